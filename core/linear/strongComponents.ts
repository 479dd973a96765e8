/** Tarjan's strongly connected components. */
import { giveBackInts, takeInts } from './slab.ts';

/** A directed graph: node v leads to targets[starts[v] .. starts[v + 1]). */
export interface Digraph {
  readonly size: number;
  readonly starts: Int32Array;
  readonly targets: Int32Array;
}

const NONE = -1;

/**
 * Writes the component of each node to `of` and returns how many there are. They are numbered so that edges between them lead from higher to
 * lower numbers.
 */
export function strongComponents({ size, starts, targets }: Digraph, of: Int32Array): number {
  const found = takeInts(size); // when each node was first met
  const low = takeInts(size); // the earliest node on the stack that it is known to reach
  const resume = takeInts(size); // the edge to follow next
  const path = takeInts(size);
  const stack = takeInts(size);
  found.fill(NONE);
  of.fill(NONE);
  let stacked = 0;
  let time = 0;
  let count = 0;
  for (let root = 0; root < size; root++) {
    if (found[root] !== NONE) continue;
    let depth = -1;
    let entering = root;
    for (;;) {
      if (entering !== NONE) {
        path[++depth] = entering;
        stack[stacked++] = entering;
        found[entering] = time;
        low[entering] = time++;
        resume[entering] = starts[entering]!;
        entering = NONE;
      }
      const v = path[depth]!;
      if (resume[v]! < starts[v + 1]!) {
        const u = targets[resume[v]!]!;
        resume[v]!++;
        if (found[u] === NONE) entering = u;
        else if (of[u] === NONE && found[u]! < low[v]!) low[v] = found[u]!;
        continue;
      }
      if (low[v] === found[v]) {
        let u: number;
        do {
          u = stack[--stacked]!;
          of[u] = count;
        } while (u !== v);
        count++;
      }
      if (--depth < 0) break;
      const above = path[depth]!;
      if (low[v]! < low[above]!) low[above] = low[v]!;
    }
  }
  for (const array of [found, low, resume, path, stack]) giveBackInts(array);
  return count;
}
