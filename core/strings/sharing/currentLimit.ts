/** What a string may give and take: its own figures first, else what its chemistry allows. */
import type { Banded } from '../../battery/banded.ts';
import { currentLimits } from '../../battery/limits.ts';
import { originOf, type StringPart } from '../../job/part.ts';
import type { ChemistryTables } from '../../tables/chemistryTables.ts';
import type { CurrentLimit } from '../answer.ts';

/** A limit each way, amperes, both positive; null where neither the job nor the tables know one. */
export interface StringLimits {
  readonly discharge: CurrentLimit | null;
  readonly charge: CurrentLimit | null;
}

/**
 * Continuous limits of a string: `maxDischargeA` and `maxChargeA` of the job, else rate × capacity of its chemistry
 * (`dischargeRate`, `chargeRateMax` in `data/chemistry/limits.csv`).
 */
export function stringLimits(string: StringPart, tables: ChemistryTables): StringLimits {
  const known = currentLimits(string, tables);
  return {
    discharge: entered(string, 'maxDischargeA') ?? ofChemistry(known.dischargeA),
    charge: entered(string, 'maxChargeA') ?? ofChemistry(known.chargeMaxA),
  };
}

/** The limit for the direction of a current; that of discharge where there is none. */
export function limitFor(limits: StringLimits, currentA: number | null): CurrentLimit | null {
  return currentA !== null && currentA < 0 ? limits.charge : limits.discharge;
}

/** Whether a current is beyond the limit for its direction; exactly at it is not. */
export function isBeyond(limits: StringLimits, currentA: number | null): boolean {
  const limit = limitFor(limits, currentA);
  return limit !== null && currentA !== null && Math.abs(currentA) > limit.limitA * (1 + ROUNDING);
}
/** What solving may add to a current that is at its limit, as a fraction of it. */
const ROUNDING = 1e-9;

function entered(string: StringPart, name: 'maxDischargeA' | 'maxChargeA'): CurrentLimit | null {
  const limitA = string[name];
  if (limitA === undefined) return null;
  const origin = originOf(string, name);
  const status = origin === 'guess' ? 'from-memory' : 'published';
  const text = `${name} of string ${string.id} as entered (${origin})`;
  return { limitA, basis: { source: 'SRC-JOB-ENTRY', text, status } };
}

function ofChemistry(limit: Banded | undefined): CurrentLimit | null {
  return limit === undefined ? null : { limitA: limit.value, basis: limit.basis };
}
