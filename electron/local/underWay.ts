/** Calls that were taken on and are not answered yet. */

/** What was taken on is finished; what hangs for this long is not waited for. */
const finishWithinMs = 10_000;

export interface UnderWay {
  readonly count: number;
  /** One more; the returned function says that it is answered. */
  begin(): () => void;
  /** Settles when no more than `most` are left, or after a long while. */
  atMost(most: number): Promise<void>;
}

/** `changed` is called whenever a call has come or been answered. */
export function callsUnderWay(changed: () => void): UnderWay {
  let count = 0;
  const checks = new Set<() => void>();
  function change(by: 1 | -1): void {
    count += by;
    changed();
    for (const check of checks) check();
  }
  return {
    get count() {
      return count;
    },
    begin() {
      change(1);
      return () => {
        change(-1);
      };
    },
    async atMost(most) {
      if (count <= most) return;
      await new Promise<void>((resolve) => {
        const check = (): void => {
          if (count > most) return;
          checks.delete(check);
          resolve();
        };
        checks.add(check);
        setTimeout(resolve, finishWithinMs).unref();
      });
    },
  };
}
