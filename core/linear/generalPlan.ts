/** The plan of an L U factorisation: block triangular form first, then minimum degree within the blocks. */
import type { Pattern } from './matrix.ts';
import { maximumTransversal, UNMATCHED } from './maximumTransversal.ts';
import { minimumDegree } from './minimumDegree.ts';
import { giveBackInts, takeInts } from './slab.ts';
import { type Digraph, strongComponents } from './strongComponents.ts';
import { reserve, workspace } from './workspace.ts';

/**
 * Rows and columns are renumbered so that the matrix is block upper triangular with entries all along the diagonal. Only the diagonal blocks
 * are factored. The arrays are at least as long as said.
 */
export interface GeneralPlan {
  readonly pattern: Pattern;
  /** A column that no choice of entries can give a pivot, or -1: if there is one, the matrix is singular and there is no plan. */
  readonly hopelessColumn: number;
  /** Length size: columnOf[k] is the column of A that becomes column k. */
  readonly columnOf: Int32Array;
  /** Length size, by column of A: the row matched to it, preferred as its pivot. */
  readonly matchedRow: Int32Array;
  /** Length blockCount + 1: block m is columns blockStarts[m] .. blockStarts[m + 1] - 1. */
  readonly blockStarts: Int32Array;
  readonly blockCount: number;
  /**
   * The places in `values` of the entries by new column k: those of its diagonal block are entries[starts[2 k] .. starts[2 k + 1]), those of the
   * blocks above entries[starts[2 k + 1] .. starts[2 k + 2]).
   */
  readonly starts: Int32Array;
  readonly entries: Int32Array;
  /** Parallel to `entries`: their rows of A. */
  readonly rows: Int32Array;
}

/** Works out the plan. */
export function generalPlan(pattern: Pattern): GeneralPlan {
  const { size, columnStarts, rowIndices } = pattern;
  const matchedRow = maximumTransversal(pattern);
  const hopelessColumn = matchedRow.subarray(0, size).indexOf(UNMATCHED);
  const columnOf = takeInts(size);
  const blockStarts = takeInts(size + 1);
  const starts = takeInts(2 * size + 1);
  const entries = takeInts(rowIndices.length);
  const rows = takeInts(rowIndices.length);
  const plan = { pattern, hopelessColumn, columnOf, matchedRow, blockStarts, starts, entries, rows };
  if (hopelessColumn >= 0) return { ...plan, blockCount: 0 };

  const graph = columnGraph(pattern, matchedRow);
  const of = takeInts(size);
  const blockCount = strongComponents({ size, starts: columnStarts, targets: graph }, of);
  orderColumns({ size, starts: columnStarts, targets: graph }, of, blockCount, plan);
  splitEntries(plan, graph, of);
  giveBackInts(of);
  giveBackInts(graph);
  return { ...plan, blockCount };
}

/** Gives the memory of a plan back. */
export function releasePlan({ columnOf, matchedRow, blockStarts, starts, entries, rows }: GeneralPlan): void {
  for (const array of [columnOf, matchedRow, blockStarts, starts, entries, rows]) giveBackInts(array);
}

/** Columns as nodes: for each entry of column j, the column whose matched row it stands in. */
function columnGraph({ size, rowIndices }: Pattern, matchedRow: Int32Array): Int32Array {
  const columnMatched = takeInts(size);
  const targets = takeInts(rowIndices.length);
  for (let j = 0; j < size; j++) columnMatched[matchedRow[j]!] = j;
  for (let e = 0; e < rowIndices.length; e++) targets[e] = columnMatched[rowIndices[e]!]!;
  giveBackInts(columnMatched);
  return targets;
}

/** Lists the columns by block, and by minimum degree within each. */
function orderColumns(
  graph: Digraph,
  of: Int32Array,
  blockCount: number,
  { columnOf, blockStarts }: Pick<GeneralPlan, 'columnOf' | 'blockStarts'>,
): void {
  const { size } = graph;
  const order = orderByDegree(graph, of);
  const { ints } = workspace;
  // Counted two blocks on, so that filling leaves each block's start in its own place.
  const next = takeInts(blockCount + 2);
  next.fill(0);
  for (let j = 0; j < size; j++) next[of[j]! + 2]!++;
  for (let m = 0; m < blockCount; m++) next[m + 1]! += next[m]!;
  for (let k = 0; k < size; k++) {
    const j = ints[order + k]!;
    const at = of[j]! + 1;
    columnOf[next[at]!] = j;
    next[at]!++;
  }
  for (let m = 0; m <= blockCount; m++) blockStarts[m] = next[m]!;
  giveBackInts(next);
}

/**
 * Orders all columns by minimum degree on the undirected graph of the edges that stay within a block; returns where in the workspace the
 * order stands.
 */
function orderByDegree({ size, starts, targets }: Digraph, of: Int32Array): number {
  const place = 0;
  const length = size;
  const held = 2 * size;
  const order = 3 * size;
  const seen = 4 * size;
  const lists = 5 * size;
  const edges = starts[size]!;
  reserve(lists + 2 * edges);
  const { ints } = workspace;
  ints.fill(0, length, order);
  for (let j = 0; j < size; j++) {
    for (let e = starts[j]!; e < starts[j + 1]!; e++) {
      const c = targets[e]!;
      if (c === j || of[c] !== of[j]) continue;
      ints[length + j]!++;
      ints[length + c]!++;
    }
  }
  let end = lists;
  for (let j = 0; j < size; j++) {
    ints[place + j] = end;
    end += ints[length + j]!;
    ints[length + j] = 0;
  }
  for (let j = 0; j < size; j++) {
    for (let e = starts[j]!; e < starts[j + 1]!; e++) {
      const c = targets[e]!;
      if (c === j || of[c] !== of[j]) continue;
      ints[ints[place + j]! + ints[length + j]!++] = c;
      ints[ints[place + c]! + ints[length + c]!++] = j;
    }
  }
  ints.fill(-1, seen, lists);
  for (let j = 0; j < size; j++) dropRepeats(ints[place + j]!, length + j, seen, j);
  minimumDegree({ size, place, length, held, order, end });
  return order;
}

/** Shortens the list of node j, which begins at `from` and whose length stands at `length`, to one of each neighbour. */
function dropRepeats(from: number, length: number, seen: number, j: number): void {
  const { ints } = workspace;
  const end = from + ints[length]!;
  let to = from;
  for (let s = from; s < end; s++) {
    const c = ints[s]!;
    if (ints[seen + c] === j) continue;
    ints[seen + c] = j;
    ints[to++] = c;
  }
  ints[length] = to - from;
}

/** Lists the entries of each new column, those of its own block first. `graph`: the column matched to each entry's row. */
function splitEntries(
  { pattern, columnOf, starts, entries, rows }: Omit<GeneralPlan, 'blockCount'>,
  graph: Int32Array,
  of: Int32Array,
): void {
  const { size, columnStarts, rowIndices } = pattern;
  let used = 0;
  starts[0] = 0;
  for (let k = 0; k < size; k++) {
    const j = columnOf[k]!;
    for (const inside of [true, false]) {
      for (let e = columnStarts[j]!; e < columnStarts[j + 1]!; e++) {
        if ((of[graph[e]!] === of[j]) !== inside) continue;
        entries[used] = e;
        rows[used++] = rowIndices[e]!;
      }
      starts[inside ? 2 * k + 1 : 2 * k + 2] = used;
    }
  }
}
