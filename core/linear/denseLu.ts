/** L U with partial pivoting of a small full matrix: the core of a low-rank update, nothing larger. */

/** With entries of at most 1, a pivot below this is what rounding leaves of zero (*common practice, no source*). */
const SINGULAR = 1e-13;

export class DenseLu {
  private readonly size: number;
  /** Length size * size, row by row: the matrix, then L (unit diagonal left out) and U. */
  readonly a: Float64Array;
  /** Length size: the row swapped with row k at step k. */
  private readonly swapped: Int32Array;

  constructor(size: number) {
    this.size = size;
    this.a = new Float64Array(size * size);
    this.swapped = new Int32Array(size);
  }

  /** Factors `a`, whose entries are at most 1 in magnitude, in place; false when it is singular to about 13 digits. */
  factor(): boolean {
    const { a, size: n } = this;
    for (let k = 0; k < n; k++) {
      let best = k;
      for (let i = k + 1; i < n; i++) if (Math.abs(a[i * n + k]!) > Math.abs(a[best * n + k]!)) best = i;
      const pivot = a[best * n + k]!;
      if (!(Math.abs(pivot) > SINGULAR)) return false;
      this.swapped[k] = best;
      if (best !== k) for (let j = 0; j < n; j++) this.swap(k * n + j, best * n + j);
      for (let i = k + 1; i < n; i++) {
        const l = a[i * n + k]! / pivot;
        a[i * n + k] = l;
        for (let j = k + 1; j < n; j++) a[i * n + j]! -= l * a[k * n + j]!;
      }
    }
    return true;
  }

  private swap(p: number, q: number): void {
    const held = this.a[p]!;
    this.a[p] = this.a[q]!;
    this.a[q] = held;
  }

  /** Solves in place. */
  solve(z: Float64Array): void {
    const { a, size: n, swapped } = this;
    for (let k = 0; k < n; k++) {
      const s = swapped[k]!;
      const held = z[k]!;
      z[k] = z[s]!;
      z[s] = held;
    }
    for (let i = 0; i < n; i++) for (let j = 0; j < i; j++) z[i]! -= a[i * n + j]! * z[j]!;
    for (let i = n - 1; i >= 0; i--) {
      for (let j = i + 1; j < n; j++) z[i]! -= a[i * n + j]! * z[j]!;
      z[i]! /= a[i * n + i]!;
    }
  }
}
