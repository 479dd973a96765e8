/** Whether anybody is still there: a host without a page ends by itself after a while. */

export interface Patience {
  /** Seconds that the host waits once the last page has gone. */
  readonly idleS: number;
  /** Seconds that it waits for a first page. */
  readonly firstS: number;
}

export interface Presence {
  /** A page came or went, a call came in or was answered. */
  noticed(now: { readonly pages: number; readonly calls: number }): void;
  /** Waits no more, whatever is noticed later. */
  stop(): void;
}

/** Calls `gone` once, when nobody has been there for as long as `patience` says. */
export function presence({ idleS, firstS }: Patience, gone: () => void): Presence {
  let waitS = firstS;
  let stopped = false;
  let timer = setTimeout(gone, waitS * 1000);
  return {
    noticed({ pages, calls }) {
      clearTimeout(timer);
      if (pages > 0) waitS = idleS;
      if (pages === 0 && calls === 0 && !stopped) timer = setTimeout(gone, waitS * 1000);
    },
    stop() {
      stopped = true;
      clearTimeout(timer);
    },
  };
}
