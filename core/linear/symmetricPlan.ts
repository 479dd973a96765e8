/** The plan of an L D Lᵀ factorisation: which entry meets which, worked out once from the pattern alone. */
import type { Pattern } from './matrix.ts';
import { minimumDegree } from './minimumDegree.ts';
import { stripLeaves } from './stripLeaves.ts';

/**
 * Nodes are renumbered in pivot order: leaves 0 .. leafCount - 1, sparse pivots .. fullStart - 1, then the full block to size - 1.
 * All numbers of a factorisation stand in one array `w`:
 * the diagonal d (size); one multiplier a leaf (leafCount); the sparse columns of L; the upper triangle of the full block, row by row.
 */
export interface SymmetricPlan {
  readonly pattern: Pattern;
  readonly leafCount: number;
  readonly fullStart: number;
  /** Length size: original[k] is the node that became pivot k. */
  readonly original: Int32Array;
  /** Length of values: where each entry of the matrix goes in w. */
  readonly destination: Int32Array;
  /** Length of w. */
  readonly storage: number;
  /** Length leafCount: the pivot that each leaf is eliminated into. */
  readonly parent: Int32Array;
  /** Length fullStart - leafCount + 1: sparse column c (pivot leafCount + c) has entries columnStarts[c] .. columnStarts[c + 1] - 1. */
  readonly columnStarts: Int32Array;
  /** By entry of the sparse columns: its row, as a pivot number, rising. Entry p stands in w at size + leafCount + p. */
  readonly rows: Int32Array;
  /**
   * The places in w that elimination changes, off the diagonal: for each sparse column with rows r_0 < r_1 < …, the entries (r_0, r_1),
   * (r_0, r_2) …, then (r_1, r_2) …
   */
  readonly targets: Int32Array;
  /** Where the full block begins in w. */
  readonly fullPlace: number;
}

/** Works out the plan. */
export function symmetricPlan(pattern: Pattern): SymmetricPlan {
  const { size, columnStarts: aStarts, rowIndices } = pattern;
  const stripped = stripLeaves(pattern);
  const leafCount = stripped.count;
  const original = stripped.leaves;
  const pivot = new Int32Array(size);
  for (let k = 0; k < leafCount; k++) pivot[original[k]!] = k;

  // The core: nodes that are no leaves, numbered 0 .. coreSize - 1 as they come.
  const coreSize = size - leafCount;
  const coreNode = new Int32Array(coreSize);
  const coreNumber = new Int32Array(size).fill(-1);
  const starts = new Int32Array(coreSize + 1);
  let c = 0;
  for (let v = 0; v < size; v++) {
    if (stripped.degree[v] === -1) continue;
    coreNode[c] = v;
    coreNumber[v] = c;
    starts[c + 1] = starts[c]! + stripped.degree[v]!;
    c++;
  }
  const neighbours = new Int32Array(starts[coreSize]!);
  const next = starts.slice();
  const held = new Uint8Array(coreSize);
  const fed = new Uint8Array(size);
  for (let k = 0; k < leafCount; k++) fed[stripped.parent[original[k]!]!] = 1;
  for (let a = 0; a < coreSize; a++) {
    const v = coreNode[a]!;
    held[a] = pattern.emptyDiagonal[v] === 1 && fed[v] === 0 ? 1 : 0;
    for (let e = aStarts[v]!; e < aStarts[v + 1]! - 1; e++) {
      const b = coreNumber[rowIndices[e]!]!;
      if (b === -1) continue;
      neighbours[next[a]!++] = b;
      neighbours[next[b]!++] = a;
    }
  }
  const elimination = minimumDegree({ size: coreSize, starts, neighbours }, held);
  for (let k = 0; k < coreSize; k++) {
    const v = coreNode[elimination.order[k]!]!;
    original[leafCount + k] = v;
    pivot[v] = leafCount + k;
  }
  const parent = new Int32Array(leafCount);
  for (let k = 0; k < leafCount; k++) parent[k] = pivot[stripped.parent[original[k]!]!]!;

  // Sparse columns of L with rows rising: two transpositions sort them.
  const { sparseCount, lists, listStarts, listLengths, order } = elimination;
  const columnStarts = new Int32Array(sparseCount + 1);
  const rowStarts = new Int32Array(coreSize + 1);
  for (let k = 0; k < sparseCount; k++) {
    const p = order[k]!;
    columnStarts[k + 1] = columnStarts[k]! + listLengths[p]!;
    for (let s = listStarts[p]!; s < listStarts[p]! + listLengths[p]!; s++) {
      rowStarts[pivot[coreNode[lists[s]!]!]! - leafCount + 1]!++;
    }
  }
  for (let r = 0; r < coreSize; r++) rowStarts[r + 1]! += rowStarts[r]!;
  const entries = columnStarts[sparseCount]!;
  const columnOf = new Int32Array(entries); // by row: the columns in which the row has an entry, rising
  const rowNext = rowStarts.slice();
  for (let k = 0; k < sparseCount; k++) {
    const p = order[k]!;
    for (let s = listStarts[p]!; s < listStarts[p]! + listLengths[p]!; s++) {
      columnOf[rowNext[pivot[coreNode[lists[s]!]!]! - leafCount]!++] = k;
    }
  }
  const rows = new Int32Array(entries);
  const columnNext = columnStarts.slice();
  const entryOf = new Int32Array(entries); // parallel to columnOf: the entry itself
  for (let r = 0; r < coreSize; r++) {
    for (let s = rowStarts[r]!; s < rowStarts[r + 1]!; s++) {
      const p = columnNext[columnOf[s]!]!++;
      rows[p] = leafCount + r;
      entryOf[s] = p;
    }
  }

  // Where the entry (r, row) stands in w, for the column r in hand.
  const base = size + leafCount;
  const fullStart = leafCount + sparseCount;
  const fullSize = size - fullStart;
  const fullPlace = base + entries;
  const fullEntry = (r: number, s: number): number => {
    const i = r - fullStart;
    // Row i of the upper triangle begins after the i rows before it, of lengths fullSize - 1, fullSize - 2, …
    return fullPlace + i * (fullSize - 1) - (i * (i - 1)) / 2 + (s - r - 1);
  };
  const targetStarts = new Int32Array(sparseCount + 1);
  for (let k = 0; k < sparseCount; k++) {
    const d = columnStarts[k + 1]! - columnStarts[k]!;
    targetStarts[k + 1] = targetStarts[k]! + (d * (d - 1)) / 2;
  }
  const targets = new Int32Array(targetStarts[sparseCount]!);
  const where = new Int32Array(size);
  for (let r = 0; r < coreSize; r++) {
    const full = r >= sparseCount;
    if (!full) for (let p = columnStarts[r]!; p < columnStarts[r + 1]!; p++) where[rows[p]!] = base + p;
    for (let s = rowStarts[r]!; s < rowStarts[r + 1]!; s++) {
      const k = columnOf[s]!;
      const end = columnStarts[k + 1]!;
      const p = entryOf[s]!;
      const i = p - columnStarts[k]!;
      const d = end - columnStarts[k]!;
      let t = targetStarts[k]! + i * d - (i * (i + 1)) / 2;
      for (let q = p + 1; q < end; q++) targets[t++] = full ? fullEntry(leafCount + r, rows[q]!) : where[rows[q]!]!;
    }
  }

  // Where each entry of the matrix goes.
  const destination = new Int32Array(rowIndices.length);
  for (let j = 0; j < size; j++) {
    const end = aStarts[j + 1]! - 1;
    destination[end] = pivot[j]!;
    for (let e = aStarts[j]!; e < end; e++) {
      const a = pivot[j]!;
      const b = pivot[rowIndices[e]!]!;
      const low = a < b ? a : b;
      const high = a < b ? b : a;
      if (low < leafCount) destination[e] = size + low;
      else if (low >= fullStart) destination[e] = fullEntry(low, high);
      else
        destination[e] = base + search(rows, columnStarts[low - leafCount]!, columnStarts[low - leafCount + 1]!, high);
    }
  }
  const storage = fullPlace + (fullSize * (fullSize - 1)) / 2;
  return {
    pattern,
    leafCount,
    fullStart,
    original,
    destination,
    storage,
    parent,
    columnStarts,
    rows,
    targets,
    fullPlace,
  };
}

/** The place of `wanted` in the rising list rows[from .. to). */
function search(rows: Int32Array, from: number, to: number, wanted: number): number {
  let low = from;
  let high = to - 1;
  while (low < high) {
    const middle = (low + high) >> 1;
    if (rows[middle]! < wanted) low = middle + 1;
    else high = middle;
  }
  return low;
}
