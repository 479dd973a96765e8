/** Tarjan's strongly connected components. */

/** A directed graph: node v leads to targets[starts[v] .. starts[v + 1]). */
export interface Digraph {
  readonly size: number;
  readonly starts: Int32Array;
  readonly targets: Int32Array;
}

/** The components, numbered so that edges between them lead from higher to lower numbers. */
export interface Components {
  readonly count: number;
  /** Length size: the component of each node. */
  readonly of: Int32Array;
}

/** Finds the strongly connected components without recursion. */
export function strongComponents({ size, starts, targets }: Digraph): Components {
  const of = new Int32Array(size).fill(-1);
  const found = new Int32Array(size).fill(-1); // when each node was first met
  const low = new Int32Array(size); // the earliest node on the stack that it is known to reach
  const resume = new Int32Array(size);
  const path = new Int32Array(size);
  const stack = new Int32Array(size);
  let stacked = 0;
  let time = 0;
  let count = 0;
  for (let root = 0; root < size; root++) {
    if (found[root] !== -1) continue;
    let depth = -1;
    let entering = root;
    for (;;) {
      if (entering >= 0) {
        const v = entering;
        path[++depth] = v;
        stack[stacked++] = v;
        found[v] = time;
        low[v] = time++;
        resume[v] = starts[v]!;
        entering = -1;
      }
      const v = path[depth]!;
      if (resume[v]! < starts[v + 1]!) {
        const u = targets[resume[v]!++]!;
        if (found[u] === -1) entering = u;
        else if (of[u] === -1 && found[u]! < low[v]!) low[v] = found[u]!;
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
  return { count, of };
}
