/** Writes an answer to a file, whole or not at all, and never over the job that it was made from. */
import { randomBytes } from 'node:crypto';
import {
  chmodSync,
  closeSync,
  fsyncSync,
  openSync,
  realpathSync,
  renameSync,
  type Stats,
  statSync,
  unlinkSync,
  writeFileSync,
} from 'node:fs';
import { basename, dirname, join } from 'node:path';
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
      `${path} cannot be written: it exists already, and a new job is not put over an old one.`,
    );
  }
}

/**
 * Writes beside the place under another name, waits for the disk, then renames: after a power cut there is the old file or the new
 * one, never half of one. A pipe or device is written as it is.
 */
export function writeOut(request: OutRequest): void {
  checkPlace(request);
  try {
    const existing = statOf(request.path);
    if (existing !== undefined && !existing.isFile()) writeFileSync(request.path, request.content);
    else replace(existing === undefined ? request.path : realpathSync(request.path), request.content, existing);
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

function replace(path: string, content: string | Uint8Array, existing: Stats | undefined): void {
  const beside = join(dirname(path), `.${basename(path).slice(0, 100)}.${randomBytes(6).toString('hex')}.part`);
  const descriptor = openSync(beside, 'wx');
  try {
    try {
      writeFileSync(descriptor, content);
      fsyncSync(descriptor);
    } finally {
      closeSync(descriptor);
    }
    if (existing !== undefined) chmodSync(beside, existing.mode & 0o777);
    renameSync(beside, path);
  } catch (error) {
    unlinkSync(beside);
    throw error;
  }
  settleFolder(dirname(path));
}

/** Makes the new name itself last; not every system lets a folder be opened for that, and then the rename has to do. */
function settleFolder(folder: string): void {
  try {
    const descriptor = openSync(folder, 'r');
    try {
      fsyncSync(descriptor);
    } finally {
      closeSync(descriptor);
    }
  } catch {
    // The content is written and renamed; only the moment at which the disk keeps the name is left to the system.
  }
}
