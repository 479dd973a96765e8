/**
 * Sparse matrices in compressed columns, and what every factorisation here offers. Knows no electricity.
 *
 * A pattern is analysed once; its values are refactored often. Nothing allocates after analysis.
 */

/** Where the entries of an n by n matrix stand. Row indices rise within a column; the diagonal entry is always present. */
export interface Pattern {
  readonly size: number;
  /** True when only the upper triangle is kept and each entry stands for its mirror image as well. */
  readonly symmetric: boolean;
  /** Length size + 1: column j holds the entries columnStarts[j] to columnStarts[j + 1] - 1. */
  readonly columnStarts: Int32Array;
  /** Length columnStarts[size]. A symmetric matrix keeps its upper triangle only: row <= column. */
  readonly rowIndices: Int32Array;
  /** Length size: 1 where no entry was ever given on the diagonal, so that it holds zero whatever the values. */
  readonly emptyDiagonal: Uint8Array;
}

/** What a numeric factorisation found. */
export interface FactorReport {
  /** False when a pivot is zero, not finite, or below 1e-14 of the largest entry of its column: the matrix is singular to working precision. */
  readonly regular: boolean;
  /**
   * Symmetric matrix: number of negative eigenvalues (Sylvester's law of inertia); 0 says that it is positive definite.
   * General matrix: number of negative pivots, which has no such meaning.
   */
  readonly negativePivots: number;
  /** Column of the original matrix whose pivot failed, or -1. */
  readonly failedColumn: number;
}

/** A factorisation of one pattern. `values` always runs parallel to the pattern's `rowIndices`. */
export interface Factorisation {
  readonly pattern: Pattern;
  /** Factors the matrix with these values. The report is one object, written anew by each call. */
  refactor(values: Float64Array): FactorReport;
  /** Solves A x = b with the last factors; `x` may be `b` itself. Both have length size. Throws a Defect unless the last refactor was regular. */
  solve(b: Float64Array, x: Float64Array): void;
  /** Solves the transposed system; for a symmetric matrix the same as `solve`. */
  solveTransposed(b: Float64Array, x: Float64Array): void;
  /**
   * Gives its memory back for the next analysis; it cannot be used after that. Nobody has to: what is not released is collected like any
   * other object. It pays where thousands of patterns are analysed in a row.
   */
  release(): void;
}

/** A factorisation that can also carry the right-hand side along while it factors, which costs less than `refactor` and `solve` in turn. */
export interface FusedFactorisation extends Factorisation {
  /** `refactor(values)`, then `solve(b, x)` with the same result bit for bit. When the matrix is singular, x is set to zero. */
  refactorAndSolve(values: Float64Array, b: Float64Array, x: Float64Array): FactorReport;
}
