/** Rest volts and resistance of a string as the solve took them. */
import type { StringPart } from '../job/part.ts';
import type { OperatingPoint } from '../network/answer.ts';

export interface StringFigures {
  /** Whole string at rest. */
  readonly emfV: number;
  /** Whole string, its links included. */
  readonly ohm: number;
}

/**
 * The string's own figures where the job gives them, else what the solve assumed and listed. `undefined` where the point is not
 * of this string's case.
 */
export function stringFigures(string: StringPart, point: OperatingPoint): StringFigures | undefined {
  const emfV = string.emfV ?? assumed(string, 'emfV', point);
  if (emfV === undefined) return undefined;
  const ohm = string.resistanceOhm ?? assumed(string, 'resistanceOhm', point) ?? ofShortCircuit(string, emfV);
  return ohm === undefined ? undefined : { emfV, ohm: ohm + string.linkOhm };
}

function assumed(string: StringPart, field: string, { assumptions }: OperatingPoint): number | undefined {
  const found = assumptions.find((one) => one.part === string.id && one.field === field);
  return typeof found?.value === 'number' ? found.value : undefined;
}

/** A rated short-circuit current settles the resistance of the first second: R = E / I. */
function ofShortCircuit({ shortCircuitA }: StringPart, emfV: number): number | undefined {
  return shortCircuitA === undefined ? undefined : emfV / shortCircuitA;
}
