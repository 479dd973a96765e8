/** Strings that should be alike, how many of them, and midpoints. */
import { describe, expect, test } from 'vitest';
import { battery, check, found, gaps, passes, type RawPart } from './checksJob.ts';

const lead = (id: string, fields: Record<string, unknown> = {}) =>
  battery(id, {
    chemistry: 'agm',
    blockNominalV: 12,
    capacityAh: 100,
    emfV: undefined,
    resistanceOhm: undefined,
    ...fields,
  });

describe('too-many-strings', () => {
  const many = (count: number, settings: Record<string, unknown> = {}) =>
    check({ parts: Array.from({ length: count }, (_, k) => lead(`B${k + 1}`)), settings });

  test('exactly four pass, five are worth a look, and the setting is the job’s own', () => {
    expect(passes(many(4), 'too-many-strings')).toBe(1);
    const [finding] = found(many(5), 'too-many-strings');
    expect(finding).toMatchObject({ severity: 'look', measured: { value: 5 }, limit: { value: 4 } });
    expect(finding!.basis).toContain('no published source');
    expect(finding!.basis).toContain('tubular gel cell allows at most four');
    expect(passes(many(5, { maxParallelStrings: 6 }), 'too-many-strings')).toBe(1);
  });

  test('strings in series count as one', () => {
    const pair = (k: number) => [lead(`L${k}`, { plus: `M${k}` }), lead(`U${k}`, { minus: `M${k}` })];
    expect(passes(check({ parts: [1, 2, 3, 4].flatMap(pair) }), 'too-many-strings')).toBe(1);
  });
});

describe('parallel-mix', () => {
  const beside = (first: Record<string, unknown>, second: Record<string, unknown>, settings = {}) =>
    check({ parts: [lead('A', first), lead('B', second)], settings });

  test('like beside like passes, whatever is not said of both', () => {
    expect(passes(beside({}, {}), 'parallel-mix')).toBe(1);
    expect(passes(beside({ blocksInSeries: 2, blockNominalV: 6 }, {}), 'parallel-mix')).toBe(1);
  });

  test('lead beside lithium is to be put right, two kinds of lead are worth a look', () => {
    const lfp = { chemistry: 'lfp', blockNominalV: 12.8 };
    expect(found(beside({}, lfp), 'parallel-mix')[0]).toMatchObject({ severity: 'fix', parts: ['A', 'B'] });
    expect(found(beside({}, { chemistry: 'gel' }), 'parallel-mix')[0]!.severity).toBe('look');
  });

  test('other volts, or other cells of one chemistry, are a stop', () => {
    expect(found(beside({}, { blocksInSeries: 2 }), 'parallel-mix')[0]).toMatchObject({
      severity: 'stop',
      measured: { value: 24, unit: 'V' },
      limit: { value: 12, unit: 'V' },
    });
    const lfp = { chemistry: 'lfp', emfV: 13 };
    const cells = beside({ ...lfp, blockNominalV: 12.8 }, { ...lfp, blockNominalV: 16 });
    expect(found(cells, 'parallel-mix')[0]!.message).toContain('(4 cells in series) and B of 16 V (5 cells)');
  });

  test('ages exactly a year apart pass, further apart are worth a look, and the sources are said to disagree', () => {
    expect(passes(beside({ ageYears: 2 }, { ageYears: 3 }), 'parallel-mix')).toBe(1);
    const [finding] = found(beside({ ageYears: 2 }, { ageYears: 3.5 }), 'parallel-mix');
    expect(finding).toMatchObject({ severity: 'look', measured: { value: 1.5, unit: 'year' } });
    expect(finding!.message).toContain('sources disagree');
    expect(passes(beside({ ageYears: 2 }, { ageYears: 3.5 }, { ageGapYears: 2 }), 'parallel-mix')).toBe(1);
  });

  test('an age is missed only where another string gives its own', () => {
    expect(gaps(beside({ ageYears: 2 }, {}), 'parallel-mix')).toEqual([
      'ageYears of string B: another string beside it gives its own',
    ]);
    expect(gaps(beside({}, {}), 'parallel-mix')).toEqual([]);
  });
});

describe('series-mismatch', () => {
  const series = (lower: Record<string, unknown>, upper: Record<string, unknown>, more: readonly RawPart[] = []) =>
    check({ parts: [lead('LOW', { plus: 'M', ...lower }), lead('UP', { minus: 'M', ...upper }), ...more] });

  test('alike passes; strings that are not in series are not judged', () => {
    expect(passes(series({}, {}), 'series-mismatch')).toBe(1);
    expect(passes(check({ parts: [lead('A'), lead('B', { capacityAh: 50 })] }), 'series-mismatch')).toBe(0);
  });

  test('capacities exactly a tenth apart are worth a look, further apart to be put right', () => {
    expect(found(series({}, { capacityAh: 90 }), 'series-mismatch')[0]!.severity).toBe('look');
    const [finding] = found(series({}, { capacityAh: 89 }), 'series-mismatch');
    expect(finding!.severity).toBe('fix');
    expect(finding!.message).toContain('so UP is empty first and full first');
  });

  test('charge may differ by a tenth, chemistry not at all', () => {
    expect(passes(series({ stateOfCharge: 0.8 }, { stateOfCharge: 0.7 }), 'series-mismatch')).toBe(1);
    expect(found(series({ stateOfCharge: 0.8 }, { stateOfCharge: 0.69 }), 'series-mismatch')[0]!.severity).toBe('look');
    expect(found(series({}, { chemistry: 'flooded' }), 'series-mismatch')[0]!.severity).toBe('fix');
  });

  test('ages count as beside one another, and a tap between them changes nothing', () => {
    const tap = { id: 'L1', kind: 'load', plus: 'M', minus: 'N', currentA: 1 };
    const report = series({ ageYears: 1 }, { ageYears: 4 }, [tap]);
    expect(found(report, 'series-mismatch')[0]!.message).toContain('the older one ends each discharge');
    expect(gaps(series({ ageYears: 1 }, {}), 'series-mismatch')).toHaveLength(1);
  });
});

describe('midpoint-off', () => {
  const reading = (id: string, plus: string, minus: string, valueV: number, fields: Record<string, unknown> = {}) => ({
    id,
    quantity: 'voltage',
    plus,
    minus,
    valueV,
    ...fields,
  });
  const string24 = lead('S', { blocksInSeries: 2, midpoint: 'MID' });
  const halves = (lower: number, upper: number) =>
    check({ parts: [string24], readings: [reading('r1', 'MID', 'N', lower), reading('r2', 'P', 'MID', upper)] });

  test('exactly half a per cent of the total off centre passes, more is looked at, beyond one per cent it is acted on', () => {
    // 28 V: 140 mV and 280 mV off centre, so halves 280 mV and 560 mV apart.
    expect(passes(halves(13.86, 14.14), 'midpoint-off')).toBe(1);
    expect(found(halves(13.85, 14.15), 'midpoint-off')[0]!.severity).toBe('look');
    expect(found(halves(13.72, 14.28), 'midpoint-off')[0]!.severity).toBe('look');
    expect(found(halves(13.71, 14.29), 'midpoint-off')[0]).toMatchObject({ severity: 'fix', parts: ['S'] });
  });

  test('nothing read and nothing tapped is neither a pass nor a finding', () => {
    const report = check({ parts: [string24] });
    expect([passes(report, 'midpoint-off'), found(report, 'midpoint-off'), gaps(report, 'midpoint-off')]).toEqual([
      0,
      [],
      [],
    ]);
  });

  test('what was found off and left right is past', () => {
    const set = (name: string) => ({ set: name });
    const readings = [
      reading('r1', 'MID', 'N', 13.5, set('as-found')),
      reading('r2', 'P', 'MID', 14.5, set('as-found')),
      reading('r3', 'MID', 'N', 14, set('as-left')),
      reading('r4', 'P', 'MID', 14, set('as-left')),
    ];
    expect(passes(check({ parts: [string24], readings }), 'midpoint-off')).toBe(1);
    expect(found(check({ parts: [string24], readings: readings.slice(0, 2) }), 'midpoint-off')).toHaveLength(1);
  });

  test('a load on half of a string pulls its midpoint, as solved', () => {
    const known = { ...string24, emfV: 25, resistanceOhm: 0.02 };
    const tap = { id: 'L1', kind: 'load', plus: 'MID', minus: 'N', currentA: 40 };
    const [finding] = found(check({ parts: [known, tap] }), 'midpoint-off');
    // 40 A through 10 mohm of the lower half alone: 400 mV, half of it off centre.
    expect(finding!.measured.value).toBeCloseTo(0.2, 6);
    expect(finding!.message).toContain('String S, as solved');
  });
});
