/** Many systems of one symmetric pattern, LANES at a time. */
import { Defect } from '../job/issue.ts';
import { inspectPivots, type PivotReport } from './inspectPivots.ts';
import { layOutBlock, writeBlock } from './kernelBlock.ts';
import type { FactorReport, Pattern } from './matrix.ts';
import { SymmetricFactors } from './symmetricFactors.ts';
import { batchProgram, LANES } from './symmetricKernel.ts';
import { type SymmetricPlan, symmetricPlan } from './symmetricPlan.ts';
import { PAGE, type WasmKernel } from './webAssembly.ts';

/** Room for `lanes` systems side by side, to be filled, solved and read again and again. */
export interface Batch {
  readonly pattern: Pattern;
  readonly lanes: number;
  /** Entry e of system s stands at e * lanes + s, and is kept. */
  readonly values: Float64Array;
  /** Row i of system s stands at i * lanes + s: the right-hand side going in, the solution coming out. Zero where a system is singular. */
  readonly unknowns: Float64Array;
  /**
   * Factors and solves the first `count` systems (all, if not given); the others' numbers are lost. Each system comes out bit for bit as from
   * `analyseSymmetric(pattern).refactorAndSolve`. The reports are written anew by each call.
   */
  refactorAndSolve(count?: number): readonly FactorReport[];
}

/** Analyses a symmetric pattern for batches. `plain` keeps to plain JavaScript, as where compiled code is forbidden. */
export function analyseBatch(pattern: Pattern, { plain = false }: { readonly plain?: boolean } = {}): Batch {
  if (!pattern.symmetric) throw new Defect('a symmetric pattern for a batch');
  const plan = symmetricPlan(pattern);
  const layout = layOutBlock(plan, LANES);
  const kernel = plain ? null : batchProgram.instantiate(Math.ceil(layout.bytes / PAGE));
  if (kernel === null) return new PlainBatch(plan);
  writeBlock(plan, layout, kernel.memory.buffer, 0);
  return new CompiledBatch(plan, kernel, layout.parts);
}

function emptyReports(): PivotReport[] {
  return Array.from({ length: LANES }, () => ({ regular: false, negativePivots: 0, failedColumn: -1 }));
}

class CompiledBatch implements Batch {
  readonly pattern: Pattern;
  readonly lanes = LANES;
  readonly values: Float64Array;
  readonly unknowns: Float64Array;
  private readonly plan: SymmetricPlan;
  private readonly kernel: WasmKernel;
  /** The numbers of all systems, and room for those of one. */
  private readonly w: Float64Array;
  private readonly one: Float64Array;
  private readonly oneValues: Float64Array;
  private readonly reports = emptyReports();

  constructor(plan: SymmetricPlan, kernel: WasmKernel, parts: { w: number; y: number; values: number }) {
    const { size, rowIndices } = plan.pattern;
    const { buffer } = kernel.memory;
    this.pattern = plan.pattern;
    this.plan = plan;
    this.kernel = kernel;
    this.w = new Float64Array(buffer, parts.w, LANES * plan.storage);
    this.unknowns = new Float64Array(buffer, parts.y, LANES * size);
    this.values = new Float64Array(buffer, parts.values, LANES * rowIndices.length);
    this.one = new Float64Array(plan.storage);
    this.oneValues = new Float64Array(rowIndices.length);
  }

  refactorAndSolve(count: number = LANES): readonly FactorReport[] {
    repeatFirst(this.values, count);
    const sound = this.kernel.functions['refactorAndSolve']!(0) === 1;
    if (!sound) this.kernel.functions['substitute']!(0);
    for (let s = 0; s < count; s++) {
      const report = this.reports[s]!;
      if (sound) {
        report.regular = true;
        report.negativePivots = 0;
        report.failedColumn = -1;
      } else this.inspect(s, report);
    }
    return this.reports;
  }

  private inspect(s: number, report: PivotReport): void {
    takeLane(this.w, s, this.one);
    takeLane(this.values, s, this.oneValues);
    inspectPivots(this.plan, this.one, this.oneValues, report);
    if (!report.regular) for (let i = 0; i < this.pattern.size; i++) this.unknowns[i * LANES + s] = 0;
  }
}

/** The same without compiled code: one system after another. */
class PlainBatch implements Batch {
  readonly pattern: Pattern;
  readonly lanes = LANES;
  readonly values: Float64Array;
  readonly unknowns: Float64Array;
  private readonly factors: SymmetricFactors;
  private readonly one: Float64Array;
  private readonly x: Float64Array;
  private readonly reports = emptyReports();

  constructor(plan: SymmetricPlan) {
    const { size, rowIndices } = plan.pattern;
    this.pattern = plan.pattern;
    this.factors = new SymmetricFactors(plan, true);
    this.values = new Float64Array(LANES * rowIndices.length);
    this.unknowns = new Float64Array(LANES * size);
    this.one = new Float64Array(rowIndices.length);
    this.x = new Float64Array(size);
  }

  refactorAndSolve(count: number = LANES): readonly FactorReport[] {
    for (let s = 0; s < count; s++) {
      takeLane(this.values, s, this.one);
      takeLane(this.unknowns, s, this.x);
      const report = this.factors.refactorAndSolve(this.one, this.x, this.x);
      Object.assign(this.reports[s]!, report);
      for (let i = 0; i < this.x.length; i++) this.unknowns[i * LANES + s] = this.x[i]!;
    }
    return this.reports;
  }
}

/** Copies system s out of a set of all. */
function takeLane(all: Float64Array, s: number, one: Float64Array): void {
  for (let i = 0; i < one.length; i++) one[i] = all[i * LANES + s]!;
}

/** Fills the lanes that are not used with the first system, so that they cannot stop the others. */
function repeatFirst(values: Float64Array, count: number): void {
  if (count === LANES) return;
  for (let at = 0; at < values.length; at += LANES) values.fill(values[at]!, at + count, at + LANES);
}
