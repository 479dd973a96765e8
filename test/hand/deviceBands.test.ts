/** Bands of fuses worked on paper: straight lines on log–log axes, and what is said outside them. */
import { describe, expect, it } from 'vitest';
import { clearingOf, type DeviceBand, deviceBandOf, selectivityOf, withstandOf } from '../../core/api.ts';
import { tables } from '../../data/index.ts';
import { bandOf, breaker, cable, fuse } from '../core/protectionDevices.ts';

/** A maker's curve of decades: 100 A holds 10 s and opens by 100 s, 1000 A holds 0.1 s and opens by 1 s. */
const decades = [
  [100, 10, 100],
  [1000, 0.1, 1],
];

function at(band: DeviceBand, currentA: number) {
  return clearingOf({ band, currentA });
}

/** Currents from a tenth of the rating to a thousand times it, a twentieth of a decade apart. */
const currentsA = Array.from({ length: 81 }, (_, step) => 10 * 10 ** (step / 20));

describe('between two points', () => {
  const band = bandOf(fuse(50, undefined, { curvePoints: decades }));

  it('half-way on the log axis of current is half-way on that of time', () => {
    // √(100 · 1000) = 316.23 A; √(10 · 0.1) = 1 s; √(100 · 1) = 10 s.
    const found = at(band, Math.sqrt(100_000));
    expect(found.holdS).toBeCloseTo(1, 9);
    expect(found.clearS).toBeCloseTo(10, 9);
    // 316.23² · 10 = 1 000 000 A²s.
    expect(found.letThroughI2t).toBeCloseTo(1_000_000, 3);
  });

  it('at a point it is the point', () => {
    expect(at(band, 1000)).toMatchObject({ holdS: 0.1, clearS: 1, clears: true, beyond: false });
  });

  it('below the first point it need not open, and holds at least as long as there', () => {
    expect(at(band, 99)).toMatchObject({ holdS: 10, clearS: null, clears: false, letThroughI2t: null });
  });

  it('beyond the last point no shorter time is made up: no longer than there, marked, and no holding', () => {
    // A fuse lets through no more heat than at its last point: 1000² · 1.
    expect(at(band, 5000)).toMatchObject({ holdS: null, clearS: 1, clears: true, beyond: true, letThroughI2t: 1e6 });
  });

  it('a breaker has no element that melts: beyond its last point it is the square of the current times the longest time', () => {
    const found = at(bandOf(breaker(50, undefined, { curvePoints: decades })), 5000);
    expect(found).toMatchObject({ clearS: 1, beyond: true, letThroughI2t: 25e6 });
  });
});

describe('gates that give one of the two times', () => {
  // gG 16 A: holds 20 A for an hour, opens 25.6 A within it; holds 33 A for 10 s, opens 65 A in 5 s; 85 A for 0.1 s, 150 A in 0.1 s.
  const band = bandOf(fuse(16, 'gG'));

  it('each edge runs through its own gates only', () => {
    expect(at(band, 25.6).clearS).toBeCloseTo(3600, 6);
    expect(at(band, 65).clearS).toBeCloseTo(5, 9);
    expect(at(band, 33).holdS).toBeCloseTo(10, 9);
    // Opening at √(65 · 150) = 98.74 A: √(5 · 0.1) = 0.7071 s, though the gate at 85 A lies between.
    expect(at(band, Math.sqrt(65 * 150)).clearS).toBeCloseTo(Math.sqrt(0.5), 6);
  });

  it('beyond the last gate of holding nothing is held, while opening is known up to its own last gate', () => {
    expect(at(band, 120)).toMatchObject({ holdS: null, beyond: false, clears: true });
    expect(at(band, 151)).toMatchObject({ beyond: true, clearS: 0.1 });
  });
});

describe('test points of opening', () => {
  // Class T, 100 A: holds 110 A for 4 h and 350 A for 5 s; opens 200 A within 6 min, and nothing is known of its holding there.
  it('count with the next known holding, not with the straight line between two holdings', () => {
    expect(at(bandOf(fuse(100, 'class_T')), 200)).toMatchObject({ holdS: 5, clearS: 360 });
  });

  it('say nothing of holding where no holding is known further on', () => {
    expect(at(bandOf(fuse(5, 'glass_tube')), 10)).toMatchObject({ holdS: null, clearS: 120 });
  });
});

describe('the heat of the melting', () => {
  const band = bandOf(fuse(50, undefined, { curvePoints: decades, preArcI2t: 50_000, totalI2t: 90_000 }));

  it('decides beyond the last point once it opens within 10 ms: 90 000/4000² = 5.625 ms', () => {
    const found = at(band, 4000);
    expect(found.clearS).toBeCloseTo(0.005_625, 12);
    expect(found.holdS).toBeCloseTo(50_000 / 16e6, 12);
    expect(found).toMatchObject({ letThroughI2t: 90_000, beyond: false });
  });

  it('is left alone where it would take longer than 10 ms: 90 000/2000² = 22.5 ms', () => {
    expect(at(band, 2000)).toMatchObject({ clearS: 1, beyond: true });
  });

  it('is left alone within the curve', () => {
    expect(at(band, 1000)).toMatchObject({ clearS: 1, holdS: 0.1 });
  });
});

describe('more current never opens later and never holds longer', () => {
  it.each([
    ['blade 30 A', fuse(30, 'blade')],
    ['blade 80 A', fuse(80, 'blade')],
    ['strip 100 A', fuse(100, 'strip_large')],
    ['class T 200 A', fuse(200, 'class_T')],
    ['gG 63 A', fuse(63, 'gG')],
    ["a maker's curve", fuse(50, undefined, { curvePoints: decades })],
    [
      "a maker's curve with its heat",
      fuse(50, undefined, { curvePoints: decades, preArcI2t: 50_000, totalI2t: 90_000 }),
    ],
    [
      'a curve that runs below 10 ms',
      fuse(50, undefined, { curvePoints: [...decades, [5000, 0.001, 0.002]], totalI2t: 9e4, preArcI2t: 5e4 }),
    ],
  ])('%s', (_name, device) => {
    const band = bandOf(device);
    const found = currentsA.map((currentA) => at(band, currentA));
    expect(found.some(({ clears }) => clears === true)).toBe(true);
    for (const [index, next] of found.entries()) {
      const before = found[index - 1];
      if (before === undefined) continue;
      expect(next.clearS ?? Infinity).toBeLessThanOrEqual(before.clearS ?? Infinity);
      expect(next.holdS ?? 0).toBeLessThanOrEqual(before.holdS ?? 0);
      expect(Number(next.clears)).toBeGreaterThanOrEqual(Number(before.clears));
      expect(next.holdS ?? 0).toBeLessThanOrEqual(next.clearS ?? Infinity);
    }
  });
});

describe('where a band comes from', () => {
  it("the maker's points go before the generic band", () => {
    const band = bandOf(fuse(20, 'blade', { curvePoints: decades }));
    expect(band.from).toBe('maker');
    expect(at(band, 1000).text).toContain("maker's points entered in the job");
    expect(at(bandOf(fuse(20, 'blade')), 1000).text).toContain('generic band of blade, from memory');
  });

  it("the maker's heat is used with a generic band", () => {
    expect(at(bandOf(fuse(20, 'blade', { totalI2t: 900 })), 1000)).toMatchObject({ letThroughI2t: 900, beyond: false });
  });

  it('a breaker with points has a band', () => {
    expect(deviceBandOf(breaker(30, 'thermal-magnetic', { curvePoints: decades }), tables)).toHaveProperty(
      'from',
      'maker',
    );
  });
});

describe('what opens alone', () => {
  const heat = (ratingA: number, preArcI2t: number, totalI2t: number) =>
    fuse(ratingA, 'class_T', { preArcI2t, totalI2t });

  it('the heat decides where it is known, whatever the ratio', () => {
    const of = (preArcI2t: number) =>
      selectivityOf({ upstream: heat(150, preArcI2t, 1e5), downstream: heat(100, 1e4, 3e4), faultA: 5000 }, tables);
    expect(of(31_000)).toMatchObject({ selective: true, by: 'heat' });
    expect(of(30_000)).toMatchObject({ selective: false, by: 'heat' });
  });

  it("makers' curves that overlap before the fault fail a ratio that would pass, and pass with a fault short of it", () => {
    const upstream = fuse(100, 'one', {
      curvePoints: [
        [300, 50, 500],
        [3000, 0.2, 2],
      ],
    });
    const downstream = fuse(50, 'two', {
      curvePoints: [
        [100, 1, 10],
        [3000, 0.01, 0.9],
      ],
    });
    expect(selectivityOf({ upstream, downstream, faultA: 3000 }, tables)).toMatchObject({
      selective: false,
      by: 'bands',
    });
    expect(selectivityOf({ upstream, downstream, faultA: 400 }, tables)).toMatchObject({
      selective: true,
      by: 'ratio',
    });
  });

  it('generic bands of unlike types that overlap at the fault leave it open', () => {
    const request = { upstream: fuse(100, 'class_T'), downstream: fuse(50, 'open_link'), faultA: 200 };
    expect(selectivityOf(request, tables)).toMatchObject({ selective: null, by: 'bands', ratio: 2 });
    expect(selectivityOf({ ...request, faultA: null }, tables)).toMatchObject({ selective: true, by: 'ratio' });
  });

  it('a breaker without a curve is judged by the ratio alone', () => {
    const request = { upstream: fuse(100, 'class_T'), downstream: breaker(60, 'thermal-magnetic'), faultA: 2000 };
    expect(selectivityOf(request, tables)).toMatchObject({ selective: false, needed: 2, by: 'ratio' });
  });
});

describe('withstand of a cable', () => {
  it('two in parallel stand four times the heat of one', () => {
    const of = (inParallel: number) => {
      const found = withstandOf(cable('16mm2', { inParallel, metal: 'copper', insulationDegC: 90 }), tables);
      return 'missing' in found ? found : found.k2s2;
    };
    // 100² · 16² and 100² · 32².
    expect([of(1), of(2)]).toEqual([2_560_000, 10_240_000]);
  });

  it('without metal or insulation it is plain copper in PVC, and says so', () => {
    expect(withstandOf(cable('16mm2'), tables)).toMatchObject({
      k: 115,
      assumed: ['metal copper', 'insulation ordinary PVC, 70 °C'],
    });
  });

  it('insulation that no k is held for is asked about', () => {
    expect(withstandOf(cable('16mm2', { insulationDegC: 200 }), tables)).toEqual({
      missing: 'insulationDegC of cable C',
    });
  });
});
