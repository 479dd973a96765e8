/**
 * Sparse L U of a square matrix: block triangular form, columns ordered by minimum degree on A + Aᵀ within each block, rows chosen by
 * partial pivoting.
 */
import { Defect } from '../job/issue.ts';
import { GeneralFactors } from './generalFactors.ts';
import { generalPlan } from './generalPlan.ts';
import type { Factorisation, Pattern } from './matrix.ts';

/** Analyses a pattern once; the result refactors and solves any values on it. */
export function analyseGeneral(pattern: Pattern): Factorisation {
  if (pattern.symmetric) throw new Defect('a general pattern, with both triangles, for a general factorisation');
  return new GeneralFactors(generalPlan(pattern));
}
