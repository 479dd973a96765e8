/** The checks of strings as one bank on worked banks, with the sums beside them. Banks are invented. */
import { describe, expect, test } from 'vitest';
import { battery, check, found, passes, type RawPart } from '../core/checksJob.ts';

const joint = (id: string, from: string, to: string, resistanceOhm: number): RawPart => ({
  id,
  kind: 'joint',
  from,
  to,
  resistanceOhm,
});

/**
 * A ridge cabin: three 24 V strings of two 12 V blocks, each with 1.930 mohm of lead, link and joints. A and B are old (6 mohm and
 * 12.55 V a block), C is a year old (3 mohm, 12.70 V).
 *
 *   R_A = R_B = 2 x 6 + 1.930 = 13.930 mohm, R_C = 7.930 mohm
 *   bus at rest: (2 x 25.10/13.930 + 25.40/7.930) / (2/13.930 + 1/7.930) = 25.240 V
 *   C gives (25.40 - 25.240)/7.930 mohm = 20.14 A, A and B take 10.07 A each, with nothing switched on
 *   heat: 25.40 x 20.14 - 2 x 25.10 x 10.07 = 0.30 V x 20.14 A = 6.04 W
 */
describe('a ridge cabin whose third string was replaced last year', () => {
  const leadOhm = 0.00193;
  const string = (id: string, blockOhm: number, blockV: number, ageYears: number): readonly RawPart[] => [
    battery(id, {
      plus: `${id}+`,
      chemistry: 'agm',
      blocksInSeries: 2,
      blockNominalV: 12,
      capacityAh: 150,
      emfV: 2 * blockV,
      resistanceOhm: 2 * blockOhm,
      ageYears,
    }),
    joint(`W-${id}`, `${id}+`, 'P', leadOhm),
  ];
  const cabin = (loadA: number, newV = 12.7) =>
    check({
      parts: [
        ...string('A', 0.006, 12.55, 7),
        ...string('B', 0.006, 12.55, 7),
        ...string('C', 0.003, newV, 1),
        { id: 'L1', kind: 'load', plus: 'P', minus: 'N', currentA: loadA },
      ],
    });

  test('20 A flow between the strings with nothing switched on', () => {
    const [finding] = found(cabin(80), 'circulating-at-rest');
    expect(finding!.measured.value).toBeCloseTo(10.07, 2);
    expect(finding!.message).toBe(
      'With nothing switched on, A takes 10.07 A and B takes 10.07 A from C (20.14 A); 6.042 W turn to heat on the way.',
    );
  });

  test('C carries 57.55 A of the first 80 A, most of what is too much by its rest volts', () => {
    const [finding] = found(cabin(80), 'share-uneven');
    expect(finding!.message).toContain('String C gives 57.55 A of the 80 A');
    // It is 57.55 - 26.67 = 30.88 A above its third, and 20.14 A of that flow at rest.
    expect(finding!.message).toContain('with nothing switched on 20.14 A flow out of it already');
  });

  test('once rest volts meet it is the resistances alone: C 37.41 A', () => {
    const report = cabin(80, 12.55);
    expect(found(report, 'circulating-at-rest')).toEqual([]);
    expect(found(report, 'share-uneven')[0]!.message).toContain('String C gives 37.41 A of the 80 A');
  });

  test('six years apart is worth a look, and left to the solved shares', () => {
    expect(found(cabin(80), 'parallel-mix')[0]).toMatchObject({ severity: 'look', measured: { value: 6 } });
  });
});

/**
 * A hire boat: three 12 V blocks, 0.794 mohm of lead each. Two at 12.6 V, 5 mohm; one with a dead cell, 10.6 V, 8 mohm.
 *
 *   R = 5.794 and 8.794 mohm; I = (12.6 - 10.6)/(5.794/2 + 8.794) mohm = 171.1 A into the bad block, 85.54 A from each good one
 */
test('a hire boat with a dead cell: stop, isolate that block, do not charge', () => {
  const block = (id: string, emfV: number, resistanceOhm: number): readonly RawPart[] => [
    battery(id, { plus: `${id}+`, chemistry: 'agm', blockNominalV: 12, capacityAh: 100, emfV, resistanceOhm }),
    joint(`W-${id}`, `${id}+`, 'P', 0.000794),
  ];
  const parts = [...block('G1', 12.6, 0.005), ...block('G2', 12.6, 0.005), ...block('BAD', 10.6, 0.008)];
  const report = check({ parts });
  const [finding] = found(report, 'circulating-at-rest');
  expect(finding!.severity).toBe('stop');
  expect(finding!.measured.value).toBeCloseTo(171.1, 1);
  expect(finding!.message).toContain('BAD takes 171.1 A from G1 (85.54 A) and G2 (85.54 A)');
  expect(finding!.message).toContain(
    'that of the first moment and an upper bound, and falls as the bad block polarises',
  );
  expect(finding!.remedy).toContain('Isolate that block now: gas and heat hazard; do not charge it');
  expect(found(report, 'joining-surge')).toEqual([]);
});

/**
 * A sauna hut: three 12.8 V lithium blocks of 13.2 V and 2.5 mohm with 100 A limits; leads of 0.893 mohm (two of 0.5 m a pole) and
 * 1.881 mohm (1.5 m), 240 A.
 *
 *   G = 1/3.393 + 1/3.393 + 1/4.381 mohm: 86.5, 86.5 and 67.0 A with all in
 *   block 2 off: 240 x 4.381/(3.393 + 4.381) = 135.3 A in block 1; its 100 A allow 100 x (3.393 + 4.381)/4.381 = 177.4 A in all
 */
test('a sauna hut is fine until one block cuts out, then the rest follow', () => {
  const block = (id: string, leadOhm: number): readonly RawPart[] => [
    battery(id, { plus: `${id}+`, resistanceOhm: 0.0025, capacityAh: 100, maxDischargeA: 100 }),
    joint(`W-${id}`, `${id}+`, 'P', leadOhm),
  ];
  const hut = (currentA: number) =>
    check({
      parts: [
        ...block('B1', 0.000893),
        ...block('B2', 0.000893),
        ...block('B3', 0.001881),
        { id: 'L1', kind: 'load', plus: 'P', minus: 'N', currentA },
      ],
    });
  const [finding] = found(hut(240), 'one-out-overload');
  expect(finding!.severity).toBe('fix');
  expect(finding!.measured.value).toBeCloseTo((240 * 4.381) / (3.393 + 4.381), 6);
  expect(finding!.message).toContain('fine until one cuts out, then the rest follow, a cascade');
  expect(finding!.message).toContain('the largest that survives any one loss is 177.4 A');
  expect(passes(hut(177.4), 'one-out-overload')).toBe(1);
});

/**
 * A hill farm at absorption. 24 V: lower 14.09, upper 14.71 V: 620 mV apart, 310 mV off centre, 1.08 % of 28.80 V; 2.15 % if the
 * difference is taken of the total, 4.31 % of the mean half. 48 V: 14.32, 14.41, 13.62, 15.05 V from minus: the midpoint is 30 mV off,
 * blocks 3 and 4 lie 730 mV below and 700 mV above the mean of 14.35 V.
 */
describe('a hill farm on absorption', () => {
  const block = (id: string, minus: string, plus: string) =>
    battery(id, { chemistry: 'agm', blockNominalV: 12, emfV: undefined, resistanceOhm: undefined, minus, plus });
  const read = (junctions: readonly string[], blockV: readonly number[]) =>
    blockV.map((valueV, k) => ({
      id: `r${k}`,
      quantity: 'voltage',
      minus: junctions[k],
      plus: junctions[k + 1],
      valueV,
    }));
  const bank = (junctions: readonly string[], blockV: readonly number[]) =>
    check({
      parts: blockV.map((_, k) => block(`K${k + 1}`, junctions[k]!, junctions[k + 1]!)),
      readings: read(junctions, blockV),
    });

  test('one reading is 2.2 % or 4.3 %, so millivolts stand first and each base is named', () => {
    const [finding] = found(bank(['N', 'M', 'P'], [14.09, 14.71]), 'midpoint-off');
    expect(finding!.severity).toBe('fix');
    expect(finding!.measured.value).toBeCloseTo(0.31, 9);
    expect(finding!.message).toContain('620 mV apart (2.15 % of the total, 4.31 % of the mean half)');
    expect(finding!.message).toContain('310 mV off centre, 1.08 % of the 28.8 V across the whole');
  });

  test('a good midpoint hides two bad blocks', () => {
    const [finding] = found(bank(['N', 'J1', 'J2', 'J3', 'P'], [14.32, 14.41, 13.62, 15.05]), 'midpoint-off');
    expect(finding!.measured.value).toBeCloseTo(0.73, 9);
    expect(finding!.message).toContain('K3 at 13.62 V is 730 mV below the mean');
    expect(finding!.message).toContain('while the midpoint is only 30 mV off centre');
  });
});
