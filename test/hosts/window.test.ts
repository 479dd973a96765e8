import { existsSync, mkdirSync, readdirSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { pathToFileURL } from 'node:url';
import type { MenuItemConstructorOptions } from 'electron';
import { afterAll, afterEach, beforeAll, describe, expect, test } from 'vitest';
import type { AboutHost, HostAnswer, HostEvent, JobSummary, KeptJob } from '../../core/host.ts';
import { menuTemplate } from '../../electron/window/menu.ts';
import { buildPreload } from './builtWindow.ts';
import { preventable } from './electronStandIn.ts';
import { tenAmps } from './smallJobs.ts';
import {
  forget,
  type Home,
  makeHome,
  run,
  type StartChanges,
  type StartedWindow,
  startWindow,
} from './windowStarted.ts';

let started: StartedWindow | undefined;
const homes: Home[] = [];

beforeAll(buildPreload);
afterEach(async () => {
  await started?.end();
  started = undefined;
});
afterAll(() => homes.forEach(forget));

async function open(changes?: StartChanges): Promise<StartedWindow> {
  started = await startWindow(changes);
  return started;
}

function home(): Home {
  const made = makeHome();
  homes.push(made);
  return made;
}

async function call<T>({ contents }: StartedWindow, method: string, ask: unknown = {}): Promise<T> {
  const answer = (await contents.key.call(method, ask)) as HostAnswer<T>;
  if (!answer.ok) throw new Error(JSON.stringify(answer.trouble));
  return answer.value;
}

/** Waits for the next event that the page is told. */
async function nextEvent({ contents }: StartedWindow): Promise<HostEvent> {
  return await new Promise((resolve) => {
    const stop = contents.key.listen((event) => {
      queueMicrotask(() => stop());
      resolve(event as HostEvent);
    });
  });
}

const jobText = JSON.stringify(tenAmps);

describe('the start', () => {
  test('the page is loaded from our own scheme, with the policy and a fresh nonce at each load', async () => {
    const { contents, electron } = await open();
    expect(contents.mainFrame.url).toBe('app://ohmwright/');
    const first = contents.page!;
    await contents.load('app://ohmwright/');
    const again = contents.page!;
    const nonces = [first, again].map(
      (page) => /'nonce-([^']+)'/.exec(page.headers.get('content-security-policy')!)![1]!,
    );
    expect(first.status).toBe(200);
    expect(first.headers.get('content-security-policy')).toContain("default-src 'none'");
    expect(first.text).toContain(`content="${nonces[0]!}"`);
    expect(nonces[0]).not.toBe(nonces[1]);
    const script = await electron.ask('app://ohmwright/assets/page.js');
    expect([script.status, script.headers.get('content-type')]).toEqual([200, 'text/javascript; charset=utf-8']);
  });

  test('the window is hidden until it has something to show', async () => {
    const { window } = await open();
    expect(window.options.show).toBe(false);
    expect(window.done).toEqual(['show']);
  });

  test('the page is shut in: isolated, sandboxed, without Node, without frames of other programs', async () => {
    const { window, electron } = await open();
    expect(window.options.webPreferences).toMatchObject({
      contextIsolation: true,
      sandbox: true,
      nodeIntegration: false,
      nodeIntegrationInWorker: false,
      nodeIntegrationInSubFrames: false,
      webSecurity: true,
      webviewTag: false,
      spellcheck: false,
      devTools: false,
    });
    expect(electron.app.sandboxed).toBe(true);
    expect(electron.schemes).toEqual([
      { scheme: 'app', privileges: { standard: true, secure: true, supportFetchAPI: true, codeCache: true } },
    ]);
  });

  test('switches that would let another program steer the page are taken away', async () => {
    const { electron } = await open({
      prepare: ({ app }) => {
        for (const name of ['remote-debugging-port', 'remote-debugging-pipe', 'lang']) app.switches.add(name);
      },
    });
    expect([...electron.app.switches]).toEqual(['lang']);
  });

  test('developer tools are there only while we develop', async () => {
    const { window, electron } = await open({
      prepare: ({ app }) => {
        app.isPackaged = false;
      },
    });
    expect(window.options.webPreferences?.devTools).toBe(true);
    expect(electron.mayRequest('devtools://devtools/bundled/inspector.html')).toBe(true);
  });

  test('the preload gives the page one key with three things in it, and the name of its window', async () => {
    const { contents } = await open();
    expect(Object.keys(contents.preload!.exposed)).toEqual(['ohmwright']);
    expect(Object.keys(contents.key).toSorted()).toEqual(['call', 'listen', 'window']);
    expect(contents.key.window).toMatch(/^window-[0-9a-f]{8}$/);
  });

  test('the host says what it is and where things lie', async () => {
    const window = await open();
    const about = await call<AboutHost>(window, 'host.about');
    expect(about).toMatchObject({
      kind: 'window',
      can: { askForFile: true, askWhereToSave: true, showFile: true },
      storeFolder: window.storeFolder,
      saveFolder: join(window.folder, 'Documents', 'Ohmwright'),
    });
  });

  test("Chromium's own files lie beside the store, not among its files", async () => {
    const { electron, storeFolder } = await open();
    expect(electron.app.getPath('userData')).toBe(join(storeFolder, 'window'));
  });

  test('a second start with the same store gives way to the first', async () => {
    const { electron, home } = await run({
      prepare: ({ app }) => {
        app.firstInstance = false;
      },
    });
    homes.push(home);
    expect(electron.windows).toEqual([]);
    expect(electron.app.exitCode).toBe(0);
    expect(readdirSync(home.storeFolder)).toEqual(['window']);
  });

  test('a page that was not built is told in words and ends the program', async () => {
    const place = home();
    const { electron } = await run({ home: { ...place, builtFolder: join(place.folder, 'nowhere') } });
    expect(electron.asked.map(({ kind }) => kind)).toEqual(['error']);
    expect(electron.asked[0]!.options.detail).toContain('build it first');
    expect(electron.app.exitCode).toBe(1);
  });
});

describe('a store that cannot be opened', () => {
  test('is told with its reason; its folder can be opened, and the program be left', async () => {
    const place = home();
    // A file stands where the store's folder should be.
    writeFileSync(place.storeFolder, 'in the way');
    const { electron } = await run({
      home: place,
      prepare: ({ answers }) => void answers.push({ response: 1 }, { response: 2 }),
    });
    expect(electron.asked.map(({ options }) => options.message)).toEqual([
      'The store of jobs could not be opened.',
      'The store of jobs could not be opened.',
    ]);
    expect(electron.asked[0]!.options.buttons).toEqual(['Try again', 'Open the folder', 'Quit']);
    expect(electron.asked[0]!.options.detail).toContain(place.storeFolder);
    expect(electron.shown).toEqual([place.storeFolder]);
    expect(electron.windows).toEqual([]);
    expect(electron.app.exitCode).toBe(0);
  });
});

describe('files', () => {
  test('a job named at the start is opened once the page is there', async () => {
    const place = home();
    writeFileSync(join(place.folder, 'hut.job.json'), jobText);
    const window = await open({ home: place, words: ['--some-switch', 'hut.job.json'] });
    const event = await nextEvent(window);
    const jobs = await call<readonly JobSummary[]>(window, 'jobs.list');
    expect(jobs.map(({ file }) => file)).toEqual([join(place.folder, 'hut.job.json')]);
    expect(event).toEqual({ event: 'open-job', job: jobs[0]!.job });
  });

  test('a second start with a job opens it in the first, whose window comes to the front', async () => {
    const window = await open();
    writeFileSync(join(window.folder, 'boat.job.json'), jobText);
    window.window.minimized = true;
    const told = nextEvent(window);
    window.electron.app.emit('second-instance', {}, ['ohmwright', '--flag', 'boat.job.json'], window.folder);
    expect(await told).toMatchObject({ event: 'open-job' });
    expect([window.window.minimized, window.window.done]).toEqual([false, ['show', 'focus']]);
  });

  test('a job opened by association comes as an event, also as an address', async () => {
    const window = await open();
    const path = join(window.folder, 'van with a space.job.json');
    writeFileSync(path, jobText);
    let told = nextEvent(window);
    const event = preventable({});
    window.electron.app.emit('open-file', event, path);
    const first = await told;
    told = nextEvent(window);
    window.electron.app.emit('second-instance', {}, ['ohmwright', pathToFileURL(path).href], '/');
    expect([first.event, (await told).event, event.defaultPrevented]).toEqual(['open-job', 'open-job', true]);
  });

  test('a file that is no job is told as trouble with its name', async () => {
    const window = await open();
    const path = join(window.folder, 'letter.json');
    writeFileSync(path, '{"dear": "reader"}');
    const told = nextEvent(window);
    window.electron.app.emit('open-file', preventable({}), path);
    expect(await told).toMatchObject({ event: 'file-trouble', trouble: { code: 'issues' } });
  });

  test('a file that came while the page was loading again is told when it is there', async () => {
    const window = await open();
    const path = join(window.folder, 'late.job.json');
    writeFileSync(path, jobText);
    window.contents.emit('did-navigate', {}, 'app://ohmwright/');
    window.electron.app.emit('open-file', preventable({}), path);
    await expect.poll(async () => (await call<readonly JobSummary[]>(window, 'jobs.list')).length).toBe(1);
    await window.contents.load('app://ohmwright/');
    expect(await nextEvent(window)).toMatchObject({ event: 'open-job' });
  });

  test('File → Open asks in the dialog of the system and opens what was chosen', async () => {
    const window = await open();
    const path = join(window.folder, 'chosen.job.json');
    writeFileSync(path, jobText);
    expect(await call(window, 'files.open')).toBeNull();
    window.electron.answers.push({ canceled: false, filePaths: [path] });
    expect(await call<KeptJob>(window, 'files.open')).toMatchObject({ file: path });
    expect(window.electron.asked.map(({ kind }) => kind)).toEqual(['open', 'open']);
  });

  test('saving asks where, in the folder for saved files, and writes there', async () => {
    const window = await open();
    const { job, head } = await call<KeptJob>(window, 'jobs.create', { text: jobText, label: 'New' });
    const path = join(window.folder, 'kept.job.json');
    window.electron.answers.push({ canceled: false, filePath: path });
    const written = await call(window, 'files.saveJob', { job, revision: head, where: 'ask' });
    expect(written).toEqual({ name: 'kept.job.json', path });
    expect(existsSync(path)).toBe(true);
    const { defaultPath } = window.electron.asked[0]!.options as { defaultPath: string };
    expect(defaultPath.startsWith(join(window.folder, 'Documents', 'Ohmwright'))).toBe(true);
    await call(window, 'files.show', { path });
    expect(window.electron.shown).toEqual([path]);
  });
});

describe('the menu', () => {
  test.each([
    ['New job', 'new'],
    ['Open…', 'open'],
    ['Save', 'save'],
    ['Save as…', 'save-as'],
    ['Undo', 'undo'],
    ['Redo', 'redo'],
    ['Find…', 'find'],
    ['Hand over…', 'handover'],
  ])('%s reaches the page as the command %s', async (label, command) => {
    const window = await open();
    const told = nextEvent(window);
    window.electron.clickMenu(label);
    expect(await told).toEqual({ event: 'menu', command });
  });

  test('About says the version and the licence, and opens the sources', async () => {
    const { electron, folder } = await open();
    electron.answers.push({ response: 1 });
    electron.clickMenu('About Ohmwright');
    await expect.poll(() => electron.shown).toEqual([join(folder, 'resources', 'SOURCES.txt')]);
    expect(electron.asked[0]!.options.message).toMatch(/^Ohmwright \d+\.\d+\.\d+$/);
    expect(electron.asked[0]!.options.detail).toContain('Licence: MIT');
  });

  test('undo and redo leave their keys to the page, which knows whether typing or a change is meant', () => {
    const items = template('linux').flatMap((menu) => menu.submenu as MenuItemConstructorOptions[]);
    const left = items.filter(({ registerAccelerator }) => registerAccelerator === false).map(({ id }) => id);
    expect(left).toEqual(['undo', 'redo']);
  });

  test('no key is given twice', () => {
    const items = template('linux').flatMap((menu) => menu.submenu as MenuItemConstructorOptions[]);
    const keys = items.map(({ accelerator }) => accelerator).filter((key) => key !== undefined);
    expect(new Set(keys).size).toBe(keys.length);
    expect(keys.length).toBeGreaterThan(5);
  });

  test("macOS gets the program's own menu first", () => {
    expect(template('darwin')[0]).toEqual({ role: 'appMenu' });
    expect(template('win32')[0]?.label).toBe('&File');
  });

  function template(platform: NodeJS.Platform): MenuItemConstructorOptions[] {
    const nothing = (): void => {};
    return menuTemplate({ command: nothing, about: nothing, showStore: nothing }, { platform, developerTools: false });
  }
});

describe('the end', () => {
  test('a call that is still being answered is finished before the store is closed', async () => {
    const { contents, window, electron } = await open();
    const answering = contents.key.call('jobs.create', { text: jobText, label: 'New' });
    window.close();
    expect(await answering).toMatchObject({ ok: true });
    expect(await electron.ended()).toBe(0);
    await expect(contents.key.call('jobs.list', {})).rejects.toThrow('no handler registered');
  });

  test('a file that is being saved is written and noted before the store is closed', async () => {
    const place = home();
    const first = await open({ home: place });
    const { job, head } = await call<KeptJob>(first, 'jobs.create', { text: jobText, label: 'New' });
    const path = join(place.folder, 'late.job.json');
    let choose = (_answer: object): void => {};
    first.electron.answers.push(new Promise<object>((resolve) => (choose = resolve)));
    const saving = call(first, 'files.saveJob', { job, revision: head, where: 'ask' });
    await expect.poll(() => first.electron.asked.length).toBe(1);
    first.window.close();
    choose({ canceled: false, filePath: path });
    expect(await saving).toMatchObject({ path });
    expect(await first.electron.ended()).toBe(0);
    const second = await open({ home: place });
    expect(await call<KeptJob>(second, 'jobs.open', { job })).toMatchObject({ file: path });
  });

  test('what was kept is there at the next start', async () => {
    const place = home();
    const first = await open({ home: place });
    const { job } = await call<KeptJob>(first, 'jobs.create', { text: jobText, label: 'New' });
    await first.end();
    const second = await open({ home: place });
    expect((await call<readonly JobSummary[]>(second, 'jobs.list')).map((each) => each.job)).toEqual([job]);
  });

  test('the page may end the program, and has its answer first', async () => {
    const window = await open();
    expect(await call(window, 'host.end')).toBeNull();
    expect(await window.electron.ended()).toBe(0);
  });

  test('a page with changes still to send gets a moment, then closes by itself', async () => {
    const { window, contents, electron } = await open();
    contents.holdsOn = true;
    expect(window.close()).toBe(false);
    contents.holdsOn = false;
    expect(await electron.ended()).toBe(0);
    expect(electron.asked).toEqual([]);
  });

  test('a page that cannot send them leaves it to the person to stay or go', async () => {
    const { window, contents, electron } = await open();
    contents.holdsOn = true;
    window.close();
    await expect.poll(() => electron.asked.length, { timeout: 10_000 }).toBe(1);
    expect(electron.asked[0]!.options.buttons).toEqual(['Stay', 'Leave all the same']);
    expect(window.isDestroyed()).toBe(false);
    electron.answers.push({ response: 1 });
    window.close();
    await expect.poll(() => window.isDestroyed(), { timeout: 10_000 }).toBe(true);
  });

  test('the window comes back where it was, unless no screen shows that place any more', async () => {
    const place = home();
    const keep = (x: number): void => {
      mkdirSync(place.storeFolder, { recursive: true });
      const bounds = { x, y: 40, width: 1400, height: 900 };
      writeFileSync(join(place.storeFolder, 'window-place.json'), JSON.stringify({ bounds, maximized: true }));
    };
    keep(300);
    const first = await open({ home: place });
    expect(first.window.options).toMatchObject({ x: 300, y: 40, width: 1400, height: 900 });
    expect(first.window.maximized).toBe(true);
    await first.end();
    const again = await open({ home: place });
    expect(again.window.options).toMatchObject({ x: 300, width: 1400 });
    await again.end();
    keep(9000);
    const away = await open({ home: place });
    expect(away.window.options.x).toBeUndefined();
    expect(away.window.options).toMatchObject({ width: 1280, height: 800 });
  });
});

describe('trouble with the page', () => {
  test('a page that has stopped is told, and started again on request', async () => {
    const { contents, electron } = await open();
    electron.answers.push({ response: 0 });
    contents.emit('render-process-gone', {}, { reason: 'oom' });
    await expect.poll(() => contents.loads).toBe(2);
    expect(electron.asked[0]!.options).toMatchObject({
      message: 'The page of Ohmwright has stopped.',
      buttons: ['Start the page again', 'Quit'],
    });
    expect(electron.asked[0]!.options.detail).toContain('oom');
  });

  test('a page that does not answer can be waited for or stopped', async () => {
    const { window, contents, electron } = await open();
    window.emit('unresponsive');
    await expect.poll(() => electron.asked.length).toBe(1);
    expect(contents.loads).toBe(1);
    electron.answers.push({ response: 1 }, { response: 0 });
    window.emit('unresponsive');
    await expect.poll(() => contents.loads).toBe(2);
  });
});
