/** Who does not belong into the local browser host, how they try, and what they get. The table is printed. */
import { existsSync, mkdirSync, symlinkSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { afterAll, beforeAll, describe, expect, test } from 'vitest';
import { largestBodyBytes } from '../../electron/local/doorman.ts';
import { startServer } from '../../electron/local/server.ts';
import { staticFiles } from '../../electron/page/staticFiles.ts';
import { buildLocal, type RunningLocal, startBuiltLocal, testFolder } from './builtLocal.ts';
import { hangUp, type RawRequest, rawRequest } from './rawHttp.ts';

let host: RunningLocal;
let otherStartsKey: string;
const { folder, remove } = testFolder();
const pageFolder = join(folder, 'page');
const outcomes: (readonly [string, string])[] = [];

beforeAll(async () => {
  await buildLocal();
  mkdirSync(join(pageFolder, 'assets'), { recursive: true });
  writeFileSync(join(folder, 'secret.txt'), 'outside');
  writeFileSync(join(pageFolder, 'index.html'), '<meta name="csp-nonce" content="__CSP_NONCE__">');
  writeFileSync(join(pageFolder, '.env'), 'hidden');
  symlinkSync(join(folder, 'secret.txt'), join(pageFolder, 'link.txt'));
  const earlier = await startBuiltLocal(folder);
  otherStartsKey = earlier.key;
  earlier.process.kill('SIGTERM');
  await earlier.ended;
  host = await startBuiltLocal(folder, ['--page', pageFolder]);
});

afterAll(async () => {
  host.process.kill('SIGTERM');
  await host.ended;
  remove();
  const widest = Math.max(...outcomes.map(([attempt]) => attempt.length));
  process.stdout.write(`\n${outcomes.map(([attempt, got]) => `${attempt.padEnd(widest)}  ${got}`).join('\n')}\n`);
});

/** A call as the page makes it; `changes` replace headers, and drop those that are undefined. */
function call(changes: Readonly<Record<string, string | undefined>> = {}, body = '{}'): Omit<RawRequest, 'target'> {
  const usual: Record<string, string | undefined> = {
    Host: `127.0.0.1:${String(host.port)}`,
    Origin: host.origin,
    Authorization: `Bearer ${host.key}`,
    'X-Ohmwright-Window': 'test',
    'Content-Type': 'application/json',
    'Content-Length': String(Buffer.byteLength(body)),
    Connection: 'close',
    ...changes,
  };
  const headers = Object.entries(usual).flatMap(([name, value]) =>
    value === undefined ? [] : [[name, value] as const],
  );
  return { port: host.port, method: 'POST', headers, body };
}

function get(changes: Readonly<Record<string, string | undefined>> = {}): Omit<RawRequest, 'target'> {
  const { headers } = call({ Origin: undefined, 'Content-Length': undefined, 'Content-Type': undefined, ...changes });
  return { port: host.port, method: 'GET', headers };
}

/** Where more than one outcome is named, it depends on who is quicker: the answer, or the end of the connection. */
async function attempt(
  what: string,
  request: RawRequest,
  ...expected: readonly (number | 'closed')[]
): Promise<string> {
  const outcome = await rawRequest(request);
  outcomes.push([what, String(outcome.status)]);
  expect(expected, what).toContain(outcome.status);
  return outcome.status === 'closed' ? '' : outcome.text;
}

describe('the door of the local browser host', () => {
  test('the page itself is let in', async () => {
    const about = await attempt('the page itself', { ...call(), target: '/call/host.about' }, 200);
    expect(about).toContain('"ok":true');
    expect(await attempt('the page itself, its file', { ...get(), target: '/' }, 200)).toContain('csp-nonce');
  });

  test('without the key of this start nothing is answered', async () => {
    const target = '/call/jobs.list';
    const noKey: readonly (readonly [string, string | undefined])[] = [
      ['no key', undefined],
      ['a wrong key', `Bearer ${'A'.repeat(43)}`],
      ['the key of another start', `Bearer ${otherStartsKey}`],
      ['the key with a letter more', `Bearer ${host.key}A`],
      ['an empty key', 'Bearer '],
      ['the key as a password', `Basic ${Buffer.from(`x:${host.key}`).toString('base64')}`],
      ['a key of 10 000 letters', `Bearer ${'A'.repeat(10_000)}`],
    ];
    for (const [what, Authorization] of noKey) {
      await attempt(what, { ...call({ Authorization }), target }, 401);
      await attempt(`${what}, for events`, { ...get({ Authorization }), target: '/events' }, 401);
    }
    await attempt(
      'the key in the address',
      { ...call({ Authorization: undefined }), target: `${target}?key=${host.key}` },
      401,
    );
  });

  test('a page of another origin gets nothing, even with the key', async () => {
    const origins: readonly (readonly [string, string | undefined])[] = [
      ['another site', 'https://elsewhere.example'],
      ['no origin that can be named', 'null'],
      ['another port of this machine', `http://127.0.0.1:${String(host.port + 1)}`],
      ['another name of this machine', `http://localhost:${String(host.port)}`],
      ['the same with another scheme', `https://127.0.0.1:${String(host.port)}`],
      ['ours as the beginning of another', `${host.origin}.elsewhere.example`],
      ['no origin at all', undefined],
    ];
    for (const [what, Origin] of origins) {
      await attempt(`a call from ${what}`, { ...call({ Origin }), target: '/call/jobs.list' }, 403);
    }
    for (const [what, Origin] of origins.filter(([, each]) => each !== undefined)) {
      await attempt(`the page wanted by ${what}`, { ...get({ Origin }), target: '/' }, 403);
      await attempt(`events wanted by ${what}`, { ...get({ Origin }), target: '/events' }, 403);
    }
    const { headers } = call({ Origin: 'https://elsewhere.example', 'Access-Control-Request-Method': 'POST' });
    const asked = { port: host.port, method: 'OPTIONS', headers, target: '/call/jobs.list' };
    expect(await attempt('the question before a foreign call', asked, 403)).not.toMatch(/access-control/i);
    const own = { port: host.port, method: 'OPTIONS', headers: call().headers, target: '/call/jobs.list' };
    expect(await attempt('the same question from here', own, 405)).not.toMatch(/access-control/i);
  });

  test('a name that leads here by a trick of the name server is not this host', async () => {
    for (const Host of [
      'elsewhere.example',
      `elsewhere.example:${String(host.port)}`,
      `localhost:${String(host.port)}`,
      '127.0.0.1',
      `127.0.0.1:${String(host.port)}0`,
      `[::1]:${String(host.port)}`,
      `127.0.0.1:${String(host.port)}.elsewhere.example`,
      `0x7f.1:${String(host.port)}`,
      '',
    ]) {
      await attempt(`Host: ${Host}`, { ...get({ Host }), target: '/' }, 421);
      await attempt(`Host: ${Host}, a call`, { ...call({ Host }), target: '/call/jobs.list' }, 421);
    }
    const { headers } = get();
    const twice = { port: host.port, headers: [...headers, ['Host', 'elsewhere.example'] as const], target: '/' };
    await attempt('two Host headers', twice, 421);
    await attempt('no Host header', { ...get({ Host: undefined }), target: '/' }, 400);
  });

  test('it listens on the loopback address and refuses to on any other', async () => {
    for (const address of ['0.0.0.0', '::', '::1', 'localhost', '127.0.0.2', '']) {
      const started = startServer({
        page: staticFiles(pageFolder),
        answer: async () => ({ ok: true, value: null }),
        closeStore: () => {},
        address,
        port: 0,
        patience: { idleS: 1, firstS: 1 },
      });
      await expect(started).rejects.toThrow('loopback');
      outcomes.push([`listening on ${JSON.stringify(address)}`, 'refused to start']);
    }
  });

  test('no way leads out of the page folder', async () => {
    for (const target of [
      '/../secret.txt',
      '/assets/../../secret.txt',
      '/%2e%2e/secret.txt',
      '/%2E%2E%2Fsecret.txt',
      '/..%2fsecret.txt',
      '/..%5csecret.txt',
      '/..\\secret.txt',
      '/%252e%252e/secret.txt',
      '/....//secret.txt',
      '/..%c0%afsecret.txt',
      '//secret.txt',
      '/../../../../../../../../etc/passwd',
      '/.env',
      '/%2eenv',
      '/link.txt',
      '/index.html%00.txt',
      '/store/jobs.sqlite',
      'http://elsewhere.example/',
    ]) {
      const text = await attempt(`GET ${target}`, { ...get(), target }, 404);
      expect(text).not.toMatch(/outside|hidden|root:/);
    }
  });

  test('a body that is too large is not read', async () => {
    const target = '/call/jobs.list';
    const declared = call({ 'Content-Length': String(largestBodyBytes + 1) }, '{}');
    await attempt('a body that says it is too large', { ...declared, target }, 413);
    const chunk = `${(1024 * 1024).toString(16)}\r\n${' '.repeat(1024 * 1024)}\r\n`;
    const pieces = Math.ceil(largestBodyBytes / (1024 * 1024)) + 1;
    const streamed = call({ 'Content-Length': undefined, 'Transfer-Encoding': 'chunked' }, chunk);
    await attempt('a body without end', { ...streamed, target, slowly: { pieces, pauseMs: 1 } }, 413, 'closed');
    await attempt('a length that is no number', { ...call({ 'Content-Length': 'many' }), target }, 400);
    const both = call({ 'Transfer-Encoding': 'chunked' });
    await attempt('a length and pieces besides', { ...both, target }, 400);
  });

  test('a body that is no ask is refused in words', async () => {
    const target = '/call/jobs.open';
    const notJson = { ...call({}, '{"job":'), target };
    expect(await attempt('half of a JSON text', notJson, 400)).toContain('"refused"');
    await attempt('no body', { ...call({}, ''), target }, 400);
    await attempt('10 000 lists in each other', { ...call({}, '['.repeat(10_000)), target }, 400);
    await attempt('10 000 objects in each other', { ...call({}, '{"a":'.repeat(10_000)), target }, 400);
    const wrong: readonly (readonly [string, string])[] = [
      ['a list instead of an object', '[]'],
      ['nothing instead of an object', 'null'],
      ['a field too many', '{"job":"x","more":1}'],
      ['a prototype among the fields', '{"job":"x","__proto__":{"isAdmin":true}}'],
      ['a number instead of a name', '{"job":1}'],
    ];
    for (const [what, body] of wrong) {
      expect(await attempt(what, { ...call({}, body), target }, 200)).toContain('"refused"');
    }
  });

  test('only calls of the contract are calls', async () => {
    for (const name of [
      '__proto__',
      'constructor',
      'toString',
      'jobs',
      'jobs.',
      '.list',
      'jobs.list.more',
      'jobs/list',
      '',
    ]) {
      await attempt(`the call ${JSON.stringify(name)}`, { ...call(), target: `/call/${name}` }, 404);
    }
    for (const name of ['jobs.everything', 'jobs.constructor', 'jobs.toString', 'object.prototype']) {
      const text = await attempt(`the call ${JSON.stringify(name)}`, { ...call(), target: `/call/${name}` }, 200);
      expect(text).toContain('"refused"');
    }
    for (const method of ['GET', 'PUT', 'DELETE', 'PATCH', 'HEAD', 'TRACE']) {
      await attempt(`${method} on a call`, { ...call(), method, target: '/call/jobs.list' }, 405);
    }
    await attempt('POST on a file', { ...call(), target: '/index.html' }, 405);
    await attempt('CONNECT to elsewhere', { ...get(), method: 'CONNECT', target: 'elsewhere.example:443' }, 'closed');
    for (const type of [
      undefined,
      'text/plain',
      'application/x-www-form-urlencoded',
      'multipart/form-data; boundary=x',
    ]) {
      const odd = call({ 'Content-Type': type });
      await attempt(`a body of type ${String(type)}`, { ...odd, target: '/call/jobs.list' }, 415);
    }
    await attempt('a packed body', { ...call({ 'Content-Encoding': 'gzip' }), target: '/call/jobs.list' }, 415);
    for (const window of [undefined, '', 'a b', '<script>', 'x'.repeat(65)]) {
      const named = call({ 'X-Ohmwright-Window': window });
      await attempt(`a page named ${String(window).slice(0, 12)}`, { ...named, target: '/call/jobs.list' }, 400);
    }
  });

  test('a head that is too large, and one that is no HTTP, end there', async () => {
    await attempt('a header of 100 kB', { ...get({ 'X-Long': 'x'.repeat(100_000) }), target: '/' }, 431, 'closed');
    await attempt('a target of 100 kB', { ...get(), target: `/${'x'.repeat(100_000)}` }, 431, 'closed');
    await attempt('no HTTP at all', { port: host.port, method: '\u0016\u0003\u0001', target: '', headers: [] }, 400);
  });

  test('a thousand at once are all answered, and the host goes on', async () => {
    const requests = Array.from({ length: 1000 }, (_, index) => {
      if (index % 4 === 0) return rawRequest({ ...get(), target: '/' });
      return rawRequest({ ...call(), target: index % 4 === 1 ? '/call/jobs.list' : '/call/host.about' });
    });
    const got = await Promise.all(requests);
    const answered = got.filter((outcome) => outcome.status === 200).length;
    outcomes.push(['1000 requests at once', `${String(answered)} answered, ${String(1000 - answered)} refused`]);
    expect(answered).toBe(1000);
    await attempt('one more after them', { ...call(), target: '/call/host.about' }, 200);
  });

  test('those who hang up in the middle leave the host as it was', async () => {
    const { headers, body = '' } = call();
    const head = headers.map(([name, value]) => `${name}: ${value}\r\n`).join('');
    const whole = `POST /call/host.about HTTP/1.1\r\n${head}\r\n${body}`;
    const lengths = Array.from({ length: 300 }, (_, index) => Math.floor((whole.length * (index + 1)) / 300));
    await Promise.all(lengths.map(async (length) => await hangUp(host.port, whole.slice(0, length))));
    outcomes.push(['300 that hang up in the middle', 'no answer asked for']);
    await attempt('one more after those', { ...call(), target: '/call/host.about' }, 200);
  });

  test('after all that nothing was kept and nothing was complained about', async () => {
    expect(await attempt('the list of jobs', { ...call(), target: '/call/jobs.list' }, 200)).toContain('"value":[]');
    expect(existsSync(join(folder, 'saved'))).toBe(false);
    expect(host.stderr()).toBe('');
  });
});

describe('one who takes for ever', () => {
  test('is hung up on: while sending the head, and while sending the body', async () => {
    const server = await startServer({
      page: staticFiles(pageFolder),
      answer: async () => ({ ok: true, value: null }),
      closeStore: () => {},
      address: '127.0.0.1',
      port: 0,
      patience: { idleS: 60, firstS: 60 },
      haste: { headersMs: 500, requestMs: 1000 },
    });
    const own = `127.0.0.1:${String(server.port)}`;
    const slowBody = call(
      {
        Host: own,
        Origin: `http://${own}`,
        Authorization: `Bearer ${new URL(server.url).hash.replace('#key=', '')}`,
        'Content-Length': '1000',
      },
      ' ',
    );
    const slowly = { pieces: 1000, pauseMs: 50 };
    await attempt('a body of a byte at a time', { ...slowBody, port: server.port, target: '/call/x.y', slowly }, 408);
    const head = {
      ...get({ Host: own }),
      port: server.port,
      target: '/',
      unended: true,
      body: 'X-More: 1\r\n',
      slowly,
    };
    await attempt('a head without end', head, 408);
    await server.end();
  });
});
