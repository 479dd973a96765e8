/** Banks for tests of a drift run: whole jobs of a few parts, and tables with a curve drawn for the purpose. */
import type { CheckedJob, CycleStep, DriftStudy, Tables } from '../../core/api.ts';
import { driftOf } from '../../core/api.ts';
import { tables } from '../../data/index.ts';
import type { PartValue } from './jobDraft.ts';
import { checked, jobOf } from './solveValue.ts';

export interface BankString {
  readonly id: string;
  readonly capacityAh: number;
  readonly resistanceOhm?: number;
  readonly stateOfCharge: number;
  readonly chemistry?: string;
  readonly blocksInSeries?: number;
  readonly midpoint?: string;
}

/** A string between P and N; of AGM blocks of 12 V unless said otherwise. */
export function stringPart({ chemistry = 'agm', blocksInSeries = 1, ...fields }: BankString): PartValue {
  const blockNominalV = chemistry === 'lfp' ? 12.8 : 12;
  return { kind: 'string', plus: 'P', minus: 'N', chemistry, blocksInSeries, blockNominalV, ...fields };
}

export type Case = { readonly id: string } & Record<string, unknown>;

/** Parts and cases at 25 degC, where every curve is at home. */
export function driftJob(parts: readonly PartValue[], cases: readonly Case[]): CheckedJob {
  const value = { ...jobOf(parts), cases: cases.map((one) => ({ ambientDegC: 25, ...one })) };
  return checked(value).job;
}

export function drifted(
  job: CheckedJob,
  cycle: readonly CycleStep[],
  { cycles = 1, stepS = 1800, from = tables }: { cycles?: number; stepS?: number; from?: Tables } = {},
): DriftStudy {
  return driftOf({ job, tables: from, request: { cycle, cycles, stepS } });
}

/** Iron phosphate cells with a rest voltage that is one straight line, and no loss of charge: what pencils can follow. */
export function straightTables(emptyV: number, fullV: number): Tables {
  const { chemistry } = tables;
  const basis = { source: 'SRC-JOB-ENTRY', text: 'drawn for a test', status: 'from-memory' } as const;
  const point = (stateOfCharge: number, value: number) => ({ stateOfCharge, value, low: value, high: value, basis });
  const lfp = { ...chemistry.emf.lfp, points: [point(0, emptyV), point(1, fullV)] };
  const kept = { at: 0, value: 1, low: 1, high: 1, basis };
  return {
    ...tables,
    chemistry: {
      ...chemistry,
      emf: { ...chemistry.emf, lfp },
      emfTemperature: { ...chemistry.emfTemperature, lfp: [] },
      chargeKept: { ...chemistry.chargeKept, lfp: [kept] },
    },
  };
}
