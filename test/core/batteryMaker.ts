/** Strings and arrays for tests, whole parts with only the interesting fields named. */
import type { ArrayPart, JunctionId, Origin, PartId, StringPart } from '../../core/job/part.ts';

const plus = 'P' as JunctionId;
const minus = 'N' as JunctionId;

export interface Marks {
  readonly origin?: Readonly<Record<string, Origin>>;
  readonly range?: Readonly<Record<string, readonly [number, number]>>;
}

function base(id: string, fields: object, marks: Marks) {
  return {
    id: id as PartId,
    label: undefined,
    note: undefined,
    locationTag: undefined,
    at: undefined,
    plus,
    minus,
    origin: new Map(Object.entries(marks.origin ?? {})),
    range: new Map(Object.entries(marks.range ?? {})),
    given: new Set(Object.keys(fields)),
  };
}

/** A 12 V 100 Ah AGM block unless said otherwise. */
export function makeString(fields: Partial<StringPart> = {}, marks: Marks = {}): StringPart {
  return {
    ...base('S1', fields, marks),
    kind: 'string',
    chemistry: 'agm',
    blocksInSeries: 1,
    blockNominalV: 12,
    capacityAh: 100,
    stateOfCharge: 1,
    temperatureDegC: undefined,
    ageYears: undefined,
    emfV: undefined,
    resistanceOhm: undefined,
    linkOhm: 0,
    linkSize: undefined,
    maxChargeA: undefined,
    maxDischargeA: undefined,
    shortCircuitA: undefined,
    midpoint: undefined,
    ...fields,
  };
}

/** One 36-cell module of 100 W unless said otherwise. */
export function makeArray(fields: Partial<ArrayPart> = {}): ArrayPart {
  return {
    ...base('PV1', fields, {}),
    kind: 'array',
    modulesInSeries: 1,
    stringsInParallel: 1,
    vocV: 22,
    iscA: 6,
    vmpV: 17.879,
    impA: 5.5944,
    vocPerDegC: undefined,
    iscPerDegC: undefined,
    pmpPerDegC: undefined,
    nominalCellDegC: undefined,
    tiltDeg: undefined,
    azimuthDeg: undefined,
    maxFuseA: undefined,
    ...fields,
  };
}
