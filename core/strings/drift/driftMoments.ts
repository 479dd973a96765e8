/** The moments of a drift run, thinned for drawing: whole cycles are kept or left out, so that no cycle is shown bent. */
import type { DriftMoment } from '../answer.ts';

const MOST = 1200;

export class DriftMoments {
  private readonly cycles: { readonly number: number; moments: DriftMoment[] }[] = [];
  private every = 1;

  beginCycle(number: number): void {
    // The one before is kept only where its turn it is; the last stays in any case.
    const before = this.cycles.at(-1);
    if (before !== undefined && before.number % this.every !== 0) this.cycles.pop();
    this.cycles.push({ number, moments: [] });
  }

  add(moment: DriftMoment): void {
    const cycle = this.cycles.at(-1)!;
    cycle.moments.push(moment);
    while (this.count > MOST && this.cycles.length > 2) {
      this.every *= 2;
      const last = this.cycles.length - 1;
      const kept = this.cycles.filter(({ number }, k) => k === last || number % this.every === 0);
      this.cycles.splice(0, this.cycles.length, ...kept);
    }
  }

  /** In order of time, at most some twelve hundred. */
  get list(): readonly DriftMoment[] {
    const all = this.cycles.flatMap(({ moments }) => moments);
    const stride = Math.ceil(all.length / MOST);
    return all.filter((_, k) => k % stride === 0 || k === all.length - 1);
  }

  private get count(): number {
    return this.cycles.reduce((sum, { moments }) => sum + moments.length, 0);
  }
}
