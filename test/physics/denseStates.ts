/**
 * The states of piecewise parts (diodes, chargers, controllers): found by softening the parts and sharpening step by step,
 * then solved exactly and checked against their own inequalities; states that contradict themselves are flipped.
 */
import { type BranchState, hasStates } from './denseBranch.ts';
import type { DenseEquations } from './denseEquations.ts';
import { type Found, newton } from './denseNewton.ts';
import { contradiction } from './densePiece.ts';

/** Sharpness of softened parts: from the first to the last each solution is a good start for the next. */
const SOFTEST = 1;
const SHARPEST = 1e4;
const MOST_PIVOTS = 40;
const DIRECT_STATES: readonly BranchState[] = ['middle', 'held', 'lower'];

/** A network with no powers drawn, from nothing known. */
export function solveFresh(equations: DenseEquations, start: Float64Array, share: number): Found | undefined {
  const { branches } = equations.network;
  const plain = branches.map((): BranchState => 'none');
  if (!branches.some(({ law }) => hasStates(law))) return pivot(equations, { x: start, states: plain }, share);
  const softened = sharpen(equations, start, share);
  return softened && pivot(equations, softened, share);
}

/** From a solution for a smaller share of the powers. */
export function solveOnwards(equations: DenseEquations, from: Found, share: number): Found | undefined {
  const guessed = pivot(equations, { x: from.x, states: readyToGive(equations, from) }, share);
  if (guessed !== undefined) return guessed;
  const near = newton(equations, from.x, { share, parts: { sharp: SHARPEST } });
  const found = near && pivot(equations, near, share);
  return found ?? solveFresh(equations, from.x, share);
}

/** A source that gives nothing only because nothing is drawn stands at its set point all the same. */
function readyToGive(equations: DenseEquations, { x, states }: Found): readonly BranchState[] {
  return states.map((state, k) => {
    const { a, b, law } = equations.network.branches[k]!;
    return law.type === 'feed' && Math.abs(x[b]! - x[a]! - law.setpointV) < 1e-6 ? 'middle' : state;
  });
}

/** Softened parts, made sharper by a factor that shrinks where a step does not settle and grows where it does. */
function sharpen(equations: DenseEquations, start: Float64Array, share: number): Found | undefined {
  let at = newton(equations, start, { share, parts: { sharp: SOFTEST } });
  let sharp = SOFTEST;
  for (let factor = 10; at !== undefined && sharp < SHARPEST; ) {
    const next = newton(equations, at.x, { share, parts: { sharp: sharp * factor } });
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
 * With states fixed, exact. Where a solution contradicts its states, tries them all flipped, then one by one; a set of
 * states that has no solution, or was seen before, is a dead end.
 */
function pivot(equations: DenseEquations, from: Found, share: number): Found | undefined {
  const seen = new Set<string>();
  const waiting: (readonly BranchState[])[] = [from.states];
  while (waiting.length > 0 && seen.size < MOST_PIVOTS) {
    const states = waiting.pop()!;
    if (seen.has(states.join())) continue;
    seen.add(states.join());
    // Always from the same start: wrong states may have absurd solutions (a limited source with no load).
    const solved = newton(equations, from.x, { share, parts: { fixed: states } });
    if (solved === undefined) {
      waiting.unshift(...otherDirectStates(equations, states));
      states.forEach((state, k) => {
        if (state === 'held') waiting.push(flipped(states, [[k, 'lower']]));
      });
      continue;
    }
    const wrong = contradictions(equations, solved.x, states);
    if (wrong.length === 0) return solved;
    waiting.push(...wrong.map((flip) => flipped(states, [flip])), flipped(states, wrong));
  }
  return undefined;
}

/** No current of its array may hold a direct controller's set point, or join it to the rest: any other state may. */
function otherDirectStates(
  equations: DenseEquations,
  states: readonly BranchState[],
): readonly (readonly BranchState[])[] {
  return equations.network.branches.flatMap(({ law }, k) =>
    law.type === 'pass'
      ? DIRECT_STATES.filter((other) => other !== states[k]).map((other) => flipped(states, [[k, other]]))
      : [],
  );
}

/** Branches whose state is not borne out by the solution, with the state they should take. */
function contradictions(
  equations: DenseEquations,
  x: Float64Array,
  states: readonly BranchState[],
): readonly (readonly [number, BranchState])[] {
  return equations.network.branches.flatMap((branch, k) => {
    if (!hasStates(branch.law)) return [];
    const next = contradiction({ branch, x, i: x[equations.currentIndex[k]!]! }, states[k]!);
    return next === undefined ? [] : [[k, next] as const];
  });
}

function flipped(
  states: readonly BranchState[],
  flips: readonly (readonly [number, BranchState])[],
): readonly BranchState[] {
  const next = new Map(flips);
  return states.map((state, k) => next.get(k) ?? state);
}
