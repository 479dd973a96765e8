/** Figures of a circuit that are moved from where the job has them, a part at a time. */
import { Defect } from '../job/issue.ts';
import type { PartId } from '../job/part.ts';
import type { Circuit } from './circuit.ts';
import { type Element, Law } from './element.ts';

/** A figure of a part as the circuit has it: for a string its links included, for a cable its terminations, cold. */
export interface Shift {
  readonly part: PartId;
  readonly quantity: 'resistanceOhm' | 'emfV' | 'currentA' | 'powerW';
}

/** Where a shift acts: each element takes its share of the change. */
export interface ShiftTarget {
  readonly element: Element;
  readonly share: number;
}

const LAWS: Readonly<Record<Shift['quantity'], readonly Law[]>> = {
  resistanceOhm: [Law.conductance, Law.emf, Law.warming],
  emfV: [Law.emf],
  currentA: [Law.current],
  powerW: [Law.power],
};

/**
 * The elements that a shift moves; the halves of a string with a midpoint share it, the segments of a bar each take it whole. Empty
 * where the part has no such figure in this case: it is off or open, or has no ohm at all (a zero-ohm part is no small resistance).
 */
export function shiftTargets(circuit: Circuit, { part, quantity }: Shift): readonly ShiftTarget[] {
  const index = circuit.parts.findIndex(({ id }) => id === part);
  if (index < 0) return [];
  const elements = circuit.elementsOfPart[index]!.filter(({ law }) => LAWS[quantity].includes(law));
  const share = circuit.parts[index]!.kind === 'busbar' ? 1 : 1 / elements.length;
  return elements.map((element) => ({ element, share }));
}

/** The figures of an element after a change of one of its quantities. Throws a `Defect` where a resistance is no longer positive. */
export function shifted(
  { law, a, b }: Pick<Element, 'law' | 'a' | 'b'>,
  quantity: Shift['quantity'],
  change: number,
): { readonly a: number; readonly b: number } {
  switch (quantity) {
    case 'resistanceOhm': {
      const ohm = (law === Law.warming ? a : 1 / a) + change;
      if (!(ohm > 0)) throw new Defect(`a shifted resistance stays positive (${String(ohm)})`);
      return { a: law === Law.warming ? ohm : 1 / ohm, b };
    }
    case 'emfV':
      return { a, b: b + change };
    default:
      return { a: a + change, b };
  }
}
