/** What ranges of assumed figures make of the sharing. */
import { describe, expect, it } from 'vitest';
import { type BandStudy, bandOf, type CheckedJob, checkJob, type PartId } from '../../core/api.ts';
import { tables } from '../../data/index.ts';
import { seededRandom } from '../physics/seededRandom.ts';

interface StringFields {
  readonly id: string;
  readonly leadM: number;
  readonly more?: Readonly<Record<string, unknown>>;
}

/** Strings of one 12 V AGM block on leads of their own to two bars, and a load of fixed amps. */
function star(strings: readonly StringFields[], loadA: number, settings: Readonly<Record<string, unknown>> = {}) {
  const read = checkJob({
    format: 'ohmwright-job',
    version: 1,
    title: 'Strings for a band (invented)',
    practice: 'iec-land',
    settings,
    parts: [
      ...strings.flatMap(({ id, leadM, more }) => [
        {
          id,
          kind: 'string',
          plus: `${id}+`,
          minus: `${id}-`,
          chemistry: 'agm',
          blocksInSeries: 1,
          blockNominalV: 12,
          capacityAh: 100,
          ...more,
        },
        {
          id: `${id} leads`,
          kind: 'pair',
          from: { plus: `${id}+`, minus: `${id}-` },
          to: { plus: 'bar+', minus: 'bar-' },
          lengthM: leadM,
          size: '35 mm2',
          conductorDegC: 20,
          run: 'free-air',
          insulationDegC: 70,
        },
      ]),
      { id: 'house', kind: 'load', plus: 'bar+', minus: 'bar-', currentA: loadA },
    ],
  });
  if (!read.ok) throw new Error(JSON.stringify(read.issues));
  return read.value;
}

function band(job: CheckedJob, { draws = 2000, seed = 1 } = {}): BandStudy {
  const operatingCase = job.cases[0]!;
  return bandOf({ job, tables, operatingCase, model: 'slow', draws, seed })!;
}

const width = ({ currentA: { p05, p95 } }: BandStudy['strings'][number]) => p95 - p05;

describe('a band over assumed figures', () => {
  const labelOnly = star(
    [
      { id: 'A', leadM: 0.5 },
      { id: 'B', leadM: 1.5 },
      { id: 'C', leadM: 0.5 },
    ],
    60,
  );

  it('is wide with label figures alone, says that it rests on assumptions, and narrows with measured ones', () => {
    const assumed = band(labelOnly);
    expect(assumed.allGiven).toBe(false);
    const measured = { resistanceOhm: 0.013, emfV: 12.7, origin: { resistanceOhm: 'measured', emfV: 'measured' } };
    const exact = {
      ...measured,
      range: { resistanceOhm: [0.0127, 0.0133], emfV: [12.699, 12.701] },
    };
    const known = band(
      star(
        ['A', 'B', 'C'].map((id) => ({ id, leadM: id === 'B' ? 1.5 : 0.5, more: exact })),
        60,
      ),
    );
    expect(known.allGiven).toBe(true);
    assumed.strings.forEach((string, k) => {
      expect(string.id).toBe(known.strings[k]!.id);
      // Default resistances lie between 0.5 and 1.9 of their figure; these were measured to 2 %.
      expect(width(known.strings[k]!)).toBeLessThan(0.2 * width(string));
      expect(string.currentA.p05).toBeLessThan(string.nominalA);
      expect(string.currentA.p95).toBeGreaterThan(string.nominalA);
    });
    expect(assumed.verdict.holds).toBe(false);
    expect(assumed.verdict.text).toMatch(/hangs on assumed figures/);
    expect(assumed.reading?.kind).toBe('string-current');
    expect(assumed.reading!.leavesA).toBeLessThan(0.5 * assumed.reading!.nowA);
  });

  it('is the same for the same seed, bit for bit, and another for another', () => {
    expect(band(labelOnly, { draws: 300 })).toEqual(band(labelOnly, { draws: 300 }));
    expect(band(labelOnly, { draws: 300, seed: 2 }).strings).not.toEqual(band(labelOnly, { draws: 300 }).strings);
  });

  it('has the percentiles of the closed form, drawn independently', () => {
    // Two strings of equal EMF: I_A = 80 R_B / (R_A + R_B), each R even over 8 to 10 or over 10 to 16 mohm, turn about.
    const more = {
      emfV: 12.6,
      resistanceOhm: 0.01,
      range: { resistanceOhm: [0.008, 0.016], emfV: [12.6, 12.6] },
    };
    const parts = ['A', 'B'].map((id) => ({ id, leadM: 0.5, more }));
    const found = band(star(parts, 80), { draws: 20_000 });
    const lead = (2 * 0.5 * 0.554) / 1000; // flexible conductor table: 0.554 ohm/km for 35 mm2 at 20 degC
    const random = seededRandom(77);
    const drawOhm = () => (random.chance(0.5) ? random.between([0.008, 0.01]) : random.between([0.01, 0.016])) + lead;
    const values = Array.from({ length: 200_000 }, () => {
      const [a, b] = [drawOhm(), drawOhm()];
      return (80 * b) / (a + b);
    });
    values.sort((p, q) => p - q);
    const { p05, p50, p95 } = found.strings[0]!.currentA;
    const at = (share: number) => values[Math.round(share * values.length)]!;
    // 20 000 draws know a 5 % percentile to about 0.3 % of the band, whose width is 17 A; the lead's table figure to 12 % of 0.5 mohm.
    expect(Math.abs(p05 - at(0.05))).toBeLessThan(0.25);
    expect(Math.abs(p50 - at(0.5))).toBeLessThan(0.25);
    expect(Math.abs(p95 - at(0.95))).toBeLessThan(0.25);
  });

  it('ranks by the adjoint what one-at-a-time solves and the draws themselves rank', () => {
    const narrow = (ohm: number, emfV: number) => ({
      resistanceOhm: ohm,
      emfV,
      range: { resistanceOhm: [ohm * 0.99, ohm * 1.01], emfV: [emfV - 0.002, emfV + 0.002] },
    });
    const job = star(
      [
        { id: 'A', leadM: 0.5, more: narrow(0.009, 12.62) },
        { id: 'B', leadM: 1, more: narrow(0.014, 12.6) },
        { id: 'C', leadM: 2, more: narrow(0.02, 12.63) },
      ],
      60,
    );
    const found = band(job, { draws: 4000 });
    const slopeA = ({ perUnit, high, low }: BandStudy['tornado'][number]) => perUnit * (high - low);
    for (const bar of found.tornado) {
      // Ranges of 1 %: first order is good to about that.
      expect(Math.abs(slopeA(bar) - (bar.highA - bar.lowA))).toBeLessThan(0.02 * Math.abs(slopeA(bar)) + 1e-6);
    }
    const byAdjoint = [...found.tornado];
    byAdjoint.sort((p, q) => Math.abs(slopeA(q)) - Math.abs(slopeA(p)));
    expect(byAdjoint.map(({ label }) => label)).toEqual(found.tornado.map(({ label }) => label));
    // Even draws over a width w have the variance w²/12, and independent ones add: the band is what the bars add up to.
    const variance = found.tornado.reduce((sum, bar) => sum + slopeA(bar) ** 2 / 12, 0);
    const judged = found.strings.find(({ id }) => id === found.judged)!;
    // A sum of six even draws of like width is nearly normal: 5th to 95th percentile are 3.29 standard deviations apart.
    expect(width(judged) / (3.29 * Math.sqrt(variance))).toBeCloseTo(1, 1);
  });

  it('moves strings of one chemistry along one rest curve, and apart by their own states of charge', () => {
    const together = band(
      star(
        ['A', 'B'].map((id) => ({
          id,
          leadM: 0.5,
          more: {
            resistanceOhm: 0.013,
            origin: { resistanceOhm: 'measured' },
            range: { resistanceOhm: [0.013, 0.013] },
          },
        })),
        40,
      ),
      { draws: 200 },
    );
    // Nothing but the common curve is left to draw: equal strings stay equal.
    for (const string of together.strings) expect(width(string)).toBeLessThan(1e-9);
    expect(together.tornado.map(({ label }) => label)).toEqual(['rest curve of agm (A, B)']);
    const apart = band(
      star(
        ['A', 'B'].map((id) => ({
          id,
          leadM: 0.5,
          more: {
            resistanceOhm: 0.013,
            stateOfCharge: 0.8,
            range: { resistanceOhm: [0.013, 0.013], stateOfCharge: [0.7, 0.9] },
          },
        })),
        40,
      ),
      { draws: 200 },
    );
    for (const string of apart.strings) expect(width(string)).toBeGreaterThan(1);
  });

  it('says that a verdict holds where nearly every draw bears it out', () => {
    const sure = { resistanceOhm: 0.01, emfV: 12.6, range: { resistanceOhm: [0.0099, 0.0101], emfV: [12.6, 12.6] } };
    const even = band(
      star(
        ['A', 'B'].map((id) => ({ id, leadM: 1, more: sure })),
        50,
      ),
    );
    expect(even.verdict).toMatchObject({ nominalWithin: true, within: 1, holds: true });
    const uneven = band(
      star(
        [
          { id: 'A', leadM: 0.3, more: sure },
          { id: 'B', leadM: 6, more: sure },
        ],
        50,
      ),
    );
    expect(uneven.verdict).toMatchObject({ nominalWithin: false, within: 0, holds: true });
    expect(uneven.verdict.text).toMatch(/^The verdict holds over the ranges/);
  });

  it('does not judge the sharing of a bank that rests', () => {
    const found = band(
      star(
        [
          { id: 'A', leadM: 1 },
          { id: 'B', leadM: 1 },
        ],
        0.1,
      ),
      { draws: 50 },
    );
    expect(found.strings.every(({ deviation }) => deviation === null)).toBe(true);
    expect(found.verdict.text).toMatch(/enough/);
  });

  it('answers nothing where there is no string or no operating point', () => {
    const read = checkJob({
      format: 'ohmwright-job',
      version: 1,
      title: 'No string (invented)',
      practice: 'iec-land',
      parts: [{ id: 'L', kind: 'load', plus: 'p', minus: 'm', currentA: 1 }],
    });
    if (!read.ok) throw new Error('readable');
    const operatingCase = read.value.cases[0]!;
    expect(bandOf({ job: read.value, tables, operatingCase, model: 'slow', draws: 10, seed: 1 })).toBeNull();
  });

  it('judges the string that is furthest from its fair share', () => {
    const found = band(
      star(
        [
          { id: 'A', leadM: 0.5 },
          { id: 'B', leadM: 4 },
          { id: 'C', leadM: 0.5 },
        ],
        60,
      ),
      { draws: 64 },
    );
    expect(found.judged).toBe('B' as PartId);
  });
});
