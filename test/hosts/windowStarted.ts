/** The window host started on the stand-in for Electron, with a store, a home and a page of its own that are gone afterwards. */
import { cpSync, mkdirSync, mkdtempSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { start, type WindowSurroundings } from '../../electron/window/start.ts';
import { preloadFile } from './builtWindow.ts';
import { StandIn, type StandInContents, type StandInWindow } from './electronStandIn.ts';

export interface StartedWindow {
  readonly electron: StandIn;
  readonly window: StandInWindow;
  readonly contents: StandInContents;
  readonly folder: string;
  readonly storeFolder: string;
  readonly log: string[];
  /** Closes the window and waits until the store is closed. */
  end(): Promise<void>;
}

export interface Home {
  readonly folder: string;
  readonly storeFolder: string;
  readonly builtFolder: string;
}

/** A home for one start: an invented page of two files and the built preload. */
export function makeHome(): Home {
  const folder = mkdtempSync(join(tmpdir(), 'ohmwright-window-'));
  const builtFolder = join(folder, 'built');
  mkdirSync(join(builtFolder, 'page', 'assets'), { recursive: true });
  mkdirSync(join(folder, 'Documents'));
  cpSync(preloadFile, join(builtFolder, 'preload.cjs'));
  writeFileSync(
    join(builtFolder, 'page', 'index.html'),
    '<meta name="csp-nonce" content="__CSP_NONCE__"><p>the page</p>',
  );
  writeFileSync(join(builtFolder, 'page', 'assets', 'page.js'), 'export const page = 1;');
  return { folder, builtFolder, storeFolder: join(folder, 'store') };
}

export function forget(home: Home): void {
  rmSync(home.folder, { recursive: true, force: true });
}

export interface StartChanges {
  readonly home?: Home;
  /** Words after the program's name. */
  readonly words?: readonly string[];
  readonly platform?: NodeJS.Platform;
  /** Changes the stand-in before the program sees it. */
  readonly prepare?: (electron: StandIn) => void;
}

export interface Run {
  readonly electron: StandIn;
  readonly home: Home;
  readonly log: string[];
}

/** Starts and waits for what the start leads to, be it a window or not. */
export async function run({
  home = makeHome(),
  words = [],
  platform = 'linux',
  prepare,
}: StartChanges = {}): Promise<Run> {
  const electron = new StandIn(home.folder);
  prepare?.(electron);
  const log: string[] = [];
  const here: WindowSurroundings = {
    start: { words: ['ohmwright', ...words], folder: home.folder },
    platform,
    home: home.folder,
    env: { OHMWRIGHT_STORE: home.storeFolder },
    builtFolder: home.builtFolder,
    resourcesFolder: join(home.folder, 'resources'),
    log: (line) => void log.push(line),
  };
  await start(electron.module, here);
  return { electron, home, log };
}

export async function startWindow(changes: StartChanges = {}): Promise<StartedWindow> {
  const { electron, home, log } = await run(changes);
  const window = electron.windows[0];
  if (window === undefined) throw new Error(`no window: ${JSON.stringify([electron.asked, log])}`);
  return {
    electron,
    window,
    contents: window.webContents,
    folder: home.folder,
    storeFolder: home.storeFolder,
    log,
    async end() {
      window.webContents.holdsOn = false;
      window.close();
      await electron.ended();
      if (changes.home === undefined) forget(home);
    },
  };
}
