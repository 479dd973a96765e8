/** The page's end of the way to its host, by itself. */
import { createServer } from 'node:http';
import type { AddressInfo } from 'node:net';
import { describe, expect, test } from 'vitest';
import type { HostEvent } from '../../core/host.ts';
import { readLines } from '../../renderer/host/eventLines.ts';
import { httpChannel } from '../../renderer/host/httpChannel.ts';
import { takeKey } from '../../renderer/host/key.ts';
import { listenersOf } from '../../renderer/host/listeners.ts';
import { windowChannel } from '../../renderer/host/windowChannel.ts';

describe('the key', () => {
  const tabOf = (kept: Map<string, string>): Pick<Storage, 'getItem' | 'setItem'> => ({
    getItem: (name) => kept.get(name) ?? null,
    setItem: (name, value) => void kept.set(name, value),
  });

  test('leaves the address at once, and is there again after a reload', () => {
    const kept = new Map<string, string>();
    const addresses: unknown[] = [];
    const past = { replaceState: (_: unknown, __: string, to?: string | URL | null) => void addresses.push(to) };
    expect(takeKey({ hash: '#key=abc-_1', pathname: '/' }, past, tabOf(kept))).toBe('abc-_1');
    expect(addresses).toEqual(['/']);
    expect(takeKey({ hash: '', pathname: '/' }, past, tabOf(kept))).toBe('abc-_1');
    expect(takeKey({ hash: '#key=newer', pathname: '/' }, past, tabOf(kept))).toBe('newer');
  });

  test('is empty where there never was one, and where the address holds something else', () => {
    const past = { replaceState: () => {} };
    expect(takeKey({ hash: '', pathname: '/' }, past, tabOf(new Map()))).toBe('');
    expect(takeKey({ hash: '#key=<b>', pathname: '/' }, past, tabOf(new Map()))).toBe('');
  });
});

describe('the stream of events', () => {
  test('gives the same lines wherever its bytes are cut, signs of several bytes too', async () => {
    const bytes = new TextEncoder().encode('\n{"a":"Ω"}\n\n\n{"b":"±µ"}\n');
    for (let cut = 0; cut <= bytes.length; cut += 1) {
      const lines: string[] = [];
      const stream = new ReadableStream<Uint8Array>({
        start: (way) => {
          way.enqueue(bytes.subarray(0, cut));
          way.enqueue(bytes.subarray(cut));
          way.close();
        },
      });
      await readLines(stream, (line) => lines.push(line));
      expect(lines).toEqual(['{"a":"Ω"}', '{"b":"±µ"}']);
    }
  });

  const changed = (by: string): HostEvent => ({ event: 'job-changed', job: 'j', head: 1, by });

  test('what comes before anybody listens is held; what the page did itself is not told to it', () => {
    const listeners = listenersOf('own');
    listeners.take(changed('own'));
    listeners.take(changed('other'));
    const told: HostEvent[] = [];
    const stop = listeners.listen((event) => told.push(event));
    listeners.take(changed('third'));
    stop();
    expect(told).toEqual([changed('other'), changed('third')]);
  });

  test('is taken up again when it is cut', async () => {
    let streams = 0;
    const server = createServer((_, response) => {
      streams += 1;
      response.write(`${JSON.stringify(changed(`stream-${String(streams)}`))}\n`);
      if (streams === 1) response.destroy();
    }).listen(0, '127.0.0.1');
    await new Promise((resolve) => server.once('listening', resolve));
    const base = `http://127.0.0.1:${String((server.address() as AddressInfo).port)}`;
    const channel = httpChannel({ base, key: 'k', window: 'own', fetch });
    await new Promise<void>((resolve) => {
      channel.listen((event) => {
        if (event.event === 'job-changed' && event.by === 'stream-2') resolve();
      });
    });
    channel.close();
    server.closeAllConnections();
    server.close();
    expect(streams).toBe(2);
  });
});

describe('a host that does not answer', () => {
  /** A way on which nothing arrives; counts the attempts. */
  function cutWay(): { readonly asked: string[]; readonly fetch: typeof fetch } {
    const asked: string[] = [];
    return {
      asked,
      fetch: async (what) => {
        asked.push(new Request(what).url.replace('http://host', ''));
        throw new TypeError('cut');
      },
    };
  }

  test('is asked twice for what changes nothing, and once for what may have been done', async () => {
    const way = cutWay();
    const channel = httpChannel({ base: 'http://host', key: 'k', window: 'own', fetch: way.fetch });
    const read = await channel.call('jobs.list', {});
    const write = await channel.call('jobs.remove', { job: 'j' });
    channel.close();
    for (const answer of [read, write]) expect(answer).toMatchObject({ ok: false, trouble: { code: 'no-host' } });
    const calls = way.asked.filter((path) => path.startsWith('/call/'));
    expect(calls).toEqual(['/call/jobs.list', '/call/jobs.list', '/call/jobs.remove']);
  });

  test('in a window is told of as no host, too', async () => {
    const channel = windowChannel({
      window: 'own',
      call: async () => await Promise.reject(new Error('the process has gone')),
      listen: () => () => {},
    });
    expect(await channel.call('jobs.list', {})).toMatchObject({ ok: false, trouble: { code: 'no-host' } });
  });
});
