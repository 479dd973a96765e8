/** Networks small enough to be worked with a pencil, the working beside the answer. Volts and amps to nine decimals. */
import { describe, expect, it } from 'vitest';
import { arrayCurve, conductorResistance, currentAt, heatingLaw } from '../../core/api.ts';
import type { ArrayPart, CablePart, PartId } from '../../core/job/part.ts';
import { tables } from '../../data/index.ts';
import type { PartValue } from '../physics/jobDraft.ts';
import { ampsIn, answered, jobOf, stringOf, voltsAt } from '../physics/solveValue.ts';

const DECIMALS = 9;

function point(parts: readonly PartValue[], conditions: Record<string, unknown> = {}) {
  const { point: found } = answered(jobOf(parts, { conditions }));
  expect(found.outcome).toBe('solved');
  return found;
}

function answerOf(found: ReturnType<typeof point>, id: string) {
  return found.parts.get(id as PartId)!;
}

const load = (figure: Record<string, unknown>, plus = 'P', minus = 'N'): PartValue => ({
  id: 'load',
  kind: 'load',
  plus,
  minus,
  ...figure,
});

describe('strings in parallel', () => {
  const strings = [
    stringOf('A', { plus: 'P', minus: 'N', emfV: 12.8, resistanceOhm: 0.01 }),
    stringOf('B', { plus: 'P', minus: 'N', emfV: 12.6, resistanceOhm: 0.02 }),
  ];

  it('share a load by their EMF and resistance', () => {
    // V (1/0.01 + 1/0.02) = 12.8/0.01 + 12.6/0.02 - 30, so V = 1880/150.
    const found = point([...strings, load({ currentA: 30 })]);
    expect(voltsAt(found, 'P')).toBeCloseTo(1880 / 150, DECIMALS);
    // A: (12.8 - 12.5333)/0.01 = 26.667 A; B: (12.6 - 12.5333)/0.02 = 3.333 A; together 30 A.
    expect(ampsIn(found, 'A')).toBeCloseTo(80 / 3, DECIMALS);
    expect(ampsIn(found, 'B')).toBeCloseTo(10 / 3, DECIMALS);
  });

  it('feed each other at rest', () => {
    // (12.8 - 12.6)/(0.01 + 0.02) = 6.667 A out of A, into B.
    const found = point(strings);
    expect(ampsIn(found, 'A')).toBeCloseTo(20 / 3, DECIMALS);
    expect(ampsIn(found, 'B')).toBeCloseTo(-20 / 3, DECIMALS);
  });
});

describe('a string tapped at its middle', () => {
  // 24 V and 0.2 ohm: two halves of 12 V and 0.1 ohm. 10 A from the lower half: 12 - 0.1 · 10 = 11 V; above it 12 V more.
  const found = point([
    stringOf('S', { plus: 'P', minus: 'N', emfV: 24, resistanceOhm: 0.2, midpoint: 'M' }),
    load({ currentA: 10 }, 'M', 'N'),
  ]);

  it('sags on the loaded half only', () => {
    expect(voltsAt(found, 'M')).toBeCloseTo(11, DECIMALS);
    expect(voltsAt(found, 'P')).toBeCloseTo(23, DECIMALS);
    expect(ampsIn(found, 'S')).toBeCloseTo(0, DECIMALS);
  });

  it('delivers what its tap gives too: 10 A at 11 V', () => {
    expect(answerOf(found, 'S').powerW).toBeCloseTo(110, 6);
  });
});

describe('wires', () => {
  const bank = stringOf('S', { plus: 'P', minus: 'N', emfV: 12.6, resistanceOhm: 0.02 });

  it('out and back each take their part: 10 A through 0.01 out, 0.01 back and 0.02 inside leave 12.2 V', () => {
    const found = point([
      bank,
      {
        id: 'run',
        kind: 'pair',
        from: { plus: 'P', minus: 'N' },
        to: { plus: 'p', minus: 'n' },
        lengthM: 3,
        resistanceOhm: 0.01,
      },
      load({ currentA: 10 }, 'p', 'n'),
    ]);
    expect(voltsAt(found, 'p') - voltsAt(found, 'n')).toBeCloseTo(12.2, DECIMALS);
    expect(ampsIn(found, 'run.plus')).toBeCloseTo(10, DECIMALS);
    expect(ampsIn(found, 'run.minus')).toBeCloseTo(10, DECIMALS);
    expect(voltsAt(found, 'n')).toBeCloseTo(0.1, DECIMALS);
  });

  it('of two side by side, 0.010 ohm as measured with each its ends of 0.002 ohm, drop (0.010 + 0.002/2) · 10 A = 0.11 V', () => {
    const found = point([
      bank,
      { id: 'W', kind: 'cable', from: 'P', to: 'L', lengthM: 2, resistanceOhm: 0.01, endOhm: 0.002, inParallel: 2 },
      load({ currentA: 10 }, 'L'),
    ]);
    expect(voltsAt(found, 'P') - voltsAt(found, 'L')).toBeCloseTo(0.11, DECIMALS);
    expect(answerOf(found, 'W').powerW).toBeCloseTo(1.1, DECIMALS);
  });

  it('warmed by their own current: T = ambient + rise (I/ampacity)², V = I R20 (1 + alpha (T - 20))', () => {
    const cable = {
      lengthM: 4,
      size: '16 mm2',
      metal: 'copper',
      stranding: 'stranded',
      insulationDegC: 70,
      run: 'free-air',
      ambientDegC: 30,
    };
    const found = point([bank, { id: 'W', kind: 'cable', from: 'P', to: 'L', ...cable }, load({ currentA: 90 }, 'L')]);
    const part = {
      ...cable,
      size: { system: 'mm2', areaMm2: 16 },
      inParallel: 1,
      loadedConductors: undefined,
    } as unknown as CablePart;
    const resistance = conductorResistance(part, { practice: 'iec-land', tables: tables.conductors });
    const warm = heatingLaw(part, { practice: 'iec-land', ambientDegC: 30, tables: tables.conductors });
    if ('missing' in resistance || 'missing' in warm) throw new Error('the tables hold 16 mm2');
    const degC = 30 + warm.riseAtRatedK * (90 / warm.ampacityA) ** 2;
    const dropV = 90 * resistance.at20Ohm * (1 + resistance.alphaPerK * (degC - 20));
    expect(answerOf(found, 'W').conductorDegC).toBeCloseTo(degC, 6);
    expect(answerOf(found, 'W').dropV).toBeCloseTo(dropV, DECIMALS);
  });

  it('of a busbar carry what is still to come: 30, 20, 10 A along three taps', () => {
    const found = point([
      bank,
      { id: 'bar', kind: 'busbar', junctions: ['P', 'a', 'b', 'c'], segmentOhm: 0.001 },
      ...['a', 'b', 'c'].map((plus) => ({ ...load({ currentA: 10 }, plus), id: `load ${plus}` })),
    ]);
    expect(answerOf(found, 'bar').segmentsA?.map((amps) => Math.round(amps! * 1e9) / 1e9)).toEqual([30, 20, 10]);
    expect(ampsIn(found, 'bar')).toBeCloseTo(30, DECIMALS);
    // 0.001 · (30 + 20 + 10) = 0.06 V to the last tap.
    expect(voltsAt(found, 'P') - voltsAt(found, 'c')).toBeCloseTo(0.06, DECIMALS);
  });

  it('through a diode lose its forward volts as well: 12.6 - 10 · 0.02 - 0.6 - 10 · 0.05 = 11.3 V', () => {
    const found = point([
      bank,
      { id: 'D', kind: 'diode', from: 'P', to: 'L', slopeOhm: 0.05 },
      load({ currentA: 10 }, 'L'),
    ]);
    expect(voltsAt(found, 'L')).toBeCloseTo(11.3, DECIMALS);
  });
});

describe('loads of fixed power', () => {
  it('take 20 A at 10 V: of V² - 12 V + 0.1 · 200 = 0 the roots are 10 and 2', () => {
    const found = point([
      stringOf('S', { plus: 'P', minus: 'N', emfV: 12, resistanceOhm: 0.1 }),
      load({ powerW: 200 }),
    ]);
    expect(voltsAt(found, 'P')).toBeCloseTo(10, DECIMALS);
    expect(ampsIn(found, 'load')).toBeCloseTo(20, DECIMALS);
  });

  it('of an inverter: 500 W of 1000 at 0.875, between 0.80 at a fifth and 0.90 at three fifths', () => {
    const inverter = {
      id: 'INV',
      kind: 'inverter',
      plus: 'P',
      minus: 'N',
      acPowerW: 500,
      ratedW: 1000,
      efficiency: [
        [0.2, 0.8],
        [0.6, 0.9],
      ],
      standbyW: 8,
    };
    const bank = stringOf('S', { plus: 'P', minus: 'N', emfV: 25, resistanceOhm: 0.01 });
    expect(answerOf(point([bank, inverter]), 'INV').powerW).toBeCloseTo(500 / 0.875, 6);
    // At rest it takes its standby; a small output takes no less than that.
    expect(answerOf(point([bank, { ...inverter, acPowerW: 0 }]), 'INV').powerW).toBeCloseTo(8, 6);
    expect(answerOf(point([bank, { ...inverter, acPowerW: 2 }]), 'INV').powerW).toBeCloseTo(8, 6);
  });
});

describe('a charger with a bank of 13 V behind 0.1 ohm and a load of 5 A', () => {
  const at = (outputA: number, setpointV: number) =>
    point([
      stringOf('S', { plus: 'P', minus: 'N', emfV: 13, resistanceOhm: 0.1 }),
      { id: 'C', kind: 'charger', plus: 'P', minus: 'N', outputA, setpointV },
      load({ currentA: 5 }),
    ]);

  it('of 20 A holds 14 V with 15 A: 5 for the load and (14 - 13)/0.1 = 10 for the bank', () => {
    const found = at(20, 14);
    expect(voltsAt(found, 'P')).toBeCloseTo(14, DECIMALS);
    expect(ampsIn(found, 'C')).toBeCloseTo(15, DECIMALS);
    expect(ampsIn(found, 'S')).toBeCloseTo(-10, DECIMALS);
  });

  it('of 12 A gives all of it at 13 + 0.1 · 7 = 13.7 V', () => {
    const found = at(12, 14);
    expect(voltsAt(found, 'P')).toBeCloseTo(13.7, DECIMALS);
    expect(ampsIn(found, 'C')).toBeCloseTo(12, DECIMALS);
  });

  it('set to 12 V gives nothing: the bank alone stands at 13 - 0.5 = 12.5 V', () => {
    const found = at(20, 12);
    expect(voltsAt(found, 'P')).toBeCloseTo(12.5, DECIMALS);
    expect(ampsIn(found, 'C')).toBe(0);
  });

  it('beside a second one set lower, with no bank, holds its own volts and feeds the load alone', () => {
    // The lead of 0.5 mohm carries nothing: the lower one never takes current in.
    const found = point([
      { id: 'high', kind: 'charger', plus: 'P', minus: 'N', outputA: 30, setpointV: 13.8 },
      { id: 'low', kind: 'charger', plus: 'Q', minus: 'N', outputA: 30, setpointV: 13.6 },
      { id: 'lead', kind: 'joint', from: 'P', to: 'Q', resistanceOhm: 0.0005 },
      load({ powerW: 41.4 }),
    ]);
    expect(voltsAt(found, 'P')).toBeCloseTo(13.8, DECIMALS);
    expect(ampsIn(found, 'load')).toBeCloseTo(3, DECIMALS);
    expect(ampsIn(found, 'high')).toBeCloseTo(3, DECIMALS);
    expect(ampsIn(found, 'low')).toBe(0);
  });
});

describe('several limited sources with no bank', () => {
  it('on one pair of posts: 7 A at the limit of the higher charger, the rest from the lower one, which holds 12.4 V', () => {
    // At 12.4 V: 12.4/4 + 50/12.4 = 3.1 + 4.0323 = 7.1323 A, more than the 7 A of the charger set to 12.5 V.
    const found = point([
      { id: 'high', kind: 'charger', plus: 'P', minus: 'N', outputA: 7, setpointV: 12.5 },
      { id: 'low', kind: 'charger', plus: 'P', minus: 'N', outputA: 18, setpointV: 12.4 },
      load({ powerW: 50 }),
      { id: 'lamp', kind: 'load', plus: 'P', minus: 'N', resistanceOhm: 4 },
    ]);
    expect(voltsAt(found, 'P')).toBeCloseTo(12.4, DECIMALS);
    expect(ampsIn(found, 'high')).toBeCloseTo(7, DECIMALS);
    expect(ampsIn(found, 'low')).toBeCloseTo(3.1 + 50 / 12.4 - 7, DECIMALS);
  });
});

describe('a converter from a bank of 25 V behind 0.1 ohm', () => {
  const from = [stringOf('S', { plus: 'P', minus: 'N', emfV: 25, resistanceOhm: 0.1 })];
  const converter = (more: Record<string, unknown>): PartValue => ({
    id: 'DC',
    kind: 'converter',
    from: { plus: 'P', minus: 'N' },
    to: { plus: 'O', minus: 'N' },
    outputV: 11.5,
    outputA: 30,
    efficiency: 0.8,
    ...more,
  });

  it('draws 10 A at 24 V for 16 A at 11.5 V: 184/0.8 + 10 W of its own = 240 W', () => {
    const found = point([...from, converter({ standbyW: 10 }), load({ currentA: 16 }, 'O')]);
    expect(voltsAt(found, 'O')).toBeCloseTo(11.5, DECIMALS);
    expect(voltsAt(found, 'P')).toBeCloseTo(24, DECIMALS);
    expect(answerOf(found, 'DC')).toMatchObject({ state: 'voltage-held' });
    expect(answerOf(found, 'DC').inputA).toBeCloseTo(10, DECIMALS);
    expect(answerOf(found, 'DC').powerW).toBeCloseTo(240 - 184, 6);
  });

  it('at its limit of 10 A into 1 ohm gives 10 V, and draws 125 W: V = (25 + sqrt(625 - 50))/2', () => {
    const found = point([...from, converter({ outputA: 10 }), load({ resistanceOhm: 1 }, 'O')]);
    expect(voltsAt(found, 'O')).toBeCloseTo(10, DECIMALS);
    expect(voltsAt(found, 'P')).toBeCloseTo((25 + Math.sqrt(575)) / 2, DECIMALS);
  });

  it('with an output of its own minus feeds the same load from the same input', () => {
    const found = point([
      ...from,
      converter({ to: { plus: 'O', minus: 'o' }, standbyW: 10 }),
      load({ currentA: 16 }, 'O', 'o'),
    ]);
    expect(voltsAt(found, 'O') - voltsAt(found, 'o')).toBeCloseTo(11.5, DECIMALS);
    expect(voltsAt(found, 'P')).toBeCloseTo(24, DECIMALS);
  });
});

describe('an array of 20 V and 5 A at its best point, in full sun, its cells at 25 °C', () => {
  const array = {
    id: 'PV',
    kind: 'array',
    plus: 'A',
    minus: 'N',
    modulesInSeries: 1,
    stringsInParallel: 1,
    vocV: 25,
    iscA: 5.4,
    vmpV: 20,
    impA: 5,
    nominalCellDegC: 20,
  };
  const sun = { ambientDegC: 25, irradianceWPerM2: 1000 };
  const harvest = (type: 'mppt' | 'pwm', more: Record<string, unknown> = {}) =>
    point(
      [
        array,
        stringOf('S', { plus: 'P', minus: 'N', emfV: 12.5, resistanceOhm: 0.1 }),
        {
          id: 'MC',
          kind: 'controller',
          from: { plus: 'A', minus: 'N' },
          to: { plus: 'P', minus: 'N' },
          type,
          outputA: 30,
          maxInputV: 100,
          setpointV: 15,
          ...more,
        },
      ],
      sun,
    );
  const curve = arrayCurve(array as unknown as ArrayPart, { ambientDegC: 25, irradianceWPerM2: 1000 });

  it('gives 95 W through a tracking controller: V (V - 12.5)/0.1 = 95', () => {
    const found = harvest('mppt');
    const volts = (12.5 + Math.sqrt(12.5 ** 2 + 4 * 9.5)) / 2;
    expect(voltsAt(found, 'P')).toBeCloseTo(volts, 7);
    // The best point is flat: its volts are less sharp than its watts.
    expect(voltsAt(found, 'A')).toBeCloseTo(20, 5);
    expect(ampsIn(found, 'PV')).toBeCloseTo(5, 5);
  });

  it('gives what a limit of 4 A leaves it, from the high-voltage side of its curve', () => {
    const found = harvest('mppt', { outputA: 4 });
    expect(voltsAt(found, 'P')).toBeCloseTo(12.9, DECIMALS);
    // 12.9 · 4 / 0.95 = 54.316 W, at more than 20 V.
    const { inputA, inputV } = answerOf(found, 'MC');
    expect(inputA! * inputV!).toBeCloseTo((12.9 * 4) / 0.95, 6);
    expect(inputV).toBeGreaterThan(20);
    expect(currentAt(curve, inputV!).currentA).toBeCloseTo(inputA!, 6);
  });

  it('gives (13 - 12.5)/0.1 = 5 A at a set point of 13 V', () => {
    const found = harvest('mppt', { setpointV: 13 });
    expect(voltsAt(found, 'P')).toBeCloseTo(13, DECIMALS);
    expect(answerOf(found, 'MC').outputA).toBeCloseTo(5, DECIMALS);
  });

  const array2 = { ...array, minus: 'a' };
  const tracker = (more: Record<string, unknown>): PartValue => {
    const ports = { from: { plus: 'A', minus: 'a' }, to: { plus: 'O', minus: 'o' } };
    return { id: 'MC', kind: 'controller', ...ports, type: 'mppt', outputA: 30, maxInputV: 100, ...more };
  };

  it('gives its 95 W to a bare resistor of 4 ohm at sqrt(95 · 4) = 19.49 V, below the set point, whatever else there is', () => {
    const found = point(
      [
        array2,
        tracker({ setpointV: 30 }),
        { id: 'heater', kind: 'load', plus: 'O', minus: 'o', resistanceOhm: 4 },
        stringOf('S', { plus: 'P', minus: 'N', emfV: 25, resistanceOhm: 0.1 }),
        load({ currentA: 2 }),
      ],
      sun,
    );
    expect(voltsAt(found, 'O') - voltsAt(found, 'o')).toBeCloseTo(Math.sqrt(380), 6);
    expect(voltsAt(found, 'P')).toBeCloseTo(24.8, DECIMALS);
  });

  it('holds its set point of 15 V alone, with 52.5 of its 95 W, where a charger is set lower', () => {
    // 15 V: 15/10 + 2 = 3.5 A, 52.5 W of the 95 W; the charger at 14 V stands idle.
    const found = point(
      [
        array2,
        tracker({ setpointV: 15 }),
        { id: 'C', kind: 'charger', plus: 'O', minus: 'o', outputA: 20, setpointV: 14 },
        { id: 'lamp', kind: 'load', plus: 'O', minus: 'o', resistanceOhm: 10 },
        load({ currentA: 2 }, 'O', 'o'),
      ],
      sun,
    );
    expect(voltsAt(found, 'O') - voltsAt(found, 'o')).toBeCloseTo(15, DECIMALS);
    expect(ampsIn(found, 'C')).toBe(0);
    expect(answerOf(found, 'MC').outputA).toBeCloseTo(3.5, DECIMALS);
  });

  it('works at the volts of the bank through a direct controller', () => {
    const found = harvest('pwm');
    const { inputA, inputV, outputA, outputV } = answerOf(found, 'MC');
    expect(inputV).toBeCloseTo(outputV!, DECIMALS);
    expect(inputA).toBeCloseTo(outputA!, DECIMALS);
    expect(currentAt(curve, inputV!).currentA).toBeCloseTo(inputA!, 7);
    expect(outputV).toBeCloseTo(12.5 + 0.1 * outputA!, DECIMALS);
  });

  it('is held back by a direct controller at its set point, its own volts rising', () => {
    const found = harvest('pwm', { setpointV: 12.8 });
    // (12.8 - 12.5)/0.1 = 3 A.
    expect(answerOf(found, 'MC').outputA).toBeCloseTo(3, DECIMALS);
    expect(voltsAt(found, 'P')).toBeCloseTo(12.8, DECIMALS);
    expect(voltsAt(found, 'A')).toBeGreaterThan(20);
    expect(currentAt(curve, voltsAt(found, 'A')).currentA).toBeCloseTo(3, 6);
  });

  it('holds 19.5 V by itself rather than 12 V with the charger’s help: of two answers the one of higher volts', () => {
    // 95 W at 19.5 V are 4.87 A, and the array gives 5 A at 20 V. At 12 V they would be 7.92 A: 5.4 A of sun, 2.5 A of charger.
    const found = point(
      [
        array,
        {
          id: 'MC',
          kind: 'controller',
          from: { plus: 'A', minus: 'N' },
          to: { plus: 'P', minus: 'N' },
          type: 'pwm',
          outputA: 30,
          maxInputV: 100,
          setpointV: 19.5,
        },
        { id: 'C', kind: 'charger', plus: 'P', minus: 'N', outputA: 20, setpointV: 12 },
        load({ powerW: 95 }),
      ],
      sun,
    );
    expect(voltsAt(found, 'P')).toBeCloseTo(19.5, DECIMALS);
    expect(ampsIn(found, 'C')).toBe(0);
  });

  it('takes nothing back at night', () => {
    const found = point(
      [
        array,
        stringOf('S', { plus: 'P', minus: 'N', emfV: 12.5, resistanceOhm: 0.1 }),
        {
          id: 'MC',
          kind: 'controller',
          from: { plus: 'A', minus: 'N' },
          to: { plus: 'P', minus: 'N' },
          type: 'pwm',
          outputA: 30,
          maxInputV: 100,
          setpointV: 15,
        },
      ],
      { irradianceWPerM2: 0 },
    );
    expect(voltsAt(found, 'P')).toBeCloseTo(12.5, DECIMALS);
    expect(answerOf(found, 'MC').outputA).toBe(0);
  });
});

describe('a part with one side dead', () => {
  const bank = stringOf('S', { plus: 'P', minus: 'N', emfV: 12.5, resistanceOhm: 0.1 });

  it('a converter with nothing at its input gives a bank at its output nothing', () => {
    const ports = { from: { plus: 'X', minus: 'x' }, to: { plus: 'P', minus: 'N' } };
    const found = point([
      bank,
      { id: 'DC', kind: 'converter', ...ports, outputV: 13.5, outputA: 10 },
      load({ currentA: 2 }),
    ]);
    // The bank alone: 12.5 - 0.1 · 2.
    expect(voltsAt(found, 'P')).toBeCloseTo(12.3, DECIMALS);
    expect(answerOf(found, 'DC').outputA).toBe(0);
  });

  it('a direct controller whose array has lost its return leaves the bank alone', () => {
    const label = { modulesInSeries: 1, stringsInParallel: 1, vocV: 22, iscA: 5.4, vmpV: 18, impA: 5 };
    const ports = { from: { plus: 'A', minus: 'a' }, to: { plus: 'P', minus: 'N' } };
    const found = point([
      { id: 'PV', kind: 'array', plus: 'A', minus: 'torn off', ...label },
      { id: 'MC', kind: 'controller', ...ports, type: 'pwm', outputA: 30, maxInputV: 100, setpointV: 12 },
      bank,
      load({ currentA: 2 }),
    ]);
    expect(voltsAt(found, 'P') - voltsAt(found, 'N')).toBeCloseTo(12.3, DECIMALS);
    expect(answerOf(found, 'MC').outputA).toBeCloseTo(0, DECIMALS);
  });
});

describe('beyond what can be delivered', () => {
  it('one heavy load is named, not the small one beside it', () => {
    // E²/(4R) = 144/0.4 = 360 W less what the lamp's amps cost: V = 12 - 0.1 (1 + I), best V = 5.95, P = 5.95²/0.1 = 354.025 W.
    const { point: found } = answered(
      jobOf([
        stringOf('S', { plus: 'P', minus: 'N', emfV: 12, resistanceOhm: 0.1 }),
        { id: 'lamp', kind: 'load', plus: 'P', minus: 'N', currentA: 1 },
        { id: 'heater', kind: 'load', plus: 'P', minus: 'N', powerW: 360 },
      ]),
    );
    expect(found.outcome).toBe('collapse');
    expect(found.collapse?.load).toBe('heater');
    expect(found.collapse!.largestDeliverableW / 354.025).toBeGreaterThan(0.999);
    expect(found.collapse!.largestDeliverableW / 354.025).toBeLessThan(1.001);
  });

  it('an idle controller elsewhere takes no part in it: a charger of 12 V feeds 24 W', () => {
    const found = point(
      [
        {
          id: 'PV',
          kind: 'array',
          plus: 'A',
          minus: 'a',
          modulesInSeries: 1,
          stringsInParallel: 1,
          vocV: 25,
          iscA: 5.4,
          vmpV: 20,
          impA: 5,
        },
        {
          id: 'MC',
          kind: 'controller',
          from: { plus: 'A', minus: 'a' },
          to: { plus: 'X', minus: 'a' },
          type: 'mppt',
          outputA: 30,
          maxInputV: 100,
          setpointV: 14,
        },
        { id: 'C', kind: 'charger', plus: 'P', minus: 'N', outputA: 20, setpointV: 12 },
        load({ powerW: 24 }),
      ],
      { ambientDegC: 25, irradianceWPerM2: 500 },
    );
    expect(ampsIn(found, 'load')).toBeCloseTo(2, DECIMALS);
  });
});
