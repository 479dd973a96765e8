/** A job file, or standard input, becomes a checked job. */
import { createReadStream, statSync } from 'node:fs';
import { type CheckedJob, parseJob } from '../../core/api.ts';
import { jobText, largestBytes } from '../files/jobText.ts';
import { collect, type FileIdentity, type Io } from './io.ts';
import { fileRefusal, JobRefusal } from './refusal.ts';

export interface JobRead {
  readonly job: CheckedJob;
  /** How the file is called in a message. */
  readonly name: string;
  /** The file itself, so that no answer is written over it. */
  readonly file: FileIdentity | undefined;
}

/** Reads and checks a job; throws a `Refusal` where the file cannot be read, a `JobRefusal` where the job has issues. */
export async function readJob(path: string, io: Io): Promise<JobRead> {
  const fromStdin = path === '-';
  const name = fromStdin ? 'standard input' : path;
  const { bytes, file } = fromStdin ? await stdinBytes(io) : await fileBytes(path);
  const text = jobText(bytes);
  if (!text.ok) throw new JobRefusal(name, text.issues);
  const read = parseJob(text.value);
  if (!read.ok) throw new JobRefusal(name, read.issues);
  return { job: read.value, name, file };
}

interface BytesRead {
  readonly bytes: Uint8Array;
  readonly file: FileIdentity | undefined;
}

async function stdinBytes(io: Io): Promise<BytesRead> {
  try {
    return { bytes: await io.readStdin(largestBytes), file: io.stdinFile() };
  } catch (error) {
    throw fileRefusal('Standard input cannot be read', error);
  }
}

async function fileBytes(path: string): Promise<BytesRead> {
  try {
    const { dev, ino } = statSync(path);
    return { bytes: await collect(createReadStream(path), largestBytes), file: { dev, ino } };
  } catch (error) {
    throw fileRefusal(`${path} cannot be read`, error);
  }
}
