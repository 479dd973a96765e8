import { spawnSync } from 'node:child_process';
import { cpSync, mkdirSync, mkdtempSync, readdirSync, readFileSync, rmSync, writeFileSync } from 'node:fs';
import { dirname, join } from 'node:path';
import { fileURLToPath } from 'node:url';
import { afterAll, beforeAll, describe, expect, test } from 'vitest';
import { buildMain, buildPreload, mainFile, preloadFile } from './builtWindow.ts';
import { type PageKey, runPreload } from './electronStandIn.ts';

describe('the built preload', () => {
  beforeAll(buildPreload);

  function load(
    invoke: (channel: string, ...words: unknown[]) => Promise<unknown> = async () => await Promise.resolve(),
  ) {
    const run = runPreload({ file: preloadFile, words: ['electron', '--ohmwright-window=window-7'], invoke });
    return { ...run, key: run.exposed['ohmwright'] as PageKey };
  }

  test('is one file that needs only electron, as a sandbox wants it', () => {
    expect(load().required).toEqual(['electron']);
    expect(readFileSync(preloadFile, 'utf8')).not.toMatch(/\bimport\b|node:/);
  });

  test('exposes one key', () => {
    expect(Object.keys(load().exposed)).toEqual(['ohmwright']);
    expect(load().key.window).toBe('window-7');
  });

  test('sends each call over the one channel and hands back its answer', async () => {
    const sent: unknown[] = [];
    const { key } = load(async (...words) => {
      sent.push(words);
      return await Promise.resolve({ ok: true, value: 5 });
    });
    expect(await key.call('jobs.list', { a: 1 })).toEqual({ ok: true, value: 5 });
    expect(sent).toEqual([['ohmwright:call', 'jobs.list', { a: 1 }]]);
  });

  test('holds events until the page listens, in their order, and no longer', () => {
    const { key, deliver } = load();
    deliver('ohmwright:event', 1);
    deliver('ohmwright:event', 2);
    const heard: unknown[] = [];
    const stop = key.listen((event) => heard.push(event));
    deliver('ohmwright:event', 3);
    deliver('some-other-channel', 4);
    stop();
    deliver('ohmwright:event', 5);
    expect(heard).toEqual([1, 2, 3]);
  });

  test('holds no more than a hundred events for a page that never listens', () => {
    const { key, deliver } = load();
    for (let event = 1; event <= 500; event += 1) deliver('ohmwright:event', event);
    const heard: unknown[] = [];
    key.listen((event) => heard.push(event));
    expect(heard.length).toBe(100);
  });
});

describe('the built main process', () => {
  let folder: string;
  beforeAll(async () => {
    await buildMain();
    await buildPreload();
    folder = packaged();
  });
  afterAll(() => {
    rmSync(folder, { recursive: true, force: true });
  });

  test('loads in plain Node with a stub for electron, opens its window on the page, answers a call and ends', () => {
    const store = join(folder, 'store');
    const stub = fileURLToPath(new URL('electronStub/register.mjs', import.meta.url));
    const run = spawnSync(process.execPath, ['--import', stub, join(folder, 'main.mjs')], {
      encoding: 'utf8',
      env: { ...process.env, OHMWRIGHT_STORE: store },
      timeout: 30_000,
    });
    expect(run.stderr).toBe('');
    expect(run.status).toBe(0);
    const told = JSON.parse(run.stdout) as Record<string, unknown>;
    expect(told).toMatchObject({
      schemes: ['app'],
      channels: ['ohmwright:call'],
      windows: [
        { preload: join(folder, 'preload.cjs'), contextIsolation: true, sandbox: true, nodeIntegration: false },
      ],
      page: { status: 200, policy: expect.stringContaining("default-src 'none'") as unknown },
      answer: { ok: true, value: { kind: 'window', storeFolder: store } },
    });
    expect(told).not.toHaveProperty('error');
  });
});

/** The built files with an invented page, in a folder from which the packages of this project are found. */
function packaged(): string {
  const dist = dirname(mainFile);
  const cache = join(dist, '..', '.cache');
  mkdirSync(cache, { recursive: true });
  const folder = mkdtempSync(join(cache, 'built-window-'));
  for (const file of readdirSync(dist))
    if (/^main.*\.mjs$|^preload\.cjs$/.test(file)) cpSync(join(dist, file), join(folder, file));
  mkdirSync(join(folder, 'page'));
  writeFileSync(join(folder, 'page', 'index.html'), '<p>the page</p>');
  return folder;
}
