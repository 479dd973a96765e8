/** The channel to the browser host: calls as HTTP requests to the host that sent the page, events on one answer that stays open. */
import type { HostAnswer, HostChannel, HostEvent, HostMethod } from '../../core/host.ts';
import { readLines } from './eventLines.ts';
import { listenersOf } from './listeners.ts';

export interface HttpHost {
  /** Origin of the host, as `http://127.0.0.1:4000`. */
  readonly base: string;
  readonly key: string;
  /** The name that this page gives itself: letters, digits, `-` and `_`. */
  readonly window: string;
  /** The browser's own, which tells the host of which page a call is. */
  readonly fetch: typeof fetch;
  /** Told when the way to the host is cut, and when it is there again. */
  readonly reached?: (isThere: boolean) => void;
}

export interface HttpChannel extends HostChannel {
  /** Lets go of the host: it sees this page as gone. */
  close(): void;
}

/** Calls that change nothing may be asked twice; of any other it is unknown, after silence, whether it was done. */
const reads: ReadonlySet<HostMethod> = new Set([
  'host.about',
  'jobs.list',
  'jobs.open',
  'jobs.history',
  'jobs.line',
  'jobs.revision',
  'lists.csv',
  'library.list',
  'preferences.read',
  'readings.list',
]);
/** A read is asked once more after this long. */
const againMs = 300;
/** Pauses between attempts to listen again; the last one is kept to. */
const pausesMs: readonly number[] = [200, 500, 1000, 2000, 5000];

export function httpChannel(host: HttpHost): HttpChannel {
  const listeners = listenersOf(host.window);
  const gone = new AbortController();
  void keepListening(host, listeners.take, gone.signal);
  return {
    listen: listeners.listen,
    close: () => {
      gone.abort();
    },
    call: async (method, ask) => {
      const body = JSON.stringify(ask);
      const first = await post(host, method, body);
      if (first !== undefined) return first;
      if (!reads.has(method)) return silence;
      await pause(againMs);
      return (await post(host, method, body)) ?? silence;
    },
  };
}

const silence: HostAnswer<never> = {
  ok: false,
  trouble: {
    code: 'no-host',
    message: 'The program does not answer. What it had acknowledged is kept; start it again.',
  },
};
const otherStart: HostAnswer<never> = {
  ok: false,
  trouble: {
    code: 'no-host',
    message: 'This page has no key to the running program. Close it and open the address that the program printed.',
  },
};

/** The answer of the host, or undefined where none came. */
async function post(host: HttpHost, method: HostMethod, body: string): Promise<HostAnswer<never> | undefined> {
  try {
    const response = await host.fetch(`${host.base}/call/${method}`, {
      method: 'POST',
      headers: { ...headersOf(host), 'Content-Type': 'application/json' },
      body,
      cache: 'no-store',
    });
    if (response.status === 401) return otherStart;
    return (await response.json()) as HostAnswer<never>;
  } catch {
    return undefined; // refused, cut off, or cut off in the middle of the answer
  }
}

function headersOf({ key, window }: HttpHost): Readonly<Record<string, string>> {
  return { Authorization: `Bearer ${key}`, 'X-Ohmwright-Window': window };
}

/** Listens until the page lets go or the host knows no such key, and again whenever the way was cut. */
async function keepListening(host: HttpHost, take: (event: HostEvent) => void, gone: AbortSignal): Promise<void> {
  let attempt = 0;
  while (!gone.aborted) {
    try {
      const response = await host.fetch(`${host.base}/events`, {
        headers: headersOf(host),
        signal: gone,
        cache: 'no-store',
      });
      if (response.status === 401) return;
      if (response.ok && response.body !== null) {
        attempt = 0;
        host.reached?.(true);
        await readLines(response.body, (line) => {
          take(JSON.parse(line) as HostEvent);
        });
      }
    } catch {
      // The way was cut: to say so and to listen again is all that can be done.
      if (!gone.aborted) host.reached?.(false);
    }
    await pause(pausesMs[Math.min(attempt, pausesMs.length - 1)]!);
    attempt += 1;
  }
}

async function pause(ms: number): Promise<void> {
  await new Promise((resolve) => setTimeout(resolve, ms));
}
