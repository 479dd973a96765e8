import * as fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { parseQuantity } from '../../core/units/parseQuantity.ts';
import { type UnitName, unitKinds } from '../../core/units/unitName.ts';

function read(text: string, unit: UnitName): number {
  const parsed = parseQuantity({ text, unit });
  if (!parsed.ok) throw new Error(`${text}: ${parsed.message}`);
  return parsed.value;
}
function refusal(text: string, unit: UnitName): string {
  const parsed = parseQuantity({ text, unit });
  if (parsed.ok) throw new Error(`${text} was read as ${String(parsed.value)}`);
  return parsed.message;
}

describe('what people write is read in the unit of the field', () => {
  // Exact by the definitions of the units: 1 ft = 0.3048 m, 1 in = 25.4 mm, 1 yd = 0.9144 m (NIST SP 811, appendix B.8);
  // hp is 745.6998715822702 W there. Sums are tidied to 15 significant digits, so equality is meant exactly.
  test.each<[string, UnitName, number]>([
    ['12 ft', 'm', 3.6576],
    ['12ft', 'm', 3.6576],
    ['3 m + 40 cm', 'm', 3.4],
    ['3 m 40 cm', 'm', 3.4],
    ['3 m - 40 cm', 'm', 2.6],
    ['10 ft 6 in', 'm', 3.2004],
    ['10\'6"', 'm', 3.2004],
    ['10′ 6″', 'm', 3.2004],
    ['10 ft 6 1/2 in', 'm', 3.2131],
    ['10 ft 6½ in', 'm', 3.2131],
    ['3/4 in', 'm', 0.01905],
    ['-10 ft 6 in', 'm', -3.2004],
    ['2 yards', 'm', 1.8288],
    ['850 mm', 'm', 0.85],
    ['3.2 m', 'm', 3.2],
    ['8 mOhm', 'ohm', 0.008],
    ['8 mΩ', 'ohm', 0.008],
    ['2.1 milliohm', 'ohm', 0.0021],
    ['350 uOhm', 'ohm', 0.00035],
    ['350 µΩ', 'ohm', 0.00035],
    ['.5 ohm', 'ohm', 0.5],
    ['2 kW', 'W', 2000],
    ['2 kw', 'W', 2000],
    ['60 W + 15 W', 'W', 75],
    ['1.2 kWh', 'Wh', 1200],
    ['200 Ah', 'Ah', 200],
    ['200ah', 'Ah', 200],
    ['2500 mAh', 'Ah', 2.5],
    ['0.21 V', 'V', 0.21],
    ['210 mV', 'V', 0.21],
    ['210 mV', 'mV', 210],
    ['0.05 V', 'mV', 50],
    ['1.5 kA', 'A', 1500],
    ['12 amps', 'A', 12],
    ['2e1 A', 'A', 20],
    ['25 degC', 'degC', 25],
    ['25 °C', 'degC', 25],
    ['25 C', 'degC', 25],
    ['95 degF', 'degC', 35],
    ['95 deg F', 'degC', 35],
    ['95°F', 'degC', 35],
    ['-40 degF', 'degC', -40],
    ['298.15 K', 'degC', 25],
    ['0 K', 'degC', -273.15],
    ['90 min', 'h', 1.5],
    ['2 min', 's', 120],
    ['3 days', 'day', 3],
    ['36 h', 'day', 1.5],
    ['18 months', 'year', 1.5],
    ['35 deg', 'deg', 35],
    ['35°', 'deg', 35],
    ['85 %', '1', 0.85],
    ['-0.29 %/degC', '1/K', -0.0029],
    ['-0.29%/°C', '1/K', -0.0029],
    ['850 W/m²', 'W/m2', 850],
    ['0.85 kW/m2', 'W/m2', 850],
    ['3.4 kWh/m2/day', 'kWh/m2/day', 3.4],
    ['150 cm2', 'cm2', 150],
    ['1100 mm²', 'cm2', 11],
    ['2 in2', 'cm2', 12.9032],
    ['4.8 m³/h', 'm3/h', 4.8],
    ['2 l/s', 'm3/h', 7.2],
    ['20000 A²s', 'A2s', 20_000],
    ['400 A2s', 'A2s', 400],
    ['10ft2in', 'm', 3.0988],
  ])('%s as %s is %d', (text, unit, value) => {
    expect(read(text, unit)).toBe(value);
  });

  test('a horsepower is the mechanical one', () => {
    // NIST SP 811, appendix B.8: 745.6999 W to seven digits, hence the tolerance.
    expect(Math.abs(read('1 hp', 'W') - 745.6999)).toBeLessThan(5e-5);
  });
});

describe('what cannot be read is refused in words', () => {
  test.each<[string, UnitName]>([
    ['5 kg', 'm'],
    ['5 m', 'ohm'],
    ['5 A', 'V'],
    ['5 V', 'degC'],
    ['12', 'm'],
    ['', 'm'],
    ['m', 'm'],
    ['3 m +', 'm'],
    ['+ + 3 m', 'm'],
    ['3 m * 2', 'm'],
    ['(3 m)', 'm'],
    ['3 m; 4 m', 'm'],
    ['sqrt(9) m', 'm'],
    ['x m', 'm'],
    ['pi m', 'm'],
    ['3 m^2', 'm'],
    ['3 m/s', 'm'],
    ['import("fs")', 'm'],
    ['3 m to cm', 'm'],
    ['3,2 m', 'm'],
    ['1,200 W', 'W'],
    ['10² m', 'm'],
    ['1/0 m', 'm'],
    ['1e400 m', 'm'],
    ['NaN m', 'm'],
    ['Infinity m', 'm'],
    ['20 degC + 5 degC', 'degC'],
    ['-300 degC', 'degC'],
    ['-1 K', 'degC'],
    ['2 W 3 W', 'W'],
    ['constructor', 'm'],
    ['3 constructor', 'm'],
    ['3 __proto__', 'm'],
    ['3 toString', '1'],
    ['3 valueOf', 'm'],
    ['3 mOhm', 'm'],
    ['10%', 'm'],
    ['20 kA2s', 'A2s'],
    ['3 m2', 'm'],
    [`${'1 m + '.repeat(12)}1 m`, 'm'],
    [' '.repeat(100), 'm'],
    [`${'9'.repeat(79)} m`, 'm'],
  ])('%j is no %s', (text, unit) => {
    expect(refusal(text, unit)).toMatch(/^expected an? .+ such as .+, got ".*/);
  });

  test('the wrong kind of unit is named with what was expected', () => {
    expect(refusal('5 kg', 'm')).toBe('expected a length such as 3.2 m or 10 ft, got "5 kg"');
  });
  test('a figure without a unit is said to have none', () => {
    expect(refusal('12', 'm')).toBe('expected a length such as 3.2 m or 10 ft, got "12", which has no unit');
  });
  test('a decimal comma is pointed out, since it may be a thousands mark', () => {
    expect(refusal('1,200 W', 'W')).toContain('write a decimal point and no comma');
  });
  test('signs that would upset a terminal are shown as their codes', () => {
    expect(refusal('\u001b[31m5\u202e m', 'm')).not.toMatch(/[\p{Cc}\p{Cf}]/u);
  });
});

describe('properties', () => {
  test('a figure with the unit of its field is the figure itself', () => {
    const units = (Object.keys(unitKinds) as UnitName[]).filter((unit) => unit !== '1' && unit !== '1/K');
    fc.assert(
      fc.property(fc.constantFrom(...units), fc.integer({ min: -99_999, max: 99_999 }), (unit, thousandths) => {
        const value = thousandths / 1000;
        if (unit === 'degC' && value < -273.15) return;
        expect(read(`${String(value)} ${unit}`, unit)).toBe(value + 0);
      }),
      { seed: 11, numRuns: 500 },
    );
  });

  test('adding lengths is adding their metres', () => {
    fc.assert(
      fc.property(fc.nat(50_000), fc.nat(5000), (millimetres, tenthInches) => {
        const sum = read(`${String(millimetres)} mm + ${String(tenthInches / 10)} in`, 'm');
        // Two rounded conversions and one sum: 1e-12 of a metre is far above their dust and far below a tape measure.
        expect(Math.abs(sum - (millimetres / 1000 + tenthInches * 0.00254))).toBeLessThan(1e-12);
      }),
      { seed: 12, numRuns: 300 },
    );
  });

  test('no text whatever makes it throw or gives a value that is not finite', () => {
    const pieces = fc.constantFrom(
      '3',
      ' ',
      'm',
      '+',
      '-',
      '/',
      "'",
      '"',
      'ft',
      'e',
      '.',
      '°',
      'µ',
      '½',
      '(',
      'K',
      '%',
      '²',
      '\u0000',
      '\ud800',
      'degF',
      '0',
      '1e9',
    );
    const text = fc.oneof(
      fc.string({ unit: 'binary', maxLength: 100 }),
      fc.array(pieces, { maxLength: 30 }).map((list) => list.join('')),
    );
    fc.assert(
      fc.property(text, fc.constantFrom(...(Object.keys(unitKinds) as UnitName[])), (written, unit) => {
        const parsed = parseQuantity({ text: written, unit });
        const fit = parsed.ok
          ? Number.isFinite(parsed.value) && !Object.is(parsed.value, -0)
          : parsed.message.startsWith('expected ') && parsed.message.length < 400;
        expect([written, unit, fit]).toEqual([written, unit, true]);
      }),
      { seed: 13, numRuns: 3000 },
    );
  });
});
