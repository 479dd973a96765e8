/**
 * Solves with a matrix that differs a little from one already factored (Sherman, Morrison and Woodbury):
 * with A' = A + U C Vᵀ, W = A⁻¹ U and S = I + C Vᵀ W,   A'⁻¹ b = x₀ - W S⁻¹ C Vᵀ x₀   where x₀ = A⁻¹ b.
 */

import { Defect } from '../job/issue.ts';
import { DenseLu } from './denseLu.ts';
import type { Factorisation, Pattern } from './matrix.ts';
import { type RefinedReport, refine } from './refine.ts';
import { scaledResidual, startResidual, takeProduct } from './residual.ts';
import { scratch } from './scratch.ts';

/** A vector with few entries: entry k is coefficients[k], in row rows[k]. */
interface SparseVector {
  readonly rows: readonly number[];
  readonly coefficients: readonly number[];
}

/** Adds weight u vᵀ to the matrix; without v, weight u uᵀ. */
export interface RankOneChange {
  readonly weight: number;
  readonly u: SparseVector;
  readonly v?: SparseVector;
}

/** The change of one symmetric branch between two rows, or from one row to the reference (`to` = null): weight (e_from - e_to)(e_from - e_to)ᵀ. */
export function branchChange(weight: number, from: number, to: number | null): RankOneChange {
  const u = to === null ? { rows: [from], coefficients: [1] } : { rows: [from, to], coefficients: [1, -1] };
  return { weight, u };
}

/**
 * Prepares the solver of A + Σ weight u vᵀ from the factors of A: one solve with A for each change. `values` are those of the last refactor.
 * The factorisation must not be refactored while the update is in use.
 */
export function lowRankUpdate(
  factorisation: Factorisation,
  values: Float64Array,
  changes: readonly RankOneChange[],
): LowRankUpdate {
  return new LowRankUpdate(factorisation, values, changes);
}

export class LowRankUpdate {
  /** False when the changed matrix is singular, or so nearly that the update has lost its digits: factor it anew to tell which. */
  readonly regular: boolean;
  private readonly pattern: Pattern;
  private readonly factorisation: Factorisation;
  private readonly values: Float64Array;
  private readonly changes: readonly RankOneChange[];
  /** W, one column a change. */
  private readonly columns: readonly Float64Array[];
  private readonly core: DenseLu;
  private readonly rowScale: Float64Array;
  private readonly z: Float64Array;

  constructor(factorisation: Factorisation, values: Float64Array, changes: readonly RankOneChange[]) {
    this.pattern = factorisation.pattern;
    this.factorisation = factorisation;
    this.values = values;
    this.changes = changes;
    this.columns = changes.map(({ u }) => {
      const w = new Float64Array(this.pattern.size);
      for (let k = 0; k < u.rows.length; k++) w[u.rows[k]!]! += u.coefficients[k]!;
      factorisation.solve(w, w);
      return w;
    });
    this.core = new DenseLu(changes.length);
    this.rowScale = new Float64Array(changes.length);
    this.z = new Float64Array(changes.length);
    this.regular = this.factorCore();
  }

  /**
   * Factors S = I + C Vᵀ W, each row divided by the largest sum of magnitudes that met in it, so that a pivot near rounding shows that the
   * digits have cancelled.
   */
  private factorCore(): boolean {
    const { changes, columns, core, rowScale } = this;
    const k = changes.length;
    for (let i = 0; i < k; i++) {
      const { weight, u, v = u } = changes[i]!;
      let most = 0;
      for (let j = 0; j < k; j++) {
        const product = weight * dot(v, columns[j]!);
        const one = i === j ? 1 : 0;
        core.a[i * k + j] = one + product;
        most = Math.max(most, one + Math.abs(product));
      }
      rowScale[i] = 1 / most;
      for (let j = 0; j < k; j++) core.a[i * k + j]! *= 1 / most;
    }
    return core.factor();
  }

  /** x = A'⁻¹ b, from x₀ = A⁻¹ b (a base case already solved). `x` may be `base` itself. */
  correct(base: Float64Array, x: Float64Array): void {
    if (!this.regular) throw new Defect('a regular low-rank update before a solve');
    const { changes, columns, z, rowScale } = this;
    for (let i = 0; i < changes.length; i++) {
      const { weight, u, v = u } = changes[i]!;
      z[i] = rowScale[i]! * weight * dot(v, base);
    }
    this.core.solve(z);
    const { size } = this.pattern;
    if (x !== base) for (let i = 0; i < size; i++) x[i] = base[i]!;
    for (let c = 0; c < columns.length; c++) {
      const w = columns[c]!;
      const zc = z[c]!;
      for (let i = 0; i < size; i++) x[i] = x[i]! - w[i]! * zc;
    }
  }

  /** x = A'⁻¹ b. `x` may be `b` itself. */
  solve(b: Float64Array, x: Float64Array): void {
    this.factorisation.solve(b, x);
    this.correct(x, x);
  }

  /** The same by iterative refinement on the changed matrix, with its scaled residual. */
  solveRefined(b: Float64Array, x: Float64Array): RefinedReport {
    return refine(
      {
        size: this.pattern.size,
        solve: (right, solution) => this.solve(right, solution),
        residual: (right, solution, r) => this.residual(right, solution, r),
      },
      b,
      x,
    );
  }

  /** r = b - A' x, and its scaled size. */
  private residual(b: Float64Array, x: Float64Array, r: Float64Array): number {
    const { size } = this.pattern;
    const magnitude = scratch.magnitude(size);
    startResidual(size, b, r, magnitude);
    takeProduct(this.pattern, this.values, x, r, magnitude);
    for (const { weight, u, v = u } of this.changes) {
      const product = weight * dot(v, x);
      for (let k = 0; k < u.rows.length; k++) {
        const i = u.rows[k]!;
        r[i] = r[i]! - u.coefficients[k]! * product;
        magnitude[i] = magnitude[i]! + Math.abs(u.coefficients[k]! * product);
      }
    }
    return scaledResidual(size, r, magnitude);
  }
}

function dot({ rows, coefficients }: SparseVector, x: Float64Array): number {
  let s = 0;
  for (let k = 0; k < rows.length; k++) s += coefficients[k]! * x[rows[k]!]!;
  return s;
}
