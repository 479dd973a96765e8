/** The plan of an L U factorisation: block triangular form first, then minimum degree within the blocks. */
import type { Pattern } from './matrix.ts';
import { maximumTransversal, UNMATCHED } from './maximumTransversal.ts';
import { minimumDegree } from './minimumDegree.ts';
import { type Digraph, strongComponents } from './strongComponents.ts';
import { reserve, workspace } from './workspace.ts';

/**
 * Rows and columns are renumbered so that the matrix is block upper triangular with entries all along the diagonal. Only the diagonal blocks
 * are factored.
 */
export interface GeneralPlan {
  readonly pattern: Pattern;
  /** Length size: columnOf[k] is the column of A that becomes column k. */
  readonly columnOf: Int32Array;
  /** Length size: the row of A matched to that column, preferred as its pivot. */
  readonly matchedRow: Int32Array;
  /** Length number of blocks + 1: block m is columns blockStarts[m] .. blockStarts[m + 1] - 1. */
  readonly blockStarts: Int32Array;
  /**
   * The entries of A by new column: those of its diagonal block are inside[insideStarts[k] .. insideStarts[k + 1]), as places in `values`,
   * with their rows of A in `insideRows`; those of the blocks above likewise.
   */
  readonly insideStarts: Int32Array;
  readonly inside: Int32Array;
  readonly insideRows: Int32Array;
  readonly aboveStarts: Int32Array;
  readonly above: Int32Array;
  readonly aboveRows: Int32Array;
  /** A column that no choice of entries can give a pivot, or -1: the matrix is then singular whatever its values. */
  readonly hopelessColumn: number;
}

/** Works out the plan. */
export function generalPlan(pattern: Pattern): GeneralPlan {
  const { size } = pattern;
  const rowOf = maximumTransversal(pattern);
  const hopelessColumn = rowOf.indexOf(UNMATCHED);
  if (hopelessColumn >= 0) {
    const none = new Int32Array(0);
    const noBlocks = { columnOf: none, matchedRow: none, blockStarts: none };
    return { pattern, ...noBlocks, ...splitEntries(pattern, none, none, none), hopelessColumn };
  }
  const graph = columnGraph(pattern, rowOf);
  const { count, of } = strongComponents(graph);
  const byDegree = orderWithinBlocks(graph, of);
  const blockStarts = new Int32Array(count + 1);
  for (let j = 0; j < size; j++) blockStarts[of[j]! + 1]!++;
  for (let m = 0; m < count; m++) blockStarts[m + 1]! += blockStarts[m]!;
  const next = blockStarts.slice();
  const columnOf = new Int32Array(size);
  for (const j of byDegree) columnOf[next[of[j]!]!++] = j;
  const matchedRow = columnOf.map((j) => rowOf[j]!);
  return {
    pattern,
    columnOf,
    matchedRow,
    blockStarts,
    ...splitEntries(pattern, columnOf, graph.targets, of),
    hopelessColumn,
  };
}

/** Lists the entries of each new column, those of its own block and those above it apart. `targets`: the column matched to each entry's row. */
function splitEntries(pattern: Pattern, columnOf: Int32Array, targets: Int32Array, of: Int32Array) {
  const { columnStarts, rowIndices } = pattern;
  const insideStarts = new Int32Array(columnOf.length + 1);
  const aboveStarts = new Int32Array(columnOf.length + 1);
  const inside = new Int32Array(targets.length);
  const above = new Int32Array(targets.length);
  let i = 0;
  let a = 0;
  for (let k = 0; k < columnOf.length; k++) {
    const j = columnOf[k]!;
    for (let e = columnStarts[j]!; e < columnStarts[j + 1]!; e++) {
      if (of[targets[e]!] === of[j]) inside[i++] = e;
      else above[a++] = e;
    }
    insideStarts[k + 1] = i;
    aboveStarts[k + 1] = a;
  }
  const rowsOf = (list: Int32Array): Int32Array => list.map((e) => rowIndices[e]!);
  const [inner, upper] = [inside.slice(0, i), above.slice(0, a)];
  return {
    insideStarts,
    inside: inner,
    insideRows: rowsOf(inner),
    aboveStarts,
    above: upper,
    aboveRows: rowsOf(upper),
  };
}

/** Columns as nodes: column j leads to the columns whose matched rows it has entries in. */
function columnGraph({ size, columnStarts, rowIndices }: Pattern, rowOf: Int32Array): Digraph {
  const columnMatched = new Int32Array(size);
  for (let j = 0; j < size; j++) columnMatched[rowOf[j]!] = j;
  return { size, starts: columnStarts, targets: rowIndices.map((i) => columnMatched[i]!) };
}

/** All columns by minimum degree, on the undirected graph of the edges that stay within a component. */
function orderWithinBlocks({ size, starts, targets }: Digraph, of: Int32Array): Int32Array {
  const place = 0;
  const length = size;
  const held = 2 * size;
  const order = 3 * size;
  const seen = 4 * size;
  const lists = 5 * size;
  reserve(lists + 2 * targets.length);
  const { ints } = workspace;
  ints.fill(0, length, order);
  const forEachEdge = (visit: (j: number, c: number) => void): void => {
    for (let j = 0; j < size; j++) {
      for (let e = starts[j]!; e < starts[j + 1]!; e++) {
        const c = targets[e]!;
        if (c !== j && of[c] === of[j]) visit(j, c);
      }
    }
  };
  forEachEdge((j, c) => {
    ints[length + j]!++;
    ints[length + c]!++;
  });
  let end = lists;
  for (let j = 0; j < size; j++) {
    ints[place + j] = end;
    end += ints[length + j]!;
    ints[length + j] = 0;
  }
  forEachEdge((j, c) => {
    ints[ints[place + j]! + ints[length + j]!++] = c;
    ints[ints[place + c]! + ints[length + c]!++] = j;
  });
  ints.fill(-1, seen, lists);
  for (let j = 0; j < size; j++) dropRepeats(ints[place + j]!, length + j, seen, j);
  minimumDegree({ size, place, length, held, order, end });
  return workspace.ints.slice(order, order + size);
}

/** Shortens the list of node j, which begins at `from` and whose length stands at `length`, to one of each neighbour. */
function dropRepeats(from: number, length: number, seen: number, j: number): void {
  const { ints } = workspace;
  let to = from;
  for (let s = from; s < from + ints[length]!; s++) {
    const c = ints[s]!;
    if (ints[seen + c] === j) continue;
    ints[seen + c] = j;
    ints[to++] = c;
  }
  ints[length] = to - from;
}
