import { describe, expect, test } from 'vitest';
import { caseById, operatingPoint, parseJob } from '../../core/api.ts';
import { tables } from '../../data/index.ts';

function solve(parts: readonly object[]) {
  const file = { format: 'ohmwright-job', version: 1, title: 'collapse', practice: 'iec-land', parts };
  const parsed = parseJob(JSON.stringify(file));
  if (!parsed.ok) throw new Error(JSON.stringify(parsed.issues));
  const job = parsed.value;
  return operatingPoint({ job, operatingCase: caseById(job, 'as-drawn')!, tables, model: 'slow' });
}
const battery = (emfV: number, resistanceOhm: number) => ({
  id: 'S',
  kind: 'string',
  plus: 'p',
  minus: 'n',
  chemistry: 'agm',
  blocksInSeries: 1,
  blockNominalV: 12,
  capacityAh: 100,
  emfV,
  resistanceOhm,
});

describe('a network that cannot deliver', () => {
  test('a constant power just below E squared over 4 R is served at just over half of E', () => {
    // E = 12.6 V, R = 0.1 ohm: E^2/4R = 396.9 W at 6.3 V. 390 W: V = (12.6 + sqrt(158.76 - 156)) / 2 = 7.1307 V.
    const point = solve([battery(12.6, 0.1), { id: 'L', kind: 'load', plus: 'p', minus: 'n', powerW: 390 }]);
    expect(point.outcome).toBe('solved');
    expect(point.parts.get('L' as never)!.voltageV).toBeCloseTo((12.6 + Math.sqrt(12.6 ** 2 - 4 * 390 * 0.1)) / 2, 10);
  });

  test('just above it there is no answer, and the load and the most it could have are named', () => {
    const point = solve([battery(12.6, 0.1), { id: 'L', kind: 'load', plus: 'p', minus: 'n', powerW: 398 }]);
    expect(point.outcome).toBe('collapse');
    expect(point.collapse!.load).toBe('L');
    expect(point.collapse!.largestDeliverableW).toBeCloseTo(396.9, 3);
    expect(point.junctions.get('p' as never)).toBeNull();
  });

  test('a load that drops out below its own minimum does so instead', () => {
    const load = { id: 'L', kind: 'load', plus: 'p', minus: 'n', powerW: 398, minimumV: 10 };
    const point = solve([battery(12.6, 0.1), load]);
    expect(point.outcome).toBe('solved');
    expect(point.parts.get('L' as never)).toMatchObject({ state: 'dropped-out', currentA: 0 });
    expect(point.parts.get('L' as never)!.voltageV).toBeCloseTo(12.6, 12);
  });

  test('a set current beyond the short-circuit current is no operating point at negative volts', () => {
    // 12.6 V behind 0.1 ohm gives 126 A into a short and no more.
    const ask = (currentA: number) =>
      solve([battery(12.6, 0.1), { id: 'L', kind: 'load', plus: 'p', minus: 'n', currentA }]);
    expect(ask(125).outcome).toBe('solved');
    expect(ask(127).outcome).toBe('collapse');
    expect(ask(127).collapse!.largestDeliverableW).toBeCloseTo(396.9, 3);
  });

  test('across a dead short a power load can have nothing', () => {
    const short = { id: 'J', kind: 'joint', from: 'p', to: 'n', resistanceOhm: 0 };
    const point = solve([battery(12.6, 0.1), short, { id: 'L', kind: 'load', plus: 'p', minus: 'n', powerW: 50 }]);
    expect(point.outcome).toBe('collapse');
    expect(point.collapse).toMatchObject({ load: 'L', wantedW: 50, largestDeliverableW: 0 });
  });
});
