/** Sparse L D Lᵀ and L U against general-purpose libraries and known results. */

import { lup, lusolve, sparse } from 'mathjs';
import { EigenvalueDecomposition, Matrix, solve } from 'ml-matrix';
import { describe, expect, it } from 'vitest';
import { Defect } from '../../core/job/issue.ts';
import { analyseGeneral } from '../../core/linear/analyseGeneral.ts';
import { analyseSymmetric } from '../../core/linear/analyseSymmetric.ts';
import type { Factorisation } from '../../core/linear/matrix.ts';
import { patternFromEntries } from '../../core/linear/patternFromEntries.ts';
import { solveRefined } from '../../core/linear/solveRefined.ts';
import {
  branch,
  relativeDifference,
  type System,
  seeded,
  shuffled,
  system,
  type Triplet,
  wiring,
  wiringWithSources,
} from './linearSystems.ts';

/** Residual of a refined solve: a few roundings of the row that fits worst. */
const RESIDUAL = 1e-15;
/** Two solvers differ by condition number times rounding: these systems stay below 1e5. */
const AGREEMENT = 1e-10;

function reference({ full, b }: System): number[] {
  return solve(full, Matrix.columnVector([...b])).to1DArray();
}

function expectSolved(s: System, factorisation: Factorisation = analyseSymmetric(s.pattern)): void {
  const report = factorisation.refactor(s.values);
  expect(report).toMatchObject({ regular: true, failedColumn: -1 });
  const x = new Float64Array(s.size);
  expect(solveRefined(factorisation, s.values, s.b, x).scaledResidual).toBeLessThan(RESIDUAL);
  expect(relativeDifference(x, reference(s))).toBeLessThan(AGREEMENT);
}

describe('positive definite systems', () => {
  it.each([1, 2, 3, 5, 20, 60])(
    'agree with a dense solve: wiring of %i junctions, from a bare tree to many loops',
    (size) => {
      for (const loops of [0, 1, Math.ceil(size / 20), size, 4 * size]) {
        for (let seed = 1; seed <= 5; seed++) expectSolved(wiring(size, loops, 100 * size + seed));
      }
    },
  );

  it('agree with a dense solve when the matrix is full', () => {
    const random = seeded(4);
    const triplets: Triplet[] = [];
    for (let i = 0; i < 25; i++) for (let j = 0; j <= i; j++) triplets.push([j, i, i === j ? 30 : random() - 0.5]);
    expectSolved(system(25, triplets, true, random));
  });

  it('agree with mathjs, dense and sparse', () => {
    const s = wiring(40, 6, 11);
    const factorisation = analyseSymmetric(s.pattern);
    factorisation.refactor(s.values);
    const x = new Float64Array(s.size);
    factorisation.solve(s.b, x);
    const right = [...s.b].map((v) => [v]);
    const dense = lusolve(s.full.to2DArray(), right) as number[][];
    expect(relativeDifference(x, dense.flat())).toBeLessThan(AGREEMENT);
    const bySparse = lusolve(lup(sparse(s.full.to2DArray())), right);
    expect(relativeDifference(x, (bySparse as { valueOf(): number[][] }).valueOf().flat())).toBeLessThan(AGREEMENT);
  });

  it('give a uniform ladder its known voltages', () => {
    // A source of 1 A into the end of n resistors of 1 ohm in series to the reference: junction k stands at k volts.
    const n = 200;
    const triplets: Triplet[] = [[0, 0, 1]];
    for (let i = 1; i < n; i++) triplets.push(...branch(i - 1, i, 1));
    const s = system(n, triplets, true, () => 0);
    const b = new Float64Array(n);
    b[n - 1] = 1;
    const factorisation = analyseSymmetric(s.pattern);
    factorisation.refactor(s.values);
    factorisation.solve(b, b);
    for (let k = 0; k < n; k++) expect(b[k]).toBeCloseTo(k + 1, 9); // 200 additions of numbers up to 200
  });

  it('are solved in place, and again and again with new values', () => {
    const s = wiring(30, 4, 5);
    const factorisation = analyseSymmetric(s.pattern);
    for (let round = 1; round <= 4; round++) {
      const values = s.values.map((v) => v * round);
      factorisation.refactor(values);
      const x = s.b.slice();
      expect(solveRefined(factorisation, values, x, x).scaledResidual).toBeLessThan(RESIDUAL);
      expect(
        relativeDifference(
          x,
          reference(s).map((v) => v / round),
        ),
      ).toBeLessThan(AGREEMENT);
    }
  });

  it('come out the same however the junctions are numbered', () => {
    const random = seeded(9);
    const triplets: Triplet[] = [[0, 0, 3]];
    for (let i = 1; i < 50; i++) triplets.push(...branch(i, Math.floor(random() * i), 1 + random()));
    for (let k = 0; k < 5; k++) triplets.push(...branch(k, 49 - k, 1));
    const s = system(50, triplets, true, random);
    const turned = Array.from({ length: 50 }, (_, i) => (7 * i + 3) % 50);
    const t = system(
      50,
      triplets.map(([i, j, v]) => [turned[i]!, turned[j]!, v]),
      true,
      random,
    );
    const solveOne = (one: System, b: Float64Array): Float64Array => {
      const factorisation = analyseSymmetric(one.pattern);
      factorisation.refactor(one.values);
      factorisation.solve(b, b);
      return b;
    };
    const x = solveOne(s, s.b.slice());
    const turnedB = new Float64Array(50);
    s.b.forEach((v, i) => {
      turnedB[turned[i]!] = v;
    });
    const y = solveOne(t, turnedB);
    expect(
      relativeDifference(
        turned.map((i) => y[i]!),
        x,
      ),
    ).toBeLessThan(1e-12); // another order of the same roundings
  });

  it('may fall into islands', () => {
    const triplets: Triplet[] = [];
    for (let island = 0; island < 6; island++) {
      triplets.push(
        [3 * island, 3 * island, 2],
        ...branch(3 * island, 3 * island + 1, 1),
        ...branch(3 * island + 1, 3 * island + 2, 1),
      );
    }
    expectSolved(system(18, triplets, true, seeded(3)));
  });
});

describe('indefinite systems', () => {
  it.each([4, 10, 30])(
    'with ideal sources are solved, and count a negative eigenvalue for each source: %i junctions',
    (size) => {
      for (let seed = 1; seed <= 6; seed++) {
        const sources = Math.floor(size / 4);
        const s = wiringWithSources(size, sources, 10 * size + seed);
        expectSolved(s);
        const { negativePivots } = analyseSymmetric(s.pattern).refactor(s.values);
        const eigenvalues = new EigenvalueDecomposition(s.full, { assumeSymmetric: true }).realEigenvalues;
        expect(negativePivots).toBe(eigenvalues.filter((v) => v < 0).length);
        expect(negativePivots).toBe(sources);
      }
    },
  );

  it('count the negative conductance of a load that draws too much', () => {
    const s = system(3, [[0, 0, 10], ...branch(0, 1, 1), ...branch(1, 2, 1), [2, 2, -5]], true, seeded(1));
    expect(analyseSymmetric(s.pattern).refactor(s.values)).toEqual({
      regular: true,
      negativePivots: 1,
      failedColumn: -1,
    });
  });
});

describe('singular systems are reported, not thrown', () => {
  it('a network without a path to the reference', () => {
    const triplets: Triplet[] = [];
    for (let i = 1; i < 12; i++) triplets.push(...branch(i, i >> 1, 0.1 + i));
    triplets.push(...branch(3, 11, 0.3), ...branch(4, 9, 0.7));
    const s = system(12, triplets, true, seeded(2));
    const report = analyseSymmetric(s.pattern).refactor(s.values);
    expect(report.regular).toBe(false);
    expect(report.failedColumn).toBeGreaterThanOrEqual(0);
  });

  it('two ideal sources in parallel', () => {
    const s = system(
      4,
      [[0, 0, 0.3], ...branch(0, 1, 0.7), [2, 0, 1], [2, 1, -1], [3, 0, 1], [3, 1, -1]],
      true,
      seeded(2),
    );
    expect(analyseSymmetric(s.pattern).refactor(s.values)).toMatchObject({ regular: false });
  });

  it('a junction with nothing at it, named', () => {
    const s = system(3, [[0, 0, 1], ...branch(0, 1, 1)], true, seeded(2));
    expect(analyseSymmetric(s.pattern).refactor(s.values)).toMatchObject({ regular: false, failedColumn: 2 });
  });

  it('values that are not numbers', () => {
    const s = wiring(6, 1, 1);
    s.values[3] = Number.NaN;
    expect(analyseSymmetric(s.pattern).refactor(s.values).regular).toBe(false);
  });

  it('and solving one all the same is a broken promise; good values mend it', () => {
    const s = wiring(6, 1, 1);
    const factorisation = analyseSymmetric(s.pattern);
    factorisation.refactor(new Float64Array(s.values.length));
    expect(() => factorisation.solve(s.b, s.b)).toThrow(Defect);
    expectSolved(s, factorisation);
  });
});

describe('general systems', () => {
  it.each([1, 2, 7, 30, 60])('that need row exchanges agree with a dense solve, also transposed: size %i', (size) => {
    for (let seed = 1; seed <= 8; seed++) {
      const s = shuffled(size, 100 * size + seed);
      const factorisation = analyseGeneral(s.pattern);
      for (let round = 0; round < 2; round++) {
        expectSolved(s, factorisation); // the second round keeps pivots and pattern
        const x = new Float64Array(size);
        factorisation.solveTransposed(s.b, x);
        const transposed = reference({ ...s, full: s.full.transpose() });
        expect(relativeDifference(x, transposed)).toBeLessThan(1e-8); // not refined, condition up to 1e6
      }
    }
  });

  it('choose pivots anew when kept ones have become too small', () => {
    // First the diagonal is large, then the anti-diagonal.
    const entries: [number, number][] = [
      [0, 0],
      [0, 1],
      [1, 0],
      [1, 1],
    ];
    const factorisation = analyseGeneral(
      patternFromEntries(
        2,
        entries.map(([i]) => i),
        entries.map(([, j]) => j),
        { symmetric: false },
      ).pattern,
    );
    const x = new Float64Array(2);
    factorisation.refactor(Float64Array.of(1, 1e-12, 2e-12, 1));
    factorisation.solve(Float64Array.of(3, 4), x);
    expect(relativeDifference(x, [3, 4])).toBeLessThan(1e-11); // the small entries themselves
    expect(factorisation.refactor(Float64Array.of(1e-12, 1, 2, 1e-12)).regular).toBe(true);
    factorisation.solve(Float64Array.of(3, 4), x);
    // By columns: 2 x1 = 3 and x0 = 4.
    expect(relativeDifference(x, [4, 1.5])).toBeLessThan(1e-11);
  });

  it('in block triangular form agree with a dense solve', () => {
    const random = seeded(6);
    const triplets: Triplet[] = [];
    // Three blocks of four, each full; couplings only from a block to the ones before it; rows and columns shuffled.
    const row = Array.from({ length: 12 }, (_, i) => (5 * i + 2) % 12);
    const column = Array.from({ length: 12 }, (_, i) => (7 * i + 4) % 12);
    for (let i = 0; i < 12; i++) {
      for (let j = 0; j < 12; j++) {
        if (i >> 2 === j >> 2 || (i >> 2 < j >> 2 && random() < 0.3))
          triplets.push([row[i]!, column[j]!, random() - 0.5]);
      }
    }
    const s = system(12, triplets, false, random);
    expectSolved(s, analyseGeneral(s.pattern));
  });

  it('with a column that no entry can give a pivot are singular whatever the values', () => {
    const s = system(
      3,
      [
        [0, 0, 1],
        [0, 1, 1],
        [0, 2, 1],
        [1, 1, 2],
        [1, 2, 1],
      ],
      false,
      seeded(1),
    );
    expect(analyseGeneral(s.pattern).refactor(s.values)).toMatchObject({ regular: false });
  });

  it('with two equal rows are singular', () => {
    const triplets: Triplet[] = [];
    for (const i of [0, 1]) for (const j of [0, 1, 2]) triplets.push([i, j, 0.1 * (j + 1)]);
    for (const j of [0, 1, 2]) triplets.push([2, j, (j - 1) ** 2]);
    const s = system(3, triplets, false, seeded(1));
    expect(analyseGeneral(s.pattern).refactor(s.values)).toMatchObject({ regular: false });
  });

  it('may be released: the next ones use their memory without harm', () => {
    const kept = shuffled(25, 77);
    const keeper = analyseGeneral(kept.pattern);
    keeper.refactor(kept.values);
    for (let seed = 1; seed <= 40; seed++) {
      const s = shuffled(5 + seed, seed);
      const other = analyseGeneral(s.pattern);
      expectSolved(s, other);
      other.release();
      expect(() => other.solve(s.b, s.b)).toThrow(Defect);
      expect(() => other.refactor(s.values)).toThrow(Defect);
    }
    const x = new Float64Array(25);
    keeper.solve(kept.b, x);
    expect(relativeDifference(x, reference(kept))).toBeLessThan(1e-8); // not refined, condition up to 1e6
  });
});
