/** Matrix times vector. */
import type { Pattern } from './matrix.ts';

/** Writes y = A x. `y` and `x` are different arrays of length size. */
export function multiply(pattern: Pattern, values: Float64Array, x: Float64Array, y: Float64Array): void {
  const { size, symmetric, columnStarts, rowIndices } = pattern;
  y.fill(0, 0, size);
  for (let j = 0; j < size; j++) {
    const xj = x[j]!;
    for (let e = columnStarts[j]!; e < columnStarts[j + 1]!; e++) {
      const i = rowIndices[e]!;
      y[i]! += values[e]! * xj;
      if (symmetric && i !== j) y[j]! += values[e]! * x[i]!;
    }
  }
}
