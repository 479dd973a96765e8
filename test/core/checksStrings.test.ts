/** Strings as one bank: what flows at rest, what rushes when they are joined, what is left when one goes, taps on links. */
import { describe, expect, test } from 'vitest';
import { runChecks } from '../../core/checks/runChecks.ts';
import { tables } from '../../data/index.ts';
import { battery, check, found, gaps, jobOf, passes, type RawPart } from './checksJob.ts';

const load = (currentA: number, fields: Record<string, unknown> = {}): RawPart => ({
  id: 'L1',
  kind: 'load',
  plus: 'P',
  minus: 'N',
  currentA,
  ...fields,
});
const charger = (fields: Record<string, unknown> = {}): RawPart => ({
  id: 'C1',
  kind: 'charger',
  plus: 'P',
  minus: 'N',
  outputA: 60,
  setpointV: 14.4,
  ...fields,
});
const lead = (id: string, fields: Record<string, unknown> = {}) =>
  battery(id, { chemistry: 'agm', blockNominalV: 12, capacityAh: 100, resistanceOhm: 0.005, ...fields });

describe('share-uneven in charging and with strings in series', () => {
  test('a bank that takes is judged as one that gives: 9 against 11 mohm is exactly at the limit and passes', () => {
    const taking = (first: number, second: number) =>
      check({ parts: [battery('B1', { resistanceOhm: first }), battery('B2', { resistanceOhm: second }), charger()] });
    expect(passes(taking(0.009, 0.011), 'share-uneven')).toBe(1);
    const [finding] = found(taking(0.0088, 0.0112), 'share-uneven');
    expect(finding!.message).toContain(
      'takes 33.6 A of the 60 A that it and B2 take; its fair share by capacity is 30 A',
    );
  });

  test('a fuller string takes less of a charge, which evens them out: no finding', () => {
    const parts = [
      battery('B1', { emfV: 13.3, resistanceOhm: 0.01 }),
      battery('B2', { resistanceOhm: 0.01 }),
      charger(),
    ];
    const report = check({ parts });
    expect(found(report, 'share-uneven')).toEqual([]);
    expect(passes(report, 'share-uneven')).toBe(0);
  });

  test('where rest volts make most of the difference on discharge, leads are not what is to be changed', () => {
    const parts = [
      battery('B1', { emfV: 13.4, resistanceOhm: 0.01 }),
      battery('B2', { resistanceOhm: 0.01 }),
      load(40),
    ];
    const [finding] = found(check({ parts }), 'share-uneven');
    expect(finding!.message).toContain('with nothing switched on 10 A flow out of it already');
    expect(finding!.remedy).toMatch(/^Bring the strings to the same charge/);
  });

  test('strings in series count as one, and are named so', () => {
    const parts = [
      lead('A1', { plus: 'AM' }),
      lead('A2', { minus: 'AM' }),
      lead('B1', { plus: 'BM', resistanceOhm: 0.01 }),
      lead('B2', { minus: 'BM', resistanceOhm: 0.01 }),
      load(30),
    ];
    const [finding] = found(check({ parts }), 'share-uneven');
    expect(finding!.message).toContain('Strings A1 and A2 in series give 20 A of the 30 A that they and B1 + B2 give');
  });

  test('on assumed figures it is said whether they could undo the verdict', () => {
    const unknown = { emfV: 13.2, resistanceOhm: undefined };
    const long = { id: 'W1', kind: 'cable', from: 'B2+', to: 'P', lengthM: 1, size: '35 mm2', resistanceOhm: 0.004 };
    const parts = (resistanceOhm: number) => [
      battery('B1', unknown),
      battery('B2', { ...unknown, plus: 'B2+' }),
      { ...long, resistanceOhm },
      load(100),
    ];
    const message = (ohm: number) => found(check({ parts: parts(ohm) }), 'share-uneven')[0]!.message;
    expect(message(0.002)).toContain('with the best figures that may be assumed it would hold');
    expect(message(0.1)).toContain('it fails with the best of them too');
  });
});

describe('circulating-at-rest', () => {
  // I = (E1 - E2)/(R1 + R2); C/50 of 100 Ah is 2 A.
  const apart = (emfV: number, fields: Record<string, unknown> = {}) =>
    check({ parts: [lead('A', { emfV: 12.5 }), lead('B', { emfV, ...fields }), load(1, { on: false })] });

  test('20 mV across 10 mohm is exactly C/50 and passes', () => {
    const report = apart(12.52);
    expect(found(report, 'circulating-at-rest')).toEqual([]);
    expect(passes(report, 'circulating-at-rest')).toBe(1);
  });

  test('more is worth a look: who feeds whom, amps, watts, with nothing switched on', () => {
    const [finding] = found(apart(12.6), 'circulating-at-rest');
    expect(finding).toMatchObject({ severity: 'look', parts: ['A', 'B'], limit: { value: 2, unit: 'A' } });
    expect(finding!.measured.value).toBeCloseTo(10, 9);
    expect(finding!.message).toBe('With nothing switched on, A takes 10 A from B (10 A); 1 W turn to heat on the way.');
  });

  test('more than the string may take on charge is to be put right', () => {
    const parts = [lead('A', { emfV: 12.2, maxChargeA: 20 }), lead('B', { emfV: 12.7 })];
    const [finding] = found(check({ parts }), 'circulating-at-rest');
    expect(finding).toMatchObject({ severity: 'fix', limit: { value: 20, unit: 'A' } });
    expect(finding!.message).toContain('50 A is more than the 20 A that it may take on charge');
  });

  test('1.5 V below per 12 V is not yet a dead cell, more is: stop, isolate, do not charge', () => {
    expect(found(apart(14), 'circulating-at-rest')[0]!.severity).toBe('fix');
    const [finding] = found(apart(14.1), 'circulating-at-rest');
    expect(finding!.severity).toBe('stop');
    expect(finding!.remedy).toContain('gas and heat hazard; do not charge');
  });

  test('strings apart by an open switch, and those that only a relay joins while charging, are not judged', () => {
    const relay = { id: 'K', kind: 'switch', from: 'B+', to: 'P', state: 'open' };
    const parts = [lead('A', { emfV: 12.5 }), lead('B', { emfV: 12.6, plus: 'B+' }), relay, charger({ on: false })];
    const cases = [{ id: 'rest' }, { id: 'charging', set: { K: { state: 'closed' }, C1: { on: true } } }];
    expect(found(check({ parts, cases }), 'circulating-at-rest')).toEqual([]);
    const left = [...cases, { id: 'left-closed', set: { K: { state: 'closed' } } }];
    expect(found(check({ parts, cases: left }), 'circulating-at-rest')).toHaveLength(1);
  });
});

describe('joining-surge', () => {
  const joined = (emfV: number, fields: Record<string, unknown> = {}, fuseA = 200) =>
    check({
      parts: [
        lead('A', { emfV: 12.5, ...fields }),
        lead('B', { emfV, plus: 'B+', maxChargeA: 100 }),
        { id: 'F', kind: 'fuse', from: 'B+', to: 'P', ratingA: fuseA },
      ],
    });

  test('the first instant exactly at the fuse passes, more is to be put right', () => {
    // 0.2 V over 10 mohm and the fuse of no ohms that the test gives it.
    const exact = { resistanceOhm: 0.005, maxChargeA: 100 };
    const ohms = (fuseA: number) =>
      check({
        parts: [
          lead('A', { emfV: 12.5, ...exact }),
          lead('B', { emfV: 12.7, plus: 'B+', ...exact }),
          { id: 'F', kind: 'fuse', from: 'B+', to: 'P', ratingA: fuseA, resistanceOhm: 0 },
        ],
      });
    expect(found(ohms(20), 'joining-surge')).toEqual([]);
    const [finding] = found(ohms(15), 'joining-surge');
    expect(finding).toMatchObject({ severity: 'fix', limit: { value: 15, unit: 'A' } });
    expect(finding!.measured.value).toBeCloseTo(20, 6);
    expect(finding!.message).toContain('would carry 20 A in the first instant after joining');
    expect(finding!.message).toContain('15 A is ratingA of fuse F');
  });

  test('fast resistance counts, not that of minutes: what rests gently may rush', () => {
    const unknown = { resistanceOhm: undefined, shortCircuitA: 3000, stateOfCharge: 0.9, temperatureDegC: 25 };
    const parts = [
      lead('A', { emfV: 12.2, maxChargeA: 20, ...unknown }),
      lead('B', { emfV: 12.4, maxChargeA: 20, ...unknown }),
    ];
    const report = check({ parts });
    expect(found(report, 'circulating-at-rest')[0]!.severity).toBe('look');
    expect(found(report, 'joining-surge')[0]).toMatchObject({ severity: 'look', limit: { value: 20, unit: 'A' } });
  });

  test('what circulates gravely is told by the other rule alone', () => {
    const report = joined(13.5, { maxChargeA: 20 });
    expect(found(report, 'circulating-at-rest')[0]!.severity).toBe('fix');
    expect(found(report, 'joining-surge')).toEqual([]);
    expect(passes(report, 'joining-surge')).toBe(0);
  });

  test.each([
    [0.05, 'nothing'],
    [0.06, 'look'],
    [0.3, 'look'],
    [0.31, 'fix'],
  ])('iron phosphate blocks %f V apart: %s', (gapV, severity) => {
    const soft = { resistanceOhm: 0.2 };
    const parts = [battery('A', soft), battery('B', { ...soft, emfV: 13.2 + gapV })];
    const findings = found(check({ parts }), 'joining-surge');
    expect(findings.map((one) => one.severity)).toEqual(severity === 'nothing' ? [] : [severity]);
    for (const { message } of findings) expect(message).toContain('do not prove equal charge');
  });
});

describe('one-out-overload', () => {
  const bank = (currentA: number, fields: Record<string, unknown> = {}, loadFields: Record<string, unknown> = {}) =>
    check({
      parts: [
        ...['A', 'B', 'C'].map((id) => battery(id, { maxDischargeA: 100, ...fields })),
        load(currentA, loadFields),
      ],
    });

  test('two that are left at exactly their limit pass', () => {
    expect(passes(bank(200), 'one-out-overload')).toBe(1);
  });

  test('lithium with limits of its own follows in a cascade; the largest load that survives is named', () => {
    const [finding] = found(bank(240), 'one-out-overload');
    expect(finding).toMatchObject({ severity: 'fix', parts: ['A', 'B', 'C'], limit: { value: 100, unit: 'A' } });
    expect(finding!.measured.value).toBeCloseTo(120, 6);
    expect(finding!.message).toContain('fine until one cuts out, then the rest follow');
    expect(finding!.message).toContain(
      'the largest that survives any one loss is 200 A and 300 A with all in, of the 240 A',
    );
  });

  test('lead bears more for a while: a look, unless a critical load hangs on it', () => {
    const agm = { chemistry: 'agm', blockNominalV: 12, emfV: 12.7 };
    expect(found(bank(240, agm), 'one-out-overload')[0]!.severity).toBe('look');
    expect(found(bank(240, agm, { dropClass: 'critical' }), 'one-out-overload')[0]!.severity).toBe('fix');
  });

  test('strings that are beyond their limits with all in are told by the other rule', () => {
    const report = bank(330);
    expect(found(report, 'string-discharge-high')).toHaveLength(3);
    expect(found(report, 'one-out-overload')).toEqual([]);
    expect(passes(report, 'one-out-overload')).toBe(0);
  });

  test('a load that the others cannot bring at all is told as such', () => {
    const weak = { resistanceOhm: 0.1, maxDischargeA: 60 };
    const report = bank(0, weak, { currentA: undefined, powerW: 1000 });
    expect(found(report, 'one-out-overload')[0]!.message).toContain('cannot bring');
  });
});

test('rates that the tables do not know are missing figures, never a pass', () => {
  const known = tables.chemistry.limits.agm;
  const agm = new Map([...known].filter(([quantity]) => quantity !== 'dischargeRate' && quantity !== 'chargeRateMax'));
  const chemistry = { ...tables.chemistry, limits: { ...tables.chemistry.limits, agm } };
  const job = jobOf({ parts: [lead('A', { maxDischargeA: 90, maxChargeA: 30 }), lead('B'), load(50)] });
  const report = runChecks({ job, tables: { ...tables, chemistry } });
  expect(gaps(report, 'one-out-overload')).toEqual(['maxDischargeA of string B']);
  expect(gaps(report, 'joining-surge')).toEqual(['maxChargeA of string B']);
});

describe('charge-and-load-share-links', () => {
  // One link of r between two strings of R, charger at the one and load at the other, both 60 A: I_B = 60 r/(2 R + r).
  const ladder = (linkOhm: number, capacityAh = 100) =>
    check({
      parts: [
        lead('A', { plus: 'PA', capacityAh, resistanceOhm: 0.01 }),
        lead('B', { plus: 'PB', capacityAh, resistanceOhm: 0.01 }),
        { id: 'LINK', kind: 'joint', from: 'PA', to: 'PB', resistanceOhm: linkOhm },
        charger({ plus: 'PA', setpointV: 20 }),
        load(60, { plus: 'PB' }),
      ],
    });

  test('exactly C/50 passes, more is worth a look and names the strings and the link', () => {
    const linkOhm = (2 * 0.01 * 2) / (60 - 2);
    expect(passes(ladder(linkOhm), 'charge-and-load-share-links')).toBe(1);
    const [finding] = found(ladder(0.001), 'charge-and-load-share-links');
    expect(finding).toMatchObject({ severity: 'look', parts: ['A', 'B'], limit: { value: 2, unit: 'A' } });
    expect(finding!.message).toBe(
      'A takes 2.857 A while B gives 2.857 A: charger and load work on different ends of LINK (57.14 A).',
    );
  });

  test('what flows with nothing switched on is no matter of taps', () => {
    const parts = [
      lead('A', { emfV: 12.5 }),
      lead('B', { emfV: 12.7 }),
      charger({ outputA: 10, setpointV: 20 }),
      load(10),
    ];
    const report = check({ parts });
    expect(found(report, 'circulating-at-rest')).toHaveLength(1);
    expect(found(report, 'charge-and-load-share-links')).toEqual([]);
  });
});

describe('link-overloaded', () => {
  const linked = (currentA: number, fields: Record<string, unknown> = {}) =>
    check({ parts: [lead('A', { blocksInSeries: 2, emfV: 25, linkSize: '16 mm2', ...fields }), load(currentA)] });
  const ampacityA = found(linked(500), 'link-overloaded')[0]!.limit.value;

  test('at exactly the ampacity of its link a string passes, a little above it is to be put right, far above it stops', () => {
    expect(passes(linked(ampacityA), 'link-overloaded')).toBe(1);
    expect(found(linked(1.1 * ampacityA), 'link-overloaded')[0]!.severity).toBe('fix');
    const [finding] = found(linked(1.3 * ampacityA), 'link-overloaded');
    expect(finding!.severity).toBe('stop');
    expect(finding!.message).toContain('through its links of 16 mm²');
  });

  test('links of no stated size are not checked; a single block has none', () => {
    expect(gaps(linked(10, { linkSize: undefined }), 'link-overloaded')).toEqual(['linkSize of string A']);
    const single = linked(10, { blocksInSeries: 1, linkSize: undefined });
    expect(gaps(single, 'link-overloaded')).toEqual([]);
    expect(passes(single, 'link-overloaded')).toBe(0);
  });
});
