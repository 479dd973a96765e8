/** The working of every part reproduces its answer; junctions sum to nothing; figures say where they come from. */
import { describe, expect, it } from 'vitest';
import {
  balanceLine,
  type CheckedJob,
  caseById,
  checkJob,
  junctionBalance,
  type OperatingCase,
  type OperatingPoint,
  operatingPoint,
  parseJob,
  partFigures,
  partWorking,
} from '../../core/api.ts';
import { examples } from '../../data/examples/index.ts';
import { tables } from '../../data/index.ts';
import { randomJob } from '../physics/randomJob.ts';

function jobOf(text: string): CheckedJob {
  const parsed = parseJob(text);
  if (!parsed.ok) throw new Error(JSON.stringify(parsed.issues));
  return parsed.value;
}

interface Solved {
  readonly job: CheckedJob;
  readonly operatingCase: OperatingCase;
  readonly point: OperatingPoint;
}

function solved(job: CheckedJob, id: string): Solved {
  const operatingCase = caseById(job, id)!;
  const model = operatingCase.surge === undefined ? 'slow' : 'fast';
  return { job, operatingCase, point: operatingPoint({ job, operatingCase, tables, model }) };
}

/**
 * Relative 1e-9 is the proof's own bound. A drop is a small difference of potentials, known to the last places of these: hence
 * also 1e-11 V, and the amperes and watts that go with it.
 */
function isSame(found: number, answered: number): boolean {
  return Math.abs(found - answered) <= 1e-9 * Math.abs(answered) + 1e-10;
}

function expectWorkingToHold(at: Solved): number {
  let compared = 0;
  for (const { id, ...answer } of at.point.parts.values()) {
    const lines = partWorking({ ...at, part: id, tables });
    expect([id, lines.length > 0]).toStrictEqual([id, true]);
    expect([id, lines.at(-1)?.answers !== undefined]).toStrictEqual([id, true]);
    for (const { name, answers, result, notDetermined, withValues } of lines) {
      expect([id, name, withValues.includes('not finite')]).toStrictEqual([id, name, false]);
      expect([id, name, result.value === null]).toStrictEqual([id, name, notDetermined !== undefined]);
      if (answers === undefined) continue;
      const answered = answer[answers];
      // What the answer leaves open, its working leaves open.
      const agrees =
        typeof answered === 'number' ? result.value !== null && isSame(result.value, answered) : result.value === null;
      const same = agrees ? 'same' : [result.value, answered];
      expect([id, name, same]).toStrictEqual([id, name, 'same']);
      compared++;
    }
  }
  return compared;
}

function expectJunctionsToBalance({ job, operatingCase, point }: Solved): void {
  const largestA = Math.max(1, ...[...point.parts.values()].map(({ currentA }) => Math.abs(currentA ?? 0)));
  for (const junction of point.junctions.keys()) {
    const { sumA } = junctionBalance({ job, operatingCase, point, junction });
    // The proof sums the same currents; another order of summing moves the last places only.
    expect([junction, Math.abs(sumA) <= point.proof.worstJunctionA + 1e-10 * largestA]).toStrictEqual([junction, true]);
  }
}

describe.each(examples)('working of $name', ({ text }) => {
  const job = jobOf(text);

  it.each([...job.cases.map(({ id }) => id), 'at-rest'])('gives the answer of every part in case %s', (id) => {
    const at = solved(job, id);
    expect(expectWorkingToHold(at)).toBeGreaterThan(at.point.parts.size);
    expectJunctionsToBalance(at);
  });

  it('lists every figure that the solve assumed, with its origin', () => {
    const at = solved(job, job.cases[0]!.id);
    const assumed = at.point.assumptions.filter(({ part }) => part !== null);
    for (const { part, text: said, range } of assumed) {
      const figures = partFigures({ ...at, part: part!, tables });
      const found = figures.find((figure) => figure.text === said);
      expect([said, found?.from === 'assumed' || found?.from === 'standard']).toStrictEqual([said, true]);
      expect(found?.range).toStrictEqual(range);
    }
  });
});

describe('random networks', () => {
  it.each([1, 2, 3, 4])('have workings that give their answers and junctions that balance (set %i)', (set) => {
    for (let seed = 1000 * set; seed < 1000 * set + 25; seed++) {
      const checked = checkJob(randomJob({ seed, partCount: 5 + (seed % 60), sized: true }));
      if (!checked.ok) throw new Error(JSON.stringify(checked.issues));
      const at = solved(checked.value, checked.value.cases[0]!.id);
      expectWorkingToHold(at);
      expectJunctionsToBalance(at);
    }
  });
});

describe('the balance line', () => {
  it('adds up: in less out less heat is the mismatch', () => {
    const { point } = solved(jobOf(examples[0]!.text), jobOf(examples[0]!.text).cases[0]!.id);
    const { inW, outW, heatW, mismatchW, holds } = balanceLine(point);
    expect(inW - outW - heatW).toBe(mismatchW);
    expect(inW).toBeGreaterThan(0);
    expect(holds).toBe(true);
  });
});
