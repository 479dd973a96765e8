/** The numbers of an L U factorisation with row pivoting (Gilbert and Peierls: time in proportion to the arithmetic). */
import { Defect } from '../job/issue.ts';
import { type GeneralPlan, releasePlan } from './generalPlan.ts';
import { SINGULAR } from './inspectPivots.ts';
import type { Factorisation, FactorReport, Pattern } from './matrix.ts';
import { Reach } from './reach.ts';
import { giveBackInts, giveBackNumbers, takeInts, takeNumbers } from './slab.ts';

/** The matched entry is taken as pivot when it is at least this share of the largest candidate (*common practice, no source*). */
const PREFER_MATCHED = 0.1;
/** Kept pivots are chosen anew when one falls below this share of the largest candidate of its column (*common practice, no source*). */
const KEEP_PIVOT = 1e-3;

export class GeneralFactors implements Factorisation {
  readonly pattern: Pattern;
  private readonly plan: GeneralPlan;
  // Arrays are at least as long as said.
  /** Length size: row k of the factors is row rowOf[k] of A; pivotOf is the inverse, -1 for a row that has not been a pivot yet. */
  private readonly rowOf: Int32Array;
  private readonly pivotOf: Int32Array;
  /** L by columns, unit diagonal left out; rows of A while factoring, pivot numbers afterwards. */
  private readonly lStarts: Int32Array;
  private lRows: Int32Array;
  private l: Float64Array;
  /** U by columns, above the diagonal, in an order in which the column can be solved for; rows are pivot numbers. */
  private readonly uStarts: Int32Array;
  private uRows: Int32Array;
  private u: Float64Array;
  /** Length size: the diagonal of U. */
  private readonly d: Float64Array;
  /** Parallel to plan.entries: their values, for those above the diagonal blocks; the pivot numbers of their rows, for all. */
  private readonly above: Float64Array;
  private readonly pivotRows: Int32Array;
  /** Length size: the column in hand, zero between columns; and a right-hand side. */
  private readonly x: Float64Array;
  private readonly y: Float64Array;
  private readonly reach: Reach;
  private pivoted = false;
  private released = false;
  private readonly report = { regular: false, negativePivots: 0, failedColumn: -1 };

  constructor(plan: GeneralPlan) {
    const { size, rowIndices } = plan.pattern;
    const entries = rowIndices.length;
    this.pattern = plan.pattern;
    this.plan = plan;
    this.rowOf = takeInts(size);
    this.pivotOf = takeInts(size);
    this.lStarts = takeInts(size + 1);
    this.uStarts = takeInts(size + 1);
    this.lStarts[0] = 0;
    this.uStarts[0] = 0;
    this.lRows = takeInts(entries);
    this.l = takeNumbers(entries);
    this.uRows = takeInts(entries);
    this.u = takeNumbers(entries);
    this.d = takeNumbers(size);
    this.above = takeNumbers(entries);
    this.pivotRows = takeInts(entries);
    this.x = takeNumbers(size);
    this.y = takeNumbers(size);
    this.reach = new Reach(size);
  }

  refactor(values: Float64Array): FactorReport {
    if (this.released) throw new Defect('no use of a factorisation after its release');
    const { plan, report } = this;
    report.negativePivots = 0;
    report.failedColumn = plan.hopelessColumn;
    if (plan.hopelessColumn < 0 && !(this.pivoted && this.refactorKept(values))) this.factor(values);
    report.regular = report.failedColumn < 0;
    return report;
  }

  release(): void {
    if (this.released) return;
    this.released = true;
    this.report.regular = false;
    releasePlan(this.plan);
    this.reach.release();
    const { rowOf, pivotOf, lStarts, uStarts, lRows, uRows, pivotRows, l, u, d, above, x, y } = this;
    for (const array of [rowOf, pivotOf, lStarts, uStarts, lRows, uRows, pivotRows]) giveBackInts(array);
    for (const array of [l, u, d, above, x, y]) giveBackNumbers(array);
  }

  /** Full factorisation with a free choice of pivots. */
  private factor(values: Float64Array): void {
    const { size } = this.pattern;
    this.pivotOf.fill(-1);
    this.reach.forget();
    this.x.fill(0);
    this.pivoted = false;
    this.report.negativePivots = 0;
    for (let k = 0; k < size; k++) {
      if (this.factorColumn(k, values)) continue;
      this.report.failedColumn = this.plan.columnOf[k]!;
      return;
    }
    this.renumber();
    this.pivoted = true;
  }

  /** Solves L x = A(:, k) over the rows that the column reaches through L, and chooses its pivot. False when there is none. */
  private factorColumn(k: number, values: Float64Array): boolean {
    const { entries, rows, starts, matchedRow, columnOf } = this.plan;
    const { pivotOf, lStarts, uStarts, x, above } = this;
    const from = starts[2 * k]!;
    const to = starts[2 * k + 1]!;
    for (let p = to; p < starts[2 * k + 2]!; p++) above[p] = values[entries[p]!]!;
    const top = this.reach.find(k, rows, from, to, pivotOf, lStarts, this.lRows);
    const { reached } = this.reach;
    const { size } = this.pattern;
    this.makeRoom(lStarts[k]!, uStarts[k]!, size - top);
    const { lRows, l, uRows, u } = this;
    let columnMost = 0;
    for (let p = from; p < to; p++) {
      const a = values[entries[p]!]!;
      x[rows[p]!] = a;
      columnMost = Math.max(columnMost, Math.abs(a));
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
        lRows[lEnd++] = i;
        if (Math.abs(xi) <= most) continue;
        most = Math.abs(xi);
        best = i;
        continue;
      }
      for (let p = lStarts[c]!; p < lStarts[c + 1]!; p++) x[lRows[p]!]! -= l[p]! * xi;
      uRows[uEnd] = c;
      u[uEnd++] = xi;
      x[i] = 0;
    }
    if (!(most > SINGULAR * columnMost && most < Number.POSITIVE_INFINITY)) return false;
    const matched = matchedRow[columnOf[k]!]!;
    if (pivotOf[matched]! < 0 && Math.abs(x[matched]!) >= PREFER_MATCHED * most) best = matched;
    uStarts[k + 1] = uEnd;
    this.divideColumn(k, best, lEnd);
    return true;
  }

  /** Makes row `best` the pivot of column k and turns the rest of x, listed in L up to lEnd, into multipliers. */
  private divideColumn(k: number, best: number, lEnd: number): void {
    const { lStarts, lRows, l, x } = this;
    const pivot = x[best]!;
    if (pivot < 0) this.report.negativePivots++;
    this.d[k] = pivot;
    this.rowOf[k] = best;
    this.pivotOf[best] = k;
    let to = lStarts[k]!;
    for (let p = to; p < lEnd; p++) {
      const i = lRows[p]!;
      if (i !== best) {
        lRows[to] = i;
        l[to++] = x[i]! / pivot;
      }
      x[i] = 0;
    }
    lStarts[k + 1] = to;
  }

  /** Rows of A become pivot numbers, now that all are known. */
  private renumber(): void {
    const { pivotOf, lRows, pivotRows } = this;
    const { rows } = this.plan;
    const { size, rowIndices } = this.pattern;
    const end = this.lStarts[size]!;
    for (let p = 0; p < end; p++) lRows[p] = pivotOf[lRows[p]!]!;
    for (let p = 0; p < rowIndices.length; p++) pivotRows[p] = pivotOf[rows[p]!]!;
  }

  /** Refactors with the pivots and patterns of the last full factorisation; false when a pivot has become too small for that. */
  private refactorKept(values: Float64Array): boolean {
    const { entries, starts } = this.plan;
    const { pivotRows, lStarts, uStarts, lRows, uRows, l, u, d, x, above } = this;
    const { size } = this.pattern;
    let negative = 0;
    for (let k = 0; k < size; k++) {
      let columnMost = 0;
      const inner = starts[2 * k + 1]!;
      for (let p = starts[2 * k]!; p < inner; p++) {
        const a = values[entries[p]!]!;
        x[pivotRows[p]!] = a;
        columnMost = Math.max(columnMost, Math.abs(a));
      }
      for (let p = inner; p < starts[2 * k + 2]!; p++) above[p] = values[entries[p]!]!;
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
    this.report.negativePivots = negative;
    return true;
  }

  /** Makes room for `more` entries in L and in U. */
  private makeRoom(lUsed: number, uUsed: number, more: number): void {
    if (lUsed + more > Math.min(this.l.length, this.lRows.length)) {
      this.lRows = grownInts(this.lRows, 2 * lUsed + more);
      this.l = grownNumbers(this.l, 2 * lUsed + more);
    }
    if (uUsed + more > Math.min(this.u.length, this.uRows.length)) {
      this.uRows = grownInts(this.uRows, 2 * uUsed + more);
      this.u = grownNumbers(this.u, 2 * uUsed + more);
    }
  }

  /** Blocks from last to first: L and U within the block, then its solution goes into the rows above. */
  solve(b: Float64Array, x: Float64Array): void {
    if (!this.report.regular) throw new Defect('a regular factorisation before a solve');
    const { columnOf, blockStarts, blockCount, starts } = this.plan;
    const { rowOf, lStarts, uStarts, lRows, uRows, l, u, d, y, above, pivotRows } = this;
    const { size } = this.pattern;
    for (let k = 0; k < size; k++) y[k] = b[rowOf[k]!]!;
    for (let m = blockCount - 1; m >= 0; m--) {
      const start = blockStarts[m]!;
      const end = blockStarts[m + 1]!;
      for (let k = start; k < end; k++) {
        const yk = y[k]!;
        for (let p = lStarts[k]!; p < lStarts[k + 1]!; p++) y[lRows[p]!]! -= l[p]! * yk;
      }
      for (let k = end - 1; k >= start; k--) {
        const xk = y[k]! / d[k]!;
        x[columnOf[k]!] = xk;
        for (let p = uStarts[k]!; p < uStarts[k + 1]!; p++) y[uRows[p]!]! -= u[p]! * xk;
        for (let p = starts[2 * k + 1]!; p < starts[2 * k + 2]!; p++) y[pivotRows[p]!]! -= above[p]! * xk;
      }
    }
  }

  /** Blocks from first to last: what the blocks above contribute, then Uᵀ and Lᵀ within the block. */
  solveTransposed(b: Float64Array, x: Float64Array): void {
    if (!this.report.regular) throw new Defect('a regular factorisation before a solve');
    const { columnOf, blockStarts, blockCount, starts } = this.plan;
    const { rowOf, lStarts, uStarts, lRows, uRows, l, u, d, y, above, pivotRows } = this;
    const { size } = this.pattern;
    for (let m = 0; m < blockCount; m++) {
      const start = blockStarts[m]!;
      const end = blockStarts[m + 1]!;
      for (let k = start; k < end; k++) {
        let s = b[columnOf[k]!]!;
        for (let p = starts[2 * k + 1]!; p < starts[2 * k + 2]!; p++) s -= above[p]! * y[pivotRows[p]!]!;
        for (let p = uStarts[k]!; p < uStarts[k + 1]!; p++) s -= u[p]! * y[uRows[p]!]!;
        y[k] = s / d[k]!;
      }
      for (let k = end - 1; k >= start; k--) {
        let s = y[k]!;
        for (let p = lStarts[k]!; p < lStarts[k + 1]!; p++) s -= l[p]! * y[lRows[p]!]!;
        y[k] = s;
      }
    }
    for (let k = 0; k < size; k++) x[rowOf[k]!] = y[k]!;
  }
}

function grownInts(from: Int32Array, length: number): Int32Array {
  const to = takeInts(Math.max(length, from.length));
  to.set(from);
  giveBackInts(from);
  return to;
}

function grownNumbers(from: Float64Array, length: number): Float64Array {
  const to = takeNumbers(Math.max(length, from.length));
  to.set(from);
  giveBackNumbers(from);
  return to;
}
