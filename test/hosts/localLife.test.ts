/** How the local browser host comes and goes. */
import { spawn, spawnSync } from 'node:child_process';
import { chmodSync, mkdirSync, readFileSync, writeFileSync } from 'node:fs';
import { dirname, join } from 'node:path';
import { afterAll, beforeAll, describe, expect, test } from 'vitest';
import type { HostChannel, HostEvent } from '../../core/host.ts';
import { buildLocal, localFile, pageOf, type RunningLocal, startBuiltLocal, testFolder } from './builtLocal.ts';
import { ask, titled } from './scriptedEdits.ts';
import { thinCable } from './smallJobs.ts';

beforeAll(buildLocal);

const { folder, remove } = testFolder();
afterAll(remove);

/** So long that a test which waits for it fails by its own time. */
const patient = ['--idle', '3600'];

async function firstEvent(channel: HostChannel): Promise<HostEvent> {
  return await new Promise((resolve) => {
    channel.listen(resolve);
  });
}

/** A page that the host knows of: an event has come through to it. */
async function openPage(host: RunningLocal, window: string): Promise<ReturnType<RunningLocal['page']>> {
  const page = host.page(window);
  const { job, head } = await ask(page, 'jobs.create', { text: titled('Any'), label: 'Any' });
  const other = host.page('other');
  const told = firstEvent(page);
  // The stream may open later than the call is answered; a change is told to whoever listens by then.
  let after = head;
  const timer = setInterval(() => {
    void other.call('jobs.keep', { job, after, text: titled('Changed'), label: 'Changed' }).then((answer) => {
      if (answer.ok) after = answer.value.head;
    });
  }, 50);
  await told;
  clearInterval(timer);
  other.close();
  return page;
}

describe('the end of a host', () => {
  test.each(['SIGTERM', 'SIGINT', 'SIGHUP'] as const)('comes with %s, even while a page is open', async (signal) => {
    const host = await startBuiltLocal(folder, patient);
    const page = await openPage(host, 'page');
    host.process.kill(signal);
    expect(await host.ended).toBe(0);
    expect(host.stderr()).toBe('');
    expect(await page.call('host.about', {})).toMatchObject({ ok: false, trouble: { code: 'no-host' } });
    page.close();
  });

  test('comes when the page asks for it; what others asked before is answered first', async () => {
    const host = await startBuiltLocal(folder, patient);
    const page = await openPage(host, 'page');
    const other = host.page('other');
    const paper = other.call('reports.pdf', { text: JSON.stringify(thinCable), paper: 'A4', preparedOn: '2025-03-31' });
    await ask(other, 'jobs.list', {}); // sent after the paper was asked for, so that is under way now
    expect(await page.call('host.end', {})).toEqual({ ok: true, value: null });
    expect(await paper).toMatchObject({ ok: true });
    expect(await host.ended).toBe(0);
    page.close();
    other.close();
  });

  test('comes by itself once the last page has gone, and not before', async () => {
    const host = await startBuiltLocal(folder, ['--idle', '1']);
    const page = await openPage(host, 'page');
    await new Promise((resolve) => setTimeout(resolve, 2_500));
    expect(await page.call('host.about', {})).toMatchObject({ ok: true });
    page.close();
    expect(await host.ended).toBe(0);
  });
});

describe('the start of a host', () => {
  test('says its address in one line, on the loopback address, with a key of 32 bytes that is new each time', async () => {
    const hosts = [await startBuiltLocal(folder, patient), await startBuiltLocal(folder, patient)];
    for (const { url } of hosts) expect(url).toMatch(/^http:\/\/127\.0\.0\.1:\d+\/#key=[A-Za-z0-9_-]{43}$/);
    expect(hosts[0]!.key).not.toBe(hosts[1]!.key);
    for (const host of hosts) host.process.kill('SIGTERM');
    for (const host of hosts) expect(await host.ended).toBe(0);
  });

  test('with a job file leads the first page to it', async () => {
    const file = join(folder, 'stick.job.json');
    writeFileSync(file, titled('From a stick'));
    const host = await startBuiltLocal(folder, [...patient, file]);
    const page = host.page('page');
    const event = await firstEvent(page);
    if (event.event !== 'open-job') throw new Error(`told ${event.event}`);
    expect(await ask(page, 'jobs.open', { job: event.job })).toMatchObject({ title: 'From a stick', file });
    page.close();
    host.process.kill('SIGTERM');
    expect(await host.ended).toBe(0);
  });

  test('with a file that is no job tells the first page so', async () => {
    const file = join(folder, 'no.job.json');
    writeFileSync(file, '{"format": "something else"}');
    const host = await startBuiltLocal(folder, [...patient, file]);
    const page = host.page('page');
    expect(await firstEvent(page)).toMatchObject({ event: 'file-trouble', file, trouble: { code: 'issues' } });
    page.close();
    host.process.kill('SIGTERM');
    expect(await host.ended).toBe(0);
  });

  test('on a port that is taken, or with wrong words, ends in plain words', async () => {
    const host = await startBuiltLocal(folder, patient);
    await expect(startBuiltLocal(folder, ['--port', String(host.port)])).rejects.toThrow(/ended with 1 .*EADDRINUSE/s);
    for (const words of [['--port', '70000'], ['--port', 'x'], ['--idle', '-1'], ['--nothing'], ['a', 'b']]) {
      await expect(startBuiltLocal(folder, words)).rejects.toThrow(/ended with 2 .*error: /s);
    }
    host.process.kill('SIGTERM');
    await host.ended;
  });
});

/** Programs of this name that only note what they were asked, and end with the given status. */
function fakePrograms(name: string, programs: Readonly<Record<string, number>>): { path: string; noted: () => string } {
  const bin = join(folder, name);
  mkdirSync(bin);
  writeFileSync(join(bin, 'noted'), '');
  for (const [program, status] of Object.entries(programs)) {
    const file = join(bin, program);
    writeFileSync(
      file,
      `#!/bin/sh\nfor word in "$0" "$@"; do echo "$word" >> "${bin}/noted"; done\nexit ${String(status)}\n`,
    );
    chmodSync(file, 0o755);
  }
  return { path: bin, noted: () => readFileSync(join(bin, 'noted'), 'utf8') };
}

/** Starts the host with a screen and only the given programs on its path; answers what it printed. */
async function startShowing(path: string): Promise<{ url: string; stderr: string }> {
  const child = spawn(process.execPath, [localFile, '--store', join(folder, 'store'), ...patient], {
    env: { HOME: folder, PATH: path, DISPLAY: ':9' },
  });
  let [out, complained] = ['', ''];
  child.stdout.on('data', (piece: Buffer) => {
    out += piece.toString('utf8');
  });
  child.stderr.on('data', (piece: Buffer) => {
    complained += piece.toString('utf8');
  });
  while (!out.includes('\n')) await new Promise((resolve) => setTimeout(resolve, 20));
  const url = out.trim();
  // The signal is heeded from when the page was shown, or could not be.
  const page = pageOf(url, 'page');
  await ask(page, 'host.about', {});
  await new Promise((resolve) => setTimeout(resolve, 500));
  await page.call('host.end', {});
  page.close();
  await new Promise((resolve) => child.on('close', resolve));
  return { url, stderr: complained };
}

describe.skipIf(process.platform !== 'linux')('showing the page', () => {
  test('an installed browser opens it as a window of its own, apart from the browsing of the person', async () => {
    const { path, noted } = fakePrograms('with-browser', { chromium: 0, 'xdg-open': 0 });
    const { url, stderr } = await startShowing(path);
    expect(noted().split('\n').slice(0, 3)).toEqual([
      join(path, 'chromium'),
      `--app=${url}`,
      `--user-data-dir=${join(folder, 'store', 'browser')}`,
    ]);
    expect(stderr).toBe('');
  });

  test('where that fails, or there is none, the system opens it', async () => {
    const { path, noted } = fakePrograms('with-broken-browser', { chromium: 1, 'xdg-open': 0 });
    const { url, stderr } = await startShowing(path);
    expect(noted().trim().split('\n').slice(-2)).toEqual([join(path, 'xdg-open'), url]);
    expect(stderr).toBe('');
  });

  test('where nothing can, it says so and goes on', async () => {
    const { path } = fakePrograms('with-nothing', {});
    expect((await startShowing(path)).stderr).toContain('open the address above');
  });
});

describe('the launcher', () => {
  test('says in one line why there is no window, and serves the same app to the browser', async () => {
    const launcher = join(dirname(localFile), 'launch.mjs');
    const words = [launcher, '--version'];
    const { status, stdout, stderr } = spawnSync(process.execPath, words, { encoding: 'utf8' });
    expect(stderr).toBe(
      'ohmwright: the runtime of the desktop window is not installed, so the app opens in your browser.\n',
    );
    expect(stdout).toMatch(/^\d+\.\d+\.\d+\n$/);
    expect(status).toBe(0);
  });
});
