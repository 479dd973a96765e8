/** Hundreds of small random networks against an independent solver and against the laws of physics. */
import { describe, expect, it } from 'vitest';
import { complaints } from './againstReference.ts';
import { seeds } from './randomJob.ts';

describe('random networks of 5 to 30 parts', () => {
  it('answer the same volts and amps as the dense reference, and keep every law, in 500 networks', () => {
    const found = seeds({ first: 1, count: 500 }).flatMap((seed) => complaints({ seed, partCount: 5 + (seed % 26) }));
    expect(found).toEqual([]);
  });

  it('do so with cables by size, at a fixed temperature or warmed by their own current, in 200 networks', () => {
    const found = seeds({ first: 20_001, count: 200 }).flatMap((seed) =>
      complaints({ seed, partCount: 5 + (seed % 26), sized: true }),
    );
    expect(found).toEqual([]);
  });
});
