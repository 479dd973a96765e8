/** Default resistance: bands in order, slow at or above fast, more when older, colder, emptier, smaller. */
import { describe, expect, it } from 'vitest';
import { rcModel, resistanceAfter } from '../../core/battery/rc.ts';
import type { ResistanceQuery } from '../../core/battery/resistance.ts';
import { defaultResistance } from '../../core/battery/resistance.ts';
import type { Chemistry } from '../../core/job/part.ts';
import { chemistryTables as tables } from '../../data/chemistry/chemistry.ts';
import { makeString } from './batteryMaker.ts';

const CHEMISTRIES: readonly Chemistry[] = ['flooded', 'agm', 'gel', 'lfp', 'nmc', 'nicd'];
const BOUNDS = ['low', 'value', 'high'] as const;
const temperatures = [-40, -20, -5, 0, 10, 25, 40, 60];
const charges = [0, 0.05, 0.1, 0.2, 0.35, 0.5, 0.8, 1];
const ages = [undefined, 0, 1, 3, 7, 12, 25];

describe.each(CHEMISTRIES)('resistance of %s', (chemistry) => {
  const plain: ResistanceQuery = {
    chemistry,
    cells: 6,
    boards: 1,
    capacityAh: 100,
    stateOfCharge: 1,
    temperatureDegC: 25,
    ageYears: 0,
    model: 'slow',
  };
  const ask = (change: Partial<ResistanceQuery>) => defaultResistance({ ...plain, ...change }, tables);

  it('keeps 0 <= low <= value <= high, and slow >= fast in each of the three, everywhere', () => {
    for (const temperatureDegC of temperatures) {
      for (const stateOfCharge of charges) {
        for (const ageYears of ages) {
          const slow = ask({ temperatureDegC, stateOfCharge, ageYears, model: 'slow' });
          const fast = ask({ temperatureDegC, stateOfCharge, ageYears, model: 'fast' });
          expect(fast.low).toBeGreaterThan(0);
          for (const { low, value, high } of [slow, fast]) {
            expect(low).toBeLessThanOrEqual(value);
            expect(value).toBeLessThanOrEqual(high);
          }
          for (const bound of BOUNDS) expect(slow[bound]).toBeGreaterThanOrEqual(fast[bound]);
        }
      }
    }
  });

  it.each(['fast', 'slow'] as const)(
    'rises strictly in the cold and with age, and never falls as it empties (%s)',
    (model) => {
      const cold = temperatures.map((temperatureDegC) => ask({ temperatureDegC, model }).value);
      for (const [index, warmer] of cold.slice(1).entries()) expect(warmer).toBeLessThan(cold[index]!);
      const old = [0, 1, 3, 7, 12].map((ageYears) => ask({ ageYears, model }).value);
      for (const [index, older] of old.slice(1).entries()) expect(older).toBeGreaterThanOrEqual(old[index]!);
      expect(old[2]).toBeGreaterThan(old[0]!);
      const full = charges.map((stateOfCharge) => ask({ stateOfCharge, model }).value);
      for (const [index, fuller] of full.slice(1).entries()) expect(fuller).toBeLessThanOrEqual(full[index]!);
      expect(full[0]).toBeGreaterThan(full.at(-1)!);
    },
  );

  it('halves with twice the capacity, but for the protection board', () => {
    const board = tables.resistance[chemistry].boardOhm?.value ?? 0;
    expect(ask({ capacityAh: 200 }).value - board).toBeCloseTo((ask({}).value - board) / 2, 12);
  });

  it('is not better known than its weakest figure', () => {
    expect(ask({}).basis.status).not.toBe('published');
    expect(ask({}).origin).toBe('default');
  });
});

describe('default resistance of a 12 V block of 100 Ah, full, 25 degC', () => {
  // The ten-second figures of practice (mohm): flooded 9, AGM 5, gel 7; four iron phosphate cells with board 4.0 (2.4 to 8.2).
  it.each([
    ['flooded', 6, 9],
    ['agm', 6, 5],
    ['gel', 6, 7],
    ['lfp', 4, 4],
  ] as const)(
    '%s: the ten-second figure of practice stands between fast and slow',
    (chemistry, cells, tenSecondMohm) => {
      const of = (model: 'fast' | 'slow') =>
        1000 *
        defaultResistance(
          { chemistry, cells, boards: 1, capacityAh: 100, stateOfCharge: 1, temperatureDegC: 25, ageYears: 0, model },
          tables,
        ).value;
      expect(of('fast')).toBeLessThanOrEqual(tenSecondMohm);
      expect(of('slow')).toBeGreaterThanOrEqual(tenSecondMohm);
    },
  );
});

describe('settling of a string', () => {
  it.each(CHEMISTRIES)('%s: the RC model runs from the fast to the slow resistance and never falls', (chemistry) => {
    const part = makeString({ chemistry, blockNominalV: chemistry === 'lfp' ? 12.8 : chemistry === 'nmc' ? 14.4 : 12 });
    const model = rcModel(part, { ambientDegC: 25, tables });
    expect(resistanceAfter(model, 0)).toBe(model.instantOhm);
    let before = model.instantOhm;
    for (const seconds of [0.1, 1, 10, 60, 600, 1e5]) {
      const now = resistanceAfter(model, seconds);
      expect(now).toBeGreaterThan(before);
      before = now;
    }
    const slow = tables.relaxation[chemistry].reduce((sum, { share }) => sum + share, 0);
    // Shares are printed to six digits.
    expect(Math.abs(slow - 1)).toBeLessThan(2e-6);
  });

  it('an entered resistance leaves nothing to settle', () => {
    expect(rcModel(makeString({ resistanceOhm: 0.02 }), { ambientDegC: 25, tables })).toEqual({
      instantOhm: 0.02,
      elements: [],
    });
  });
});
