/** Sparse factorisations against dense reference libraries, on seeded random systems. */
import { solve as denseSolve, Matrix } from 'ml-matrix';
import { describe, expect, it } from 'vitest';
import { analyseGeneral } from '../../core/linear/analyseGeneral.ts';
import { analyseSymmetric } from '../../core/linear/analyseSymmetric.ts';
import { patternFromEntries } from '../../core/linear/patternFromEntries.ts';
import { solveRefined } from '../../core/linear/solveRefined.ts';

function random(seed: number) {
  let s = seed >>> 0;
  return () => {
    s = (s + 0x6d2b79f5) >>> 0;
    let t = Math.imul(s ^ (s >>> 15), 1 | s);
    t = (t + Math.imul(t ^ (t >>> 7), 61 | t)) ^ t;
    return ((t ^ (t >>> 14)) >>> 0) / 4294967296;
  };
}

describe('smoke', () => {
  it('solves symmetric', () => {
    for (let seed = 1; seed < 60; seed++) {
      const rnd = random(seed);
      const n = 1 + Math.floor(rnd() * 60);
      const rows: number[] = [];
      const cols: number[] = [];
      const vals: number[] = [];
      const M = Matrix.zeros(n, n);
      const add = (i: number, j: number, v: number) => {
        rows.push(i);
        cols.push(j);
        vals.push(v);
        M.set(i, j, M.get(i, j) + v);
        if (i !== j) M.set(j, i, M.get(j, i) + v);
      };
      const branch = (i: number, j: number, g: number) => {
        add(i, i, g);
        add(j, j, g);
        add(i, j, -g);
      };
      for (let i = 1; i < n; i++) branch(i, Math.floor(rnd() * i), 1 + rnd());
      const loops = Math.floor((n * rnd() * seed) / 20);
      for (let k = 0; k < loops && n > 1; k++) {
        const i = Math.floor(rnd() * n);
        const j = Math.floor(rnd() * n);
        if (i !== j) branch(i, j, 1 + rnd());
      }
      add(0, 0, 0.5);
      const { pattern, slots } = patternFromEntries(n, rows, cols, { symmetric: true });
      const values = new Float64Array(pattern.rowIndices.length);
      vals.forEach((v, k) => {
        values[slots[k]!]! += v;
      });
      const b = Float64Array.from({ length: n }, () => rnd() - 0.5);
      const f = analyseSymmetric(pattern);
      expect(f.refactor(values)).toEqual({ regular: true, negativePivots: 0, failedColumn: -1 });
      const x = new Float64Array(n);
      const rep = solveRefined(f, values, b, x);
      expect(rep.scaledResidual).toBeLessThan(1e-15);
      const ref = denseSolve(M, Matrix.columnVector([...b])).to1DArray();
      for (let i = 0; i < n; i++) expect(Math.abs(x[i]! - ref[i]!)).toBeLessThan(1e-9 * (1 + Math.abs(ref[i]!)));
    }
  });
  it('solves general', () => {
    for (let seed = 1; seed < 60; seed++) {
      const rnd = random(seed);
      const n = 1 + Math.floor(rnd() * 60);
      const rows: number[] = [];
      const cols: number[] = [];
      const vals: number[] = [];
      const M = Matrix.zeros(n, n);
      const add = (i: number, j: number, v: number) => {
        rows.push(i);
        cols.push(j);
        vals.push(v);
        M.set(i, j, M.get(i, j) + v);
      };
      const perm = Array.from({ length: n }, (_, i) => i);
      for (let i = n - 1; i > 0; i--) {
        const j = Math.floor(rnd() * (i + 1));
        [perm[i], perm[j]] = [perm[j]!, perm[i]!];
      }
      for (let i = 0; i < n; i++) add(i, perm[i]!, 1 + rnd());
      for (let k = 0; k < 2 * n; k++) add(Math.floor(rnd() * n), Math.floor(rnd() * n), rnd() - 0.5);
      const { pattern, slots } = patternFromEntries(n, rows, cols, { symmetric: false });
      const values = new Float64Array(pattern.rowIndices.length);
      vals.forEach((v, k) => {
        values[slots[k]!]! += v;
      });
      const b = Float64Array.from({ length: n }, () => rnd() - 0.5);
      const f = analyseGeneral(pattern);
      for (let round = 0; round < 2; round++) {
        expect(f.refactor(values).regular).toBe(true);
        const x = new Float64Array(n);
        const rep = solveRefined(f, values, b, x);
        expect(rep.scaledResidual).toBeLessThan(1e-15);
        const ref = denseSolve(M, Matrix.columnVector([...b])).to1DArray();
        for (let i = 0; i < n; i++) expect(Math.abs(x[i]! - ref[i]!)).toBeLessThan(1e-8 * (1 + Math.abs(ref[i]!)));
        const reft = denseSolve(M.transpose(), Matrix.columnVector([...b])).to1DArray();
        f.solveTransposed(b, x);
        for (let i = 0; i < n; i++) expect(Math.abs(x[i]! - reft[i]!)).toBeLessThan(1e-8 * (1 + Math.abs(reft[i]!)));
      }
    }
  });
});
