/** A short in a network whose valve states are fixed: it is linear, so one solve with the factors at hand answers it. */
import type { Circuit } from '../network/circuit.ts';
import { type Element, Law } from '../network/element.ts';
import type { Assembled } from '../network/newton.ts';
import { tieCurrents } from '../network/ties.ts';

/** A set current that a junction is given and another gives back. */
export interface Injection {
  readonly plus: number;
  readonly minus: number;
  readonly currentA: number;
}

/** What an element's law was when the network was solved. */
export type ElementFigures = Pick<Element, 'law' | 'a' | 'b'>;

export interface FixedNetwork {
  readonly circuit: Circuit;
  readonly assembled: Assembled;
  /** Volts of each junction before the short, injections included. */
  readonly openVolts: Float64Array;
  readonly injections: readonly Injection[];
  readonly figures: (element: Element) => ElementFigures;
}

export interface Shorted {
  /** From the first junction to the second. */
  readonly currentA: number;
  readonly openV: number;
  readonly sourceOhm: number;
  readonly volts: (j: number) => number;
  /** From `from` to `to`; null where zero-ohm parts side by side leave it open. */
  readonly currentIn: (element: Element) => number | null;
}

/**
 * I = V_ab / Z_ab, and with the short every junction j stands at V_j - Z_j,ab I. Null where the two are one conductor, or nothing
 * defines the volts between them.
 */
export function shortBetween(network: FixedNetwork, from: number, to: number): Shorted | null {
  const { assembled, openVolts } = network;
  const { node, group, drifting, forest } = assembled.reduction;
  const [p, q] = [node[from]!, node[to]!];
  if (p === q || p === -2 || q === -2 || group[from] !== group[to] || drifting[from] === 1) return null;
  const x = solveInjected(assembled, [{ plus: from, minus: to, currentA: 1 }]);
  const sourceOhm = (p >= 0 ? x[p]! : 0) - (q >= 0 ? x[q]! : 0);
  const openV = openVolts[from]! - openVolts[to]!;
  const currentA = openV / sourceOhm;
  const volts = (j: number) => openVolts[j]! - (node[j]! >= 0 ? x[node[j]!]! * currentA : 0);
  const leads = { plus: to, minus: from, currentA };
  let ties: ReadonlyMap<Element, number> | null = null;
  const currentIn = (element: Element): number | null => {
    const figures = network.figures(element);
    if (node[element.from] === -2) return 0;
    if (figures.law !== Law.tie) return currentBy(element, figures, volts);
    if (forest.undetermined.has(element)) return null;
    ties ??= tiesOf(network, volts, leads);
    return ties.get(element) ?? 0;
  };
  return { currentA, openV, sourceOhm, volts, currentIn };
}

/** Change of each unknown for set currents. */
export function solveInjected(assembled: Assembled, injections: readonly Injection[]): Float64Array {
  const { node, size } = assembled.reduction;
  const b = new Float64Array(size);
  for (const { plus, minus, currentA } of injections) {
    if (node[plus]! >= 0) b[node[plus]!]! += currentA;
    if (node[minus]! >= 0) b[node[minus]!]! -= currentA;
  }
  const x = new Float64Array(size);
  assembled.solveLinear(b, x);
  return x;
}

/** Currents in all ties: what leaves a junction by its other elements, by injections and by the short arrives by its ties. */
function tiesOf(
  { circuit, assembled, injections, figures }: FixedNetwork,
  volts: (j: number) => number,
  short: Injection,
): ReadonlyMap<Element, number> {
  const leaving = new Float64Array(circuit.junctions.length);
  const carry = (from: number, to: number, currentA: number): void => {
    leaving[from]! += currentA;
    leaving[to]! -= currentA;
  };
  for (const element of assembled.active) carry(element.from, element.to, currentBy(element, figures(element), volts));
  for (const { plus, minus, currentA } of [...injections, short]) carry(minus, plus, currentA);
  const currents = new Map<Element, number>();
  tieCurrents(assembled.reduction.forest, leaving, currents);
  return currents;
}

export function currentBy(
  { from, to }: Pick<Element, 'from' | 'to'>,
  { law, a, b }: ElementFigures,
  volts: (j: number) => number,
): number {
  switch (law) {
    case Law.emf:
      return a * (volts(from) - volts(to) - b);
    case Law.conductance:
      return a * (volts(from) - volts(to));
    case Law.current:
      return a;
    default:
      return 0;
  }
}
