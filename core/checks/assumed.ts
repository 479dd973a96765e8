/** Says in a finding that its figures rest on assumed ones. */
import type { OperatingPoint } from '../network/answer.ts';
import { formatQuantity } from '../units/formatQuantity.ts';

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
