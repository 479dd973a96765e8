/** What the checks say of the collected check values of protection; T-numbers name the row. */
import { describe, expect, it } from 'vitest';
import { check, found, passes, type RawPart } from '../core/checksJob.ts';

describe('T21: 12.8 V behind 6 mΩ, 10 m out and back of 2.5 mm² at 7.41 mΩ/m, 83.0 A at the far end', () => {
  const run = (fuse: Record<string, unknown>) =>
    check({
      parts: [
        {
          id: 'B1',
          kind: 'string',
          plus: 'P',
          minus: 'N',
          chemistry: 'lfp',
          blocksInSeries: 1,
          blockNominalV: 12.8,
          capacityAh: 100,
          emfV: 12.8,
          resistanceOhm: 0.006,
        },
        { id: 'F1', kind: 'fuse', from: 'P', to: 'Q', resistanceOhm: 0, ...fuse },
        {
          id: 'RUN',
          kind: 'pair',
          from: { plus: 'Q', minus: 'N' },
          to: { plus: 'L', minus: 'M' },
          lengthM: 10,
          size: '2.5 mm2',
          resistanceOhm: 0.0741,
        },
        { id: 'L1', kind: 'load', plus: 'L', minus: 'M', currentA: 10 },
      ],
    });

  it('a 25 A gG needs 110 A to be sure in 5 s: too weak, a look since its band is generic', () => {
    const [finding] = found(run({ type: 'gG', ratingA: 25 }), 'fault-too-weak');
    expect(finding!.severity).toBe('look');
    // Printed to a tenth.
    expect(Math.abs(finding!.measured.value - 83)).toBeLessThan(0.05);
    expect(finding!.limit.value).toBeCloseTo(110, 3);
    expect(finding!.basisStatus).toBe('from-memory');
  });

  it('a 20 A blade at 4.15 times its rating opens in time', () => {
    const report = run({ type: 'blade', ratingA: 20 });
    expect(found(report, 'fault-too-weak')).toEqual([]);
    expect(passes(report, 'fault-too-weak')).toBe(1);
  });
});

describe('T6: six 6 V blocks of 2400 A each, two in series, three strings side by side', () => {
  const bank = (interruptA: number) => {
    const strings = [1, 2, 3].map(
      (n): RawPart => ({
        id: `S${n}`,
        kind: 'string',
        plus: 'P',
        minus: 'N',
        chemistry: 'flooded',
        blocksInSeries: 2,
        blockNominalV: 6,
        capacityAh: 200,
        emfV: 12.7,
        shortCircuitA: 2400,
      }),
    );
    const main = { id: 'F1', kind: 'fuse', from: 'P', to: 'Q', ratingA: 300, resistanceOhm: 0, interruptA };
    return check({ parts: [...strings, main, { id: 'L1', kind: 'load', plus: 'Q', minus: 'N', currentA: 50 }] });
  };

  it('the main fuse has to break 7200 A: 5000 A are too little, 7200 A will do', () => {
    const [finding] = found(bank(5000), 'interrupt-too-low');
    expect(finding).toMatchObject({ severity: 'stop', limit: { value: 5000, unit: 'A' } });
    expect(finding!.measured.value).toBeCloseTo(7200, 6);
    expect(passes(bank(7200), 'interrupt-too-low')).toBe(1);
  });
});

describe('T14: equal strings of 12.8 V behind 6 mΩ, each behind its fuse, the last with 1 mΩ more', () => {
  it.each([
    [4, 4267],
    [3, 3200],
  ])('of %d the fuse of the last has to break the %d A that the others send back', (count, backA) => {
    const strings = Array.from({ length: count }, (_, k) => k + 1).flatMap((n): RawPart[] => [
      {
        id: `S${n}`,
        kind: 'string',
        plus: `p${n}`,
        minus: 'N',
        chemistry: 'lfp',
        blocksInSeries: 1,
        blockNominalV: 12.8,
        capacityAh: 100,
        emfV: 12.8,
        resistanceOhm: 0.006,
      },
      {
        id: `F${n}`,
        kind: 'fuse',
        from: `p${n}`,
        to: 'bar',
        ratingA: 200,
        resistanceOhm: n === count ? 0.001 : 0,
        interruptA: n === count ? 2000 : 20_000,
      },
    ]);
    const load = { id: 'L1', kind: 'load', plus: 'bar', minus: 'N', currentA: 5 };
    const [finding] = found(check({ parts: [...strings, load] }), 'interrupt-too-low');
    expect(finding!.parts).toEqual([`F${count}`]);
    // Printed to whole amperes.
    expect(Math.abs(finding!.measured.value - backA)).toBeLessThan(0.5);
  });
});

describe('T23: selectivity by the ratio of the ratings', () => {
  const panel = (upA: number, downA: number, type?: string) =>
    check({
      parts: [
        {
          id: 'B1',
          kind: 'string',
          plus: 'P',
          minus: 'N',
          chemistry: 'lfp',
          blocksInSeries: 1,
          blockNominalV: 12.8,
          capacityAh: 100,
        },
        { id: 'UP', kind: 'fuse', from: 'P', to: 'BAR', ratingA: upA, type },
        { id: 'L1', kind: 'load', plus: 'BAR', minus: 'N', currentA: 1 },
        { id: 'DOWN', kind: 'fuse', from: 'BAR', to: 'Q', ratingA: downA, type },
        { id: 'L2', kind: 'load', plus: 'Q', minus: 'N', currentA: 1 },
      ],
    });

  it('100 over 63 A gG is taken, 80 over 63 A is not, 100 over 50 A passes for any', () => {
    expect(found(panel(100, 63, 'gG'), 'trips-together')).toEqual([]);
    expect(found(panel(80, 63, 'gG'), 'trips-together')).toHaveLength(1);
    expect(passes(panel(100, 50), 'trips-together')).toBe(1);
  });
});
