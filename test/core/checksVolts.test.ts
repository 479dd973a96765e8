/** Drops, starved and overfed loads, and starts. */
import { describe, expect, test } from 'vitest';
import { battery, check, found, gaps, oneCircuit, passes } from './checksJob.ts';

describe('drop-too-big', () => {
  /** 10 A through twice `milliohm`: the drop in volts is milliohm / 50. */
  const drop = (milliohm: number, load: Record<string, unknown> = {}, fields: Record<string, unknown> = {}) =>
    check(
      oneCircuit({
        practice: 'iso-marine',
        battery: { blockNominalV: 12, chemistry: 'agm', emfV: 12.5 },
        cable: { resistanceOhm: milliohm / 1000 },
        load: { currentA: 10, dropClass: 'critical', ...load },
        ...fields,
      }),
    );

  test('exactly 3 % of 12 V passes for a critical load', () => {
    const report = drop(18); // 10 A x 36 mohm = 0.36 V
    expect(found(report, 'drop-too-big')).toEqual([]);
    expect(passes(report, 'drop-too-big')).toBe(1);
  });

  test('a little more is a thing to fix, with the base of the percentage in the sentence', () => {
    const [finding] = found(drop(19), 'drop-too-big');
    expect(finding).toMatchObject({ severity: 'fix', parts: ['L1'], limit: { value: 0.03, unit: '1' } });
    expect(finding!.measured.value).toBeCloseTo(0.38 / 12, 12);
    expect(finding!.message).toContain('12 V nominal');
    expect(finding!.basis).toContain('ISO 10133');
  });

  test('an ordinary load may lose 10 % on a boat, and more is for a person to look at', () => {
    expect(passes(drop(60, { dropClass: 'ordinary' }), 'drop-too-big')).toBe(1);
    const [finding] = found(drop(61, { dropClass: 'ordinary' }), 'drop-too-big');
    expect(finding).toMatchObject({ severity: 'look', limit: { value: 0.1, unit: '1' }, basisStatus: 'from-memory' });
  });

  test('a load of no stated class is judged only where the class makes no difference', () => {
    const load = { dropClass: undefined };
    expect(passes(drop(18, load), 'drop-too-big')).toBe(1);
    expect(gaps(drop(40, load), 'drop-too-big')[0]).toMatch(/^dropClass of load L1: 6.67 %/);
    expect(passes(drop(40, load), 'drop-too-big')).toBe(0);
    expect(found(drop(61, load), 'drop-too-big')).toHaveLength(1);
  });

  test('the nominal volts and the limits may be set in the job', () => {
    const settings = { nominalV: 14, dropCritical: 0.02 };
    const [finding] = found(drop(18, {}, { settings }), 'drop-too-big');
    expect(finding!.measured.value).toBeCloseTo(0.36 / 14, 12);
    expect(finding!.limit.value).toBe(0.02);
    expect(finding!.basisStatus).toBe('common-practice');
  });

  test('a string that a switch isolates does not count as the source', () => {
    const more = [
      battery('B2', { plus: 'P2', emfV: 14, blockNominalV: 12, chemistry: 'agm' }),
      { id: 'SW', kind: 'switch', from: 'P2', to: 'P', state: 'open' },
    ];
    expect(found(drop(17, {}, { more }), 'drop-too-big')).toEqual([]);
  });

  test('two strings in series feed a load with their sum', () => {
    const parts = [
      battery('LOW', { plus: 'X', blockNominalV: 12, chemistry: 'agm', emfV: 12.5 }),
      battery('HIGH', { minus: 'X', blockNominalV: 12, chemistry: 'agm', emfV: 12.5 }),
      { id: 'OUT', kind: 'cable', from: 'P', to: 'L', lengthM: 1, resistanceOhm: 0.08 },
      { id: 'L1', kind: 'load', plus: 'L', minus: 'N', currentA: 10, dropClass: 'critical' },
      { id: 'TAP', kind: 'load', plus: 'X', minus: 'N', currentA: 1, dropClass: 'critical' },
    ];
    const report = check({ practice: 'iso-marine', parts });
    const [finding] = found(report, 'drop-too-big');
    expect(finding!.measured.value).toBeCloseTo(0.8 / 24, 12);
    expect(passes(report, 'drop-too-big')).toBe(1); // the tapped load loses nothing of its 12 V
  });

  test('behind a converter the drop counts from its output and its volts', () => {
    const parts = [
      battery('B1', { blocksInSeries: 2, emfV: 26 }),
      {
        id: 'DC1',
        kind: 'converter',
        from: { plus: 'P', minus: 'N' },
        to: { plus: 'V', minus: 'W' },
        outputV: 12,
        outputA: 20,
      },
      { id: 'OUT', kind: 'cable', from: 'V', to: 'L', lengthM: 1, resistanceOhm: 0.04 },
      { id: 'L1', kind: 'load', plus: 'L', minus: 'W', currentA: 10, dropClass: 'critical' },
    ];
    const [finding] = found(check({ practice: 'iso-marine', parts }), 'drop-too-big');
    expect(finding!.measured.value).toBeCloseTo(0.4 / 12, 9);
  });
});

describe('charge-drop-too-big', () => {
  const charging = (milliohm: number) =>
    check({
      parts: [
        battery('B1', { blockNominalV: 12, chemistry: 'agm', emfV: 12.4, resistanceOhm: 0.005 }),
        { id: 'LEAD', kind: 'cable', from: 'C', to: 'P', lengthM: 1, resistanceOhm: milliohm / 1000 },
        { id: 'C1', kind: 'charger', plus: 'C', minus: 'N', outputA: 30, setpointV: 14.4 },
      ],
    });

  test('30 A through 12 mohm lose exactly 3 % of 12 V', () => {
    expect(passes(charging(12), 'charge-drop-too-big')).toBe(1);
    const [finding] = found(charging(13), 'charge-drop-too-big');
    expect(finding).toMatchObject({ severity: 'look', parts: ['C1', 'B1'], limit: { value: 0.03, unit: '1' } });
    expect(finding!.measured.value).toBeCloseTo((30 * 0.013) / 12, 9);
  });
});

describe('load-starved', () => {
  const fed = (load: Record<string, unknown>) =>
    check(oneCircuit({ battery: { emfV: 12, resistanceOhm: 0.05 }, cable: { resistanceOhm: 0.025 }, load }));

  test('a load at exactly its least volts runs', () => {
    const report = fed({ currentA: 10, minimumV: 11 }); // 12 V - 10 A x 100 mohm
    expect(found(report, 'load-starved')).toEqual([]);
    expect(passes(report, 'load-starved')).toBe(1);
  });

  test('a load that drops out is told with the volts that it would run on', () => {
    const [finding] = found(fed({ currentA: 10, minimumV: 11.1 }), 'load-starved');
    expect(finding).toMatchObject({ severity: 'fix', parts: ['L1'], limit: { value: 11.1, unit: 'V' } });
    expect(finding!.measured.value).toBeCloseTo(11, 9);
    expect(finding!.message).toContain('drops out');
    expect(finding!.basis).toContain('minimumV of load L1 as entered (label)');
  });

  test('a load that asks for more than the wiring can bring is told in watts', () => {
    // E²/(4 R) = 144 / 0.4 = 360 W.
    const [finding] = found(fed({ powerW: 500, minimumV: 6.5 }), 'load-starved');
    expect(finding!.measured.unit).toBe('W');
    expect(finding!.measured.value).toBeCloseTo(360, 3); // golden-section search to 1e-5 in ln g
    expect(finding!.limit).toEqual({ value: 500, unit: 'W' });
  });

  test('a load without a minimum is not checked', () => {
    expect(gaps(fed({ currentA: 10 }), 'load-starved')).toEqual(['minimumV of load L1']);
  });

  test('an inverter is judged by its cut-off', () => {
    const parts = (cutoffV: number | undefined) => [
      battery('B1', { emfV: 12, resistanceOhm: 0.01 }),
      { id: 'I1', kind: 'inverter', plus: 'P', minus: 'N', ratedW: 1000, acPowerW: 900, efficiency: 0.9, cutoffV },
    ];
    // 1000 W at the battery: (12 + sqrt(144 - 40))/2 = 11.099 V.
    expect(passes(check({ parts: parts(11) }), 'load-starved')).toBe(1);
    const [finding] = found(check({ parts: parts(11.2) }), 'load-starved');
    expect(finding!.measured.value).toBeCloseTo((12 + Math.sqrt(104)) / 2, 9);
    expect(gaps(check({ parts: parts(undefined) }), 'load-starved')).toEqual(['cutoffV of inverter I1']);
  });

  test('a finding that rests on an assumed battery says so, with the range', () => {
    const parts = [
      {
        id: 'B1',
        kind: 'string',
        plus: 'P',
        minus: 'N',
        chemistry: 'flooded',
        blocksInSeries: 1,
        blockNominalV: 12,
        capacityAh: 50,
      },
      { id: 'L1', kind: 'load', plus: 'P', minus: 'N', currentA: 100, minimumV: 11.5 },
    ];
    const [finding] = found(check({ parts }), 'load-starved');
    expect(finding!.message).toMatch(
      /rests on assumed figures, first of all resistanceOhm of B1 \(.* may be .* to .*\)/,
    );
  });
});

describe('load-overfed', () => {
  const overfed = (maximumV: number | undefined, more: Parameters<typeof oneCircuit>[0]['more'] = []) =>
    check(oneCircuit({ battery: { emfV: 13 }, load: { resistanceOhm: 100, maximumV }, more }));
  const charger = { id: 'C1', kind: 'charger', plus: 'P', minus: 'N', outputA: 10, setpointV: 14.4 };

  test('the set-point of a charger counts although the bank is not there yet', () => {
    expect(found(overfed(14), 'load-overfed')).toEqual([]);
    const [finding] = found(overfed(14, [charger]), 'load-overfed');
    expect(finding).toMatchObject({
      severity: 'fix',
      measured: { value: 14.4, unit: 'V' },
      limit: { value: 14, unit: 'V' },
    });
    expect(finding!.message).toContain('C1 holds its set-point');
  });

  test('exactly the set-point is enough', () => {
    expect(passes(overfed(14.4, [charger]), 'load-overfed')).toBe(1);
  });

  test('a load without a maximum is not checked', () => {
    expect(gaps(overfed(undefined), 'load-overfed')).toEqual(['maximumV of load L1']);
  });

  test('a set-point on the far side of a converter does not reach the load', () => {
    const more = [
      {
        id: 'DC1',
        kind: 'converter',
        from: { plus: 'V', minus: 'W' },
        to: { plus: 'L', minus: 'M' },
        outputV: 12,
        outputA: 1,
      },
      { id: 'C1', kind: 'charger', plus: 'V', minus: 'W', outputA: 10, setpointV: 28.8 },
    ];
    expect(passes(overfed(14, more), 'load-overfed')).toBe(1);
  });
});

describe('surge-sag', () => {
  const starting = (fields: Record<string, unknown>, job: Record<string, unknown> = {}) =>
    check({
      parts: [
        battery('B1', { emfV: 12.6, resistanceOhm: 0.006 }),
        { id: 'I1', kind: 'inverter', plus: 'P', minus: 'N', ratedW: 1000, efficiency: 0.9, ...fields },
      ],
      ...job,
    });

  test('an inverter whose volts hold while it starts passes', () => {
    const report = starting({ surgeW: 3000, cutoffV: 10.5 });
    expect(found(report, 'surge-sag')).toEqual([]);
    expect(passes(report, 'surge-sag')).toBe(1);
  });

  test('exactly the cut-off passes, a hair above it fails with the power that would hold', () => {
    // 1000 W behind 20 mohm of 12 V: 100 A at exactly 10 V (12 - 100 · 0.02), 100 A · 10 V = 1000 W.
    const at = (cutoffV: number) =>
      check({
        parts: [
          battery('B1', { emfV: 12, resistanceOhm: 0.02 }),
          { id: 'I1', kind: 'inverter', plus: 'P', minus: 'N', ratedW: 800, efficiency: 1, surgeW: 1000, cutoffV },
        ],
      });
    expect(found(at(10), 'surge-sag')).toEqual([]);
    expect(passes(at(10), 'surge-sag')).toBe(1);
    const [finding] = found(at(10.01), 'surge-sag');
    expect(finding).toMatchObject({ severity: 'fix', limit: { value: 10.01, unit: 'V' } });
    expect(finding!.measured.value).toBeCloseTo(10, 9);
  });

  test('without a cut-off the sag is not judged, without a surge the rule does not apply', () => {
    expect(gaps(starting({ surgeW: 3000 }), 'surge-sag')).toEqual(['cutoffV of inverter I1']);
    const none = starting({ cutoffV: 10.5 });
    expect(gaps(none, 'surge-sag')).toEqual([]);
    expect(passes(none, 'surge-sag')).toBe(0);
  });

  test('other loads of the case run on while it starts', () => {
    const cases = [{ id: 'idle' }, { id: 'busy', set: { I1: { acPowerW: 0 }, L1: { on: true } } }];
    const parts = [
      battery('B1', { emfV: 12.6, resistanceOhm: 0.006 }),
      { id: 'I1', kind: 'inverter', plus: 'P', minus: 'N', ratedW: 1000, efficiency: 0.9, surgeW: 3000, cutoffV: 10.5 },
      { id: 'L1', kind: 'load', plus: 'P', minus: 'N', currentA: 60, on: false },
    ];
    const [finding] = found(check({ parts, cases }), 'surge-sag');
    expect(finding!.case).toBe('busy');
  });

  test('the first second of an assumed battery is stiffer than its minutes', () => {
    const parts = (power: Record<string, unknown>) => [
      {
        id: 'B1',
        kind: 'string',
        plus: 'P',
        minus: 'N',
        chemistry: 'agm',
        blocksInSeries: 1,
        blockNominalV: 12,
        capacityAh: 100,
      },
      { id: 'L1', kind: 'load', plus: 'P', minus: 'N', minimumV: 12.99, ...power },
    ];
    // Both fail at almost the resting volts, so that both print what they found.
    const start = found(check({ parts: parts({ powerW: 1, surgeW: 600 }) }), 'surge-sag')[0]!;
    const run = found(check({ parts: parts({ powerW: 600 }) }), 'load-starved')[0]!;
    expect(start.measured.value).toBeGreaterThan(run.measured.value);
  });
});
