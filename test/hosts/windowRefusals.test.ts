import { afterAll, beforeAll, describe, expect, test } from 'vitest';
import type { Services } from '../../electron/services/services.ts';
import { answerCalls } from '../../electron/window/ipc.ts';
import { buildPreload } from './builtWindow.ts';
import { type Frame, preventable, StandIn } from './electronStandIn.ts';
import { type StartedWindow, startWindow } from './windowStarted.ts';

interface Attempt {
  readonly what: string;
  readonly outcome: string;
}

/** Printed at the end: what was tried and what came of it. */
const attempts: Attempt[] = [];
let started: StartedWindow;

beforeAll(async () => {
  await buildPreload();
  started = await startWindow();
});
afterAll(async () => {
  await started.end();
  console.table(attempts);
});

function noted(what: string, outcome: string): string {
  attempts.push({ what, outcome });
  return outcome;
}

const page = 'app://ohmwright/';
const ourFrame: Frame = { url: page, parent: null };

describe('calls', () => {
  async function outcome(
    frame: Frame | null,
    method: unknown,
    ask: unknown,
    sender = started.contents,
  ): Promise<string> {
    const answer = await started.electron.invoke(sender, frame, 'ohmwright:call', method, ask);
    const { ok, trouble } = answer as { ok: boolean; trouble?: { code: string } };
    return ok ? 'answered' : trouble!.code;
  }

  test('a call of the page itself is answered', async () => {
    expect(noted('call from the page', await outcome(ourFrame, 'jobs.list', {}))).toBe('answered');
  });

  test.each<[string, Frame | null]>([
    ['a frame that has gone (null)', null],
    ['a page of the network', { url: 'https://elsewhere.example/', parent: null }],
    ['a file', { url: 'file:///etc/hostname', parent: null }],
    ['another host of our scheme', { url: 'app://elsewhere/', parent: null }],
    ['our host as a mere user name', { url: 'app://ohmwright@elsewhere/', parent: null }],
    ['an empty page', { url: 'about:blank', parent: null }],
    ['a file of ours that is no page', { url: 'app://ohmwright/assets/page.js', parent: null }],
    ['a frame inside our page', { url: page, parent: ourFrame }],
    ['no address at all', { url: '', parent: null }],
  ])('a call from %s is refused', async (what, frame) => {
    expect(noted(`call from ${what}`, await outcome(frame, 'jobs.list', {}))).toBe('refused');
  });

  test('a call from other contents than our window is refused, whatever their address', async () => {
    const stranger = Object.create(started.contents) as typeof started.contents;
    expect(noted('call from contents that are none of ours', await outcome(ourFrame, 'jobs.list', {}, stranger))).toBe(
      'refused',
    );
  });

  test.each<[string, unknown, unknown]>([
    ['an unknown method', 'jobs.burn', {}],
    ['a method of every object', 'constructor', {}],
    ['a method that is no text', 42, {}],
    ['wrong fields', 'jobs.open', { job: 7 }],
    ['no fields', 'jobs.open', undefined],
  ])('%s is refused', async (what, method, ask) => {
    expect(noted(`call with ${what}`, await outcome(ourFrame, method, ask))).toBe('refused');
  });

  test.each(['ohmwright:other', 'ohmwright:event', 'ELECTRON_BROWSER_REQUIRE'])(
    'the channel %s does not exist',
    async (channel) => {
      const sent = started.electron.invoke(started.contents, ourFrame, channel, 'jobs.list', {});
      await expect(sent).rejects.toThrow('no handler registered');
      noted(`call over the channel ${channel}`, 'no such channel');
    },
  );

  test('there is exactly one channel', () => {
    expect([...started.electron.handlers.keys()]).toEqual(['ohmwright:call']);
  });

  test('an answer that cannot be copied is told as a defect, not as an exception', async () => {
    const electron = new StandIn('/nowhere');
    const log: string[] = [];
    const list = async () => await Promise.resolve({ ok: true, value: () => 1 });
    const services = {
      methods: { 'jobs.list': list },
      log: (line: string) => void log.push(line),
    } as unknown as Services;
    answerCalls({ ipcMain: electron.module.ipcMain, services, windowOf: () => 'window' });
    const answer = await electron.invoke(started.contents, ourFrame, 'ohmwright:call', 'jobs.list', {});
    expect(answer).toMatchObject({ ok: false, trouble: { code: 'defect' } });
    expect(log).toHaveLength(1);
    noted('answer with a function inside', 'defect');
  });

  test('a value that cannot be copied does not reach the host', async () => {
    await expect(started.contents.key.call('jobs.open', { job: () => 'x' })).rejects.toThrow('could not be cloned');
    noted('call with a function inside', 'cannot be copied');
  });
});

describe('ways out of the page', () => {
  /** What the guards make of an event of the page's contents. */
  function guarded(event: string, fields: { url?: string; isMainFrame?: boolean }): string {
    const details = preventable(fields);
    started.contents.emit(event, details, {}, {});
    return details.defaultPrevented ? 'refused' : 'allowed';
  }

  test.each([
    ['will-navigate', 'https://elsewhere.example/'],
    ['will-navigate', 'file:///home/someone/notes.txt'],
    ['will-navigate', 'data:text/html,<p>x'],
    ['will-navigate', 'javascript:alert(1)'],
    ['will-navigate', 'app://elsewhere/'],
    ['will-navigate', 'app://ohmwright/assets/page.js'],
    ['will-redirect', 'app://ohmwright/'],
    ['will-redirect', 'https://elsewhere.example/'],
    ['will-frame-navigate', 'https://elsewhere.example/'],
  ])('%s to %s is refused', (event, url) => {
    expect(noted(`${event} ${url}`, guarded(event, { url, isMainFrame: true }))).toBe('refused');
  });

  test('a frame inside the page may go nowhere, not even to our own page', () => {
    expect(noted('frame to our page', guarded('will-frame-navigate', { url: page, isMainFrame: false }))).toBe(
      'refused',
    );
  });

  test('the page may load itself again', () => {
    expect(noted('page to itself', guarded('will-navigate', { url: page, isMainFrame: true }))).toBe('allowed');
  });

  test('a web view is never attached', () => {
    expect(noted('attach a web view', guarded('will-attach-webview', {}))).toBe('refused');
  });

  test.each(['https://elsewhere.example/', 'app://ohmwright/', 'about:blank'])('no window is opened for %s', (url) => {
    expect(noted(`window.open ${url}`, started.contents.openHandler!({ url }).action)).toBe('deny');
  });

  test('contents that should not exist are guarded from their first moment', () => {
    const stray = Object.assign(Object.create(started.contents) as typeof started.contents, {});
    const guards: string[] = [];
    stray.on = ((event: string) => {
      guards.push(event);
      return stray;
    }) as typeof stray.on;
    started.electron.app.emit('web-contents-created', {}, stray);
    expect(guards.toSorted()).toEqual(['will-attach-webview', 'will-frame-navigate', 'will-navigate', 'will-redirect']);
  });
});

describe('what the page may ask of the system', () => {
  test.each(['media', 'geolocation', 'notifications', 'clipboard-read', 'usb', 'serial', 'fileSystem', 'openExternal'])(
    'the permission %s is denied, asked or looked up',
    (permission) => {
      const { permissionRequest, permissionCheck } = started.electron.session;
      let granted = true;
      permissionRequest!({}, permission, (answer) => {
        granted = answer;
      });
      const outcome = granted || permissionCheck!({}, permission) ? 'granted' : 'denied';
      expect(noted(`permission ${permission}`, outcome)).toBe('denied');
    },
  );

  test('no device is handed out', () => {
    const given = started.electron.session.deviceCheck!({ deviceType: 'serial' });
    expect(noted('a serial device', given ? 'granted' : 'denied')).toBe('denied');
  });

  test.each([
    ['https://elsewhere.example/x.js', false],
    ['http://127.0.0.1:8080/', false],
    ['ws://127.0.0.1:8080/', false],
    ['file:///etc/hostname', false],
    ['ftp://elsewhere.example/', false],
    ['app://elsewhere/', false],
    ['blob:https://elsewhere.example/1', false],
    ['devtools://devtools/bundled/inspector.html', false],
    ['app://ohmwright/assets/page.js', true],
    ['blob:app://ohmwright/1', true],
    ['data:image/png;base64,AA==', true],
  ])('a request for %s may go out: %s', (url, may) => {
    const outcome = started.electron.mayRequest(url) ? 'allowed' : 'blocked';
    expect(noted(`request ${url}`, outcome)).toBe(may ? 'allowed' : 'blocked');
  });

  test.each([
    ['https://elsewhere.example/setup.exe', 'refused'],
    ['data:text/plain,x', 'refused'],
    ['blob:app://ohmwright/1', 'allowed'],
  ])('a download of %s is %s', (url, expected) => {
    const event = preventable({});
    started.electron.session.emit('will-download', event, { getURL: () => url });
    expect(noted(`download ${url}`, event.defaultPrevented ? 'refused' : 'allowed')).toBe(expected);
  });
});

describe('the scheme', () => {
  test.each(['app://elsewhere/', 'app://ohmwright:81/'])(
    'another host of it has nothing, even if the session let it through: %s',
    async (url) => {
      const { status } = await started.electron.answered(url);
      noted(`GET ${url} past the session`, String(status));
      expect(status).toBe(404);
    },
  );

  test.each([
    ['app://ohmwright/', 'GET', 200],
    ['app://ohmwright/', 'POST', 405],
    ['app://ohmwright/../preload.cjs', 'GET', 404],
    ['app://ohmwright/%2e%2e/preload.cjs', 'GET', 404],
    ['app://ohmwright/..%2fpreload.cjs', 'GET', 404],
    ['app://ohmwright/..%5cpreload.cjs', 'GET', 404],
    ['app://ohmwright//etc/hostname', 'GET', 404],
    ['app://ohmwright/nothing.js', 'GET', 404],
  ])('%s by %s gives %d', async (url, method, status) => {
    const answer = await started.electron.ask(url, method);
    noted(`${method} ${url}`, String(answer.status));
    expect(answer.status).toBe(status);
    expect(await answer.text()).not.toContain('ipcRenderer');
  });
});
