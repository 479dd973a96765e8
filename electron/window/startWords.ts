/** What the words of a start mean: files to open, and where the store lies. */
import { resolve } from 'node:path';
import { fileURLToPath } from 'node:url';

export interface Start {
  /** The words that the program was started with, its own name first. */
  readonly words: readonly string[];
  /** Relative names count from here. */
  readonly folder: string;
}

export interface StartWords {
  readonly files: readonly string[];
  /** As said with `--store FOLDER`. */
  readonly store: string | undefined;
}

/** `programPaths`: what a development start names as the program itself, and is no job. Unknown switches are passed over: Chromium adds some. */
export function readWords({ words, folder }: Start, programPaths: readonly string[]): StartWords {
  const files: string[] = [];
  let store: string | undefined;
  let storeIsNext = false;
  for (const word of words.slice(1)) {
    const named = storeIsNext ? word : /^--store=(.+)$/.exec(word)?.[1];
    storeIsNext = word === '--store';
    if (named !== undefined) store = resolve(folder, named);
    else if (word !== '' && !word.startsWith('-')) {
      const path = pathOf(word, folder);
      if (path !== undefined && !programPaths.includes(path)) files.push(path);
    }
  }
  return { files, store };
}

/** Some desktops hand over an address instead of a path; an address of anything but a file is not for us. */
function pathOf(word: string, folder: string): string | undefined {
  if (!/^[a-z][a-z0-9+.-]+:\/\//i.test(word)) return resolve(folder, word);
  try {
    return fileURLToPath(word);
  } catch {
    return undefined;
  }
}
