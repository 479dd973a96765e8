/** The numbers of an L U factorisation with row pivoting (Gilbert and Peierls: time in proportion to the arithmetic). */
import { Defect } from '../job/issue.ts';
import type { GeneralPlan } from './generalPlan.ts';
import { SINGULAR } from './inspectPivots.ts';
import type { Factorisation, FactorReport, Pattern } from './matrix.ts';
import { Reach } from './reach.ts';

/** The matched entry is taken as pivot when it is at least this share of the largest candidate (*common practice, no source*). */
const PREFER_MATCHED = 0.1;
/** Kept pivots are chosen anew when one falls below this share of the largest candidate of its column (*common practice, no source*). */
const KEEP_PIVOT = 1e-3;

export class GeneralFactors implements Factorisation {
  readonly pattern: Pattern;
  private readonly plan: GeneralPlan;
  /** Length size: row k of the factors is row rowOf[k] of A; pivotOf is the inverse, -1 for a row that has not been a pivot yet. */
  private readonly rowOf: Int32Array;
  private readonly pivotOf: Int32Array;
  /** L by columns, unit diagonal left out; rows of A while factoring, pivot numbers afterwards. */
  private readonly lStarts: Int32Array;
  private lRows = new Int32Array(16);
  private l = new Float64Array(16);
  /** U by columns, above the diagonal, in an order in which the column can be solved for; rows are pivot numbers. */
  private readonly uStarts: Int32Array;
  private uRows = new Int32Array(16);
  private u = new Float64Array(16);
  /** Length size: the diagonal of U. */
  private readonly d: Float64Array;
  /** The entries above the diagonal blocks, and the pivot numbers of the rows of all entries. */
  private readonly above: Float64Array;
  private readonly abovePivots: Int32Array;
  private readonly insidePivots: Int32Array;
  /** Length size: the column in hand, zero between columns; and a right-hand side. */
  private readonly x: Float64Array;
  private readonly y: Float64Array;
  private readonly reach: Reach;
  private pivoted = false;
  private readonly report = { regular: false, negativePivots: 0, failedColumn: -1 };

  constructor(plan: GeneralPlan) {
    const { size } = plan.pattern;
    this.pattern = plan.pattern;
    this.plan = plan;
    this.rowOf = new Int32Array(size);
    this.pivotOf = new Int32Array(size);
    this.lStarts = new Int32Array(size + 1);
    this.uStarts = new Int32Array(size + 1);
    this.d = new Float64Array(size);
    this.above = new Float64Array(plan.above.length);
    this.abovePivots = new Int32Array(plan.above.length);
    this.insidePivots = new Int32Array(plan.inside.length);
    this.x = new Float64Array(size);
    this.y = new Float64Array(size);
    this.reach = new Reach(size);
  }

  refactor(values: Float64Array): FactorReport {
    const { plan, report } = this;
    report.negativePivots = 0;
    report.failedColumn = plan.hopelessColumn;
    if (plan.hopelessColumn < 0 && !(this.pivoted && this.refactorKept(values))) this.factor(values);
    report.regular = report.failedColumn < 0;
    if (report.regular) for (let p = 0; p < this.above.length; p++) this.above[p] = values[plan.above[p]!]!;
    return report;
  }

  /** Full factorisation with a free choice of pivots. */
  private factor(values: Float64Array): void {
    const { columnOf, blockStarts } = this.plan;
    this.pivotOf.fill(-1);
    this.reach.forget();
    this.x.fill(0);
    this.pivoted = false;
    this.report.negativePivots = 0;
    for (let m = 0; m + 1 < blockStarts.length; m++) {
      for (let k = blockStarts[m]!; k < blockStarts[m + 1]!; k++) {
        this.makeRoom(k);
        if (this.factorColumn(k, values)) continue;
        this.report.failedColumn = columnOf[k]!;
        return;
      }
    }
    this.renumber();
    this.pivoted = true;
  }

  /** Solves L x = A(:, k) over the rows that the column reaches through L, and chooses its pivot. False when there is none. */
  private factorColumn(k: number, values: Float64Array): boolean {
    const { inside, insideRows, insideStarts, matchedRow } = this.plan;
    const { pivotOf, lStarts, uStarts, x, lRows, l, uRows, u } = this;
    const { reached } = this.reach;
    const from = insideStarts[k]!;
    const to = insideStarts[k + 1]!;
    const top = this.reach.find(k, insideRows, from, to, pivotOf, lStarts, lRows);
    let columnMost = 0;
    for (let p = from; p < to; p++) {
      const a = values[inside[p]!]!;
      x[insideRows[p]!] = a;
      columnMost = Math.max(columnMost, Math.abs(a));
    }
    let uEnd = uStarts[k]!;
    let lEnd = lStarts[k]!;
    let most = -1;
    let best = -1;
    for (let s = top; s < reached.length; s++) {
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
    const matched = matchedRow[k]!;
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
    const { pivotOf, lRows } = this;
    const { insideRows, aboveRows } = this.plan;
    const end = this.lStarts[this.pattern.size]!;
    for (let p = 0; p < end; p++) lRows[p] = pivotOf[lRows[p]!]!;
    for (let p = 0; p < insideRows.length; p++) this.insidePivots[p] = pivotOf[insideRows[p]!]!;
    for (let p = 0; p < aboveRows.length; p++) this.abovePivots[p] = pivotOf[aboveRows[p]!]!;
  }

  /** Refactors with the pivots and patterns of the last full factorisation; false when a pivot has become too small for that. */
  private refactorKept(values: Float64Array): boolean {
    const { inside, insideStarts } = this.plan;
    const { insidePivots, lStarts, uStarts, lRows, uRows, l, u, d, x } = this;
    const { size } = this.pattern;
    let negative = 0;
    for (let k = 0; k < size; k++) {
      let columnMost = 0;
      for (let p = insideStarts[k]!; p < insideStarts[k + 1]!; p++) {
        const a = values[inside[p]!]!;
        x[insidePivots[p]!] = a;
        columnMost = Math.max(columnMost, Math.abs(a));
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
    this.report.negativePivots = negative;
    return true;
  }

  /** Makes room for one more column, of at most `size` entries each. */
  private makeRoom(k: number): void {
    const { size } = this.pattern;
    if (this.lStarts[k]! + size > this.l.length) {
      this.lRows = copied(this.lRows, new Int32Array(2 * this.l.length + size));
      this.l = copied(this.l, new Float64Array(this.lRows.length));
    }
    if (this.uStarts[k]! + size > this.u.length) {
      this.uRows = copied(this.uRows, new Int32Array(2 * this.u.length + size));
      this.u = copied(this.u, new Float64Array(this.uRows.length));
    }
  }

  /** Blocks from last to first: L and U within the block, then its solution goes into the rows above. */
  solve(b: Float64Array, x: Float64Array): void {
    if (!this.report.regular) throw new Defect('a regular factorisation before a solve');
    const { columnOf, blockStarts, aboveStarts } = this.plan;
    const { rowOf, lStarts, uStarts, lRows, uRows, l, u, d, y, above, abovePivots } = this;
    const { size } = this.pattern;
    for (let k = 0; k < size; k++) y[k] = b[rowOf[k]!]!;
    for (let m = blockStarts.length - 2; m >= 0; m--) {
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
        for (let p = aboveStarts[k]!; p < aboveStarts[k + 1]!; p++) y[abovePivots[p]!]! -= above[p]! * xk;
      }
    }
  }

  /** Blocks from first to last: what the blocks above contribute, then Uᵀ and Lᵀ within the block. */
  solveTransposed(b: Float64Array, x: Float64Array): void {
    if (!this.report.regular) throw new Defect('a regular factorisation before a solve');
    const { columnOf, blockStarts, aboveStarts } = this.plan;
    const { rowOf, lStarts, uStarts, lRows, uRows, l, u, d, y, above, abovePivots } = this;
    const { size } = this.pattern;
    for (let m = 0; m + 1 < blockStarts.length; m++) {
      const start = blockStarts[m]!;
      const end = blockStarts[m + 1]!;
      for (let k = start; k < end; k++) {
        let s = b[columnOf[k]!]!;
        for (let p = aboveStarts[k]!; p < aboveStarts[k + 1]!; p++) s -= above[p]! * y[abovePivots[p]!]!;
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

function copied<T extends Int32Array | Float64Array>(from: T, to: T): T {
  to.set(from);
  return to;
}
