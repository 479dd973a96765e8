/** Takes a tree-like graph apart from its twigs inwards: a node with one neighbour left is eliminated without any fill. */
import type { Pattern } from './matrix.ts';
import type { Layout } from './symmetricPlan.ts';
import { workspace } from './workspace.ts';

/**
 * Strips the leaves of a symmetric pattern; returns how many. Writes their pairs (leaf, neighbour) to the program, in order, and where their
 * entries stand; leaves degree[v] = -1 behind for a leaf, and the number of neighbours left for any other node.
 *
 * Instead of neighbour lists each node keeps the exclusive-or of its neighbours' numbers and of its entries' places: with one neighbour left,
 * these are the neighbour and the entry themselves.
 */
export function stripLeaves(pattern: Pattern, at: Layout): number {
  sumNeighbours(pattern, at);
  const { ints } = workspace;
  const { size } = pattern;
  const { degree, neighbour, edge, held, slot, program, offDiagonal } = at;
  let tail = 0;
  const { queue } = at;
  for (let v = 0; v < size; v++) if (ints[degree + v] === 1 && ints[held + v] === 0) ints[queue + tail++] = v;
  let count = 0;
  for (let head = 0; head < tail; head++) {
    const v = ints[queue + head]!;
    if (ints[degree + v] !== 1) continue; // its one neighbour was taken first
    const p = ints[neighbour + v]!;
    const e = ints[edge + v]!;
    ints[program + 2 * count] = v;
    ints[program + 2 * count + 1] = p;
    ints[slot + e] = offDiagonal + count;
    count++;
    ints[degree + v] = -1;
    ints[neighbour + p]! ^= v;
    ints[edge + p]! ^= e;
    ints[held + p] = 0;
    if (--ints[degree + p]! === 1) ints[queue + tail++] = p;
  }
  return count;
}

function sumNeighbours(pattern: Pattern, at: Layout): void {
  const { ints } = workspace;
  const { size, columnStarts, rowIndices, emptyDiagonal } = pattern;
  const { degree, neighbour, edge, held, slot } = at;
  ints.fill(0, degree, degree + size);
  ints.fill(0, neighbour, neighbour + size);
  ints.fill(0, edge, edge + size);
  let e = 0;
  for (let j = 0; j < size; j++) {
    ints[held + j] = emptyDiagonal[j]!;
    const diagonal = columnStarts[j + 1]! - 1; // it ends its column
    for (; e < diagonal; e++) {
      const i = rowIndices[e]!;
      ints[degree + i]!++;
      ints[degree + j]!++;
      ints[neighbour + i]! ^= j;
      ints[neighbour + j]! ^= i;
      ints[edge + i]! ^= e;
      ints[edge + j]! ^= e;
    }
    ints[slot + e++] = j;
  }
}
