/** Numbers the planned branches, solves them, and gives volts and amps back by name. */
import type { JunctionId } from '../../core/job/part.ts';
import type { Branch, BranchState, Law } from './denseBranch.ts';
import { DenseEquations } from './denseEquations.ts';
import { type Found, sensitivity } from './denseNewton.ts';
import type { PlannedBranch } from './densePlan.ts';
import { Groups } from './denseScreening.ts';
import { solveFresh, solveOnwards } from './denseStates.ts';

export interface NamedSolution {
  readonly volts: ReadonlyMap<JunctionId, number>;
  readonly amps: ReadonlyMap<string, number>;
  readonly states: ReadonlyMap<string, BranchState>;
  /** Change of the current in a `hold` branch per volt of it, S. */
  readonly holdSlope: (key: string) => number;
  /** The same network with all powers at zero. */
  readonly unloadedVolts: ReadonlyMap<JunctionId, number>;
}

/** The reference has no answer: beyond what can be delivered, or its own failure. */
export class NoSolution extends Error {}

export function solvePlanned(planned: readonly PlannedBranch[]): NamedSolution {
  const names = [...new Set(planned.flatMap(({ a, b }) => [a, b]))];
  const nodes = new Map(names.map((name, k) => [name, k]));
  const order = new Map(planned.map(({ key }, k) => [key, k]));
  const branches: Branch[] = planned.map(({ key, a, b, law }) => {
    const numbered: Law =
      law.type === 'draw'
        ? { ...law, feed: order.get(law.feed)! }
        : law.type === 'pass'
          ? { ...law, outMinus: nodes.get(law.outMinus)! }
          : law;
    return { key, a: nodes.get(a)!, b: nodes.get(b)!, law: numbered };
  });
  const equations = new DenseEquations({
    nodeCount: names.length,
    branches,
    ...ringsAndGrounds(names.length, branches),
  });
  const unloaded = solveFresh(equations, startingPoint(equations), 0);
  if (unloaded === undefined) throw new NoSolution('the network without its power loads does not settle');
  const powered = branches.some(({ law }) => law.type === 'watts' || law.type === 'draw');
  const solved = powered ? loadUp(equations, unloaded) : unloaded;
  const voltsOf = (x: Float64Array) => new Map(names.map((name, k) => [name, x[k]!]));
  return {
    volts: voltsOf(solved.x),
    amps: new Map(branches.map(({ key }, k) => [key, equations.flow(solved.x, k, 1).value])),
    states: new Map(branches.map(({ key }, k) => [key, solved.states[k]!])),
    unloadedVolts: voltsOf(unloaded.x),
    holdSlope: (key) => {
      const row = equations.currentIndex[order.get(key)!]!;
      return sensitivity(equations, solved, row)[row]!;
    },
  };
}

/** From no power to all of it, in one step or, where that does not settle, in shorter ones. */
function loadUp(equations: DenseEquations, unloaded: Found): Found {
  for (const steps of [1, 4, 16]) {
    let at: Found | undefined = unloaded;
    for (let step = 1; step <= steps && at !== undefined; step++) {
      at = solveOnwards(equations, at, step / steps);
    }
    if (at !== undefined) return at;
  }
  throw new NoSolution('the power loads cannot be fed');
}

/** Every plus above its minus, so that no constant-power part starts at 0 V; arrays a little below open circuit. */
function startingPoint({ size, network }: DenseEquations): Float64Array {
  const x = new Float64Array(size);
  for (const { a, b, law } of network.branches) {
    if (law.type === 'ohm' && law.emfV < 0) x[b] = x[a]! - law.emfV;
    if (law.type === 'panel') x[b] = x[a]! + 0.97 * law.curve.openCircuitV;
  }
  return x;
}

/** One ground a connected group, and the zero-ohm branches that close a ring of their own kind. */
function ringsAndGrounds(
  nodeCount: number,
  branches: readonly Branch[],
): { readonly grounds: readonly number[]; readonly redundant: ReadonlySet<number> } {
  const merged = new Groups<number>();
  const connected = new Groups<number>();
  const redundant = new Set<number>();
  branches.forEach(({ a, b, law }, k) => {
    if (law.type === 'short' && !merged.join(a, b)) redundant.add(k);
    connected.join(a, b);
  });
  const grounds = Array.from({ length: nodeCount }, (_, node) => node).filter((node) => connected.head(node) === node);
  return { grounds, redundant };
}

/** Keys of zero-ohm branches that lie in a ring of zero-ohm branches: no balance can say how much each carries. */
export function undeterminedShorts(planned: readonly PlannedBranch[]): ReadonlySet<string> {
  const shorts = planned.filter(({ law }) => law.type === 'short');
  const inRing = shorts.filter((short) => {
    const without = new Groups<JunctionId>();
    for (const other of shorts) if (other !== short) without.join(other.a, other.b);
    return !without.join(short.a, short.b);
  });
  return new Set(inRing.map(({ key }) => key));
}
