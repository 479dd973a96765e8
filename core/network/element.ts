/**
 * Two-terminal elements: what a part is made of electrically. Each obeys one law i(v), where v = V(from) - V(to) and i is the
 * current through the element from `from` to `to`.
 */

import type { ArrayCurve } from '../solar/arrayCurve.ts';
import { currentAt } from '../solar/arrayCurve.ts';

/** The law in force; valves (chargers, diodes …) change theirs while the operating point is found. */
export const Law = {
  /** Carries nothing: off, blocking, dropped out. */
  none: 0,
  /** i = a v; a conductance, S. */
  conductance: 1,
  /** i = a (v - b); a conductance S behind an EMF of b volts. */
  emf: 2,
  /** v = a i + b i^3; a conductor that warms with its own load, a in ohm, b in ohm/A^2. */
  warming: 3,
  /** i = a, A. */
  current: 4,
  /** i = a / v; a constant power a, W. */
  power: 5,
  /** i = -a / v; a source of constant power a, W. */
  powerSource: 6,
  /** i from the curve of a solar array, which gives current out of `from`. */
  array: 7,
  /** v = b exactly, whatever the current: zero ohms (b = 0) or a held voltage. Its current follows from the balance. */
  tie: 8,
} as const;
export type Law = (typeof Law)[keyof typeof Law];

export class Element {
  /** Place in the circuit's list. */
  readonly index: number;
  readonly partIndex: number;
  /** Which piece of the part: ``, `upper`, `lower`, `segment 0`, `input`, `output`, `plus-link`, `minus-link`. */
  readonly role: string;
  readonly from: number;
  readonly to: number;
  law: Law;
  a: number;
  b: number;
  curve: ArrayCurve | null = null;
  /** Volts across, amps through, and di/dv, as last evaluated. */
  v = 0;
  i = 0;
  slope = 0;

  constructor(
    at: { index: number; partIndex: number; role: string; from: number; to: number },
    law: Law,
    a: number,
    b: number,
  ) {
    this.index = at.index;
    this.partIndex = at.partIndex;
    this.role = at.role;
    this.from = at.from;
    this.to = at.to;
    this.law = law;
    this.a = a;
    this.b = b;
  }
}

/** Sets i and di/dv of an element for the volts across it. A tie is left alone: its current is not a function of its volts. */
export function evaluate(element: Element, v: number): void {
  element.v = v;
  switch (element.law) {
    case Law.conductance:
      element.i = element.a * v;
      element.slope = element.a;
      return;
    case Law.emf:
      element.i = element.a * (v - element.b);
      element.slope = element.a;
      return;
    case Law.warming:
      element.i = warmingCurrent(element.a, element.b, v);
      element.slope = 1 / (element.a + 3 * element.b * element.i * element.i);
      return;
    case Law.current:
      element.i = element.a;
      element.slope = 0;
      return;
    case Law.power:
      element.i = element.a / v;
      element.slope = -element.a / (v * v);
      return;
    case Law.powerSource:
      element.i = -element.a / v;
      element.slope = element.a / (v * v);
      return;
    case Law.array: {
      const { currentA, slopeSiemens } = currentAt(element.curve!, v);
      element.i = -currentA;
      element.slope = -slopeSiemens;
      return;
    }
    case Law.none:
      element.i = 0;
      element.slope = 0;
      return;
    default:
      return;
  }
}

function warmingCurrent(a: number, b: number, v: number): number {
  const target = Math.abs(v);
  // Both v/a and cbrt(v/b) bound the root from above; the smaller is within a factor 1.5 of it.
  return warmingCurrentNear(a, b, v, b > 0 ? Math.min(target / a, Math.cbrt(target / b)) : target / a);
}

/** The one real root of v = a i + b i^3 (a > 0, b >= 0), by Newton from |i| = `start` >= 0: after one step it falls to it monotonically. */
export function warmingCurrentNear(a: number, b: number, v: number, start: number): number {
  const target = Math.abs(v);
  if (b === 0) return v / a;
  let i = start;
  for (let step = 0; step < 40; step++) {
    const slope = a + 3 * b * i * i;
    const change = ((a + b * i * i) * i - target) / slope;
    i -= change;
    if (Math.abs(change) <= 2 ** -52 * i) break;
  }
  return v < 0 ? -i : i;
}

/** True when the element's law fixes the potential difference between its ends once its current is known. */
export function conducts(element: Element): boolean {
  switch (element.law) {
    case Law.conductance:
    case Law.emf:
    case Law.warming:
    case Law.array:
    case Law.powerSource:
    case Law.tie:
      return true;
    default:
      return false;
  }
}
