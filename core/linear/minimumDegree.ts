/**
 * Minimum-degree ordering on the quotient graph, with the approximate external degree and the element absorption of
 * Amestoy, Davis and Duff. It also yields the pattern of each factor column, and stops early: once what is left is nearly
 * complete, it is left to be factored as a full block.
 */
import { reserve, workspace } from './workspace.ts';

/**
 * Where things stand in the workspace, for a graph of `size` nodes without loops or double edges.
 * The caller fills `place`, `length`, `held` and the neighbour lists, all of which lie below `end`.
 */
export interface QuotientGraph {
  readonly size: number;
  /** place[v]: where the list of node v begins (once it is eliminated: its column in the factor). */
  readonly place: number;
  /** length[v]: how long that list is. */
  readonly length: number;
  /** held[v] = 1 keeps v back until a neighbour has been eliminated, because its diagonal is empty until then. */
  readonly held: number;
  /** order[k]: the node eliminated k-th. */
  readonly order: number;
  /** The first free place of the workspace. */
  readonly end: number;
}

/** A rest whose lowest degree is at least this share of the highest possible is factored as a full block. Between 0.3 and 1 it hardly matters. */
const FULL_ENOUGH = 0.6;

/** What a node is: still to be eliminated; eliminated, its list a column; eliminated, its column covered by that of a later one. */
const VARIABLE = 0;
const ELEMENT = 1;
const ABSORBED = 2;

/** Ends a list. */
const NONE = -1;

/** How the ordering ended. */
export interface EliminationEnd {
  /** Nodes eliminated before the full block; those of the block end the order. */
  readonly count: number;
  /** The first free place of the workspace. */
  readonly end: number;
}

/** Orders the graph. Equal degrees go to the node that reached its degree last, so the order depends on the graph alone. */
export function minimumDegree(graph: QuotientGraph): EliminationEnd {
  const elimination = new Elimination(graph);
  let count = 0;
  while (count < graph.size && !elimination.restIsFull(count)) elimination.eliminate(count++);
  elimination.appendRest(count);
  return { count, end: elimination.used };
}

class Elimination {
  private readonly graph: QuotientGraph;
  // Places in the workspace of arrays by node:
  /** Elements at the head of a variable's list; variables follow. */
  private readonly elements: number;
  private readonly kind: number;
  /** Approximate external degree; NONE for a held variable, which is in no list. */
  private readonly degree: number;
  /** Doubly linked lists of the variables of equal degree: first[degree], next[v], previous[v]. */
  private readonly first: number;
  private readonly next: number;
  private readonly previous: number;
  /** inColumn[v] = k: v is in the column of the k-th pivot. */
  private readonly inColumn: number;
  /** outside[e], if touched[e] = k: how many variables of element e are not in that column. */
  private readonly outside: number;
  private readonly touched: number;
  /** The first free place of the workspace. */
  used: number;
  /** No variable has a lower degree. */
  private lowest = 0;
  /** Number of held variables. */
  private waiting = 0;

  constructor(graph: QuotientGraph) {
    const { size } = graph;
    this.graph = graph;
    const base = graph.end;
    this.elements = base;
    this.kind = base + size;
    this.degree = base + 2 * size;
    this.next = base + 3 * size;
    this.previous = base + 4 * size;
    this.outside = base + 5 * size;
    this.inColumn = base + 6 * size;
    this.touched = base + 7 * size;
    this.first = base + 8 * size;
    this.used = base + 9 * size;
    reserve(this.used + size);
    const { ints } = workspace;
    ints.fill(0, base, base + 2 * size);
    ints.fill(NONE, this.inColumn, this.used);
    for (let v = size - 1; v >= 0; v--) {
      if (ints[graph.held + v] === 1) {
        ints[this.degree + v] = NONE;
        this.waiting++;
      } else this.insert(v, ints[graph.length + v]!);
    }
  }

  private insert(v: number, d: number): void {
    const { ints } = workspace;
    const f = ints[this.first + d]!;
    ints[this.next + v] = f;
    ints[this.previous + v] = NONE;
    if (f !== NONE) ints[this.previous + f] = v;
    ints[this.first + d] = v;
    ints[this.degree + v] = d;
    if (d < this.lowest) this.lowest = d;
  }

  private remove(v: number): void {
    const { ints } = workspace;
    const p = ints[this.previous + v]!;
    const q = ints[this.next + v]!;
    if (p === NONE) ints[this.first + ints[this.degree + v]!] = q;
    else ints[this.next + p] = q;
    if (q !== NONE) ints[this.previous + q] = p;
  }

  /** Whether the nodes left after k pivots are as good as all joined to each other. Finds the lowest degree on the way. */
  restIsFull(k: number): boolean {
    const { ints } = workspace;
    const { size } = this.graph;
    if (this.waiting === size - k) this.letThrough();
    while (ints[this.first + this.lowest] === NONE) this.lowest++;
    return this.waiting === 0 && this.lowest >= FULL_ENOUGH * (size - k - 1) && this.lowest > 0;
  }

  /** Only held nodes are left, and no neighbour will ever fill their diagonals: they go in as they are, for the factorisation to report. */
  private letThrough(): void {
    const { ints } = workspace;
    const { size, length } = this.graph;
    this.lowest = 0;
    this.waiting = 0;
    for (let v = size - 1; v >= 0; v--) {
      if (ints[this.kind + v] === VARIABLE) this.insert(v, Math.min(ints[length + v]!, size - 1));
    }
  }

  /** Takes a node of lowest degree as the k-th pivot. */
  eliminate(k: number): void {
    const p = workspace.ints[this.first + this.lowest]!;
    this.remove(p);
    reserve(this.used + this.graph.size);
    const columnStart = this.used;
    this.gatherColumn(p, k);
    this.measureElements(columnStart, k);
    this.updateDegrees(p, columnStart, k);
  }

  /** The column of p: its variables, and those of every element it belongs to, which p absorbs. */
  private gatherColumn(p: number, k: number): void {
    const { ints } = workspace;
    const { place, length, order } = this.graph;
    const columnStart = this.used;
    ints[order + k] = p;
    ints[this.inColumn + p] = k;
    const start = ints[place + p]!;
    const elementsEnd = start + ints[this.elements + p]!;
    for (let s = start; s < elementsEnd; s++) {
      const e = ints[s]!;
      if (ints[this.kind + e] !== ELEMENT) continue;
      ints[this.kind + e] = ABSORBED;
      const from = ints[place + e]!;
      this.gather(from, from + ints[length + e]!, k);
    }
    this.gather(elementsEnd, start + ints[length + p]!, k);
    ints[this.kind + p] = ELEMENT;
    ints[place + p] = columnStart;
    ints[length + p] = this.used - columnStart;
  }

  /** Adds the variables of a list to the column, once each. */
  private gather(from: number, to: number, k: number): void {
    const { ints } = workspace;
    for (let t = from; t < to; t++) {
      const v = ints[t]!;
      if (ints[this.kind + v] !== VARIABLE || ints[this.inColumn + v] === k) continue;
      ints[this.inColumn + v] = k;
      ints[this.used++] = v;
    }
  }

  /** How much of each neighbouring element lies outside the column. */
  private measureElements(columnStart: number, k: number): void {
    const { ints } = workspace;
    const { place, length } = this.graph;
    const columnEnd = this.used;
    for (let c = columnStart; c < columnEnd; c++) {
      const v = ints[c]!;
      const start = ints[place + v]!;
      const end = start + ints[this.elements + v]!;
      for (let s = start; s < end; s++) {
        const e = ints[s]!;
        if (ints[this.kind + e] !== ELEMENT) continue;
        if (ints[this.touched + e] !== k) {
          ints[this.touched + e] = k;
          ints[this.outside + e] = ints[length + e]!;
        }
        ints[this.outside + e]!--;
      }
    }
  }

  /** Gives each variable of the column p as an element in place of all that p covers, and its new degree. */
  private updateDegrees(p: number, columnStart: number, k: number): void {
    const { ints } = workspace;
    const inside = this.used - columnStart - 1;
    const most = this.graph.size - k - 2;
    for (let c = columnStart; c < this.used; c++) {
      const v = ints[c]!;
      const before = ints[this.degree + v]!;
      if (before === NONE) this.waiting--;
      else this.remove(v);
      const beyond = this.prune(v, p, k);
      this.insert(v, Math.min(most, inside + (before === NONE ? beyond : Math.min(beyond, before))));
    }
  }

  /** Drops from the list of v what the column of p covers, and adds p. Returns how many neighbours v may have outside the column. */
  private prune(v: number, p: number, k: number): number {
    const { ints } = workspace;
    const start = ints[this.graph.place + v]!;
    const elementsEnd = start + ints[this.elements + v]!;
    const end = start + ints[this.graph.length + v]!;
    let beyond = 0;
    let to = start;
    for (let s = start; s < elementsEnd; s++) {
      const e = ints[s]!;
      if (ints[this.kind + e] !== ELEMENT) continue;
      if (ints[this.outside + e] === 0) {
        ints[this.kind + e] = ABSORBED;
        continue;
      }
      beyond += ints[this.outside + e]!;
      ints[to++] = e;
    }
    const kept = to;
    for (let s = elementsEnd; s < end; s++) {
      const u = ints[s]!;
      if (ints[this.kind + u] !== VARIABLE || ints[this.inColumn + u] === k) continue;
      beyond++;
      ints[to++] = u;
    }
    // The first variable makes room for p among the elements. There is room: p itself, or an element that p absorbed, has gone.
    ints[to] = ints[kept]!;
    ints[kept] = p;
    ints[this.elements + v] = kept + 1 - start;
    ints[this.graph.length + v] = to + 1 - start;
    return beyond;
  }

  /** The nodes of the full block end the order, as they are numbered. */
  appendRest(k: number): void {
    const { ints } = workspace;
    const { size, order } = this.graph;
    let next = order + k;
    for (let v = 0; v < size; v++) if (ints[this.kind + v] === VARIABLE) ints[next++] = v;
  }
}
