/** Superposition and reciprocity: what holds of every network of sources, ohms and fixed amps, and of no other. */
import { describe, expect, it } from 'vitest';
import type { JobValue, PartValue } from './jobDraft.ts';
import { randomJob, seeds } from './randomJob.ts';
import { seededRandom } from './seededRandom.ts';
import { answered, voltsAt } from './solveValue.ts';

/**
 * Volts compared after differences of answers near 50 V: each answer is good to about 1e-11 of that, and the changes made
 * are whole volts.
 */
const TOLERANCE_V = 2e-8;

/** A linear job; its loads that are ohms stay. */
function linearJob(seed: number): JobValue {
  return randomJob({ seed, partCount: 10 + (seed % 40), linear: true });
}

/** The same job with every EMF and every fixed current moved by a part of its own. */
function moved(value: JobValue, move: (part: PartValue) => number): JobValue {
  const parts = value.parts.map((part): PartValue => {
    if (part.kind === 'string') return { ...part, emfV: Number(part['emfV']) * (1 + move(part)) };
    if (part['currentA'] !== undefined) return { ...part, currentA: Number(part['currentA']) * (1 + move(part)) };
    return part;
  });
  return { ...value, parts };
}

function allVolts(value: JobValue): ReadonlyMap<string, number> {
  const { point } = answered(value);
  expect(point.outcome).toBe('solved');
  return new Map([...point.junctions].flatMap(([name, volts]) => (volts === null ? [] : [[name as string, volts]])));
}

describe('linear networks', () => {
  it('obey superposition: two changes of sources together move every junction by the sum of what each moves it', () => {
    for (const seed of seeds({ first: 3001, count: 60 })) {
      const value = linearJob(seed);
      const random = seededRandom(seed);
      const moves = new Map(
        value.parts.map(({ id }) => [id, [random.between([0, 0.1]), random.between([0, 0.1])] as const]),
      );
      const rest = allVolts(value);
      const first = allVolts(moved(value, ({ id }) => moves.get(id)![0]));
      const second = allVolts(moved(value, ({ id }) => moves.get(id)![1]));
      const both = allVolts(moved(value, ({ id }) => moves.get(id)![0] + moves.get(id)![1]));
      for (const [junction, volts] of rest) {
        const summed = first.get(junction)! + second.get(junction)! - volts;
        expect(Math.abs(both.get(junction)! - summed), `seed ${seed}, ${junction}`).toBeLessThan(TOLERANCE_V);
      }
    }
  });

  it('obey superposition in proportion: twice the change of a source moves every junction twice as far', () => {
    for (const seed of seeds({ first: 3101, count: 40 })) {
      const value = linearJob(seed);
      const rest = allVolts(value);
      const once = allVolts(moved(value, () => 0.04));
      const twice = allVolts(moved(value, () => 0.08));
      for (const [junction, volts] of rest) {
        const gap = twice.get(junction)! - volts - 2 * (once.get(junction)! - volts);
        expect(Math.abs(gap), `seed ${seed}, ${junction}`).toBeLessThan(TOLERANCE_V);
      }
    }
  });

  it('obey reciprocity: 100 A drawn at one place drop the volts at another as much as 100 A drawn there drop them here', () => {
    for (const seed of seeds({ first: 3201, count: 60 })) {
      const value = linearJob(seed);
      const places = value.parts.filter(({ kind }) => kind === 'load') as (PartValue & {
        plus: string;
        minus: string;
      })[];
      const random = seededRandom(seed);
      const [here, there] = [random.pick(places), random.pick(places)];
      const drop = (drawn: typeof here, seen: typeof here): number => {
        const probe = { id: 'probe', kind: 'load', plus: drawn.plus, minus: drawn.minus, currentA: 100 };
        const before = answered(value).point;
        const after = answered({ ...value, parts: [...value.parts, probe] }).point;
        const across = (point: typeof before) => voltsAt(point, seen.plus) - voltsAt(point, seen.minus);
        return across(before) - across(after);
      };
      const gap = Math.abs(drop(here, there) - drop(there, here));
      expect(gap, `seed ${seed}`).toBeLessThan(TOLERANCE_V);
    }
  });
});
