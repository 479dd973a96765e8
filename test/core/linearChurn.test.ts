import { expect, test } from 'vitest';
import { analyseSymmetric } from '../../core/linear/analyseSymmetric.ts';
import type { Factorisation } from '../../core/linear/matrix.ts';
import { patternFromEntries } from '../../core/linear/patternFromEntries.ts';
import { residual } from '../../core/linear/residual.ts';

/** A small linear congruential sequence, so that the same networks come each time. */
function sequence(seed: number): () => number {
  let state = seed >>> 0;
  return () => {
    state = (Math.imul(state, 1664525) + 1013904223) >>> 0;
    return state / 2 ** 32;
  };
}

function spoil(factorisation: Factorisation, values: Float64Array, kind: number): void {
  values.fill([0, Number.NaN, 1e308][kind]!);
  const x = new Float64Array(factorisation.pattern.size).fill(1);
  const report = factorisation.refactor(values);
  if (report.regular) factorisation.solve(x, x);
}

test('thousands of different networks one after another, each refactored a few times, all solve to rounding', () => {
  const random = sequence(7);
  let worst = 0;
  for (let network = 0; network < 4000; network++) {
    const size = 1 + Math.floor(random() ** 2 * 120);
    const rows: number[] = [];
    const columns: number[] = [];
    const branch: { p: number; q: number }[] = [];
    for (let k = 1; k < size; k++) branch.push({ p: k, q: Math.floor(random() * k) });
    for (let k = 0; k < size / 10; k++) branch.push({ p: Math.floor(random() * size), q: Math.floor(random() * size) });
    branch.push({ p: 0, q: -1 });
    for (const { p, q } of branch) {
      rows.push(p);
      columns.push(p);
      if (q >= 0) {
        rows.push(q, p);
        columns.push(q, q);
      }
    }
    const { pattern, slots } = patternFromEntries(size, rows, columns, { symmetric: true });
    const factorisation = analyseSymmetric(pattern);
    const values = new Float64Array(pattern.columnStarts[size]!);
    for (let round = 0; round < 3; round++) {
      // A hopeless matrix before a good one must leave nothing behind.
      if (network % 5 === 0) spoil(factorisation, values, network % 3);
      values.fill(0);
      let at = 0;
      for (const { p, q } of branch) {
        const g = p === q ? 0 : 10 ** (4 * random() - 1);
        values[slots[at++]!]! += g;
        if (q >= 0) {
          values[slots[at++]!]! += g;
          values[slots[at++]!]! -= g;
        }
      }
      const b = Float64Array.from({ length: size }, () => random() - 0.5);
      const x = new Float64Array(size);
      const report = factorisation.refactor(values);
      expect(report.regular, `network ${network} of ${size}`).toBe(true);
      expect(report.negativePivots).toBe(0);
      factorisation.solve(b, x);
      const scaled = residual(pattern, values, b, x, new Float64Array(size));
      expect(Number.isFinite(x[0]!), `network ${network} of ${size}`).toBe(true);
      worst = Math.max(worst, scaled);
    }
  }
  // Scaled by |A||x| + |b|: a backward-stable elimination stays near the unit of rounding.
  expect(worst).toBeLessThan(1e-12);
});
