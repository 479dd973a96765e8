/** Hundreds of small random networks against an independent solver and against the laws of physics. */
import { describe, expect, it } from 'vitest';
import { heldAgainstReference } from './againstReference.ts';
import { seeds } from './randomJob.ts';

describe('random networks of 5 to 30 parts', () => {
  it('answer the same volts and amps as the dense reference, and keep every law, in 600 networks', () => {
    const jobs = seeds({ first: 1, count: 600 }).map((seed) => ({ seed, partCount: 5 + (seed % 26) }));
    const { found, compared } = heldAgainstReference(jobs);
    expect(found).toEqual([]);
    expect(compared).toBeGreaterThanOrEqual(595);
  });

  it('do so with cables by size, at a fixed temperature or warmed by their own current, in 250 networks', () => {
    const jobs = seeds({ first: 20_001, count: 250 }).map((seed) => ({
      seed,
      partCount: 5 + (seed % 26),
      sized: true,
    }));
    const { found, compared } = heldAgainstReference(jobs);
    expect(found).toEqual([]);
    expect(compared).toBeGreaterThanOrEqual(247);
  });
});
