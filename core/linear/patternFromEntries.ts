/** From a list of (row, column) pairs to compressed columns. */
import { Defect } from '../job/issue.ts';
import type { Pattern } from './matrix.ts';

/** A pattern, and where each triplet's value belongs. */
export interface Assembly {
  readonly pattern: Pattern;
  /** Length = number of triplets: triplet k is added as values[slots[k]] += x. Duplicates share a slot. */
  readonly slots: Int32Array;
}

/**
 * The pattern of an n by n matrix given as triplets, in any order and with repetitions. The diagonal is always there.
 * With `symmetric`, (i, j) and (j, i) are the same entry, kept in the upper triangle: give each pair once, not twice.
 */
export function patternFromEntries(
  size: number,
  rows: ArrayLike<number>,
  columns: ArrayLike<number>,
  { symmetric }: { readonly symmetric: boolean },
): Assembly {
  const count = rows.length;
  if (columns.length !== count) throw new Defect('as many rows as columns in a list of entries');
  // Entries 0 to count - 1 are the triplets, count + i the diagonal of column i.
  const total = count + size;
  const row = new Int32Array(total);
  const column = new Int32Array(total);
  const emptyDiagonal = new Uint8Array(size).fill(1);
  for (let k = 0; k < count; k++) {
    const i = rows[k]!;
    const j = columns[k]!;
    if (!(i >= 0 && i < size && j >= 0 && j < size))
      throw new Defect(`entry (${i}, ${j}) inside a matrix of size ${size}`);
    const swap = symmetric && i > j;
    row[k] = swap ? j : i;
    column[k] = swap ? i : j;
    if (i === j) emptyDiagonal[i] = 0;
  }
  for (let i = 0; i < size; i++) {
    row[count + i] = i;
    column[count + i] = i;
  }
  const byRow = countingSort(size, row, null);
  const sorted = countingSort(size, column, byRow);
  return compress(size, symmetric, emptyDiagonal, row, column, sorted, count);
}

/** The entries, listed in rising order of their key (0 to size - 1); entries of equal key keep the order of `before`. */
function countingSort(size: number, key: Int32Array, before: Int32Array | null): Int32Array {
  const next = new Int32Array(size + 1);
  for (let e = 0; e < key.length; e++) next[key[e]! + 1]!++;
  for (let j = 0; j < size; j++) next[j + 1]! += next[j]!;
  const sorted = new Int32Array(key.length);
  for (let k = 0; k < key.length; k++) {
    const e = before === null ? k : before[k]!;
    sorted[next[key[e]!]!++] = e;
  }
  return sorted;
}

/** Merges equal neighbours of the sorted list into one slot each. */
function compress(
  size: number,
  symmetric: boolean,
  emptyDiagonal: Uint8Array,
  row: Int32Array,
  column: Int32Array,
  sorted: Int32Array,
  count: number,
): Assembly {
  const slots = new Int32Array(count);
  const columnStarts = new Int32Array(size + 1);
  const rowIndices = new Int32Array(sorted.length);
  let used = 0;
  let lastRow = -1;
  let lastColumn = -1;
  for (let k = 0; k < sorted.length; k++) {
    const e = sorted[k]!;
    if (row[e] !== lastRow || column[e] !== lastColumn) {
      lastRow = row[e]!;
      lastColumn = column[e]!;
      rowIndices[used++] = lastRow;
      columnStarts[lastColumn + 1] = used;
    }
    if (e < count) slots[e] = used - 1;
  }
  return { pattern: { size, symmetric, columnStarts, rowIndices: rowIndices.slice(0, used), emptyDiagonal }, slots };
}
