/**
 * The equations of the piecewise branches, and whether a solution bears out the piece that was taken.
 *
 * While states are searched the parts are softened by a `sharp`ness: `1 / sharp` ohms in their middle, `1 / sharp` siemens
 * of leak elsewhere. Exact parts have none of either but a leak far below what any test can see.
 */
import type { Branch, BranchState } from './denseBranch.ts';

/** Leak of a blocking part, S: keeps a node between two blocking parts from floating; 20 V through it is 2e-14 A. */
const LEAK_S = 1e-15;
/** A nanovolt, a nanoamp beyond the edge is rounding. */
const EDGE = 1e-9;

type Slopes = readonly (readonly [column: number, slope: number])[];

interface At {
  readonly branch: Branch;
  readonly x: Float64Array;
  /** The branch's own current. */
  readonly i: number;
}

/** Limit and gap of a branch: a positive gap asks for current; on the middle piece gap = slope · i. */
interface Piece {
  readonly limitA: number;
  readonly limitSlopes: Slopes;
  readonly gapV: number;
  readonly gapSlopes: Slopes;
  readonly slopeOhm: number;
}

function pieceOf({ branch, x }: Omit<At, 'i'>, state: BranchState): Piece {
  const { a, b, law } = branch;
  const v = x[a]! - x[b]!;
  const across = [
    [a, 1],
    [b, -1],
  ] as const;
  if (law.type === 'diode') {
    return { limitA: Infinity, limitSlopes: [], gapV: v - law.forwardV, gapSlopes: across, slopeOhm: law.slopeOhm };
  }
  if (law.type === 'pass') {
    const limit = { limitA: law.outputA, limitSlopes: [], slopeOhm: 0 };
    if (state !== 'held') return { ...limit, gapV: v, gapSlopes: across };
    return {
      ...limit,
      gapV: roomBelowSetpoint({ branch, x }),
      gapSlopes: [
        [b, -1],
        [law.outMinus, 1],
      ],
    };
  }
  if (law.type !== 'feed') throw new Error(`${law.type} has no pieces`);
  const u = Math.max(-v, 1e-3 * law.setpointV);
  const harvestedA = law.harvestW === undefined ? Infinity : law.harvestW / u;
  const byHarvest = harvestedA < law.outputA;
  return {
    limitA: Math.min(law.outputA, harvestedA),
    limitSlopes: byHarvest
      ? [
          [a, harvestedA / u],
          [b, -harvestedA / u],
        ]
      : [],
    gapV: law.setpointV + v,
    gapSlopes: across,
    slopeOhm: 0,
  };
}

/** How far a direct controller's output is below its set point. */
function roomBelowSetpoint({ branch, x }: Omit<At, 'i'>): number {
  if (branch.law.type !== 'pass') return Infinity;
  return branch.law.setpointV - (x[branch.b]! - x[branch.law.outMinus]!);
}

/** The equation that fixes a branch's own current (unknown number `row`). */
export function pieceEquation(
  at: At & { readonly row: number; readonly state: BranchState; readonly sharp: number | undefined },
): { readonly value: number; readonly slopes: Slopes } {
  const { i, row, state, sharp } = at;
  const { gapV, gapSlopes, slopeOhm, limitA, limitSlopes } = pieceOf(at, state);
  const middleOhm = slopeOhm + (sharp === undefined ? 0 : 1 / sharp);
  if (state === 'middle' || state === 'held') {
    return { value: gapV - middleOhm * i, slopes: [...gapSlopes, [row, -middleOhm]] };
  }
  const leakS = sharp === undefined ? LEAK_S : 1 / sharp;
  const leak = gapSlopes.map(([column, slope]) => [column, -leakS * slope] as const);
  if (state === 'lower') return { value: i - leakS * gapV, slopes: [[row, 1], ...leak] };
  const beyondV = gapV - middleOhm * limitA;
  const limit = limitSlopes.map(([column, slope]) => [column, -slope * (1 + leakS * middleOhm)] as const);
  return { value: i - limitA - leakS * beyondV, slopes: [[row, 1], ...leak, ...limit] };
}

/** Weight of volts against amps in the projection below, S; any positive weight has the same fixed points. */
const PROJECTION_S = 2;

/** The state of a softened part: where its current would go if it followed what is left of its middle equation. */
export function softState(at: At & { readonly sharp: number }): BranchState {
  const { gapV, slopeOhm, limitA } = pieceOf(at, 'middle');
  const middleOhm = slopeOhm + 1 / at.sharp;
  const wantedA = at.i + Math.min(PROJECTION_S, 1 / middleOhm) * (gapV - middleOhm * at.i);
  if (wantedA <= 0) return 'lower';
  return wantedA >= limitA ? 'upper' : 'middle';
}

/** The state that an exact solution asks for instead of the one it was made with: that of the largest breach, V or A. */
export function contradiction(at: At, state: BranchState): BranchState | undefined {
  const { i } = at;
  const { gapV, slopeOhm, limitA } = pieceOf(at, 'middle');
  const askedV = gapV - slopeOhm * i;
  const roomV = roomBelowSetpoint(at);
  const wrong: (readonly [by: number, next: BranchState])[] = [];
  if (state === 'lower') wrong.push([Math.min(askedV, roomV), askedV < roomV ? 'middle' : 'held']);
  if (state === 'upper') wrong.push([-askedV, 'middle'], [-roomV, 'held']);
  if (state === 'middle' || state === 'held') wrong.push([-i, 'lower'], [i - limitA, 'upper']);
  if (state === 'middle') wrong.push([-roomV, 'held']);
  if (state === 'held') wrong.push([-askedV, 'middle']);
  const worst = Math.max(EDGE, ...wrong.map(([by]) => by));
  return worst === EDGE ? undefined : wrong.find(([by]) => by === worst)?.[1];
}
