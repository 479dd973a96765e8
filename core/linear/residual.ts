/** What is left of b when A x is taken from it. */
import type { Pattern } from './matrix.ts';
import { scratch } from './scratch.ts';

/**
 * Writes r = b - A x and returns the scaled residual max|r| / max(|A| |x| + |b|), dimensionless; 0 for an empty or an all-zero system,
 * infinite where x is not finite. A backward-stable solve leaves about 1e-16.
 */
export function residual(
  pattern: Pattern,
  values: Float64Array,
  b: Float64Array,
  x: Float64Array,
  r: Float64Array,
): number {
  const magnitude = scratch.magnitude(pattern.size);
  startResidual(pattern.size, b, r, magnitude);
  takeProduct(pattern, values, x, r, magnitude);
  return scaledResidual(pattern.size, r, magnitude);
}

/** r = b, magnitude = |b|. */
export function startResidual(size: number, b: Float64Array, r: Float64Array, magnitude: Float64Array): void {
  for (let i = 0; i < size; i++) {
    r[i] = b[i]!;
    magnitude[i] = Math.abs(b[i]!);
  }
}

/** r -= A x, magnitude += |A| |x|. */
export function takeProduct(
  { size, symmetric, columnStarts, rowIndices }: Pattern,
  values: Float64Array,
  x: Float64Array,
  r: Float64Array,
  magnitude: Float64Array,
): void {
  for (let j = 0; j < size; j++) {
    const xj = x[j]!;
    for (let e = columnStarts[j]!; e < columnStarts[j + 1]!; e++) {
      const i = rowIndices[e]!;
      const a = values[e]!;
      const below = a * xj;
      r[i] = r[i]! - below;
      magnitude[i] = magnitude[i]! + Math.abs(below);
      if (symmetric && i !== j) {
        const right = a * x[i]!;
        r[j] = r[j]! - right;
        magnitude[j] = magnitude[j]! + Math.abs(right);
      }
    }
  }
}

/** max|r| / max(magnitude). */
export function scaledResidual(size: number, r: Float64Array, magnitude: Float64Array): number {
  let largest = 0;
  let scale = 0;
  for (let i = 0; i < size; i++) {
    const ri = Math.abs(r[i]!);
    if (ri > largest || Number.isNaN(ri)) largest = ri; // a NaN, once in, stays
    if (magnitude[i]! > scale) scale = magnitude[i]!;
  }
  if (largest === 0) return 0;
  return Number.isFinite(largest) ? largest / scale : Number.POSITIVE_INFINITY;
}
