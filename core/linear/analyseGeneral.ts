/** Sparse L U of a square matrix: columns ordered by minimum degree on A + Aᵀ, rows chosen by partial pivoting. */
import { Defect } from '../job/issue.ts';
import { GeneralFactors } from './generalFactors.ts';
import type { Factorisation, Pattern } from './matrix.ts';
import { minimumDegree } from './minimumDegree.ts';

/** Analyses a pattern once; the result refactors and solves any values on it. */
export function analyseGeneral(pattern: Pattern): Factorisation {
  if (pattern.symmetric) throw new Defect('a general pattern, with both triangles, for a general factorisation');
  const { order } = minimumDegree(symmetrised(pattern), new Uint8Array(pattern.size));
  return new GeneralFactors(pattern, order);
}

/** The graph of A + Aᵀ without the diagonal. */
function symmetrised(pattern: Pattern) {
  const { size, columnStarts, rowIndices } = pattern;
  const count = new Int32Array(size + 1);
  for (let j = 0; j < size; j++) {
    for (let e = columnStarts[j]!; e < columnStarts[j + 1]!; e++) {
      const i = rowIndices[e]!;
      if (i === j) continue;
      count[i + 1]!++;
      count[j + 1]!++;
    }
  }
  for (let j = 0; j < size; j++) count[j + 1]! += count[j]!;
  const twice = new Int32Array(count[size]!);
  const next = count.slice();
  for (let j = 0; j < size; j++) {
    for (let e = columnStarts[j]!; e < columnStarts[j + 1]!; e++) {
      const i = rowIndices[e]!;
      if (i === j) continue;
      twice[next[i]!++] = j;
      twice[next[j]!++] = i;
    }
  }
  const starts = new Int32Array(size + 1);
  const seen = new Int32Array(size).fill(-1);
  let used = 0;
  for (let j = 0; j < size; j++) {
    for (let s = count[j]!; s < count[j + 1]!; s++) {
      const i = twice[s]!;
      if (seen[i] === j) continue;
      seen[i] = j;
      twice[used++] = i;
    }
    starts[j + 1] = used;
  }
  return { size, starts, neighbours: twice };
}
