/** The local browser host as it ships, run as a process of its own. */
import { type ChildProcess, spawn } from 'node:child_process';
import { mkdtempSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { fileURLToPath } from 'node:url';
import { type HttpChannel, httpChannel } from '../../renderer/host/httpChannel.ts';
import { buildMode } from './buildMode.ts';

const root = fileURLToPath(new URL('../../', import.meta.url));
export const localFile = join(root, 'dist', 'local.mjs');

export async function buildLocal(): Promise<void> {
  await buildMode('browser', localFile);
}

/** A folder of its own for a test, removed by the returned function. */
export function testFolder(): { readonly folder: string; readonly remove: () => void } {
  const folder = mkdtempSync(join(tmpdir(), 'ohmwright-'));
  return {
    folder,
    remove: () => {
      rmSync(folder, { recursive: true, force: true });
    },
  };
}

export interface RunningLocal {
  readonly process: ChildProcess;
  /** The address as printed, with its key. */
  readonly url: string;
  readonly origin: string;
  readonly port: number;
  readonly key: string;
  /** What it has written to standard error so far. */
  stderr(): string;
  /** Settles with the exit status, or with the signal that ended it. */
  readonly ended: Promise<number | NodeJS.Signals | null>;
  /** A page of this host that names itself so. */
  page(window: string): HttpChannel;
}

/** Starts the built host and waits for the line with its address. */
export async function startBuiltLocal(folder: string, words: readonly string[] = []): Promise<RunningLocal> {
  const places = ['--store', join(folder, 'store'), '--save-folder', join(folder, 'saved'), '--no-browser'];
  const child = spawn(process.execPath, [localFile, ...places, ...words], { stdio: ['ignore', 'pipe', 'pipe'] });
  let complained = '';
  child.stderr.on('data', (piece: Buffer) => {
    complained += piece.toString('utf8');
  });
  const ended = new Promise<number | NodeJS.Signals | null>((resolve) => {
    child.on('close', (status, signal) => {
      resolve(signal ?? status);
    });
  });
  const url = await firstLine(child, () => complained);
  const { origin, port, hash } = new URL(url);
  const key = hash.replace('#key=', '');
  return {
    process: child,
    url,
    origin,
    port: Number(port),
    key,
    stderr: () => complained,
    ended,
    page: (window) => pageOf(url, window),
  };
}

/** A page at the address that a host printed. */
export function pageOf(url: string, window: string): HttpChannel {
  const { origin, hash } = new URL(url);
  return httpChannel({ base: origin, key: hash.replace('#key=', ''), window, fetch: fetchFrom(origin) });
}

/** A browser says by itself from which page it asks; Node has to be told. */
function fetchFrom(origin: string): typeof fetch {
  return async (what, how) => {
    const headers = new Headers(how?.headers);
    headers.set('Origin', origin);
    return await fetch(what, { ...how, headers });
  };
}

async function firstLine(child: ChildProcess, complained: () => string): Promise<string> {
  return await new Promise((resolve, reject) => {
    let printed = '';
    child.stdout!.on('data', (piece: Buffer) => {
      printed += piece.toString('utf8');
      if (printed.includes('\n')) resolve(printed.split('\n')[0]!);
    });
    child.on('error', reject);
    child.on('close', (status) => {
      reject(new Error(`the host ended with ${String(status)} before it said where: ${complained()}`));
    });
  });
}
