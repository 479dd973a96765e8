/** Iterative refinement: solve, look at what is left, solve for that, and stop when it no longer helps. */
import { scratch } from './scratch.ts';

/** What a refined solve achieved. */
export interface RefinedReport {
  /** max|b - A x| / max(|A| |x| + |b|), dimensionless: how far x is from solving the system as given. */
  readonly scaledResidual: number;
  /** Corrections that were kept. */
  readonly corrections: number;
}

/** Something that solves a system roughly, and can say how well. */
export interface RoughSolver {
  readonly size: number;
  /** `x` may be `b` itself. */
  solve(b: Float64Array, x: Float64Array): void;
  /** Writes r = b - A x and returns the scaled residual. */
  residual(b: Float64Array, x: Float64Array, r: Float64Array): number;
}

/** Half a unit in the last place of a double: no residual can be asked to be much smaller. */
const ROUNDING = 2 ** -53;
/** A refinement that has not converged after this many steps will not (*common practice, no source*). */
const MOST_CORRECTIONS = 5;
/** A step that does not at least halve the residual is not worth another (*common practice, no source*). */
const LEAST_GAIN = 0.5;

/**
 * Solves and refines until the scaled residual is down to rounding or stops halving. `x` may be `b` itself. Always leaves the best x seen,
 * with its residual; a bad one is the caller's to refuse.
 */
export function refine(solver: RoughSolver, b: Float64Array, x: Float64Array): RefinedReport {
  const { size } = solver;
  const given = b === x ? copy(b, scratch.rightHandSide(size), size) : b;
  const r = scratch.remainder(size);
  const best = scratch.best(size);
  solver.solve(given, x);
  let scaledResidual = solver.residual(given, x, r);
  let corrections = 0;
  while (scaledResidual > ROUNDING && corrections < MOST_CORRECTIONS) {
    copy(x, best, size);
    solver.solve(r, r);
    for (let i = 0; i < size; i++) x[i] = x[i]! + r[i]!;
    const next = solver.residual(given, x, r);
    if (!(next < scaledResidual)) {
      copy(best, x, size);
      break;
    }
    corrections++;
    const gained = next <= LEAST_GAIN * scaledResidual;
    scaledResidual = next;
    if (!gained) break;
  }
  return { scaledResidual, corrections };
}

function copy(from: Float64Array, to: Float64Array, size: number): Float64Array {
  for (let i = 0; i < size; i++) to[i] = from[i]!;
  return to;
}
