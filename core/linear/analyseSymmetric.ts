/**
 * Sparse L D Lᵀ of a symmetric matrix, without square roots and without pivoting by value.
 *
 * Wiring is a tree with a few loops. Its leaves are eliminated first, each with one multiplier and no fill; what remains is ordered by minimum
 * degree; and the end of that, where the fill is nearly complete, is factored as one full block.
 */
import { Defect } from '../job/issue.ts';
import type { FusedFactorisation, Pattern } from './matrix.ts';
import { SymmetricFactors } from './symmetricFactors.ts';
import { symmetricPlan } from './symmetricPlan.ts';

/**
 * Analyses a pattern once; the result refactors and solves any values on it. `plain` keeps to plain JavaScript, as where compiled code is
 * forbidden; the results are the same bit for bit.
 */
export function analyseSymmetric(
  pattern: Pattern,
  { plain = false }: { readonly plain?: boolean } = {},
): FusedFactorisation {
  if (!pattern.symmetric) throw new Defect('a symmetric pattern for a symmetric factorisation');
  return new SymmetricFactors(symmetricPlan(pattern), plain);
}
