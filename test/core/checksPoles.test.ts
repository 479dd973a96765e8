/** In which pole devices stand, what isolates a source, and what a switch or breaker must be able to do. */
import { describe, expect, test } from 'vitest';
import { battery, check, found, gaps, passes, type RawPart } from './checksJob.ts';

const EARTH: RawPart = { id: 'EARTH', kind: 'bond', from: 'N', to: 'earth', size: '16 mm2', lengthM: 1 };
const fuse = (id: string, from: string, to: string): RawPart => ({ id, kind: 'fuse', from, to, ratingA: 50 });
const gate = (id: string, from: string, to: string, fields: Record<string, unknown> = {}): RawPart => ({
  id,
  kind: 'switch',
  from,
  to,
  ratingA: 100,
  loadBreak: true,
  ...fields,
});
const load = (plus: string, minus: string, fields: Record<string, unknown> = {}): RawPart => ({
  id: 'L1',
  kind: 'load',
  plus,
  minus,
  currentA: 10,
  ...fields,
});
const judged = (practice: string, ...parts: readonly RawPart[]) =>
  check({ practice, parts: [battery('B1'), ...parts] });
const PRACTICES = ['us-land', 'us-marine', 'iso-marine', 'iec-land'] as const;

describe('both-poles-open-system', () => {
  test('with one pole earthed, one fused pole is enough', () => {
    expect(passes(judged('iso-marine', EARTH, fuse('F1', 'P', 'Q'), load('Q', 'N')), 'both-poles-open-system')).toBe(1);
  });

  test('with neither earthed, a device in one pole only is worth a look, one in each passes', () => {
    const [one] = found(judged('iso-marine', fuse('F1', 'P', 'Q'), load('Q', 'N')), 'both-poles-open-system');
    expect(one).toMatchObject({ severity: 'look', parts: ['B1'], measured: { value: 1 }, limit: { value: 2 } });
    expect(one!.message).toContain('the minus pole has neither');
    const both = judged('iso-marine', fuse('F1', 'P', 'Q'), gate('SW', 'N', 'M'), load('Q', 'M'));
    expect(passes(both, 'both-poles-open-system')).toBe(1);
  });

  test('with a device in neither the missing fuse is told instead', () => {
    const report = judged('iso-marine', load('P', 'N'));
    expect(found(report, 'both-poles-open-system')).toEqual([]);
    expect(found(report, 'no-fuse-on-source')).toHaveLength(1);
  });

  test.each(PRACTICES)('%s has a clause of its own', (practice) => {
    const [one] = found(judged(practice, fuse('F1', 'P', 'Q'), load('Q', 'N')), 'both-poles-open-system');
    const remembered = practice === 'us-land' || practice === 'iec-land';
    expect(one!.basisStatus).toBe(remembered ? 'from-memory' : 'published');
  });
});

describe('fuse-in-earthed-pole', () => {
  const inMinus = (part: RawPart, ...more: readonly RawPart[]) =>
    judged('iso-marine', EARTH, load('P', 'M'), part, ...more);

  test('a fuse in the earthed conductor alone is a thing to fix', () => {
    const [finding] = found(inMinus(fuse('F1', 'M', 'N')), 'fuse-in-earthed-pole');
    expect(finding).toMatchObject({ severity: 'fix', parts: ['F1', 'L1'], basisStatus: 'published' });
    expect(finding!.message).toContain('the other pole of L1 stays live');
  });

  test('one in the pole that is not earthed passes, and one in each pole too', () => {
    expect(passes(judged('iso-marine', EARTH, fuse('F1', 'P', 'Q'), load('Q', 'N')), 'fuse-in-earthed-pole')).toBe(1);
    const both = judged('iso-marine', EARTH, fuse('F1', 'P', 'Q'), load('Q', 'M'), fuse('F2', 'M', 'N'));
    expect(passes(both, 'fuse-in-earthed-pole')).toBe(2);
  });

  test('a switch wants a switch or breaker in the other pole: a fuse cannot be opened by hand', () => {
    const fused = judged('iso-marine', EARTH, fuse('F1', 'P', 'Q'), load('Q', 'M'), gate('SW', 'M', 'N'));
    expect(found(fused, 'fuse-in-earthed-pole')[0]!.parts).toEqual(['SW', 'L1']);
    const switched = judged('iso-marine', EARTH, gate('SW1', 'P', 'Q'), load('Q', 'M'), gate('SW', 'M', 'N'));
    expect(found(switched, 'fuse-in-earthed-pole')).toEqual([]);
  });

  test('where no pole is earthed nothing is in the earthed one', () => {
    expect(found(judged('iso-marine', load('P', 'M'), fuse('F1', 'M', 'N')), 'fuse-in-earthed-pole')).toEqual([]);
  });

  test.each([
    ['us-land', 'from-memory'],
    ['us-marine', 'published'],
    ['iec-land', 'common-practice'],
  ])('%s has a clause of its own', (practice, basisStatus) => {
    const report = judged(practice, EARTH, load('P', 'M'), fuse('F1', 'M', 'N'));
    expect(found(report, 'fuse-in-earthed-pole')[0]!.basisStatus).toBe(basisStatus);
  });
});

describe('source-without-isolator', () => {
  const isolated = (...parts: readonly RawPart[]) => judged('iec-land', fuse('F1', 'P', 'Q'), ...parts);

  test('a switch that breaks its load isolates, and so does a breaker', () => {
    expect(passes(isolated(gate('SW', 'Q', 'R'), load('R', 'N')), 'source-without-isolator')).toBe(1);
    const breaker = { ...fuse('CB', 'Q', 'R'), kind: 'breaker' };
    expect(passes(isolated(breaker, load('R', 'N')), 'source-without-isolator')).toBe(1);
  });

  test('a fuse alone does not, nor a switch that cannot break its load', () => {
    const [bare] = found(isolated(load('Q', 'N')), 'source-without-isolator');
    expect(bare).toMatchObject({ severity: 'fix', parts: ['B1', 'L1'], basisStatus: 'published' });
    const report = isolated(gate('SW', 'Q', 'R', { loadBreak: false }), load('R', 'N'));
    expect(found(report, 'source-without-isolator')).toHaveLength(1);
  });

  test('whether the switch breaks its load is asked for where it decides', () => {
    const report = isolated(gate('SW', 'Q', 'R', { loadBreak: undefined }), load('R', 'N'));
    expect(gaps(report, 'source-without-isolator')).toEqual(['loadBreak of switch SW: does it isolate B1']);
  });

  test('a critical load may stay joined, as a bilge pump does', () => {
    expect(passes(isolated(load('Q', 'N', { dropClass: 'critical' })), 'source-without-isolator')).toBe(1);
  });

  test('the battery of a starter motor is for a person to judge', () => {
    const [finding] = found(isolated(load('Q', 'N', { cranking: true })), 'source-without-isolator');
    expect(finding!.severity).toBe('look');
  });

  test('a charger wants a switch towards the strings, and its finding says what an alternator does', () => {
    const charger: RawPart = { id: 'ALT', kind: 'charger', plus: 'C', minus: 'N', outputA: 50, setpointV: 14.2 };
    const [finding] = found(isolated(fuse('F2', 'P', 'C'), charger), 'source-without-isolator');
    expect(finding).toMatchObject({ severity: 'look', parts: ['ALT', 'B1'] });
    expect(finding!.remedy).toContain('stop an alternator');
    expect(passes(isolated(gate('SW', 'P', 'C'), charger), 'source-without-isolator')).toBe(2);
    // Where the string itself has none, that is told and nothing else.
    const both = found(isolated(fuse('F2', 'P', 'C'), charger, load('Q', 'N')), 'source-without-isolator');
    expect(both.map(({ parts }) => parts)).toEqual([['B1', 'L1']]);
  });

  test.each(PRACTICES)('%s has a clause of its own', (practice) => {
    const [bare] = found(judged(practice, fuse('F1', 'P', 'Q'), load('Q', 'N')), 'source-without-isolator');
    expect(bare!.basisStatus).toBe('published');
  });
});

describe('switch-not-breaking', () => {
  const through = (fields: Record<string, unknown>, taker: Record<string, unknown> = {}, practice = 'us-land') =>
    judged(practice, fuse('F1', 'P', 'Q'), gate('SW', 'Q', 'R', fields), load('R', 'N', taker));

  test('one that breaks its load passes, and one that carries nothing', () => {
    expect(passes(through({}), 'switch-not-breaking')).toBe(1);
    expect(passes(through({ loadBreak: false }, { on: false }), 'switch-not-breaking')).toBe(1);
    expect(passes(through({ loadBreak: false }, { currentA: 0.01 }), 'switch-not-breaking')).toBe(1);
  });

  test('one that cannot and carries current is a thing to fix, unless it is marked', () => {
    expect(found(through({ loadBreak: false }), 'switch-not-breaking')[0]).toMatchObject({
      severity: 'fix',
      parts: ['SW'],
      measured: { value: 10, unit: 'A' },
    });
    expect(passes(through({ loadBreak: false, marked: true }), 'switch-not-breaking')).toBe(1);
  });

  test('what it can do is asked for', () => {
    expect(gaps(through({ loadBreak: undefined }), 'switch-not-breaking')).toEqual(['loadBreak of switch SW']);
  });

  test.each([
    ['us-land', 'published'],
    ['us-marine', 'common-practice'],
    ['iso-marine', 'common-practice'],
    ['iec-land', 'published'],
  ])('%s has a clause of its own', (practice, basisStatus) => {
    const report = through({ loadBreak: false }, {}, practice);
    expect(found(report, 'switch-not-breaking')[0]!.basisStatus).toBe(basisStatus);
  });
});

describe('auto-reset', () => {
  const breaker = (fields: Record<string, unknown>, practice = 'us-marine') =>
    judged(practice, { ...fuse('CB', 'P', 'Q'), kind: 'breaker', ...fields }, load('Q', 'N'));

  test('reset by hand passes, by itself does not, unstated is asked for', () => {
    expect(passes(breaker({ manualReset: true }), 'auto-reset')).toBe(1);
    expect(found(breaker({ manualReset: false }), 'auto-reset')[0]).toMatchObject({ severity: 'fix', parts: ['CB'] });
    expect(gaps(breaker({}), 'auto-reset')).toEqual(['manualReset of breaker CB']);
  });

  test.each([
    ['us-marine', 'published'],
    ['us-land', 'common-practice'],
    ['iso-marine', 'from-memory'],
    ['iec-land', 'common-practice'],
  ])('%s has a clause of its own', (practice, basisStatus) => {
    expect(found(breaker({ manualReset: false }, practice), 'auto-reset')[0]!.basisStatus).toBe(basisStatus);
  });
});
