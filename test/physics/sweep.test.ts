/** Many draws at once answer what each draw answers as a job of its own. */
import { describe, expect, it } from 'vitest';
import { type CheckedJob, operatingPoint, solveCircuit } from '../../core/api.ts';
import type { Shift } from '../../core/network/shift.ts';
import { Sweep } from '../../core/network/sweep.ts';
import { tables } from '../../data/index.ts';
import { randomJob } from './randomJob.ts';
import { seededRandom } from './seededRandom.ts';
import { checked } from './solveValue.ts';

const DRAWS = 19; // more than two sets of lanes, the last not full

/** Shifts of a network's strings and of its loads and joints, and the same job with one draw written into its parts. */
function shiftsOf(job: CheckedJob): readonly Shift[] {
  return job.parts.flatMap((part): readonly Shift[] => {
    if (part.kind === 'string' && part.emfV !== undefined && part.resistanceOhm !== undefined) {
      return [
        { part: part.id, quantity: 'emfV' },
        { part: part.id, quantity: 'resistanceOhm' },
      ];
    }
    if (part.kind === 'joint' && part.resistanceOhm > 0) return [{ part: part.id, quantity: 'resistanceOhm' }];
    if (part.kind === 'load' && part.on && part.powerW !== undefined && part.powerW > 0)
      return [{ part: part.id, quantity: 'powerW' }];
    return [];
  });
}

function written(job: CheckedJob, shifts: readonly Shift[], changes: Float64Array): CheckedJob {
  const parts = job.parts.map((part) => {
    let changed = part;
    shifts.forEach((shift, k) => {
      if (shift.part !== part.id) return;
      const before = (part as unknown as Record<string, number>)[shift.quantity]!;
      changed = { ...changed, [shift.quantity]: before + changes[k]! };
    });
    return changed;
  });
  return { ...job, parts };
}

function change(job: CheckedJob, { part, quantity }: Shift, share: number): number {
  const found = job.parts.find(({ id }) => id === part) as unknown as Record<string, number>;
  return share * found[quantity]! * (quantity === 'emfV' ? 0.04 : 0.6);
}

function compare(seed: number, sized: boolean): { readonly compared: number; readonly worst: number } {
  const { job, operatingCase } = checked(randomJob({ seed, partCount: 8 + (seed % 40), sized }));
  const solved = solveCircuit({ job, operatingCase, tables, model: 'slow' });
  if (solved.point.outcome !== 'solved') return { compared: 0, worst: 0 };
  // A case may override a part; here the drawing itself is written over, so those stay out.
  const shifts = shiftsOf(job).filter(({ part }) => !operatingCase.changed.has(part));
  const watched = job.parts.filter(({ kind }) => kind === 'string').map(({ id }) => id);
  const random = seededRandom(seed);
  const drawn = Array.from({ length: DRAWS }, () =>
    Float64Array.from(shifts, (shift) => change(job, shift, random.between([-1, 1]))),
  );
  const answers: (Float64Array | null)[] = [];
  new Sweep({ solved, tables, shifts, watched }).run({
    count: DRAWS,
    draw: (index, changes) => changes.set(drawn[index]!),
    take: (_, currents) => answers.push(currents === null ? null : currents.slice()),
  });
  let worst = 0;
  drawn.forEach((changes, index) => {
    const point = operatingPoint({ job: written(job, shifts, changes), operatingCase, tables, model: 'slow' });
    if (point.outcome !== 'solved') {
      if (answers[index] !== null) worst = Number.POSITIVE_INFINITY;
      return;
    }
    watched.forEach((id, w) => {
      const fresh = point.parts.get(id)!.currentA!;
      worst = Math.max(worst, Math.abs(fresh - answers[index]![w]!) / Math.max(1, Math.abs(fresh)));
    });
  });
  // The operating point itself is left as it was.
  const again = solveCircuit({ job, operatingCase, tables, model: 'slow' });
  for (const id of watched) expect(again.point.parts.get(id)).toEqual(solved.point.parts.get(id));
  return { compared: DRAWS, worst };
}

describe('a sweep over draws', () => {
  it.each([
    ['all kinds of parts', false],
    ['cables that warm with their own load', true],
  ])('agrees with a new solve of each draw: %s', (_, sized) => {
    let compared = 0;
    let worst = 0;
    for (let seed = 1; seed <= 60; seed++) {
      const one = compare(700 * (sized ? 2 : 1) + seed, sized);
      compared += one.compared;
      worst = Math.max(worst, one.worst);
    }
    expect(compared).toBeGreaterThan(50 * DRAWS);
    // Both end at the rounding of their own Newton iteration; weak sources and stiff strings lose some digits of it.
    expect(worst).toBeLessThan(1e-7);
  });
});
