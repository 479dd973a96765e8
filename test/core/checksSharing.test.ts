/** Strings side by side against their fair share of the current. */
import { describe, expect, test } from 'vitest';
import { battery, check, found, passes, type RawPart } from './checksJob.ts';

const load = (currentA: number): RawPart => ({ id: 'L1', kind: 'load', plus: 'P', minus: 'N', currentA });
const two = (first: Record<string, unknown>, second: Record<string, unknown>, currentA = 100) =>
  check({ parts: [battery('B1', first), battery('B2', second), load(currentA)] });

describe('share-uneven', () => {
  // Of two strings with the same rest volts, string k gives R_other / (R1 + R2): it is |R1 - R2| / (R1 + R2) off its half.
  test('9 against 11 mohm puts each string 10 % off its half, which is exactly at the limit and passes', () => {
    const report = two({ resistanceOhm: 0.009 }, { resistanceOhm: 0.011 });
    expect(found(report, 'share-uneven')).toEqual([]);
    expect(passes(report, 'share-uneven')).toBe(1);
  });

  test('a little more is worth a look, told once for the bank by its worst string', () => {
    const [finding, ...more] = found(two({ resistanceOhm: 0.0088 }, { resistanceOhm: 0.0112 }), 'share-uneven');
    expect(more).toEqual([]);
    expect(finding).toMatchObject({ severity: 'look', parts: ['B1', 'B2'], limit: { value: 0.1, unit: '1' } });
    expect(finding!.measured.value).toBeCloseTo(0.12, 9);
    expect(finding!.message).toContain(
      'gives 56 A of the 100 A that it and B2 give; its fair share by capacity is 50 A',
    );
  });

  test('beyond twice the limit it is to be put right, but not on resistances that are only assumed', () => {
    expect(found(two({ resistanceOhm: 0.005 }, { resistanceOhm: 0.01 }), 'share-uneven')[0]!.severity).toBe('fix');
    const guessed = { origin: { resistanceOhm: 'guess' } };
    const report = two({ resistanceOhm: 0.005, ...guessed }, { resistanceOhm: 0.01, ...guessed });
    expect(found(report, 'share-uneven')[0]!.severity).toBe('look');
  });

  test('fair is by capacity: a string twice as large with half the resistance does its part', () => {
    const report = two({ capacityAh: 200, resistanceOhm: 0.005 }, { capacityAh: 100, resistanceOhm: 0.01 });
    expect(passes(report, 'share-uneven')).toBe(1);
  });

  test('the leads count: the same two strings, one on a longer lead', () => {
    const lead = (lengthM: number): RawPart => ({
      id: 'W1',
      kind: 'cable',
      from: 'B2+',
      to: 'P',
      lengthM,
      size: '16 mm2',
    });
    const parts = (lengthM: number) => [battery('B1'), battery('B2', { plus: 'B2+' }), lead(lengthM), load(100)];
    expect(found(check({ parts: parts(3) }), 'share-uneven')).toHaveLength(1);
    expect(found(check({ parts: parts(0.1) }), 'share-uneven')).toEqual([]);
  });

  test('a bank that gives less than C/50 is not judged: rest volts outweigh all else there', () => {
    const uneven = [{ resistanceOhm: 0.005 }, { resistanceOhm: 0.01 }] as const;
    expect(found(two(...uneven, 12), 'share-uneven')).toHaveLength(1); // 600 Ah: C/50 is 12 A
    const report = two(...uneven, 11.9);
    expect(found(report, 'share-uneven')).toEqual([]);
    expect(passes(report, 'share-uneven')).toBe(0);
  });

  test('the limit is the job’s own where it sets one', () => {
    const parts = [battery('B1', { resistanceOhm: 0.0088 }), battery('B2', { resistanceOhm: 0.0112 }), load(100)];
    expect(passes(check({ parts, settings: { shareLimit: 0.15 } }), 'share-uneven')).toBe(1);
  });

  test('one string alone, or a second that is switched off, has nothing to share with', () => {
    expect(passes(check({ parts: [battery('B1'), load(100)] }), 'share-uneven')).toBe(0);
    const parts: RawPart[] = [
      battery('B1'),
      battery('B2', { plus: 'B2+', resistanceOhm: 0.01 }),
      { id: 'S1', kind: 'switch', from: 'B2+', to: 'P', state: 'open' },
      load(100),
    ];
    expect(found(check({ parts }), 'share-uneven')).toEqual([]);
  });
});
