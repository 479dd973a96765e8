import * as fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { formatQuantity } from '../../core/units/formatQuantity.ts';
import { fahrenheitText, feetText } from '../../core/units/imperial.ts';
import { fixedText, numberText } from '../../core/units/numberText.ts';
import { parseQuantity } from '../../core/units/parseQuantity.ts';

test.each<[number, number, string]>([
  [0, 4, '0'],
  [-0, 4, '0'],
  [1.2, 4, '1.2'],
  [1.23456, 4, '1.235'],
  [9.9999, 3, '10'],
  [999.96, 4, '1000'],
  [12345.6, 3, '12346'],
  [0.000123456, 3, '0.000123'],
  [2.842e-14, 2, '2.8e-14'],
  [-1e-9, 3, '-1e-9'],
  [1e20, 3, '1e+20'],
  [Number.NaN, 4, 'not finite'],
])('%d to %d digits is %s', (value, digits, text) => {
  expect(numberText({ value, digits })).toBe(text);
});

test('a small negative number rounded to nought has no minus sign', () => {
  expect(fixedText({ value: -0.0004, decimals: 2 })).toBe('0');
  expect(fixedText({ value: -0.0004, decimals: 2, keepZeros: true })).toBe('0.00');
});

describe('quantities carry the prefixes of the trade', () => {
  test.each<[number, string, string]>([
    [0.0021, 'ohm', '2.1 mΩ'],
    [0.000004, 'ohm', '4 µΩ'],
    [12, 'ohm', '12 Ω'],
    [0.21, 'V', '210 mV'],
    [12.62, 'V', '12.62 V'],
    [0, 'V', '0 V'],
    [-0.05, 'V', '-50 mV'],
    [1500, 'A', '1.5 kA'],
    [9876, 'A2s', '9876 A²s'],
    [536_684, 'A2s', '536\u00a0700 A²s'],
    [2_430_000, 'A2s', '2\u00a0430\u00a0000 A²s'],
    [1.6, '', '1.6'],
    [96, 'A', '96 A'],
    [0.25, 'A', '250 mA'],
    [1204.6, 'W', '1.205 kW'],
    [999.96, 'W', '1 kW'],
    [800, 'Wh', '800 Wh'],
    [1200, 'Wh', '1.2 kWh'],
    [0.72, '1', '72 %'],
    [25, 'degC', '25 °C'],
    [-0.04, 'degC', '0 °C'],
    [35, 'mm2', '35 mm²'],
    [200, 'Ah', '200 Ah'],
    [3, 'furlong', '3 furlong'],
    [3, 'constructor', '3 constructor'],
  ])('%d %s is written %s', (value, unit, text) => {
    expect(formatQuantity({ value, unit })).toBe(text);
  });
  test('a column of one unit keeps it', () => {
    expect(formatQuantity({ value: 0.21, unit: 'V', prefix: false })).toBe('0.21 V');
  });
});

test('lengths in feet and inches, temperatures in Fahrenheit', () => {
  expect(feetText({ lengthM: 3.2004 })).toBe('10 ft 6 in');
  expect(feetText({ lengthM: 3.6576 })).toBe('12 ft');
  expect(feetText({ lengthM: 0.0254 })).toBe('1 in');
  expect(feetText({ lengthM: 0 })).toBe('0 in');
  expect(feetText({ lengthM: 3.6575 })).toBe('12 ft'); // 11 ft 11.996 in: the inch is carried
  expect(fahrenheitText({ temperatureDegC: 35 })).toBe('95 °F');
});

test('what is written with a prefix is read back, to the digits that were written', () => {
  fc.assert(
    fc.property(
      fc.constantFrom('V', 'A', 'W', 'ohm', 'Ah', 'Wh', 'm', 's', 'h', 'degC'),
      fc.double({ min: -1e5, max: 1e5, noNaN: true }),
      (unit, value) => {
        if (unit === 'degC' && value < -273) return;
        const text = formatQuantity({ value, unit, digits: 6 });
        expect(text).not.toMatch(/-0(?:\.0*)? /);
        const parsed = parseQuantity({ text, unit });
        if (!parsed.ok) throw new Error(`${text}: ${parsed.message}`);
        // Six significant digits are written; a temperature has one decimal.
        const allowed = unit === 'degC' ? 0.0501 : Math.abs(value) * 5.01e-6;
        expect(Math.abs(parsed.value - value)).toBeLessThanOrEqual(allowed);
      },
    ),
    { seed: 31, numRuns: 2000 },
  );
});
