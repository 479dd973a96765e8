/** Cables against the current that they carry. */
import { describe, expect, test } from 'vitest';
import { check, found, gaps, oneCircuit, passes } from './checksJob.ts';

/** 3/0 AWG with 75 °C insulation and terminals: 200 A in NEC table 310.16 at 30 °C. */
const CABLE_200A = { size: '3/0 AWG', insulationDegC: 75 };

function withCurrent(currentA: number, fields: Parameters<typeof oneCircuit>[0] = {}) {
  return check(
    oneCircuit({
      practice: 'us-land',
      cable: CABLE_200A,
      load: { currentA, continuous: false },
      fuse: { ratingA: 400 },
      ...fields,
    }),
  );
}

describe('cable-overloaded', () => {
  test('a cable that carries exactly its ampacity passes', () => {
    const report = withCurrent(200);
    expect(found(report, 'cable-overloaded')).toEqual([]);
    expect(passes(report, 'cable-overloaded')).toBe(2);
  });

  test('a little more than the ampacity is a thing to fix, in both conductors', () => {
    const findings = found(withCurrent(201), 'cable-overloaded');
    expect(findings.map(({ parts }) => parts)).toEqual([['OUT'], ['BACK']]);
    expect(findings[0]).toMatchObject({
      severity: 'fix',
      case: 'as-drawn',
      limit: { value: 200, unit: 'A' },
      basisStatus: 'published',
    });
    expect(findings[0]!.measured.value).toBeCloseTo(201, 9); // the load is a set current
    expect(findings[0]!.message).toContain('201 A');
    expect(findings[0]!.basis).toContain('310.16');
  });

  test('exactly at the stop factor it is still a thing to fix, above it the system must not be energised', () => {
    expect(found(withCurrent(240), 'cable-overloaded')[0]!.severity).toBe('fix');
    expect(found(withCurrent(241), 'cable-overloaded')[0]!.severity).toBe('stop');
    const settings = { cableStopFactor: 1.5 };
    expect(found(withCurrent(241, { settings }), 'cable-overloaded')[0]!.severity).toBe('fix');
  });

  test('hot air lowers the ampacity, and the finding says by how much', () => {
    const [finding] = found(withCurrent(190, { site: { ambientDesignDegC: 45 } }), 'cable-overloaded');
    // NEC correction for 75 °C insulation at 41 to 45 °C: 0.82, so 200 A becomes 164 A.
    expect(finding!.limit.value).toBeCloseTo(164, 9);
    expect(finding!.message).toMatch(/0\.820 for ambient 45/);
  });

  test('of several cases only the worst is told, with its name', () => {
    const cases = [
      { id: 'evening', set: { L1: { currentA: 210 } } },
      { id: 'party', set: { L1: { currentA: 230 } } },
      { id: 'night', set: { L1: { currentA: 20 } } },
    ];
    const findings = found(withCurrent(20, { cases }), 'cable-overloaded');
    expect(findings.map((finding) => [finding.parts[0], finding.case])).toEqual([
      ['OUT', 'party'],
      ['BACK', 'party'],
    ]);
  });

  test('a cable of no stated size is not checked, and the missing field is named', () => {
    const report = withCurrent(10, { cable: { size: undefined } });
    expect(gaps(report, 'cable-overloaded')).toEqual(['size of cable OUT', 'size of cable BACK']);
    expect(passes(report, 'cable-overloaded')).toBe(0);
  });

  test('a cable that its table does not hold is not checked', () => {
    const report = withCurrent(1, { practice: 'iec-land', cable: { size: '70 mm2', metal: 'aluminium' } });
    expect(gaps(report, 'cable-overloaded')[0]).toContain('aluminium');
    expect(passes(report, 'cable-overloaded')).toBe(0);
  });

  test('a starting load is not what warms a cable: such a case is not judged, and the rule says that it was not done', () => {
    const cases = [{ id: 'start', surge: 'L1' }];
    const report = withCurrent(10, { cases, load: { powerW: 100, surgeW: 4000 } });
    expect(found(report, 'cable-overloaded')).toEqual([]);
    expect(gaps(report, 'cable-overloaded')).toEqual(['a case without a starting load']);
    expect(passes(report, 'cable-overloaded')).toBe(0);
  });

  test('an out-and-back run is judged as its two conductors', () => {
    const parts = [
      {
        id: 'B1',
        kind: 'string',
        plus: 'P',
        minus: 'N',
        chemistry: 'lfp',
        blocksInSeries: 1,
        blockNominalV: 12.8,
        capacityAh: 300,
      },
      {
        id: 'RUN',
        kind: 'pair',
        from: { plus: 'P', minus: 'N' },
        to: { plus: 'L', minus: 'M' },
        lengthM: 2,
        size: '3/0 AWG',
        minusSize: '2/0 AWG',
        insulationDegC: 75,
      },
      { id: 'L1', kind: 'load', plus: 'L', minus: 'M', currentA: 190 },
    ];
    const report = check({ practice: 'us-land', site: { ambientDesignDegC: 30 }, parts });
    // 2/0 AWG: 175 A in the 75 °C column.
    expect(found(report, 'cable-overloaded').map(({ parts, limit }) => [...parts, limit.value])).toEqual([
      ['RUN.minus', 175],
    ]);
    expect(passes(report, 'cable-overloaded')).toBe(1);
  });
});

describe('cable-under-continuous', () => {
  const lasting = (currentA: number, more = {}) =>
    withCurrent(currentA, { load: { currentA, continuous: true }, ...more });

  test('160 A for hours need exactly the 200 A of the table', () => {
    const report = lasting(160);
    expect(found(report, 'cable-under-continuous')).toEqual([]);
    expect(passes(report, 'cable-under-continuous')).toBe(2);
  });

  test('161 A for hours need more than the table gives, and the building code says so', () => {
    const [finding] = found(lasting(161), 'cable-under-continuous');
    expect(finding).toMatchObject({ severity: 'fix', limit: { value: 200, unit: 'A' }, basisStatus: 'published' });
    expect(finding!.measured.value).toBeCloseTo(201.25, 9);
    expect(finding!.basis).toContain('690.8, numbering of 2023, (B)');
  });

  test('a load that runs briefly needs no margin', () => {
    const report = withCurrent(190);
    expect(found(report, 'cable-under-continuous')).toEqual([]);
    expect(passes(report, 'cable-under-continuous')).toBe(2);
  });

  test('where only trade practice asks for the margin a person judges', () => {
    // 16 mm² PVC, enclosed: 69 A in IEC 60364-5-52 table B.52.2.
    const more = { practice: 'iec-land', cable: { size: '16 mm2', insulationDegC: 70 } };
    const [finding] = found(lasting(60, more), 'cable-under-continuous');
    expect(finding).toMatchObject({ severity: 'look', basisStatus: 'common-practice' });
  });

  test('a load that does not say how long it runs matters only where it decides', () => {
    const unmarked = (currentA: number) => withCurrent(currentA, { load: { currentA } });
    expect(passes(unmarked(150), 'cable-under-continuous')).toBe(2);
    const report = unmarked(180);
    expect(found(report, 'cable-under-continuous')).toEqual([]);
    expect(gaps(report, 'cable-under-continuous')[0]).toMatch(/^continuous of load L1/);
    expect(passes(report, 'cable-under-continuous')).toBe(0);
  });

  test('a cable that is overloaded outright is told once, by the other rule', () => {
    const report = lasting(210);
    expect(found(report, 'cable-overloaded')).toHaveLength(2);
    expect(found(report, 'cable-under-continuous')).toEqual([]);
    expect(passes(report, 'cable-under-continuous')).toBe(0);
  });

  test('the factor may be set in the job', () => {
    expect(passes(lasting(161, { settings: { continuousFactor: 1.2 } }), 'cable-under-continuous')).toBe(2);
  });

  test('correction for hot air does not count twice: the margin is asked of the uncorrected figure', () => {
    const report = lasting(160, { site: { ambientDesignDegC: 45 } });
    expect(found(report, 'cable-overloaded')).toEqual([]); // 164 A after correction
    expect(passes(report, 'cable-under-continuous')).toBe(2);
  });
});
