/** A figure with the band it honestly has, where it comes from, and what is printed beside it. */
import type { Origin, Part } from '../job/part.ts';
import { originOf } from '../job/part.ts';
import type { Spread } from '../tables/chemistryTables.ts';
import type { Basis } from '../tables/status.ts';

export interface Banded {
  readonly value: number;
  /** low <= value <= high, always. */
  readonly low: number;
  readonly high: number;
  readonly origin: Origin;
  readonly basis: Basis;
}

/** A table's figure as a default, in the unit and for the number of pieces that `scale` says (scale > 0). */
export function bandedDefault(spread: Spread, scale = 1): Banded {
  return {
    value: spread.value * scale,
    low: spread.low * scale,
    high: spread.high * scale,
    origin: 'default',
    basis: spread.basis,
  };
}

/** Half-widths of the band around an entered figure, as fractions of it, by where the figure comes from. */
export interface EntryBand {
  readonly measured: number;
  readonly label: number;
  readonly guess: number;
}

/**
 * A figure that the job itself gives (value > 0): the job's own `range` for the field is its band, else a band by origin
 * (common practice, no source).
 */
export function bandedEntry(part: Part, field: string, value: number, band: EntryBand): Banded {
  const origin = originOf(part, field);
  const range = part.range.get(field);
  if (range !== undefined) {
    const basis = entryBasis(origin, 'with its range from the job');
    return { value, low: Math.min(range[0], value), high: Math.max(range[1], value), origin, basis };
  }
  const half = origin === 'default' ? band.guess : band[origin];
  const basis = entryBasis(
    origin,
    `band of ${(100 * half).toFixed(half < 0.01 ? 2 : 0)} % either way by common practice`,
  );
  return { value, low: value * (1 - half), high: value * (1 + half), origin, basis };
}

function entryBasis(origin: Origin, band: string): Basis {
  return { source: 'SRC-JOB-ENTRY', text: `entered in the job (${origin}), ${band}`, status: 'common-practice' };
}
