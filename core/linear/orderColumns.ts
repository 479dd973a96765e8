/** Column order of a general matrix: minimum degree on the graph of A + Aᵀ. */
import type { Pattern } from './matrix.ts';
import { minimumDegree } from './minimumDegree.ts';
import { reserve, workspace } from './workspace.ts';

/** The columns in the order in which to eliminate them. */
export function orderColumns(pattern: Pattern): Int32Array {
  const { size } = pattern;
  const { starts, neighbours } = symmetrised(pattern);
  const base = 4 * size;
  reserve(base + neighbours.length);
  const { ints } = workspace;
  ints.fill(0, 2 * size, 3 * size);
  for (let v = 0; v < size; v++) {
    ints[v] = base + starts[v]!;
    ints[size + v] = starts[v + 1]! - starts[v]!;
  }
  ints.set(neighbours, base);
  const graph = { size, place: 0, length: size, held: 2 * size, order: 3 * size, end: base + neighbours.length };
  minimumDegree(graph);
  return workspace.ints.slice(graph.order, graph.order + size);
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
  return { size, starts, neighbours: twice.subarray(0, used) };
}
