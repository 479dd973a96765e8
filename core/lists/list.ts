/** Lists for the bench and the shop: rows of text cells under headings. */
import type { CheckedJob } from '../job/job.ts';
import type { PartId } from '../job/part.ts';
import type { OperatingPoint } from '../network/answer.ts';
import type { Tables } from '../tables/tables.ts';
import { numberText } from '../units/numberText.ts';

/** Every row has one cell for each heading; an empty cell is a figure that the job does not give. */
export interface List {
  readonly headings: readonly string[];
  readonly rows: readonly (readonly string[])[];
}

/** Results only; nothing is solved here. */
export interface ListInput {
  readonly job: CheckedJob;
  readonly tables: Tables;
  readonly points: readonly OperatingPoint[];
}

/** What a part carries at most, and in which case. */
export interface WorstCurrent {
  readonly currentA: string;
  readonly case: string;
}

/** Over the cases with a proved answer; both empty where no case determines it. */
export function worstCurrent(points: readonly OperatingPoint[], id: PartId): WorstCurrent {
  let worst: { readonly amps: number; readonly case: string } | undefined;
  for (const { outcome, proof, parts, case: name } of points) {
    const amps = outcome === 'solved' && proof.holds ? parts.get(id)?.currentA : undefined;
    if (typeof amps !== 'number') continue;
    if (worst === undefined || Math.abs(amps) > worst.amps) worst = { amps: Math.abs(amps), case: name };
  }
  return worst === undefined
    ? { currentA: '', case: '' }
    : { currentA: numberText({ value: worst.amps }), case: worst.case };
}

/** A figure as it was given, or nothing. */
export function given(value: number | undefined): string {
  return value === undefined ? '' : numberText({ value, digits: 6 });
}
