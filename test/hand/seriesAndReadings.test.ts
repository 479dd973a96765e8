/** Volts along a string, and what two loads tell of it, with the working beside the sum. */
import { describe, expect, it } from 'vitest';
import { fromReadings, seriesOf } from '../../core/api.ts';
import type { MeterError } from '../../core/strings/readings/meter.ts';
import { twoLoads } from '../../core/strings/readings/twoLoads.ts';
import { tables } from '../../data/index.ts';
import { type BankString, bankJob, jobOf, perfect, readAt, solvedAt } from '../core/bankJobs.ts';
import { seededRandom } from '../physics/seededRandom.ts';

const block = {
  kind: 'string',
  chemistry: 'flooded',
  blocksInSeries: 1,
  blockNominalV: 12,
  capacityAh: 200,
};

/** Four blocks from negative to positive, as four parts, with a voltage reading each. */
function fourBlocks(voltsV: readonly number[], scale = 1) {
  return jobOf({
    parts: voltsV.map((_, index) => ({ ...block, id: `B${index + 1}`, minus: `n${index}`, plus: `n${index + 1}` })),
    readings: voltsV.map((valueV, index) => ({
      id: `r${index + 1}`,
      quantity: 'voltage',
      plus: `n${index + 1}`,
      minus: `n${index}`,
      valueV: scale * valueV,
    })),
  });
}

function halves(readings: readonly (readonly [plus: string, minus: string, valueV: number])[], extra = {}) {
  return jobOf({
    parts: [{ ...block, id: 'S', blocksInSeries: 2, minus: 'neg', plus: 'pos', midpoint: 'mid', ...extra }],
    readings: readings.map(([plus, minus, valueV], index) => ({
      id: `r${index}`,
      quantity: 'voltage',
      plus,
      minus,
      valueV,
    })),
  });
}

const solvedIn = (job: ReturnType<typeof jobOf>) => ['light', 'heavy'].map((caseId) => solvedAt(job, caseId));
const seriesIn = (job: ReturnType<typeof jobOf>) => seriesOf({ job, tables, points: [] });

describe('volts along a string', () => {
  it('24 V at 28.80 V, lower half 14.09 V, upper 14.71 V', () => {
    const [one] = seriesIn(
      halves([
        ['mid', 'neg', 14.09],
        ['pos', 'mid', 14.71],
      ]),
    );
    // 14.71 - 14.09 = 0.62 V.  0.62/28.80 = 2.152778 %;  mean half 14.40 V: 0.62/14.40 = 4.305556 %.
    expect(one!.totalV).toBeCloseTo(28.8, 12);
    expect(one!.midpoint!.differenceV).toBeCloseTo(0.62, 12);
    expect(100 * one!.midpoint!.onTotal).toBeCloseTo(2.152778, 6);
    expect(100 * one!.midpoint!.onMeanHalf).toBeCloseTo(4.305556, 6);
    expect(one!.blocks.map(({ name }) => name)).toStrictEqual(['S lower half', 'S upper half']);
    // Both bases are printed with the millivolts first.
    expect(one!.remarks[0]).toMatch(/620 mV more.*2\.2 % of the total of 28\.80 V.*4\.3 % of the mean half/);
  });

  it('48 V from negative 14.32, 14.41, 13.62, 15.05: the midpoint looks right, blocks 3 and 4 are not', () => {
    const [one] = seriesIn(fourBlocks([14.32, 14.41, 13.62, 15.05]));
    // Total 57.40, mean 14.35: -0.03, +0.06, -0.73, +0.70.  Halves 28.73 and 28.67: -0.06/57.40 = -0.104530 %.
    const fromMean = one!.blocks.map(({ fromMeanV }) => Math.round(1000 * fromMeanV));
    expect(fromMean).toStrictEqual([-30, 60, -730, 700]);
    expect(100 * one!.midpoint!.onTotal).toBeCloseTo(-0.10453, 5);
    expect(one!.remarks.join(' ')).toMatch(
      /looks right \(0\.10 % of the total\) while B3 is 730 mV below the mean and B4 is 700 mV above the mean.*reading of every block/,
    );
  });

  it('the same volts read from the negative pole upwards, or with the probes the other way round, are the same answer', () => {
    const expected = seriesIn(
      halves([
        ['mid', 'neg', 14.09],
        ['pos', 'mid', 14.71],
      ]),
    )[0]!.midpoint!;
    for (const readings of [
      [
        ['mid', 'neg', 14.09],
        ['pos', 'neg', 28.8],
      ],
      [
        ['neg', 'mid', -14.09],
        ['mid', 'pos', -14.71],
      ],
    ] as const) {
      // A volt and its sums: exact but for the last digits.
      expect(seriesIn(halves(readings))[0]!.midpoint!.differenceV).toBeCloseTo(expected.differenceV, 12);
    }
  });

  it('the fractions do not depend on the size of the volts', () => {
    const random = seededRandom(4);
    for (let trial = 0; trial < 20; trial++) {
      const voltsV = [1, 2, 3, 4].map(() => random.between([10, 15]));
      const [one] = seriesIn(fourBlocks(voltsV));
      const [half] = seriesIn(fourBlocks(voltsV, 0.5));
      expect(half!.midpoint!.onTotal).toBeCloseTo(one!.midpoint!.onTotal, 12);
      for (const [index, { fromMean, fromMeanV }] of one!.blocks.entries()) {
        expect(half!.blocks[index]!.fromMean).toBeCloseTo(fromMean, 12);
        expect(half!.blocks[index]!.fromMeanV).toBeCloseTo(fromMeanV / 2, 12);
      }
      // Distances from a mean add up to nothing.
      expect(one!.blocks.reduce((sum, { fromMeanV }) => sum + fromMeanV, 0)).toBeCloseTo(0, 12);
    }
  });

  it('a 12 V load of 10 A on the lower half of a string of 25.4 V and 8 milliohm lowers it by 40 mV', () => {
    const string = {
      ...block,
      id: 'S',
      blocksInSeries: 2,
      minus: 'neg',
      plus: 'pos',
      emfV: 25.4,
      resistanceOhm: 0.008,
    };
    const tap = { id: 'radio', kind: 'load', plus: 'mid', minus: 'neg', currentA: 10 };
    const job = jobOf({ parts: [{ ...string, midpoint: 'mid' }, tap] });
    const [one] = seriesOf({ job, tables, points: [solvedAt(job, 'as-drawn')] });
    // Lower half 12.7 - 10 A x 4 mohm = 12.66 V, upper 12.70 V: 0.04 V, 0.04/25.36 = 0.158 %.
    expect(one!.midpoint!.differenceV).toBeCloseTo(0.04, 9);
    expect(one!.midpoint!.onTotal).toBeCloseTo(0.04 / 25.36, 9);
    expect(one!.remarks[0]).toContain('takes 10 A');
  });

  it('a solve in which nothing can differ is not told', () => {
    const string = { ...block, id: 'S', blocksInSeries: 2, minus: 'neg', plus: 'pos', midpoint: 'mid' };
    const job = jobOf({ parts: [string, { id: 'load', kind: 'load', plus: 'pos', minus: 'neg', currentA: 10 }] });
    expect(seriesOf({ job, tables, points: [solvedAt(job, 'as-drawn')] })).toStrictEqual([]);
  });
});

describe('EMF and resistance from two loads', () => {
  const exact: MeterError = { own: 0.001, gain: null };
  const load = (voltageV: number, currentA: number, error = exact) => ({
    volts: { value: voltageV, error },
    amps: { value: currentA, error },
  });

  it('12.40 V at 40 A and 11.55 V at 200 A: 5.3125 milliohm and 12.6125 V (T22, two-point method)', () => {
    const { emfV, resistanceOhm } = twoLoads(load(12.4, 40), load(11.55, 200));
    // R = 0.85/160 = 5.3125 mohm;  E = 12.40 + 0.2125 = 12.6125 V;  E/R = 2374.1 A.
    expect(resistanceOhm.value).toBeCloseTo(0.0053125, 12);
    expect(emfV.value).toBeCloseTo(12.6125, 12);
    expect(Math.abs(emfV.value / resistanceOhm.value - 2374.1)).toBeLessThan(0.05);
  });

  it('uncertainties by hand: 1 mV and 1 mA on every reading', () => {
    const { emfV, resistanceOhm, significance } = twoLoads(load(12.4, 40), load(11.55, 200));
    // u(R) = sqrt(2) sqrt(1 mV² + (R 1 mA)²)/160 A = 1.41421 x 1.0000141 mV/160 A = 8.8389 µohm.
    expect(1e6 * resistanceOhm.standard).toBeCloseTo(8.839, 3);
    // u(E) = sqrt((200/160)² + (40/160)²) x 1.0000141 mV = 1.274773 mV.
    expect(1000 * emfV.standard).toBeCloseTo(1.2748, 4);
    // 160 A over sqrt(2) mA.
    expect(significance).toBeCloseTo(160 / 0.00141421356, 0);
  });

  it("an error of one meter's scale changes E in proportion and drops out of nothing else", () => {
    const scale: MeterError = { own: 0, gain: { meter: 'one', relative: 0.01 } };
    const none: MeterError = { own: 0, gain: null };
    const volts = (value: number) => ({ value, error: scale });
    const amps = (value: number) => ({ value, error: none });
    const { emfV, resistanceOhm } = twoLoads(
      { volts: volts(12.4), amps: amps(40) },
      { volts: volts(11.55), amps: amps(200) },
    );
    // All volts 1 % high: both answers are 1 % high.
    expect(emfV.standard).toBeCloseTo(0.01 * emfV.value, 12);
    expect(resistanceOhm.standard).toBeCloseTo(0.01 * resistanceOhm.value, 12);
  });

  const strings: readonly BankString[] = [
    { id: 'A', emfV: 25.4, ohm: 0.009, leadOhm: 0.001 },
    { id: 'B', emfV: 25.36, ohm: 0.012, leadOhm: 0.0015 },
    { id: 'C', emfV: 25.44, ohm: 0.02, leadOhm: 0.001 },
  ];

  it('perfect readings of a solved bank give back each string with its lead, as the job expects', () => {
    const job = bankJob({ strings });
    const read = bankJob({ strings, readings: readAt(job, solvedIn(job), perfect) });
    const found = fromReadings({ job: read, tables });
    expect(found.missing).toStrictEqual([]);
    for (const [index, { id, emfV, ohm, leadOhm }] of strings.entries()) {
      const one = found.strings[index]!;
      expect(one.string).toBe(id);
      // The solve balances to far below a microvolt over 20 to 80 A of change.
      expect(one.resistanceOhm.value).toBeCloseTo(ohm + leadOhm, 9);
      expect(one.emfV.value).toBeCloseTo(emfV, 7);
      expect(one.expectedOhm).toBeCloseTo(ohm + leadOhm, 9);
      expect(one.expectedEmfV).toBeCloseTo(emfV, 7);
    }
  });

  it.each([1, -1])('the amps may be read on the lead, drawn either way round (%d)', (way) => {
    const drawn = strings.map((string) => ({ ...string, turned: way < 0 }));
    const job = bankJob({ strings: drawn });
    const readings = readAt(job, solvedIn(job), perfect).map((reading) =>
      'part' in reading ? { ...reading, part: `${reading.part} lead`, valueA: way * reading.valueA } : reading,
    );
    const found = fromReadings({ job: bankJob({ strings: drawn, readings }), tables });
    expect(found.strings[1]!.resistanceOhm.value).toBeCloseTo(0.0135, 9);
  });

  it('200 seeded trials with a hand meter and a clamp: the truth lies within the stated uncertainty', () => {
    const random = seededRandom(22);
    let [within, all, squares] = [0, 0, 0];
    for (let trial = 0; trial < 200; trial++) {
      const drawn = ['A', 'B', 'C'].map((id) => ({
        id,
        emfV: 25.4 + random.between([-0.05, 0.05]),
        ohm: random.between([0.008, 0.02]),
        leadOhm: random.between([0.0005, 0.002]),
      }));
      // Limits of error of the meters as the engine takes them: shared scale, a count or five of the display, and rounding.
      const [voltScale, ampScale] = [random.between([-0.005, 0.005]), random.between([-0.02, 0.02])];
      const shown = (value: number, step: number) => Math.round(value / step) * step;
      const meter = {
        volts: (trueV: number) => shown(trueV * (1 + voltScale) + random.between([-0.01, 0.01]), 0.01),
        amps: (trueA: number) => shown(trueA * (1 + ampScale) + random.between([-0.5, 0.5]), 0.1),
      };
      const job = bankJob({ strings: drawn });
      const points = solvedIn(job);
      const found = fromReadings({
        job: bankJob({ strings: drawn, readings: readAt(job, points, meter) }),
        tables,
        points,
      });
      for (const [index, { emfV, ohm, leadOhm }] of drawn.entries()) {
        const one = found.strings[index]!;
        for (const [measured, truth] of [
          [one.resistanceOhm, ohm + leadOhm],
          [one.emfV, emfV],
        ] as const) {
          const misses = (measured.value - truth) / measured.standard;
          all++;
          squares += misses ** 2;
          if (Math.abs(misses) <= 2) within++;
        }
      }
    }
    expect(all).toBe(1200);
    // Two standard uncertainties hold about 95 % (a little more where one flat error rules, as the meter's scale does for E).
    expect(within / all).toBeGreaterThan(0.93);
    // And they are not padded: the misses are as large as stated.
    expect(Math.sqrt(squares / all)).toBeGreaterThan(0.85);
    expect(Math.sqrt(squares / all)).toBeLessThan(1.15);
  });
});
