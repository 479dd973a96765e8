/**
 * The real window, where Electron's runtime is installed: elsewhere these tests are reported as skipped. They start the built program on
 * an empty store and let it say, through its window's own page, that it is there.
 */
import { spawn } from 'node:child_process';
import { existsSync, mkdtempSync, readFileSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { fileURLToPath } from 'node:url';
import { expect, test } from 'vitest';
import { buildMain, buildPage, buildPreload, mainFile } from './builtWindow.ts';

const electronFolder = fileURLToPath(new URL('../../node_modules/electron', import.meta.url));
const runtime = runtimeProgram();

/** Where the runtime's own installation says that it is. */
function runtimeProgram(): string | undefined {
  const pathFile = join(electronFolder, 'path.txt');
  if (!existsSync(pathFile)) return undefined;
  const program = join(electronFolder, 'dist', readFileSync(pathFile, 'utf8').trim());
  return existsSync(program) ? program : undefined;
}

test('the real window starts, makes its store with the SQLite of its runtime, and ends when told to', async ({
  skip,
}) => {
  skip(runtime === undefined, 'no runtime');
  await buildMain();
  await buildPreload();
  await buildPage();
  const store = mkdtempSync(join(tmpdir(), 'ohmwright-smoke-'));
  // Chromium refuses its own sandbox to the superuser, as whom tests may run in a container.
  const words = process.getuid?.() === 0 ? [mainFile, '--no-sandbox'] : [mainFile];
  const child = spawn(runtime!, words, {
    env: { ...process.env, OHMWRIGHT_STORE: store },
    stdio: ['ignore', 'ignore', 'pipe'],
  });
  let complaints = '';
  child.stderr.on('data', (piece: Buffer) => {
    complaints += piece.toString('utf8');
  });
  const ended = new Promise<number | null>((resolve) => child.on('exit', (status) => resolve(status)));
  try {
    await expect.poll(() => existsSync(join(store, 'ohmwright.db')), { timeout: 30_000 }).toBe(true);
    child.kill('SIGTERM');
    expect(await ended).toBe(0);
    expect(complaints).not.toMatch(/^ohmwright:/m);
  } finally {
    child.kill('SIGKILL');
    rmSync(store, { recursive: true, force: true });
  }
});
