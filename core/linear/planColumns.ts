/** Plans what leaves and links leave over: sparse columns in order of minimum degree, then a full block. */
import { minimumDegree, type QuotientGraph } from './minimumDegree.ts';
import type { Layout } from './symmetricPlan.ts';
import { reserve, workspace } from './workspace.ts';

/** What is left: `size` nodes of a pattern of `patternSize`; their entries stand in w from `place` on. */
export interface Rest {
  readonly patternSize: number;
  readonly size: number;
  readonly place: number;
}

export interface ColumnPlan {
  readonly columnCount: number;
  readonly fullSize: number;
  /** In the workspace: where this part of the program begins and ends. The nodes of the full block are its last `fullSize` integers. */
  readonly start: number;
  readonly end: number;
  /** In w: where the full block begins, and where w ends. */
  readonly fullPlace: number;
  readonly storage: number;
}

/** The nodes left, numbered 0 to size - 1: node[k] is the node of that number, `number[v]` the number of node v. */
interface RestGraph extends QuotientGraph {
  readonly node: number;
  readonly number: number;
}

/** Where things stand in the workspace; rows and columns go by pivot number, 0 to size - 1. */
interface Columns {
  readonly count: number;
  readonly size: number;
  /** position[a]: the pivot number of node number a. */
  readonly position: number;
  /** By sparse column: its first entry, and its record in the program. */
  readonly columnStart: number;
  readonly record: number;
  /** By row: its first entry in `columnOf`, the columns in which it has entries, rising; `rank`: the how-manieth of its column each is. */
  readonly rowStart: number;
  readonly columnOf: number;
  readonly rank: number;
  /** By entry of the sparse columns: its row, rising within the column. */
  readonly row: number;
  /** By row, for the column in hand: place in w. */
  readonly where: number;
  readonly program: number;
  readonly end: number;
  /** In w. */
  readonly place: number;
  readonly fullPlace: number;
}

/** Writes the program of the sparse columns and the full block to the end of the workspace, and the places of their entries to `slot`. */
export function planColumns(at: Layout, rest: Rest): ColumnPlan {
  const graph = restGraph(at, rest);
  const { count, end } = minimumDegree(graph);
  const columns = layOutColumns(graph, rest.place, count, end);
  sortRows(graph, columns);
  writeRecords(graph, columns);
  placeEntries(at, graph, columns);
  const fullSize = rest.size - count;
  return {
    columnCount: count,
    fullSize,
    start: columns.program,
    end: columns.end,
    fullPlace: columns.fullPlace,
    storage: columns.fullPlace + (fullSize * (fullSize - 1)) / 2,
  };
}

function restGraph(at: Layout, { patternSize, size }: Rest): RestGraph {
  const base = at.free;
  const lists = base + 5 * size;
  reserve(lists + at.twin - at.end);
  const { ints } = workspace;
  const node = base;
  const place = base + size;
  const length = base + 2 * size;
  const held = base + 3 * size;
  const number = at.cursor;
  let count = 0;
  for (let v = 0; v < patternSize; v++) {
    if (ints[at.degree + v]! < 0) continue;
    ints[number + v] = count;
    ints[node + count] = v;
    ints[held + count] = ints[at.held + v]!;
    count++;
  }
  let used = lists;
  for (let a = 0; a < size; a++) {
    const v = ints[node + a]!;
    const first = at.end + ints[at.start + v]!;
    const last = first + ints[at.degree + v]!;
    ints[place + a] = used;
    ints[length + a] = last - first;
    for (let s = first; s < last; s++) ints[used++] = ints[number + ints[s]!]!;
  }
  return { size, node, number, place, length, held, order: base + 4 * size, end: used };
}

function layOutColumns({ size, place, length, order }: RestGraph, w: number, count: number, base: number): Columns {
  const position = base;
  const columnStart = base + size;
  const record = columnStart + count + 1;
  const rowStart = record + count + 1;
  const columnOf = rowStart + size + 2;
  reserve(columnOf);
  const { ints } = workspace;
  ints.fill(0, rowStart, columnOf);
  for (let k = 0; k < size; k++) ints[position + ints[order + k]!] = k;
  let entries = 0;
  let integers = 0;
  for (let k = 0; k < count; k++) {
    const p = ints[order + k]!;
    const d = ints[length + p]!;
    const list = ints[place + p]!;
    ints[columnStart + k] = entries;
    ints[record + k] = integers;
    entries += d;
    integers += 3 + d + (d * (d - 1)) / 2;
    // Counted two rows on, so that filling moves each count to its row's end and leaves its start one row on.
    for (let s = list; s < list + d; s++) ints[rowStart + 2 + ints[position + ints[s]!]!]!++;
  }
  ints[columnStart + count] = entries;
  for (let r = 0; r < size; r++) ints[rowStart + r + 1]! += ints[rowStart + r]!;
  const rank = columnOf + entries;
  const row = rank + entries;
  const where = row + entries;
  const program = where + size;
  const end = program + integers + size - count;
  reserve(end);
  const fullPlace = w + entries;
  return {
    count,
    size,
    position,
    columnStart,
    record,
    rowStart,
    columnOf,
    rank,
    row,
    where,
    program,
    end,
    place: w,
    fullPlace,
  };
}

/** Sorts the rows of each column by pivot number: columns to rows and back again. */
function sortRows(
  graph: RestGraph,
  { count, size, position, columnStart, rowStart, columnOf, rank, row, where }: Columns,
): void {
  const { ints } = workspace;
  for (let k = 0; k < count; k++) {
    const p = ints[graph.order + k]!;
    const list = ints[graph.place + p]!;
    const end = list + ints[graph.length + p]!;
    for (let s = list; s < end; s++) {
      const r = ints[position + ints[s]!]!;
      ints[columnOf + ints[rowStart + r + 1]!++] = k;
    }
    ints[where + k] = ints[columnStart + k]!; // borrowed: the next free entry of column k
  }
  for (let r = 0; r < size; r++) {
    for (let s = ints[rowStart + r]!; s < ints[rowStart + r + 1]!; s++) {
      const k = ints[columnOf + s]!;
      const e = ints[where + k]!++;
      ints[row + e] = r;
      ints[rank + s] = e - ints[columnStart + k]!;
    }
  }
}

/** Writes the records of the sparse columns, all but the places that elimination changes, and the nodes of the full block. */
function writeRecords(
  { node, order }: RestGraph,
  { count, size, columnStart, record, row, program, end }: Columns,
): void {
  const { ints } = workspace;
  for (let k = 0; k < count; k++) {
    const from = ints[columnStart + k]!;
    const d = ints[columnStart + k + 1]! - from;
    const at = program + ints[record + k]!;
    ints[at] = ints[node + ints[order + k]!]!;
    ints[at + 1] = d;
    for (let i = 0; i < d; i++) ints[at + 2 + i] = ints[node + ints[order + ints[row + from + i]!]!]!;
    ints[at + 2 + d + (d * (d - 1)) / 2] = d;
  }
  let next = end - (size - count);
  for (let k = count; k < size; k++) ints[next++] = ints[node + ints[order + k]!]!;
}

/** For each column, places in w: of the entries the matrix itself has there, and of those that the elimination of earlier columns changes. */
function placeEntries(at: Layout, graph: RestGraph, columns: Columns): void {
  const { count, size, place, fullPlace, columnStart, row, where } = columns;
  const { ints } = workspace;
  for (let r = 0; r < size; r++) {
    if (r < count) {
      for (let e = ints[columnStart + r]!; e < ints[columnStart + r + 1]!; e++)
        ints[where + ints[row + e]!] = place + e;
    } else {
      // Row i of the full block's upper triangle follows i rows of lengths m - 1, m - 2 …, for m nodes in the block.
      const i = r - count;
      const m = size - count;
      const rowPlace = fullPlace + i * (m - 1) - (i * (i - 1)) / 2;
      for (let q = r + 1; q < size; q++) ints[where + q] = rowPlace + q - r - 1;
    }
    placeOwn(at, graph, columns, r);
    placeChanged(columns, r);
  }
}

/** The entries of the matrix (or fill of the links) between pivot r and later ones. */
function placeOwn(at: Layout, { node, number, order }: RestGraph, { position, where }: Columns, r: number): void {
  const { ints } = workspace;
  const v = ints[node + ints[order + r]!]!;
  const first = ints[at.start + v]!;
  const last = first + ints[at.degree + v]!;
  for (let s = first; s < last; s++) {
    const q = ints[position + ints[number + ints[at.end + s]!]!]!;
    if (q > r) ints[at.slot + ints[at.entry + s]!] = ints[where + q]!;
  }
}

/** The entries of column r that earlier columns change: those with an entry in row r change the rows below it. */
function placeChanged(
  { columnStart, record, rowStart, columnOf, rank, row, where, program }: Columns,
  r: number,
): void {
  const { ints } = workspace;
  for (let s = ints[rowStart + r]!; s < ints[rowStart + r + 1]!; s++) {
    const k = ints[columnOf + s]!;
    const i = ints[rank + s]!;
    const from = ints[columnStart + k]!;
    const d = ints[columnStart + k + 1]! - from;
    let t = program + ints[record + k]! + 2 + d + i * d - (i * (i + 1)) / 2;
    for (let e = from + i + 1; e < from + d; e++) ints[t++] = ints[where + ints[row + e]!]!;
  }
}
