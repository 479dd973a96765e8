/** Whether valve states agree with the solution they lead to, and what they would rather be. */
import type { Circuit } from './circuit.ts';
import { SHORT_OF_NOSE } from './coupling.ts';
import type { Element } from './element.ts';
import { Law } from './element.ts';
import type { Assembled } from './newton.ts';
import { OFF_THE_PLATEAU } from './startStates.ts';
import type { Valve, ValveState } from './valve.ts';

export interface Change {
  readonly valve: Valve;
  readonly state: ValveState;
}

/** Valves whose state contradicts the solution, in job order. */
export function disagreements(circuit: Circuit, assembled: Assembled): Change[] {
  const { coupling, reduction } = assembled;
  const changes: Change[] = [];
  // Rounding must not flip a valve: currents and volts closer than this to a corner are on it.
  let largest = 1;
  for (const element of assembled.active) largest = Math.max(largest, Math.abs(element.i));
  const smallA = 1e-10 * largest;
  for (const valve of circuit.valves) {
    const { element } = valve;
    if (reduction.node[element.from] === -2) continue;
    const drifts = reduction.group[element.from] !== reduction.group[element.to];
    const v = voltsAcross(element, assembled);
    const tieA = coupling.ties.get(element) ?? 0;
    const state =
      valve.kind === 'diode'
        ? diodeState(valve, v, tieA, smallA, drifts)
        : sourceState(valve, { v, tieA, smallA, drifts }, assembled);
    if (state !== null) changes.push({ valve, state });
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

export function voltsAcross(element: Element, assembled: Assembled): number {
  return assembled.volts[element.from]! - assembled.volts[element.to]!;
}
