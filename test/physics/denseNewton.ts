/**
 * Modified nodal analysis with a dense matrix: unknowns are the volts of every node, then the current of every branch that
 * has no finite conductance. Newton steps. The states of piecewise parts (diodes, chargers …) are found by softening them,
 * sharpening step by step, and then solved exactly and checked against their own inequalities.
 */
import { type Branch, type BranchState, hasOwnCurrent, hasStates } from './denseBranch.ts';
import { type Dense, solveExactly, solveQuickly } from './denseLu.ts';
import { contradiction, pieceEquation, softState } from './densePiece.ts';

export interface DenseNetwork {
  readonly nodeCount: number;
  readonly branches: readonly Branch[];
  /** One node of each connected group: 0 V. */
  readonly grounds: readonly number[];
  /** Branches of zero ohm that close a ring of such branches: their current is not determined, taken as 0. */
  readonly redundant: ReadonlySet<number>;
}

export interface DenseSolution {
  readonly volts: Float64Array;
  /** By branch. */
  readonly amps: Float64Array;
  readonly states: readonly BranchState[];
}

/** Sharpness of softened parts, see `pieceEquation`: from the first to the last each solution is a good start for the next. */
const SOFTEST = 1;
const SHARPEST = 1e4;
const MOST_STEPS = 30;
/** Remainder, A or V, below which full steps are always taken: what is left is rounding. */
const NEAR = 1e-6;

const MOST_PIVOTS = 40;
const DIRECT_STATES: readonly BranchState[] = ['middle', 'held', 'lower'];

/** All unknowns, and the piece that each piecewise branch is on. */
export interface Found {
  readonly x: Float64Array;
  readonly states: readonly BranchState[];
}

interface Settings {
  /** Share of the powers that is drawn, 0 to 1. */
  readonly share: number;
  /** Fixed states of exact parts, or the sharpness of softened ones. */
  readonly parts: { readonly fixed: readonly BranchState[] } | { readonly sharp: number };
}

/** One set of equations at a point: residual, and Jacobian row by row. */
interface Equations {
  readonly residual: Float64Array;
  readonly jacobian: Dense;
  readonly states: BranchState[];
}

export class DenseSolver {
  readonly network: DenseNetwork;
  readonly size: number;
  /** Index of a branch's own current among the unknowns, or -1. */
  readonly currentIndex: Int32Array;

  constructor(network: DenseNetwork) {
    this.network = network;
    this.currentIndex = new Int32Array(network.branches.length).fill(-1);
    let size = network.nodeCount;
    network.branches.forEach((branch, k) => {
      if (hasOwnCurrent(branch.law)) this.currentIndex[k] = size++;
    });
    this.size = size;
  }

  /**
   * Solves from `start` (all unknowns); undefined where Newton does not settle or the states go on contradicting themselves.
   * A start that is a solution for a smaller share brings its states; without them they are searched from soft to sharp.
   */
  solve(
    start: Float64Array,
    wanted: { readonly share: number; readonly states?: readonly BranchState[] },
  ): Found | undefined {
    const { share, states } = wanted;
    if (states !== undefined) {
      const guessed = this.pivot(start, { share, states: this.readyToGive(start, states) });
      if (guessed !== undefined) return guessed;
      const near = this.newton(start, { share, parts: { sharp: SHARPEST } });
      const found = near && this.pivot(near.x, { share, states: near.states });
      if (found !== undefined) return found;
    }
    const plain = this.network.branches.map((): BranchState => 'none');
    if (!this.network.branches.some(({ law }) => hasStates(law))) return this.pivot(start, { share, states: plain });
    const softened = this.sharpen(start, share);
    return softened && this.pivot(softened.x, { share, states: softened.states });
  }

  /** A source that gives nothing only because nothing is drawn stands at its set point all the same. */
  private readyToGive(x: Float64Array, states: readonly BranchState[]): readonly BranchState[] {
    return states.map((state, k) => {
      const { a, b, law } = this.network.branches[k]!;
      return law.type === 'feed' && Math.abs(x[b]! - x[a]! - law.setpointV) < 1e-6 ? 'middle' : state;
    });
  }

  /** Softened parts, made sharper by a factor that shrinks where a step does not settle and grows where it does. */
  private sharpen(start: Float64Array, share: number): Found | undefined {
    let at = this.newton(start, { share, parts: { sharp: SOFTEST } });
    let sharp = SOFTEST;
    for (let factor = 10; at !== undefined && sharp < SHARPEST; ) {
      const next = this.newton(at.x, { share, parts: { sharp: sharp * factor } });
      if (next === undefined) {
        factor = Math.sqrt(factor);
        if (factor < 1.05) return undefined;
      } else {
        at = next;
        sharp *= factor;
        factor = Math.min(factor * factor, 10);
      }
    }
    return at;
  }

  /**
   * With states fixed, exact. Where a solution contradicts its states, tries them all flipped, then one by one;
   * a set of states that has no solution, or was seen before, is a dead end.
   */
  private pivot(
    start: Float64Array,
    from: { readonly share: number; readonly states: readonly BranchState[] },
  ): Found | undefined {
    const seen = new Set<string>();
    const waiting: Found[] = [{ x: start, states: from.states }];
    while (waiting.length > 0 && seen.size < MOST_PIVOTS) {
      const guess = waiting.pop()!;
      if (seen.has(guess.states.join())) continue;
      seen.add(guess.states.join());
      const solved = this.newton(guess.x, { share: from.share, parts: { fixed: guess.states } });
      if (solved === undefined) {
        // No current of its array may hold a direct controller's set point, or join it to the rest: any other state may.
        guess.states.forEach((state, k) => {
          if (this.network.branches[k]!.law.type !== 'pass') return;
          const others = DIRECT_STATES.filter((other) => other !== state);
          for (const other of others) waiting.unshift({ x: start, states: flipped(guess.states, [[k, other]]) });
          if (state === 'held') waiting.push({ x: start, states: flipped(guess.states, [[k, 'lower']]) });
        });
        continue;
      }
      const wrong = this.contradictions(solved.x, guess.states);
      if (wrong.length === 0) return solved;
      const choices = [...wrong.map((flip) => [flip]), wrong];
      // Wrong states may have absurd solutions (a limited source with no load): no place to start from.
      for (const flips of choices) waiting.push({ x: start, states: flipped(guess.states, flips) });
    }
    return undefined;
  }

  /** How all unknowns move per unit added to the right side of one equation. */
  sensitivity(at: { readonly x: Float64Array; readonly states: readonly BranchState[] }, row: number): Float64Array {
    const { jacobian } = this.equations(at.x, { share: 1, parts: { fixed: at.states } });
    const unit = new Float64Array(this.size);
    unit[row] = 1;
    const moved = solveExactly(jacobian, unit);
    if (moved === undefined) throw new Error('no sensitivity at a singular point');
    return moved;
  }

  branchAmps(x: Float64Array, k: number, share: number): number {
    return this.flow(x, k, share).amps;
  }

  private newton(start: Float64Array, settings: Settings): Found | undefined {
    let x: Float64Array = Float64Array.from(start);
    let settled = 0;
    for (let step = 0; step < MOST_STEPS; step++) {
      const equations = this.equations(x, settings);
      const solve = 'sharp' in settings.parts ? solveQuickly : solveExactly;
      const delta = solve(equations.jacobian, equations.residual);
      if (delta === undefined) return undefined;
      const remainder = length(equations.residual);
      const { x: next, factor } = this.descend({ x, delta, before: remainder }, settings);
      x = next;
      const scale = Math.max(1, ...x.subarray(0, this.network.nodeCount).map(Math.abs));
      const moved = Math.max(...delta.map(Math.abs)) / scale;
      // A node between two blocking parts jitters by far more than rounding: there the remainder must tell.
      const still = moved < 1e-9 || (step > 5 && remainder < 1e-8);
      settled = factor === 1 && still ? settled + 1 : 0;
      // While softened, near is enough; at the end one more step after it has settled refines the last digits.
      if (settled === ('sharp' in settings.parts ? 1 : 2)) return { x, states: equations.states };
    }
    return undefined;
  }

  /** As much of a Newton step as brings the equations nearer to their solution. */
  private descend(
    from: { readonly x: Float64Array; readonly delta: Float64Array; readonly before: number },
    settings: Settings,
  ): { x: Float64Array; factor: number } {
    const along = (factor: number) => from.x.map((value, k) => value - factor * from.delta[k]!);
    const whole = this.damping(from.x, from.delta);
    for (let factor = whole; factor > whole / 20; factor /= 2) {
      const x = along(factor);
      if (from.before < NEAR || length(this.equations(x, settings).residual) < from.before) return { x, factor };
    }
    return { x: along(whole), factor: whole };
  }

  /** No constant-power part may lose more than half its volts in one step, no panel jump to open circuit or far below. */
  private damping(x: Float64Array, delta: Float64Array): number {
    let factor = 1;
    for (const { a, b, law } of this.network.branches) {
      const v = x[a]! - x[b]!;
      const dv = delta[a]! - delta[b]!;
      if ((law.type === 'watts' || law.type === 'draw') && v > 0 && dv > 0.5 * v)
        factor = Math.min(factor, (0.5 * v) / dv);
      if (law.type === 'panel') {
        const { openCircuitV } = law.curve;
        const roomV = openCircuitV + v;
        if (roomV > 1e-3 * openCircuitV && dv >= roomV) factor = Math.min(factor, (0.9 * roomV) / dv);
        if (-dv > 0.2 * openCircuitV) factor = Math.min(factor, (0.2 * openCircuitV) / -dv);
      }
    }
    return factor;
  }

  private equations(x: Float64Array, settings: Settings): Equations {
    const { network, size } = this;
    const residual = new Float64Array(size);
    const jacobian: Dense = { size, entries: new Float64Array(size * size) };
    const { entries } = jacobian;
    const states: BranchState[] = network.branches.map(() => 'none');
    const grounded = new Set(network.grounds);
    network.branches.forEach((branch, k) => {
      const flow = this.flow(x, k, settings.share);
      for (const [node, sign] of [
        [branch.a, 1],
        [branch.b, -1],
      ] as const) {
        if (grounded.has(node)) continue;
        residual[node]! += sign * flow.amps;
        for (const [column, slope] of flow.slopes) {
          entries[node * size + column]! += sign * slope;
        }
      }
      if (this.currentIndex[k]! >= 0) states[k] = this.ownEquation({ x, k, settings, residual, jacobian });
    });
    for (const ground of network.grounds) {
      residual[ground] = x[ground]!;
      entries[ground * size + ground] = 1;
    }
    return { residual, jacobian, states };
  }

  /** The current of a branch and its derivatives by unknown. */
  private flow(
    x: Float64Array,
    k: number,
    share: number,
  ): { amps: number; slopes: readonly (readonly [number, number])[] } {
    const { a, b, law } = this.network.branches[k]!;
    const own = this.currentIndex[k]!;
    if (own >= 0) return { amps: x[own]!, slopes: [[own, 1]] };
    const v = x[a]! - x[b]!;
    const both = (slope: number) =>
      [
        [a, slope],
        [b, -slope],
      ] as const;
    if (law.type === 'ohm') return { amps: (v - law.emfV) / law.ohm, slopes: both(1 / law.ohm) };
    if (law.type === 'amps') return { amps: law.amps, slopes: [] };
    if (share === 0 && (law.type === 'watts' || law.type === 'draw')) return { amps: 0, slopes: [] };
    if (law.type === 'watts') return { amps: (share * law.watts) / v, slopes: both((-share * law.watts) / v ** 2) };
    if (law.type === 'panel') return { amps: law.curve.currentA(-v), slopes: both(-law.curve.slope(-v)) };
    if (law.type !== 'draw') throw new Error(`no current law for ${law.type}`);
    const out = this.network.branches[law.feed]!;
    const outA = x[this.currentIndex[law.feed]!]!;
    const outV = x[out.b]! - x[out.a]!;
    const watts = share * (Math.max(outA * outV, 0) / law.efficiency + law.standbyW);
    const perOut = outA * outV > 0 ? share / (law.efficiency * v) : 0;
    return {
      amps: watts / v,
      slopes: [
        ...both(-watts / v ** 2),
        [this.currentIndex[law.feed]!, perOut * outV],
        [out.b, perOut * outA],
        [out.a, -perOut * outA],
      ],
    };
  }

  /** The equation that fixes a branch's own current; answers which of its equations was taken. */
  private ownEquation(at: {
    readonly x: Float64Array;
    readonly k: number;
    readonly settings: Settings;
    readonly residual: Float64Array;
    readonly jacobian: Dense;
  }): BranchState {
    const { x, k, settings, residual, jacobian } = at;
    const { a, b, law } = this.network.branches[k]!;
    const row = this.currentIndex[k]!;
    const i = x[row]!;
    const v = x[a]! - x[b]!;
    const write = (value: number, slopes: readonly (readonly [number, number])[]): void => {
      residual[row] = value;
      for (const [column, slope] of slopes) jacobian.entries[row * jacobian.size + column]! += slope;
    };
    if (law.type === 'short') {
      if (this.network.redundant.has(k)) write(i, [[row, 1]]);
      else
        write(v, [
          [a, 1],
          [b, -1],
        ]);
      return 'none';
    }
    if (law.type === 'hold') {
      write(v - law.volts, [
        [a, 1],
        [b, -1],
      ]);
      return 'none';
    }
    if (law.type === 'warm') {
      write(v - (law.ohm + law.ohmPerA2 * i * i) * i, [
        [a, 1],
        [b, -1],
        [row, -law.ohm - 3 * law.ohmPerA2 * i * i],
      ]);
      return 'none';
    }
    const { parts } = settings;
    const state =
      'sharp' in parts ? softState({ branch: this.network.branches[k]!, x, i, sharp: parts.sharp }) : parts.fixed[k]!;
    const { value, slopes } = pieceEquation({
      branch: this.network.branches[k]!,
      x,
      i,
      row,
      state,
      sharp: 'sharp' in parts ? parts.sharp : undefined,
    });
    write(value, slopes);
    return state;
  }

  /** Branches whose state is not borne out by the solution, with the state they should take. */
  private contradictions(x: Float64Array, states: readonly BranchState[]): (readonly [number, BranchState])[] {
    return this.network.branches.flatMap((branch, k) => {
      if (!hasStates(branch.law)) return [];
      const next = contradiction({ branch, x, i: x[this.currentIndex[k]!]! }, states[k]!);
      return next === undefined ? [] : [[k, next] as const];
    });
  }
}

function flipped(
  states: readonly BranchState[],
  flips: readonly (readonly [number, BranchState])[],
): readonly BranchState[] {
  const next = new Map(flips);
  return states.map((state, k) => next.get(k) ?? state);
}

function length(residual: Float64Array): number {
  return Math.sqrt(residual.reduce((sum, value) => sum + value * value, 0));
}
