/** Newton's steps on the dense equations, damped where a whole step would lead away. */
import type { BranchState } from './denseBranch.ts';
import type { DenseEquations, Setting } from './denseEquations.ts';
import { solveExactly, solveQuickly } from './denseLu.ts';

/** All unknowns, and the piece that each piecewise branch is on. */
export interface Found {
  readonly x: Float64Array;
  readonly states: readonly BranchState[];
}

const MOST_STEPS = 30;
/** Remainder, A or V, below which full steps are always taken: what is left is rounding. */
const NEAR = 1e-6;

/** Undefined where the steps do not settle or the matrix is singular. */
export function newton(equations: DenseEquations, start: Float64Array, setting: Setting): Found | undefined {
  const softened = 'sharp' in setting.parts;
  let x: Float64Array = Float64Array.from(start);
  let settled = 0;
  for (let step = 0; step < MOST_STEPS; step++) {
    const { residual, jacobian, states } = equations.at(x, setting);
    const delta = (softened ? solveQuickly : solveExactly)(jacobian, residual);
    if (delta === undefined) return undefined;
    const before = length(residual);
    const { x: next, factor } = descend(equations, { x, delta, before, setting });
    x = next;
    const scale = Math.max(1, ...x.subarray(0, equations.network.nodeCount).map(Math.abs));
    const moved = Math.max(...delta.map(Math.abs)) / scale;
    // A node between two blocking parts jitters by far more than rounding: there the remainder must tell.
    const still = moved < 1e-9 || (step > 5 && before < 1e-8);
    settled = factor === 1 && still ? settled + 1 : 0;
    // While softened, near is enough; at the end one more step after it has settled refines the last digits.
    if (settled === (softened ? 1 : 2)) return { x, states };
  }
  return undefined;
}

/** How all unknowns move per unit added to the right side of one equation. */
export function sensitivity(equations: DenseEquations, at: Found, row: number): Float64Array {
  const { jacobian } = equations.at(at.x, { share: 1, parts: { fixed: at.states } });
  const unit = new Float64Array(equations.size);
  unit[row] = 1;
  const moved = solveExactly(jacobian, unit);
  if (moved === undefined) throw new Error('no sensitivity at a singular point');
  return moved;
}

/** As much of a Newton step as brings the equations nearer to their solution. */
function descend(
  equations: DenseEquations,
  from: {
    readonly x: Float64Array;
    readonly delta: Float64Array;
    readonly before: number;
    readonly setting: Setting;
  },
): { readonly x: Float64Array; readonly factor: number } {
  const along = (factor: number) => from.x.map((value, k) => value - factor * from.delta[k]!);
  const whole = damping(equations, from);
  for (let factor = whole; factor > whole / 20; factor /= 2) {
    const x = along(factor);
    if (from.before < NEAR || length(equations.at(x, from.setting).residual) < from.before) return { x, factor };
  }
  return { x: along(whole), factor: whole };
}

/** No constant-power part may lose more than half its volts in one step, no panel jump to open circuit or far below. */
function damping(
  equations: DenseEquations,
  { x, delta }: { readonly x: Float64Array; readonly delta: Float64Array },
): number {
  let factor = 1;
  for (const { a, b, law } of equations.network.branches) {
    const v = x[a]! - x[b]!;
    const dv = delta[a]! - delta[b]!;
    if ((law.type === 'watts' || law.type === 'draw') && v > 0 && dv > 0.5 * v) {
      factor = Math.min(factor, (0.5 * v) / dv);
    }
    if (law.type === 'panel') {
      const { openCircuitV } = law.curve;
      const roomV = openCircuitV + v;
      if (roomV > 1e-3 * openCircuitV && dv >= roomV) factor = Math.min(factor, (0.9 * roomV) / dv);
      if (-dv > 0.2 * openCircuitV) factor = Math.min(factor, (0.2 * openCircuitV) / -dv);
    }
  }
  return factor;
}

function length(residual: Float64Array): number {
  return Math.sqrt(residual.reduce((sum, value) => sum + value * value, 0));
}
