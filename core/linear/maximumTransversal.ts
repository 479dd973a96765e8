/** Duff's maximum transversal: as many entries as possible, no two in a row or a column. */
import type { Pattern } from './matrix.ts';
import { takeInts } from './slab.ts';

/** A row or column without a partner. */
export const UNMATCHED = -1;

/**
 * Returns the row matched to each column (at least `size` long), UNMATCHED where there is none: then the matrix is singular whatever its values. Diagonal entries
 * are taken where they are not empty, and given up only for a larger matching. Empty diagonals do not count as entries.
 */
export function maximumTransversal(pattern: Pattern): Int32Array {
  const { size, emptyDiagonal } = pattern;
  const rowOf = takeInts(size);
  let unmatched = 0;
  for (let j = 0; j < size; j++) {
    rowOf[j] = emptyDiagonal[j] === 1 ? UNMATCHED : j;
    unmatched += emptyDiagonal[j]!;
  }
  if (unmatched === 0) return rowOf;
  const search = new Search(pattern, rowOf, rowOf.slice());
  for (let j = 0; j < size; j++) if (rowOf[j] === UNMATCHED) search.augment(j);
  return rowOf;
}

/** Depth-first search for a path of entries, alternately outside and inside the matching, that ends at a free row. */
class Search {
  private readonly pattern: Pattern;
  private readonly rowOf: Int32Array;
  private readonly columnOf: Int32Array;
  /** seen[c] = j: column c has been visited in the search from column j. */
  private readonly seen: Int32Array;
  /** By column: entries before this one lead to rows that were never free. */
  private readonly cheap: Int32Array;
  /** The path: its columns, the entry by which each is left, and where to resume. */
  private readonly path: Int32Array;
  private readonly exit: Int32Array;
  private readonly resume: Int32Array;

  constructor(pattern: Pattern, rowOf: Int32Array, columnOf: Int32Array) {
    const { size, columnStarts } = pattern;
    this.pattern = pattern;
    this.rowOf = rowOf;
    this.columnOf = columnOf;
    this.seen = new Int32Array(size).fill(-1);
    this.cheap = columnStarts.slice(0, size);
    this.path = new Int32Array(size);
    this.exit = new Int32Array(size);
    this.resume = new Int32Array(size);
  }

  augment(from: number): void {
    const { columnStarts, rowIndices } = this.pattern;
    const { path, exit, resume, seen, columnOf } = this;
    let depth = 0;
    path[0] = from;
    seen[from] = from;
    resume[0] = columnStarts[from]!;
    while (depth >= 0) {
      const j = path[depth]!;
      const free = this.freeRow(j);
      if (free >= 0) {
        exit[depth] = free;
        this.apply(depth);
        return;
      }
      let e = resume[depth]!;
      const end = columnStarts[j + 1]!;
      while (e < end && (this.isEmpty(e, j) || seen[columnOf[rowIndices[e]!]!] === from)) e++;
      if (e === end) {
        depth--;
        continue;
      }
      exit[depth] = e;
      resume[depth] = e + 1;
      const c = columnOf[rowIndices[e]!]!;
      seen[c] = from;
      path[++depth] = c;
      resume[depth] = columnStarts[c]!;
    }
  }

  private isEmpty(e: number, j: number): boolean {
    const { rowIndices, emptyDiagonal } = this.pattern;
    return rowIndices[e] === j && emptyDiagonal[j] === 1;
  }

  /** An entry of column j whose row is free, or -1. A row once matched stays matched, so each entry is tried once only. */
  private freeRow(j: number): number {
    const { columnStarts, rowIndices } = this.pattern;
    const end = columnStarts[j + 1]!;
    while (this.cheap[j]! < end) {
      const e = this.cheap[j]!++;
      if (this.columnOf[rowIndices[e]!] === UNMATCHED && !this.isEmpty(e, j)) return e;
    }
    return -1;
  }

  /** Matches each column of the path to the row by which it is left. */
  private apply(depth: number): void {
    for (let d = depth; d >= 0; d--) {
      const i = this.pattern.rowIndices[this.exit[d]!]!;
      this.rowOf[this.path[d]!] = i;
      this.columnOf[i] = this.path[d]!;
    }
  }
}
