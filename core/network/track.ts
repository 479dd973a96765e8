/**
 * Maximum-power controllers: finds the input volts at which the input power no longer rises, dP/dV = I + V dI/dV = 0, where
 * dI/dV comes from the network itself (one linear solve), by Newton's secant inside a bracket.
 */
import type { Element } from './element.ts';
import type { Assembled } from './newton.ts';
import { tieCurrents } from './ties.ts';
import type { TrackerValve } from './valve.ts';

/** Moves every tracking controller to its best input volts. False when the network does not solve on the way. */
export function trackMaximumPower(assembled: Assembled, share: number): boolean {
  const trackers = assembled.circuit.valves.filter(
    (valve): valve is TrackerValve => valve.kind === 'tracker' && valve.state === 'tracking',
  );
  if (trackers.length === 0) return true;
  const searches = trackers.map((valve) => new Search(valve));
  for (let pass = 0; pass < 60; pass++) {
    assembled.coupling.balance();
    let moved = 0;
    for (const search of searches) moved = Math.max(moved, search.advance(assembled));
    if (moved <= 1e-14) break;
    for (const { valve, changeV } of searches) shiftHeld(assembled, valve.input, changeV);
    if (!assembled.solve(share, true)) return false;
  }
  assembled.coupling.balance();
  for (const { valve } of searches) {
    valve.availableW = valve.trackedV * Math.max(0, assembled.coupling.ties.get(valve.input) ?? 0);
  }
  return true;
}

/** I + V dI/dV below this part of I is rounding: the volts are the best to the same part. */
const BEST = 1e-12;

class Search {
  readonly valve: TrackerValve;
  changeV = 0;
  private low = 0;
  private high = Number.POSITIVE_INFINITY;
  private lastV = Number.NaN;
  private lastF = Number.NaN;

  constructor(valve: TrackerValve) {
    this.valve = valve;
  }

  /** Sets the next input volts; returns the relative change. */
  advance(assembled: Assembled): number {
    const { valve } = this;
    const v = valve.trackedV;
    const inputA = assembled.coupling.ties.get(valve.input) ?? 0;
    const f = inputA + v * inputSlope(assembled, valve.input);
    if (f > 0) this.low = Math.max(this.low, v);
    else this.high = Math.min(this.high, v);
    const secant = v - (f * (v - this.lastV)) / (f - this.lastF);
    let next = Number.isFinite(secant) ? secant : v * (1 + 1e-3 * Math.sign(f));
    if (Math.abs(f) <= BEST * Math.abs(inputA)) next = v;
    else if (!(next > this.low && next < this.high)) {
      next = this.high === Number.POSITIVE_INFINITY ? v * 1.1 : 0.5 * (this.low + this.high);
    }
    // Without an upper bracket the secant may point far beyond open circuit.
    next = Math.min(next, 1.25 * v);
    this.lastV = v;
    this.lastF = f;
    this.changeV = next - v;
    valve.trackedV = next;
    return Math.abs(next - v) / Math.max(v, 1e-3);
  }
}

/** Junctions on the `from` side of a held tie within its tied group move with it: +1, others 0. */
function movedBy(assembled: Assembled, tie: Element): Float64Array {
  const { parentTie, parentJunction, order } = assembled.reduction.forest;
  const share = new Float64Array(assembled.volts.length);
  // Parents stand after children in `order`: walk it backwards so that each junction sees its parent first.
  for (let k = order.length - 1; k >= 0; k--) {
    const j = order[k]!;
    const parent = parentJunction[j]!;
    if (parent < 0) continue;
    share[j] = share[parent]!;
    if (parentTie[j] === tie) share[j] = share[parent]! + (tie.from === j ? 1 : -1);
  }
  // The junction whose volts define the group's offset must not move: known volts first, else the forest's root.
  const { node, offset } = assembled.reduction;
  const group = groupOf(assembled, tie);
  const anchor = group.find((j) => node[j] === -1 && offset[j] === 0) ?? group[0]!;
  const at = share[anchor]!;
  if (at !== 0) for (const j of group) share[j]! -= at;
  return share;
}

function groupOf(assembled: Assembled, tie: Element): number[] {
  const { parentJunction } = assembled.reduction.forest;
  const rootOf = (j: number) => {
    let at = j;
    while (parentJunction[at]! >= 0) at = parentJunction[at]!;
    return at;
  };
  const root = rootOf(tie.from);
  const group: number[] = [];
  for (let j = 0; j < assembled.volts.length; j++) if (rootOf(j) === root) group.push(j);
  return group;
}

function shiftHeld(assembled: Assembled, tie: Element, changeV: number): void {
  if (changeV === 0) return;
  tie.b += changeV;
  const share = movedBy(assembled, tie);
  for (let j = 0; j < share.length; j++) {
    assembled.volts[j]! += share[j]! * changeV;
    assembled.reduction.offset[j]! += share[j]! * changeV;
  }
}

/** dI/dV of a held input, I into `from`: the network answers a change of the held volts by one linear solve. */
function inputSlope(assembled: Assembled, tie: Element): number {
  const { node, forest, size } = assembled.reduction;
  const share = movedBy(assembled, tie);
  const b = new Float64Array(size);
  for (const { from, to, slope } of assembled.active) {
    const change = slope * (share[from]! - share[to]!);
    if (change === 0) continue;
    if (node[from]! >= 0) b[node[from]!]! -= change;
    if (node[to]! >= 0) b[node[to]!]! += change;
  }
  assembled.solveLinear(b, b);
  const leaving = new Float64Array(assembled.volts.length);
  // A tracked output keeps its power here: at the best input volts dP/dV is zero, so that is exact where it matters.
  for (const { from, to, slope } of assembled.active) {
    const dv =
      share[from]! - share[to]! + (node[from]! >= 0 ? b[node[from]!]! : 0) - (node[to]! >= 0 ? b[node[to]!]! : 0);
    leaving[from]! += slope * dv;
    leaving[to]! -= slope * dv;
  }
  const currents = new Map<Element, number>();
  tieCurrents(forest, leaving, currents);
  return currents.get(tie) ?? 0;
}
