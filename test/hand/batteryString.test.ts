/** Strings as sources, with the working beside the sum. */
import { expect, it } from 'vitest';
import { chargeWindow } from '../../core/battery/limits.ts';
import { stringSource } from '../../core/battery/stringSource.ts';
import { chemistryTables as tables } from '../../data/chemistry/chemistry.ts';
import { makeString } from '../core/batteryMaker.ts';

it('two 12 V AGM blocks of 150 Ah, half charged, at 0 degC, three years old', () => {
  const part = makeString({ blocksInSeries: 2, capacityAh: 150, stateOfCharge: 0.5, temperatureDegC: 0, ageYears: 3 });
  const slow = stringSource(part, { model: 'slow', ambientDegC: 25, tables });
  const fast = stringSource(part, { model: 'fast', ambientDegC: 25, tables });
  // Twelve cells. Rest: 2 x 12.30 V - 12 x 0.2 mV/K x 25 K = 24.60 - 0.06 = 24.54 V.
  expect(slow.emfV.value).toBeCloseTo(24.54, 10);
  // Cold: exp[(7000/8.314)(1/273.15 - 1/298.15)] = exp(841.953 x 3.06975e-4) = exp(0.258459) = 1.29493.
  // Half charged 1.3; three years is mid-life of AGM, 1.25: together 1.3 x 1.25 x 1.29493 = 2.10427.
  // Slow: 2 x 1.3 ohm Ah / 150 Ah = 17.333 mohm, x 2.10427 = 36.474 mohm.  Fast: 2 x 0.45/150 = 6 mohm, 12.626 mohm.
  // Tolerance: last digit of the working.
  expect(Math.abs(1000 * slow.resistanceOhm.value - 36.474)).toBeLessThan(0.001);
  expect(Math.abs(1000 * fast.resistanceOhm.value - 12.626)).toBeLessThan(0.001);
});

it('one 12.8 V iron phosphate block of 200 Ah, full, at 25 degC, new', () => {
  const part = makeString({ chemistry: 'lfp', blockNominalV: 12.8, capacityAh: 200, ageYears: 0 });
  const fast = stringSource(part, { model: 'fast', ambientDegC: 25, tables });
  // 4 cells: 0.20 ohm Ah / 200 Ah = 1.0 mohm, and one protection board of 1.5 mohm.
  expect(fast.resistanceOhm.value).toBeCloseTo(0.0025, 12);
  // Lowest, for the highest fault current: 0.10/200 = 0.5 mohm and no board.
  expect(fast.resistanceOhm.low).toBeCloseTo(0.0005, 12);
  // Highest: 0.32/200 = 1.6 mohm, x 1.1 (full) x 1.1 (age 0) = 1.936 mohm, and a board of 5 mohm.
  expect(fast.resistanceOhm.high).toBeCloseTo(0.006936, 12);
});

it('absorption of a 48 V flooded string at 10 degC', () => {
  // 24 cells: 24 x (14.6/6 + 15 K x 5 mV/K) = 58.4 + 1.8 = 60.2 V; low 24 x (2.4 + 15 x 4 mV) = 59.04 V.
  const { absorptionV } = chargeWindow({ chemistry: 'flooded', cells: 24, temperatureDegC: 10 }, tables);
  expect(absorptionV?.value).toBeCloseTo(60.2, 10);
  expect(absorptionV?.low).toBeCloseTo(59.04, 10);
});
