/** Who listens to the host. Events that come before anybody does are held for the first listener. */
import type { HostEvent } from '../../core/host.ts';

const mostHeld = 100;

export interface Listeners {
  /** Passes an event on, unless it tells of a change that this page made itself. */
  take(event: HostEvent): void;
  listen(onEvent: (event: HostEvent) => void): () => void;
}

export function listenersOf(window: string): Listeners {
  const listeners = new Set<(event: HostEvent) => void>();
  const held: HostEvent[] = [];
  return {
    take(event) {
      if (event.event === 'job-changed' && event.by === window) return;
      if (listeners.size === 0 && held.length < mostHeld) held.push(event);
      for (const listener of listeners) listener(event);
    },
    listen(onEvent) {
      listeners.add(onEvent);
      for (const event of held.splice(0)) onEvent(event);
      return () => void listeners.delete(onEvent);
    },
  };
}
