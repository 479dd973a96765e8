/** Larger random networks against an independent solver and against the laws of physics. */
import { describe, expect, it } from 'vitest';
import { complaints } from './againstReference.ts';
import { seeds } from './randomJob.ts';

describe('random networks of 30 to 300 parts', () => {
  it('answer as the dense reference and keep every law in 220 networks of 30 to 80 parts', () => {
    const found = seeds({ first: 40_001, count: 220 }).flatMap((seed) =>
      complaints({ seed, partCount: 30 + (seed % 51), sized: seed % 4 === 0 }),
    );
    expect(found).toEqual([]);
  });

  it('do so in 10 networks of 100 to 200 parts of every kind', () => {
    const found = seeds({ first: 60_001, count: 10 }).flatMap((seed) =>
      complaints({ seed, partCount: 100 + 11 * (seed % 10) }),
    );
    expect(found).toEqual([]);
  });

  it('do so in 80 linear networks of 100 to 300 parts', () => {
    const found = seeds({ first: 80_001, count: 80 }).flatMap((seed) =>
      complaints({ seed, partCount: 100 + 20 * (seed % 11), linear: true }),
    );
    expect(found).toEqual([]);
  });
});
