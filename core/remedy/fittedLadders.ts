/** What is fitted where a part stands: a strap, a cover, a bolted post, a larger vent. */
import { together } from '../draft/edit.ts';
import { setField } from '../draft/fields.ts';
import type { PartId } from '../job/part.ts';
import { nameOf } from '../job/part.ts';
import { formatQuantity } from '../units/formatQuantity.ts';
import { type Bench, type Ladder, relabelled, stepped } from './candidate.ts';

export interface Fitting {
  readonly field: string;
  readonly value: boolean;
  /** `strapped down`, after the name of the part. */
  readonly words: string;
  readonly cost: string;
}

/** A yes-or-no figure of a part as it reads once something is fitted. */
export function fitted(bench: Bench, id: PartId, { field, value, words, cost }: Fitting): readonly Ladder[] {
  const part = bench.drawn(id);
  if (part === undefined) return [];
  const edit = relabelled(setField({ part: id, field, value }), `${nameOf(part)}: ${words}`);
  return [stepped([{ edit, cost, effort: 'joint', amount: 1, sameAnswers: true }])];
}

/** The opening or the fan of a battery space as large as the finding asks, said of every string that states one. */
export function moreAir(bench: Bench, ids: readonly PartId[]): readonly Ladder[] {
  const { limit } = bench.finding;
  const field = limit.unit === 'cm2' ? 'ventOpeningCm2' : 'ventAirM3PerH';
  const stating = ids.filter((id) => {
    const part = bench.drawn(id);
    return part?.kind === 'string' && part[field] !== undefined;
  });
  if (stating.length === 0) return [];
  const step = limit.unit === 'cm2' ? 1 : 0.1;
  // Rounded up, the dust of the sum aside.
  const value = Number((Math.ceil(Number((limit.value / step).toPrecision(9))) * step).toPrecision(9));
  const size = formatQuantity({ value, unit: limit.unit });
  const words = limit.unit === 'cm2' ? `inlet and outlet of ${size} each` : `a fan of ${size}`;
  const edit = together(
    `Space of ${ids.join(', ')}: ${words}`,
    stating.map((part) => setField({ part, field, value })),
  );
  return [stepped([{ edit, cost: words, effort: 'joint', amount: value, sameAnswers: true }])];
}
