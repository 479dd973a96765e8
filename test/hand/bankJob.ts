/** Small jobs about banks: strings on leads of their own to common bars, and what is asked of them. */
import type { CheckedJob, OperatingCase, SharedString, SharingCase } from '../../core/api.ts';
import { caseById, parseJob } from '../../core/api.ts';

export type RawPart = Readonly<Record<string, unknown>> & { readonly id: string };

export interface RawString {
  readonly emfV: number;
  readonly ohm: number;
  readonly capacityAh?: number;
  readonly more?: Readonly<Record<string, unknown>>;
}

export function stringPart(
  id: string,
  poles: { plus: string; minus: string },
  { emfV, ohm, capacityAh, more }: RawString,
) {
  return {
    id,
    kind: 'string',
    ...poles,
    chemistry: 'agm',
    blocksInSeries: 1,
    blockNominalV: 12,
    capacityAh: capacityAh ?? 100,
    emfV,
    resistanceOhm: ohm,
    ...more,
  };
}

/** Strings side by side, S1, S2 …, each behind its own fuse F1, F2 … without resistance, to the bars `bus+` and `bus-`. */
export function star(strings: readonly RawString[]): readonly RawPart[] {
  return strings.flatMap((string, index) => {
    const n = index + 1;
    return [
      stringPart(`S${n}`, { plus: `p${n}`, minus: 'bus-' }, string),
      { id: `F${n}`, kind: 'fuse', from: `p${n}`, to: 'bus+', ratingA: 400 },
    ];
  });
}

export const load = (asks: Readonly<Record<string, unknown>>, poles = { plus: 'bus+', minus: 'bus-' }): RawPart => ({
  id: 'LOAD',
  kind: 'load',
  ...poles,
  ...asks,
});
/** A charger that always gives its limit: no string here comes near its volts. */
export const charger = (outputA: number): RawPart => ({
  id: 'CHG',
  kind: 'charger',
  plus: 'bus+',
  minus: 'bus-',
  outputA,
  setpointV: 60,
});

export function jobOf(parts: readonly RawPart[], cases?: readonly object[]): CheckedJob {
  const file = { format: 'ohmwright-job', version: 1, title: 'banks', practice: 'iec-land', parts };
  const read = parseJob(JSON.stringify(cases === undefined ? file : { ...file, cases }));
  if (!read.ok) throw new Error(JSON.stringify(read.issues));
  return read.value;
}

export function caseOf(job: CheckedJob, id = 'as-drawn'): OperatingCase {
  const found = caseById(job, id);
  if (found === undefined) throw new Error(`no case ${id}`);
  return found;
}

export function sharedOf(sharing: SharingCase, id: string): SharedString {
  const found = sharing.strings.find((string) => string.id === id);
  if (found === undefined) throw new Error(`no string ${id}`);
  return found;
}
