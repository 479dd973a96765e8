/** A job file, or standard input, becomes a checked job. */
import { createReadStream, statSync } from 'node:fs';
import { type CheckedJob, type Issue, largestTextLength, parseJob } from '../../core/api.ts';
import { collect, type FileIdentity, type Io } from './io.ts';
import { fileRefusal, JobRefusal } from './refusal.ts';

/** A text of this many bytes may still be short enough; one of more is not. */
const largestBytes = largestTextLength;

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
  if (bytes.length > largestBytes) throw new JobRefusal(name, [tooLarge]);
  const text = decoded(bytes);
  if (text === undefined) throw new JobRefusal(name, [notText(bytes)]);
  const read = parseJob(text);
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

const tooLarge: Issue = {
  path: '',
  code: 'too-large',
  message: `The text is longer than ${String(largestBytes)} bytes; a job of more is not read.`,
};

function decoded(bytes: Uint8Array): string | undefined {
  try {
    return new TextDecoder('utf-8', { fatal: true }).decode(bytes);
  } catch {
    return undefined; // the decoder's way of saying that the bytes are no UTF-8
  }
}

function notText(bytes: Uint8Array): Issue {
  const [first, second] = bytes;
  const isUtf16 = (first === 0xff && second === 0xfe) || (first === 0xfe && second === 0xff);
  const hint = isUtf16 ? ' It looks like UTF-16.' : '';
  return { path: '', code: 'not-json', message: `This is not UTF-8 text.${hint} Save the job as UTF-8 and try again.` };
}
