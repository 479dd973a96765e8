/** What rests on fault current: what a device must break, whether it opens, what it lets through, and what parts a fault. */
import { describe, expect, test } from 'vitest';
import { battery, check, found, gaps, oneCircuit, passes, type RawPart } from './checksJob.ts';

/** 13.2 V behind 2 mΩ, a fuse without resistance, 0.5 mΩ out and 0.5 mΩ back: 6600 A right behind the fuse, 4400 A at the load. */
const circuit = (fuse: Record<string, unknown>, more: Parameters<typeof oneCircuit>[0] = {}) =>
  check(oneCircuit({ ...more, fuse: { resistanceOhm: 0, ...fuse } }));
const cable = (id: string, from: string, to: string, fields: Record<string, unknown> = {}): RawPart => ({
  id,
  kind: 'cable',
  from,
  to,
  lengthM: 1,
  size: '70 mm2',
  resistanceOhm: 0.0005,
  ...fields,
});
const fuse = (id: string, from: string, to: string, fields: Record<string, unknown> = {}): RawPart => ({
  id,
  kind: 'fuse',
  from,
  to,
  ratingA: 100,
  resistanceOhm: 0,
  ...fields,
});

describe('interrupt-too-low', () => {
  test('a fuse that breaks exactly the 6600 A right behind it passes, one ampere less is a stop', () => {
    expect(passes(circuit({ interruptA: 6600 }), 'interrupt-too-low')).toBe(1);
    const [finding] = found(circuit({ interruptA: 6599 }), 'interrupt-too-low');
    expect(finding).toMatchObject({ severity: 'stop', parts: ['F1'], limit: { value: 6599, unit: 'A' } });
    expect(finding!.measured.value).toBeCloseTo(6600, 6);
    expect(finding!.message).toContain('can break 6.599 kA');
    expect(finding!.message).not.toContain('assumed');
  });

  test('a second string beside the first doubles what it must break, and an open switch in its lead counts as closed', () => {
    const second = battery('B2', { plus: 'P2' });
    const link = { id: 'SW', kind: 'switch', from: 'P2', to: 'P', state: 'open', resistanceOhm: 0 };
    const [finding] = found(circuit({ interruptA: 10_000 }, { more: [second, link] }), 'interrupt-too-low');
    expect(finding!.measured.value).toBeCloseTo(13_200, 6);
  });

  test('of two strings with a fuse each, the fuse of one must break what the other sends back', () => {
    const parts = [
      battery('B1', { plus: 'P1', resistanceOhm: 0.004 }),
      battery('B2', { plus: 'P2', resistanceOhm: 0.002 }),
      fuse('F1', 'P1', 'BUS', { interruptA: 3300 }),
      fuse('F2', 'P2', 'BUS', { interruptA: 6600 }),
      { id: 'L1', kind: 'load', plus: 'BUS', minus: 'N', currentA: 5 },
    ];
    const [finding, ...others] = found(check({ parts }), 'interrupt-too-low');
    expect(others).toEqual([]);
    expect(finding!.parts).toEqual(['F1']);
    // A short at the post of B1 draws the whole of B2 through F1.
    expect(finding!.measured.value).toBeCloseTo(6600, 6);
    expect(finding!.message).toContain('sources lie on both sides');
  });

  test('a charger adds its rated output and no more', () => {
    const charger = { id: 'C1', kind: 'charger', plus: 'P', minus: 'N', outputA: 50, setpointV: 14.2 };
    const [finding] = found(circuit({ interruptA: 6600 }, { more: [charger] }), 'interrupt-too-low');
    expect(finding!.measured.value).toBeCloseTo(6650, 6);
  });

  test('with an assumed resistance the least that it may be decides; where the softest would pass it is a look', () => {
    const assumed = { resistanceOhm: undefined, emfV: undefined };
    const low = circuit({ interruptA: 50 }, { battery: assumed });
    const [stop] = found(low, 'interrupt-too-low');
    expect(stop!.severity).toBe('stop');
    expect(stop!.message).toContain('rests on assumed figures, first of all resistanceOhm of B1');
    const highestA = stop!.measured.value;
    const [look] = found(circuit({ interruptA: 0.999 * highestA }, { battery: assumed }), 'interrupt-too-low');
    expect(look!.severity).toBe('look');
    expect(look!.message).toContain('measure the strings');
    expect(found(circuit({ interruptA: 1.001 * highestA }, { battery: assumed }), 'interrupt-too-low')).toEqual([]);
  });

  test('without an interrupting rating it is told by interrupt-unknown, and neither passed nor failed here', () => {
    const report = circuit({});
    expect(found(report, 'interrupt-too-low')).toEqual([]);
    expect(passes(report, 'interrupt-too-low')).toBe(0);
    expect(found(report, 'interrupt-unknown')).toHaveLength(1);
  });
});

describe('fault-too-weak', () => {
  const opensAt = (currentA: number) => ({
    curvePoints: [
      [1000, 20, 100],
      [currentA, 1, 5],
      [9000, 0.01, 0.02],
    ],
  });

  test('a fuse that opens in 5 s at exactly the 4400 A of the far end passes, at a little more it is a thing to fix', () => {
    expect(passes(circuit(opensAt(4400)), 'fault-too-weak')).toBe(1);
    const [finding] = found(circuit(opensAt(4500)), 'fault-too-weak');
    expect(finding).toMatchObject({ severity: 'fix', parts: ['F1', 'OUT', 'BACK'] });
    expect(finding!.measured.value).toBeCloseTo(4400, 6);
    expect(finding!.limit.value).toBeCloseTo(4500, 6);
    expect(finding!.message).toContain('surely opens it within 5 s');
    expect(finding!.message).toContain("maker's points");
  });

  test('the time is a setting', () => {
    expect(found(circuit(opensAt(4500), { settings: { faultClearS: 6 } }), 'fault-too-weak')).toEqual([]);
    expect(found(circuit(opensAt(4400), { settings: { faultClearS: 4 } }), 'fault-too-weak')).toHaveLength(1);
  });

  test('a cable that stands the weak fault for longer than the fuse takes is enough', () => {
    // 95 mm² of PVC stands 4400 A for (115 · 95 / 4400)² = 6.2 s, and the fuse is open after 5.2 s.
    expect(found(circuit(opensAt(4500), { cable: { size: '95 mm2' } }), 'fault-too-weak')).toEqual([]);
  });

  test('a generic band that may hold too long is a look; one that surely holds too long is a thing to fix', () => {
    const long = { cable: { size: '2.5 mm2', resistanceOhm: 0.074 }, battery: { emfV: 12.8, resistanceOhm: 0.006 } };
    const [look] = found(circuit({ type: 'gG', ratingA: 25 }, long), 'fault-too-weak');
    expect(look!.severity).toBe('look');
    expect(look!.message).toContain('generic band of gG');
    const [fix] = found(circuit({ type: 'gG', ratingA: 100 }, long), 'fault-too-weak');
    expect(fix!.severity).toBe('fix');
  });

  test('a fuse of no known type and a breaker without points are not checked', () => {
    expect(gaps(circuit({}), 'fault-too-weak')).toEqual(['type of fuse F1: when it opens']);
    expect(gaps(circuit({ kind: 'breaker' }), 'fault-too-weak')).toEqual(['curvePoints of breaker F1: when it opens']);
  });
});

describe('cable-cooks', () => {
  /** 70 mm² of PVC: (115 · 70)². */
  const STANDS = (115 * 70) ** 2;
  const opensIn = (timeS: number) => ({
    curvePoints: [
      [1000, 0.5, 60],
      [4400, 0.5, 3.3],
      [6600, 0.5, timeS],
      [9000, 0.01, 0.5],
    ],
  });

  test('a let-through of exactly k²S² passes, more is a stop', () => {
    expect(passes(circuit(opensIn(STANDS / 6600 ** 2)), 'cable-cooks')).toBe(1);
    const [finding] = found(circuit(opensIn((1.01 * STANDS) / 6600 ** 2)), 'cable-cooks');
    expect(finding).toMatchObject({ severity: 'stop', limit: { value: STANDS, unit: 'A2s' } });
    expect(finding!.measured.value / STANDS).toBeCloseTo(1.01, 6);
    expect(finding!.parts).toContain('OUT');
  });

  test('the weak fault counts as well as the strong one: a fuse lets more through where it is slow', () => {
    const slow = {
      curvePoints: [
        [1000, 0.5, 60],
        [4400, 0.5, 4],
        [6600, 0.01, 0.1],
      ],
    };
    const [finding] = found(circuit(slow), 'cable-cooks');
    expect(finding!.measured.value).toBeCloseTo(4400 ** 2 * 4, 0);
  });

  test('a generic band that only may let too much through is a look', () => {
    const [finding] = found(
      circuit({ type: 'strip_large', ratingA: 200 }, { cable: { size: '4 mm2' } }),
      'cable-cooks',
    );
    expect(finding!.severity).toBe('look');
    expect(finding!.message).toContain('generic band');
  });

  test('without a type, or without the size of a cable, it is not checked', () => {
    expect(gaps(circuit({}), 'cable-cooks')).toEqual(['type of fuse F1: when it opens']);
    expect(gaps(circuit({ type: 'class_T' }, { cable: { size: undefined } }), 'cable-cooks')[0]).toContain(
      'size of cable',
    );
  });
});

describe('trips-together', () => {
  const panel = (main: Record<string, unknown>, branch: Record<string, unknown>) =>
    check({
      parts: [
        battery('B1'),
        fuse('MAIN', 'P', 'BAR', main),
        { id: 'L1', kind: 'load', plus: 'BAR', minus: 'N', currentA: 5 },
        fuse('F1', 'BAR', 'Q', branch),
        { id: 'L2', kind: 'load', plus: 'Q', minus: 'N', currentA: 5 },
      ],
    });

  test('a ratio of exactly two to one passes, less is a look at both', () => {
    expect(passes(panel({ ratingA: 200 }, { ratingA: 100 }), 'trips-together')).toBe(1);
    const [finding] = found(panel({ ratingA: 199 }, { ratingA: 100 }), 'trips-together');
    expect(finding).toMatchObject({ severity: 'look', parts: ['F1', 'MAIN'] });
    expect(finding!.message).toContain('1.99 to 1 where 2 to 1 is asked');
  });

  test('two gG of 100 and 63 A pass by their step of 1.587, 80 over 63 A do not', () => {
    expect(passes(panel({ ratingA: 100, type: 'gG' }, { ratingA: 63, type: 'gG' }), 'trips-together')).toBe(1);
    expect(found(panel({ ratingA: 80, type: 'gG' }, { ratingA: 63, type: 'gG' }), 'trips-together')).toHaveLength(1);
  });

  test('melting heat of the farther above the let-through of the nearer passes whatever the ratio', () => {
    const heats = (preArcI2t: number) =>
      panel(
        { ratingA: 120, curvePoints: [[200, 100, 1000]], preArcI2t },
        { ratingA: 100, curvePoints: [[150, 5, 50]], totalI2t: 1000 },
      );
    expect(passes(heats(1001), 'trips-together')).toBe(1);
    const [finding] = found(heats(1000), 'trips-together');
    expect(finding).toMatchObject({ measured: { value: 1000, unit: 'A2s' }, limit: { value: 1000, unit: 'A2s' } });
  });

  test('two generic types whose bands overlap at the fault are not settled by their ratings, so not checked', () => {
    const report = panel(
      { ratingA: 2000, type: 'strip_large' },
      { ratingA: 1000, type: 'open_link', resistanceOhm: 0.0007 },
    );
    expect(found(report, 'trips-together')).toEqual([]);
    expect(gaps(report, 'trips-together')[0]).toContain('curvePoints of fuse MAIN and curvePoints of fuse F1');
  });

  test('two devices in one lead that serve the same are no matter', () => {
    const report = circuit({ ratingA: 100 }, { more: [] });
    expect(passes(report, 'trips-together')).toBe(0);
    expect(found(report, 'trips-together')).toEqual([]);
  });
});

describe('busbar-fault', () => {
  const withBar = (
    bar: Record<string, unknown>,
    main: Record<string, unknown> = {},
    string: Record<string, unknown> = {},
  ) =>
    check({
      parts: [
        { ...battery('B1'), ...string },
        fuse('MAIN', 'P', 'A', {
          curvePoints: [
            [1000, 1, 5],
            [7000, 0.1, 0.1],
          ],
          ...main,
        }),
        { id: 'BAR', kind: 'busbar', junctions: ['A', 'B'], ...bar },
        fuse('F1', 'B', 'Q'),
        { id: 'L1', kind: 'load', plus: 'Q', minus: 'N', currentA: 5 },
      ],
    });
  /** Opens a 6600 A fault in 0.2 s. */
  const fast = {
    curvePoints: [
      [1000, 1, 5],
      [6600, 0.1, 0.2],
      [7000, 0.1, 0.1],
    ],
  };

  test('a bar that stands exactly what the fuse ahead of it lets through passes, less is a look', () => {
    expect(passes(withBar({ withstandA: 6600, withstandS: 0.2 }, fast), 'busbar-fault')).toBe(1);
    const [finding] = found(withBar({ withstandA: 6600, withstandS: 0.19 }, fast), 'busbar-fault');
    expect(finding).toMatchObject({ severity: 'look', parts: ['BAR', 'MAIN'] });
    expect(finding!.measured.value).toBeCloseTo(6600 ** 2 * 0.2, 0);
  });

  test('without its withstand it is asked for above 10 kA only; without a curve of the fuse it is not checked', () => {
    expect(gaps(withBar({ withstandA: 5000 }), 'busbar-fault')).toEqual([]);
    const strong = { emfV: 12.6, resistanceOhm: 0.0005 };
    expect(gaps(withBar({ withstandA: 5000 }, {}, strong), 'busbar-fault')).toEqual(['withstandS of busbar BAR']);
    const untyped = withBar({ withstandA: 5000, withstandS: 1 }, { curvePoints: undefined });
    expect(gaps(untyped, 'busbar-fault')[0]).toContain('type of fuse MAIN');
  });
});

describe('fault-not-parted', () => {
  const bank = (leadM: number) =>
    check({
      practice: 'us-marine',
      parts: [
        battery('B1', { plus: 'P1' }),
        battery('B2', { plus: 'P2' }),
        cable('LEAD1', 'P1', 'BUS', { lengthM: leadM, sheathed: false }),
        fuse('F2', 'P2', 'BUS'),
        fuse('F3', 'BUS', 'Q'),
        { id: 'L1', kind: 'load', plus: 'Q', minus: 'N', currentA: 5 },
      ],
    });

  test('a bus that is parted from one string and not from the other is a thing to fix', () => {
    const [finding] = found(bank(1.5), 'fault-not-parted');
    expect(finding).toMatchObject({ severity: 'fix', parts: ['B1', 'B2', 'F2'] });
    expect(finding!.message).toBe('A fault at BUS is parted from B2 by F2, but from B1 by nothing.');
  });

  test('fuses exactly at the unfused length of the practice from the post are near enough', () => {
    // 7 in without a sheath, rounded in the table.
    expect(passes(bank(0.178), 'fault-not-parted')).toBe(4);
    expect(found(bank(0.179), 'fault-not-parted')).toHaveLength(1);
  });

  test('each string with a fuse of its own, and each fuse, passes', () => {
    const parts = [
      battery('B1', { plus: 'P1' }),
      battery('B2', { plus: 'P2' }),
      fuse('F1', 'P1', 'BUS'),
      fuse('F2', 'P2', 'BUS'),
      { id: 'L1', kind: 'load', plus: 'BUS', minus: 'N', currentA: 5 },
    ];
    expect(passes(check({ parts }), 'fault-not-parted')).toBe(4);
  });

  test('a fuse that other wiring runs round parts nothing', () => {
    const [finding] = found(circuit({}, { more: [cable('ROUND', 'P', 'Q')] }), 'fault-not-parted');
    expect(finding).toMatchObject({ severity: 'fix', parts: ['F1'] });
    expect(finding!.message).toContain('parts nothing');
  });

  test('a string with no fuse at all is told by no-fuse-on-source alone', () => {
    const more = [
      battery('B2', { plus: 'P2' }),
      fuse('F2', 'P2', 'P'),
      { id: 'L2', kind: 'load', plus: 'P', minus: 'N', currentA: 1 },
    ];
    const report = circuit({}, { more });
    expect(found(report, 'fault-not-parted')).toEqual([]);
    expect(found(report, 'no-fuse-on-source').length).toBeGreaterThan(0);
  });

  test('for a job that names no practice it is not checked', () => {
    const report = check({ ...oneCircuit({}), practice: undefined });
    expect(gaps(report, 'fault-not-parted')[0]).toContain('practice of the job');
  });
});
