/**
 * Ties: elements that fix a potential difference whatever their current: zero-ohm parts (difference 0) and held voltages.
 * Junctions that ties join become one unknown with known offsets, before any arithmetic; the currents in the ties are found
 * afterwards from the balance, over the forest that the ties form.
 */
import type { Circuit } from './circuit.ts';
import { DisjointSets } from './disjointSets.ts';
import type { Element } from './element.ts';
import { conducts, Law } from './element.ts';
import type { GraphView } from './graph.ts';
import { OffsetSets } from './offsetSets.ts';
import type { Valve } from './valve.ts';

export interface Reduction {
  /** Unknown of each junction: 0 to size - 1; -1 when its volts are known; -2 when it has none. */
  readonly node: Int32Array;
  /** V(junction) = U(node) + offset, or offset alone where the node is -1. */
  readonly offset: Float64Array;
  readonly size: number;
  readonly forest: TieForest;
  /** Conducting group of each junction in the present states; volts between two groups are not defined. */
  readonly group: Int32Array;
  /** 1 for junctions of groups that have neither their island's 0 V nor a source of their own: their volts mean nothing. */
  readonly drifting: Uint8Array;
}

interface TieForest {
  /** Junctions so that each stands before its parent; ends with the roots. */
  readonly order: Int32Array;
  readonly parentTie: (Element | null)[];
  readonly parentJunction: Int32Array;
  /** Zero-ohm ties that close a loop of ties: how the current splits in that loop is not determined. */
  readonly undetermined: ReadonlySet<Element>;
  /** Held sources side by side at the same volts: each shares the first one's current in proportion to its limit. */
  readonly shared: readonly {
    readonly first: Element;
    readonly second: Element;
    readonly weightFirst: number;
    readonly weight: number;
  }[];
}

/** A held valve that contradicts other ties: its volts are already fixed, higher (`above`) or lower. */
export interface TieConflict {
  readonly valve: Valve;
  readonly above: boolean;
}

export type ReductionOutcome =
  | { readonly ok: true; readonly value: Reduction }
  | { readonly ok: false; readonly conflicts: readonly TieConflict[]; readonly adrift: readonly Element[] };

/** Merges junctions over the ties in force. Fails with the valves whose held volts contradict each other, or with elements that push current into a group that has no way back. */
export function reduce(circuit: Circuit, graph: GraphView): ReductionOutcome {
  const n = circuit.junctions.length;
  const sets = new OffsetSets(n);
  const valveOf = new Map<Element, Valve>(circuit.valves.map((valve) => [valve.element, valve]));
  const { accepted, closing, conflicts } = join(circuit, graph, sets, valveOf);
  if (conflicts.length > 0) return { ok: false, conflicts, adrift: [] };

  const drifting = new Uint8Array(n);
  const groundOf = new Map<number, number>(); // root of a set → junction at known volts
  for (const j of graph.reference) groundOf.set(sets.find(j), j);
  const { adrift, group } = groundDriftingGroups(circuit, graph, sets, groundOf, drifting);
  if (adrift.length > 0) return { ok: false, conflicts: [], adrift };

  const node = new Int32Array(n).fill(-2);
  const offset = new Float64Array(n);
  const nodeOf = new Map<number, number>();
  for (let j = 0; j < n; j++) {
    if (graph.island[j]! < 0) continue;
    const root = sets.find(j);
    const ground = groundOf.get(root);
    offset[j] = sets.potential(j) - (ground === undefined ? 0 : sets.potential(ground));
    if (ground !== undefined) node[j] = -1;
    else {
      if (!nodeOf.has(root)) nodeOf.set(root, nodeOf.size);
      node[j] = nodeOf.get(root)!;
    }
  }
  const forest = buildForest(n, accepted, closing, valveOf);
  return { ok: true, value: { node, offset, size: nodeOf.size, forest, group, drifting } };
}

/** Zero-ohm parts first, then diodes from the lowest drop, then held sources from the highest volts: the later gives way. */
function join(circuit: Circuit, graph: GraphView, sets: OffsetSets, valveOf: ReadonlyMap<Element, Valve>) {
  const rank = (element: Element): number => {
    const valve = valveOf.get(element);
    if (valve === undefined) return element.b === 0 ? 0 : 1;
    return valve.kind === 'diode' ? 2 : 3;
  };
  const ties = circuit.elements
    .filter((element) => element.law === Law.tie && graph.island[element.from]! >= 0)
    .map((element) => ({ element, rank: rank(element) }));
  ties.sort((p, q) => p.rank - q.rank || (p.rank === 3 ? q.element.b - p.element.b : p.element.b - q.element.b));
  const accepted: Element[] = [];
  const closing: Element[] = [];
  const conflicts: TieConflict[] = [];
  for (const { element } of ties) {
    const gap = sets.join(element.from, element.to, element.b);
    const valve = valveOf.get(element);
    if (gap === null) accepted.push(element);
    else if (Math.abs(gap) <= 1e-12 * Math.abs(element.b)) closing.push(element);
    else if (valve !== undefined) conflicts.push({ valve, above: gap > 0 });
  }
  return { accepted, closing, conflicts };
}

/**
 * Groups cut off from their island's 0 V by closed valves stand for themselves: 0 V is the minus of their first source; one
 * without a source gets some 0 V to be solved by, and is marked as drifting. If an element pushes a set current across the
 * gap there is no such answer; the elements are returned.
 */
function groundDriftingGroups(
  circuit: Circuit,
  graph: GraphView,
  sets: OffsetSets,
  groundOf: Map<number, number>,
  drifting: Uint8Array,
): { adrift: Element[]; group: Int32Array } {
  const n = circuit.junctions.length;
  const joined = new DisjointSets(n);
  for (let j = 0; j < n; j++) joined.join(sets.find(j), j);
  for (const element of circuit.elements) if (conducts(element)) joined.join(element.from, element.to);
  const group = joined.groups();
  const grounded = new Set([...groundOf.values()].map((j) => group[j]!));
  const floats = (j: number) => graph.island[j]! >= 0 && !grounded.has(group[j]!);
  const adrift: Element[] = [];
  for (const element of circuit.elements) {
    if (element.law === Law.none || conducts(element) || group[element.from] === group[element.to]) continue;
    if (element.a !== 0 && (floats(element.from) || floats(element.to))) adrift.push(element);
  }
  if (adrift.length > 0) return { adrift, group };
  const ground = (j: number): void => {
    grounded.add(group[j]!);
    groundOf.set(sets.find(j), j);
  };
  for (const part of circuit.parts) {
    if (part.kind !== 'string' && part.kind !== 'array' && part.kind !== 'charger') continue;
    const j = circuit.junctionIndex.get(part.minus)!;
    if (floats(j)) ground(j);
  }
  for (let j = 0; j < n; j++) if (floats(j)) drifting[j] = 1;
  for (let j = 0; j < n; j++) if (floats(j)) ground(j);
  return { adrift, group };
}

function buildForest(
  n: number,
  accepted: readonly Element[],
  closing: readonly Element[],
  valveOf: ReadonlyMap<Element, Valve>,
): TieForest {
  const neighbours = new Map<number, Element[]>();
  for (const tie of accepted) {
    for (const j of [tie.from, tie.to]) {
      if (!neighbours.has(j)) neighbours.set(j, []);
      neighbours.get(j)!.push(tie);
    }
  }
  const parentTie: (Element | null)[] = Array.from({ length: n }, () => null);
  const parentJunction = new Int32Array(n).fill(-1);
  const depth = new Int32Array(n).fill(-1);
  const down: number[] = [];
  for (const root of neighbours.keys()) {
    if (depth[root]! >= 0) continue;
    depth[root] = 0;
    down.push(root);
    for (let k = down.length - 1; k < down.length; k++) {
      const j = down[k]!;
      for (const tie of neighbours.get(j)!) {
        const other = tie.from === j ? tie.to : tie.from;
        if (depth[other]! >= 0) continue;
        depth[other] = depth[j]! + 1;
        parentTie[other] = tie;
        parentJunction[other] = j;
        down.push(other);
      }
    }
  }
  const undetermined = new Set<Element>();
  const shared: { first: Element; second: Element; weightFirst: number; weight: number }[] = [];
  for (const tie of closing) {
    const path = treePath(tie, { parentTie, parentJunction, depth });
    const held = path.filter((element) => isSource(valveOf.get(element)));
    const valve = valveOf.get(tie);
    if (isSource(valve) && held.length === 1 && sameWay(tie, held[0]!)) {
      const weightFirst = (valveOf.get(held[0]!) as { limitA: number }).limitA;
      shared.push({ first: held[0]!, second: tie, weightFirst, weight: (valve as { limitA: number }).limitA });
    } else {
      undetermined.add(tie);
      for (const element of path) undetermined.add(element);
    }
  }
  const order = Int32Array.from(down, (_, k) => down[down.length - 1 - k]!);
  return { order, parentTie, parentJunction, undetermined, shared };
}

function isSource(valve: Valve | undefined): boolean {
  return valve !== undefined && valve.kind !== 'diode';
}
const sameWay = (tie: Element, other: Element) => Math.sign(tie.b) === Math.sign(other.b);

/** The ties on the tree's way between a closing tie's ends. */
function treePath(
  tie: Element,
  tree: { parentTie: (Element | null)[]; parentJunction: Int32Array; depth: Int32Array },
): Element[] {
  const path: Element[] = [];
  let p = tie.from;
  let q = tie.to;
  while (p !== q) {
    if (tree.depth[p]! < tree.depth[q]!) [p, q] = [q, p];
    path.push(tree.parentTie[p]!);
    p = tree.parentJunction[p]!;
  }
  return path;
}

/**
 * Currents in the ties, from the currents in all other elements: what leaves a junction by its other elements must arrive by
 * its ties. Linear in the other currents, so it serves for derivatives too. `leaving` (one entry a junction) is overwritten.
 */
export function tieCurrents(forest: TieForest, leaving: Float64Array, currents: Map<Element, number>): void {
  currents.clear();
  const { order, parentTie, parentJunction } = forest;
  for (const j of order) {
    const tie = parentTie[j];
    if (!tie) continue;
    // Current needed into j from its parent is what leaves j.
    const towardsChild = leaving[j]!;
    leaving[parentJunction[j]!]! += towardsChild;
    currents.set(tie, tie.to === j ? towardsChild : -towardsChild);
  }
  shareHeld(forest, currents);
}

/** Held sources side by side: total in proportion to limits; the ties between them carry the difference. */
function shareHeld(forest: TieForest, currents: Map<Element, number>): void {
  if (forest.shared.length === 0) return;
  const totals = new Map<Element, { total: number; weight: number }>();
  for (const { first, weightFirst, weight } of forest.shared) {
    const entry = totals.get(first) ?? { total: currents.get(first) ?? 0, weight: weightFirst };
    entry.weight += weight;
    totals.set(first, entry);
  }
  const { parentTie, parentJunction } = forest;
  const depthOf = (j: number) => {
    let depth = 0;
    for (let at = j; parentTie[at]; at = parentJunction[at]!) depth++;
    return depth;
  };
  for (const { first, second, weight } of forest.shared) {
    const entry = totals.get(first)!;
    const part = (entry.total * weight) / entry.weight;
    currents.set(second, part);
    // The second takes `part` from second.from to second.to; the tree path back carries as much the other way.
    let p = second.from;
    let q = second.to;
    while (p !== q) {
      const stepFromP = depthOf(p) >= depthOf(q);
      const child = stepFromP ? p : q;
      const tie = parentTie[child]!;
      // Along the path from second.from to second.to the tree carried this current; now it carries `part` less.
      const forward = stepFromP ? tie.from === child : tie.to === child;
      currents.set(tie, (currents.get(tie) ?? 0) + (forward ? -part : part));
      if (stepFromP) p = parentJunction[p]!;
      else q = parentJunction[q]!;
    }
  }
}
