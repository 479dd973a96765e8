/** The terminals that a volt walk can start from and go through. */

import type { JunctionId, PartId, StringPart } from '../job/part.ts';
import type { OperatingPoint, PartAnswer } from '../network/answer.ts';
import { polesOf, type SinglePart } from '../network/wiring.ts';
import { stringFigures } from './stringFigures.ts';

/** A pair of terminals that gives current. */
export interface SourcePort {
  readonly part: PartId;
  readonly plus: JunctionId;
  readonly minus: JunctionId;
  /** Rest volts of a string; of any other source the volts that it holds. */
  readonly emfV: number;
  /** Lost inside to its own resistance; undefined for a source without any. */
  readonly sagV: number | undefined;
  /** Out of its plus. */
  readonly currentA: number | null;
}

/** A pair of terminals that takes current. */
export interface LoadPort {
  readonly part: PartId;
  readonly plus: JunctionId;
  readonly minus: JunctionId;
  readonly voltageV: number;
  /** Into its plus. */
  readonly currentA: number | null;
}

/**
 * Every way to take a source: most have one; a string with a midpoint also its lower and its upper half. Empty where the
 * network does not define its volts.
 */
export function sourcePorts(part: SinglePart, point: OperatingPoint): readonly SourcePort[] {
  const answer = point.parts.get(part.id);
  if (answer === undefined) return [];
  if (part.kind === 'string') return stringPorts(part, answer, point);
  const poles = polesOf(part).find(({ role }) => role === 'source');
  if (poles === undefined) return [];
  const { plus, minus } = poles;
  const { voltageV } = answer;
  return voltageV === null
    ? []
    : [{ part: part.id, plus, minus, emfV: voltageV, sagV: undefined, currentA: answer.currentA }];
}

function stringPorts(string: StringPart, answer: PartAnswer, point: OperatingPoint): readonly SourcePort[] {
  const figures = stringFigures(string, point);
  const { voltageV, currentA } = answer;
  if (figures === undefined || voltageV === null || currentA === null) return [];
  const { emfV, ohm } = figures;
  const { id, plus, minus, midpoint } = string;
  if (midpoint === undefined) return [{ part: id, plus, minus, emfV, sagV: currentA * ohm, currentA }];
  // The halves may carry different currents; the answer's is that of the upper one.
  const halfV = emfV / 2;
  const lowerV = voltsBetween(point, midpoint, minus);
  if (lowerV === null) return [];
  const lower = { part: id, plus: midpoint, minus, emfV: halfV, ...sagOf(halfV - lowerV, ohm / 2) };
  const upper = { part: id, plus, minus: midpoint, emfV: halfV, sagV: (currentA * ohm) / 2, currentA };
  return [{ part: id, plus, minus, emfV, sagV: upper.sagV + lower.sagV, currentA }, lower, upper];
}

function sagOf(sagV: number, ohm: number): { readonly sagV: number; readonly currentA: number | null } {
  return { sagV, currentA: ohm > 0 ? sagV / ohm : null };
}

/** The current in the lower half of a string with a midpoint, out towards the midpoint; null where not defined. */
export function lowerHalfA(string: StringPart, point: OperatingPoint): number | null {
  if (string.midpoint === undefined) return point.parts.get(string.id)?.currentA ?? null;
  const figures = stringFigures(string, point);
  const lowerV = voltsBetween(point, string.midpoint, string.minus);
  return figures === undefined || lowerV === null ? null : sagOf(figures.emfV / 2 - lowerV, figures.ohm / 2).currentA;
}

function voltsBetween({ junctions }: OperatingPoint, plus: JunctionId, minus: JunctionId): number | null {
  const [high, low] = [junctions.get(plus), junctions.get(minus)];
  return typeof high === 'number' && typeof low === 'number' ? high - low : null;
}

/** What the part takes as a load: a load or inverter, a string under charge, the input of a controller or converter. */
export function loadPort(part: SinglePart, point: OperatingPoint): LoadPort | undefined {
  const answer = point.parts.get(part.id);
  if (answer === undefined) return undefined;
  const port = (
    plus: JunctionId,
    minus: JunctionId,
    voltageV: number | null | undefined,
    a: number | null | undefined,
  ) => (typeof voltageV === 'number' ? { part: part.id, plus, minus, voltageV, currentA: a ?? null } : undefined);
  switch (part.kind) {
    case 'load':
    case 'inverter':
      return port(part.plus, part.minus, answer.voltageV, answer.currentA);
    case 'string':
      return answer.currentA === null || answer.currentA >= 0
        ? undefined
        : port(part.plus, part.minus, answer.voltageV, -answer.currentA);
    case 'controller':
    case 'converter':
      return port(part.from.plus, part.from.minus, answer.inputV, answer.inputA);
    default:
      return undefined;
  }
}
