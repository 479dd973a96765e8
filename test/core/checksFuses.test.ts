/** Fuses and breakers against the cables that they protect and the current that they carry. */
import { array, assert, nat, property, record, tuple, uniqueArray } from 'fast-check';
import { describe, expect, test } from 'vitest';
import { liveSides } from '../../core/checks/deviceSides.ts';
import { largestDevice } from '../../core/checks/fuseRules.ts';
import { ProtectedCables } from '../../core/checks/protectedCables.ts';
import type { PartId } from '../../core/job/part.ts';
import { type Device, isDevice, meetings, withoutPairs } from '../../core/network/wiring.ts';
import { tables } from '../../data/index.ts';
import { battery, check, found, gaps, jobOf, oneCircuit, passes, type RawPart } from './checksJob.ts';

const cable = (id: string, from: string, to: string, fields: Record<string, unknown> = {}): RawPart => ({
  id,
  kind: 'cable',
  from,
  to,
  lengthM: 1,
  size: '16 mm2',
  ...fields,
});
const fuse = (id: string, from: string, to: string, ratingA = 100): RawPart => ({
  id,
  kind: 'fuse',
  from,
  to,
  ratingA,
});
const load = (id: string, plus: string, minus: string): RawPart => ({ id, kind: 'load', plus, minus, currentA: 1 });

/** Ids of the cables that a fuse protects. */
function protectedBy(id: string, parts: readonly RawPart[]): readonly string[] {
  const drawn = withoutPairs(jobOf({ parts }).parts);
  const device = drawn.find((part): part is Device => part.id === id && isDevice(part))!;
  return new ProtectedCables(drawn, meetings(drawn)).of(device).map((part) => part.id);
}

describe('which cables a fuse protects', () => {
  test('in one circuit: all of it, the lead from the battery and the return included', () => {
    const parts = [
      battery('B1'),
      cable('LEAD', 'P', 'A'),
      fuse('F1', 'A', 'B'),
      cable('OUT', 'B', 'L'),
      load('L1', 'L', 'M'),
      cable('BACK', 'M', 'N'),
    ];
    expect(protectedBy('F1', parts)).toEqual(['LEAD', 'OUT', 'BACK']);
  });

  test('the way the fuse is drawn round makes no difference', () => {
    const parts = [
      battery('B1'),
      fuse('F1', 'B', 'P'),
      cable('OUT', 'B', 'L'),
      load('L1', 'L', 'M'),
      cable('BACK', 'M', 'N'),
    ];
    expect(protectedBy('F1', parts)).toEqual(['OUT', 'BACK']);
  });

  test('downstream through every branch, up to the next fuse and not beyond', () => {
    const parts = [
      battery('B1'),
      fuse('MAIN', 'P', 'A'),
      cable('FEED', 'A', 'BAR'),
      cable('STUB', 'BAR', 'C'),
      fuse('F2', 'C', 'D'),
      cable('BRANCH', 'D', 'L'),
      load('L1', 'L', 'N'),
      cable('THIN', 'BAR', 'E'),
      load('L2', 'E', 'N'),
    ];
    expect(protectedBy('MAIN', parts)).toEqual(['FEED', 'STUB', 'THIN']);
    // F2 guards what is behind it, and the stub that carries its current alone.
    expect(protectedBy('F2', parts)).toEqual(['STUB', 'BRANCH']);
  });

  test('a fuse beside a busbar does not protect the other branches of the bar', () => {
    const bar = { id: 'BAR', kind: 'busbar', junctions: ['A', 'C', 'E'] };
    const parts = [
      battery('B1'),
      cable('FEED', 'P', 'A'),
      bar,
      fuse('F1', 'C', 'D'),
      cable('ONE', 'D', 'L'),
      load('L1', 'L', 'N'),
      fuse('F2', 'E', 'G'),
      cable('TWO', 'G', 'K'),
      load('L2', 'K', 'N'),
    ];
    expect(protectedBy('F1', parts)).toEqual(['ONE']);
    expect(protectedBy('F2', parts)).toEqual(['TWO']);
  });

  test('where two strings feed a bar through a fuse each, each fuse guards its own lead; the main fuse guards the feed to it', () => {
    const parts = [
      battery('B1', { plus: 'P1' }),
      cable('LEAD1', 'P1', 'A1'),
      fuse('F1', 'A1', 'BAR'),
      battery('B2', { plus: 'P2' }),
      cable('LEAD2', 'P2', 'A2'),
      fuse('F2', 'A2', 'BAR'),
      cable('FEED', 'BAR', 'C'),
      fuse('MAIN', 'C', 'D'),
      cable('OUT', 'D', 'L'),
      load('L1', 'L', 'N'),
    ];
    expect(protectedBy('F1', parts)).toEqual(['LEAD1']);
    expect(protectedBy('F2', parts)).toEqual(['LEAD2']);
    expect(protectedBy('MAIN', parts)).toEqual(['FEED', 'OUT']);
  });

  test('switches, shunts and joints in the way are passed, open switches too, since they may be closed', () => {
    const parts = [
      battery('B1'),
      fuse('F1', 'P', 'A'),
      { id: 'SW', kind: 'switch', from: 'A', to: 'B', state: 'open' },
      cable('OUT', 'B', 'C'),
      { id: 'SH', kind: 'shunt', from: 'C', to: 'D', ratingA: 100, ratingMv: 50 },
      cable('ON', 'D', 'L'),
      load('L1', 'L', 'N'),
    ];
    expect(protectedBy('F1', parts)).toEqual(['OUT', 'ON']);
  });

  test('a fuse in the minus lead guards the return of what it serves', () => {
    const parts = [
      battery('B1'),
      cable('OUT', 'P', 'L'),
      load('L1', 'L', 'M'),
      cable('BACK', 'M', 'A'),
      fuse('F1', 'A', 'N'),
    ];
    expect(protectedBy('F1', parts)).toEqual(['BACK', 'OUT']);
  });

  test('behind a converter the fuse guards its own branch, not the stub of its neighbour', () => {
    const parts = [
      battery('B1'),
      {
        id: 'DC1',
        kind: 'converter',
        from: { plus: 'P', minus: 'N' },
        to: { plus: 'V', minus: 'W' },
        outputV: 5,
        outputA: 20,
      },
      cable('FEED', 'V', 'BAR'),
      cable('S1', 'BAR', 'A'),
      fuse('F1', 'A', 'B', 10),
      cable('ONE', 'B', 'L'),
      load('L1', 'L', 'W'),
      cable('S2', 'BAR', 'C'),
      fuse('F2', 'C', 'D', 2),
      cable('TWO', 'D', 'K'),
      load('L2', 'K', 'W'),
    ];
    expect(protectedBy('F1', parts)).toEqual(['S1', 'ONE']);
    expect(protectedBy('F2', parts)).toEqual(['S2', 'TWO']);
  });
});

describe('the largest device over a cable', () => {
  const largest = (practice: keyof typeof tables.practices, ampacityA: number, nominalV: number | undefined) => {
    const answer = largestDevice({ ampacityA, nominalV }, { practice: tables.practices[practice], tables });
    return 'missing' in answer ? answer.missing : answer.ratingA;
  };

  test('US land: the ampacity, or the next standard size above it up to 800 A', () => {
    expect(largest('us-land', 55, 12)).toBe(60);
    expect(largest('us-land', 200, 12)).toBe(200);
    expect(largest('us-land', 775, 12)).toBe(800);
    expect(largest('us-land', 820, 12)).toBe(820); // the next standard size would be 1000 A
  });

  test('US boats: 150 % below 50 V; from 50 V the next standard size, never above 150 %', () => {
    expect(largest('us-marine', 60, 12)).toBe(90);
    expect(largest('us-marine', 60, 48)).toBe(90);
    expect(largest('us-marine', 55, 51.2)).toBe(60);
    expect(largest('us-marine', 60, 50)).toBe(60);
    expect(largest('us-marine', 0.6, 60)).toBe(0.6); // 1 A would be more than 150 %
    expect(largest('us-marine', 60, undefined)).toMatch(/nominalV/);
  });

  test('small craft elsewhere and land elsewhere: the ampacity and no more', () => {
    expect(largest('iso-marine', 55, undefined)).toBe(55);
    expect(largest('iec-land', 55, undefined)).toBe(55);
  });
});

describe('fuse-over-cable', () => {
  /** 16 mm² PVC, enclosed: 69 A in IEC 60364-5-52 table B.52.2 at 30 °C. */
  const over = (ratingA: number, fields: Parameters<typeof oneCircuit>[0] = {}) =>
    check(
      oneCircuit({
        fuse: { ratingA },
        cable: { size: '16 mm2', insulationDegC: 70 },
        load: { currentA: 10 },
        ...fields,
      }),
    );

  test('a fuse of exactly the ampacity protects the cable', () => {
    const report = over(69);
    expect(found(report, 'fuse-over-cable')).toEqual([]);
    expect(passes(report, 'fuse-over-cable')).toBe(1);
  });

  test('a fuse above the ampacity is a thing to fix, above 150 % of it a stop', () => {
    const [finding] = found(over(80), 'fuse-over-cable');
    expect(finding).toMatchObject({
      severity: 'fix',
      parts: ['F1', 'OUT'],
      measured: { value: 80, unit: 'A' },
      limit: { value: 69, unit: 'A' },
    });
    expect(finding!.message).toContain('does not protect cable OUT (16 mm²)');
    expect(finding!.basis).toContain('IEC 60364-4-43');
    expect(found(over(103.5), 'fuse-over-cable')[0]!.severity).toBe('fix');
    expect(found(over(104), 'fuse-over-cable')[0]!.severity).toBe('stop');
  });

  test('the thinnest cable of all that it protects is named', () => {
    const more = [
      { id: 'TAP', kind: 'cable', from: 'L', to: 'T', lengthM: 1, size: '2.5 mm2', insulationDegC: 70 },
      { id: 'L2', kind: 'load', plus: 'T', minus: 'M', currentA: 1 },
    ];
    const [finding] = found(over(63, { more }), 'fuse-over-cable');
    // 23 A for 2.5 mm² in the same column.
    expect(finding).toMatchObject({ severity: 'stop', parts: ['F1', 'TAP'], limit: { value: 23, unit: 'A' } });
  });

  test('the warmest case decides the ampacity', () => {
    const cases = [
      { id: 'mild', ambientDegC: 30 },
      { id: 'hot', ambientDegC: 50 },
    ];
    const [finding] = found(over(69, { cases }), 'fuse-over-cable');
    expect(finding!.case).toBe('hot');
    // Table B.52.14, PVC at 50 °C: 0.71.
    expect(finding!.limit.value).toBeCloseTo(69 * 0.71, 9);
  });

  test('a breaker is judged like a fuse', () => {
    expect(found(over(80, { fuse: { kind: 'breaker', ratingA: 80 } }), 'fuse-over-cable')).toHaveLength(1);
  });

  test('one cable without a size leaves the fuse unjudged, unless another cable already fails it', () => {
    const report = over(50, { cable: { size: undefined } });
    expect(gaps(report, 'fuse-over-cable')).toEqual(['size of cable OUT', 'size of cable BACK']);
    expect(passes(report, 'fuse-over-cable')).toBe(0);
  });

  test('a job that names no practice is not judged by any', () => {
    const report = over(500, { practice: undefined });
    expect(found(report, 'fuse-over-cable')).toEqual([]);
    expect(gaps(report, 'fuse-over-cable')).toEqual(['practice of the job: which rule book judges it']);
  });
});

describe('small-wire-cap', () => {
  const capped = (size: string, ratingA: number, fields: Parameters<typeof oneCircuit>[0] = {}) =>
    check(
      oneCircuit({
        practice: 'us-land',
        fuse: { ratingA },
        cable: { size, insulationDegC: 90 },
        load: { currentA: 1 },
        ...fields,
      }),
    );

  test.each([
    ['18 AWG', 7],
    ['16 AWG', 10],
    ['14 AWG', 15],
    ['12 AWG', 20],
    ['10 AWG', 30],
  ])('copper %s may have exactly %d A and no more', (size, capA) => {
    expect(passes(capped(size, capA), 'small-wire-cap')).toBe(1);
    expect(found(capped(size, capA + 1), 'small-wire-cap')[0]).toMatchObject({
      severity: 'fix',
      limit: { value: capA, unit: 'A' },
      basisStatus: 'published',
    });
  });

  test('aluminium has caps of its own', () => {
    expect(
      found(capped('12 AWG', 20, { cable: { size: '12 AWG', metal: 'aluminium' } }), 'small-wire-cap')[0]!.limit.value,
    ).toBe(15);
  });

  test('thicker wires and other practices have no cap', () => {
    expect(passes(capped('8 AWG', 50), 'small-wire-cap')).toBe(0);
    expect(found(capped('8 AWG', 50), 'small-wire-cap')).toEqual([]);
    expect(found(capped('10 AWG', 60, { practice: 'us-marine' }), 'small-wire-cap')).toEqual([]);
  });
});

describe('fuse-under-current and fuse-under-continuous', () => {
  const fused = (ratingA: number, fields: Record<string, unknown>) =>
    check(oneCircuit({ fuse: { ratingA }, load: fields }));

  test('a fuse of exactly its running current carries it', () => {
    expect(passes(fused(100, { currentA: 100, continuous: false }), 'fuse-under-current')).toBe(1);
  });

  test('a fuse below its running current will open in use', () => {
    const report = fused(100, { currentA: 101, continuous: false });
    const [finding] = found(report, 'fuse-under-current');
    expect(finding).toMatchObject({ severity: 'fix', parts: ['F1'], limit: { value: 100, unit: 'A' } });
    expect(finding!.message).toContain('will open in use');
    // Told once: the margin is then not the question.
    expect(found(report, 'fuse-under-continuous')).toEqual([]);
    expect(passes(report, 'fuse-under-continuous')).toBe(0);
  });

  test('80 A for hours need exactly 100 A', () => {
    expect(passes(fused(100, { currentA: 80, continuous: true }), 'fuse-under-continuous')).toBe(1);
    const [finding] = found(fused(100, { currentA: 81, continuous: true }), 'fuse-under-continuous');
    expect(finding!.measured.value).toBeCloseTo(101.25, 9);
    expect(finding).toMatchObject({
      severity: 'fix',
      limit: { value: 100, unit: 'A' },
      basisStatus: 'common-practice',
    });
  });

  test('an open fuse carries nothing, which is no pass', () => {
    const report = check(oneCircuit({ fuse: { ratingA: 100, state: 'open' } }));
    expect(passes(report, 'fuse-under-current')).toBe(0);
    expect(passes(report, 'fuse-under-continuous')).toBe(0);
    expect(found(report, 'part-never-used').map(({ parts }) => parts[0])).toEqual(['F1']);
  });

  test('a current that the network does not determine is not checked', () => {
    const twin = { id: 'F2', kind: 'fuse', from: 'P', to: 'Q', ratingA: 200 };
    const report = check(oneCircuit({ more: [twin] }));
    expect(gaps(report, 'fuse-under-current')[0]).toMatch(/current in fuse F1 .*side by side/);
  });
});

describe('which sides of a device the sources still reach once it is open', () => {
  interface Drawn {
    readonly edges: readonly (readonly [number, number])[];
    readonly sources: readonly number[];
  }
  const drawings = record({
    edges: array(tuple(nat({ max: 7 }), nat({ max: 7 })), { minLength: 1, maxLength: 12 }),
    sources: uniqueArray(nat({ max: 7 }), { maxLength: 3 }),
  });

  /** The plain way: open the one device and follow the others. */
  function reached({ edges, sources }: Drawn, without: number, start: number): boolean {
    const seen = new Set([start]);
    for (const net of seen) {
      edges.forEach(([a, b], index) => {
        if (index === without) return;
        if (a === net) seen.add(b);
        if (b === net) seen.add(a);
      });
    }
    return sources.some((net) => seen.has(net));
  }

  test('one walk over all devices agrees with opening each in turn, on any drawing with rings and devices side by side', () => {
    assert(
      property(drawings, (drawn) => {
        const edges = drawn.edges.map(([from, to], index) => ({ id: `F${index}` as PartId, from, to }));
        const sides = liveSides(edges, (net) => drawn.sources.includes(net));
        edges.forEach(({ id, from, to }, index) => {
          expect(sides.get(id)).toEqual({ from: reached(drawn, index, from), to: reached(drawn, index, to) });
        });
      }),
      { seed: 20_250_101, numRuns: 2000 },
    );
  });
});
