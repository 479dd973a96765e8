/**
 * What the drawing says before any arithmetic: which parts can carry current at all, which groups have a source, and what
 * stands at 0 V. Done on the graph, so that a message can name the part instead of saying that a matrix is singular.
 */
import type { JunctionId, PartId } from '../job/part.ts';
import { nameOf } from '../job/part.ts';
import type { GraphRemark } from './answer.ts';
import type { Circuit } from './circuit.ts';
import { isCoupler } from './coupling.ts';
import { DisjointSets } from './disjointSets.ts';
import { Law } from './element.ts';

export interface GraphView {
  /** Block of each element: elements of one block lie on common loops. Current flows only in blocks that hold a source. */
  readonly block: Int32Array;
  readonly blockIsLive: readonly boolean[];
  /** Island of each junction, or -1 for a junction that no live group reaches. */
  readonly island: Int32Array;
  /** Junction at 0 V, by island. */
  readonly reference: readonly number[];
  readonly remarks: readonly GraphRemark[];
}

/** Finds live blocks and islands, and switches dead elements off (`Law.none`). */
export function readGraph(circuit: Circuit): GraphView {
  const { block, blockCount } = blocksOf(circuit);
  const blockIsLive = findLiveBlocks(circuit, block, blockCount);
  const unfed = switchOffDeadSinks(circuit, block, blockIsLive);
  const { island, groups } = islandsOf(circuit);
  const live = groups.map(() => false);
  for (const index of sourceElements(circuit)) {
    if (blockIsLive[block[index]!]) live[island[circuit.elements[index]!.from]!] = true;
  }
  // An island of its own behind a converter or controller is live through it.
  const couplerOutputs = new Set(circuit.valves.filter(isCoupler).map(({ element }) => element));
  circuit.elements.forEach((element, index) => {
    if (couplerOutputs.has(element) && blockIsLive[block[index]!]) live[island[element.from]!] = true;
  });
  const remarks = [...unfed, ...unsuppliedRemarks(circuit, island, live)];
  for (let j = 0; j < island.length; j++) if (!live[island[j]!]) island[j] = -1;
  const { reference, renumbered } = references(circuit, island, live);
  return { block, blockIsLive, island: renumbered, reference, remarks };
}

/** Indices of elements that can drive a current; converter and controller outputs only if their input can be fed. */
function sourceElements(circuit: Circuit): number[] {
  const sources: number[] = [];
  const valveOf = new Map(circuit.valves.map((valve) => [valve.element, valve]));
  circuit.elements.forEach((element, index) => {
    if ((element.law === Law.emf && !valveOf.has(element)) || element.law === Law.array) sources.push(index);
    else if (valveOf.get(element)?.kind === 'charger') sources.push(index);
  });
  return sources;
}

function findLiveBlocks(circuit: Circuit, block: Int32Array, blockCount: number): boolean[] {
  const live = Array.from({ length: blockCount }, () => false);
  for (const index of sourceElements(circuit)) live[block[index]!] = true;
  // A converter or controller makes its output's block live once its input's block is: repeat until nothing changes.
  const couplers = circuit.valves.filter(isCoupler);
  for (let changed = true; changed; ) {
    changed = false;
    for (const valve of couplers) {
      const output = block[valve.element.index]!;
      if (!live[output] && live[block[valve.input.index]!]) {
        live[output] = true;
        changed = true;
      }
    }
  }
  return live;
}

function switchOffDeadSinks(circuit: Circuit, block: Int32Array, live: readonly boolean[]): GraphRemark[] {
  const dead: number[] = [];
  for (const sink of circuit.sinks) {
    const index = sink.element.index;
    if (live[block[index]!]) continue;
    sink.state = 'unfed';
    sink.element.law = Law.none;
    dead.push(index);
  }
  if (dead.length === 0) return [];
  const reach = connected(circuit, (index) => !dead.includes(index));
  const fed = new Set<number>();
  for (const index of sourceElements(circuit)) fed.add(reach[circuit.elements[index]!.from]!);
  return dead.map((index) => unfedRemark(circuit, index, reach, fed));
}

function unfedRemark(circuit: Circuit, index: number, reach: Int32Array, fed: ReadonlySet<number>): GraphRemark {
  const element = circuit.elements[index]!;
  const part = circuit.parts[element.partIndex]!;
  const plus = circuit.junctions[element.from]!;
  const minus = circuit.junctions[element.to]!;
  const plusFed = fed.has(reach[element.from]!);
  const minusFed = fed.has(reach[element.to]!);
  let why: string;
  if (plusFed && minusFed)
    why = 'both its ends hang on the same side of the source: nothing drives a current through it';
  else if (plusFed) why = `its minus side (junction ${minus}) has no path back to a source`;
  else if (minusFed) why = `its plus side (junction ${plus}) has no path to a source`;
  else why = 'neither of its ends reaches a source';
  return { kind: 'unfed', parts: [part.id], junctions: [plus, minus], message: `${nameOf(part)} is not fed: ${why}.` };
}

function unsuppliedRemarks(circuit: Circuit, island: Int32Array, live: readonly boolean[]): GraphRemark[] {
  const parts = new Map<number, Set<PartId>>();
  const junctions = new Map<number, JunctionId[]>();
  for (const element of circuit.elements) {
    const group = island[element.from]!;
    if (live[group] || element.law === Law.none) continue;
    if (!parts.has(group)) parts.set(group, new Set());
    parts.get(group)!.add(circuit.parts[element.partIndex]!.id);
  }
  island.forEach((group, j) => {
    if (!parts.has(group)) return;
    if (!junctions.has(group)) junctions.set(group, []);
    junctions.get(group)!.push(circuit.junctions[j]!);
  });
  return [...parts].map(([group, ids]) => ({
    kind: 'island-unsupplied' as const,
    parts: [...ids],
    junctions: junctions.get(group)!,
    message: `No source feeds ${[...ids].join(', ')}: the group is not connected to any battery, array or charger that gives current.`,
  }));
}

/** Connected groups of junctions over the elements that `use` admits; returns the group of each junction. */
function connected(circuit: Circuit, use: (index: number) => boolean): Int32Array {
  const sets = new DisjointSets(circuit.junctions.length);
  circuit.elements.forEach((element, index) => {
    if (use(index)) sets.join(element.from, element.to);
  });
  return sets.groups();
}

function islandsOf(circuit: Circuit): { island: Int32Array; groups: number[] } {
  const unfed = new Set(circuit.sinks.filter((sink) => sink.state === 'unfed').map((sink) => sink.element));
  const root = connected(circuit, (index) => !unfed.has(circuit.elements[index]!));
  const number = new Map<number, number>();
  const island = root.map((r) => {
    if (!number.has(r)) number.set(r, number.size);
    return number.get(r)!;
  });
  return { island, groups: [...number.values()] };
}

/** 0 V is the junction marked so, else the minus of the island's first source in job order. */
function references(circuit: Circuit, island: Int32Array, live: readonly boolean[]) {
  const reference = new Map<number, number>();
  for (const [id, note] of circuit.job.junctions) {
    const j = circuit.junctionIndex.get(id);
    if (note.reference && j !== undefined && island[j]! >= 0 && !reference.has(island[j]!))
      reference.set(island[j]!, j);
  }
  const claim = (id: JunctionId) => {
    const j = circuit.junctionIndex.get(id);
    if (j !== undefined && island[j]! >= 0 && !reference.has(island[j]!)) reference.set(island[j]!, j);
  };
  for (const part of circuit.parts) {
    if (part.kind === 'string' || part.kind === 'array' || part.kind === 'charger') claim(part.minus);
  }
  for (const part of circuit.parts) if (part.kind === 'controller' || part.kind === 'converter') claim(part.to.minus);
  const order = live.flatMap((isLive, group) => (isLive ? [group] : []));
  const place = new Map(order.map((group, k) => [group, k]));
  return { reference: order.map((group) => reference.get(group)!), renumbered: island.map((g) => place.get(g) ?? -1) };
}

/**
 * Biconnected blocks of the graph (Hopcroft and Tarjan), by an explicit stack: two elements share a block when some loop runs
 * through both. A bridge is a block of one.
 */
function blocksOf(circuit: Circuit): { block: Int32Array; blockCount: number } {
  const { elements, junctions } = circuit;
  const n = junctions.length;
  const block = new Int32Array(elements.length).fill(-1);
  const starts = new Int32Array(n + 1);
  for (const { from, to } of elements) {
    starts[from + 1]!++;
    starts[to + 1]!++;
  }
  for (let j = 0; j < n; j++) starts[j + 1]! += starts[j]!;
  const incident = new Int32Array(starts[n]!);
  const fill = starts.slice();
  elements.forEach(({ from, to }, index) => {
    incident[fill[from]!++] = index;
    incident[fill[to]!++] = index;
  });
  const entered = new Int32Array(n); // order of discovery, 0 = not yet
  const low = new Int32Array(n); // earliest junction reachable
  const next = starts.slice(0, n); // next incident element to look at
  const via = new Int32Array(n).fill(-1); // element by which a junction was entered
  const open: number[] = []; // elements not yet given to a block
  let clock = 0;
  let blockCount = 0;
  for (let root = 0; root < n; root++) {
    if (entered[root]! > 0) continue;
    const path = [root];
    entered[root] = low[root] = ++clock;
    while (path.length > 0) {
      const j = path[path.length - 1]!;
      if (next[j]! < starts[j + 1]!) {
        const index = incident[next[j]!++]!;
        const { from, to } = elements[index]!;
        const other = from === j ? to : from;
        if (index === via[j] || other === j) {
          if (other === j && block[index]! < 0) block[index] = blockCount++;
        } else if (entered[other] === 0) {
          open.push(index);
          via[other] = index;
          entered[other] = low[other] = ++clock;
          path.push(other);
        } else if (entered[other]! < entered[j]!) {
          open.push(index);
          low[j] = Math.min(low[j]!, entered[other]!);
        }
        continue;
      }
      path.pop();
      const above = path[path.length - 1];
      if (above === undefined) continue;
      low[above] = Math.min(low[above]!, low[j]!);
      if (low[j]! < entered[above]!) continue;
      for (let index = open.pop()!; ; index = open.pop()!) {
        block[index] = blockCount;
        if (index === via[j]) break;
      }
      blockCount++;
    }
  }
  return { block, blockCount };
}
