/** Layouts and lead lengths worked by hand. */
import { describe, expect, it } from 'vitest';
import { caseById, layoutsOf, leadToleranceOf, parseJob } from '../../core/api.ts';
import { tables } from '../../data/index.ts';

/** Ohm square millimetres per metre of copper at 20 degC; 35 mm2; a lug. */
const [RHO, MM2, LUG_OHM] = [0.017241, 35, 0.0001] as const;
const BLOCK_OHM = 0.0025;
const perMetreOhm = RHO / MM2;

/** Blocks of 13.2 V and 2.5 mohm, each on two leads of the length given, with two lugs each. */
function camper(leadsM: readonly number[], emfV: readonly number[] = leadsM.map(() => 13.2)) {
  const parts = leadsM.flatMap((lengthM, k) => {
    const lead = { kind: 'cable', lengthM, resistanceOhm: perMetreOhm * lengthM, endOhm: 2 * LUG_OHM };
    const id = 'ABCD'[k]!;
    return [
      {
        id,
        kind: 'string',
        plus: `${id}+`,
        minus: `${id}-`,
        chemistry: 'lfp',
        blocksInSeries: 1,
        blockNominalV: 12.8,
        capacityAh: 100,
        emfV: emfV[k]!,
        resistanceOhm: BLOCK_OHM,
      },
      { ...lead, id: `${id} plus lead`, from: `${id}+`, to: 'bus+' },
      { ...lead, id: `${id} minus lead`, from: 'bus-', to: `${id}-` },
    ];
  });
  const load = { id: 'load', kind: 'load', plus: 'bus+', minus: 'bus-', currentA: 150 };
  const read = parseJob(
    JSON.stringify({ format: 'ohmwright-job', version: 1, practice: 'iec-land', parts: [...parts, load] }),
  );
  if (!read.ok) throw new Error(JSON.stringify(read.issues));
  return { job: read.value, tables, operatingCase: caseById(read.value, 'as-drawn')!, model: 'slow' } as const;
}

const branchOhm = (leadM: number) => BLOCK_OHM + 2 * (perMetreOhm * leadM + 2 * LUG_OHM);

describe('two lithium blocks on leads of 0.5 m and 2.0 m (S03)', () => {
  it('the near lead may be as short as 1.529191 m for 5 % of deviation, and longer than the far one by as much', () => {
    const { leads } = leadToleranceOf({ ...camper([0.5, 2]), limit: 0.05 });
    // Shares go with 1/R: 2 R2/(R1 + R2) = 1.05 where R1 = R2 * 0.95/1.05; the other end where R1 = R2 * 1.05/0.95.
    const leadOf = (ohm: number) => ((ohm - BLOCK_OHM) / 2 - 2 * LUG_OHM) / perMetreOhm;
    const [near, far] = leads;
    expect(leads.map(({ string }) => string)).toEqual(['A', 'B']);
    expect(near!.lengthM).toBeCloseTo(0.5, 12);
    // Found to 1e-9 of the length.
    expect(near!.shortestM!).toBeCloseTo(leadOf((branchOhm(2) * 0.95) / 1.05), 7);
    expect(near!.longestM!).toBeCloseTo(leadOf((branchOhm(2) * 1.05) / 0.95), 7);
    expect(Math.abs(near!.shortestM! - 1.529191)).toBeLessThan(0.00001);
    expect(far!.shortestM!).toBeCloseTo(leadOf((branchOhm(0.5) * 0.95) / 1.05), 7);
    expect(far!.longestM!).toBeCloseTo(leadOf((branchOhm(0.5) * 1.05) / 0.95), 7);
  });

  it('leads both as long as the longer one share evenly and cost 65 mV', () => {
    const study = layoutsOf(camper([0.5, 2]))!;
    const drawn = study.layouts[0]!;
    const equal = study.layouts.find(({ kind }) => kind === 'equal-leads')!;
    // 88.41 and 61.59 A of 150: 118 % of a half.
    const nearA = (150 * branchOhm(2)) / (branchOhm(0.5) + branchOhm(2));
    expect(drawn.strings[0]!.currentA).toBeCloseTo(nearA, 9);
    expect(drawn.spread).toBeCloseTo(nearA / 75 - 1, 9);
    expect(drawn.lostW).toBeCloseTo(nearA ** 2 * branchOhm(0.5) + (150 - nearA) ** 2 * branchOhm(2), 9);
    expect(drawn.cableM).toBeCloseTo(2 * 0.5 + 2 * 2, 12);
    expect(equal.spread).toBeLessThan(1e-9);
    expect(equal.cableM).toBeCloseTo(4 * 2, 12);
    expect(equal.bankV).toBeCloseTo(13.2 - 75 * branchOhm(2), 9);
    expect(drawn.bankV).toBeCloseTo(13.2 - nearA * branchOhm(0.5), 9);
    expect(Math.round(1000 * (drawn.bankV - equal.bankV))).toBe(65);
  });
});

describe('leads of strings that no lead brings into line', () => {
  it('two others that differ by themselves leave no length for the third', () => {
    const { leads } = leadToleranceOf({ ...camper([0.5, 2, 1]), limit: 0.05 });
    expect(leads[2]).toMatchObject({ string: 'C', shortestM: null, longestM: null });
  });

  it('a string that is charged while its bank gives is not helped by its leads', () => {
    const { leads } = leadToleranceOf({ ...camper([1, 1, 1], [13.2, 13.2, 12.5]), limit: 0.3 });
    expect(leads[2]).toMatchObject({ string: 'C', shortestM: null, longestM: null });
  });

  it('a limit that the bank keeps without any lead has no shortest', () => {
    const { leads } = leadToleranceOf({ ...camper([1, 1]), limit: 0.4 });
    expect(leads[0]!.shortestM).toBe(0);
    // R1 = R2 * 1.4/0.6 at the other end.
    const longest = ((branchOhm(1) * 1.4) / 0.6 - branchOhm(1)) / (2 * perMetreOhm) + 1;
    expect(leads[0]!.longestM!).toBeCloseTo(longest, 6);
  });
});
