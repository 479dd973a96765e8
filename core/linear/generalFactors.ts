/** The numbers of an L U factorisation with row pivoting (Gilbert and Peierls: time in proportion to the arithmetic). */
import { Defect } from '../job/issue.ts';
import type { Factorisation, FactorReport, Pattern } from './matrix.ts';

/** A pivot below this share of the largest entry of its column: singular to working precision (*common practice, no source*). */
const SINGULAR = 1e-14;
/** The diagonal entry is taken as pivot when at least this share of the largest candidate (*common practice, no source*). */
const PREFER_DIAGONAL = 0.1;
/** Kept pivots are chosen anew when one falls below this share of the largest candidate of its column (*common practice, no source*). */
const KEEP_PIVOT = 1e-3;

export class GeneralFactors implements Factorisation {
  readonly pattern: Pattern;
  /** Length size: column k of the factors is column columnOf[k] of A; row k is row rowOf[k] of A. */
  private readonly columnOf: Int32Array;
  private readonly rowOf: Int32Array;
  /** Length size: the inverse of rowOf; -1 for a row that has not been a pivot yet. */
  private readonly pivotOf: Int32Array;
  /** L by columns, unit diagonal left out; rows as pivot numbers once factored. */
  private readonly lStarts: Int32Array;
  private lRows = new Int32Array(16);
  private l = new Float64Array(16);
  /** U by columns, above the diagonal, in an order in which column k can be solved for. */
  private readonly uStarts: Int32Array;
  private uRows = new Int32Array(16);
  private u = new Float64Array(16);
  /** Length size: the diagonal of U. */
  private readonly d: Float64Array;
  /** Length size: the column in hand; zero between columns. */
  private readonly x: Float64Array;
  private readonly y: Float64Array;
  private readonly stack: Int32Array;
  private readonly resume: Int32Array;
  private readonly reached: Int32Array;
  private readonly seen: Int32Array;
  private pivoted = false;
  private readonly report = { regular: false, negativePivots: 0, failedColumn: -1 };

  constructor(pattern: Pattern, columnOf: Int32Array) {
    const { size } = pattern;
    this.pattern = pattern;
    this.columnOf = columnOf;
    this.rowOf = new Int32Array(size);
    this.pivotOf = new Int32Array(size);
    this.lStarts = new Int32Array(size + 1);
    this.uStarts = new Int32Array(size + 1);
    this.d = new Float64Array(size);
    this.x = new Float64Array(size);
    this.y = new Float64Array(size);
    this.stack = new Int32Array(size);
    this.resume = new Int32Array(size);
    this.reached = new Int32Array(size);
    this.seen = new Int32Array(size);
  }

  refactor(values: Float64Array): FactorReport {
    if (!(this.pivoted && this.refactorKept(values))) this.factor(values);
    return this.report;
  }

  /** Full factorisation with a free choice of pivots. */
  private factor(values: Float64Array): void {
    const { size, columnStarts, rowIndices } = this.pattern;
    const { columnOf, rowOf, pivotOf, lStarts, uStarts, d, x, seen, reached } = this;
    pivotOf.fill(-1);
    seen.fill(-1);
    x.fill(0);
    this.pivoted = false;
    let negative = 0;
    for (let k = 0; k < size; k++) {
      const j = columnOf[k]!;
      this.makeRoom(k);
      // x = L \ A(:, j), over the rows that the entries of A reach through L.
      const top = this.reach(j, k);
      let columnMost = 0;
      for (let e = columnStarts[j]!; e < columnStarts[j + 1]!; e++) {
        x[rowIndices[e]!] = values[e]!;
        columnMost = Math.max(columnMost, Math.abs(values[e]!));
      }
      let uEnd = uStarts[k]!;
      let lEnd = lStarts[k]!;
      let most = -1;
      let best = -1;
      for (let s = top; s < size; s++) {
        const i = reached[s]!;
        const xi = x[i]!;
        const c = pivotOf[i]!;
        if (c < 0) {
          if (!(Math.abs(xi) <= most)) {
            most = Math.abs(xi);
            best = i;
          }
          this.lRows[lEnd++] = i;
          continue;
        }
        for (let p = lStarts[c]!; p < lStarts[c + 1]!; p++) x[this.lRows[p]!]! -= this.l[p]! * xi;
        this.uRows[uEnd] = c;
        this.u[uEnd++] = xi;
        x[i] = 0;
      }
      if (!(most > SINGULAR * columnMost && most < Number.POSITIVE_INFINITY)) {
        this.say(false, negative, j);
        return;
      }
      if (pivotOf[j]! < 0 && Math.abs(x[j]!) >= PREFER_DIAGONAL * most) best = j;
      const pivot = x[best]!;
      if (pivot < 0) negative++;
      d[k] = pivot;
      rowOf[k] = best;
      pivotOf[best] = k;
      let to = lStarts[k]!;
      for (let p = lStarts[k]!; p < lEnd; p++) {
        const i = this.lRows[p]!;
        if (i !== best) {
          this.lRows[to] = i;
          this.l[to++] = x[i]! / pivot;
        }
        x[i] = 0;
      }
      lStarts[k + 1] = to;
      uStarts[k + 1] = uEnd;
    }
    for (let p = 0; p < lStarts[size]!; p++) this.lRows[p] = pivotOf[this.lRows[p]!]!;
    this.pivoted = true;
    this.say(true, negative, -1);
  }

  /** The rows that column j of A reaches through the first k columns of L, by depth-first search; topological order in reached[top ..]. */
  private reach(j: number, k: number): number {
    const { columnStarts, rowIndices, size } = this.pattern;
    const { pivotOf, lStarts, seen, stack, resume, reached, lRows } = this;
    let top = size;
    for (let e = columnStarts[j]!; e < columnStarts[j + 1]!; e++) {
      if (seen[rowIndices[e]!] === k) continue;
      let depth = 0;
      stack[0] = rowIndices[e]!;
      while (depth >= 0) {
        const i = stack[depth]!;
        const c = pivotOf[i]!;
        if (seen[i] !== k) {
          seen[i] = k;
          resume[depth] = c < 0 ? 0 : lStarts[c]!;
        }
        const end = c < 0 ? 0 : lStarts[c + 1]!;
        let p = resume[depth]!;
        while (p < end && seen[lRows[p]!] === k) p++;
        if (p < end) {
          resume[depth] = p + 1;
          stack[++depth] = lRows[p]!;
        } else {
          depth--;
          reached[--top] = i;
        }
      }
    }
    return top;
  }

  /** Refactors with the pivots and patterns of the last full factorisation; false when a pivot has become too small for that. */
  private refactorKept(values: Float64Array): boolean {
    const { size, columnStarts, rowIndices } = this.pattern;
    const { columnOf, pivotOf, lStarts, uStarts, lRows, uRows, l, u, d, x } = this;
    let negative = 0;
    for (let k = 0; k < size; k++) {
      const j = columnOf[k]!;
      let columnMost = 0;
      for (let e = columnStarts[j]!; e < columnStarts[j + 1]!; e++) {
        x[pivotOf[rowIndices[e]!]!] = values[e]!;
        columnMost = Math.max(columnMost, Math.abs(values[e]!));
      }
      for (let p = uStarts[k]!; p < uStarts[k + 1]!; p++) {
        const c = uRows[p]!;
        const xc = x[c]!;
        u[p] = xc;
        x[c] = 0;
        for (let q = lStarts[c]!; q < lStarts[c + 1]!; q++) x[lRows[q]!]! -= l[q]! * xc;
      }
      const pivot = x[k]!;
      x[k] = 0;
      let most = 0;
      for (let p = lStarts[k]!; p < lStarts[k + 1]!; p++) {
        const xi = x[lRows[p]!]!;
        x[lRows[p]!] = 0;
        most = Math.max(most, Math.abs(xi));
        l[p] = xi / pivot;
      }
      if (!(Math.abs(pivot) >= KEEP_PIVOT * most && Math.abs(pivot) > SINGULAR * columnMost)) return false;
      d[k] = pivot;
      if (pivot < 0) negative++;
    }
    this.say(true, negative, -1);
    return true;
  }

  private makeRoom(k: number): void {
    const { size } = this.pattern;
    if (this.lStarts[k]! + size > this.l.length) {
      this.lRows = grown(this.lRows, new Int32Array(2 * this.lRows.length + size));
      this.l = grown(this.l, new Float64Array(2 * this.l.length + size));
    }
    if (this.uStarts[k]! + size > this.u.length) {
      this.uRows = grown(this.uRows, new Int32Array(2 * this.uRows.length + size));
      this.u = grown(this.u, new Float64Array(2 * this.u.length + size));
    }
  }

  private say(regular: boolean, negativePivots: number, failedColumn: number): void {
    this.report.regular = regular;
    this.report.negativePivots = negativePivots;
    this.report.failedColumn = failedColumn;
  }

  solve(b: Float64Array, x: Float64Array): void {
    if (!this.report.regular) throw new Defect('a regular factorisation before a solve');
    const { size } = this.pattern;
    const { columnOf, rowOf, lStarts, uStarts, lRows, uRows, l, u, d, y } = this;
    for (let k = 0; k < size; k++) y[k] = b[rowOf[k]!]!;
    for (let k = 0; k < size; k++) {
      const yk = y[k]!;
      for (let p = lStarts[k]!; p < lStarts[k + 1]!; p++) y[lRows[p]!]! -= l[p]! * yk;
    }
    for (let k = size - 1; k >= 0; k--) {
      const yk = y[k]! / d[k]!;
      x[columnOf[k]!] = yk;
      for (let p = uStarts[k]!; p < uStarts[k + 1]!; p++) y[uRows[p]!]! -= u[p]! * yk;
    }
  }

  solveTransposed(b: Float64Array, x: Float64Array): void {
    if (!this.report.regular) throw new Defect('a regular factorisation before a solve');
    const { size } = this.pattern;
    const { columnOf, rowOf, lStarts, uStarts, lRows, uRows, l, u, d, y } = this;
    for (let k = 0; k < size; k++) {
      let s = b[columnOf[k]!]!;
      for (let p = uStarts[k]!; p < uStarts[k + 1]!; p++) s -= u[p]! * y[uRows[p]!]!;
      y[k] = s / d[k]!;
    }
    for (let k = size - 1; k >= 0; k--) {
      let s = y[k]!;
      for (let p = lStarts[k]!; p < lStarts[k + 1]!; p++) s -= l[p]! * y[lRows[p]!]!;
      y[k] = s;
    }
    for (let k = 0; k < size; k++) x[rowOf[k]!] = y[k]!;
  }
}

function grown<T extends Int32Array | Float64Array>(from: T, to: T): T {
  to.set(from);
  return to;
}
