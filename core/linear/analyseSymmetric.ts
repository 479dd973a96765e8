/**
 * Sparse L D Lᵀ of a symmetric matrix, without square roots and without pivoting by value.
 *
 * Wiring is a tree with a few loops. Its leaves are eliminated first, each with one multiplier and no fill; what remains is ordered by minimum
 * degree; and the end of that, where the fill is nearly complete, is factored as one full block.
 */
import { Defect } from '../job/issue.ts';
import type { Factorisation, Pattern } from './matrix.ts';
import { SymmetricFactors } from './symmetricFactors.ts';
import { symmetricPlan } from './symmetricPlan.ts';

/** Analyses a pattern once; the result refactors and solves any values on it. */
export function analyseSymmetric(pattern: Pattern): Factorisation {
  if (!pattern.symmetric) throw new Defect('a symmetric pattern for a symmetric factorisation');
  return new SymmetricFactors(symmetricPlan(pattern));
}
