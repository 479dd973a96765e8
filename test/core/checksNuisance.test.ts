/** Fuses while something starts: the surge against the shortest melting time. */
import { describe, expect, test } from 'vitest';
import { check, found, gaps, oneCircuit, passes } from './checksJob.ts';

/** At 100 A it surely holds 10 s, at 200 A 1 s. */
const curvePoints = [
  [100, 10, 100],
  [200, 1, 5],
];

function starting(load: Record<string, unknown>, fuse: Record<string, unknown> = { curvePoints }) {
  const taker = { powerW: 200, minimumV: 5, surgeW: 1500, ...load };
  return check(oneCircuit({ fuse: { ratingA: 50, ...fuse }, load: taker }));
}

describe('nuisance-blow', () => {
  test('a start that lasts longer than the fuse surely holds it is worth a look', () => {
    const [finding] = found(starting({ surgeS: 20 }), 'nuisance-blow');
    expect(finding).toMatchObject({
      severity: 'look',
      parts: ['F1', 'L1'],
      measured: { value: 20, unit: 's' },
      limit: { unit: 's' },
    });
    // Between 100 and 200 A on log-log axes: between 10 and 1 s.
    expect(finding!.limit.value).toBeGreaterThan(1);
    expect(finding!.limit.value).toBeLessThan(10);
    expect(finding!.message).toContain("maker's points");
  });

  test('exactly as long as it holds passes', () => {
    const [finding] = found(starting({ surgeS: 20 }), 'nuisance-blow');
    expect(passes(starting({ surgeS: finding!.limit.value }), 'nuisance-blow')).toBe(1);
    expect(found(starting({ surgeS: finding!.limit.value * 1.001 }), 'nuisance-blow')).toHaveLength(1);
  });

  test('within its rating nothing of the fuse need be known', () => {
    expect(passes(starting({ surgeW: 600 }, {}), 'nuisance-blow')).toBe(1);
    expect(passes(starting({ surgeW: undefined }, {}), 'nuisance-blow')).toBe(0);
  });

  test('above it, how long the start lasts and how the fuse melts are asked for', () => {
    expect(gaps(starting({}), 'nuisance-blow')).toEqual(['surgeS of load L1: does fuse F1 hold while it starts?']);
    expect(gaps(starting({ surgeS: 2 }, {}), 'nuisance-blow')).toEqual([
      'type of fuse F1: does it hold while L1 starts?',
    ]);
    expect(passes(starting({}), 'nuisance-blow')).toBe(0);
  });

  test('a generic band stands in for the points, and says so', () => {
    const [finding] = found(starting({ surgeS: 30 }, { type: 'blade', ratingA: 40 }), 'nuisance-blow');
    expect(finding!.message).toContain('generic band');
    expect(finding!.basisStatus).toBe('from-memory');
  });

  test('a start that the wiring cannot bring is told by the rule about sagging volts', () => {
    const report = starting({ surgeW: 100_000, surgeS: 1 });
    expect(found(report, 'surge-sag')).toHaveLength(1);
    expect(found(report, 'nuisance-blow')).toEqual([]);
    expect(passes(report, 'nuisance-blow')).toBe(0);
  });
});
