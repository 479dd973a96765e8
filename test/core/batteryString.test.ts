/** A string as a source: entered figures win and are marked; what is assumed is said. */
import { describe, expect, it } from 'vitest';
import { cellsPerBlock } from '../../core/battery/cells.ts';
import type { StringContext } from '../../core/battery/stringSource.ts';
import { factsOf, stringEmfAtCharge, stringSource } from '../../core/battery/stringSource.ts';
import { chemistryTables as tables } from '../../data/chemistry/chemistry.ts';
import { makeString } from './batteryMaker.ts';

const slow: StringContext = { model: 'slow', ambientDegC: 25, tables };
const fast: StringContext = { ...slow, model: 'fast' };

describe('cells in a block', () => {
  it.each([
    ['flooded', 2, 1],
    ['flooded', 6, 3],
    ['agm', 12, 6],
    ['gel', 24, 12],
    ['lfp', 3.2, 1],
    ['lfp', 12.8, 4],
    ['lfp', 25.6, 8],
    ['lfp', 51.2, 16],
    ['lfp', 12, 4],
    ['lfp', 24, 8],
    ['nmc', 3.6, 1],
    ['nmc', 3.7, 1],
    ['nmc', 14.8, 4],
    ['nmc', 36, 10],
    ['nicd', 1.2, 1],
    ['nicd', 12, 10],
  ] as const)('%s of %d V has %d', (chemistry, blockNominalV, cells) => {
    expect(cellsPerBlock(chemistry, blockNominalV, tables)).toMatchObject({ known: true, cells });
  });

  it.each([
    ['agm', 13],
    ['agm', 3],
    ['nmc', 12],
    ['nicd', 1],
  ] as const)('%s of %d V fits no whole number of cells, and the answer says what is missing', (chemistry, volts) => {
    const count = cellsPerBlock(chemistry, volts, tables);
    const missing = count.known ? '' : count.missing;
    expect(missing).toContain('blockNominalV');
    expect(missing).toContain(`${volts} V`);
  });

  it('36 V of iron phosphate may be 11 or 12 cells: it does not choose', () => {
    const count = cellsPerBlock('lfp', 36, tables);
    if (count.known) throw new Error('chosen');
    expect(count.missing).toContain('11 to 12 cells');
  });
});

describe('a string source', () => {
  it('of two 12 V blocks has twice the EMF and twice the resistance of one', () => {
    const one = stringSource(makeString(), slow);
    const two = stringSource(makeString({ blocksInSeries: 2 }), slow);
    expect(two.emfV.value).toBeCloseTo(2 * one.emfV.value, 10);
    expect(two.resistanceOhm.value).toBeCloseTo(2 * one.resistanceOhm.value, 12);
  });

  it('the same cells in blocks of any size make the same lead-acid string', () => {
    const sixVolt = stringSource(makeString({ blocksInSeries: 4, blockNominalV: 6 }), slow);
    const twoVolt = stringSource(makeString({ blocksInSeries: 12, blockNominalV: 2 }), slow);
    expect(sixVolt.emfV.value).toBeCloseTo(twoVolt.emfV.value, 10);
    expect(sixVolt.resistanceOhm.value).toBeCloseTo(twoVolt.resistanceOhm.value, 12);
  });

  it('sixteen single iron phosphate cells have one protection board, four blocks of four have four', () => {
    const cells = stringSource(makeString({ chemistry: 'lfp', blocksInSeries: 16, blockNominalV: 3.2 }), fast);
    const blocks = stringSource(makeString({ chemistry: 'lfp', blocksInSeries: 4, blockNominalV: 12.8 }), fast);
    const board = tables.resistance.lfp.boardOhm!.value;
    expect(blocks.resistanceOhm.value - cells.resistanceOhm.value).toBeCloseTo(3 * board, 12);
  });

  it('entered figures win, serve fast and slow alike, and carry their origin', () => {
    const part = makeString(
      { emfV: 12.9, resistanceOhm: 0.011 },
      { origin: { emfV: 'measured', resistanceOhm: 'guess' } },
    );
    for (const context of [slow, fast]) {
      const { emfV, resistanceOhm, assumed } = stringSource(part, context);
      expect(emfV).toMatchObject({ value: 12.9, origin: 'measured' });
      expect(resistanceOhm).toMatchObject({ value: 0.011, origin: 'guess' });
      expect(emfV.basis.source).toBe('SRC-JOB-ENTRY');
      expect(assumed).toEqual([]);
    }
  });

  it('a measured figure has a narrower band than a label, a label than a guess', () => {
    const width = (origin: 'measured' | 'label' | 'guess') => {
      const { low, high } = stringSource(
        makeString({ resistanceOhm: 0.01 }, { origin: { resistanceOhm: origin } }),
        slow,
      ).resistanceOhm;
      return high - low;
    };
    expect(width('measured')).toBeLessThan(width('label'));
    expect(width('label')).toBeLessThan(width('guess'));
  });

  it("the job's own range is the band", () => {
    const part = makeString(
      { resistanceOhm: 0.01, emfV: 12.7 },
      { range: { resistanceOhm: [0.009, 0.015], emfV: [12.6, 12.75] } },
    );
    const { resistanceOhm, emfV } = stringSource(part, slow);
    expect([resistanceOhm.low, resistanceOhm.high]).toEqual([0.009, 0.015]);
    expect([emfV.low, emfV.high]).toEqual([12.6, 12.75]);
  });

  it('a range of the state of charge widens the band of the EMF', () => {
    const narrow = stringSource(makeString({ stateOfCharge: 0.6 }), slow).emfV;
    const wide = stringSource(makeString({ stateOfCharge: 0.6 }, { range: { stateOfCharge: [0.3, 0.9] } }), slow).emfV;
    expect(wide.value).toBe(narrow.value);
    expect(wide.low).toBeLessThan(narrow.low);
    expect(wide.high).toBeGreaterThan(narrow.high);
  });

  it('a rated short-circuit current gives the fast resistance, with the range of the current turned round', () => {
    const part = makeString({ shortCircuitA: 2000 }, { range: { shortCircuitA: [1600, 2500] } });
    const { emfV, resistanceOhm } = stringSource(part, fast);
    expect(resistanceOhm.value).toBeCloseTo(emfV.value / 2000, 12);
    expect(resistanceOhm.low).toBeCloseTo(emfV.value / 2500, 12);
    expect(resistanceOhm.high).toBeCloseTo(emfV.value / 1600, 12);
    const slowly = stringSource(part, slow).resistanceOhm;
    expect(slowly.value).toBeGreaterThanOrEqual(resistanceOhm.value);
    expect(slowly.low).toBeGreaterThanOrEqual(resistanceOhm.low);
    expect(slowly.high).toBeGreaterThanOrEqual(resistanceOhm.high);
  });

  it('takes the ambient temperature where it gives none, and says so', () => {
    const cold = stringSource(makeString(), { ...slow, ambientDegC: -10 });
    const own = stringSource(makeString({ temperatureDegC: -10 }), slow);
    expect(cold.resistanceOhm.value).toBe(own.resistanceOhm.value);
    expect(cold.assumed.some((text) => text.startsWith('temperatureDegC:'))).toBe(true);
    expect(own.assumed.some((text) => text.startsWith('temperatureDegC:'))).toBe(false);
  });

  it('says that it took the string as full and as new', () => {
    const { assumed } = stringSource(makeString(), slow);
    expect(assumed.some((text) => text.startsWith('stateOfCharge:'))).toBe(true);
    expect(assumed.some((text) => text.startsWith('ageYears:'))).toBe(true);
    const told = stringSource(makeString({ stateOfCharge: 0.5, ageYears: 2, temperatureDegC: 20 }), slow);
    expect(told.assumed).toEqual([]);
  });

  it('of unknown cells is a guess with a band of a cell more or less, and says what is missing', () => {
    const { emfV, assumed } = stringSource(makeString({ blockNominalV: 13 }), slow);
    expect(emfV.origin).toBe('guess');
    expect(emfV.high - emfV.low).toBeGreaterThan(2 * 2);
    expect(assumed.some((text) => text.startsWith('blockNominalV:'))).toBe(true);
  });

  it('moves an entered rest voltage along the curve of its chemistry', () => {
    const facts = factsOf(makeString({ chemistry: 'lfp', blockNominalV: 12.8, emfV: 13.25, stateOfCharge: 0.6 }), slow);
    expect(stringEmfAtCharge(facts, 0.6, tables)).toBeCloseTo(13.25, 12);
    expect(stringEmfAtCharge(facts, 0.4, tables)).toBeCloseTo(13.25 - 4 * (3.3032 - 3.2948), 10);
  });
});
