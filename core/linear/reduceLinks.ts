/** Takes nodes with two neighbours left out of their chains: the neighbours become joined, as resistors in series do. */
import type { Pattern } from './matrix.ts';
import type { Layout } from './symmetricPlan.ts';
import { workspace } from './workspace.ts';

/** A link without a second neighbour, or without an entry that its elimination changes. */
const NONE = -1;

/**
 * Eliminates nodes with two neighbours or one until none is left; returns how many. Writes (node, first neighbour, second neighbour, entry
 * changed) for each to the program. A missing second neighbour is node number `size`, which is nobody; the entry changed is then NONE.
 * An entry of the matrix keeps its own number; fill is numbered on from the entries of the pattern.
 */
export function reduceLinks(pattern: Pattern, at: Layout, leafCount: number): number {
  listNeighbours(pattern, at);
  return new LinkReduction(pattern, at, leafCount).run();
}

/** Neighbour lists of the nodes that are no leaves: list v is ends[start[v] .. + degree[v]), each with its twin at the other node. */
function listNeighbours(pattern: Pattern, at: Layout): void {
  const { ints } = workspace;
  const { size, columnStarts, rowIndices } = pattern;
  const { degree, start, cursor, end, twin, entry } = at;
  let used = 0;
  for (let v = 0; v < size; v++) {
    ints[start + v] = used;
    ints[cursor + v] = used;
    if (ints[degree + v]! > 0) used += ints[degree + v]!;
  }
  for (let j = 0; j < size; j++) {
    if (ints[degree + j]! <= 0) continue;
    for (let e = columnStarts[j]!; e < columnStarts[j + 1]! - 1; e++) {
      const i = rowIndices[e]!;
      if (ints[degree + i]! <= 0) continue;
      const a = ints[cursor + i]!++;
      const b = ints[cursor + j]!++;
      ints[end + a] = j;
      ints[end + b] = i;
      ints[twin + a] = b;
      ints[twin + b] = a;
      ints[entry + a] = e;
      ints[entry + b] = e;
    }
  }
}

class LinkReduction {
  private readonly at: Layout;
  private readonly size: number;
  /** Where the next quadruple goes. */
  private next: number;
  private count = 0;
  /** Where the multipliers of the next link stand among the numbers of the factorisation. */
  private multiplier: number;
  /** The number of the next fill entry. */
  private fill: number;
  /** Ring of nodes to look at, size + 1 long. */
  private head = 0;
  private tail = 0;

  constructor(pattern: Pattern, at: Layout, leafCount: number) {
    this.at = at;
    this.size = pattern.size;
    this.next = at.program + 2 * leafCount;
    this.multiplier = at.offDiagonal + leafCount;
    this.fill = pattern.rowIndices.length;
  }

  /**
   * Goes round in passes; in one pass no node is taken whose neighbour was, so that long chains are halved again and again
   * (cyclic reduction) and their divisions need not wait for each other.
   */
  run(): number {
    const { ints } = workspace;
    const { degree, waiting, pass } = this.at;
    ints.fill(0, waiting, waiting + this.size);
    ints.fill(0, pass, pass + this.size);
    for (let v = 0; v < this.size; v++) this.consider(v);
    for (let round = 1; this.head !== this.tail; round++) {
      const roundEnd = this.tail;
      while (this.head !== roundEnd) {
        const v = this.pop();
        if (ints[pass + v] === round) this.consider(v);
        else this.take(v, ints[degree + v]!, round);
      }
    }
    return this.count;
  }

  private consider(v: number): void {
    const { ints } = workspace;
    const { degree, held, waiting, queue } = this.at;
    const d = ints[degree + v]!;
    if (d <= 0 || d > 2 || ints[held + v] === 1 || ints[waiting + v] === 1) return;
    ints[waiting + v] = 1;
    ints[queue + this.tail] = v;
    this.tail = this.tail === this.size ? 0 : this.tail + 1;
  }

  private pop(): number {
    const { ints } = workspace;
    const v = ints[this.at.queue + this.head]!;
    this.head = this.head === this.size ? 0 : this.head + 1;
    ints[this.at.waiting + v] = 0;
    return v;
  }

  /** Eliminates v, which has d neighbours left. */
  private take(v: number, d: number, round: number): void {
    if (d <= 0) return;
    const { ints } = workspace;
    const { start, end, twin, entry, slot, degree } = this.at;
    const first = ints[start + v]!;
    const a = ints[end + first]!;
    ints[slot + ints[entry + first]!] = this.multiplier;
    ints[degree + v] = -1;
    if (d === 1) {
      this.drop(a, ints[twin + first]!);
      this.write(v, a, this.size, NONE);
      this.touch(a, round);
    } else {
      const second = first + 1;
      const b = ints[end + second]!;
      ints[slot + ints[entry + second]!] = this.multiplier + 1;
      this.write(v, a, b, this.join(a, ints[twin + first]!, b, ints[twin + second]!));
      this.touch(a, round);
      this.touch(b, round);
    }
    this.multiplier += 2;
  }

  private write(v: number, a: number, b: number, changed: number): void {
    const { ints } = workspace;
    ints[this.next] = v;
    ints[this.next + 1] = a;
    ints[this.next + 2] = b;
    ints[this.next + 3] = changed;
    this.next += 4;
    this.count++;
  }

  /** Joins a and b, whose ends s and t pointed at the node that has gone. Returns the number of their common entry. */
  private join(a: number, s: number, b: number, t: number): number {
    const { ints } = workspace;
    const { end, twin, entry } = this.at;
    const known = this.find(a, b);
    if (known !== NONE) {
      const e = ints[entry + known]!;
      this.drop(a, s);
      this.drop(b, t);
      return e;
    }
    const e = this.fill++;
    ints[end + s] = b;
    ints[end + t] = a;
    ints[twin + s] = t;
    ints[twin + t] = s;
    ints[entry + s] = e;
    ints[entry + t] = e;
    return e;
  }

  /** The end at which the shorter list of the two holds the other node, or NONE. */
  private find(a: number, b: number): number {
    const { ints } = workspace;
    const { degree, start, end } = this.at;
    const shorter = ints[degree + a]! <= ints[degree + b]! ? a : b;
    const wanted = shorter === a ? b : a;
    const from = ints[start + shorter]!;
    const to = from + ints[degree + shorter]!;
    for (let s = from; s < to; s++) if (ints[end + s] === wanted) return s;
    return NONE;
  }

  /** Takes end s out of the list of node a: the last one moves into its place. */
  private drop(a: number, s: number): void {
    const { ints } = workspace;
    const { degree, start, end, twin, entry } = this.at;
    const last = ints[start + a]! + --ints[degree + a]!;
    if (s === last) return;
    const other = ints[twin + last]!;
    ints[end + s] = ints[end + last]!;
    ints[twin + s] = other;
    ints[entry + s] = ints[entry + last]!;
    ints[twin + other] = s;
  }

  /** Node a has just had a neighbour eliminated into it. */
  private touch(a: number, round: number): void {
    const { ints } = workspace;
    ints[this.at.held + a] = 0;
    ints[this.at.pass + a] = round;
    this.consider(a);
  }
}
