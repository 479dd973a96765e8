/** Low-rank updates against factoring the changed matrix anew. */
import { describe, expect, it } from 'vitest';
import { Defect } from '../../core/job/issue.ts';
import { analyseGeneral } from '../../core/linear/analyseGeneral.ts';
import { analyseSymmetric } from '../../core/linear/analyseSymmetric.ts';
import { branchChange, lowRankUpdate } from '../../core/linear/lowRankUpdate.ts';
import { branch, relativeDifference, seeded, shuffled, system, type Triplet, wiring } from './linearSystems.ts';

/** A changed branch of a few siemens in networks of a few siemens: the update loses two or three digits of sixteen. */
const AGREEMENT = 1e-10;

/** A tree of 40 junctions with six more branches that close loops, as triplets so that branches can be changed. */
function looped(): { branches: [number, number, number][]; triplets: Triplet[] } {
  const random = seeded(21);
  const branches: [number, number, number][] = [];
  for (let i = 1; i < 40; i++) branches.push([i, Math.floor(random() * i), 1 + 4 * random()]);
  for (let k = 0; k < 6; k++) branches.push([k, 39 - k, 1 + 4 * random()]);
  const triplets: Triplet[] = [[0, 0, 5]];
  for (const [i, j, g] of branches) triplets.push(...branch(i, j, g), [i, i, 0.05]);
  return { branches, triplets };
}

describe('one branch changed', () => {
  it('agrees with a full re-solve, for every branch made stronger, weaker or cut', () => {
    const { branches, triplets } = looped();
    const s = system(40, triplets, true, seeded(1));
    const base = analyseSymmetric(s.pattern);
    base.refactor(s.values);
    const again = analyseSymmetric(s.pattern);
    const [x, y, x0] = [new Float64Array(40), new Float64Array(40), new Float64Array(40)];
    base.solve(s.b, x0);
    for (const [i, j, g] of branches) {
      for (const change of [3 * g, -0.5 * g, -g]) {
        const changed = system(40, [...triplets, ...branch(i, j, change)], true, seeded(1));
        expect(again.refactor(changed.values).regular).toBe(true);
        again.solve(s.b, y);
        const update = lowRankUpdate(base, s.values, [branchChange(change, i, j)]);
        expect(update.regular).toBe(true);
        update.solve(s.b, x);
        expect(relativeDifference(x, y)).toBeLessThan(AGREEMENT);
        update.correct(x0, x);
        expect(relativeDifference(x, y)).toBeLessThan(AGREEMENT);
        expect(update.solveRefined(s.b, x).scaledResidual).toBeLessThan(1e-15);
      }
    }
  });

  it('to the reference agrees as well', () => {
    const { triplets } = looped();
    const s = system(40, triplets, true, seeded(1));
    const changed = system(40, [...triplets, [17, 17, 2.5]], true, seeded(1));
    const [base, again] = [analyseSymmetric(s.pattern), analyseSymmetric(s.pattern)];
    base.refactor(s.values);
    again.refactor(changed.values);
    const [x, y] = [s.b.slice(), s.b.slice()];
    lowRankUpdate(base, s.values, [branchChange(2.5, 17, null)]).solve(x, x);
    again.solve(y, y);
    expect(relativeDifference(x, y)).toBeLessThan(AGREEMENT);
  });

  it('that cuts off a part without a load is refused', () => {
    // 0 - 1 - 2, grounded at 0 only: without the branch 1 - 2, junction 2 floats.
    const s = system(3, [[0, 0, 1], ...branch(0, 1, 0.3), ...branch(1, 2, 0.7)], true, seeded(1));
    const base = analyseSymmetric(s.pattern);
    base.refactor(s.values);
    const update = lowRankUpdate(base, s.values, [branchChange(-0.7, 1, 2)]);
    expect(update.regular).toBe(false);
    expect(() => update.solve(s.b, s.b)).toThrow(Defect);
  });
});

describe('several changes at once', () => {
  it('agree with a full re-solve: three branches of very different strength', () => {
    const s = wiring(60, 8, 31);
    const changes = [branchChange(1e4, 3, 50), branchChange(2, 9, 41), branchChange(1e-3, 12, 30)];
    const full = s.full;
    for (const { weight, u } of changes) {
      const [i, j] = u.rows as [number, number];
      for (const [r, c, sign] of [
        [i, i, 1],
        [j, j, 1],
        [i, j, -1],
        [j, i, -1],
      ] as const)
        full.set(r, c, full.get(r, c) + sign * weight);
    }
    const triplets: Triplet[] = [];
    for (let i = 0; i < 60; i++)
      for (let j = i; j < 60; j++) if (full.get(i, j) !== 0) triplets.push([i, j, full.get(i, j)]);
    const changed = system(60, triplets, true, seeded(1));
    const again = analyseSymmetric(changed.pattern);
    again.refactor(changed.values);
    const base = analyseSymmetric(s.pattern);
    base.refactor(s.values);
    const [x, y] = [new Float64Array(60), new Float64Array(60)];
    lowRankUpdate(base, s.values, changes).solve(s.b, x);
    again.solve(s.b, y);
    expect(relativeDifference(x, y)).toBeLessThan(AGREEMENT);
  });

  it('on a general matrix, rows and columns apart', () => {
    const s = shuffled(20, 5);
    const base = analyseGeneral(s.pattern);
    base.refactor(s.values);
    const changes = [
      { weight: 0.7, u: { rows: [2, 5], coefficients: [1, -2] }, v: { rows: [11], coefficients: [1] } },
      { weight: -0.4, u: { rows: [7], coefficients: [1] }, v: { rows: [0, 3], coefficients: [1, 1] } },
    ];
    const update = lowRankUpdate(base, s.values, changes);
    const x = new Float64Array(20);
    expect(update.solveRefined(s.b, x).scaledResidual).toBeLessThan(1e-15);
    // b - (A + Σ weight u vᵀ) x, worked out on the full matrix.
    const full = s.full;
    for (const { weight, u, v } of changes) {
      u.rows.forEach((i, p) => {
        v.rows.forEach((j, q) => {
          full.set(i, j, full.get(i, j) + weight * u.coefficients[p]! * v.coefficients[q]!);
        });
      });
    }
    for (let i = 0; i < 20; i++) {
      let r = s.b[i]!;
      for (let j = 0; j < 20; j++) r -= full.get(i, j) * x[j]!;
      expect(Math.abs(r)).toBeLessThan(1e-13); // twenty products of size one, each rounded
    }
  });
});
