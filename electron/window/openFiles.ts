/** Files that the person opens with the system: by the command line, by a second start, by the desktop's own way. */
import type { App } from 'electron';
import type { Start } from './startWords.ts';

export interface OpenFilesRequest {
  /** Files that the first start named. */
  readonly first: readonly string[];
  /** Reads those that a second start names. */
  readonly read: (start: Start) => readonly string[];
}

export interface OpenFiles {
  /** From here on files go to `open`, those that came before the window first, one at a time; `show` brings the window to the front. */
  deliverTo(open: (path: string) => Promise<void>, show: () => void): void;
}

/** Listens from the very start: macOS tells of a file before the program is ready. */
export function listenForFiles(app: App, { first, read }: OpenFilesRequest): OpenFiles {
  const waiting = [...first];
  let show = (): void => {};
  let take: ((path: string) => Promise<void>) | undefined;
  let last = Promise.resolve();
  const arrived = (path: string): void => {
    const open = take;
    if (open === undefined) waiting.push(path);
    else last = last.then(async () => await open(path));
  };

  app.on('open-file', (event, path) => {
    event.preventDefault();
    show();
    arrived(path);
  });
  app.on('second-instance', (_event, words, folder) => {
    show();
    for (const path of read({ words, folder })) arrived(path);
  });
  return {
    deliverTo(open, showWindow) {
      take = open;
      show = showWindow;
      for (const path of waiting.splice(0)) arrived(path);
    },
  };
}
