/** A solve with its proof. */
import type { Factorisation } from './matrix.ts';
import { type RefinedReport, refine } from './refine.ts';
import { residual } from './residual.ts';

/**
 * Solves A x = b with the factors of the last `refactor(values)`, by iterative refinement, and reports the scaled residual. `x` may be `b`
 * itself. Always leaves the best x seen; a bad one is the caller's to refuse.
 */
export function solveRefined(
  factorisation: Factorisation,
  values: Float64Array,
  b: Float64Array,
  x: Float64Array,
): RefinedReport {
  const { pattern } = factorisation;
  return refine(
    {
      size: pattern.size,
      solve: (right, solution) => factorisation.solve(right, solution),
      residual: (right, solution, r) => residual(pattern, values, right, solution, r),
    },
    b,
    x,
  );
}
