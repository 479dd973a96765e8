/** Writes a file whole or not at all: after a power cut there is the old file or the new one, never half of one. */
import { randomBytes } from 'node:crypto';
import {
  chmodSync,
  closeSync,
  existsSync,
  fsyncSync,
  linkSync,
  openSync,
  realpathSync,
  renameSync,
  statSync,
  unlinkSync,
  writeFileSync,
} from 'node:fs';
import { basename, dirname, join } from 'node:path';

type Content = string | Uint8Array;

/**
 * Writes beside the place under another name, waits for the disk, then renames. A link is followed, a pipe or device is written as
 * it is, and who may read an old file may read the new one. Throws the system's error.
 */
export function writeWhole(path: string, content: Content): void {
  const existing = statSync(path, { throwIfNoEntry: false });
  if (existing !== undefined && !existing.isFile()) {
    writeFileSync(path, content);
    return;
  }
  const place = existing === undefined ? path : realpathSync(path);
  placed(place, content, (beside) => {
    if (existing !== undefined) chmodSync(beside, existing.mode & 0o777);
    renameSync(beside, place);
  });
}

/**
 * Writes a file under a name that no other file has, numbered where need be: `hut.pdf`, `hut (2).pdf`. Answers where it went.
 * Throws the system's error.
 */
export function writeNumbered(folder: string, name: string, content: Content): string {
  // A number that the name has already is counted on, so that no name ends in two of them.
  const split = /^(.+?)(?: \(\d{1,3}\))?((?:\.job\.json|\.[A-Za-z0-9]+)?)$/.exec(name);
  const [stem, ending] = [split?.[1] ?? name, split?.[2] ?? ''];
  for (let number = 1; ; number += 1) {
    const path = join(folder, number === 1 ? name : `${stem} (${String(number)})${ending}`);
    if (!existsSync(path) && placed(path, content, (beside) => takeName(beside, path))) return path;
  }
}

/** False where another program has taken the name in the meantime. */
function takeName(beside: string, path: string): boolean {
  try {
    linkSync(beside, path);
  } catch (error) {
    const code = error instanceof Error && 'code' in error ? error.code : undefined;
    if (code === 'EEXIST') {
      unlinkSync(beside);
      return false;
    }
    // Not every file system has a second name for a file; there the moment between question and renaming has to be borne.
    renameSync(beside, path);
    return true;
  }
  unlinkSync(beside);
  return true;
}

function placed<T>(path: string, content: Content, take: (beside: string) => T): T {
  const beside = join(dirname(path), `.${basename(path).slice(0, 100)}.${randomBytes(6).toString('hex')}.part`);
  const descriptor = openSync(beside, 'wx');
  let answer: T;
  try {
    try {
      writeFileSync(descriptor, content);
      fsyncSync(descriptor);
    } finally {
      closeSync(descriptor);
    }
    answer = take(beside);
  } catch (error) {
    unlinkSync(beside);
    throw error;
  }
  settleFolder(dirname(path));
  return answer;
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
