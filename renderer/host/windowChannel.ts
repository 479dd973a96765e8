/** The channel inside the desktop window. */
import type { HostAnswer, HostChannel, HostEvent } from '../../core/host.ts';
import { listenersOf } from './listeners.ts';

/** What the window's preload script gives the page. */
export interface WindowBridge {
  /** The name that the window gave this page. */
  readonly window: string;
  call(method: string, ask: unknown): Promise<unknown>;
  listen(onEvent: (event: unknown) => void): () => void;
}

declare global {
  interface Window {
    readonly ohmwright?: WindowBridge;
  }
}

export function windowChannel(bridge: WindowBridge): HostChannel {
  const listeners = listenersOf(bridge.window);
  bridge.listen((event) => {
    listeners.take(event as HostEvent);
  });
  return {
    listen: listeners.listen,
    call: async (method, ask) => {
      try {
        return (await bridge.call(method, ask)) as HostAnswer<never>;
      } catch {
        return { ok: false, trouble: { code: 'no-host', message: 'The program behind this window does not answer.' } };
      }
    },
  };
}
