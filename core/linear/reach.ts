/** The rows that a column reaches through L: depth-first search, after Gilbert and Peierls. */
import { giveBackInts, takeInts } from './slab.ts';

export class Reach {
  /** The rows reached, in topological order, end at place `size` of this list. */
  readonly reached: Int32Array;
  /** seen[i] = k: row i is reached by column k. */
  private readonly seen: Int32Array;
  private readonly stack: Int32Array;
  private readonly resume: Int32Array;

  private readonly size: number;

  constructor(size: number) {
    this.size = size;
    this.reached = takeInts(size);
    this.seen = takeInts(size);
    this.stack = takeInts(size);
    this.resume = takeInts(size);
  }

  /** Gives its memory back. */
  release(): void {
    for (const array of [this.reached, this.seen, this.stack, this.resume]) giveBackInts(array);
  }

  /** Before a new factorisation. */
  forget(): void {
    this.seen.fill(-1);
  }

  /**
   * Finds what rows[from .. to) reach for column k: a row that is pivot c leads to the rows of column c of L. Returns where the rows reached
   * begin in `reached`.
   */
  find(
    k: number,
    rows: Int32Array,
    from: number,
    to: number,
    pivotOf: Int32Array,
    lStarts: Int32Array,
    lRows: Int32Array,
  ): number {
    const { reached, seen, stack, resume } = this;
    let top = this.size;
    for (let s = from; s < to; s++) {
      if (seen[rows[s]!] === k) continue;
      let depth = 0;
      stack[0] = rows[s]!;
      while (depth >= 0) {
        const i = stack[depth]!;
        const c = pivotOf[i]!;
        if (seen[i] !== k) {
          seen[i] = k;
          resume[depth] = c < 0 ? 0 : lStarts[c]!;
        }
        const end = c < 0 ? 0 : lStarts[c + 1]!;
        let p = resume[depth]!;
        while (p < end && seen[lRows[p]!] === k) p++;
        if (p < end) {
          resume[depth] = p + 1;
          stack[++depth] = lRows[p]!;
        } else {
          depth--;
          reached[--top] = i;
        }
      }
    }
    return top;
  }
}
