/**
 * Valves: parts that are one thing or another depending on the rest of the network. A charger gives its limit, or holds its
 * volts, or gives nothing; a diode conducts or blocks. `settle.ts` finds the states that agree with each other.
 */

import type { Element } from './element.ts';
import { Law } from './element.ts';

export type ValveState = 'off' | 'held' | 'limited' | 'tracking' | 'direct';

interface ValveBase {
  readonly partIndex: number;
  state: ValveState;
}
/** Conducts from `from` to `to` above `forwardV`; with no slope its volts are held while it conducts. */
export interface DiodeValve extends ValveBase {
  readonly kind: 'diode';
  readonly element: Element;
  readonly forwardV: number;
  readonly slopeOhm: number;
}
/** Gives up to `limitA` below `setpointV`, then holds it with less; never takes current in. */
export interface ChargerValve extends ValveBase {
  readonly kind: 'charger';
  readonly element: Element;
  readonly setpointV: number;
  readonly limitA: number;
}
/** The output of a DC-to-DC converter, a `charger` whose input draws output power / efficiency + standby. */
export interface ConverterValve extends ValveBase {
  readonly kind: 'converter';
  readonly element: Element;
  readonly input: Element;
  readonly setpointV: number;
  readonly limitA: number;
  readonly efficiency: number;
  readonly standbyW: number;
}
/** A maximum-power controller: `tracking` holds its input at the array's best volts and passes on the power. */
export interface TrackerValve extends ValveBase {
  readonly kind: 'tracker';
  readonly element: Element;
  readonly input: Element;
  readonly setpointV: number;
  readonly limitA: number;
  readonly efficiency: number;
  /** Input volts held while tracking, and the most that the input can take, W (Infinity until tracked once). */
  trackedV: number;
  availableW: number;
}
/** A switching controller: `direct` joins array and battery; a common minus is always joined. */
export interface JoinerValve extends ValveBase {
  readonly kind: 'joiner';
  readonly element: Element;
  readonly input: Element;
  readonly plusLink: Element;
  readonly minusLink: Element;
  readonly setpointV: number;
  readonly limitA: number;
  /** What the arrays give at the set point's volts, and at none: no state that agrees asks for more while holding, or limiting. */
  availableA: number;
  shortA: number;
}
export type Valve = DiodeValve | ChargerValve | ConverterValve | TrackerValve | JoinerValve;

/** Puts a valve into a state: its elements take the laws that go with it. */
export function enter(valve: Valve, state: ValveState): void {
  valve.state = state;
  if (valve.kind === 'diode') {
    enterDiode(valve, state);
    return;
  }
  setSource(valve.element, state, valve);
  switch (valve.kind) {
    case 'converter':
      valve.input.law = Law.power;
      valve.input.a = state === 'off' ? valve.standbyW : valve.input.a;
      return;
    case 'tracker':
      if (state === 'tracking') {
        valve.input.law = Law.tie;
        valve.input.b = valve.trackedV;
        valve.element.law = Law.powerSource;
      } else {
        valve.input.law = state === 'off' ? Law.none : Law.power;
        valve.input.a = 0;
      }
      return;
    case 'joiner':
      valve.plusLink.law = state === 'direct' ? Law.tie : Law.none;
      if (state === 'direct') valve.element.law = Law.none;
      valve.input.law = state === 'held' || state === 'limited' ? Law.current : Law.none;
      valve.input.a = state === 'limited' ? Math.min(valve.limitA, valve.shortA) : 0;
      return;
    default:
      return;
  }
}

function enterDiode(valve: DiodeValve, state: ValveState): void {
  const { element } = valve;
  if (state === 'off') {
    element.law = Law.none;
  } else if (valve.slopeOhm > 0) {
    element.law = Law.emf;
    element.a = 1 / valve.slopeOhm;
    element.b = valve.forwardV;
  } else {
    element.law = Law.tie;
    element.b = valve.forwardV;
  }
}

function setSource(element: Element, state: ValveState, at: { setpointV: number; limitA: number }): void {
  if (state === 'held') {
    element.law = Law.tie;
    element.b = at.setpointV;
  } else if (state === 'limited') {
    element.law = Law.current;
    element.a = -at.limitA;
  } else {
    element.law = Law.none;
  }
}
