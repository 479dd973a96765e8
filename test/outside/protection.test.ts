/**
 * Withstand, clearing and selectivity against values printed elsewhere. T-numbers are those of the collected list of check values; each
 * case names where its numbers come from.
 */
import { describe, expect, it } from 'vitest';
import {
  adiabaticTimeS,
  arcEnergy,
  BURN_CAL_PER_CM2,
  clearingOf,
  pulseShare,
  selectivityOf,
  smallestAreaMm2,
  surgeAgainstMelt,
  withstandFactorK,
  withstandOf,
} from '../../core/api.ts';
import { factorBetween } from '../../core/protection/withstand.ts';
import { tables } from '../../data/index.ts';
import { bandOf, cable, fuse } from '../core/protectionDevices.ts';

const { conductors, devices, practices } = tables;

/** Half of the last digit that stands in the list. */
const HUNDREDTH = 0.005;
const THOUSANDTH = 0.0005;

/** The factor, or a failed test. */
function k(request: Parameters<typeof withstandFactorK>[0]): number {
  const found = withstandFactorK(request, tables);
  if ('missing' in found) throw new Error(found.missing);
  return found.value;
}

describe('T1: k by the form of IEC 60364-5-54 annex A against the printed table 43A', () => {
  it.each([
    ['copper', 70, 160, 115.0, 115],
    ['copper', 90, 250, 143.08, 143],
    ['copper', 85, 220, 134.17, 134],
    ['copper', 60, 200, 140.94, 141],
    ['copper', 90, 160, 99.88, 100],
    ['aluminium', 70, 160, 76.03, 76],
    ['aluminium', 90, 250, 94.48, 94],
  ] as const)('%s from %d to %d °C: %d, printed %d', (metal, fromDegC, toDegC, worked, printed) => {
    const found = factorBetween({ metal, fromDegC, toDegC }, conductors);
    expect(Math.abs(found - worked)).toBeLessThan(HUNDREDTH);
    expect(Math.round(found)).toBe(printed);
  });

  it('every printed k in the table comes out of the form, to the whole number, but for silicone and large conductors to one', () => {
    expect(conductors.withstand.rows.length).toBe(9);
    for (const { metal, insulationDegC, finalDegC, k: printed } of conductors.withstand.rows) {
      const worked = factorBetween({ metal, fromDegC: insulationDegC, toDegC: finalDegC }, conductors);
      expect(Math.abs(worked - printed.value)).toBeLessThan(1);
    }
  });

  it('105 °C boat cable, not in the table: 134.8 where its maker says 250 °C, 87.6 otherwise', () => {
    const boat = { metal: 'copper', insulationDegC: 105, areaMm2: 50 } as const;
    expect(Math.abs(k({ ...boat, finalDegC: 250 }) - 134.78)).toBeLessThan(HUNDREDTH);
    expect(Math.abs(k(boat) - 87.6)).toBeLessThan(0.05);
  });

  it('a conductor that begins at 30 °C withstands 142.9', () => {
    expect(Math.abs(k({ metal: 'copper', insulationDegC: 70, areaMm2: 10, initialDegC: 30 }) - 142.9)).toBeLessThan(
      0.05,
    );
  });

  it('the printed figure is taken for the sizes it is printed for: 115 up to 300 mm², 103 above', () => {
    const plain = { metal: 'copper', insulationDegC: 70 } as const;
    expect(k({ ...plain, areaMm2: 300 })).toBe(115);
    expect(k({ ...plain, areaMm2: 400 })).toBe(103);
  });

  it('insulation as hot as the short may end leaves no k', () => {
    expect(withstandFactorK({ metal: 'copper', insulationDegC: 200, areaMm2: 10 }, tables)).toHaveProperty('missing');
  });
});

describe('adiabatic sums', () => {
  it('T2 (trade forum): 0.75 mm², k 115, 160 A: 0.2906 s, printed 0.29', () => {
    const timeS = adiabaticTimeS({ k: 115, areaMm2: 0.75, currentA: 160 });
    expect(Math.abs(timeS - 0.2906)).toBeLessThan(0.000_05);
  });

  it.each([
    ['T3 (Basic Electrical Installation Work, p. 262)', 200, 1.1],
    ['T3 (Basic Electrical Installation Work, p. 262)', 90, 0.495],
    ['T4 (engineering forum)', 328, 1.804],
    ['T4 (engineering forum)', 120, 0.66],
  ])('%s: %d A for 0.4 s with k 115 asks %d mm²', (_source, currentA, areaMm2) => {
    const i2t = currentA ** 2 * 0.4;
    expect(Math.abs(smallestAreaMm2({ i2t, k: 115 }) - areaMm2)).toBeLessThan(THOUSANDTH);
  });

  it('T20: 50 mm² of 105 °C copper up to 250 °C at 8 kA: 0.710 s; 5.94 mm² would do for 10 ms, 132.7 mm² for 5 s', () => {
    const factor = k({ metal: 'copper', insulationDegC: 105, areaMm2: 50, finalDegC: 250 });
    expect(Math.abs(adiabaticTimeS({ k: factor, areaMm2: 50, currentA: 8000 }) - 0.71)).toBeLessThan(THOUSANDTH);
    expect(Math.abs(smallestAreaMm2({ i2t: 8000 ** 2 * 0.01, k: factor }) - 5.94)).toBeLessThan(HUNDREDTH);
    expect(Math.abs(smallestAreaMm2({ i2t: 8000 ** 2 * 5, k: factor }) - 132.7)).toBeLessThan(0.05);
  });

  it.each([
    ['25mm2', 8_265_625, true],
    ['6mm2', 476_100, true],
    ['0.75mm2', 7439, false],
  ] as const)('T22: %s of 70 °C copper stands %d A²s; a let-through of 20 000 A²s passes: %s', (size, k2s2, passes) => {
    const found = withstandOf(cable(size, { metal: 'copper', insulationDegC: 70 }), tables);
    if ('missing' in found) throw new Error(found.missing);
    expect(Math.abs(found.k2s2 - k2s2)).toBeLessThan(0.5);
    expect(20_000 <= found.k2s2).toBe(passes);
    expect(found.assumed).toEqual([]);
  });
});

describe('clearing', () => {
  // T21: 12.8 V, 6 mΩ of battery, 10 m out and back of 2.5 mm² at 7.41 mΩ/m.
  const currentA = 12.8 / (0.006 + 2 * 10 * 0.00741);

  it('T21: 83.0 A at the far end', () => {
    expect(Math.abs(currentA - 83)).toBeLessThan(0.05);
  });

  it('T21: a 25 A gG is sure within 5 s from 110 A only: 83 A is too weak', () => {
    const band = bandOf(fuse(25, 'gG'));
    expect(clearingOf({ band, currentA: 110 }).clearS).toBeCloseTo(5, 9);
    expect(clearingOf({ band, currentA }).clearS).toBeGreaterThan(5);
  });

  it('T21: a 20 A blade at 4.15 times its rating opens in time, and says that its band is generic', () => {
    const found = clearingOf({ band: bandOf(fuse(20, 'blade')), currentA });
    expect(found.clears).toBe(true);
    expect(found.clearS).toBeLessThan(5);
    expect(found.text).toContain("generic band of blade, from memory: get the maker's curve");
  });
});

describe('T23: selectivity by ratio (1.6 to 1 between gG as quoted in a fuse guide; a step of 1.587 taken for it)', () => {
  it.each([
    [100, 63, 1.587, true],
    [80, 63, 1.27, false],
    [100, 50, 2, true],
  ])('gG %d A over gG %d A: %d, selective %s', (upperA, lowerA, ratio, selective) => {
    const request = { upstream: fuse(upperA, 'gG'), downstream: fuse(lowerA, 'gG'), faultA: null };
    const found = selectivityOf(request, tables);
    expect(Math.abs(found.ratio - ratio)).toBeLessThan(THOUSANDTH);
    expect(found).toMatchObject({ selective, needed: 1.6, by: 'ratio' });
  });

  it('the step of 1.587 is accepted as common practice, and says so', () => {
    const at = (upperA: number) =>
      selectivityOf({ upstream: fuse(upperA, 'gG'), downstream: fuse(63, 'gG'), faultA: null }, tables).basis.status;
    expect([at(100), at(125)]).toEqual(['common-practice', 'published']);
  });

  it('two blades need 2 to 1: exactly at it passes, below fails', () => {
    const of = (upperA: number) =>
      selectivityOf({ upstream: fuse(upperA, 'blade'), downstream: fuse(10, 'blade'), faultA: null }, tables).selective;
    expect([of(20), of(15)]).toEqual([true, false]);
  });
});

describe('standard ratings and factors', () => {
  it('T24 (NEC 240.6(A)): 42 A continuous asks 52.5 A and the next rating is 60 A', () => {
    const neededA = practices['us-land'].continuousFactor.value * 42;
    const ratingsA = devices.ratings.get('nec_240_6A_fuse_and_breaker')?.ratingsA ?? [];
    expect(neededA).toBe(52.5);
    expect(ratingsA.find((ratingA) => ratingA >= neededA)).toBe(60);
  });

  it('T5 (stand-alone PV lesson): 2500 W at 22 V and 85 %: 133.7 A, 167.1 A continuous, 235.4 A of 60 °C cable at 41 to 45 °C', () => {
    const inputA = 2500 / (22 * 0.85);
    const continuousA = inputA * practices['us-land'].continuousFactor.value;
    const band = conductors.usLand.ambient.find(({ from, to }) => (from ?? 0) <= 45 && (to ?? 99) >= 45);
    const tableA = continuousA / (band?.factors.get('60')?.value ?? Number.NaN);
    expect([inputA, continuousA, tableA].map((value) => value.toFixed(1))).toEqual(['133.7', '167.1', '235.4']);
  });
});

describe('nuisance opening', () => {
  const band = bandOf(fuse(30, 'blade'));

  it('a surge left of the band of shortest melting is held, one right of it is not, one on it is', () => {
    // Twice the rating: at least 0.15 s.
    const held = [0.14, 0.15, 0.16].map(
      (durationS) => surgeAgainstMelt({ band, currentA: 60, durationS }, tables).holds,
    );
    expect(held).toEqual([true, true, false]);
  });

  it('a surge beyond the last point is not judged', () => {
    expect(surgeAgainstMelt({ band, currentA: 1000, durationS: 0.01 }, tables).holds).toBeNull();
  });

  it.each([
    [1, 1],
    [100, 0.48],
    [101, 0.38],
    [10_000, 0.29],
    [100_000, 0.22],
    [1_000_000, 0.22],
  ])('%d pulses may each bring %d of the melting heat (one fuse guide)', (pulses, share) => {
    expect(pulseShare(pulses, tables)).toBe(share);
  });

  it('a thousand surges of 0.06 s at twice the rating blow what one does not: 0.38 × 0.15 s is 0.057 s', () => {
    const once = surgeAgainstMelt({ band, currentA: 60, durationS: 0.06 }, tables);
    const often = surgeAgainstMelt({ band, currentA: 60, durationS: 0.06, pulses: 1000 }, tables);
    expect([once.holds, often.holds]).toEqual([true, false]);
  });
});

describe('T26: heat of an arc (NFPA 70E annex D, from memory)', () => {
  const arc = { systemV: 58, shortA: 5000, distanceCm: 45.72 };

  it('58 V, 5 kA, two seconds at 45.72 cm: 1.387 cal/cm², above the usual burn; 10 ms: 0.0069', () => {
    expect(Math.abs(arcEnergy(arc) - 1.387)).toBeLessThan(THOUSANDTH);
    expect(arcEnergy(arc)).toBeGreaterThan(BURN_CAL_PER_CM2);
    expect(Math.abs(arcEnergy({ ...arc, timeS: 0.01 }) - 0.0069)).toBeLessThan(0.000_05);
  });
});
