/** Takes a tree-like graph apart from its twigs inwards: a node with one neighbour left is eliminated without any fill. */
import type { Pattern } from './matrix.ts';

/** What the stripping leaves. */
export interface Stripped {
  /** Number of leaves taken. */
  readonly count: number;
  /** Length size; the first `count` are the leaves in the order taken. */
  readonly leaves: Int32Array;
  /** Length size, by node: the one neighbour a leaf had left. */
  readonly parent: Int32Array;
  /** Length size, by node: the place in `values` of the entry that joins leaf and parent. */
  readonly edge: Int32Array;
  /** Length size, by node: neighbours left; -1 for a leaf that is gone. */
  readonly degree: Int32Array;
}

/**
 * Strips the leaves of a symmetric pattern. Instead of neighbour lists each node keeps the exclusive-or of its neighbours' numbers and of
 * its entries' places: with one neighbour left, these are the neighbour and the entry themselves.
 * A node with an empty diagonal waits until a neighbour has been taken and has filled it.
 */
export function stripLeaves(pattern: Pattern): Stripped {
  const { size, columnStarts, rowIndices, emptyDiagonal } = pattern;
  const degree = new Int32Array(size);
  const parent = new Int32Array(size);
  const edge = new Int32Array(size);
  const leaves = new Int32Array(size);
  for (let j = 0; j < size; j++) {
    // The diagonal ends the column.
    for (let e = columnStarts[j]!; e < columnStarts[j + 1]! - 1; e++) {
      const i = rowIndices[e]!;
      degree[i]!++;
      degree[j]!++;
      parent[i]! ^= j;
      parent[j]! ^= i;
      edge[i]! ^= e;
      edge[j]! ^= e;
    }
  }
  let count = 0;
  for (let v = 0; v < size; v++) if (degree[v] === 1 && emptyDiagonal[v] === 0) leaves[count++] = v;
  let taken = 0;
  for (let head = 0; head < count; head++) {
    const v = leaves[head]!;
    if (degree[v] !== 1) continue; // its one neighbour was taken first
    leaves[taken++] = v;
    degree[v] = -1;
    const p = parent[v]!;
    parent[p]! ^= v;
    edge[p]! ^= edge[v]!;
    if (--degree[p]! === 1) leaves[count++] = p; // by now filled, so an empty diagonal is no bar
  }
  return { count: taken, leaves, parent, edge, degree };
}
