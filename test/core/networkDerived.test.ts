import { describe, expect, test } from 'vitest';
import { caseById } from '../../core/job/job.ts';
import { parseJob } from '../../core/job/parseJob.ts';
import type { JunctionId, PartId } from '../../core/job/part.ts';
import { solveCircuit } from '../../core/network/operatingPoint.ts';
import type { Target } from '../../core/network/sensitivity.ts';
import { sensitivities } from '../../core/network/sensitivity.ts';
import { theveninAt } from '../../core/network/thevenin.ts';
import { whatIf } from '../../core/network/whatIf.ts';
import { tables } from '../../data/index.ts';

type RawPart = Record<string, unknown> & { id: string };

function solve(parts: readonly RawPart[]) {
  const file = { format: 'ohmwright-job', version: 1, title: 'derived', practice: 'iec-land', parts };
  const parsed = parseJob(JSON.stringify(file));
  if (!parsed.ok) throw new Error(JSON.stringify(parsed.issues));
  const operatingCase = caseById(parsed.value, 'as-drawn')!;
  return solveCircuit({ job: parsed.value, operatingCase, tables, model: 'slow' });
}

const battery = (id: string, plus: string, minus: string, emfV: number, resistanceOhm: number): RawPart => ({
  id,
  kind: 'string',
  plus,
  minus,
  chemistry: 'agm',
  blocksInSeries: 1,
  blockNominalV: 12,
  capacityAh: 100,
  emfV,
  resistanceOhm,
});
const cable = (id: string, from: string, to: string, resistanceOhm: number): RawPart => ({
  id,
  kind: 'cable',
  from,
  to,
  lengthM: 1,
  resistanceOhm,
});

/** Two unlike strings on a common bar, a fuse without resistance, a constant-power inverter at the end of a cable. */
const twoStrings: RawPart[] = [
  battery('A', 'a', 'n', 12.8, 0.008),
  battery('B', 'b', 'n', 12.7, 0.011),
  cable('LA', 'a', 'bar', 0.001),
  cable('LB', 'b', 'bar', 0.003),
  { id: 'F1', kind: 'fuse', from: 'bar', to: 'x', ratingA: 200 },
  { id: 'S1', kind: 'switch', from: 'x', to: 'x2' },
  cable('C1', 'x2', 'y', 0.002),
  cable('C2', 'n', 'z', 0.0021),
  { id: 'INV', kind: 'inverter', plus: 'y', minus: 'z', ratedW: 2000, acPowerW: 900, efficiency: 0.9 },
  { id: 'L2', kind: 'load', plus: 'bar', minus: 'n', currentA: 7 },
];

/** A converter whose input and output share the minus cable, so that each side feels the other. */
const coupled: RawPart[] = [
  battery('A', 'a', 'n', 25.4, 0.02),
  cable('C1', 'a', 'ip', 0.03),
  cable('C2', 'n', 'im', 0.04),
  {
    id: 'DC',
    kind: 'converter',
    from: { plus: 'ip', minus: 'im' },
    to: { plus: 'op', minus: 'im' },
    outputV: 12.5,
    outputA: 30,
    efficiency: 0.88,
    standbyW: 2,
  },
  cable('C3', 'op', 'lp', 0.02),
  { id: 'LR', kind: 'load', plus: 'lp', minus: 'n', resistanceOhm: 2 },
  { id: 'LI', kind: 'load', plus: 'ip', minus: 'n', currentA: 3 },
];
const limitedCoupled = coupled.map((part) => (part.id === 'DC' ? { ...part, outputA: 4 } : part));

const fields = ['resistanceOhm', 'emfV', 'currentA'] as const;

/** Central difference of the answer when one field of one part moves by a millionth of itself. */
function byDifference(parts: RawPart[], id: string, field: string, target: Target): number {
  const base = parts.find((part) => part.id === id)![field] as number;
  const step = base * 1e-5;
  const answerAt = (value: number) => {
    const solved = solve(parts.map((part) => (part.id === id ? { ...part, [field]: value } : part)));
    return read(solved, target);
  };
  return (answerAt(base + step) - answerAt(base - step)) / (2 * step);
}

function read({ point }: ReturnType<typeof solve>, target: Target): number {
  if (target.kind === 'current') return point.parts.get(target.part)!.currentA!;
  return point.junctions.get(target.plus)! - point.junctions.get(target.minus)!;
}

const volts = (plus: string, minus: string): Target => ({
  kind: 'voltage',
  plus: plus as JunctionId,
  minus: minus as JunctionId,
});
const amps = (part: string): Target => ({ kind: 'current', part: part as PartId });

describe('sensitivities by the adjoint equal what small changes of the job do', () => {
  const cases: [string, RawPart[], Target][] = [
    ['volts at the inverter', twoStrings, volts('y', 'z')],
    ['current of a string', twoStrings, amps('B')],
    ['current through a fuse of zero ohms', twoStrings, amps('F1')],
    ['volts beyond a converter', coupled, volts('lp', 'n')],
    ['current into a converter', coupled, amps('C1')],
    ['output current of a converter', coupled, amps('DC')],
    ['volts beyond a converter at its current limit', limitedCoupled, volts('lp', 'n')],
    ['current into a converter at its current limit', limitedCoupled, amps('C1')],
  ];
  test.each(cases)('%s', (_, parts, target) => {
    const solved = solve(parts);
    const found = sensitivities(solved, target)!;
    let compared = 0;
    for (const part of parts) {
      for (const field of fields) {
        if (typeof part[field] !== 'number') continue;
        const adjoint = found.find((s) => s.part === part.id && s.quantity === field)!.perUnit;
        const difference = byDifference(parts, part.id, field, target);
        // Central differences of step 1e-5: truncation about 1e-9, rounding about 1e-9 of the answer over the step.
        const scale = Math.max(Math.abs(adjoint), (1e-4 * Math.abs(read(solved, target))) / part[field]);
        expect(Math.abs(adjoint - difference), `${part.id}.${field}`).toBeLessThan(1e-4 * scale);
        compared++;
      }
    }
    expect(compared).toBeGreaterThan(4);
  });

  test('a zero-ohm fuse counts as what its first milliohm would do', () => {
    const solved = solve(twoStrings);
    const target = volts('y', 'z');
    const adjoint = sensitivities(solved, target)!.find((s) => s.part === 'F1')!.perUnit;
    const small = 1e-7;
    const worse = twoStrings.map((part) => (part.id === 'F1' ? { ...part, resistanceOhm: small } : part));
    const difference = (read(solve(worse), target) - read(solved, target)) / small;
    expect(Math.abs(adjoint / difference - 1)).toBeLessThan(1e-4); // a one-sided difference
  });
});

describe('a Thévenin source', () => {
  test('of two strings is their parallel resistance and the volts on the bar', () => {
    const solved = solve(twoStrings.slice(0, 4));
    const seen = theveninAt(solved, { plus: 'bar' as JunctionId, minus: 'n' as JunctionId })!;
    // 9 mohm beside 14 mohm: 126/23 = 5.478 mohm; EMF by conductance: (12.8/9 + 12.7/14) / (1/9 + 1/14).
    expect(seen.resistanceOhm).toBeCloseTo(0.126 / 23, 12);
    expect(seen.openV).toBeCloseTo((12.8 / 9 + 12.7 / 14) / (1 / 9 + 1 / 14), 10);
  });

  test('predicts the volts under a small added load', () => {
    const solved = solve(coupled);
    const seen = theveninAt(solved, { plus: 'lp' as JunctionId, minus: 'n' as JunctionId })!;
    const added = 1e-4;
    const more = solve([...coupled, { id: 'X', kind: 'load', plus: 'lp', minus: 'n', currentA: added }]);
    const fall = seen.openV - more.point.junctions.get('lp' as JunctionId)!;
    expect(Math.abs(fall / added / seen.resistanceOhm - 1)).toBeLessThan(1e-5); // first order in a 0.1 mA step
  });
});

describe('a what-if by low-rank update gives what a new solve gives', () => {
  const changed = (parts: RawPart[], id: string, resistanceOhm: number) =>
    parts.map((part) => (part.id === id ? { ...part, resistanceOhm } : part));
  const cases: [string, RawPart[], string, number][] = [
    ['a worn cable beside a constant-power load', twoStrings, 'C1', 0.009],
    ['a sick string', twoStrings, 'B', 0.05],
    ['a better lead', twoStrings, 'LB', 0.0002],
    ['a bad return before a converter', coupled, 'C2', 0.09],
  ];
  test.each(cases)('%s', (_, parts, id, resistanceOhm) => {
    const solved = solve(parts);
    const before = [...solved.point.junctions];
    const quick = whatIf(solved, [{ part: id as PartId, resistanceOhm }])!;
    const anew = solve(changed(parts, id, resistanceOhm)).point;
    for (const [junction, volts] of anew.junctions) {
      expect(Math.abs(quick.volts.get(junction)! - volts!), junction).toBeLessThan(1e-10); // rounding of 12 V over 1e-4 S
    }
    for (const [part, amps] of quick.currentA) {
      expect(Math.abs(amps - anew.parts.get(part)!.currentA!), part).toBeLessThan(1e-7); // the same volts over some 0.2 mohm
    }
    // The solved circuit is as it was.
    const again = whatIf(solved, [])!;
    for (const [junction, volts] of before) expect(again.volts.get(junction)).toBeCloseTo(volts!, 11);
  });

  test('an opened lead', () => {
    const solved = solve(twoStrings);
    const quick = whatIf(solved, [{ part: 'LB' as PartId, resistanceOhm: 'open' }])!;
    expect(Math.abs(quick.currentA.get('B' as PartId)!)).toBeLessThan(1e-9);
    expect(quick.volts.get('b' as JunctionId)).toBeCloseTo(12.7, 9); // the string at rest
  });

  test('two changes at once, and none where a charger would change its state', () => {
    const solved = solve(twoStrings);
    const both = whatIf(solved, [
      { part: 'C1' as PartId, resistanceOhm: 0.004 },
      { part: 'A' as PartId, resistanceOhm: 0.02 },
    ])!;
    const anew = solve(changed(changed(twoStrings, 'C1', 0.004), 'A', 0.02)).point;
    expect(both.volts.get('y' as JunctionId)).toBeCloseTo(anew.junctions.get('y' as JunctionId)!, 10);
    const held: RawPart[] = [
      battery('A', 'a', 'n', 13.5, 0.1),
      cable('C', 'a', 'p', 0.05),
      { id: 'CH', kind: 'charger', plus: 'p', minus: 'n', outputA: 10, setpointV: 14.4 },
    ];
    // 0.9 V over 0.15 ohm is 6 A, within the charger's 10 A; over 0.06 ohm it would be 15 A.
    expect(whatIf(solve(held), [{ part: 'A' as PartId, resistanceOhm: 0.01 }])).toBeNull();
    expect(
      whatIf(solve(held), [{ part: 'A' as PartId, resistanceOhm: 0.2 }])!.currentA.get('CH' as PartId),
    ).toBeCloseTo(3.6, 9);
  });
});
