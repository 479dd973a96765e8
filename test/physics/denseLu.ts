/** Dense linear systems. The search for states solves many and takes the quick way; every exact solve goes through ml-matrix. */
import { LuDecomposition, Matrix } from 'ml-matrix';

/** A square matrix by rows. */
export interface Dense {
  readonly size: number;
  /** Length size². */
  readonly entries: Float64Array;
}

/** Solves by the library's LU; undefined where it finds the matrix singular. */
export function solveExactly(matrix: Dense, right: Float64Array): Float64Array | undefined {
  const { size, entries } = matrix;
  const lu = new LuDecomposition(Matrix.from1DArray(size, size, entries));
  if (lu.isSingular()) return undefined;
  const x = Float64Array.from(lu.solve(Matrix.columnVector(right)).to1DArray());
  return x.every(Number.isFinite) ? x : undefined;
}

/** Gaussian elimination with row pivoting that skips zeros: wiring has few entries a row. */
export function solveQuickly(matrix: Dense, right: Float64Array): Float64Array | undefined {
  const { size } = matrix;
  const rows = Array.from({ length: size }, (_, r) => matrix.entries.slice(r * size, (r + 1) * size));
  const x = Float64Array.from(right);
  for (let k = 0; k < size; k++) {
    let pivot = k;
    for (let r = k + 1; r < size; r++) if (Math.abs(rows[r]![k]!) > Math.abs(rows[pivot]![k]!)) pivot = r;
    if (rows[pivot]![k] === 0) return undefined;
    [rows[k], rows[pivot]] = [rows[pivot]!, rows[k]!];
    [x[k], x[pivot]] = [x[pivot]!, x[k]!];
    const top = rows[k]!;
    for (let r = k + 1; r < size; r++) {
      const row = rows[r]!;
      if (row[k] === 0) continue;
      const factor = row[k]! / top[k]!;
      for (let c = k + 1; c < size; c++) row[c]! -= factor * top[c]!;
      x[r]! -= factor * x[k]!;
    }
  }
  for (let k = size - 1; k >= 0; k--) {
    const row = rows[k]!;
    let sum = x[k]!;
    for (let c = k + 1; c < size; c++) sum -= row[c]! * x[c]!;
    x[k] = sum / row[k]!;
  }
  return x.every(Number.isFinite) ? x : undefined;
}
