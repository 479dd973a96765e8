/**
 * Finds valve states that agree with the solution they lead to: a bounded complementarity problem, solved by block principal
 * pivoting (Júdice and Pires): change every valve that disagrees at once; when that stops helping, change only the first
 * (Murty's least-index rule), which cannot cycle on networks of resistances.
 */
import { Defect } from '../job/issue.ts';
import type { Circuit, Sink } from './circuit.ts';
import { disagreements, voltsAcross } from './disagree.ts';
import type { Element } from './element.ts';
import { Law } from './element.ts';
import type { GraphView } from './graph.ts';
import { Assembled } from './newton.ts';
import { startStates, unpark } from './startStates.ts';
import { reduce } from './ties.ts';
import { trackMaximumPower } from './track.ts';
import type { Valve, ValveState } from './valve.ts';
import { enter } from './valve.ts';

export type Settled =
  | { readonly ok: true; readonly assembled: Assembled }
  | { readonly ok: false; readonly assembled: Assembled | null };

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
