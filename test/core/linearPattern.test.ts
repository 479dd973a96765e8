/** Patterns, assembly, products and residuals, checked by hand on small matrices. */
import { describe, expect, it } from 'vitest';
import { Defect } from '../../core/job/issue.ts';
import { multiply } from '../../core/linear/multiply.ts';
import { patternFromEntries } from '../../core/linear/patternFromEntries.ts';
import { residual } from '../../core/linear/residual.ts';
import { seeded, shuffled, wiring } from './linearSystems.ts';

describe('a pattern from entries', () => {
  it('keeps the upper triangle of a symmetric matrix, with its diagonal, rows rising in each column', () => {
    //  . x .
    //  x d x      given as (1,0), (1,1), (1,2), and (0,1) once more
    //  . x .
    const { pattern, slots } = patternFromEntries(3, [1, 1, 1, 0], [0, 1, 2, 1], { symmetric: true });
    expect([...pattern.columnStarts]).toEqual([0, 1, 3, 5]);
    expect([...pattern.rowIndices]).toEqual([0, 0, 1, 1, 2]);
    expect([...slots]).toEqual([1, 2, 3, 1]);
    expect([...pattern.emptyDiagonal]).toEqual([1, 0, 1]);
  });

  it('keeps both triangles of a general matrix apart', () => {
    const { pattern, slots } = patternFromEntries(2, [1, 0, 1], [0, 1, 0], { symmetric: false });
    expect([...pattern.columnStarts]).toEqual([0, 2, 4]);
    expect([...pattern.rowIndices]).toEqual([0, 1, 0, 1]);
    expect([...slots]).toEqual([1, 2, 1]);
  });

  it('may be empty', () => {
    const { pattern } = patternFromEntries(0, [], [], { symmetric: true });
    expect([...pattern.columnStarts]).toEqual([0]);
  });

  it('refuses an entry outside the matrix', () => {
    expect(() => patternFromEntries(2, [2], [0], { symmetric: false })).toThrow(Defect);
    expect(() => patternFromEntries(2, [0, 1], [0], { symmetric: false })).toThrow(Defect);
  });
});

describe('products', () => {
  it.each([true, false])('agree with the full matrix; symmetric: %s', (symmetric) => {
    const s = symmetric ? wiring(15, 4, 3) : shuffled(15, 3);
    const x = Float64Array.from({ length: 15 }, seeded(8));
    const y = new Float64Array(15);
    multiply(s.pattern, s.values, x, y);
    for (let i = 0; i < 15; i++) {
      let sum = 0;
      for (let j = 0; j < 15; j++) sum += s.full.get(i, j) * x[j]!;
      expect(y[i]).toBeCloseTo(sum, 11); // fifteen products of up to 100
    }
  });

  it('and residuals are worked out by hand', () => {
    // [2 1; 1 3] x = b with x = (1, 2): A x = (4, 7). With b = (4, 8) the remainder is (0, 1);
    // |A| |x| + |b| = (8, 15), so the scaled residual is 1 / 15.
    const { pattern } = patternFromEntries(2, [0, 0, 1], [0, 1, 1], { symmetric: true });
    const r = new Float64Array(2);
    expect(residual(pattern, Float64Array.of(2, 1, 3), Float64Array.of(4, 8), Float64Array.of(1, 2), r)).toBe(1 / 15);
    expect([...r]).toEqual([0, 1]);
  });

  it('of a solution that is not a number are infinitely wrong', () => {
    const { pattern } = patternFromEntries(1, [0], [0], { symmetric: true });
    const r = new Float64Array(1);
    expect(residual(pattern, Float64Array.of(2), Float64Array.of(1), Float64Array.of(Number.NaN), r)).toBe(
      Number.POSITIVE_INFINITY,
    );
  });
});
