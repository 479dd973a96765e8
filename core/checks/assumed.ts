/** Says in a finding that its figures rest on assumed ones, and whether the verdict holds over their range. */
import { stringSource } from '../battery/stringSource.ts';
import type { StringPart } from '../job/part.ts';
import type { OperatingPoint } from '../network/answer.ts';
import { formatQuantity } from '../units/formatQuantity.ts';
import type { CheckContext, SolvedCase } from './checkContext.ts';

/**
 * `; rests on assumed resistanceOhm of S1 (5 mΩ, between 3 and 8 mΩ) …`, or nothing when every battery figure was given.
 * Only figures with a range are told: the first two by the width of their range.
 */
export function assumedSources(point: OperatingPoint): string {
  const ranged = point.assumptions.flatMap(({ part, field, value, unit, range }) =>
    part !== null && range !== null && typeof value === 'number' && range[1] > range[0]
      ? [{ part, field, value, unit, range, width: (range[1] - range[0]) / Math.abs(value) }]
      : [],
  );
  if (ranged.length === 0) return '';
  ranged.sort((a, b) => b.width - a.width || (a.part < b.part ? -1 : 1));
  const told = ranged.slice(0, 2).map(({ part, field, value, unit, range: [low, high] }) => {
    const text = (figure: number) => formatQuantity({ value: figure, unit, digits: 3 });
    return `${field} of ${part} (${text(value)}, may be ${text(low)} to ${text(high)})`;
  });
  return `; this rests on assumed figures, first of all ${told.join(' and ')}`;
}

/**
 * The strings of a case as stiff as their assumed figures allow: highest rest volts, lowest resistance. Strings whose figures
 * were measured or taken from a label stay as they are; empty where all are.
 */
export function stiffestStrings(context: CheckContext, one: SolvedCase, model: 'slow' | 'fast'): readonly StringPart[] {
  return one.parts.flatMap((part) => {
    if (part.kind !== 'string') return [];
    const { emfV, resistanceOhm } = stringSource(part, {
      model,
      ambientDegC: one.ambientDegC,
      tables: context.tables.chemistry,
    });
    const isAssumed = ({ origin }: { origin: string }) => origin === 'default' || origin === 'guess';
    if (!isAssumed(emfV) && !isAssumed(resistanceOhm)) return [];
    return [
      {
        ...part,
        emfV: isAssumed(emfV) ? emfV.high : emfV.value,
        resistanceOhm: isAssumed(resistanceOhm) ? resistanceOhm.low : resistanceOhm.value,
      },
    ];
  });
}

/** What the stiffest strings make of a failure: `holds` says whether it would then pass. */
export function overRange(holds: boolean | undefined): string {
  if (holds === undefined) return '';
  return holds
    ? '; with the best figures that may be assumed it would hold: measure the strings'
    : ', and it fails with the best of them too';
}
