/** Conductors side by side, returns, and cables that grow thinner on their way. */
import { describe, expect, test } from 'vitest';
import { battery, check, found, gaps, passes, type RawPart } from './checksJob.ts';

const PRACTICES = ['us-land', 'us-marine', 'iso-marine', 'iec-land'] as const;

/** 16 mm² PVC, enclosed: 69 A in IEC 60364-5-52 table B.52.2 at 30 °C; 35 mm²: 111 A; 2.5 mm²: 23 A. */
const cable = (id: string, from: string, to: string, fields: Record<string, unknown> = {}): RawPart => ({
  id,
  kind: 'cable',
  from,
  to,
  lengthM: 2,
  size: '16 mm2',
  insulationDegC: 70,
  ...fields,
});
const fuse = (id: string, from: string, to: string, ratingA: number): RawPart => ({
  id,
  kind: 'fuse',
  from,
  to,
  ratingA,
});
const load = (id: string, plus: string, minus: string, currentA: number): RawPart => ({
  id,
  kind: 'load',
  plus,
  minus,
  currentA,
});
const judged = (parts: readonly RawPart[], practice = 'iec-land') =>
  check({ practice, site: { ambientDesignDegC: 30 }, parts: [battery('B1'), ...parts] });

/** P - F1 - Q = two legs = L - load - N. */
function legs(
  second: Record<string, unknown>,
  options: { ratingA?: number; currentA?: number; practice?: string } = {},
) {
  const { ratingA = 60, currentA = 10, practice = 'iec-land' } = options;
  return judged(
    [fuse('F1', 'P', 'Q', ratingA), cable('A', 'Q', 'L'), cable('B', 'L', 'Q', second), load('L1', 'L', 'N', currentA)],
    practice,
  );
}

describe('parallel-legs-unequal', () => {
  test('legs alike in all pass, whichever way round they are drawn', () => {
    expect(passes(legs({}), 'parallel-legs-unequal')).toBe(1);
  });

  test.each([
    ['lengthM', 2.1],
    ['size', '25 mm2'],
    ['insulationDegC', 90],
  ])('legs that differ in %s are a thing to fix', (field, value) => {
    const [finding] = found(legs({ [field]: value }), 'parallel-legs-unequal');
    expect(finding).toMatchObject({ severity: 'fix', parts: ['A', 'B'] });
    expect(finding!.message).toContain(`differ in ${field}`);
  });

  test('lengths within the millimetre are the same', () => {
    expect(passes(legs({ lengthM: 2.0004 }), 'parallel-legs-unequal')).toBe(1);
  });

  test('what one leg says and the other does not is asked for', () => {
    expect(gaps(legs({ metal: 'copper' }), 'parallel-legs-unequal')).toEqual(['metal of cable A: are A and B alike']);
  });

  test('US land: below 1/0 AWG nothing is paralleled, exactly 1/0 AWG may be', () => {
    const at = (size: string) =>
      judged(
        [
          fuse('F1', 'P', 'Q', 60),
          cable('A', 'Q', 'L', { size, inParallel: 2, insulationDegC: 75 }),
          load('L1', 'L', 'N', 10),
        ],
        'us-land',
      );
    expect(passes(at('1/0 AWG'), 'parallel-legs-unequal')).toBe(1);
    const [thin] = found(at('1 AWG'), 'parallel-legs-unequal');
    expect(thin).toMatchObject({ severity: 'fix', parts: ['A'] });
    expect(thin!.basis).toContain('310.10(H)');
  });

  test.each(PRACTICES)('%s has a clause of its own', (practice) => {
    const [finding] = found(legs({ lengthM: 3 }, { practice }), 'parallel-legs-unequal');
    expect(finding!.basisStatus).toBe(
      {
        'us-land': 'published',
        'iec-land': 'from-memory',
        'us-marine': 'common-practice',
        'iso-marine': 'common-practice',
      }[practice],
    );
  });
});

describe('parallel-legs-unfused', () => {
  test('while one leg carries all, or the fuse is right for one, it passes; exactly at the limit too', () => {
    expect(passes(legs({}, { currentA: 69, ratingA: 200 }), 'parallel-legs-unfused')).toBe(1);
    expect(passes(legs({}, { currentA: 80, ratingA: 69 }), 'parallel-legs-unfused')).toBe(1);
  });

  test('beyond both it is a thing to fix', () => {
    const [finding] = found(legs({}, { currentA: 80, ratingA: 100 }), 'parallel-legs-unfused');
    expect(finding).toMatchObject({ severity: 'fix', parts: ['A', 'B', 'F1'], limit: { value: 69, unit: 'A' } });
    // Two cables drawn apart: the rest carries the whole.
    expect(finding!.measured.value).toBeCloseTo(80, 6);
    expect(finding!.basisStatus).toBe('common-practice');
  });

  test('three conductors of one cable: with one open each other carries half', () => {
    const at = (currentA: number) =>
      judged([fuse('F1', 'P', 'Q', 300), cable('A', 'Q', 'L', { inParallel: 3 }), load('L1', 'L', 'N', currentA)]);
    expect(passes(at(138), 'parallel-legs-unfused')).toBe(1);
    expect(found(at(140), 'parallel-legs-unfused')[0]!.measured.value).toBeCloseTo(70, 6);
  });

  test('a leg of no stated size is asked about', () => {
    const parts = [
      fuse('F1', 'P', 'Q', 300),
      cable('A', 'Q', 'L', { inParallel: 2, size: undefined, resistanceOhm: 0.001 }),
      load('L1', 'L', 'N', 100),
    ];
    expect(gaps(judged(parts), 'parallel-legs-unfused')).toEqual(['size of cable A']);
  });
});

describe('return-smaller', () => {
  const circuit = (back: Record<string, unknown>) =>
    judged([fuse('F1', 'P', 'Q', 50), cable('OUT', 'Q', 'L'), load('L1', 'L', 'M', 10), cable('BACK', 'M', 'N', back)]);

  test('a return of the same size passes, a larger one too', () => {
    expect(passes(circuit({}), 'return-smaller')).toBe(1);
    expect(passes(circuit({ size: '25 mm2' }), 'return-smaller')).toBe(1);
  });

  test('a smaller one is a thing to fix', () => {
    expect(found(circuit({ size: '10 mm2' }), 'return-smaller')[0]).toMatchObject({
      severity: 'fix',
      parts: ['L1', 'BACK', 'OUT'],
      limit: { value: 69, unit: 'A' },
      basisStatus: 'common-practice',
    });
  });

  test('the size is asked for where it is not given', () => {
    expect(gaps(circuit({ size: undefined, resistanceOhm: 0.001 }), 'return-smaller')).toEqual(['size of cable BACK']);
  });

  /** Two circuits with leads of their own out and one cable back for both, 23 A; each runs in a case of its own. */
  const shared = (oneA: number, twoA: number) =>
    check({
      practice: 'iec-land',
      site: { ambientDesignDegC: 30 },
      parts: [
        battery('B1'),
        fuse('F1', 'P', 'Q', 20),
        load('L1', 'Q', 'M', oneA),
        fuse('F2', 'P', 'R', 20),
        load('L2', 'R', 'M', twoA),
        cable('BACK', 'M', 'N', { size: '2.5 mm2' }),
      ],
      cases: [
        { id: 'one', set: { L2: { on: false } } },
        { id: 'two', set: { L1: { on: false } } },
      ],
    });

  test('one that several share is judged by the sum of what each takes at most; exactly its ampacity passes', () => {
    const [finding] = found(shared(15, 10), 'return-smaller');
    expect(finding).toMatchObject({
      severity: 'look',
      parts: ['BACK', 'L1', 'L2'],
      measured: { value: 25, unit: 'A' },
    });
    // 15 A and 8 A: exactly what it may carry.
    expect(passes(shared(15, 8), 'return-smaller')).toBe(1);
  });
});

describe('cable-shrinks', () => {
  const run = (ratingA: number, thin: Record<string, unknown> = {}, practice = 'iec-land') =>
    judged(
      [
        fuse('F1', 'P', 'Q', ratingA),
        cable('WIDE', 'Q', 'R'),
        cable('THIN', 'R', 'L', { size: '2.5 mm2', ...thin }),
        load('L1', 'L', 'N', 10),
      ],
      practice,
    );

  test('a thinner cable with the right fuse passes, exactly at its ampacity too', () => {
    expect(passes(run(20), 'cable-shrinks')).toBe(1);
    expect(passes(run(23), 'cable-shrinks')).toBe(1);
  });

  test('one that the fuse does not protect is a thing to fix, and both cables are named', () => {
    const [finding] = found(run(50), 'cable-shrinks');
    expect(finding).toMatchObject({
      severity: 'fix',
      parts: ['THIN', 'WIDE', 'F1'],
      measured: { value: 50, unit: 'A' },
      limit: { value: 23, unit: 'A' },
    });
  });

  test('a fuse of its own where it begins settles it', () => {
    const parts = [
      fuse('F1', 'P', 'Q', 50),
      cable('WIDE', 'Q', 'R'),
      fuse('F2', 'R', 'S', 20),
      cable('THIN', 'S', 'L', { size: '2.5 mm2' }),
      load('L1', 'L', 'N', 10),
    ];
    expect(found(judged(parts), 'cable-shrinks')).toEqual([]);
  });

  test('a cable that stays as it is or grows is not judged; one of no stated size is asked about', () => {
    const same = run(50, { size: '16 mm2' });
    expect([found(same, 'cable-shrinks'), passes(same, 'cable-shrinks')]).toEqual([[], 0]);
    expect(gaps(run(50, { size: undefined, resistanceOhm: 0.001 }), 'cable-shrinks')).toEqual(['size of cable THIN']);
  });

  test.each([
    ['us-land', 'published', { size: '12 AWG' }],
    ['us-marine', 'published', { size: '12 AWG' }],
    ['iso-marine', 'from-memory', {}],
    ['iec-land', 'from-memory', {}],
  ])('%s has a clause of its own', (practice, basisStatus, thin) => {
    const wide = practice.startsWith('us') ? { size: '4 AWG', insulationDegC: 75 } : {};
    const parts = [
      fuse('F1', 'P', 'Q', 60),
      cable('WIDE', 'Q', 'R', wide),
      cable('THIN', 'R', 'L', {
        size: '2.5 mm2',
        ...thin,
        ...(practice.startsWith('us') ? { insulationDegC: 75 } : {}),
      }),
      load('L1', 'L', 'N', 10),
    ];
    expect(found(judged(parts, practice), 'cable-shrinks')[0]!.basisStatus).toBe(basisStatus);
  });
});
