/** Volt walks over the example jobs and over random networks: continuous, closed, and at the solve's own potentials. */
import { describe, expect, it } from 'vitest';
import {
  type CheckedJob,
  caseById,
  checkJob,
  type OperatingPoint,
  operatingPoint,
  parseJob,
  type VoltWalk,
  voltWalk,
  walkChoices,
} from '../../core/api.ts';
import { examples } from '../../data/examples/index.ts';
import { tables } from '../../data/index.ts';
import { randomJob } from '../physics/randomJob.ts';

/** Volts are known to the last places of a double: some hundred steps of 1e-14 V each stay far below. */
const ROUNDING_V = 1e-9;

function jobOf(text: string): CheckedJob {
  const parsed = parseJob(text);
  if (!parsed.ok) throw new Error(JSON.stringify(parsed.issues));
  return parsed.value;
}

/** Every walk of a solved case, from the source that feeds each load most and from every other that reaches it. */
function walksOf(job: CheckedJob, point: OperatingPoint): readonly VoltWalk[] {
  const operatingCase = caseById(job, point.case)!;
  return walkChoices({ job, point }).flatMap(({ load, sources }) =>
    sources.map((source) => {
      const walk = voltWalk({ job, operatingCase, point, load, source });
      if (!walk.ok) throw new Error(walk.reason);
      return walk;
    }),
  );
}

function expectWalkToHold(walk: VoltWalk, point: OperatingPoint): void {
  const { steps, totals, closureV, emfV } = walk;
  expect(Math.abs(closureV)).toBeLessThan(ROUNDING_V);
  steps.forEach((step, index) => {
    const next = steps[(index + 1) % steps.length]!;
    expect(next.from).toBe(step.to);
    // The last step ends where the first began, to rounding; the others exactly where the next begins.
    expect(Math.abs(next.startV - step.endV)).toBeLessThanOrEqual(index + 1 < steps.length ? 0 : ROUNDING_V);
    // Where the solve gives the junction no volts of its own, the walk is only against the source's minus.
    const solvedV = (step.to === null ? null : point.junctions.get(step.to)) ?? step.endV;
    expect(Math.abs(step.endV - solvedV)).toBeLessThan(ROUNDING_V);
  });
  const rest = emfV + totals.otherSourcesV - totals.sagV - totals.outV - totals.loadV - totals.backV;
  expect(Math.abs(rest)).toBeLessThan(ROUNDING_V);
}

describe.each(examples)('volt walks of $name', ({ text }) => {
  const job = jobOf(text);

  it.each(job.cases.map(({ id }) => id))('close and meet the solved potentials in case %s', (id) => {
    const operatingCase = caseById(job, id)!;
    const model = operatingCase.surge === undefined ? 'slow' : 'fast';
    const point = operatingPoint({ job, operatingCase, tables, model });
    const walks = walksOf(job, point);
    for (const walk of walks) expectWalkToHold(walk, point);
    const running = walkChoices({ job, point });
    expect(running.length).toBeGreaterThan(0);
    expect(running.filter(({ source }) => source === null)).toStrictEqual([]);
  });
});

describe('volt walks of random networks', () => {
  it.each([1, 2, 3, 4, 5, 6, 7, 8])('close and meet the solved potentials (seeds of set %i)', (set) => {
    let walked = 0;
    for (let seed = 100 * set; seed < 100 * set + 25; seed++) {
      const checked = checkJob(randomJob({ seed, partCount: 5 + (seed % 60), sized: seed % 2 === 0 }));
      if (!checked.ok) throw new Error(JSON.stringify(checked.issues));
      const job = checked.value;
      const point = operatingPoint({ job, operatingCase: job.cases[0]!, tables, model: 'slow' });
      const walks = walksOf(job, point);
      for (const walk of walks) expectWalkToHold(walk, point);
      walked += walks.length;
    }
    expect(walked).toBeGreaterThan(25);
  });
});
