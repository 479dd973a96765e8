/** Writes an answer to a file, whole or not at all, and never over the job that it was made from. */
import { type Stats, statSync } from 'node:fs';
import { writeWhole } from '../files/wholeFile.ts';
import type { FileIdentity } from './io.ts';
import { exitStatus, fileRefusal, Refusal } from './refusal.ts';

export interface OutRequest {
  readonly path: string;
  readonly content: string | Uint8Array;
  /** The job that the answer was made from. */
  readonly input?: FileIdentity | undefined;
  /** True where an existing file is to be kept. */
  readonly keepExisting?: boolean;
}

/**
 * Throws a `Refusal` before any work where the place is one that may not be written; to be called early, so that nobody waits for
 * an answer that has nowhere to go.
 */
export function checkPlace({ path, input, keepExisting }: Omit<OutRequest, 'content'>): void {
  const existing = statOf(path);
  if (existing === undefined) return;
  if (input !== undefined && existing.dev === input.dev && existing.ino === input.ino) {
    throw new Refusal(exitStatus.words, `--out ${path} is the job file itself; no command changes its input.`);
  }
  if (existing.isDirectory()) throw new Refusal(exitStatus.file, `${path} cannot be written: it is a folder.`);
  if (keepExisting === true && existing.isFile()) {
    throw new Refusal(
      exitStatus.file,
      `${path} cannot be written: it exists already and is not written over; name another place.`,
    );
  }
}

/** A pipe or device is written as it is. Throws a `Refusal` where the system refuses. */
export function writeOut(request: OutRequest): void {
  checkPlace(request);
  try {
    writeWhole(request.path, request.content);
  } catch (error) {
    throw fileRefusal(`${request.path} cannot be written`, error);
  }
}

function statOf(path: string): Stats | undefined {
  try {
    return statSync(path, { throwIfNoEntry: false });
  } catch (error) {
    throw fileRefusal(`${path} cannot be written`, error);
  }
}
