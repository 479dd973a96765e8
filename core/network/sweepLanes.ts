/**
 * Newton's method on several circuits of one topology side by side: the same elements with other figures in each lane. Every array
 * that runs by lanes keeps the figure of lane s at `place * lanes + s`.
 */
import type { Batch } from '../linear/analyseBatch.ts';
import { analyseBatch } from '../linear/analyseBatch.ts';
import { isCoupler } from './coupling.ts';
import type { Element } from './element.ts';
import { Law, warmingCurrentNear } from './element.ts';
import type { Assembled } from './newton.ts';

/** Laws that lanes know; a circuit with others is solved one draw at a time. */
const LANE_LAWS: readonly Law[] = [Law.conductance, Law.emf, Law.warming, Law.current, Law.power];
const EPSILON = 2 ** -52;
/** Steps enough for a quadratic descent from the neighbouring solution; a lane that takes more is solved anew by itself. */
const MOST_STEPS = 25;

/** Whether every element in force has a law that lanes know, and no converter or controller carries figures from place to place. */
export function fitsLanes({ active, circuit }: Assembled): boolean {
  const isCoupled = circuit.valves.some((valve) => isCoupler(valve) && valve.state !== 'off');
  return !isCoupled && active.every(({ law }) => LANE_LAWS.includes(law));
}

export class SweepLanes {
  readonly lanes: number;
  readonly elements: readonly Element[];
  /** Figures by element and lane, as `Element.a` and `Element.b`; filled anew for each set of draws. */
  readonly a: Float64Array;
  readonly b: Float64Array;
  /** Currents by element and lane, from `from` to `to`. */
  readonly i: Float64Array;
  /** Unknowns by node and lane. */
  readonly x: Float64Array;
  private readonly batch: Batch;
  private readonly from: Int32Array;
  private readonly to: Int32Array;
  /** Volts between the ends of an element that ties fix, beyond the difference of its nodes. */
  private readonly between: Float64Array;
  /** |offset| of both ends together: what rounding of volts is judged by. */
  private readonly apart: Float64Array;
  /** Three an element: from-from, to-to, from-to; -1 where absent. */
  private readonly slots: Int32Array;
  private readonly laws: Uint8Array;
  /** Of the element in hand, by lane: volts across, di/dv, and the size of the volts at its ends. */
  private readonly v: Float64Array;
  private readonly slope: Float64Array;
  private readonly size: Float64Array;
  private readonly start: Float64Array;
  private readonly residual: Float64Array;
  private readonly norm: Float64Array;
  private readonly floor: Float64Array;
  /** Remainder before the last step. */
  private readonly last: Float64Array;
  private readonly damping: Float64Array;
  private readonly failed: Uint8Array;

  constructor(assembled: Assembled) {
    const { node, offset, size } = assembled.reduction;
    this.elements = assembled.active;
    this.batch = analyseBatch(assembled.factorisation.pattern);
    this.lanes = this.batch.lanes;
    const n = this.elements.length;
    this.from = Int32Array.from(this.elements, ({ from }) => node[from]!);
    this.to = Int32Array.from(this.elements, ({ to }) => node[to]!);
    this.between = Float64Array.from(this.elements, ({ from, to }) => offset[from]! - offset[to]!);
    this.apart = Float64Array.from(this.elements, ({ from, to }) => Math.abs(offset[from]!) + Math.abs(offset[to]!));
    this.slots = assembled.slotsOf(this.elements);
    this.laws = Uint8Array.from(this.elements, ({ law }) => law);
    this.v = new Float64Array(this.lanes);
    this.slope = new Float64Array(this.lanes);
    this.size = new Float64Array(this.lanes);
    this.a = new Float64Array(n * this.lanes);
    this.b = new Float64Array(n * this.lanes);
    this.i = new Float64Array(n * this.lanes);
    this.x = new Float64Array(size * this.lanes);
    this.residual = new Float64Array(size * this.lanes);
    this.norm = new Float64Array(this.lanes);
    this.floor = new Float64Array(this.lanes);
    this.last = new Float64Array(this.lanes);
    this.damping = new Float64Array(this.lanes);
    this.failed = new Uint8Array(this.lanes);
    this.start = new Float64Array(size);
    node.forEach((unknown, j) => {
      if (unknown >= 0) this.start[unknown] = assembled.volts[j]! - offset[j]!;
    });
  }

  /** Sets every lane to the figures that the elements themselves have, at the operating point. */
  reset(): void {
    const { lanes, a, b, i, x, start } = this;
    this.elements.forEach((element, e) => {
      i.fill(element.i, e * lanes, (e + 1) * lanes);
      a.fill(element.a, e * lanes, (e + 1) * lanes);
      b.fill(element.b, e * lanes, (e + 1) * lanes);
    });
    for (let k = 0; k < start.length; k++) x.fill(start[k]!, k * lanes, (k + 1) * lanes);
  }

  /** Solves the first `count` lanes from where `x` stands; 1 in the answer for a lane that did not settle on the high-voltage branch. */
  solve(count: number): Uint8Array {
    const { failed, norm, floor, last, batch } = this;
    failed.fill(0);
    last.fill(Number.POSITIVE_INFINITY);
    for (let pass = 0; ; pass++) {
      this.evaluate();
      let open = false;
      for (let s = 0; s < count; s++) {
        // Where a step no longer halves a small remainder, the remainder is the rounding of many currents at one node.
        const isAsGood = norm[s]! >= 0.5 * last[s]! ? 64 : 4;
        if (failed[s] === 0 && !(norm[s]! <= isAsGood * floor[s]!)) open = true;
        last[s] = norm[s]!;
      }
      // One step at least: its factors show which branch the solution lies on.
      if (!open && pass > 0) return failed;
      if (pass === MOST_STEPS) {
        for (let s = 0; s < count; s++) if (!(norm[s]! <= 64 * floor[s]!)) failed[s] = 1;
        return failed;
      }
      const { unknowns } = batch;
      for (let k = 0; k < unknowns.length; k++) unknowns[k] = -this.residual[k]!;
      const reports = batch.refactorAndSolve(count);
      for (let s = 0; s < count; s++) {
        const report = reports[s]!;
        if (!report.regular || report.negativePivots > 0) failed[s] = 1;
      }
      this.move();
    }
  }

  /** Volts across an element, from `from` to `to`, in a lane. */
  voltsOf(place: number, s: number): number {
    const p = this.from[place]!;
    const q = this.to[place]!;
    const { x, lanes } = this;
    return (p >= 0 ? x[p * lanes + s]! : 0) - (q >= 0 ? x[q * lanes + s]! : 0) + this.between[place]!;
  }

  /** Currents, slopes into the matrix, remainders of every node, and the size below which a remainder is rounding. */
  private evaluate(): void {
    const { lanes, laws, i, x, v, size, slope, from, to, between, apart, slots, residual, norm, floor } = this;
    const { values } = this.batch;
    values.fill(0);
    residual.fill(0);
    norm.fill(0);
    floor.fill(1e-18);
    for (let e = 0; e < laws.length; e++) {
      const p = from[e]! * lanes;
      const q = to[e]! * lanes;
      const at = e * lanes;
      for (let s = 0; s < lanes; s++) {
        const up = p >= 0 ? x[p + s]! : 0;
        const down = q >= 0 ? x[q + s]! : 0;
        v[s] = up - down + between[e]!;
        size[s] = Math.abs(up) + Math.abs(down) + apart[e]!;
      }
      this.obey(laws[e]!, at);
      const pp = slots[3 * e]! * lanes;
      const qq = slots[3 * e + 1]! * lanes;
      const pq = slots[3 * e + 2]! * lanes;
      for (let s = 0; s < lanes; s++) {
        const current = i[at + s]!;
        const rounding = EPSILON * (Math.abs(current) + Math.abs(slope[s]!) * size[s]!);
        if (rounding > floor[s]!) floor[s] = rounding;
      }
      if (p >= 0) for (let s = 0; s < lanes; s++) residual[p + s]! += i[at + s]!;
      if (q >= 0) for (let s = 0; s < lanes; s++) residual[q + s]! -= i[at + s]!;
      if (pp >= 0) for (let s = 0; s < lanes; s++) values[pp + s]! += slope[s]!;
      if (qq >= 0) for (let s = 0; s < lanes; s++) values[qq + s]! += slope[s]!;
      if (pq >= 0) for (let s = 0; s < lanes; s++) values[pq + s]! -= slope[s]!;
    }
    for (let k = 0; k < residual.length; k += lanes) {
      for (let s = 0; s < lanes; s++) {
        const remainder = Math.abs(residual[k + s]!);
        if (!(remainder <= norm[s]!)) norm[s] = remainder;
      }
    }
  }

  /** Current and slope of one element in every lane, for the volts in `v`; `at` is its place in `a`, `b` and `i`. */
  private obey(law: number, at: number): void {
    const { lanes, a, b, i, v, slope } = this;
    switch (law) {
      case Law.conductance:
        for (let s = 0; s < lanes; s++) {
          slope[s] = a[at + s]!;
          i[at + s] = a[at + s]! * v[s]!;
        }
        return;
      case Law.emf:
        for (let s = 0; s < lanes; s++) {
          slope[s] = a[at + s]!;
          i[at + s] = a[at + s]! * (v[s]! - b[at + s]!);
        }
        return;
      case Law.current:
        for (let s = 0; s < lanes; s++) {
          slope[s] = 0;
          i[at + s] = a[at + s]!;
        }
        return;
      case Law.power:
        for (let s = 0; s < lanes; s++) {
          i[at + s] = a[at + s]! / v[s]!;
          slope[s] = -i[at + s]! / v[s]!;
        }
        return;
      default:
        for (let s = 0; s < lanes; s++) {
          const bend = b[at + s]!;
          const current = warmingCurrentNear(a[at + s]!, bend, v[s]!, Math.abs(i[at + s]!));
          i[at + s] = current;
          slope[s] = 1 / (a[at + s]! + 3 * bend * current * current);
        }
    }
  }

  /** Takes the step, shortened where it would bring a constant power below a tenth of its volts. */
  private move(): void {
    const { lanes, elements, x, from, to, between, damping } = this;
    const { unknowns } = this.batch;
    damping.fill(1);
    for (let e = 0; e < elements.length; e++) {
      if (elements[e]!.law !== Law.power) continue;
      const p = from[e]! * lanes;
      const q = to[e]! * lanes;
      for (let s = 0; s < lanes; s++) {
        const v = (p >= 0 ? x[p + s]! : 0) - (q >= 0 ? x[q + s]! : 0) + between[e]!;
        const change = (p >= 0 ? unknowns[p + s]! : 0) - (q >= 0 ? unknowns[q + s]! : 0);
        if (v > 0 && v + damping[s]! * change < 0.1 * v) damping[s] = (-0.9 * v) / change;
      }
    }
    for (let k = 0; k < x.length; k += lanes) {
      for (let s = 0; s < lanes; s++) x[k + s]! += damping[s]! * unknowns[k + s]!;
    }
  }
}
