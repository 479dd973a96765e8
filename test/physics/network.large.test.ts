/** Larger random networks against an independent solver and against the laws of physics. */
import { describe, expect, it } from 'vitest';
import { heldAgainstReference } from './againstReference.ts';
import { seeds } from './randomJob.ts';

describe('random networks of 30 to 300 parts', () => {
  it('answer as the dense reference and keep every law in 150 networks of 30 to 80 parts', () => {
    const jobs = seeds({ first: 40_001, count: 150 }).map((seed) => {
      return { seed, partCount: 30 + (seed % 51), sized: seed % 4 === 0 };
    });
    const { found, compared } = heldAgainstReference(jobs);
    expect(found).toEqual([]);
    expect(compared).toBeGreaterThanOrEqual(148);
  });

  it('do so in 8 networks of 100 to 200 parts of every kind', () => {
    const jobs = seeds({ first: 60_001, count: 8 }).map((seed) => ({ seed, partCount: 100 + 14 * (seed % 8) }));
    const { found, compared } = heldAgainstReference(jobs);
    expect(found).toEqual([]);
    expect(compared).toBe(8);
  });

  it('do so in 44 linear networks of 100 to 300 parts', () => {
    const jobs = seeds({ first: 80_001, count: 44 }).map((seed) => {
      return { seed, partCount: 100 + 20 * (seed % 11), linear: true };
    });
    const { found, compared } = heldAgainstReference(jobs);
    expect(found).toEqual([]);
    expect(compared).toBe(44);
  });
});
