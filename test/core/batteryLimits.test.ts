/** Charge windows, currents, temperatures and end volts by chemistry. */
import { describe, expect, it } from 'vitest';
import {
  chargeWindow,
  currentLimits,
  dischargeVolts,
  freezingTemperature,
  limitOf,
  temperatureWindow,
} from '../../core/battery/limits.ts';
import type { Chemistry } from '../../core/job/part.ts';
import { chemistryTables as tables } from '../../data/chemistry/chemistry.ts';

const CHEMISTRIES: readonly Chemistry[] = ['flooded', 'agm', 'gel', 'lfp', 'nmc', 'nicd'];

describe('the charge window', () => {
  it('of a 12 V gel block at 25 degC is 14.4 V with a float of 13.5 V (maker guide)', () => {
    const window = chargeWindow({ chemistry: 'gel', cells: 6, temperatureDegC: 25 }, tables);
    expect(window.absorptionV?.value).toBeCloseTo(14.4, 10);
    expect(window.floatV?.value).toBeCloseTo(13.5, 10);
    expect(window.equaliseV).toBeUndefined();
  });

  it('of a 12 V flooded block falls by 30 mV per kelvin: 14.6 V at 25 degC is 15.2 V at 5 degC (charger manual)', () => {
    const cold = chargeWindow({ chemistry: 'flooded', cells: 6, temperatureDegC: 5 }, tables);
    expect(cold.compensationVPerK?.value).toBeCloseTo(-0.03, 12);
    expect(cold.absorptionV?.value).toBeCloseTo(14.6 + 20 * 0.03, 10);
  });

  it('of lithium does not move with temperature, and charging stops at 0 degC', () => {
    const warm = chargeWindow({ chemistry: 'lfp', cells: 4, temperatureDegC: 25 }, tables);
    const cold = chargeWindow({ chemistry: 'lfp', cells: 4, temperatureDegC: -5 }, tables);
    expect(cold.absorptionV?.value).toBe(warm.absorptionV?.value);
    expect(warm.absorptionV?.value).toBeCloseTo(14.4, 10);
    expect(warm.absorptionV?.high).toBeCloseTo(14.6, 10);
    expect(warm.chargeTemperature.inside).toBe(true);
    expect(cold.chargeTemperature.inside).toBe(false);
  });

  it('does not go on beyond the temperatures between which charging is allowed', () => {
    const at = (temperatureDegC: number) =>
      chargeWindow({ chemistry: 'agm', cells: 6, temperatureDegC }, tables).absorptionV!.value;
    expect(at(70)).toBe(at(50));
    expect(at(-40)).toBe(at(-20));
    expect(at(-20)).toBeGreaterThan(at(50));
  });

  it.each(CHEMISTRIES)('of %s keeps low <= value <= high from -30 to 60 degC', (chemistry) => {
    for (let temperatureDegC = -30; temperatureDegC <= 60; temperatureDegC += 5) {
      const window = chargeWindow({ chemistry, cells: 12, temperatureDegC }, tables);
      for (const banded of [window.absorptionV, window.floatV, window.equaliseV, window.gassingV]) {
        if (banded === undefined) continue;
        expect(banded.low).toBeLessThanOrEqual(banded.value);
        expect(banded.high).toBeGreaterThanOrEqual(banded.value);
      }
      expect(window.absorptionV).toBeDefined();
    }
  });
});

describe('limits', () => {
  it('a 40 Ah AGM block takes at most 16 A and gives 160 A for a short time (its sheet)', () => {
    const limits = currentLimits({ chemistry: 'agm', capacityAh: 40 }, tables);
    expect(limits.chargeMaxA?.value).toBeCloseTo(16, 10);
    expect(limits.dischargeShortA?.value).toBeCloseTo(160, 10);
    expect(limits.chargeMaxA?.basis.status).toBe('published');
  });

  it('iron phosphate works from -20 to 60 degC, charges from 0 to 45 degC (maker sheets)', () => {
    expect(temperatureWindow('lfp', 'discharge', -20, tables).inside).toBe(true);
    expect(temperatureWindow('lfp', 'discharge', 61, tables).inside).toBe(false);
    expect(temperatureWindow('lfp', 'charge', 45, tables).inside).toBe(true);
    expect(temperatureWindow('lfp', 'charge', 46, tables).inside).toBe(false);
  });

  it.each(CHEMISTRIES)('%s: end volts < load cut < rest voltage half charged', (chemistry) => {
    const { endV, loadCutV } = dischargeVolts({ chemistry, cells: 1 }, tables);
    expect(endV!.value).toBeLessThan(loadCutV!.value);
    const half = tables.emf[chemistry].points.find((point) => point.stateOfCharge >= 0.48)!;
    expect(loadCutV!.value).toBeLessThan(half.value);
  });

  it('a quantity that a chemistry does not have is not there', () => {
    expect(limitOf('lfp', 'equaliseV', tables)).toBeUndefined();
    expect(limitOf('nmc', 'floatV', tables)).toBeUndefined();
  });

  it('an empty lead block freezes at -10 degC, a full one not before -57; lithium has no such limit', () => {
    expect(freezingTemperature({ chemistry: 'agm', stateOfCharge: 0 }, tables)?.temperatureDegC).toBe(-10);
    expect(freezingTemperature({ chemistry: 'flooded', stateOfCharge: 1 }, tables)?.temperatureDegC).toBe(-57);
    expect(freezingTemperature({ chemistry: 'lfp', stateOfCharge: 0 }, tables)).toBeUndefined();
  });
});
