/**
 * Finds valve states that agree with the solution they lead to: a bounded complementarity problem, solved by block principal
 * pivoting (Júdice and Pires): change every valve that disagrees at once; when that stops helping, change only the first
 * (Murty's least-index rule), which cannot cycle on networks of resistances.
 */
import { Defect } from '../job/issue.ts';
import type { Part } from '../job/part.ts';
import { currentAt, maximumPower } from '../solar/arrayCurve.ts';
import type { Circuit, Sink } from './circuit.ts';
import { SHORT_OF_NOSE } from './coupling.ts';
import type { Element } from './element.ts';
import { Law } from './element.ts';
import type { GraphView } from './graph.ts';
import { Assembled } from './newton.ts';
import { reduce } from './ties.ts';
import { trackMaximumPower } from './track.ts';
import type { Valve, ValveState } from './valve.ts';
import { enter } from './valve.ts';

export type Settled =
  | { readonly ok: true; readonly assembled: Assembled }
  | { readonly ok: false; readonly assembled: Assembled | null };

/** Starting states: diodes conduct, sources hold their volts, trackers track, joiners join. Dead valves stay off. */
export function startStates(circuit: Circuit, graph: GraphView): void {
  unpark(circuit);
  const isLive = (element: Element) =>
    graph.island[element.from]! >= 0 && graph.blockIsLive[graph.block[element.index]!]!;
  for (const valve of circuit.valves) {
    if (valve.kind === 'tracker' || valve.kind === 'joiner') startController(circuit, graph, valve, isLive);
    else {
      enter(valve, isLive(valve.element) ? 'held' : 'off');
      // A converter that nothing feeds gives nothing, and takes nothing from a bank at its output.
      if (valve.kind === 'converter' && !isLive(valve.input)) {
        enter(valve, 'off');
        valve.input.law = Law.none;
      }
    }
  }
  startFromAbove(circuit);
}

/**
 * Constant-power loads on a bus without a battery can have a lower and a higher operating point. There only the sources of
 * the highest set point start; lower ones come in when the volts fall to them. So the higher point is found first.
 */
function startFromAbove(circuit: Circuit): void {
  if (circuit.valves.filter((valve) => valve.kind !== 'diode' && valve.state !== 'off').length < 2) return;
  const buses = busesOf(circuit);
  const key = (element: Element) => `${buses[element.from]} ${buses[element.to]}`;
  const banks = new Set<string>();
  for (const element of circuit.elements) {
    if (element.law === Law.emf && circuit.parts[element.partIndex]!.kind === 'string') banks.add(key(element));
  }
  const highest = new Map<string, number>();
  for (const valve of circuit.valves) {
    if (valve.kind === 'diode' || valve.state === 'off') continue;
    highest.set(key(valve.element), Math.max(valve.setpointV, highest.get(key(valve.element)) ?? 0));
  }
  for (const valve of circuit.valves) {
    if (valve.kind === 'diode' || valve.state === 'off' || banks.has(key(valve.element))) continue;
    if (valve.setpointV < highest.get(key(valve.element))!) enter(valve, 'off');
  }
}

/** Junctions that conductors, fuses and switches join, by one of them. */
function busesOf(circuit: Circuit): Int32Array {
  const bus = Int32Array.from(circuit.junctions, (_, j) => j);
  const find = (j: number): number => {
    let at = j;
    while (bus[at] !== at) {
      bus[at] = bus[bus[at]!]!;
      at = bus[at]!;
    }
    return at;
  };
  for (const element of circuit.elements) {
    const { kind } = circuit.parts[element.partIndex]!;
    if (isTwoEnded(kind) || kind === 'busbar') bus[find(element.from)] = find(element.to);
  }
  return bus.map((_, j) => find(j));
}

function startController(
  circuit: Circuit,
  graph: GraphView,
  valve: Extract<Valve, { kind: 'tracker' | 'joiner' }>,
  isLive: (element: Element) => boolean,
): void {
  const arrays = feedingArrays(circuit, valve.input);
  if (arrays.length === 0 || !isLive(valve.input) || graph.island[valve.element.from]! < 0) {
    enter(valve, 'off');
    return;
  }
  if (valve.kind === 'joiner') {
    const given = (volts: number) => arrays.reduce((sum, e) => sum + currentAt(e.curve!, volts).currentA, 0);
    valve.availableA = Math.max(0, given(valve.setpointV) * OFF_THE_PLATEAU);
    valve.shortA = given(0) * OFF_THE_PLATEAU;
    enter(valve, 'direct');
    return;
  }
  // Arrays in parallel share their volts: the first one's best volts are near the group's.
  const best = maximumPower(arrays[0]!.curve!);
  valve.trackedV = best.voltageV;
  valve.availableW = best.powerW;
  enter(valve, 'tracking');
}

/** The arrays whose plus reaches an input through conductors, fuses, switches and diodes alone. */
function feedingArrays(circuit: Circuit, input: Element): Element[] {
  const diodes = new Set(circuit.valves.flatMap((valve) => (valve.kind === 'diode' ? [valve.element] : [])));
  const passes = (element: Element) => {
    if (diodes.has(element)) return true;
    const kind = circuit.parts[element.partIndex]!.kind;
    return element.law !== Law.none && (isTwoEnded(kind) || kind === 'busbar');
  };
  const reached = new Set([input.from]);
  for (let grown = true; grown; ) {
    grown = false;
    for (const element of circuit.elements) {
      if (reached.has(element.from) === reached.has(element.to) || !passes(element)) continue;
      reached.add(element.from);
      reached.add(element.to);
      grown = true;
    }
  }
  return circuit.elements.filter((element) => element.law === Law.array && reached.has(element.from));
}

function isTwoEnded(kind: Part['kind']): boolean {
  return ['cable', 'fuse', 'breaker', 'switch', 'shunt', 'joint', 'bond'].includes(kind);
}

/** Well below the maximum-power point an array's curve is flat: a set current a hair under it still fixes the volts. */
const OFF_THE_PLATEAU = 1 - 1e-8;

/**
 * Solves with valve states found on the way; constant-power sinks at `share` of their figures. Every disagreeing valve changes
 * at once; where that leads to states without a solution or round in circles, again from the start one valve at a time.
 */
export function settle(circuit: Circuit, graph: GraphView, share: number): Settled {
  const together = pivot(circuit, graph, share, 3);
  if (together !== null && (together.ok || circuit.valves.length === 0)) return together;
  startStates(circuit, graph);
  const singly = pivot(circuit, graph, share, 0);
  if (singly !== null) return singly;
  // Resistances alone always settle. Constant powers may leave no state that agrees: a source too weak to hold its volts, and
  // nothing between that and volts above them. That is a network that cannot deliver.
  if (share > 0 && circuit.sinks.some((sink) => sink.state === 'on' && isDemand(sink)))
    return { ok: false, assembled: null };
  throw new Defect('the states of chargers, diodes and controllers settle');
}

/** A sink that asks for a set power or current, and so can ask for too much. */
export function isDemand(sink: Sink): boolean {
  return (sink.element.law === Law.power || sink.element.law === Law.current) && sink.element.a > 0;
}

/** Principal pivoting; `patience` is how often all changes together may fail to lessen their number. Null: no end found. */
function pivot(circuit: Circuit, graph: GraphView, share: number, patience: number): Settled | null {
  let fewest = patience === 0 ? 0 : Number.POSITIVE_INFINITY;
  let left = patience;
  const called = new Set<Valve>();
  // Constant-power loads can make two states each point to the other: on a return the next valve in line changes instead.
  const visits = new Map<string, number>();
  const limit = 60 + 12 * circuit.valves.length;
  for (let pass = 0; pass < limit; pass++) {
    const reduction = reduce(circuit, graph);
    if (!reduction.ok) {
      giveWay(circuit, reduction.conflicts, reduction.adrift);
      continue;
    }
    const assembled = new Assembled(circuit, reduction.value);
    if (!assembled.solveUnloaded()) return { ok: false, assembled };
    if (!assembled.solve(share) || !trackMaximumPower(assembled, share)) {
      if (!callOnOthers(circuit, assembled, called)) return { ok: false, assembled };
      assembled.factorisation.release();
      continue;
    }
    assembled.coupling.balance();
    const changes = disagreements(circuit, assembled);
    if (changes.length === 0) return { ok: !pushesBack(circuit), assembled };
    if (changes.length < fewest) {
      fewest = changes.length;
      left = patience;
    } else left--;
    assembled.factorisation.release();
    unpark(circuit);
    const before = visits.get(signature(circuit)) ?? 0;
    visits.set(signature(circuit), before + 1);
    const chosen = left >= 0 ? changes : [changes[before % changes.length]!];
    for (const { valve, state } of chosen) enter(valve, state);
  }
  return null;
}

function signature(circuit: Circuit): string {
  return circuit.valves.map((valve) => valve.state).join(' ');
}

/** Sinks set aside because closed valves cut them off get another chance in the next states. */
function unpark(circuit: Circuit): void {
  for (const sink of circuit.sinks) {
    if (sink.parkedLaw === null) continue;
    sink.element.law = sink.parkedLaw;
    sink.parkedLaw = null;
    sink.state = 'on';
  }
}

/** A set current that only flows because the sums turn the volts round is no operating point. */
function pushesBack(circuit: Circuit): boolean {
  return circuit.sinks.some(
    ({ element, state }) => state === 'on' && element.law === Law.current && element.a > 0 && element.v < -1e-9,
  );
}

/** Sources that give nothing although the volts across them lie below their set point, and diodes that block forwards. */
function idleSources(circuit: Circuit, assembled: Assembled): Valve[] {
  return circuit.valves.filter((valve) => {
    if (valve.state !== 'off' || !canGive(valve, assembled)) return false;
    const v = voltsAcross(valve.element, assembled);
    return valve.kind === 'diode' ? v > valve.forwardV : v < valve.setpointV * (1 - 1e-9);
  });
}

/** Whether a valve has anything behind it to give. */
function canGive(valve: Valve, assembled: Assembled): boolean {
  if (assembled.reduction.node[valve.element.from] === -2) return false;
  if (valve.kind === 'tracker') return valve.availableW > 0;
  if (valve.kind === 'joiner') return valve.availableA > 0;
  return valve.kind !== 'converter' || valve.input.law !== Law.none;
}

/**
 * A trial without a solution may only mean wrong states: volts that give way call on every source that stands idle above
 * them, then on the others that give nothing, from the highest set point, then sources that push a set current or power hold
 * their volts instead. The last two once a valve (`called`). False when there is nothing left to try.
 */
function callOnOthers(circuit: Circuit, assembled: Assembled, called: Set<Valve>): boolean {
  const idle = idleSources(circuit, assembled);
  for (const valve of idle) enter(valve, startOf(valve));
  if (idle.length > 0) return true;
  const fresh = circuit.valves.filter((valve) => !called.has(valve));
  let next: Exclude<Valve, { kind: 'diode' }> | null = null;
  for (const valve of fresh) {
    if (valve.kind === 'diode' || valve.state !== 'off' || !canGive(valve, assembled)) continue;
    if (next === null || valve.setpointV > next.setpointV) next = valve;
  }
  if (next !== null) {
    called.add(next);
    enter(next, startOf(next));
    return true;
  }
  const pushing = fresh.filter((valve) => valve.state === 'tracking' || valve.state === 'limited');
  for (const valve of pushing) {
    called.add(valve);
    enter(valve, 'held');
  }
  return pushing.length > 0;
}

function startOf(valve: Valve): ValveState {
  if (valve.kind === 'tracker') return 'tracking';
  return valve.kind === 'joiner' ? 'direct' : 'held';
}

interface Change {
  readonly valve: Valve;
  readonly state: ValveState;
}

function giveWay(
  circuit: Circuit,
  conflicts: readonly { readonly valve: Valve; readonly above: boolean }[],
  adrift: readonly Element[],
): void {
  for (const { valve, above } of conflicts) {
    if (valve.kind === 'diode') enter(valve, 'off');
    else enter(valve, above ? 'off' : 'limited');
  }
  // A source that pushes into a group of its own is what is wrong there: loads are set aside only where there is none.
  const pushing = circuit.valves.filter((valve) => adrift.includes(valve.element));
  for (const valve of pushing) enter(valve, valve.state === 'limited' ? 'held' : 'off');
  if (pushing.length > 0) return;
  for (const element of adrift) {
    const sink = circuit.sinks.find((candidate) => candidate.element === element);
    if (sink !== undefined) {
      sink.state = 'unfed';
      sink.parkedLaw = element.law;
    }
    element.law = Law.none;
  }
}

/** Valves whose state contradicts the solution, in job order. */
export function disagreements(circuit: Circuit, assembled: Assembled): Change[] {
  const { volts, coupling } = assembled;
  const changes: Change[] = [];
  // Rounding must not flip a valve: currents and volts closer than this to a corner are on it.
  let largest = 1;
  for (const element of assembled.active) largest = Math.max(largest, Math.abs(element.i));
  const smallA = 1e-10 * largest;
  for (const valve of circuit.valves) {
    const { element } = valve;
    const node = assembled.reduction.node;
    if (node[element.from] === -2) continue;
    const drifts = assembled.reduction.group[element.from] !== assembled.reduction.group[element.to];
    const v = volts[element.from]! - volts[element.to]!;
    const tieA = coupling.ties.get(element) ?? 0;
    const state =
      valve.kind === 'diode'
        ? diodeState(valve, v, tieA, smallA, drifts)
        : sourceState(valve, { v, tieA, smallA, drifts }, assembled);
    if (state !== null) {
      changes.push({ valve, state });
    }
  }
  return changes;
}

function diodeState(
  valve: Extract<Valve, { kind: 'diode' }>,
  v: number,
  tieA: number,
  smallA: number,
  drifts: boolean,
): ValveState | null {
  if (valve.state === 'off') return !drifts && v > valve.forwardV + 1e-11 * Math.max(1, Math.abs(v)) ? 'held' : null;
  const i = valve.slopeOhm > 0 ? valve.element.i : tieA;
  return i < -smallA ? 'off' : null;
}

interface Seen {
  readonly v: number;
  readonly tieA: number;
  readonly smallA: number;
  readonly drifts: boolean;
}

const NOSE_BAND = 2 * (1 - SHORT_OF_NOSE);

function sourceState(valve: Exclude<Valve, { kind: 'diode' }>, seen: Seen, assembled: Assembled): ValveState | null {
  const { v, tieA, smallA, drifts } = seen;
  const smallV = 1e-11 * Math.max(1, valve.setpointV);
  const over = v > valve.setpointV + smallV;
  const outputA = -tieA;
  switch (valve.state) {
    case 'held':
      if (outputA > valve.limitA + smallA) return 'limited';
      if (outputA < -smallA) return 'off';
      return beyondInput(valve, { v: valve.setpointV, outputA }, assembled);
    case 'limited':
      if (over) return 'held';
      return beyondInput(valve, { v, outputA: valve.limitA }, assembled);
    case 'tracking':
      // The band matches SHORT_OF_NOSE, so that a controller at its corner does not swing between two states.
      if (v > valve.setpointV * (1 + NOSE_BAND)) return 'held';
      return -valve.element.i > valve.limitA * (1 + NOSE_BAND) ? 'limited' : null;
    case 'direct': {
      const linkA = valve.kind === 'joiner' ? (assembled.coupling.ties.get(valve.plusLink) ?? 0) : 0;
      if (over) return 'held';
      // The band matches OFF_THE_PLATEAU: at its corner the array's volts are not fixed by its current.
      if (linkA > valve.limitA * (3 - 2 * OFF_THE_PLATEAU) + smallA) return 'limited';
      return linkA < -smallA ? 'off' : null;
    }
    default:
      return mayStart(valve, v, smallV, drifts, assembled);
  }
}

/** A controller cannot pass on more than its array gives: then it tracks (or joins) instead. */
function beyondInput(
  valve: Exclude<Valve, { kind: 'diode' }>,
  { v, outputA }: { readonly v: number; readonly outputA: number },
  assembled: Assembled,
): ValveState | null {
  if (valve.kind === 'tracker') {
    return (v * outputA) / valve.efficiency > valve.availableW * SHORT_OF_NOSE ? 'tracking' : null;
  }
  if (valve.kind !== 'joiner') return null;
  const most = valve.state === 'held' ? valve.availableA : valve.shortA;
  if (outputA > most * (1 + 1e-10)) return 'direct';
  const inputV = voltsAcross(valve.input, assembled);
  const outputV = voltsAcross(valve.element, assembled);
  return inputV < outputV - 1e-10 * Math.max(1, outputV) ? 'direct' : null;
}

function mayStart(
  valve: Exclude<Valve, { kind: 'diode' }>,
  v: number,
  smallV: number,
  drifts: boolean,
  assembled: Assembled,
): ValveState | null {
  if (v > valve.setpointV - smallV || drifts) return null;
  if (valve.kind === 'tracker') return valve.availableW > 0 ? 'tracking' : null;
  if (valve.kind === 'joiner') return voltsAcross(valve.input, assembled) > v + smallV ? 'direct' : null;
  if (valve.kind === 'converter' && valve.input.law === Law.none) return null;
  return 'held';
}

function voltsAcross(element: Element, assembled: Assembled): number {
  return assembled.volts[element.from]! - assembled.volts[element.to]!;
}
