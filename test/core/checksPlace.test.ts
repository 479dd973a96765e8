/** How far devices sit from sources, what a charger's own end wants, and the starter motor's cable. */
import { describe, expect, test } from 'vitest';
import { battery, check, found, gaps, passes, type RawPart } from './checksJob.ts';

const INCH = 0.0254;

const load = (id: string, plus: string, fields: Record<string, unknown> = {}): RawPart => ({
  id,
  kind: 'load',
  plus,
  minus: 'N',
  currentA: 10,
  ...fields,
});

/** B1 - LEAD - F1 - OUT - L1, the lead as long as asked for. */
function withLead(lead: Record<string, unknown>, fields: Record<string, unknown> = {}) {
  const { fuse, ...job } = fields as { fuse?: Record<string, unknown> };
  return check({
    practice: 'us-marine',
    parts: [
      battery('B1'),
      { id: 'LEAD', kind: 'cable', from: 'P', to: 'Q', size: '2/0 AWG', ...lead },
      { id: 'F1', kind: 'fuse', from: 'Q', to: 'R', ratingA: 100, ...fuse },
      { id: 'OUT', kind: 'cable', from: 'R', to: 'L', lengthM: 3, size: '2/0 AWG' },
      load('L1', 'L'),
    ],
    ...job,
  });
}

describe('fuse-too-far', () => {
  test('US boats, open: 7.0 in passes, 7.1 in does not (33 CFR 183.455(b), at the battery after ABYC E-11)', () => {
    const near = withLead({ lengthM: 7.0 * INCH, sheathed: false });
    expect(found(near, 'fuse-too-far')).toEqual([]);
    expect(passes(near, 'fuse-too-far')).toBe(1);
    const [far] = found(withLead({ lengthM: 7.1 * INCH, sheathed: false }), 'fuse-too-far');
    expect(far).toMatchObject({ severity: 'fix', parts: ['F1', 'B1', 'LEAD'], limit: { value: 0.178, unit: 'm' } });
    expect(far!.measured.value).toBeCloseTo(0.18034, 9);
    expect(far!.basis).toContain('ABYC E-11');
  });

  test('US boats, sheathed throughout: 40 in passes; 72 in to the millimetre passes, a centimetre more does not', () => {
    expect(passes(withLead({ lengthM: 40 * INCH, sheathed: true }), 'fuse-too-far')).toBe(1);
    expect(passes(withLead({ lengthM: 1.829, sheathed: true }), 'fuse-too-far')).toBe(1);
    const [far] = found(withLead({ lengthM: 1.839, sheathed: true }), 'fuse-too-far');
    expect(far!.limit.value).toBe(1.829);
  });

  test('whether it is sheathed is asked for only where it decides', () => {
    expect(gaps(withLead({ lengthM: 1 }), 'fuse-too-far')).toEqual([
      'sheathed of cable LEAD: whether fuse F1 sits near enough to string B1',
    ]);
    expect(gaps(withLead({ lengthM: 0.1 }), 'fuse-too-far')).toEqual([]);
    expect(found(withLead({ lengthM: 3 }), 'fuse-too-far')).toHaveLength(1);
  });

  test('the distance entered for the fuse goes before the length of the cables', () => {
    const fuse = { distanceFromSourceM: 0.15 };
    expect(passes(withLead({ lengthM: 3, sheathed: false }, { fuse }), 'fuse-too-far')).toBe(1);
  });

  test.each([
    ['iso-marine', 0.2, 'fix', 'from-memory'],
    ['iec-land', 3, 'fix', 'from-memory'],
    // No figure in the book: trade practice, for a person to judge.
    ['us-land', 0.457, 'look', 'common-practice'],
  ])('%s: exactly %s m passes, a centimetre more does not', (practice, limitM, severity, basisStatus) => {
    expect(passes(withLead({ lengthM: limitM }, { practice }), 'fuse-too-far')).toBe(1);
    const [far] = found(withLead({ lengthM: limitM + 0.01 }, { practice }), 'fuse-too-far');
    expect(far).toMatchObject({ severity, basisStatus, limit: { value: limitM, unit: 'm' } });
  });

  test('a job that names no practice is not judged', () => {
    expect(gaps(withLead({ lengthM: 9 }, { practice: undefined }), 'fuse-too-far')).toEqual([
      'practice of the job: which rule book judges it',
    ]);
  });

  test('of a system with its plus earthed the devices belong into the minus', () => {
    const report = check({
      practice: 'iso-marine',
      parts: [
        battery('B1'),
        { id: 'EARTH', kind: 'bond', from: 'P', to: 'earth', size: '16 mm2', lengthM: 1 },
        { id: 'BACK', kind: 'cable', from: 'N', to: 'Q', size: '70 mm2', lengthM: 1 },
        { id: 'F1', kind: 'fuse', from: 'Q', to: 'R', ratingA: 100 },
        { id: 'L1', kind: 'load', plus: 'P', minus: 'R', currentA: 10 },
      ],
    });
    expect(found(report, 'fuse-too-far')[0]!.parts).toEqual(['F1', 'B1', 'BACK']);
  });
});

/** A charger with its fuse at the battery; LEAD between them. */
function withCharger(charger: Record<string, unknown>, lead: Record<string, unknown> = {}, practice = 'iso-marine') {
  return check({
    practice,
    site: { ambientDesignDegC: 30 },
    parts: [
      battery('B1'),
      { id: 'F1', kind: 'fuse', from: 'P', to: 'Q', ratingA: 60 },
      { id: 'LEAD', kind: 'cable', from: 'Q', to: 'C', lengthM: 4, size: '16 mm2', insulationDegC: 90, ...lead },
      { id: 'C1', kind: 'charger', plus: 'C', minus: 'N', outputA: 40, setpointV: 14.2, ...charger },
    ],
  });
}

describe('charger-end-open', () => {
  test('one that limits itself needs no fuse at its own end while its cable carries what it can give', () => {
    expect(passes(withCharger({ selfLimiting: true }), 'charger-end-open')).toBe(1);
    const [thin] = found(withCharger({ selfLimiting: true }, { size: '2.5 mm2' }), 'charger-end-open');
    expect(thin).toMatchObject({ severity: 'fix', parts: ['C1', 'LEAD'], measured: { value: 40, unit: 'A' } });
  });

  test('one that gives exactly what its cable may carry passes', () => {
    const [thin] = found(withCharger({ selfLimiting: true, outputA: 1000 }), 'charger-end-open');
    const outputA = thin!.limit.value;
    expect(passes(withCharger({ selfLimiting: true, outputA }), 'charger-end-open')).toBe(1);
    expect(found(withCharger({ selfLimiting: true, outputA: outputA + 1 }), 'charger-end-open')).toHaveLength(1);
  });

  test('one that does not wants a fuse within 1.8 m (ISO 13297 12.3), exactly there is near enough', () => {
    const [open] = found(withCharger({ selfLimiting: false }), 'charger-end-open');
    expect(open).toMatchObject({
      severity: 'fix',
      limit: { value: 1.8, unit: 'm' },
      measured: { value: 4, unit: 'm' },
    });
    expect(passes(withCharger({ selfLimiting: false }, { lengthM: 1.8 }), 'charger-end-open')).toBe(1);
  });

  test('whether it limits itself is asked for where it decides', () => {
    expect(gaps(withCharger({}), 'charger-end-open')).toEqual([
      'selfLimiting of charger C1: else it wants a device at its own end',
    ]);
    expect(passes(withCharger({}, { lengthM: 1 }), 'charger-end-open')).toBe(1);
  });

  test.each([
    ['us-marine', 'from-memory'],
    ['us-land', 'published'],
    ['iec-land', 'from-memory'],
  ])('%s has a clause of its own', (practice, basisStatus) => {
    const [open] = found(withCharger({ selfLimiting: false }, { sheathed: false }, practice), 'charger-end-open');
    expect(open!.basisStatus).toBe(basisStatus);
  });

  test('US boats: 40 in sheathed throughout is near enough', () => {
    const at = (lead: Record<string, unknown>) => withCharger({ selfLimiting: false }, lead, 'us-marine');
    expect(passes(at({ lengthM: 40 * INCH, sheathed: true }), 'charger-end-open')).toBe(1);
    expect(found(at({ lengthM: 40 * INCH, sheathed: false }), 'charger-end-open')).toHaveLength(1);
    expect(gaps(at({ lengthM: 40 * INCH }), 'charger-end-open')).toEqual(['sheathed of cable LEAD']);
  });
});

describe('generator-fuse-size', () => {
  const over = (ratingA: number, charger: Record<string, unknown>, practice = 'us-marine') =>
    check({
      practice,
      parts: [
        battery('B1'),
        { id: 'F1', kind: 'fuse', from: 'P', to: 'C', ratingA },
        { id: 'C1', kind: 'charger', plus: 'C', minus: 'N', outputA: 100, setpointV: 14.2, ...charger },
      ],
    });

  test('exactly 115 % of the output passes, more is worth a look (46 CFR 28.860)', () => {
    expect(passes(over(115, { source: 'alternator' }), 'generator-fuse-size')).toBe(1);
    const [large] = found(over(125, { source: 'alternator' }), 'generator-fuse-size');
    expect(large).toMatchObject({ severity: 'look', parts: ['F1', 'C1'], measured: { value: 125, unit: 'A' } });
    expect(large!.limit.value).toBeCloseTo(115, 9);
    expect(large!.basis).toContain('46 CFR 28.860');
  });

  test('a charger of another source is not judged; one of no stated source is asked about where it decides', () => {
    const other = over(125, { source: 'shore' });
    expect([found(other, 'generator-fuse-size'), gaps(other, 'generator-fuse-size')]).toEqual([[], []]);
    expect(gaps(over(125, {}), 'generator-fuse-size')).toEqual(['source of charger C1: is it a generator?']);
  });

  test('no other book of ours has the figure', () => {
    expect(found(over(400, { source: 'alternator' }, 'iso-marine'), 'generator-fuse-size')).toEqual([]);
  });
});

/** A starter motor on its own unfused cable; `more` hangs on it or elsewhere. */
function withStarter(
  more: readonly RawPart[],
  fields: Record<string, unknown> = {},
  starter: Record<string, unknown> = {},
) {
  return check({
    practice: 'us-marine',
    parts: [
      battery('B1'),
      { id: 'CRANK', kind: 'cable', from: 'P', to: 'S', lengthM: 2, size: '2/0 AWG' },
      load('START', 'S', { cranking: true, currentA: 300, on: false, ...starter }),
      ...more,
    ],
    ...fields,
  });
}
const HOUSE_AT_STARTER = [{ id: 'F2', kind: 'fuse', from: 'S', to: 'H', ratingA: 30 }, load('HOUSE', 'H')];
const HOUSE_AT_BATTERY = [{ id: 'F2', kind: 'fuse', from: 'P', to: 'H', ratingA: 30 }, load('HOUSE', 'H')];

describe('starter-cable-shared: the cable of a starter motor', () => {
  test('may go unfused while it feeds nothing else', () => {
    const report = withStarter(HOUSE_AT_BATTERY);
    expect(found(report, 'no-fuse-on-source')).toEqual([]);
    expect(passes(report, 'no-fuse-on-source')).toBe(1);
    expect(passes(report, 'starter-cable-shared')).toBe(1);
  });

  test('shared with another load it is a thing to fix, and the string counts as unfused', () => {
    const report = withStarter(HOUSE_AT_STARTER);
    expect(found(report, 'starter-cable-shared')[0]).toMatchObject({
      severity: 'fix',
      parts: ['START', 'CRANK', 'HOUSE'],
      basisStatus: 'from-memory',
    });
    expect(found(report, 'no-fuse-on-source')[0]).toMatchObject({ severity: 'stop', parts: ['B1', 'START'] });
  });

  test('a load that is not marked as a starter motor has no such exception', () => {
    const report = withStarter(HOUSE_AT_BATTERY, {}, { cranking: undefined });
    expect(found(report, 'no-fuse-on-source')[0]!.parts).toEqual(['B1', 'START']);
  });

  test('US land lets it go up to 60 V', () => {
    const at = (blocksInSeries: number) =>
      withStarter([], {
        practice: 'us-land',
        parts: [
          battery('B1', { blocksInSeries, blockNominalV: 12, emfV: 12 * blocksInSeries }),
          { id: 'CRANK', kind: 'cable', from: 'P', to: 'S', lengthM: 2, size: '2/0 AWG' },
          load('START', 'S', { cranking: true, on: false }),
        ],
      });
    expect(passes(at(5), 'no-fuse-on-source')).toBe(1);
    expect(found(at(6), 'no-fuse-on-source')).toHaveLength(1);
  });

  test.each([
    ['us-land', 'published'],
    ['iso-marine', 'from-memory'],
    ['iec-land', 'common-practice'],
  ])('%s: shared, it rests on a clause of its own', (practice, basisStatus) => {
    expect(found(withStarter(HOUSE_AT_STARTER, { practice }), 'starter-cable-shared')[0]!.basisStatus).toBe(
      basisStatus,
    );
  });
});
