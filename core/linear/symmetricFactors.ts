/** The numbers of an L D Lᵀ factorisation, laid out by its plan. */
import { Defect } from '../job/issue.ts';
import { inspectPivots } from './inspectPivots.ts';
import { type BlockLayout, layOutBlock, writeBlock } from './kernelBlock.ts';
import type { FactorReport, FusedFactorisation, Pattern } from './matrix.ts';
import { residence, type Tenant } from './residence.ts';
import { giveBackInts, giveBackNumbers, takeNumbers } from './slab.ts';
import type { SymmetricPlan } from './symmetricPlan.ts';
import { eliminate, solveBackward, solveForward } from './symmetricSteps.ts';

const NO_NUMBERS = new Float64Array(0);

/**
 * The first factorisation runs in plain JavaScript: it may be the only one. From the second on the work moves to a compiled kernel, once
 * there is one (see `Residence`). Both give the same bits.
 */
export class SymmetricFactors implements FusedFactorisation, Tenant {
  readonly pattern: Pattern;
  private readonly plan: SymmetricPlan;
  /**
   * At least plan.storage long. First size + 1: the diagonal d, after elimination 1/d. Next size + 1: the right-hand side, then the solution.
   * Then the off-diagonal entries, after elimination those of L. Lies in the kernel's memory while this is resident there.
   */
  private w: Float64Array;
  private readonly report = { regular: false, negativePivots: 0, failedColumn: -1 };
  private readonly plain: boolean;
  private used = false;
  private released = false;
  /** Where this lives in the kernel's memory, or -1. */
  private address = -1;
  private layout: BlockLayout | null = null;
  /** Parts of the kernel's memory: the right-hand side and solution, and the values of the matrix. */
  private y = NO_NUMBERS;
  private values = NO_NUMBERS;

  /** `plain` keeps to plain JavaScript. */
  constructor(plan: SymmetricPlan, plain = false) {
    this.plain = plain;
    this.pattern = plan.pattern;
    this.plan = plan;
    this.w = takeNumbers(plan.storage);
  }

  refactor(values: Float64Array): FactorReport {
    this.expect(values, this.pattern.rowIndices.length);
    if (this.moveIn()) {
      this.values.set(values);
      if (residence.functions!['refactor']!(this.address) === 1) return this.allWell();
      return this.inspect(values);
    }
    this.load(values);
    eliminate(this.plan, this.w);
    return this.inspect(values);
  }

  solve(b: Float64Array, x: Float64Array): void {
    if (!this.report.regular) throw new Defect('a regular factorisation before a solve');
    this.expect(b, this.pattern.size);
    this.expect(x, this.pattern.size);
    if (this.address >= 0) {
      this.y.set(b);
      // The place behind the right-hand side stands for known volts: what an earlier, hopeless matrix left there must go.
      this.w[2 * this.pattern.size + 1] = 0;
      residence.functions!['solve']!(this.address);
      x.set(this.y);
      return;
    }
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

  refactorAndSolve(values: Float64Array, b: Float64Array, x: Float64Array): FactorReport {
    this.expect(values, this.pattern.rowIndices.length);
    this.expect(b, this.pattern.size);
    this.expect(x, this.pattern.size);
    if (this.moveIn()) return this.refactorAndSolveResident(values, b, x);
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

  private refactorAndSolveResident(values: Float64Array, b: Float64Array, x: Float64Array): FactorReport {
    const kernel = residence.functions!;
    this.values.set(values);
    this.y.set(b);
    if (kernel['refactorAndSolve']!(this.address) === 1) {
      x.set(this.y);
      return this.allWell();
    }
    const report = this.inspect(values);
    if (report.regular) {
      kernel['substitute']!(this.address);
      x.set(this.y);
    } else x.fill(0, 0, this.pattern.size);
    return report;
  }

  /** An array of another length would be copied over its neighbours. */
  private expect(array: Float64Array, length: number): void {
    if (array.length !== length) throw new Defect(`an array of length ${length}, not ${array.length}`);
  }

  private load(values: Float64Array): void {
    const { table, slots, storage, pattern } = this.plan;
    const { w } = this;
    residence.notePlainWork(storage);
    w.fill(0, 0, storage);
    const count = pattern.rowIndices.length;
    for (let e = 0; e < count; e++) w[table[slots + e]!] = values[e]!;
  }

  private allWell(): FactorReport {
    const { report } = this;
    report.regular = true;
    report.negativePivots = 0;
    report.failedColumn = -1;
    return report;
  }

  private inspect(values: Float64Array): FactorReport {
    inspectPivots(this.plan, this.w, values, this.report);
    return this.report;
  }

  /** Whether this is in the kernel's memory; moves there if this is not the first use. */
  private moveIn(): boolean {
    if (this.released) throw new Defect('no use of a factorisation after its release');
    if (this.address >= 0) return true;
    if (this.plain || !this.used) {
      this.used = true;
      return false;
    }
    this.layout ??= layOutBlock(this.plan, 1);
    const { parts, bytes } = this.layout;
    const address = residence.admit(this, bytes);
    if (address < 0) return false;
    const { buffer } = residence;
    writeBlock(this.plan, this.layout, buffer, address);
    giveBackNumbers(this.w);
    this.w = new Float64Array(buffer, address + parts.w, this.plan.storage);
    this.y = new Float64Array(buffer, address + parts.y, this.pattern.size);
    this.values = new Float64Array(buffer, address + parts.values, this.pattern.rowIndices.length);
    this.address = address;
    return true;
  }

  leave(): void {
    if (this.released) return;
    const own = takeNumbers(this.plan.storage);
    own.set(this.w);
    this.w = own;
    this.address = -1;
  }

  release(): void {
    if (this.released) return;
    this.released = true;
    this.report.regular = false;
    giveBackInts(this.plan.table);
    if (this.address < 0) giveBackNumbers(this.w);
  }
}
