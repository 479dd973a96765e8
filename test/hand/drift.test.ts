/** Drift runs that a pencil can follow: two unlike strings, a tap at half voltage, a string that fills, one that empties. */
import { describe, expect, it } from 'vitest';
import { type Case, drifted, driftJob, straightTables, stringPart } from '../physics/driftBank.ts';
import type { PartValue } from '../physics/jobDraft.ts';

const load = (fields: Record<string, unknown>): PartValue => ({
  id: 'load',
  kind: 'load',
  plus: 'P',
  minus: 'N',
  on: false,
  ...fields,
});
const switchedOn = (id: string, ...parts: string[]): Case => ({
  id,
  set: Object.fromEntries(parts.map((part) => [part, { on: true }])),
});

describe('two unlike strings of straight curves', () => {
  // Four cells from 2.9 to 3.2 V: 1.2 V for the whole range of charge. R1 + R2 = 60 mohm.
  const from = straightTables(2.9, 3.2);
  const straight = { chemistry: 'lfp', stateOfCharge: 0.9 };
  const job = driftJob(
    [
      stringPart({ id: 'A', capacityAh: 100, resistanceOhm: 0.04, ...straight }),
      stringPart({ id: 'B', capacityAh: 300, resistanceOhm: 0.02, ...straight }),
      load({ currentA: 30 }),
    ],
    [switchedOn('on', 'load')],
  );
  // C = 3600 Q / 1.2 V: 300 kF and 900 kF; C_eq = 225 kF; tau = 0.06 ohm x 225 kF = 13 500 s = 3.75 h.
  const tauS = 13_500;
  const { moments, strings, steps } = drifted(job, [{ case: 'on', hours: 7.5 }], { stepS: 60, from });

  it('share by resistance at first: 30 A x 20/60 = 10 A and 20 A', () => {
    // The first step is 1.875 s long: the current has moved by less than 1 mA.
    expect(moments[0]!.currentA[0]).toBeCloseTo(10, 2);
    expect(moments[0]!.currentA[1]).toBeCloseTo(20, 2);
  });

  it('and go over to sharing by capacity, 7.5 A and 22.5 A, with tau = (R1 + R2) C_eq', () => {
    expect(steps).toBeGreaterThan(450);
    for (const [k, { hours, currentA }] of moments.entries()) {
      if (k === 0) continue;
      // A step's current is that of its middle, to second order.
      const middleS = hours * 3600 - Math.min(30, (hours * 3600) / 4);
      const expected = 7.5 + 2.5 * Math.exp(-middleS / tauS);
      expect(Math.abs(currentA[0]! - expected)).toBeLessThan(0.006);
    }
  });

  it('so that A gives the integral of that: 7.5 A x 7.5 h + 2.5 A tau (1 - exp(-2))', () => {
    const givenAh = 7.5 * 7.5 + 2.5 * 3.75 * (1 - Math.exp(-2));
    expect(strings[0]!.givenAh).toBeCloseTo(givenAh, 4);
    expect(strings[0]!.endCharge).toBeCloseTo(0.9 - givenAh / 100, 6);
    expect(strings[0]!.givenAh + strings[1]!.givenAh).toBeCloseTo(225, 9);
  });
});

describe('a 12 V load on the lower half of a 24 V string', () => {
  // 3 A for 16 h out of the lower half only, then 8 h of a 24 V charger: 48 Ah a day that the upper half never gave.
  const night = switchedOn('night', 'lights');
  const parts = [
    stringPart({ id: 'S', capacityAh: 100, stateOfCharge: 1, blocksInSeries: 2, midpoint: 'M' }),
    load({ id: 'lights', currentA: 3, minimumV: 10.5, plus: 'M', minus: 'N' }),
    { id: 'charger', kind: 'charger', plus: 'P', minus: 'N', outputA: 20, setpointV: 28.4, on: false },
  ];
  const days = [
    { case: 'night', hours: 16 },
    { case: 'day', hours: 8 },
  ];

  it('takes only the lower half down, day by day, until it is empty in the third night', () => {
    const { strings, cycleEnds, events } = drifted(driftJob(parts, [night, switchedOn('day', 'charger')]), days, {
      cycles: 4,
    });
    expect(strings.map(({ half }) => half)).toEqual(['upper', 'lower']);
    const [upper, lower] = [cycleEnds.map((end) => end[0]!), cycleEnds.map((end) => end[1]!)];
    expect(Math.min(...upper)).toBeGreaterThan(0.999);
    expect(lower[0]).toBeLessThan(0.75);
    expect(lower[1]).toBeLessThan(lower[0]! - 0.1);
    expect(events[0]!.text).toMatch(/^lower half of string S empty at hour 5\d\.\d/);
    expect(events[1]!.text).toMatch(/^load lights drops out in case night: too few volts, at hour 5/);
  });

  it('and an equaliser that feeds the middle from 24 V cures it', () => {
    const equaliser = {
      id: 'EQ',
      kind: 'converter',
      from: { plus: 'P', minus: 'N' },
      to: { plus: 'M', minus: 'N' },
      outputV: 14.2,
      outputA: 6,
      efficiency: 0.95,
      on: false,
    };
    // It holds the middle at about half: of 25.2 V at night, of 28.4 V by day.
    const on = { on: true };
    const cases = [
      { id: 'night', set: { lights: on, EQ: { on: true, outputV: 12.6 } } },
      { id: 'day', set: { charger: on, EQ: on } },
    ];
    const { cycleEnds, events } = drifted(driftJob([...parts, equaliser], cases), days, { cycles: 7 });
    expect(events).toEqual([]);
    for (const [, lower] of cycleEnds) expect(lower).toBeGreaterThan(0.85);
  });
});

describe('the ends of a curve', () => {
  it('a string that is empty is told of with the hour: 20 Ah at 5 A are gone after 4 h', () => {
    const job = driftJob(
      [stringPart({ id: 'A', capacityAh: 100, resistanceOhm: 0.01, stateOfCharge: 0.2 }), load({ currentA: 5 })],
      [switchedOn('on', 'load')],
    );
    const { events, strings } = drifted(job, [{ case: 'on', hours: 4.1 }]);
    expect(events).toHaveLength(1);
    expect(events[0]!.hours).toBeCloseTo(4, 6);
    expect(events[0]!.text).toBe('string A empty at hour 4.0');
    expect(strings[0]!.endCharge).toBe(0);
  });

  it('a constant power that empties its bank collapses, and the rest of the stretch is rest', () => {
    const job = driftJob(
      [stringPart({ id: 'A', capacityAh: 100, resistanceOhm: 0.01, stateOfCharge: 0.2 }), load({ powerW: 60 })],
      [switchedOn('on', 'load')],
    );
    const { events, hours, moments, strings } = drifted(job, [{ case: 'on', hours: 10 }]);
    expect(hours).toBeCloseTo(10, 9);
    expect(events.map(({ text }) => text)[1]).toMatch(
      /^case on cannot go on \(load asks for 60 W .*\); everything off for the rest of the stretch, at hour/,
    );
    expect(moments.at(-1)!.case).toBe('at-rest');
    expect(moments.at(-1)!.currentA[0]).toBeCloseTo(0, 9);
    // 20 Ah, and some of the 9.8 Ah in which 11.8 V run off at 120 V for the whole range of charge.
    expect(strings[0]!.givenAh).toBeGreaterThan(20);
    expect(strings[0]!.givenAh).toBeLessThan(29.8);
  });

  it('a load with a minimum drops out instead, to come back in the next cycle', () => {
    const job = driftJob(
      [
        stringPart({ id: 'A', capacityAh: 100, resistanceOhm: 0.01, stateOfCharge: 0.2 }),
        load({ powerW: 60, minimumV: 11.5 }),
        { id: 'charger', kind: 'charger', plus: 'P', minus: 'N', outputA: 10, setpointV: 14.2, on: false },
      ],
      [switchedOn('on', 'load'), switchedOn('charge', 'charger')],
    );
    const cycle = [
      { case: 'on', hours: 5 },
      { case: 'charge', hours: 1 },
    ];
    const { events, moments } = drifted(job, cycle, { cycles: 2 });
    expect(events.at(-1)!.text).toMatch(
      /^load load drops out in case on: too few volts, at hour 4\.\d, and again in one later cycle$/,
    );
    const second = moments.find(({ hours, case: id }) => hours > 6 && id === 'on');
    expect(second!.currentA[0]).toBeGreaterThan(5);
  });

  it('a full lead string turns all that it is still given to gas', () => {
    const job = driftJob(
      [
        stringPart({ id: 'A', capacityAh: 100, stateOfCharge: 1 }),
        { id: 'charger', kind: 'charger', plus: 'P', minus: 'N', outputA: 10, setpointV: 14.2 },
      ],
      [{ id: 'on' }],
    );
    const { strings, books } = drifted(job, [{ case: 'on', hours: 6 }]);
    const [a] = strings;
    expect(a!.endCharge).toBe(1);
    expect(a!.takenAh).toBeGreaterThan(0);
    expect(a!.gassedAh).toBeCloseTo(a!.takenAh, 9);
    // Shepherd's polarisation holds it to a float current: well under C/100.
    expect(a!.takenAh / 6).toBeLessThan(1);
    expect(books.gassedWh).toBeCloseTo(12.85 * a!.takenAh, 6);
  });

  it('a string beyond its limit is told of', () => {
    const job = driftJob(
      [
        { ...stringPart({ id: 'A', capacityAh: 100, resistanceOhm: 0.01, stateOfCharge: 0.9 }), maxDischargeA: 20 },
        load({ currentA: 25 }),
      ],
      [switchedOn('on', 'load')],
    );
    const { events } = drifted(job, [{ case: 'on', hours: 1 }]);
    expect(events.map(({ text }) => text)).toEqual([
      'string A gives 25 A in case on, beyond its limit of 20 A, at hour 0.0',
    ]);
  });
});
