/** Rest voltage: rises with charge, bands in order, honest about what it rests on. */
import { describe, expect, it } from 'vitest';
import { emfOfCells, emfPerCell } from '../../core/battery/emf.ts';
import type { Chemistry } from '../../core/job/part.ts';
import { chemistryTables as tables } from '../../data/chemistry/chemistry.ts';

const CHEMISTRIES: readonly Chemistry[] = ['flooded', 'agm', 'gel', 'lfp', 'nmc', 'nicd'];
const percents = Array.from({ length: 401 }, (_, index) => index / 400);

describe.each(CHEMISTRIES)('rest voltage of %s', (chemistry) => {
  it.each([-20, 0, 25, 45])('rises strictly with charge at %d degC', (temperatureDegC) => {
    let before = Number.NEGATIVE_INFINITY;
    for (const stateOfCharge of percents) {
      const { value } = emfPerCell({ chemistry, stateOfCharge, temperatureDegC }, tables);
      expect(value).toBeGreaterThan(before);
      before = value;
    }
  });

  it('keeps low <= value <= high, and low and high never fall with charge', () => {
    let before = { low: 0, high: 0 };
    for (const stateOfCharge of percents) {
      const emf = emfPerCell({ chemistry, stateOfCharge, temperatureDegC: 25 }, tables);
      expect(emf.low).toBeLessThanOrEqual(emf.value);
      expect(emf.high).toBeGreaterThanOrEqual(emf.value);
      // 1e-12: rounding of the interpolation.
      expect(emf.low).toBeGreaterThanOrEqual(before.low - 1e-12);
      expect(emf.high).toBeGreaterThanOrEqual(before.high - 1e-12);
      before = emf;
    }
  });

  it('has the slope of a difference of its own values', () => {
    const step = 1e-6;
    for (const stateOfCharge of [0.131, 0.37, 0.6204, 0.873]) {
      const at = (charge: number) => emfPerCell({ chemistry, stateOfCharge: charge, temperatureDegC: 25 }, tables);
      const difference = (at(stateOfCharge + step).value - at(stateOfCharge - step).value) / (2 * step);
      // 1e-6: rounding of volts divided by the step.
      expect(Math.abs(at(stateOfCharge).slopeV - difference)).toBeLessThan(1e-6);
    }
  });

  it('takes the nearer end beyond empty and full', () => {
    const at = (stateOfCharge: number) => emfPerCell({ chemistry, stateOfCharge, temperatureDegC: 25 }, tables).value;
    expect(at(-0.1)).toBe(at(0));
    expect(at(1.1)).toBe(at(1));
  });
});

describe('rest voltage', () => {
  it('scales with the cells in series, the band and the slope too', () => {
    const state = { chemistry: 'lfp', stateOfCharge: 0.5, temperatureDegC: 10 } as const;
    const one = emfPerCell(state, tables);
    const sixteen = emfOfCells(16, state, tables);
    expect(sixteen.value).toBeCloseTo(16 * one.value, 10);
    expect(sixteen.low).toBeCloseTo(16 * one.low, 10);
    expect(sixteen.high).toBeCloseTo(16 * one.high, 10);
    expect(sixteen.slopeV).toBeCloseTo(16 * one.slopeV, 10);
  });

  it('of a 12 V lead block moves by 1.2 mV per kelvin, of four iron phosphate cells at 10 % by -2 mV', () => {
    const change = (chemistry: Chemistry, cells: number, stateOfCharge: number) =>
      emfOfCells(cells, { chemistry, stateOfCharge, temperatureDegC: 35 }, tables).value -
      emfOfCells(cells, { chemistry, stateOfCharge, temperatureDegC: 25 }, tables).value;
    expect(change('agm', 6, 0.7)).toBeCloseTo(10 * 6 * 0.2e-3, 10);
    expect(change('lfp', 4, 0.1)).toBeCloseTo(10 * 4 * -0.4885e-3, 10);
    expect(change('nicd', 10, 0.5)).toBe(0);
  });

  it('says from memory where either neighbour of the point is from memory', () => {
    const status = (chemistry: Chemistry, stateOfCharge: number) =>
      emfPerCell({ chemistry, stateOfCharge, temperatureDegC: 25 }, tables).basis.status;
    expect(status('lfp', 0.5)).toBe('published');
    expect(status('lfp', 0.995)).toBe('from-memory');
    expect(status('gel', 0.55)).toBe('published');
    expect(status('gel', 0.45)).toBe('from-memory');
    expect(status('agm', 0.5)).toBe('from-memory');
  });

  it('of a full iron phosphate block at rest is well under its charging volts', () => {
    const full = emfOfCells(4, { chemistry: 'lfp', stateOfCharge: 1, temperatureDegC: 25 }, tables);
    expect(full.value).toBeGreaterThan(13.3);
    expect(full.value).toBeLessThan(13.8);
    // Fresh off the charger it may still show the end of charge.
    expect(full.high).toBeGreaterThan(14.3);
  });
});
