/** Parts against the volts and the current that they are made for. */
import { describe, expect, test } from 'vitest';
import { battery, check, found, gaps, oneCircuit, passes } from './checksJob.ts';

describe('volts-rating-low', () => {
  const charger = { id: 'C1', kind: 'charger', plus: 'Q', minus: 'N', outputA: 10, setpointV: 14.4 };
  const rated = (ratingV: number | undefined, more: Parameters<typeof oneCircuit>[0]['more'] = [charger]) =>
    check(oneCircuit({ fuse: { ratingV }, more }));

  test('a fuse rated at exactly the charge volts passes', () => {
    const report = rated(14.4);
    expect(found(report, 'volts-rating-low')).toEqual([]);
    expect(passes(report, 'volts-rating-low')).toBe(1);
  });

  test('a fuse rated below the charge volts is a stop, although the bank rests lower', () => {
    const [finding] = found(rated(14), 'volts-rating-low');
    expect(finding).toMatchObject({
      severity: 'stop',
      parts: ['F1'],
      measured: { value: 14.4, unit: 'V' },
      limit: { value: 14, unit: 'V' },
    });
    expect(finding!.message).toContain('set-point of C1');
    expect(finding!.basis).toContain('33 CFR 183.455(d)');
  });

  test('a fuse of no stated volts is not checked', () => {
    const report = rated(undefined);
    expect(gaps(report, 'volts-rating-low')).toEqual(['ratingV of fuse F1']);
    expect(passes(report, 'volts-rating-low')).toBe(0);
  });

  test('without a charger the solved volts count, of strings in series their sum', () => {
    const parts = [
      battery('LOW', { plus: 'X' }),
      battery('HIGH', { minus: 'X' }),
      { id: 'F1', kind: 'fuse', from: 'P', to: 'L', ratingA: 10, ratingV: 20 },
      { id: 'L1', kind: 'load', plus: 'L', minus: 'N', currentA: 1 },
    ];
    const [finding] = found(check({ parts }), 'volts-rating-low');
    expect(finding!.measured.value).toBeCloseTo(26.4, 1);
    expect(finding!.message).toContain('solved in case as-drawn');
  });

  test('breakers, switches and busbars are judged as fuses are', () => {
    const more = [
      charger,
      { id: 'S1', kind: 'switch', from: 'Q', to: 'X', ratingV: 12 },
      { id: 'K1', kind: 'breaker', from: 'X', to: 'Y', ratingA: 10, ratingV: 12 },
      { id: 'BAR', kind: 'busbar', junctions: ['Y', 'Z'], ratingV: 12 },
    ];
    expect(found(rated(32, more), 'volts-rating-low').map(({ parts }) => parts[0])).toEqual(['S1', 'K1', 'BAR']);
  });

  const arrayJob = (array: Record<string, unknown>, site: Record<string, unknown>, ratingV: number) =>
    check({
      site,
      parts: [
        battery('B1'),
        {
          id: 'A1',
          kind: 'array',
          plus: 'X',
          minus: 'Y',
          modulesInSeries: 2,
          stringsInParallel: 1,
          vocV: 42,
          iscA: 9,
          vmpV: 34,
          impA: 8.5,
          ...array,
        },
        { id: 'F1', kind: 'fuse', from: 'X', to: 'Z', ratingA: 15, ratingV },
        {
          id: 'K1',
          kind: 'controller',
          from: { plus: 'Z', minus: 'Y' },
          to: { plus: 'P', minus: 'N' },
          type: 'mppt',
          outputA: 30,
          maxInputV: 150,
          setpointV: 14.2,
        },
      ],
    });

  test('a fuse in an array lead has the open-circuit volts of the coldest air across it', () => {
    // 2 x 42 V x (1 + 0.003 x 45) = 95.34 V.
    const site = { ambientMinDegC: -20 };
    expect(passes(arrayJob({ vocPerDegC: -0.003 }, site, 95.34), 'volts-rating-low')).toBe(1);
    const [finding] = found(arrayJob({ vocPerDegC: -0.003 }, site, 90), 'volts-rating-low');
    expect(finding!.measured.value).toBeCloseTo(95.34, 9);
  });

  test('without the coefficient or the coldest air it can fail, but never pass', () => {
    expect(found(arrayJob({}, { ambientMinDegC: -20 }, 80), 'volts-rating-low')).toHaveLength(1); // 84 V at 25 °C
    const noBeta = arrayJob({}, { ambientMinDegC: -20 }, 100);
    expect(gaps(noBeta, 'volts-rating-low')).toEqual(['vocPerDegC of array A1']);
    expect(passes(noBeta, 'volts-rating-low')).toBe(0);
    expect(gaps(arrayJob({ vocPerDegC: -0.003 }, {}, 100), 'volts-rating-low')).toEqual(['ambientMinDegC of the site']);
  });
});

describe('rating-under-current', () => {
  const through = (part: Record<string, unknown>, currentA = 100) =>
    check({
      parts: [
        battery('B1'),
        { id: 'X1', ...part } as { id: string; kind: string },
        { id: 'L1', kind: 'load', plus: 'L', minus: 'N', currentA },
      ],
    });
  const kinds = [
    { kind: 'switch', from: 'P', to: 'L' },
    { kind: 'busbar', junctions: ['P', 'L'] },
    { kind: 'diode', from: 'P', to: 'L', forwardV: 0.5 },
  ];

  test.each(kinds)(
    'a $kind at exactly its rating passes, above it is a thing to fix, without a rating not checked',
    (part) => {
      expect(passes(through({ ...part, ratingA: 100 }), 'rating-under-current')).toBe(1);
      expect(found(through({ ...part, ratingA: 99 }), 'rating-under-current')[0]).toMatchObject({
        severity: 'fix',
        parts: ['X1'],
        limit: { value: 99, unit: 'A' },
      });
      const report = through(part);
      expect(gaps(report, 'rating-under-current')).toEqual([`ratingA of ${part.kind} X1`]);
      expect(passes(report, 'rating-under-current')).toBe(0);
    },
  );

  test('of a busbar its fullest segment counts', () => {
    const parts = [
      battery('B1'),
      { id: 'BAR', kind: 'busbar', junctions: ['A', 'P', 'C'], ratingA: 70 },
      { id: 'L1', kind: 'load', plus: 'A', minus: 'N', currentA: 80 },
      { id: 'L2', kind: 'load', plus: 'C', minus: 'N', currentA: 60 },
    ];
    const [finding] = found(check({ parts }), 'rating-under-current');
    expect(finding!.measured.value).toBeCloseTo(80, 9);
    expect(finding!.message).toContain('fullest segment');
  });

  test('an open switch is not judged by the nothing that it carries', () => {
    const cases = [{ id: 'only', set: { X1: { state: 'open' } } }];
    const parts = [
      battery('B1'),
      { id: 'X1', kind: 'switch', from: 'P', to: 'L', ratingA: 1 },
      { id: 'L1', kind: 'load', plus: 'L', minus: 'N', currentA: 100 },
    ];
    const report = check({ parts, cases });
    expect(found(report, 'rating-under-current')).toEqual([]);
    expect(passes(report, 'rating-under-current')).toBe(0);
  });
});

describe('shunt-small', () => {
  const shunted = (currentA: number) =>
    check({
      parts: [
        battery('B1'),
        { id: 'SH', kind: 'shunt', from: 'P', to: 'L', ratingA: 300, ratingMv: 50 },
        { id: 'L1', kind: 'load', plus: 'L', minus: 'N', currentA },
      ],
    });

  test('exactly two thirds of the rating for long pass, and exactly the rating is a look, more a thing to fix', () => {
    expect(passes(shunted(200), 'shunt-small')).toBe(1);
    expect(found(shunted(201), 'shunt-small')[0]).toMatchObject({ severity: 'look', basisStatus: 'common-practice' });
    expect(found(shunted(300), 'shunt-small')[0]!.severity).toBe('look');
    expect(found(shunted(301), 'shunt-small')[0]).toMatchObject({ severity: 'fix', limit: { value: 300, unit: 'A' } });
  });
});
