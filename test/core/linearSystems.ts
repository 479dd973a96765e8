/** Seeded random systems for the tests of core/linear, each beside the same matrix in full. */
import { Matrix } from 'ml-matrix';
import type { Pattern } from '../../core/linear/matrix.ts';
import { patternFromEntries } from '../../core/linear/patternFromEntries.ts';

/** A seeded generator of numbers in 0 to 1 (mulberry32). */
export function seeded(seed: number): () => number {
  let s = seed >>> 0;
  return () => {
    s = (s + 0x6d2b79f5) >>> 0;
    let t = Math.imul(s ^ (s >>> 15), 1 | s);
    t = (t + Math.imul(t ^ (t >>> 7), 61 | t)) ^ t;
    return ((t ^ (t >>> 14)) >>> 0) / 4294967296;
  };
}

export interface System {
  readonly size: number;
  readonly pattern: Pattern;
  readonly values: Float64Array;
  /** The same in full; made when asked for. */
  readonly full: Matrix;
  readonly b: Float64Array;
}

export type Triplet = readonly [row: number, column: number, value: number];

/** A system from its triplets, with a right-hand side of numbers in -1 to 1. */
export function system(size: number, triplets: readonly Triplet[], symmetric: boolean, random: () => number): System {
  const { pattern, slots } = patternFromEntries(
    size,
    triplets.map(([i]) => i),
    triplets.map(([, j]) => j),
    { symmetric },
  );
  const values = new Float64Array(pattern.rowIndices.length);
  triplets.forEach(([, , value], k) => {
    values[slots[k]!] = values[slots[k]!]! + value;
  });
  return {
    size,
    pattern,
    values,
    get full() {
      return inFull(size, triplets, symmetric);
    },
    b: Float64Array.from({ length: size }, () => 2 * random() - 1),
  };
}

function inFull(size: number, triplets: readonly Triplet[], symmetric: boolean): Matrix {
  const full = Matrix.zeros(size, size);
  for (const [i, j, value] of triplets) {
    full.set(i, j, full.get(i, j) + value);
    if (symmetric && i !== j) full.set(j, i, full.get(j, i) + value);
  }
  return full;
}

/** A branch of conductance g between i and j. */
export function branch(i: number, j: number, g: number): Triplet[] {
  return [
    [i, i, g],
    [j, j, g],
    [i, j, -g],
  ];
}

/** Wiring: a random tree with about `loops` loops, grounded at one junction, a small load at every other one. Positive definite. */
export function wiring(size: number, loops: number, seed: number): System {
  const random = seeded(seed);
  const triplets: Triplet[] = [[0, 0, 10]];
  for (let i = 1; i < size; i++) triplets.push(...branch(i, Math.floor(random() * i), 1 + 9 * random()), [i, i, 0.01]);
  for (let k = 0; k < loops; k++) {
    const i = Math.floor(random() * size);
    const j = Math.floor(random() * size);
    if (i !== j) triplets.push(...branch(i, j, 1 + 9 * random()));
  }
  return system(size, triplets, true, random);
}

/** Wiring with ideal voltage sources: each adds an unknown current, in a row and column without a diagonal. Indefinite. */
export function wiringWithSources(size: number, sources: number, seed: number): System {
  const random = seeded(seed);
  const triplets: Triplet[] = [[0, 0, 10]];
  for (let i = 1; i < size; i++) triplets.push(...branch(i, Math.floor(random() * i), 1 + 9 * random()), [i, i, 0.01]);
  for (let k = 0; k < size / 10; k++) {
    const i = Math.floor(random() * size);
    const j = Math.floor(random() * size);
    if (i !== j) triplets.push(...branch(i, j, 1 + 9 * random()));
  }
  // Each source holds one junction of its own (k) against the junction before it, so no loop is made of sources alone.
  for (let k = 0; k < sources; k++) triplets.push([size + k, 2 * k + 1, 1], [size + k, 2 * k, -1]);
  return system(size + sources, triplets, true, random);
}

/** A sparse unsymmetric matrix whose large entries stand off the diagonal, so that rows must be exchanged. */
export function shuffled(size: number, seed: number): System {
  const random = seeded(seed);
  const target = Array.from({ length: size }, (_, i) => i);
  for (let i = size - 1; i > 0; i--) {
    const j = Math.floor(random() * (i + 1));
    [target[i], target[j]] = [target[j]!, target[i]!];
  }
  const triplets: Triplet[] = target.map((j, i) => [i, j, 1 + random()]);
  for (let k = 0; k < 2 * size; k++) {
    triplets.push([Math.floor(random() * size), Math.floor(random() * size), random() - 0.5]);
  }
  return system(size, triplets, false, random);
}

/** Largest difference between two vectors, over the largest magnitude in the second. */
export function relativeDifference(x: ArrayLike<number>, y: ArrayLike<number>): number {
  let difference = 0;
  let scale = 0;
  for (let i = 0; i < y.length; i++) {
    difference = Math.max(difference, Math.abs(x[i]! - y[i]!));
    scale = Math.max(scale, Math.abs(y[i]!));
  }
  return scale === 0 ? difference : difference / scale;
}
