/** Strings side by side: a fuse for each, and what the healthy ones send back into one that fails. */
import { assert, double, integer, property, record } from 'fast-check';
import { describe, expect, test } from 'vitest';
import { battery, check, found, gaps, passes, type RawPart } from './checksJob.ts';

interface BankFields {
  readonly count: number;
  /** Ids of strings without a fuse of their own. */
  readonly unfused?: readonly number[];
  readonly fuse?: Record<string, unknown>;
  readonly main?: boolean;
}

/**
 * Strings of 12.8 V and 5 mΩ behind a lead of 1 mΩ and a fuse each, on one bar with a load behind a main fuse. The 5 mΩ are in the
 * links between blocks, since a string's own resistance is less in the first second.
 */
function bank({ count, unfused = [], fuse = {}, main = true }: BankFields) {
  const strings = Array.from({ length: count }, (_, k): readonly RawPart[] => {
    const own = !unfused.includes(k);
    return [
      battery(`S${k}`, {
        plus: `P${k}`,
        emfV: 12.8,
        range: { emfV: [12.8, 12.8] },
        resistanceOhm: 1e-9,
        linkOhm: 0.005,
      }),
      ...(own
        ? [{ id: `F${k}`, kind: 'fuse', from: `P${k}`, to: `Q${k}`, ratingA: 200, resistanceOhm: 0, ...fuse }]
        : []),
      { id: `LEAD${k}`, kind: 'joint', from: own ? `Q${k}` : `P${k}`, to: 'BAR', resistanceOhm: 0.001 },
    ];
  });
  return check({
    parts: [
      ...strings.flat(),
      { id: 'MAIN', kind: main ? 'fuse' : 'switch', from: 'BAR', to: 'OUT', ratingA: 300 },
      { id: 'L1', kind: 'load', plus: 'OUT', minus: 'N', currentA: 10 },
    ],
  });
}

describe('string-unfused', () => {
  test('three strings with a fuse each pass', () => {
    expect(passes(bank({ count: 3 }), 'string-unfused')).toBe(1);
  });

  test('one of three without is not to be energised, one of two to be looked at', () => {
    const [three] = found(bank({ count: 3, unfused: [1] }), 'string-unfused');
    expect(three).toMatchObject({ severity: 'stop', parts: ['S0', 'S1', 'S2'], basisStatus: 'common-practice' });
    expect(three!.message).toContain('S1 has no fuse');
    expect(found(bank({ count: 2, unfused: [0, 1] }), 'string-unfused')[0]!.severity).toBe('look');
  });

  test('a main fuse behind the bar is none of theirs', () => {
    expect(found(bank({ count: 3, unfused: [0, 1, 2] }), 'string-unfused')[0]!.measured.value).toBe(3);
  });

  test('one fuse between two strings guards each from the other', () => {
    expect(passes(bank({ count: 2, unfused: [1] }), 'string-unfused')).toBe(1);
  });

  test('a lone string is not judged', () => {
    const report = bank({ count: 1, unfused: [0] });
    expect([found(report, 'string-unfused'), passes(report, 'string-unfused')]).toEqual([[], 0]);
  });
});

describe('backfeed-into-bad-string', () => {
  // E / (lead of the failed one + (5 + 1) mΩ / the others): 12.8 V / (1 + 6/3) mΩ = 4267 A of four, and so on.
  test.each([
    [4, 4266.667, 1422.222],
    [3, 3200, 1600],
    [2, 1828.571, 1828.571],
  ])('%s equal strings send %s A into the one that fails, %s A each', (count, sumA, eachA) => {
    const [finding] = found(bank({ count, fuse: { interruptA: 1000 } }), 'backfeed-into-bad-string');
    expect(finding).toMatchObject({
      severity: 'stop',
      limit: { value: 1000, unit: 'A' },
      basisStatus: 'common-practice',
    });
    // The strings keep a nanohm of their own.
    expect(finding!.measured.value).toBeCloseTo(sumA, 2);
    expect(finding!.message).toContain(`S1 sends ${Number((eachA / 1000).toPrecision(4))} kA`);
  });

  test('a fuse that breaks exactly the sum passes, a little less does not', () => {
    expect(passes(bank({ count: 3, fuse: { interruptA: 3200 } }), 'backfeed-into-bad-string')).toBe(3);
    expect(found(bank({ count: 3, fuse: { interruptA: 3199 } }), 'backfeed-into-bad-string')).toHaveLength(3);
  });

  test('an interrupt rating that is not given is not taken as enough', () => {
    const report = bank({ count: 3 });
    expect(passes(report, 'backfeed-into-bad-string')).toBe(0);
    expect(gaps(report, 'backfeed-into-bad-string')).toEqual(
      ['F0', 'F1', 'F2'].map((id) => `interruptA of fuse ${id}`),
    );
  });

  test('another string makes it worse, never better', () => {
    const sums = [2, 3, 4, 5].map(
      (count) => found(bank({ count, fuse: { interruptA: 1 } }), 'backfeed-into-bad-string')[0]!.measured.value,
    );
    expect(sums.slice(1).every((sumA, k) => sumA > sums[k]!)).toBe(true);
  });

  test('a string without a fuse of its own is told as such instead', () => {
    const report = bank({ count: 3, unfused: [0, 1, 2] });
    expect([found(report, 'backfeed-into-bad-string'), gaps(report, 'backfeed-into-bad-string')]).toEqual([[], []]);
  });
});

describe('the cable of a string that fails', () => {
  /** Three strings of 12.8 V behind 2 mΩ each; the first has a cable, and a fuse that opens after a tenth of a second. */
  const withCable = (size: string | undefined, fuse: Record<string, unknown> = {}) => {
    const strings = [0, 1, 2].flatMap((k): readonly RawPart[] => [
      battery(`S${k}`, {
        plus: `P${k}`,
        emfV: 12.8,
        range: { emfV: [12.8, 12.8] },
        resistanceOhm: 1e-9,
        linkOhm: 0.002,
      }),
      {
        id: `F${k}`,
        kind: 'fuse',
        from: `P${k}`,
        to: `Q${k}`,
        ratingA: 200,
        resistanceOhm: 0,
        interruptA: 20_000,
        ...fuse,
      },
      k === 0
        ? {
            id: 'LEAD',
            kind: 'cable',
            from: 'Q0',
            to: 'BAR',
            lengthM: 1,
            size,
            insulationDegC: 70,
            resistanceOhm: 0.001,
          }
        : { id: `LEAD${k}`, kind: 'joint', from: `Q${k}`, to: 'BAR', resistanceOhm: 0.0001 },
    ]);
    return check({ parts: [...strings, { id: 'L1', kind: 'load', plus: 'BAR', minus: 'N', currentA: 10 }] });
  };
  const opensInTenth = {
    curvePoints: [
      [1000, 0.05, 0.1],
      [20_000, 0.05, 0.1],
    ],
  };

  test('stands what the fuse lets through, or is not to be energised', () => {
    // 12.8 V / (1 + 2.1/2) mΩ = 6244 A for 0.1 s: 3.9 MA²s; k 115 gives 3.3 MA²s for 16 mm² (10 mm²: 1.3) and 8.3 for 25 mm².
    const [thin] = found(withCable('16 mm2', opensInTenth), 'backfeed-into-bad-string');
    expect(thin).toMatchObject({ severity: 'stop', parts: ['S0', 'LEAD', 'F0'] });
    expect(thin!.measured.value).toBeCloseTo((12.8 / 0.00205) ** 2 * 0.1, -2);
    expect(thin!.limit.value).toBeCloseTo((115 * 16) ** 2, 6);
    expect(passes(withCable('25 mm2', opensInTenth), 'backfeed-into-bad-string')).toBe(3);
  });

  test('without a size, or a time of the fuse that decides, it is asked about', () => {
    expect(gaps(withCable(undefined, opensInTenth), 'backfeed-into-bad-string')).toEqual(['size of cable LEAD']);
    expect(gaps(withCable('16 mm2'), 'backfeed-into-bad-string')).toEqual([
      'type of fuse F0: whether cable LEAD stands what it lets through',
    ]);
  });
});

describe('the current that the healthy strings send back', () => {
  const sumA = (count: number, leadOhm: number, stringOhm: number) => {
    const parts = Array.from({ length: count }, (_, k): readonly RawPart[] => [
      battery(`S${k}`, { plus: `P${k}`, emfV: 12.8, resistanceOhm: 1e-9, linkOhm: stringOhm }),
      { id: `F${k}`, kind: 'fuse', from: `P${k}`, to: `Q${k}`, ratingA: 200, resistanceOhm: 0, interruptA: 0.001 },
      { id: `LEAD${k}`, kind: 'joint', from: `Q${k}`, to: 'BAR', resistanceOhm: leadOhm },
    ]).flat();
    const report = check({ parts: [...parts, { id: 'L1', kind: 'load', plus: 'BAR', minus: 'N', currentA: 1 }] });
    return found(report, 'backfeed-into-bad-string')[0]!.measured.value;
  };

  test('never falls by another string, never rises by longer leads or older strings', () => {
    const figures = record({
      count: integer({ min: 2, max: 5 }),
      leadOhm: double({ min: 1e-4, max: 1e-2, noNaN: true }),
      stringOhm: double({ min: 1e-3, max: 3e-2, noNaN: true }),
    });
    assert(
      property(figures, ({ count, leadOhm, stringOhm }) => {
        const backA = sumA(count, leadOhm, stringOhm);
        expect(sumA(count + 1, leadOhm, stringOhm)).toBeGreaterThanOrEqual(backA);
        expect(sumA(count, 1.5 * leadOhm, stringOhm)).toBeLessThanOrEqual(backA);
        expect(sumA(count, leadOhm, 1.5 * stringOhm)).toBeLessThanOrEqual(backA);
      }),
      { numRuns: 12, seed: 7 },
    );
  });
});
