import { array, assert, constantFrom, integer, oneof, property, tuple } from 'fast-check';
import { describe, expect, test } from 'vitest';
import {
  curveText,
  echoOf,
  type FieldReading,
  factor,
  fieldUnit,
  figureText,
  firstText,
  halvedText,
  milliohm,
  type Parsed,
  parseQuantity,
  parseSize,
  pointsText,
  readCount,
  readCurve,
  readField,
  readLength,
  readPoints,
  readSizeField,
  shownField,
  sizeEcho,
  sizeText,
  type UnitName,
  type UnitsFirst,
  usualSizes,
  wholeFigureText,
} from '../../core/api.ts';
import { tables } from '../../data/index.ts';

const context = { practice: 'us-marine', tables: tables.conductors } as const;

function value<T>(reading: FieldReading<T>): { value: T; store: number | string; echo: string; note?: string } {
  if (reading.reading !== 'value') throw new Error(`expected a value, got ${JSON.stringify(reading)}`);
  return reading;
}

function choices<T>(reading: FieldReading<T>): readonly string[] {
  if (reading.reading !== 'ask') throw new Error(`expected a question, got ${JSON.stringify(reading)}`);
  return reading.choices.map(({ text }) => text);
}

function figure(parsed: Parsed<number>): number {
  if (!parsed.ok) throw new Error(parsed.message);
  return parsed.value;
}

describe('A quantity field', () => {
  test.each([
    ['10 ft', 'm', 3.048, '3.048 m'],
    [`10'6"`, 'm', 3.2004, '3.2 m'],
    ['3.2m', 'm', 3.2, '10 ft 6 in'],
    ['3 m + 40 cm', 'm', 3.4, '3.4 m · 11 ft 1.9 in'],
    ['210 mV', 'V', 0.21, '0.21 V'],
    ['0.21 V', 'V', 0.21, '210 mV'],
    ['2.1 mohm', 'ohm', 0.0021, '0.0021 Ω'],
    ['0.0021 ohm', 'ohm', 0.0021, '2.1 mΩ'],
    ['95F', 'degC', 35, '35 °C'],
    ['35 °C', 'degC', 35, '95 °F'],
    ['60 W', 'W', 60, ''],
    ['1.5 kW', 'W', 1500, '1500 W'],
    ['18 months', 'year', 1.5, '1.5 years'],
    ['85 %', '1', 0.85, ''],
  ] as const)('reads %s, keeps it as typed and shows the other unit in grey', (text, unit, expected, echo) => {
    const read = value(readField({ text: ` ${text} `, unit, first: 'metric' }));
    // A conversion leaves 15 significant digits.
    expect(read.value).toBeCloseTo(expected, 12);
    expect(read.store).toBe(text);
    expect(read.echo).toBe(echo);
  });

  test('takes a bare number in the unit that stands beside the field', () => {
    expect(value(readField({ text: '150', unit: 'A', first: 'metric' }))).toMatchObject({ value: 150, store: 150 });
    expect(value(readField({ text: '35', unit: 'degC', first: 'metric' }))).toMatchObject({
      value: 35,
      store: 35,
      echo: '95 °F',
    });
  });

  test('writes the unit beside the field into the job where it is not the unit of the job file', () => {
    expect(value(readField({ text: '95', unit: 'degC', first: 'us' }))).toMatchObject({ value: 35, store: '95 degF' });
    expect(value(readField({ text: '2.1', unit: 'ohm', bare: milliohm, first: 'metric' }))).toMatchObject({
      value: 0.0021,
      store: '2.1 mohm',
    });
    expect(value(readField({ text: '80', unit: '1', first: 'metric' }))).toMatchObject({ value: 0.8, store: '80 %' });
    expect(value(readField({ text: '-0.29', unit: '1/K', first: 'metric' })).value).toBeCloseTo(-0.0029, 15);
    expect(value(readField({ text: '1.25', unit: '1', bare: factor, first: 'metric' })).store).toBe(1.25);
  });

  test('asks metres or feet of a bare length, the units that come first standing first', () => {
    expect(choices(readField({ text: '10', unit: 'm', first: 'metric' }))).toEqual(['10 m', '10 ft']);
    expect(choices(readField({ text: '10', unit: 'm', first: 'us' }))).toEqual(['10 ft', '10 m']);
  });

  test('asks whether 0.8 beside a per cent sign is a share', () => {
    expect(choices(readField({ text: '0.8', unit: '1', first: 'metric' }))).toEqual(['80 %', '0.8 %']);
    expect(value(readField({ text: '0', unit: '1', first: 'metric' })).store).toBe(0);
  });

  test('never guesses at a comma', () => {
    expect(choices(readField({ text: '3,2 m', unit: 'm', first: 'metric' }))).toEqual(['3.2 m']);
    expect(choices(readField({ text: '1,200 W', unit: 'W', first: 'metric' }))).toEqual(['1.200 W', '1200 W']);
    expect(choices(readField({ text: '1,200,000 W', unit: 'W', first: 'metric' }))).toEqual(['1200000 W']);
  });

  test('says in one sentence what it cannot read', () => {
    expect(readField({ text: '3 kg', unit: 'm', first: 'metric' })).toEqual({
      reading: 'trouble',
      message: 'Expected a length such as 3.2 m or 10 ft, got "3 kg".',
    });
    expect(readField({ text: '  ', unit: 'm', first: 'metric' })).toEqual({ reading: 'empty' });
  });
});

describe('The switch between metric and US units', () => {
  test('shows a text as it was typed under either', () => {
    for (const first of ['metric', 'us'] as const) {
      expect(shownField({ given: '12 ft', unit: 'm', first })).toEqual({ text: '12 ft', sign: '', echo: '3.658 m' });
    }
  });

  test('shows a bare number in the units that come first and the other in grey', () => {
    expect(shownField({ given: 3.048, unit: 'm', first: 'metric' })).toEqual({
      text: '3.048 m',
      sign: '',
      echo: '10 ft',
    });
    expect(shownField({ given: 3.048, unit: 'm', first: 'us' })).toEqual({ text: '10 ft', sign: '', echo: '3.048 m' });
    expect(shownField({ given: 35, unit: 'degC', first: 'us' })).toEqual({ text: '95', sign: '°F', echo: '35 °C' });
    expect(shownField({ given: 0.0021, unit: 'ohm', bare: milliohm, first: 'us' }).text).toBe('2.1');
  });

  test('goes there and back without loss: 10 ft is 3.048 m is 10 ft, 2/0 AWG is 67.43 mm² of copper', () => {
    const metres = value(readField({ text: '10 ft', unit: 'm', first: 'us' }));
    expect(metres.echo).toBe('3.048 m');
    const back = value(readField({ text: metres.echo, unit: 'm', first: 'metric' }));
    expect(back.echo).toBe('10 ft');
    expect(back.value).toBe(metres.value);
    const size = value(readSizeField('2/0'));
    expect(sizeEcho({ size: size.value, metal: undefined, stranding: undefined }, context).short).toBe('67.43 mm²');
    expect(size.store).toBe('2/0');
  });

  test('what a field shows of a stored number reads back as that number', () => {
    const units: readonly UnitName[] = ['V', 'A', 'W', 'ohm', 'Ah', 'degC', 'year', '1/K', 'W/m2', 'kWh/m2/day', 'deg'];
    assert(
      property(
        constantFrom(...units),
        integer({ min: -200_000, max: 200_000 }),
        constantFrom<UnitsFirst>('metric', 'us'),
        (unit, thousandths, first) => {
          const given = thousandths / 1000;
          const shown = shownField({ given, unit, first });
          const read = value(readField({ text: shown.text, unit, first }));
          // Twelve digits stand in the field.
          expect(Math.abs(read.value - given)).toBeLessThanOrEqual(1e-9 * Math.max(1, Math.abs(given)));
        },
      ),
    );
  });
});

describe('A length of a run', () => {
  test('given there and back is halved in its own units, and says so', () => {
    expect(readLength({ text: '24 ft', way: 'there-and-back', first: 'us' })).toEqual({
      reading: 'value',
      value: 3.6576,
      store: '12 ft',
      echo: '3.658 m',
      note: '24 ft there and back = 12 ft one way',
    });
    expect(halvedText('10 ft 6 1/2 in')).toBe('5 ft 3.25 in');
  });

  test('is asked about where nobody has said which', () => {
    const asked = readLength({ text: '24 ft', way: 'unasked', first: 'us' });
    expect(asked).toMatchObject({
      reading: 'ask',
      choices: [
        { label: '24 ft one way', way: 'one-way' },
        { label: '24 ft there and back (12 ft one way)', way: 'there-and-back' },
      ],
    });
    expect(value(readLength({ text: '24 ft', way: 'one-way', first: 'us' })).store).toBe('24 ft');
  });

  test('asks metres or feet before it asks which way', () => {
    expect(choices(readLength({ text: '24', way: 'unasked', first: 'us' }))).toEqual(['24 ft', '24 m']);
  });

  test('halved is half of what was written, whatever the units', () => {
    const amount = oneof(
      integer({ min: 1, max: 500 }).map(String),
      integer({ min: 1, max: 5000 }).map((tenths) => String(tenths / 10)),
      constantFrom('1/2', '6 3/8', '5½', '¾'),
    );
    const term = tuple(amount, constantFrom('ft', 'm', 'cm', 'in', "'", '"')).map((words) => words.join(' '));
    assert(
      property(array(term, { minLength: 1, maxLength: 3 }), (terms) => {
        const text = terms.join(' + ');
        const whole = parseQuantity({ text, unit: 'm' });
        const half = parseQuantity({ text: halvedText(text), unit: 'm' });
        // Each figure is written with 12 digits.
        expect(figure(half)).toBeCloseTo(figure(whole) / 2, 9);
      }),
    );
  });
});

describe('A size field', () => {
  test.each([
    ['2/0', '2/0 AWG'],
    ['70mm2', '70 mm²'],
    ['250 MCM', '250 kcmil'],
    ['6 auto', '6 mm auto'],
  ])('reads %s and keeps it as typed', (text, meant) => {
    const read = value(readSizeField(text));
    expect(read.store).toBe(text);
    expect(sizeText(read.value)).toBe(meant);
  });

  test('asks which kind a bare number is, offering only kinds that exist', () => {
    expect(choices(readSizeField('6'))).toEqual(['6 mm2', '6 AWG', '6 SAE', '6 auto']);
    expect(choices(readSizeField('70'))).toEqual(['70 mm2']);
    expect(choices(readSizeField('00'))).toEqual(['00 AWG', '00 SAE']);
  });

  test('asks copper area or outside diameter of millimetres, AWG or SAE of a gauge', () => {
    expect(choices(readSizeField('6 mm'))).toEqual(['6 mm2', '6 auto']);
    expect(choices(readSizeField('6 gauge'))).toEqual(['6 AWG', '6 SAE']);
    expect(readSizeField('thick').reading).toBe('trouble');
  });

  test('every answer that it offers can be read', () => {
    assert(
      property(integer({ min: 1, max: 120 }), constantFrom('', ' mm', ' ga'), (number, word) => {
        const asked = readSizeField(`${String(number)}${word}`);
        if (asked.reading !== 'ask') return;
        for (const { text } of asked.choices) expect(parseSize(text).ok).toBe(true);
      }),
    );
  });
});

describe('The grey figure beside a size', () => {
  test('says which gauges a metric size lies between, and which has no more resistance as it is stranded', () => {
    const size = { system: 'mm2', areaMm2: 70 } as const;
    const flexible = sizeEcho({ size, metal: 'copper', stranding: 'flexible' }, context);
    expect(flexible.short).toBe('between 2/0 AWG and 3/0 AWG');
    expect(flexible.detail).toBe('3/0 AWG by metal; 2/0 AWG by resistance, flexible');
  });

  test('owns up where a trade list does not hold the size', () => {
    const echo = sizeEcho(
      { size: { system: 'auto', outsideDiameterMm: 59 }, metal: undefined, stranding: undefined },
      context,
    );
    expect(echo.short).toBe('');
    expect(echo.detail).toContain('give the size in mm2');
  });

  test('comes with the sizes of the tables to pick from, those of the units that come first at the top', () => {
    expect(usualSizes('metric', context)[0]?.system).toBe('mm2');
    expect(usualSizes('us', context)[0]?.system).toBe('awg');
  });
});

describe('The unit beside a field', () => {
  test('is Fahrenheit for who thinks in it, and none for a length', () => {
    expect(fieldUnit('degC', 'us')?.sign).toBe('°F');
    expect(fieldUnit('degC', 'metric')?.sign).toBe('°C');
    expect(fieldUnit('m', 'metric')).toBeUndefined();
  });

  test('an echo of a bare number follows the switch', () => {
    expect(echoOf({ value: 3.2, unit: 'm', first: 'metric' })).toBe('10 ft 6 in');
    expect(echoOf({ value: 3.2, unit: 'm', first: 'us' })).toBe('3.2 m');
  });
});

describe('A field for the curve of a fuse', () => {
  test('reads points of amps, seconds to melt and seconds to clear, with units or without', () => {
    expect(value(readCurve('400: 2: 10; 800 A: 200 ms: 1')).value).toEqual([
      [400, 2, 10],
      ['800 A', '200 ms', 1],
    ]);
  });

  test('says which point it cannot read', () => {
    expect(readCurve('400: 2: 10; 800: 1')).toEqual({
      reading: 'trouble',
      message: 'Expected amps, seconds to melt and seconds to clear such as 400: 2: 10, got "800: 1".',
    });
  });

  test('shows what the job file holds in a form that it reads again', () => {
    const curve = [
      [400, '2 min', 600],
      [800, 0.2, 1],
    ];
    expect(value(readCurve(curveText(curve))).value).toEqual(curve);
  });
});

describe('An efficiency field', () => {
  test('reads one share, or points of output and efficiency', () => {
    expect(value(readPoints('92 %')).value).toBe('92 %');
    expect(value(readPoints('10 %: 85 %; 50 %: 94 %')).value).toEqual([
      ['10 %', '85 %'],
      ['50 %', '94 %'],
    ]);
    expect(value(readPoints('10: 85, 50: 94')).value).toEqual([
      ['10 %', '85 %'],
      ['50 %', '94 %'],
    ]);
  });

  test('asks whether figures from 0 to 1 are shares', () => {
    expect(choices(readPoints('0.1: 0.85; 0.5: 0.94'))).toEqual([
      '10 %: 85 %; 50 %: 94 %',
      '0.1 %: 0.85 %; 0.5 %: 0.94 %',
    ]);
  });

  test('says which point it cannot read', () => {
    expect(readPoints('10 %: 85 %; 50 %')).toEqual({
      reading: 'trouble',
      message: 'Expected output and efficiency such as 50 %: 94 %, got "50 %".',
    });
  });

  test('shows what the job file holds in a form that it reads again', () => {
    expect(pointsText(0.92)).toBe('92 %');
    expect(
      value(
        readPoints(
          pointsText([
            [0.1, 0.85],
            ['50 %', 0.94],
          ]),
        ),
      ).value,
    ).toEqual([
      ['10 %', '85 %'],
      ['50 %', '94 %'],
    ]);
  });
});

describe('A field for a whole number', () => {
  test('takes nothing else', () => {
    expect(value(readCount(' 4 '))).toMatchObject({ value: 4, store: 4 });
    expect(readCount('4.5')).toEqual({ reading: 'trouble', message: 'Expected a whole number such as 4, got "4.5".' });
    expect(readCount('4 A').reading).toBe('trouble');
  });
});

describe('A figure of an answer', () => {
  test('comes as number and unit apart, with a real minus sign', () => {
    expect(figureText({ value: 6.2174, unit: 'A' })).toEqual({ number: '6.217', sign: '\u00a0A' });
    expect(figureText({ value: -0.0032, unit: 'V' })).toEqual({ number: '−3.2', sign: '\u00a0mV' });
    expect(wholeFigureText({ value: 0.72, unit: '1' })).toBe('72\u00a0%');
    expect(figureText({ value: 35, unit: 'deg' })).toEqual({ number: '35', sign: '°' });
  });

  test('is nought where only the dust of a calculation is left, and a picoampere is dust', () => {
    expect(wholeFigureText({ value: 1.1e-55, unit: 'A' })).toBe('0\u00a0A');
    expect(wholeFigureText({ value: -1e-12, unit: 'V' })).toBe('0\u00a0V');
    expect(wholeFigureText({ value: 2e-6, unit: 'ohm' })).toBe('2\u00a0µΩ');
  });

  test('that is assumed stands in the units that come first', () => {
    expect(firstText({ value: 20, unit: 'degC', first: 'us' })).toBe('68 °F');
    expect(firstText({ value: 3.2, unit: 'm', first: 'us' })).toBe('10 ft 6 in');
    expect(firstText({ value: 20, unit: 'degC', first: 'metric' })).toBe('20 °C');
    expect(firstText({ value: 0.0021, unit: 'ohm', first: 'us' })).toBe('2.1 mΩ');
  });
});
