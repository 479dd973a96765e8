/** Faults of a network with diodes, or fed by chargers alone: found by the engine's own valves. */
import type { JunctionId, PartId } from '../job/part.ts';
import type { Circuit } from '../network/circuit.ts';
import { Element, Law } from '../network/element.ts';
import { type GraphView, readGraph } from '../network/graph.ts';
import { Assembled } from '../network/newton.ts';
import { settledCircuit } from '../network/operatingPoint.ts';
import { type ReductionOutcome, reduce } from '../network/ties.ts';
import { enter, type Valve, type ValveState } from '../network/valve.ts';
import type { LimitedSource } from './faultSources.ts';
import { type FaultState, faultState, NOTHING_A } from './faultState.ts';
import { type ElementFigures, type FixedNetwork, type Shorted, shortBetween } from './shortBetween.ts';

type States = readonly ValveState[];

/** Trials of other states before a fault is solved from the start. */
const MOST_TRIALS = 12;

/**
 * Limited sources are chargers here: limited in a near fault, held at their volts in one too far away to draw them down. States
 * that hold for one fault mostly hold for the next, and a network of fixed states is linear: each kind of states is factored once,
 * a fault is one solve, and is taken when every valve agrees with it. Else it is solved anew with a real short.
 */
export class ValvedFaults {
  private readonly circuit: Circuit;
  private readonly graph: GraphView;
  private readonly limited: readonly LimitedSource[];
  private readonly placeOf: ReadonlyMap<PartId, number>;
  private readonly fixed = new Map<string, FixedNetwork | States | null>();
  private readonly open: FixedNetwork | null;
  private likely: States;

  constructor(circuit: Circuit, limited: readonly LimitedSource[]) {
    this.circuit = circuit;
    this.limited = limited;
    this.placeOf = new Map(circuit.parts.map(({ id }, index) => [id, index]));
    this.graph = readGraph(circuit);
    const settled = this.graph.reference.length > 0 && 'assembled' in settledCircuit(circuit, this.graph);
    this.likely = circuit.valves.map(({ state }) => state);
    const open = settled ? this.fixedAt(this.likely) : null;
    this.open = open !== null && 'assembled' in open ? open : null;
  }

  /** Gives the factors' memory back. */
  release(): void {
    for (const found of this.fixed.values()) {
      if (found !== null && 'assembled' in found) found.assembled.factorisation.release();
    }
  }

  fault(at: JunctionId, against: JunctionId): FaultState | null {
    const from = this.circuit.junctionIndex.get(at);
    const to = this.circuit.junctionIndex.get(against);
    if (from === undefined || to === undefined || from === to) return null;
    const found = this.byStates(from, to);
    return found === undefined ? this.anew(from, to) : found;
  }

  /** Undefined where no states tried agree. */
  private byStates(from: number, to: number): FaultState | null | undefined {
    let states = this.likely;
    for (let trial = 0; trial < MOST_TRIALS; trial++) {
      const network = this.fixedAt(states);
      if (network === null) return undefined;
      if (!('assembled' in network)) {
        states = network;
        continue;
      }
      const shorted = shortBetween(network, from, to);
      if (shorted === null) return undefined;
      const better = this.agreed(network, shorted, states);
      if (better === null) return undefined;
      if (better.every((state, k) => state === states[k])) {
        this.likely = states;
        return this.answer(from, to, shorted);
      }
      states = better;
    }
    return undefined;
  }

  /** The network with its valves in given states, solved without a short; where it cannot stand so the states to try instead, or null. */
  private fixedAt(states: States): FixedNetwork | States | null {
    const key = states.join(' ');
    const known = this.fixed.get(key);
    if (known !== undefined) return known;
    const network = this.solveFixed(states);
    this.fixed.set(key, network);
    return network;
  }

  private solveFixed(states: States): FixedNetwork | States | null {
    const { circuit, graph } = this;
    circuit.valves.forEach((valve, k) => {
      enter(valve, states[k]!);
    });
    const reduction = reduce(circuit, graph);
    if (!reduction.ok) return givenWay(circuit.valves, states, reduction);
    const assembled = new Assembled(circuit, reduction.value);
    if (!assembled.solveUnloaded() || !assembled.solve(1)) return null;
    const own = new Map<Element, ElementFigures>(
      circuit.valves.map(({ element }) => [element, { law: element.law, a: element.a, b: element.b }]),
    );
    const figures = (element: Element) => own.get(element) ?? element;
    return { circuit, assembled, openVolts: assembled.volts.slice(), injections: [], figures };
  }

  /** The states that a solution asks for; null where it leaves one open. */
  private agreed({ assembled }: FixedNetwork, { currentIn, volts }: Shorted, states: States): States | null {
    const { node, group } = assembled.reduction;
    const next: ValveState[] = [];
    for (const [k, valve] of this.circuit.valves.entries()) {
      const { element } = valve;
      const state = states[k]!;
      const current = currentIn(element);
      if (current === null) return null;
      const isDefined = node[element.from] !== -2 && group[element.from] === group[element.to];
      const v = volts(element.from) - volts(element.to);
      next.push(isDefined ? wanted(valve, state, v, current) : state);
    }
    return next;
  }

  private answer(from: number, to: number, shorted: Pick<Shorted, 'currentA' | 'currentIn'>): FaultState | null {
    const { circuit, limited, placeOf } = this;
    const { currentA, currentIn } = shorted;
    const givenBy = ({ part }: LimitedSource) => {
      const element = circuit.elementsOfPart[placeOf.get(part)!]![0];
      return element === undefined ? 0 : -(currentIn(element) ?? 0);
    };
    const group = this.open?.assembled.reduction.group;
    const isJoined = group !== undefined && group[from] === group[to];
    // Nothing stands between the two before the short, and nothing flows in it: no source reaches them.
    if (!isJoined && Math.abs(currentA) < NOTHING_A) return null;
    const openV = isJoined ? this.open!.openVolts[from]! - this.open!.openVolts[to]! : 0;
    const sourceOhm = currentA === 0 ? 0 : Math.abs(openV / currentA);
    return faultState({ circuit, placeOf, limited, head: { currentA, openV, sourceOhm }, currentIn, givenBy });
  }

  private anew(from: number, to: number): FaultState | null {
    const { circuit } = this;
    const place = { index: circuit.elements.length, partIndex: 0, role: 'short', from, to };
    const short = new Element(place, Law.tie, 0, 0);
    const shorted: Circuit = { ...circuit, elements: [...circuit.elements, short] };
    const graph = readGraph(shorted);
    if (graph.reference.length === 0) return null;
    const ending = settledCircuit(shorted, graph);
    if (!('assembled' in ending)) return null;
    const { assembled } = ending;
    const { node, forest } = assembled.reduction;
    if (node[from] === -2 || forest.undetermined.has(short)) return null;
    assembled.coupling.balance();
    this.likely = circuit.valves.map(({ state }) => state);
    const ties = new Map(assembled.coupling.ties);
    const currents = new Map(assembled.active.map((element) => [element, element.i] as const));
    assembled.factorisation.release();
    const currentIn = (element: Element): number | null =>
      forest.undetermined.has(element) ? null : (currents.get(element) ?? ties.get(element) ?? 0);
    return this.answer(from, to, { currentA: ties.get(short) ?? 0, currentIn });
  }
}

/** Held volts that contradict others give way, and so does a source that pushes into a group with no way back. */
function givenWay(
  valves: readonly Valve[],
  states: States,
  { conflicts, adrift }: Extract<ReductionOutcome, { ok: false }>,
): States | null {
  const next = valves.map((valve, k): ValveState => {
    const conflict = conflicts.find((each) => each.valve === valve);
    if (conflict !== undefined) return valve.kind === 'diode' || conflict.above ? 'off' : 'limited';
    if (!adrift.includes(valve.element)) return states[k]!;
    return states[k] === 'limited' ? 'held' : 'off';
  });
  return next.every((state, k) => state === states[k]) ? null : next;
}

/** The state that agrees with the volts across a valve and the current through it, as the engine's own valves have it. */
function wanted(valve: Valve, state: ValveState, v: number, current: number): ValveState {
  const smallV = 1e-11 * Math.max(1, Math.abs(v));
  const smallA = 1e-9 * Math.max(1, Math.abs(current));
  if (valve.kind === 'diode') {
    if (state === 'off') return v > valve.forwardV + smallV ? 'held' : 'off';
    return current < -smallA ? 'off' : 'held';
  }
  if (state === 'off') return v < valve.setpointV - smallV ? 'held' : 'off';
  if (state === 'limited') return v > valve.setpointV + smallV ? 'held' : 'limited';
  if (-current > valve.limitA + smallA) return 'limited';
  return -current < -smallA ? 'off' : 'held';
}
