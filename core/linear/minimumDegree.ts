/**
 * Minimum-degree ordering on the quotient graph, with the approximate external degree and the element absorption of
 * Amestoy, Davis and Duff. It also yields the pattern of each factor column, and stops early: once what is left is nearly
 * complete, it is left to be factored as a full matrix.
 */

/** An undirected graph without loops or double edges: node v's neighbours are neighbours[starts[v] .. starts[v + 1]). */
export interface Graph {
  readonly size: number;
  readonly starts: Int32Array;
  readonly neighbours: Int32Array;
}

/** The order in which to eliminate the nodes. */
export interface Elimination {
  /** Length size: order[k] is the node eliminated k-th. */
  readonly order: Int32Array;
  /** The first `sparseCount` pivots have sparse columns; the rest form one full block. */
  readonly sparseCount: number;
  /** Length size, for the sparse pivots only: the column of node p is lists[listStarts[p] .. + listLengths[p]), unsorted nodes. */
  readonly listStarts: Int32Array;
  readonly listLengths: Int32Array;
  readonly lists: Int32Array;
}

/** A remaining graph with at least this share of its possible edges is factored as a full block. */
const FULL_ENOUGH = 0.6;

const VARIABLE = 0;
const ELEMENT = 1;
const ABSORBED = 2;

/**
 * Orders the graph. `held[v]` = 1 keeps node v back until a neighbour has been eliminated: its diagonal is empty, and it becomes a
 * pivot only by fill. Ties go to the node that reached its degree last, so the order depends on the graph alone.
 */
export function minimumDegree(graph: Graph, held: Uint8Array): Elimination {
  const { size, starts, neighbours } = graph;
  // Quotient graph. Variable v: place[v] points at elementCount[v] elements, then variables, length[v] entries in all.
  // Element p (a pivot already taken): place[p] points at the length[p] variables of its column.
  let store = new Int32Array(2 * starts[size]! + size + 16);
  store.set(neighbours.subarray(0, starts[size]!));
  let used = starts[size]!;
  const place = new Int32Array(size);
  const length = new Int32Array(size);
  const elementCount = new Int32Array(size);
  const kind = new Uint8Array(size);
  const degree = new Int32Array(size);
  // Doubly linked lists of the variables of equal degree; -1 ends a list.
  const first = new Int32Array(size + 1).fill(-1);
  const next = new Int32Array(size);
  const previous = new Int32Array(size);
  const inColumn = new Int32Array(size).fill(-1); // inColumn[v] = k when v is in the column of the k-th pivot
  const outside = new Int32Array(size); // outside[e] = |L_e \ L_p|, valid when touched[e] = k
  const touched = new Int32Array(size).fill(-1);
  const order = new Int32Array(size);

  const insert = (v: number, d: number): void => {
    const f = first[d]!;
    next[v] = f;
    previous[v] = -1;
    if (f !== -1) previous[f] = v;
    first[d] = v;
    degree[v] = d;
  };
  const remove = (v: number): void => {
    const p = previous[v]!;
    const q = next[v]!;
    if (p === -1) first[degree[v]!] = q;
    else next[p] = q;
    if (q !== -1) previous[q] = p;
  };

  let waiting = 0;
  for (let v = size - 1; v >= 0; v--) {
    place[v] = starts[v]!;
    length[v] = starts[v + 1]! - starts[v]!;
    if (held[v] === 1) {
      degree[v] = -1;
      waiting++;
    } else insert(v, length[v]!);
  }

  let lowest = 0;
  let k = 0;
  while (k < size) {
    while (lowest < size && first[lowest] === -1) lowest++;
    if (lowest >= size) {
      // Only held nodes are left: no neighbour will fill them. Let them through; the factorisation will report them.
      for (let v = size - 1; v >= 0; v--) {
        if (kind[v] === VARIABLE && degree[v] === -1) insert(v, Math.min(length[v]!, size - 1));
      }
      waiting = 0;
      lowest = 0;
      continue;
    }
    const left = size - k;
    if (waiting === 0 && lowest >= FULL_ENOUGH * (left - 1)) break;
    const p = first[lowest]!;
    remove(p);

    // The column of p: its variables, and those of every element it belongs to, which p absorbs.
    if (used + left > store.length) {
      const larger = new Int32Array(2 * store.length + left);
      larger.set(store);
      store = larger;
    }
    const columnStart = used;
    inColumn[p] = k;
    const pEnd = place[p]! + length[p]!;
    const pElements = place[p]! + elementCount[p]!;
    for (let s = place[p]!; s < pElements; s++) {
      const e = store[s]!;
      if (kind[e] !== ELEMENT) continue;
      kind[e] = ABSORBED;
      for (let t = place[e]!; t < place[e]! + length[e]!; t++) {
        const v = store[t]!;
        if (kind[v] === VARIABLE && inColumn[v] !== k) {
          inColumn[v] = k;
          store[used++] = v;
        }
      }
    }
    for (let s = pElements; s < pEnd; s++) {
      const v = store[s]!;
      if (kind[v] === VARIABLE && inColumn[v] !== k) {
        inColumn[v] = k;
        store[used++] = v;
      }
    }
    kind[p] = ELEMENT;
    place[p] = columnStart;
    length[p] = used - columnStart;
    order[k] = p;

    // How much of each neighbouring element lies outside the column.
    for (let c = columnStart; c < used; c++) {
      const v = store[c]!;
      for (let s = place[v]!; s < place[v]! + elementCount[v]!; s++) {
        const e = store[s]!;
        if (kind[e] !== ELEMENT) continue;
        if (touched[e] !== k) {
          touched[e] = k;
          outside[e] = length[e]!;
        }
        outside[e]!--;
      }
    }

    // Each variable of the column: forget what p covers, count its new degree.
    for (let c = columnStart; c < used; c++) {
      const v = store[c]!;
      const vStart = place[v]!;
      const vElements = vStart + elementCount[v]!;
      const vEnd = vStart + length[v]!;
      let to = vStart;
      let d = 0;
      for (let s = vStart; s < vElements; s++) {
        const e = store[s]!;
        if (kind[e] !== ELEMENT) continue;
        if (outside[e] === 0) {
          kind[e] = ABSORBED; // wholly inside p's column
          continue;
        }
        d += outside[e]!;
        store[to++] = e;
      }
      const elementsEnd = to;
      for (let s = vElements; s < vEnd; s++) {
        const u = store[s]!;
        if (kind[u] !== VARIABLE || inColumn[u] === k) continue;
        d++;
        store[to++] = u;
      }
      // p itself joins the elements; the first variable makes room. There is room: p, or an element it absorbed, has gone.
      if (to > elementsEnd) store[to] = store[elementsEnd]!;
      store[elementsEnd] = p;
      length[v] = to + 1 - vStart;
      elementCount[v] = elementsEnd + 1 - vStart;

      const inside = used - columnStart - 1;
      const before = degree[v]!;
      if (before === -1) waiting--;
      else remove(v);
      const bound = before === -1 ? d + inside : Math.min(d, before) + inside;
      const now = Math.min(bound, left - 2);
      insert(v, now);
      if (now < lowest) lowest = now;
    }
    k++;
  }
  const sparseCount = k;
  for (let v = 0; v < size; v++) if (kind[v] === VARIABLE) order[k++] = v;
  return { order, sparseCount, listStarts: place, listLengths: length, lists: store };
}
