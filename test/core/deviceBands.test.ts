/** The rows of opening times, ratios and pulses: whole, rising, each with its source. */
import { describe, expect, it } from 'vitest';
import { type BandRow, clearingOf, deviceBandOf } from '../../core/api.ts';
import { sources } from '../../data/conductors/figures.ts';
import { tables } from '../../data/index.ts';
import { bandOf, breaker, fuse } from './protectionDevices.ts';

const { bands, pulses, selectivity, typicalInterrupt } = tables.devices;
const everyRow: readonly BandRow[] = [...bands.values()].flat();

/** A rating within every range of every type. */
const ratings = [...bands.values()].flatMap((rows) =>
  [...new Set(rows.map(({ fromA, toA }) => (Number.isFinite(toA) ? toA : Math.max(fromA, 100))))].map(
    (ratingA) => [rows[0]?.type ?? '', ratingA] as const,
  ),
);

describe('rows of the generic bands', () => {
  it('each row has a source that is listed, and a status', () => {
    expect(everyRow.length).toBeGreaterThan(100);
    for (const { basis } of everyRow) {
      expect(sources.get(basis.source)).toBe(basis.text);
      expect(['published', 'from-memory']).toContain(basis.status);
    }
  });

  it('each row gives at least one of its two times, and opens no sooner than it holds', () => {
    for (const { holdsS, opensS } of everyRow) {
      expect(holdsS ?? opensS).toBeGreaterThan(0);
      expect(holdsS ?? 0).toBeLessThanOrEqual(opensS ?? Number.POSITIVE_INFINITY);
    }
  });

  it('only the test points of class C and miniature fuses were seen in print', () => {
    const seen = new Set(everyRow.flatMap(({ type, basis }) => (basis.status === 'published' ? [type] : [])));
    expect([...seen].toSorted()).toEqual(['class_C', 'glass_tube', 'glass_tube_iec']);
  });

  it('every type with a typical interrupt rating has a band as well', () => {
    for (const { type } of typicalInterrupt) expect(bands.get(type.toLowerCase())?.length).toBeGreaterThan(1);
  });

  it.each(ratings)(
    'the band of %s %d A rises in current, falls in time, and melts before it clears',
    (type, ratingA) => {
      const { points, basis } = bandOf(fuse(ratingA, type));
      expect(points.length).toBeGreaterThan(0);
      expect(basis.text.length).toBeGreaterThan(10);
      for (const [index, point] of points.entries()) {
        expect(point.meltS).toBeLessThanOrEqual(point.clearS);
        const next = points[index + 1];
        if (next === undefined) continue;
        expect(next.currentA).toBeGreaterThan(point.currentA);
        expect(next.meltS).toBeLessThanOrEqual(point.meltS);
        expect(next.clearS).toBeLessThanOrEqual(point.clearS);
      }
    },
  );

  it.each(ratings)('no %s of %d A need open at its own rating', (type, ratingA) => {
    expect(clearingOf({ band: bandOf(fuse(ratingA, type)), currentA: ratingA }).clears).toBe(false);
  });
});

describe('what has no band', () => {
  it('a fuse without a type asks for the type', () => {
    expect(deviceBandOf(fuse(30, undefined), tables)).toEqual({ missing: 'type of fuse F' });
  });
  it('a fuse of a type that no table holds asks for its curve', () => {
    expect(deviceBandOf(fuse(30, 'a kind nobody knows'), tables)).toEqual({ missing: 'curvePoints of fuse F' });
  });
  it('a rating outside the known ones asks for its curve', () => {
    expect(deviceBandOf(fuse(10, 'gG'), tables)).toEqual({ missing: 'curvePoints of fuse F' });
  });
  it.each(['thermal-magnetic', 'hydraulic-magnetic', undefined])('a breaker (%s) asks for its curve', (type) => {
    expect(deviceBandOf(breaker(30, type), tables)).toEqual({ missing: 'curvePoints of breaker B' });
  });
  it('a type is known however it is written', () => {
    for (const type of ['class_T', 'Class T', 'class-t']) expect(bandOf(fuse(200, type)).points.length).toBe(5);
  });
});

describe('ratios and pulses', () => {
  it('more pulses are outlasted only at a smaller share of the melting heat', () => {
    expect(pulses.map(({ pulses: count }) => count)).toEqual([100, 1000, 10_000, 100_000]);
    expect(pulses.map(({ share }) => share.value)).toEqual([0.48, 0.38, 0.29, 0.22]);
  });
  it('the ratio between gG fuses is published, the one between others common practice', () => {
    expect(selectivity.sameGg.basis.status).toBe('published');
    expect(selectivity.others.basis.status).toBe('common-practice');
  });
});
