/** Strings against the current that they may give and take, and chargers against the strings. */
import { describe, expect, test } from 'vitest';
import { battery, check, found, gaps, passes, type RawPart } from './checksJob.ts';

const load = (currentA: number): RawPart => ({ id: 'L1', kind: 'load', plus: 'P', minus: 'N', currentA });
const charger = (fields: Record<string, unknown> = {}): RawPart => ({
  id: 'C1',
  kind: 'charger',
  plus: 'P',
  minus: 'N',
  outputA: 50,
  setpointV: 14.4,
  ...fields,
});

describe('string-discharge-high', () => {
  const giving = (currentA: number, fields: Record<string, unknown> = {}) =>
    check({ parts: [battery('B1', { capacityAh: 100, ...fields }), load(currentA)] });

  test("the string's own limit is a hard one, and exactly at it passes", () => {
    expect(passes(giving(80, { maxDischargeA: 80 }), 'string-discharge-high')).toBe(1);
    expect(found(giving(81, { maxDischargeA: 80 }), 'string-discharge-high')[0]).toMatchObject({
      severity: 'fix',
      limit: { value: 80, unit: 'A' },
      basis: 'maxDischargeA of string B1 as entered (label)',
    });
  });

  test('a guessed limit makes a finding no better than a guess', () => {
    const fields = { maxDischargeA: 80, origin: { maxDischargeA: 'guess' } };
    expect(found(giving(81, fields), 'string-discharge-high')[0]!.basisStatus).toBe('from-memory');
  });

  test('without one the usual rate of the chemistry stands in: 1 C for iron phosphate', () => {
    expect(passes(giving(100), 'string-discharge-high')).toBe(1);
    const [finding] = found(giving(101), 'string-discharge-high');
    expect(finding!.limit.value).toBe(100);
    expect(finding!.message).toContain('usual for lfp of 100 Ah');
  });

  test('between the middle and the high end of what is usual a person looks', () => {
    // Flooded lead: 0.5 C usual, up to 1 C.
    const flooded = { chemistry: 'flooded', blockNominalV: 12, emfV: 12.6 };
    expect(found(giving(60, flooded), 'string-discharge-high')[0]).toMatchObject({
      severity: 'look',
      basisStatus: 'from-memory',
    });
    expect(found(giving(101, flooded), 'string-discharge-high')[0]!.severity).toBe('fix');
  });

  test('the unequal share of one of two strings is found by the solve', () => {
    const parts = [
      battery('B1', { resistanceOhm: 0.002, maxDischargeA: 100 }),
      battery('B2', { resistanceOhm: 0.004, maxDischargeA: 100 }),
      load(165),
    ];
    const findings = found(check({ parts }), 'string-discharge-high');
    expect(findings.map(({ parts }) => parts[0])).toEqual(['B1']); // 110 A of 165 A
    expect(findings[0]!.measured.value).toBeCloseTo(110, 9);
  });

  test('a starting load is not what lasts: such a case is not judged', () => {
    const parts = [
      battery('B1', { maxDischargeA: 100 }),
      { id: 'L1', kind: 'load', plus: 'P', minus: 'N', powerW: 100, surgeW: 3000 },
    ];
    const report = check({ parts, cases: [{ id: 'start', surge: 'L1' }] });
    expect(found(report, 'string-discharge-high')).toEqual([]);
    expect(gaps(report, 'string-discharge-high')).toEqual(['a case without a starting load']);
  });
});

describe('string-charge-high', () => {
  test('current into a string counts, exactly its limit passes; current out of it does not count', () => {
    const parts = [battery('B1', { maxChargeA: 40 }), charger({ outputA: 45 })];
    expect(found(check({ parts }), 'string-charge-high')[0]).toMatchObject({
      severity: 'fix',
      limit: { value: 40, unit: 'A' },
    });
    expect(
      passes(check({ parts: [battery('B1', { maxChargeA: 45 }), charger({ outputA: 45 })] }), 'string-charge-high'),
    ).toBe(1);
    expect(passes(check({ parts: [battery('B1', { maxChargeA: 1 }), load(50)] }), 'string-charge-high')).toBe(1);
  });

  test('a dead cell draws more than its string may take', () => {
    // Three parallel blocks, one with a dead cell (10.6 V, 8 mohm): 171.1 A into it with no load.
    const lead = { chemistry: 'flooded', blockNominalV: 12, capacityAh: 100, linkOhm: 0.000794 };
    const parts = [
      battery('B1', { ...lead, emfV: 12.6, resistanceOhm: 0.005 }),
      battery('B2', { ...lead, emfV: 12.6, resistanceOhm: 0.005 }),
      battery('B3', { ...lead, emfV: 10.6, resistanceOhm: 0.008 }),
      { id: 'L1', kind: 'load', plus: 'P', minus: 'N', currentA: 0 },
    ];
    const [finding] = found(check({ parts }), 'string-charge-high');
    expect(finding).toMatchObject({ severity: 'fix', parts: ['B3'] });
    expect(finding!.measured.value).toBeCloseTo(171.1, 1); // printed to 0.1 A
  });
});

describe('charge-too-strong', () => {
  test('the limits of all chargers add up, shared by capacity; exactly what the strings may take passes', () => {
    const strings = [
      battery('B1', { capacityAh: 100, maxChargeA: 30 }),
      battery('B2', { capacityAh: 200, maxChargeA: 60 }),
    ];
    const both = (outputA: number) => [charger({ outputA: 50 }), charger({ id: 'C2', outputA })];
    expect(passes(check({ parts: [...strings, ...both(40)] }), 'charge-too-strong')).toBe(2);
    const findings = found(check({ parts: [...strings, ...both(43)] }), 'charge-too-strong');
    expect(findings.map(({ parts, measured }) => [parts.join(' '), measured.value])).toEqual([
      ['B1 C1 C2', 31],
      ['B2 C1 C2', 62],
    ]);
  });

  test('loads that take some of it do not make it right', () => {
    const parts = [battery('B1', { maxChargeA: 40 }), charger({ outputA: 50 }), load(30)];
    const report = check({ parts });
    expect(found(report, 'string-charge-high')).toEqual([]);
    expect(found(report, 'charge-too-strong')).toHaveLength(1);
  });

  test('a controller gives no more than its array at the sun of the case', () => {
    const parts = [
      battery('B1', { maxChargeA: 30, blockNominalV: 12, chemistry: 'agm', emfV: 12.5 }),
      {
        id: 'A1',
        kind: 'array',
        plus: 'X',
        minus: 'Y',
        modulesInSeries: 1,
        stringsInParallel: 2,
        vocV: 24,
        iscA: 11,
        vmpV: 20,
        impA: 10,
      },
      {
        id: 'K1',
        kind: 'controller',
        from: { plus: 'X', minus: 'Y' },
        to: { plus: 'P', minus: 'N' },
        type: 'mppt',
        outputA: 100,
        maxInputV: 100,
        setpointV: 14.4,
      },
    ];
    // 400 W / 12 V = 33.3 A in full sun.
    const [finding] = found(check({ parts }), 'charge-too-strong');
    expect(finding!.measured.value).toBeCloseTo(400 / 12, 9);
    expect(passes(check({ parts, cases: [{ id: 'haze', irradianceWPerM2: 900 }] }), 'charge-too-strong')).toBe(1);
  });

  test('strings in series are said to be not judged by share', () => {
    const parts = [battery('LOW', { plus: 'X' }), battery('HIGH', { minus: 'X' }), charger({ setpointV: 28.8 })];
    expect(gaps(check({ parts }), 'charge-too-strong')[0]).toContain('one of several in series');
  });
});

describe('charger-volts-off', () => {
  const set = (setpointV: number, fields: Record<string, unknown> = {}, more: Record<string, unknown> = {}) =>
    check({ parts: [battery('B1', fields), charger({ setpointV })], ...more });
  const agm = { chemistry: 'agm', blockNominalV: 12, emfV: 12.6 };

  test('the window of four iron phosphate cells is 13.4 to 14.6 V, exactly its ends included', () => {
    expect(passes(set(13.4), 'charger-volts-off')).toBe(1);
    expect(passes(set(14.6), 'charger-volts-off')).toBe(1);
    expect(found(set(14.7), 'charger-volts-off')[0]).toMatchObject({ severity: 'fix', parts: ['C1', 'B1'] });
    expect(found(set(13.3), 'charger-volts-off')[0]!.message).toContain('no less than 13.4 V');
  });

  test('lead wants less when warm: what only the temperature moves is for a person to look at', () => {
    expect(passes(set(14.7, agm), 'charger-volts-off')).toBe(1);
    const [finding] = found(set(14.7, { ...agm, temperatureDegC: 40 }), 'charger-volts-off');
    expect(finding).toMatchObject({ severity: 'look' });
    expect(finding!.message).toContain('a charger that compensates by itself does right');
  });

  test('equalising volts on flooded lead are for a person to look at, on sealed lead to be fixed', () => {
    const flooded = { ...agm, chemistry: 'flooded' };
    expect(found(set(15.5, flooded), 'charger-volts-off')[0]).toMatchObject({ severity: 'look' });
    expect(found(set(16.5, flooded), 'charger-volts-off')[0]!.severity).toBe('fix');
    expect(found(set(15.5, agm), 'charger-volts-off')[0]!.severity).toBe('fix');
  });

  test('a block that fits no whole number of cells is not judged', () => {
    expect(gaps(set(14.4, { blockNominalV: 14 }), 'charger-volts-off')[0]).toMatch(/blockNominalV.*\(string B1\)/);
  });

  test('a diode on the way takes its forward volts off; without them it is not judged', () => {
    const behind = (forwardV: number | undefined) => [
      battery('B1'),
      { id: 'D1', kind: 'diode', from: 'X', to: 'P', forwardV },
      charger({ plus: 'X', setpointV: 15 }),
    ];
    expect(passes(check({ parts: behind(0.6) }), 'charger-volts-off')).toBe(1); // 14.4 V at the string
    expect(found(check({ parts: behind(0.2) }), 'charger-volts-off')).toHaveLength(1);
    expect(gaps(check({ parts: behind(undefined) }), 'charger-volts-off')[0]).toMatch(/^forwardV of diode D1/);
  });

  test('two banks behind an isolator: each is charged through its own diode, neither through the other', () => {
    const parts = [
      battery('B1', { plus: 'P1' }),
      battery('B2', { plus: 'P2' }),
      { id: 'D1', kind: 'diode', from: 'X', to: 'P1', forwardV: 0.6 },
      { id: 'D2', kind: 'diode', from: 'X', to: 'P2', forwardV: 0.6 },
      charger({ id: 'ALT', plus: 'X', setpointV: 14.4 }),
      charger({ id: 'SHORE', plus: 'P1', setpointV: 14.8 }),
    ];
    expect(found(check({ parts }), 'charger-volts-off').map(({ parts }) => parts)).toEqual([['SHORE', 'B1']]);
    expect(passes(check({ parts }), 'charger-volts-off')).toBe(2);
  });
});

describe('cold-charge', () => {
  const cold = (fields: Record<string, unknown>, job: Record<string, unknown> = {}) =>
    check({ parts: [battery('B1', fields), charger()], ...job });

  test('lithium below 0 degC with a charger on is a stop; at exactly 0 degC it may be charged', () => {
    expect(passes(cold({ temperatureDegC: 0 }), 'cold-charge')).toBe(1);
    expect(found(cold({ temperatureDegC: -1 }), 'cold-charge')[0]).toMatchObject({
      severity: 'stop',
      parts: ['C1', 'B1'],
      measured: { value: -1, unit: 'degC' },
      limit: { value: 0, unit: 'degC' },
      basisStatus: 'published',
    });
    expect(
      found(cold({ temperatureDegC: -1, chemistry: 'nmc', blockNominalV: 14.8, emfV: 15 }), 'cold-charge')[0]!
        .basisStatus,
    ).toBe('from-memory');
  });

  test('lead is another matter', () => {
    const report = cold({ temperatureDegC: -10, chemistry: 'agm', blockNominalV: 12, emfV: 12.6 });
    expect(found(report, 'cold-charge')).toEqual([]);
    expect(passes(report, 'cold-charge')).toBe(0);
  });

  test('a charger that is off, or a controller in the dark, charges nothing', () => {
    const parts = [battery('B1', { temperatureDegC: -5 }), charger({ on: false })];
    expect(found(check({ parts }), 'cold-charge')).toEqual([]);
    const cases = [
      { id: 'night', irradianceWPerM2: 0 },
      { id: 'noon', irradianceWPerM2: 600 },
    ];
    const solar = [
      battery('B1', { temperatureDegC: -5 }),
      {
        id: 'A1',
        kind: 'array',
        plus: 'X',
        minus: 'Y',
        modulesInSeries: 1,
        stringsInParallel: 1,
        vocV: 24,
        iscA: 11,
        vmpV: 20,
        impA: 9,
      },
      {
        id: 'K1',
        kind: 'controller',
        from: { plus: 'X', minus: 'Y' },
        to: { plus: 'P', minus: 'N' },
        type: 'mppt',
        outputA: 20,
        maxInputV: 50,
        setpointV: 14.2,
      },
    ];
    expect(found(check({ parts: solar, cases: cases.slice(0, 1) }), 'cold-charge')).toEqual([]);
    expect(found(check({ parts: solar, cases }), 'cold-charge')[0]!.case).toBe('noon');
  });

  test('the air of the case stands in for a string without a temperature, the coldest air of the site is looked at', () => {
    const none = { temperatureDegC: undefined };
    expect(found(cold(none, { cases: [{ id: 'frost', ambientDegC: -5 }] }), 'cold-charge')[0]!.severity).toBe('stop');
    const site = { ambientDesignDegC: 10, ambientMinDegC: -15 };
    expect(found(cold(none, { site }), 'cold-charge')[0]).toMatchObject({
      severity: 'look',
      measured: { value: -15, unit: 'degC' },
    });
    expect(passes(cold({ temperatureDegC: 10 }, { site }), 'cold-charge')).toBe(1);
  });

  test('where no temperature is known at all it is not checked', () => {
    const report = cold({ temperatureDegC: undefined });
    expect(gaps(report, 'cold-charge')).toEqual(['temperatureDegC of string B1, or ambientDegC of case as-drawn']);
    expect(passes(report, 'cold-charge')).toBe(0);
  });
});
