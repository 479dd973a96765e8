/**
 * Modified nodal analysis with a dense matrix: the unknowns are the volts of every node, then the current of every branch
 * that has no finite conductance; the equations are the current rule at every node, then the own law of every such branch.
 */
import { type Branch, type BranchState, hasOwnCurrent } from './denseBranch.ts';
import type { Dense } from './denseLu.ts';
import { pieceEquation, softState } from './densePiece.ts';

export interface DenseNetwork {
  readonly nodeCount: number;
  readonly branches: readonly Branch[];
  /** One node of each connected group: 0 V. */
  readonly grounds: readonly number[];
  /** Branches of zero ohm that close a ring of such branches: their current is not determined, taken as 0. */
  readonly redundant: ReadonlySet<number>;
}

/** What the equations are written for. */
export interface Setting {
  /** Share of the powers that is drawn, 0 to 1. */
  readonly share: number;
  /** Fixed states of exact parts, or the sharpness of softened ones (see `pieceEquation`). */
  readonly parts: { readonly fixed: readonly BranchState[] } | { readonly sharp: number };
}

/** The equations at a point: what is left of each, their derivatives, and the piece that each piecewise branch is on. */
interface AtPoint {
  readonly residual: Float64Array;
  readonly jacobian: Dense;
  readonly states: readonly BranchState[];
}

type Slopes = readonly (readonly [column: number, slope: number])[];
interface Equation {
  readonly value: number;
  readonly slopes: Slopes;
}

export class DenseEquations {
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

  at(x: Float64Array, setting: Setting): AtPoint {
    const { network, size } = this;
    const residual = new Float64Array(size);
    const entries = new Float64Array(size * size);
    const grounded = new Set(network.grounds);
    const states = network.branches.map((branch, k): BranchState => {
      const { value: amps, slopes } = this.flow(x, k, setting.share);
      for (const [node, sign] of ends(branch)) {
        if (grounded.has(node)) continue;
        residual[node]! += sign * amps;
        for (const [column, slope] of slopes) entries[node * size + column]! += sign * slope;
      }
      if (this.currentIndex[k]! < 0) return 'none';
      const { state, ...own } = this.ownEquation(x, k, setting);
      residual[this.currentIndex[k]!] = own.value;
      for (const [column, slope] of own.slopes) entries[this.currentIndex[k]! * size + column]! += slope;
      return state;
    });
    for (const ground of network.grounds) {
      residual[ground] = x[ground]!;
      entries[ground * size + ground] = 1;
    }
    return { residual, jacobian: { size, entries }, states };
  }

  /** The current of a branch and its derivatives by unknown. */
  flow(x: Float64Array, k: number, share: number): Equation {
    const { a, b, law } = this.network.branches[k]!;
    const own = this.currentIndex[k]!;
    if (own >= 0) return { value: x[own]!, slopes: [[own, 1]] };
    const v = x[a]! - x[b]!;
    if (law.type === 'ohm') return { value: (v - law.emfV) / law.ohm, slopes: across(a, b, 1 / law.ohm) };
    if (law.type === 'amps') return { value: law.amps, slopes: [] };
    if (law.type === 'panel') return { value: law.curve.currentA(-v), slopes: across(a, b, -law.curve.slope(-v)) };
    if (share === 0) return { value: 0, slopes: [] };
    if (law.type === 'draw') return this.drawn({ x, k, share });
    if (law.type !== 'watts') throw new Error(`no current law for ${law.type}`);
    const watts = share * law.watts;
    return { value: watts / v, slopes: across(a, b, -watts / v ** 2) };
  }

  /** What the input of a converter draws for what its output gives. */
  private drawn({ x, k, share }: { readonly x: Float64Array; readonly k: number; readonly share: number }): Equation {
    const { a, b, law } = this.network.branches[k]!;
    if (law.type !== 'draw') throw new Error('only a draw follows its feed');
    const v = x[a]! - x[b]!;
    const out = this.network.branches[law.feed]!;
    const outIndex = this.currentIndex[law.feed]!;
    const outA = x[outIndex]!;
    const outV = x[out.b]! - x[out.a]!;
    const watts = share * (Math.max(outA * outV, 0) / law.efficiency + law.standbyW);
    const perOut = outA * outV > 0 ? share / (law.efficiency * v) : 0;
    const byOutput: Slopes = [[outIndex, perOut * outV], ...across(out.b, out.a, perOut * outA)];
    return { value: watts / v, slopes: [...across(a, b, -watts / v ** 2), ...byOutput] };
  }

  /** The equation that fixes a branch's own current, and which of its pieces was taken. */
  private ownEquation(x: Float64Array, k: number, { parts }: Setting): Equation & { readonly state: BranchState } {
    const branch = this.network.branches[k]!;
    const { a, b, law } = branch;
    const row = this.currentIndex[k]!;
    const i = x[row]!;
    const v = x[a]! - x[b]!;
    if (law.type === 'short' && this.network.redundant.has(k)) return { value: i, slopes: [[row, 1]], state: 'none' };
    if (law.type === 'short') return { value: v, slopes: across(a, b, 1), state: 'none' };
    if (law.type === 'hold') return { value: v - law.volts, slopes: across(a, b, 1), state: 'none' };
    if (law.type === 'warm') {
      const byCurrent = [row, -law.ohm - 3 * law.ohmPerA2 * i * i] as const;
      return {
        value: v - (law.ohm + law.ohmPerA2 * i * i) * i,
        slopes: [...across(a, b, 1), byCurrent],
        state: 'none',
      };
    }
    const sharp = 'sharp' in parts ? parts.sharp : undefined;
    const state = 'sharp' in parts ? softState({ branch, x, i, sharp: parts.sharp }) : parts.fixed[k]!;
    return { ...pieceEquation({ branch, x, i, row, state, sharp }), state };
  }
}

function ends({ a, b }: Branch): readonly (readonly [node: number, sign: 1 | -1])[] {
  return [
    [a, 1],
    [b, -1],
  ];
}

/** Derivatives of something that depends on V(a) - V(b). */
function across(a: number, b: number, slope: number): Slopes {
  return [
    [a, slope],
    [b, -slope],
  ];
}
