import { describe, expect, it } from 'vitest';
import { caseById, operatingPoint, parseJob } from '../../core/api.ts';
import { tables } from '../../data/index.ts';

/** Two alike strings on bars of a given resistance a segment, with a load that can be switched off. */
function bankOnBars(segmentOhm: number, emfV: number) {
  const string = { kind: 'string', chemistry: 'agm', blocksInSeries: 2, blockNominalV: 12, capacityAh: 150 };
  const parsed = parseJob(
    JSON.stringify({
      format: 'ohmwright-job',
      version: 1,
      parts: [
        { ...string, id: 'A', plus: 'p1', minus: 'm1', emfV, resistanceOhm: 0.013 },
        { ...string, id: 'B', plus: 'p2', minus: 'm2', emfV, resistanceOhm: 0.013 },
        { id: 'plus bar', kind: 'busbar', junctions: ['p1', 'p2', 'p3'], segmentOhm },
        { id: 'minus bar', kind: 'busbar', junctions: ['m1', 'm2', 'm3'], segmentOhm },
        { id: 'load', kind: 'load', plus: 'p3', minus: 'm3', currentA: 1 },
      ],
    }),
  );
  if (!parsed.ok) throw new Error(parsed.issues.map((issue) => issue.message).join('\n'));
  return parsed.value;
}

describe('a bank at rest', () => {
  // A current through a segment of 10 µΩ is known to the last place of 25 V over 10 µΩ, about 1 nA: 20 nW of 25 V. That is
  // rounding, not a broken balance; the proof must not refuse it although no power flows to compare it with.
  it.each([2e-5, 1e-5, 5e-6, 1e-6, 1e-7])('has a proof that holds on bars of %s ohm a segment', (segmentOhm) => {
    for (let step = 0; step < 40; step++) {
      const job = bankOnBars(segmentOhm, 25.2 + 0.013 * step);
      const operatingCase = caseById(job, 'at-rest')!;
      const point = operatingPoint({ job, operatingCase, tables, model: 'slow' });
      expect(point.outcome).toBe('solved');
      expect(point.proof.holds).toBe(true);
      // 25 V over the segment's own resistance to the last few places: what rounding alone can leave.
      expect(Math.abs(point.proof.mismatchW)).toBeLessThan(((25.7 * 25.7) / segmentOhm) * 2 ** -46);
    }
  });
});
