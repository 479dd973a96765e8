/** Shows the page, or a written file, with a program of the person's own. */
import { spawn } from 'node:child_process';
import { accessSync, constants } from 'node:fs';
import { delimiter, join } from 'node:path';
import type { Machine } from './folders.ts';

export interface Command {
  readonly program: string;
  readonly words: readonly string[];
}

/** Browsers that can show one page as a window of its own, without bars. */
const onPath = [
  'chromium',
  'chromium-browser',
  'google-chrome',
  'google-chrome-stable',
  'microsoft-edge',
  'microsoft-edge-stable',
];
const onMac = [
  '/Applications/Google Chrome.app/Contents/MacOS/Google Chrome',
  '/Applications/Chromium.app/Contents/MacOS/Chromium',
  '/Applications/Microsoft Edge.app/Contents/MacOS/Microsoft Edge',
];
const onWindows = [
  ['Google', 'Chrome', 'Application', 'chrome.exe'],
  ['Chromium', 'Application', 'chrome.exe'],
  ['Microsoft', 'Edge', 'Application', 'msedge.exe'],
];
/** A program that shows something takes longer than this to fail, or does not fail. */
const failsWithinMs = 3_000;

/** Whether there is a screen to show anything on. */
export function hasDisplay({ platform, env }: Machine): boolean {
  if (platform === 'darwin' || platform === 'win32') return true;
  return (env['DISPLAY'] ?? '') !== '' || (env['WAYLAND_DISPLAY'] ?? '') !== '';
}

/** What to try in turn to show the page; `profile` keeps the window apart from the person's browsing. */
export function pageCommands(machine: Machine, url: string, profile: string): readonly Command[] {
  const browser = appBrowser(machine);
  const words = [`--app=${url}`, `--user-data-dir=${profile}`, '--no-first-run', '--no-default-browser-check'];
  return [...(browser === undefined ? [] : [{ program: browser, words }]), opener(machine, url)];
}

/** The system's own way to show a file or an address. No shell reads the words. */
export function opener({ platform }: Machine, what: string): Command {
  if (platform === 'darwin') return { program: 'open', words: [what] };
  if (platform === 'win32') return { program: 'rundll32.exe', words: ['url.dll,FileProtocolHandler', what] };
  return { program: 'xdg-open', words: [what] };
}

function appBrowser({ platform, env }: Machine): string | undefined {
  if (platform === 'darwin') return onMac.find(isProgram);
  if (platform === 'win32') {
    const roots = [env['PROGRAMFILES'], env['PROGRAMFILES(X86)'], env['LOCALAPPDATA']].filter(
      (root) => root !== undefined,
    );
    return onWindows.flatMap((place) => roots.map((root) => join(root, ...place))).find(isProgram);
  }
  const folders = (env['PATH'] ?? '').split(delimiter).filter((folder) => folder !== '');
  return onPath.flatMap((name) => folders.map((folder) => join(folder, name))).find(isProgram);
}

function isProgram(path: string): boolean {
  try {
    accessSync(path, constants.X_OK);
    return true;
  } catch {
    return false; // not there, or not to be run
  }
}

/** Starts the first command that works, apart from this process; false where none does. */
export async function show(commands: readonly Command[]): Promise<boolean> {
  for (const command of commands) {
    if (await starts(command)) return true;
  }
  return false;
}

async function starts({ program, words }: Command): Promise<boolean> {
  return await new Promise((resolve) => {
    const child = spawn(program, words, { detached: true, stdio: 'ignore' });
    const trusted = setTimeout(() => {
      resolve(true);
    }, failsWithinMs);
    trusted.unref();
    child.on('error', () => {
      resolve(false);
    });
    child.on('exit', (status) => {
      clearTimeout(trusted);
      resolve(status === 0);
    });
    child.unref();
  });
}
