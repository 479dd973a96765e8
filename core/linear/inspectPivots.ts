/** Looks over the pivots of a symmetric factorisation: their signs, and whether one has been lost to rounding. */
import type { SymmetricPlan } from './symmetricPlan.ts';

/** A pivot below this share of what met in it is rounding error: the matrix is singular to working precision (*common practice, no source*). */
export const SINGULAR = 1e-14;

/** What `FactorReport` says, in a form that can be written to. */
export interface PivotReport {
  regular: boolean;
  negativePivots: number;
  failedColumn: number;
}

/**
 * Writes the report on w after elimination (see `SymmetricPlan`). `values` are those of the matrix.
 *
 * When all pivots are positive, elimination has only ever taken away from the diagonal, so a pivot is measured against the matrix's own
 * diagonal entry. Otherwise it is measured against the sum of the magnitudes of all that met in it.
 */
export function inspectPivots(plan: SymmetricPlan, w: Float64Array, values: Float64Array, report: PivotReport): void {
  const { columnStarts, size } = plan.pattern;
  let negative = 0;
  let sound = true;
  for (let v = 0; v < size; v++) {
    const r = w[v]!;
    if (r < 0) negative++;
    if (!(Math.abs(r * values[columnStarts[v + 1]! - 1]!) <= 1 / SINGULAR)) sound = false;
  }
  report.negativePivots = negative;
  report.failedColumn = sound && negative === 0 ? -1 : firstLost(plan, w, values, negative > 0);
  report.regular = report.failedColumn < 0;
}

/** The first node in pivot order whose pivot is lost, or -1. */
function firstLost(plan: SymmetricPlan, w: Float64Array, values: Float64Array, indefinite: boolean): number {
  const { columnStarts, size } = plan.pattern;
  const met = new Float64Array(size + 1);
  for (let v = 0; v < size; v++) met[v] = Math.abs(values[columnStarts[v + 1]! - 1]!);
  const order = new Int32Array(size);
  let taken = 0;
  forEachPivot(plan, (v, rows, place, count) => {
    order[taken++] = v;
    if (!indefinite) return;
    const d = Math.abs(1 / w[v]!);
    for (let i = 0; i < count; i++) {
      const l = w[place + i]!;
      met[plan.table[rows + i]!]! += l * l * d;
      if (Math.abs(l) > 1 / SINGULAR) met[v] = Number.POSITIVE_INFINITY;
    }
  });
  for (const v of order) if (!(Math.abs(w[v]!) * met[v]! <= 1 / SINGULAR)) return v;
  return -1;
}

/** Visits the pivots in order: the node; where its rows stand in the table, and its multipliers in w; how many there are. */
function forEachPivot(
  plan: SymmetricPlan,
  visit: (v: number, rows: number, place: number, count: number) => void,
): void {
  const { table, leafCount, linkCount, columnCount, fullSize, fullNodes } = plan;
  let t = 0;
  let q = 2 * (plan.pattern.size + 1);
  for (let k = 0; k < leafCount; k++, t += 2, q += 1) visit(table[t]!, t + 1, q, 1);
  for (let k = 0; k < linkCount; k++, t += 4, q += 2) visit(table[t]!, t + 1, q, 2);
  for (let k = 0; k < columnCount; k++) {
    const d = table[t + 1]!;
    visit(table[t]!, t + 2, q, d);
    t += 3 + d + (d * (d - 1)) / 2;
    q += d;
  }
  for (let k = 0; k < fullSize; k++) {
    visit(table[fullNodes + k]!, fullNodes + k + 1, q, fullSize - k - 1);
    q += fullSize - k - 1;
  }
}
