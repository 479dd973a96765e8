/** The numbers of an L D Lᵀ factorisation, laid out by its plan. */
import { Defect } from '../job/issue.ts';
import type { Factorisation, FactorReport, Pattern } from './matrix.ts';
import type { SymmetricPlan } from './symmetricPlan.ts';

/** A pivot below this share of what met in it is rounding error: the matrix is singular to working precision (*common practice, no source*). */
const SINGULAR = 1e-14;

export class SymmetricFactors implements Factorisation {
  readonly pattern: Pattern;
  private readonly plan: SymmetricPlan;
  /** Length plan.storage: before elimination the matrix, after it L; the diagonal holds 1/d. */
  private readonly w: Float64Array;
  /** Length size: a right-hand side in pivot order, then the solution. */
  private readonly y: Float64Array;
  private readonly report = { regular: false, negativePivots: 0, failedColumn: -1 };

  constructor(plan: SymmetricPlan) {
    this.pattern = plan.pattern;
    this.plan = plan;
    this.w = new Float64Array(plan.storage);
    this.y = new Float64Array(plan.pattern.size);
  }

  refactor(values: Float64Array): FactorReport {
    const { destination } = this.plan;
    const w = this.w;
    w.fill(0);
    for (let e = 0; e < destination.length; e++) w[destination[e]!] = values[e]!;
    this.eliminateLeaves();
    this.eliminateSparse();
    this.eliminateFull();
    return this.inspect(values);
  }

  private eliminateLeaves(): void {
    const { leafCount, parent, pattern } = this.plan;
    const w = this.w;
    const { size } = pattern;
    for (let k = 0; k < leafCount; k++) {
      const r = 1 / w[k]!;
      const u = w[size + k]!;
      const l = u * r;
      w[k] = r;
      w[size + k] = l;
      w[parent[k]!]! -= l * u;
    }
  }

  private eliminateSparse(): void {
    const { leafCount, fullStart, columnStarts, rows, targets, pattern } = this.plan;
    const w = this.w;
    const base = pattern.size + leafCount;
    let t = 0;
    for (let k = leafCount; k < fullStart; k++) {
      const r = 1 / w[k]!;
      w[k] = r;
      const end = columnStarts[k - leafCount + 1]!;
      for (let p = columnStarts[k - leafCount]!; p < end; p++) {
        const u = w[base + p]!;
        const l = u * r;
        w[rows[p]!]! -= l * u;
        for (let q = p + 1; q < end; q++) w[targets[t++]!]! -= l * w[base + q]!;
        w[base + p] = l;
      }
    }
  }

  private eliminateFull(): void {
    const { fullStart, fullPlace, pattern } = this.plan;
    const w = this.w;
    const { size } = pattern;
    let row = fullPlace;
    for (let k = fullStart; k < size; k++) {
      const r = 1 / w[k]!;
      w[k] = r;
      const length = size - k - 1;
      let target = row + length;
      for (let i = 0; i < length; i++) {
        const u = w[row + i]!;
        const l = u * r;
        w[k + 1 + i]! -= l * u;
        for (let j = i + 1; j < length; j++) w[target++]! -= l * w[row + j]!;
        w[row + i] = l;
      }
      row += length;
    }
  }

  /**
   * Counts the negative pivots and looks for lost ones. When all are positive, elimination has only ever taken away from the
   * diagonal, so a pivot is measured against the matrix's own diagonal entry; otherwise against all that met in it.
   */
  private inspect(values: Float64Array): FactorReport {
    const { pattern, original } = this.plan;
    const { columnStarts, size } = pattern;
    const { w, y, report } = this;
    let negative = 0;
    for (let k = 0; k < size; k++) {
      if (w[k]! < 0) negative++;
      y[k] = Math.abs(values[columnStarts[original[k]! + 1]! - 1]!);
    }
    if (negative > 0) this.addWhatMet(y);
    let failed = -1;
    for (let k = 0; k < size && failed < 0; k++) if (!(Math.abs(w[k]!) * y[k]! <= 1 / SINGULAR)) failed = k;
    report.negativePivots = negative;
    report.failedColumn = failed < 0 ? -1 : original[failed]!;
    report.regular = failed < 0;
    return report;
  }

  /** Adds |l| |d| |l| of every column of L to the diagonal places it changed. A multiplier beyond 1e14 counts as a failure of its pivot. */
  private addWhatMet(met: Float64Array): void {
    const { pattern, leafCount, fullStart, fullPlace, parent, columnStarts, rows } = this.plan;
    const { size } = pattern;
    const { w } = this;
    const add = (k: number, row: number, l: number): void => {
      met[row]! += Math.abs(l * (l / w[k]!));
      if (Math.abs(l) > 1 / SINGULAR) met[k] = Number.POSITIVE_INFINITY;
    };
    for (let k = 0; k < leafCount; k++) add(k, parent[k]!, w[size + k]!);
    for (let k = leafCount; k < fullStart; k++) {
      const end = columnStarts[k - leafCount + 1]!;
      for (let p = columnStarts[k - leafCount]!; p < end; p++) add(k, rows[p]!, w[size + leafCount + p]!);
    }
    let p = fullPlace;
    for (let k = fullStart; k < size; k++) for (let i = k + 1; i < size; i++) add(k, i, w[p++]!);
  }

  solve(b: Float64Array, x: Float64Array): void {
    if (!this.report.regular) throw new Defect('a regular factorisation before a solve');
    const { pattern, original, leafCount, fullStart, fullPlace, parent, columnStarts, rows } = this.plan;
    const { size } = pattern;
    const { w, y } = this;
    for (let k = 0; k < size; k++) y[k] = b[original[k]!]!;
    for (let k = 0; k < leafCount; k++) y[parent[k]!]! -= w[size + k]! * y[k]!;
    const base = size + leafCount;
    for (let k = leafCount; k < fullStart; k++) {
      const yk = y[k]!;
      const end = columnStarts[k - leafCount + 1]!;
      for (let p = columnStarts[k - leafCount]!; p < end; p++) y[rows[p]!]! -= w[base + p]! * yk;
    }
    let p = fullPlace;
    for (let k = fullStart; k < size; k++) {
      const yk = y[k]!;
      for (let i = k + 1; i < size; i++) y[i]! -= w[p++]! * yk;
    }
    for (let k = size - 1; k >= fullStart; k--) {
      let s = y[k]! * w[k]!;
      for (let i = size - 1; i > k; i--) s -= w[--p]! * y[i]!;
      y[k] = s;
      x[original[k]!] = s;
    }
    for (let k = fullStart - 1; k >= leafCount; k--) {
      let s = y[k]! * w[k]!;
      const end = columnStarts[k - leafCount + 1]!;
      for (let q = columnStarts[k - leafCount]!; q < end; q++) s -= w[base + q]! * y[rows[q]!]!;
      y[k] = s;
      x[original[k]!] = s;
    }
    for (let k = leafCount - 1; k >= 0; k--) {
      const s = y[k]! * w[k]! - w[size + k]! * y[parent[k]!]!;
      y[k] = s;
      x[original[k]!] = s;
    }
  }

  solveTransposed(b: Float64Array, x: Float64Array): void {
    this.solve(b, x);
  }
}
