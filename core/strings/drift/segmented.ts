/** A figure along straight lines between points: its value, its slope, its integral, and its exact mean over a stretch. */
import { Defect } from '../../job/issue.ts';

export interface Segmented {
  at(x: number): number;
  /** Of the line to the right of `x`. */
  slopeAt(x: number): number;
  /** Integral from the first point to `x`. */
  integral(x: number): number;
  /** Mean over the way from `x` to `y`, and its derivative with `y`. No cancellation, however near the two are. */
  mean(x: number, y: number): { readonly mean: number; readonly slope: number };
}

/** Points rise in `x`. Beyond the ends the figure goes on with a slope of its own, 0 unless given. */
export function segmented(
  x: readonly number[],
  value: readonly number[],
  { below = 0, above = 0 }: { readonly below?: number; readonly above?: number } = {},
): Segmented {
  if (x.length === 0 || x.length !== value.length)
    throw new Defect('a line has as many values as places, at least one');
  return new Lines(x, value, below, above);
}

class Lines implements Segmented {
  private readonly x: Float64Array;
  private readonly value: Float64Array;
  /** Of the line that begins at each point; of the line below the first point in the last place. */
  private readonly slope: Float64Array;
  /** From the first point to each. */
  private readonly area: Float64Array;
  private readonly below: number;
  private last = 0;

  constructor(x: readonly number[], value: readonly number[], below: number, above: number) {
    const n = x.length;
    this.x = Float64Array.from(x);
    this.value = Float64Array.from(value);
    this.slope = new Float64Array(n);
    this.area = new Float64Array(n);
    this.below = below;
    for (let k = 0; k + 1 < n; k++) {
      const run = x[k + 1]! - x[k]!;
      this.slope[k] = (value[k + 1]! - value[k]!) / run;
      this.area[k + 1] = this.area[k]! + 0.5 * run * (value[k]! + value[k + 1]!);
    }
    this.slope[n - 1] = above;
  }

  at(x: number): number {
    return this.on(this.lineAt(x), x);
  }

  slopeAt(x: number): number {
    return this.slopeOf(this.lineAt(x));
  }

  integral(x: number): number {
    const k = this.lineAt(x);
    const from = Math.max(k, 0);
    return this.area[from]! + 0.5 * (x - this.x[from]!) * (this.value[from]! + this.on(k, x));
  }

  mean(x: number, y: number): { readonly mean: number; readonly slope: number } {
    const first = this.lineAt(x);
    const end = this.lineAt(y);
    const atX = this.on(first, x);
    if (first === end) return { mean: 0.5 * (atX + this.on(end, y)), slope: 0.5 * this.slopeOf(end) };
    const up = end > first ? 1 : -1;
    let place = x;
    let here = atX;
    let sum = 0;
    for (let k = first; k !== end; k += up) {
      // Upwards a line ends where the next begins; downwards at its own beginning.
      const corner = up > 0 ? k + 1 : k;
      sum += 0.5 * (this.x[corner]! - place) * (here + this.value[corner]!);
      place = this.x[corner]!;
      here = this.value[corner]!;
    }
    const atY = this.on(end, y);
    sum += 0.5 * (y - place) * (here + atY);
    const mean = sum / (y - x);
    return { mean, slope: (atY - mean) / (y - x) };
  }

  /** The line that a place lies on: that of the point to its left, -1 below the first. */
  private lineAt(x: number): number {
    const { x: places } = this;
    const n = places.length;
    let k = this.last;
    while (k >= 0 && x < places[k]!) k--;
    while (k + 1 < n && x >= places[k + 1]!) k++;
    this.last = Math.max(k, 0);
    return k;
  }

  private on(k: number, x: number): number {
    const from = Math.max(k, 0);
    return this.value[from]! + this.slopeOf(k) * (x - this.x[from]!);
  }

  private slopeOf(k: number): number {
    return k < 0 ? this.below : this.slope[k]!;
  }
}
