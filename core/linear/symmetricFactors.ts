/** The numbers of an L D Lᵀ factorisation, laid out by its plan. */
import { Defect } from '../job/issue.ts';
import type { Factorisation, FactorReport, Pattern } from './matrix.ts';
import { inspectPivots } from './inspectPivots.ts';
import { eliminate, solveBackward, solveForward } from './symmetricSteps.ts';
import type { SymmetricPlan } from './symmetricPlan.ts';

export class SymmetricFactors implements Factorisation {
  readonly pattern: Pattern;
  private readonly plan: SymmetricPlan;
  /**
   * Length plan.storage. First size + 1: the diagonal d, after elimination 1/d. Next size + 1: the right-hand side, then the solution.
   * Then the off-diagonal entries, after elimination those of L.
   */
  private readonly w: Float64Array;
  private readonly report = { regular: false, negativePivots: 0, failedColumn: -1 };

  constructor(plan: SymmetricPlan) {
    this.pattern = plan.pattern;
    this.plan = plan;
    this.w = new Float64Array(plan.storage);
  }

  refactor(values: Float64Array): FactorReport {
    this.load(values);
    eliminate(this.plan, this.w);
    return this.inspect(values);
  }

  solve(b: Float64Array, x: Float64Array): void {
    if (!this.report.regular) throw new Defect('a regular factorisation before a solve');
    const { w } = this;
    const { size } = this.pattern;
    w.set(b, size + 1);
    solveForward(this.plan, w);
    solveBackward(this.plan, w);
    for (let i = 0; i < size; i++) x[i] = w[size + 1 + i]!;
  }

  solveTransposed(b: Float64Array, x: Float64Array): void {
    this.solve(b, x);
  }

  /** `refactor(values)` and `solve(b, x)` in one sweep. When the matrix is singular x is set to zero. */
  refactorAndSolve(values: Float64Array, b: Float64Array, x: Float64Array): FactorReport {
    const { w } = this;
    const { size } = this.pattern;
    this.load(values);
    w.set(b, size + 1);
    eliminate(this.plan, w);
    const report = this.inspect(values);
    if (!report.regular) x.fill(0, 0, size);
    else {
      solveBackward(this.plan, w);
      for (let i = 0; i < size; i++) x[i] = w[size + 1 + i]!;
    }
    return report;
  }

  private load(values: Float64Array): void {
    const { table, slots } = this.plan;
    const { w } = this;
    w.fill(0);
    const count = table.length - slots;
    for (let e = 0; e < count; e++) w[table[slots + e]!] = values[e]!;
  }

  private inspect(values: Float64Array): FactorReport {
    inspectPivots(this.plan, this.w, values, this.report);
    return this.report;
  }
}
