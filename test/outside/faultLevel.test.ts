/**
 * Fault currents against published and independently computed values. T-numbers name the row of the collected lists of check
 * values: "protection" and "batteries".
 */
import { describe, expect, it } from 'vitest';
import { type DeviceFault, type FaultMethod, type FaultStudy, faultLevel, type JunctionFault } from '../../core/api.ts';
import { tables } from '../../data/index.ts';
import type { PartValue } from '../physics/jobDraft.ts';
import { checked, jobOf, stringOf } from '../physics/solveValue.ts';

function study(parts: readonly PartValue[], method: FaultMethod = 'plain'): FaultStudy {
  return faultLevel({ ...checked(jobOf(parts)), tables, method });
}
function at({ junctions }: FaultStudy, name: string): JunctionFault {
  const found = junctions.find(({ junction }) => (junction as string) === name);
  if (found === undefined) throw new Error(`no fault at ${name}`);
  return found;
}
function device({ devices }: FaultStudy, id: string): DeviceFault {
  const found = devices.find((each) => (each.device as string) === id);
  if (found === undefined) throw new Error(`no fault of ${id}`);
  return found;
}

describe('fault currents of the protection list', () => {
  it('T6: six 6 V blocks of 2400 A each, two in series, three strings side by side: 7200 A', () => {
    const string = (n: number): PartValue => ({
      id: `S${n}`,
      kind: 'string',
      plus: 'plus',
      minus: 'minus',
      chemistry: 'agm',
      blocksInSeries: 2,
      blockNominalV: 6,
      capacityAh: 200,
      shortCircuitA: 2400,
    });
    // Exact: the rated current of the blocks is that of the string, and strings side by side add.
    expect(at(study([1, 2, 3].map(string)), 'plus').highest?.firstA).toBeCloseTo(7200, 6);
  });

  /** Strings of 12.8 V behind 6 mΩ, each behind a fuse; that of the last one has the 1 mΩ of its lead. */
  const fused = (count: number): PartValue[] =>
    Array.from({ length: count }, (_, k) => k + 1).flatMap((n) => [
      stringOf(`S${n}`, { plus: `p${n}`, minus: 'minus', emfV: 12.8, resistanceOhm: 0.006 }),
      { id: `F${n}`, kind: 'fuse', from: `p${n}`, to: 'bar', ratingA: 200, resistanceOhm: n === count ? 0.001 : 0 },
    ]);

  // Printed to whole amperes.
  it.each([
    [4, 4267, 1422],
    [3, 3200, 1600],
    [2, 1829, 1829],
  ])(
    'T14: of %d strings the others send %d A back through the fuse of a shorted one, %d A each',
    (count, all, each) => {
      const back = study(fused(count));
      const last = device(back, `F${count}`);
      const backwards = last.sides.find(({ at: junction }) => (junction as string) === `p${count}`);
      expect(Math.abs(backwards!.highestA - all)).toBeLessThan(0.5);
      const atString = at(back, `p${count}`).highest!;
      const first = atString.shares.find(({ part }) => (part as string) === 'S1');
      expect(Math.abs(first!.currentA - each)).toBeLessThan(0.5);
      expect(last.fromBothSides).toBe(true);
    },
  );

  const farEnd = (more: Partial<PartValue> = {}): PartValue[] => [
    stringOf('S', { plus: 'p', minus: 'minus', emfV: 12.8, resistanceOhm: 0.006 }),
    { id: 'F', kind: 'fuse', from: 'p', to: 'fused', ratingA: 25 },
    {
      id: 'run',
      kind: 'pair',
      from: { plus: 'fused', minus: 'minus' },
      to: { plus: 'far+', minus: 'far-' },
      lengthM: 10,
      size: '2.5 mm2',
      stranding: 'stranded',
      ...more,
    },
    { id: 'lamp', kind: 'load', plus: 'far+', minus: 'far-', powerW: 20 },
  ];

  it('T21: 10 m out and back of 2.5 mm2 behind 6 mΩ: 154.2 mΩ and 83.0 A between its far ends', () => {
    const to = checked(jobOf(farEnd())).job.parts[3]! as unknown as { minus: DeviceFault['at'] };
    const far = faultLevel({ ...checked(jobOf(farEnd())), tables, method: 'plain', to: to.minus });
    const { highest } = at(far, 'far+');
    expect(Math.abs(1000 * highest!.sourceOhm - 154.2)).toBeLessThan(0.05);
    expect(Math.abs(highest!.firstA - 83)).toBeLessThan(0.05);
    // The least through the fuse is there too, with hot copper and the low side of the string: below that.
    const least = device(far, 'F');
    expect([least.lowestAt, least.lowestTo]).toEqual(['far+', 'far-']);
    expect(least.lowestA).toBeLessThan(83 / 1.15);
    expect(least.lowestA).toBeGreaterThan(83 / 1.3);
  });
});

describe('fault currents of the battery list', () => {
  const iecExample: PartValue[] = [
    {
      id: 'S',
      kind: 'string',
      plus: 'p',
      minus: 'minus',
      chemistry: 'flooded',
      blocksInSeries: 60,
      blockNominalV: 2,
      capacityAh: 500,
      resistanceOhm: 0.0186,
      linkOhm: 0.001498,
    },
    { id: 'C', kind: 'cable', from: 'p', to: 'far', lengthM: 10, resistanceOhm: 0.005 },
  ];

  it('T06, T07: the worked example of IEC 61660-1 peaks at 5422 A and settles at 4769 A', () => {
    const { highest } = at(study(iecExample, 'iec-61660'), 'far');
    expect(Math.abs(highest!.firstA - 5422)).toBeLessThan(1);
    expect(Math.abs(highest!.settledA - 4769)).toBeLessThan(1);
  });

  it('T08: seven telecom strings of 1895 A each give 13.3 kA, 26.6 kA without the parts between', () => {
    const string = (n: number): PartValue[] => [
      {
        ...stringOf(`S${n}`, { plus: `p${n}`, minus: 'minus', emfV: 48, resistanceOhm: (4 * 12) / 3800 }),
        linkOhm: 0.0045,
      },
      { id: `C${n}`, kind: 'joint', from: `p${n}`, to: `q${n}`, resistanceOhm: 0.007 },
      { id: `B${n}`, kind: 'breaker', from: `q${n}`, to: 'bar', ratingA: 200, resistanceOhm: 0.0012 },
    ];
    const whole = study([1, 2, 3, 4, 5, 6, 7].flatMap(string));
    const { highest } = at(whole, 'bar');
    expect(Math.abs(highest!.firstA / 13_300 - 1)).toBeLessThan(0.01);
    for (const { currentA } of highest!.shares) expect(Math.abs(currentA / 1895 - 1)).toBeLessThan(0.01);
    const parts = [1, 2, 3, 4, 5, 6, 7].map((n) =>
      stringOf(`S${n}`, { plus: 'bar', minus: 'minus', emfV: 48, resistanceOhm: (4 * 12) / 3800 }),
    );
    expect(at(study(parts), 'bar').highest!.firstA).toBeCloseTo(26_600, 6);
  });

  it('T27: 12.8 V behind 5 mΩ, an 8 m loop of 35 mm2 and 0.5 mΩ of contacts: 1338 A', () => {
    const cableOhm = (0.0178 * 8) / 35;
    const parts: PartValue[] = [
      stringOf('S', { plus: 'p', minus: 'minus', emfV: 12.8, resistanceOhm: 0.005 }),
      { id: 'C', kind: 'cable', from: 'p', to: 'end', lengthM: 8, resistanceOhm: cableOhm },
      { id: 'J', kind: 'joint', from: 'end', to: 'far', resistanceOhm: 0.0005 },
    ];
    expect(Math.abs(at(study(parts), 'far').highest!.firstA - 1338)).toBeLessThan(1);
  });
});
