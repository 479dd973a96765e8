/** Iterative refinement: solve, look at what is left, solve for that, and stop when it no longer helps. */
import type { Factorisation } from './matrix.ts';
import { residual } from './residual.ts';
import { scratch } from './scratch.ts';

/** What a refined solve achieved. */
export interface RefinedReport {
  /** max|b - A x| / max(|A| |x| + |b|), dimensionless: how far x is from solving the system as given. */
  readonly scaledResidual: number;
  /** Corrections that were kept. */
  readonly corrections: number;
}

/** Half a unit in the last place of a double: no residual can be asked to be much smaller. */
const ROUNDING = 2 ** -53;
/** A refinement that has not converged after this many steps will not (*common practice, no source*). */
const MOST_CORRECTIONS = 5;
/** A step that does not at least halve the residual is not worth another (*common practice, no source*). */
const LEAST_GAIN = 0.5;

/**
 * Solves A x = b with the factors of the last `refactor(values)` and refines x until the scaled residual is down to rounding
 * or stops halving. `x` may be `b` itself. Always returns the best x seen, with its residual; a bad one is the caller's to refuse.
 */
export function solveRefined(
  factorisation: Factorisation,
  values: Float64Array,
  b: Float64Array,
  x: Float64Array,
): RefinedReport {
  const { pattern } = factorisation;
  const { size } = pattern;
  const given = b === x ? scratch.rightHandSide(size) : b;
  if (b === x) for (let i = 0; i < size; i++) given[i] = b[i]!;
  const r = scratch.remainder(size);
  const best = scratch.best(size);
  factorisation.solve(given, x);
  let scaledResidual = residual(pattern, values, given, x, r);
  let corrections = 0;
  while (scaledResidual > ROUNDING && corrections < MOST_CORRECTIONS) {
    for (let i = 0; i < size; i++) best[i] = x[i]!;
    factorisation.solve(r, r);
    for (let i = 0; i < size; i++) x[i]! += r[i]!;
    const next = residual(pattern, values, given, x, r);
    if (!(next < scaledResidual)) {
      for (let i = 0; i < size; i++) x[i] = best[i]!;
      break;
    }
    corrections++;
    const enough = next > LEAST_GAIN * scaledResidual;
    scaledResidual = next;
    if (enough) break;
  }
  return { scaledResidual, corrections };
}
