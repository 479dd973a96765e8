/** The states in which valves start, before a solution says otherwise. */
import type { Part } from '../job/part.ts';
import { currentAt, maximumPower } from '../solar/arrayCurve.ts';
import type { Circuit } from './circuit.ts';
import { DisjointSets } from './disjointSets.ts';
import type { Element } from './element.ts';
import { Law } from './element.ts';
import type { GraphView } from './graph.ts';
import type { Valve } from './valve.ts';
import { enter } from './valve.ts';

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
  const buses = new DisjointSets(circuit.junctions.length);
  for (const element of circuit.elements) {
    const { kind } = circuit.parts[element.partIndex]!;
    if (isTwoEnded(kind) || kind === 'busbar') buses.join(element.from, element.to);
  }
  return buses.groups();
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
export const OFF_THE_PLATEAU = 1 - 1e-8;

/** Sinks set aside because closed valves cut them off get another chance in the next states. */
export function unpark(circuit: Circuit): void {
  for (const sink of circuit.sinks) {
    if (sink.parkedLaw === null) continue;
    sink.element.law = sink.parkedLaw;
    sink.parkedLaw = null;
    sink.state = 'on';
  }
}
