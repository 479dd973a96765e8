/** A solar array's curve: passes its label, peaks where the label says, falls everywhere. */
import * as fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { Defect } from '../../core/job/issue.ts';
import { arrayCurve, currentAt, maximumPower, openCircuitV, shortCircuitA } from '../../core/solar/arrayCurve.ts';
import { makeArray } from './batteryMaker.ts';

/** Full sun with cells at 25 degC: the air that much colder than the cells. */
const label = { irradianceWPerM2: 1000, ambientDegC: 25 - ((45 - 20) / 800) * 1000 };

const modules = [
  { name: '36 cells', fields: {} },
  { name: '60 cells', fields: { vocV: 40.2, iscA: 9.8, vmpV: 33, impA: 9.3 } },
  { name: '108 half cells', fields: { vocV: 37.5, iscA: 13.9, vmpV: 31.4, impA: 13.06 } },
  { name: '72 cells of an older kind', fields: { vocV: 44.2, iscA: 5.4, vmpV: 34.4, impA: 4.95 } },
];

describe.each(modules)('a module of $name', ({ fields }) => {
  const array = makeArray(fields);
  const curve = arrayCurve(array, label);

  it('passes the three points of its label', () => {
    // The fit is exact: 1e-9 is rounding.
    expect(Math.abs(openCircuitV(curve) / array.vocV - 1)).toBeLessThan(1e-9);
    expect(Math.abs(shortCircuitA(curve) / array.iscA - 1)).toBeLessThan(1e-9);
    expect(Math.abs(currentAt(curve, array.vmpV).currentA / array.impA - 1)).toBeLessThan(1e-9);
  });

  it('has its maximum power where the label says', () => {
    const peak = maximumPower(curve);
    // 1e-6: the top of the power curve is flat, its place is known to the root of the rounding.
    expect(Math.abs(peak.voltageV / array.vmpV - 1)).toBeLessThan(1e-6);
    expect(Math.abs(peak.currentA / array.impA - 1)).toBeLessThan(1e-6);
    expect(peak.powerW).toBeCloseTo(peak.voltageV * peak.currentA, 12);
  });

  it('falls steadily, with the slope of its own differences, from below 0 V to beyond open circuit', () => {
    const step = 1e-5;
    let before = Number.POSITIVE_INFINITY;
    for (let volts = -0.5 * array.vocV; volts <= 1.5 * array.vocV; volts += array.vocV / 997) {
      const { currentA, slopeSiemens } = currentAt(curve, volts);
      expect(currentA).toBeLessThanOrEqual(before + 1e-12);
      expect(slopeSiemens).toBeLessThanOrEqual(0);
      before = currentA;
      const rise = currentAt(curve, volts + step).currentA - currentAt(curve, volts - step).currentA;
      // 1e-6: rounding of amperes divided by the step, and the step's square.
      expect(Math.abs(slopeSiemens - rise / (2 * step))).toBeLessThan(1e-6 * (1 + Math.abs(slopeSiemens)));
    }
  });

  it('never has its power above the maximum', () => {
    const { powerW } = maximumPower(curve);
    for (let volts = 0; volts <= array.vocV; volts += array.vocV / 500) {
      expect(volts * currentAt(curve, volts).currentA).toBeLessThanOrEqual(powerW * (1 + 1e-12));
    }
  });
});

describe('any label above the straight line from short to open circuit', () => {
  it('has a falling curve through its points, in any light and weather', () => {
    fc.assert(
      fc.property(
        fc.double({ min: 1, max: 200, noNaN: true }),
        fc.double({ min: 0.05, max: 30, noNaN: true }),
        fc.double({ min: 0.55, max: 0.98, noNaN: true }),
        fc.double({ min: 0.55, max: 0.99, noNaN: true }),
        fc.double({ min: 1e-3, max: 1400, noNaN: true }),
        fc.double({ min: -40, max: 50, noNaN: true }),
        (vocV, iscA, voltPart, amperePart, irradianceWPerM2, ambientDegC) => {
          const array = makeArray({ vocV, iscA, vmpV: voltPart * vocV, impA: amperePart * iscA });
          const standard = arrayCurve(array, label);
          expect(Math.abs(currentAt(standard, 0).currentA / iscA - 1)).toBeLessThan(1e-6);
          expect(Math.abs(currentAt(standard, array.vmpV).currentA / array.impA - 1)).toBeLessThan(1e-6);
          expect(Math.abs(currentAt(standard, vocV).currentA)).toBeLessThan(1e-6 * iscA);
          const curve = arrayCurve(array, { irradianceWPerM2, ambientDegC });
          const steps = Array.from({ length: 60 }, (_, index) => (vocV * (index - 10)) / 25);
          const read = steps.map((volts) => currentAt(curve, volts));
          expect(read.every(({ slopeSiemens }) => slopeSiemens <= 0)).toBe(true);
          const rises = read.slice(1).filter(({ currentA }, index) => currentA > read[index]!.currentA + 1e-9 * iscA);
          expect(rises).toEqual([]);
          expect(maximumPower(curve).powerW).toBeGreaterThan(0);
        },
      ),
      { seed: 7, numRuns: 1500 },
    );
  });
});

describe('an array', () => {
  it('of 3 in series and 2 in parallel has three times the volts and twice the current', () => {
    const one = arrayCurve(makeArray(), { irradianceWPerM2: 700, ambientDegC: 15 });
    const six = arrayCurve(makeArray({ modulesInSeries: 3, stringsInParallel: 2 }), {
      irradianceWPerM2: 700,
      ambientDegC: 15,
    });
    for (const volts of [-2, 0, 12, 17, 20, 25]) {
      const single = currentAt(one, volts);
      const whole = currentAt(six, 3 * volts);
      expect(whole.currentA).toBeCloseTo(2 * single.currentA, 10);
      expect(whole.slopeSiemens).toBeCloseTo((2 / 3) * single.slopeSiemens, 10);
    }
    expect(maximumPower(six).powerW).toBeCloseTo(6 * maximumPower(one).powerW, 8);
  });

  it('in the dark gives nothing at any voltage', () => {
    const dark = arrayCurve(makeArray(), { irradianceWPerM2: 0, ambientDegC: 20 });
    for (const volts of [-5, 0, 12, 50]) expect(currentAt(dark, volts)).toEqual({ currentA: 0, slopeSiemens: 0 });
    expect(openCircuitV(dark)).toBe(0);
    expect(shortCircuitA(dark)).toBe(0);
    expect(maximumPower(dark)).toEqual({ voltageV: 0, currentA: 0, powerW: 0 });
  });

  it('in the last light still has a curve', () => {
    const dusk = arrayCurve(makeArray(), { irradianceWPerM2: 1e-6, ambientDegC: 20 });
    expect(shortCircuitA(dusk)).toBeGreaterThan(0);
    expect(openCircuitV(dusk)).toBeGreaterThan(0);
    expect(maximumPower(dusk).powerW).toBeGreaterThan(0);
  });

  it('that is lit takes current above open circuit: it does not block by itself', () => {
    const curve = arrayCurve(makeArray(), label);
    const open = openCircuitV(curve);
    expect(Math.abs(currentAt(curve, open).currentA)).toBeLessThan(1e-12);
    expect(currentAt(curve, open + 0.1).currentA).toBeLessThan(0);
    // Far beyond any real voltage there is still a finite, falling current for a solver to come back from.
    expect(currentAt(curve, open + 1000).currentA).toBeLessThan(currentAt(curve, open + 900).currentA);
    expect(Number.isFinite(currentAt(curve, open + 1000).slopeSiemens)).toBe(true);
  });

  it('has cells 31.25 K warmer than the air in full sun at a nominal cell temperature of 45 degC', () => {
    expect(arrayCurve(makeArray(), { irradianceWPerM2: 1000, ambientDegC: 25 }).cellDegC).toBeCloseTo(56.25, 12);
    expect(
      arrayCurve(makeArray({ nominalCellDegC: 47 }), { irradianceWPerM2: 800, ambientDegC: 20 }).cellDegC,
    ).toBeCloseTo(47, 12);
  });

  it('follows the coefficients of its label: volts, current and power', () => {
    const array = makeArray({ vocPerDegC: -0.0029, iscPerDegC: 0.0006, pmpPerDegC: -0.0037 });
    const warm = arrayCurve(array, { irradianceWPerM2: 1000, ambientDegC: label.ambientDegC + 40 });
    expect(openCircuitV(warm)).toBeCloseTo(22 * (1 - 0.0029 * 40), 9);
    expect(Math.abs(shortCircuitA(warm) / (6 * (1 + 0.0006 * 40)) - 1)).toBeLessThan(1e-6);
    expect(Math.abs(maximumPower(warm).powerW / (17.879 * 5.5944 * (1 - 0.0037 * 40)) - 1)).toBeLessThan(1e-9);
  });

  it('says which coefficients it assumed', () => {
    expect(arrayCurve(makeArray(), label).assumed.map((text) => text.split(':')[0])).toEqual([
      'vocPerDegC',
      'iscPerDegC',
      'nominalCellDegC',
    ]);
    const told = makeArray({ vocPerDegC: -0.003, iscPerDegC: 0.0005, nominalCellDegC: 45 });
    expect(arrayCurve(told, label).assumed).toEqual([]);
  });

  it('whose label leaves no room for a series resistance still passes its points, and says so', () => {
    // A thin-film label, whose slope is that of a shunt: the closed form would ask for a negative resistance.
    const curve = arrayCurve(makeArray({ vocV: 60.8, iscA: 2.01, vmpV: 47, impA: 1.7 }), label);
    expect(curve.module?.seriesOhm).toBe(0);
    expect(openCircuitV(curve)).toBeCloseTo(60.8, 9);
    expect(shortCircuitA(curve)).toBeCloseTo(2.01, 9);
    expect(currentAt(curve, 47).currentA).toBeCloseTo(1.7, 9);
    expect(curve.assumed.some((text) => text.startsWith('vmpV:'))).toBe(true);
    // Its peak is then not quite where the label has it, and a trifle higher.
    const peak = maximumPower(curve);
    expect(peak.powerW).toBeGreaterThanOrEqual(47 * 1.7);
    expect(peak.powerW).toBeLessThan(47 * 1.7 * 1.002);
  });

  it('whose label lies below the straight line from short to open circuit gets the straight line', () => {
    const curve = arrayCurve(makeArray({ vocV: 20, iscA: 5, vmpV: 6, impA: 1.5 }), label);
    // Half way up a straight line of 5 A to 20 V; 0.1 %: the bend is 1000 times as long as the line.
    expect(Math.abs(currentAt(curve, 10).currentA - 2.5)).toBeLessThan(0.0025);
    expect(curve.assumed.some((text) => text.startsWith('vmpV:'))).toBe(true);
  });

  it('whose label contradicts itself is a broken promise of the reader of jobs', () => {
    expect(() => arrayCurve(makeArray({ impA: 7 }), label)).toThrow(Defect);
    expect(() => arrayCurve(makeArray({ vmpV: 23 }), label)).toThrow(Defect);
  });
});
