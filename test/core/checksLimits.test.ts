/** Terminals, switches, bars, volts and rings against what the parts are made for. */
import { describe, expect, test } from 'vitest';
import { addedUp } from '../../core/checks/voltsMixRules.ts';
import { battery, check, found, gaps, oneCircuit, passes } from './checksJob.ts';

describe('main-switch-small', () => {
  const job = (fields: Record<string, unknown>, more: Record<string, unknown> = {}) => {
    const { parts, ...rest } = oneCircuit(more);
    const moved = parts.map((part) => (part.id === 'OUT' ? { ...part, from: 'Q2' } : part));
    return check({ ...rest, parts: [...moved, { id: 'SW', kind: 'switch', from: 'Q', to: 'Q2', ...fields }] });
  };
  test('a switch rated exactly as its fuse passes, one rated less is to be put right, none rated is not done', () => {
    expect(passes(job({ ratingA: 200 }), 'main-switch-small')).toBe(1);
    expect(found(job({ ratingA: 190 }), 'main-switch-small')[0]).toMatchObject({
      severity: 'fix',
      measured: { value: 200, unit: 'A' },
      limit: { value: 190, unit: 'A' },
      parts: ['SW', 'F1'],
    });
    expect(gaps(job({}), 'main-switch-small')).toEqual(['ratingA of switch SW']);
  });

  const start = {
    fuse: { ratingA: 50 },
    load: { powerW: 100, surgeW: 1200, surgeS: 2 },
    cases: [{ id: 'start', surge: 'L1' }, { id: 'run' }],
  };
  test('the current of a start is held against the short-time current', () => {
    expect(passes(job({ ratingA: 60, shortTimeA: 200 }, start), 'main-switch-small')).toBe(1);
    const [finding] = found(job({ ratingA: 60, shortTimeA: 80 }, start), 'main-switch-small');
    expect(finding).toMatchObject({ case: 'start', severity: 'fix', limit: { value: 80 } });
    expect(gaps(job({ ratingA: 60 }, start), 'main-switch-small')[0]).toContain('shortTimeA of switch SW');
  });
});

describe('busbar-small', () => {
  /** A feed over F1 (200 A) at one end, and ways off with fuses of their own. */
  const job = (ratingA: number | undefined, fuses: readonly number[], order = ['Q', 'T0', 'T1']) =>
    check({
      parts: [
        battery('B1'),
        { id: 'F1', kind: 'fuse', from: 'P', to: 'Q', ratingA: 200 },
        { id: 'BAR', kind: 'busbar', junctions: order.slice(0, fuses.length + 1), ratingA },
        ...fuses.flatMap((fuseA, n) => [
          { id: `W${String(n)}`, kind: 'fuse', from: `T${String(n)}`, to: `L${String(n)}`, ratingA: fuseA },
          { id: `L${String(n)}`, kind: 'load', plus: `L${String(n)}`, minus: 'N', currentA: 10 },
        ]),
      ],
    });
  test('the smaller of what feeds it and what leaves it counts; exactly at the rating it passes', () => {
    expect(passes(job(200, [300, 300]), 'busbar-small')).toBe(1);
    expect(passes(job(100, [50, 50]), 'busbar-small')).toBe(1);
    expect(found(job(150, [300, 300]), 'busbar-small')[0]).toMatchObject({
      severity: 'fix',
      measured: { value: 200, unit: 'A' },
      limit: { value: 150, unit: 'A' },
    });
  });
  test('by the places of the taps: with the feed in the middle no segment carries the sum', () => {
    expect(found(job(60, [50, 50]), 'busbar-small')).toHaveLength(1);
    expect(passes(job(60, [50, 50], ['T0', 'Q', 'T1']), 'busbar-small')).toBe(1);
  });
  test('without a rating another rule asks', () => {
    const report = job(undefined, [50, 50]);
    expect(gaps(report, 'busbar-small')).toEqual([]);
    expect(gaps(report, 'rating-under-current')).toEqual(['ratingA of busbar BAR']);
  });
});

describe('terminal-too-cool', () => {
  // 33 CFR 183.425 table 5: 10 AWG carries 60 A at 105 °C and 40 A at 75 °C.
  const job = (currentA: number, terminalDegC: number | undefined) =>
    check(
      oneCircuit({
        practice: 'us-marine',
        cable: { size: '10 AWG', insulationDegC: 105, resistanceOhm: undefined },
        fuse: { terminalDegC },
        load: { currentA, terminalDegC },
      }),
    );
  test('exactly the column of the terminal passes, above it is to be put right', () => {
    expect(passes(job(40, 75), 'terminal-too-cool')).toBe(2);
    const [finding] = found(job(41, 75), 'terminal-too-cool');
    expect(finding).toMatchObject({ severity: 'fix', limit: { value: 40, unit: 'A' } });
    expect(finding!.measured.value).toBeCloseTo(41, 6);
    expect(finding!.message).toContain('75 °C');
  });
  test('beyond the insulation the rule for overloaded cables tells', () => {
    expect(found(job(70, 75), 'terminal-too-cool')).toEqual([]);
    expect(found(job(70, 75), 'cable-overloaded').length).toBeGreaterThan(0);
  });
  test('not marked, it is asked once, and only where the coolest column would not do', () => {
    expect(gaps(job(45, undefined), 'terminal-too-cool')).toHaveLength(1);
    expect(passes(job(20, undefined), 'terminal-too-cool')).toBe(2);
  });
});

describe('mixed-volts', () => {
  const job = (nominalV: number | undefined, string: Record<string, unknown> = {}) =>
    check(oneCircuit({ battery: { blockNominalV: 12, ...string }, load: { powerW: 20, nominalV } }));
  test('labels of one system pass up to a factor of exactly 1.25, others are a stop', () => {
    expect(passes(job(12), 'mixed-volts')).toBe(1);
    expect(passes(job(15), 'mixed-volts')).toBe(1);
    expect(found(job(15.1), 'mixed-volts')).toHaveLength(1);
    expect(found(job(24), 'mixed-volts')[0]).toMatchObject({
      severity: 'stop',
      measured: { value: 12, unit: 'V' },
      limit: { value: 24, unit: 'V' },
    });
  });
  test('not said, all are one question; with its own least and most volts a load is not asked', () => {
    expect(gaps(job(undefined), 'mixed-volts')[0]).toContain('nominalV of load L1');
    const load = { powerW: 20, minimumV: 10.5, maximumV: 15 };
    expect(gaps(check(oneCircuit({ load })), 'mixed-volts')).toEqual([]);
  });
  test('a load between the blocks of a string is a stop, unless a converter evens it out', () => {
    const parts = [
      battery('LOW', { plus: 'X' }),
      battery('HIGH', { minus: 'X' }),
      { id: 'L1', kind: 'load', plus: 'X', minus: 'N', powerW: 20, nominalV: 12 },
    ];
    expect(found(check({ parts }), 'mixed-volts')[0]).toMatchObject({ severity: 'stop', parts: ['L1', 'LOW'] });
    const even = {
      id: 'EQ',
      kind: 'converter',
      from: { plus: 'P', minus: 'N' },
      to: { plus: 'X', minus: 'N' },
      outputV: 13.2,
      outputA: 10,
      nominalV: 24,
    };
    expect(found(check({ parts: [...parts, even] }), 'mixed-volts')).toEqual([]);
  });
});

describe('drop-added-up', () => {
  test('two losses one after the other: 2.1 % and 1.4 % are 3.47 % together', () => {
    // 1 - 0.979 x 0.986 = 0.034706.
    expect(addedUp(0.021, 0.014)).toBeCloseTo(0.034706, 12);
  });

  const inverter = (acDrop: number | undefined, acPowerW = 500) => ({
    id: 'INV',
    kind: 'inverter',
    plus: 'L',
    minus: 'M',
    ratedW: 1000,
    acPowerW,
    efficiency: 1,
    standbyW: 0,
    acDrop,
  });
  const job = (acDrop: number | undefined, ohm = 0.005) => {
    const { parts, ...rest } = oneCircuit({ battery: { blockNominalV: 12 }, cable: { resistanceOhm: ohm } });
    const kept = parts.filter(({ id }) => id !== 'L1');
    return check({ ...rest, practice: 'iec-land', parts: [...kept, inverter(acDrop)] });
  };
  test('within the allowance it passes, beyond it is to be looked at', () => {
    // About 38.7 A over 10 mΩ of cable: 0.387 V of 12 V, 3.2 %.
    expect(passes(job(0.01), 'drop-added-up')).toBe(1);
    const [finding] = found(job(0.03), 'drop-added-up');
    expect(finding).toMatchObject({ severity: 'look', limit: { value: 0.05, unit: '1' } });
    expect(finding!.measured.value).toBeGreaterThan(0.06);
  });
  test('the two together exactly at the allowance pass, a thousandth more does not', () => {
    const whole = found(job(0.03), 'drop-added-up')[0]!.measured.value;
    // 1 - (1 - dc)(1 - 0.03) is the whole; the AC loss that brings it to 5 % follows.
    const dc = 1 - (1 - whole) / (1 - 0.03);
    const allowed = 1 - (1 - 0.05) / (1 - dc);
    expect(passes(job(allowed), 'drop-added-up')).toBe(1);
    expect(found(job(allowed + 0.001), 'drop-added-up')).toHaveLength(1);
  });
  test('exactly the allowance passes, a shade more behind the inverter does not', () => {
    // The loss before it at no loss behind it, from a job that fails by all but everything behind it.
    const all = found(job(0.9), 'drop-added-up')[0]!.measured.value;
    const before = 1 - (1 - all) / 0.1;
    const exactly = 1 - 0.95 / (1 - before);
    expect(passes(job(exactly), 'drop-added-up')).toBe(1);
    expect(found(job(exactly + 1e-6), 'drop-added-up')).toHaveLength(1);
  });
  test('not said, it is asked where the DC side leaves less than the usual share', () => {
    expect(gaps(job(undefined), 'drop-added-up')[0]).toContain('acDrop of inverter INV');
    expect(gaps(job(undefined, 0.001), 'drop-added-up')).toEqual([]);
  });
});

describe('ring-feed', () => {
  const two = (state: 'closed' | 'open') => [
    { id: 'F2', kind: 'fuse', from: 'P', to: 'Z', ratingA: 100 },
    { id: 'TIE', kind: 'switch', from: 'Z', to: 'Q', ratingA: 200, state },
  ];
  test('two fuses between the same two nets are a ring', () => {
    const [finding] = found(check(oneCircuit({ more: two('closed') })), 'ring-feed');
    expect(finding).toMatchObject({ severity: 'look', parts: ['F1', 'F2'] });
  });
  test('with the tie open there is none, and strings side by side with a fuse each are none', () => {
    expect(found(check(oneCircuit({ more: two('open') })), 'ring-feed')).toEqual([]);
    const beside = [battery('B2', { plus: 'P2' }), { id: 'F2', kind: 'fuse', from: 'P2', to: 'Q', ratingA: 200 }];
    const report = check(oneCircuit({ more: beside }));
    expect(found(report, 'ring-feed')).toEqual([]);
    expect(passes(report, 'ring-feed')).toBe(2);
  });
});
