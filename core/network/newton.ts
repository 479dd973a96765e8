/**
 * Nodal analysis of a circuit whose valve states are fixed: Newton's method on the balance of currents.
 *
 * Unknowns U, one a group of tied junctions. Residual r(U) = sum of the currents that leave each group; its derivative is the
 * symmetric nodal conductance matrix. Constant-power loads make r convex in their volts, so Newton started from the volts
 * without them descends monotonically to the highest solution, the one a real system takes; a positive definite matrix there
 * (no negative pivot) certifies that it is that branch.
 */
import { analyseSymmetric } from '../linear/analyseSymmetric.ts';
import type { LowRankUpdate } from '../linear/lowRankUpdate.ts';
import type { FusedFactorisation } from '../linear/matrix.ts';
import { patternFromEntries } from '../linear/patternFromEntries.ts';
import { openCircuitV } from '../solar/arrayCurve.ts';
import type { Circuit } from './circuit.ts';
import { Coupling } from './coupling.ts';
import type { Element } from './element.ts';
import { evaluate, Law } from './element.ts';
import type { Reduction } from './ties.ts';

/** The circuit with fixed states, assembled; solved in place by `solve`. */
export class Assembled {
  readonly circuit: Circuit;
  readonly reduction: Reduction;
  readonly coupling: Coupling;
  /** Elements in force: all but ties, what is out of use and what floats. */
  readonly active: readonly Element[];
  /** Volts of each junction. */
  readonly volts: Float64Array;
  readonly factorisation: FusedFactorisation;
  readonly values: Float64Array;
  private readonly power: readonly Element[];
  private readonly slots: Int32Array; // three a stamped element: from-from, to-to, from-to; -1 where absent
  private readonly stamped: readonly Element[];
  private readonly r: Float64Array;
  private readonly step: Float64Array;
  iterations = 0;

  constructor(circuit: Circuit, reduction: Reduction) {
    this.circuit = circuit;
    this.reduction = reduction;
    this.active = circuit.elements.filter(
      (element) => element.law !== Law.none && element.law !== Law.tie && reduction.node[element.from]! > -2,
    );
    this.coupling = new Coupling(circuit, reduction, this.active);
    this.power = this.active.filter((element) => element.law === Law.power);
    this.volts = new Float64Array(circuit.junctions.length);
    const assembly = assemble(reduction, this.active);
    this.stamped = assembly.stamped;
    this.slots = assembly.slots;
    this.factorisation = analyseSymmetric(assembly.pattern);
    this.values = new Float64Array(assembly.pattern.columnStarts[reduction.size]!);
    this.r = new Float64Array(reduction.size);
    this.step = new Float64Array(reduction.size);
  }

  /** Places in the matrix's values of each element, three apiece: from-from, to-to, from-to; -1 where it has none. */
  slotsOf(elements: readonly Element[]): Int32Array {
    const place = new Map(this.stamped.map((element, k) => [element, k]));
    const slots = new Int32Array(3 * elements.length).fill(-1);
    elements.forEach((element, e) => {
      const k = place.get(element);
      if (k !== undefined) slots.set(this.slots.subarray(3 * k, 3 * k + 3), 3 * e);
    });
    return slots;
  }

  /** Volts without constant-power loads, the start of every solve. */
  solveUnloaded(): boolean {
    for (const element of this.active) evaluate(element, firstGuessV(element));
    this.coupling.reset();
    this.placeOffsets();
    for (let pass = 0; pass < 100; pass++) {
      // Norton form: the linearised currents at the present guess, as if the volts were zero.
      const change = this.linearStep(pass === 0);
      if (change === null) return false;
      if (change <= 1e-10 * scaleOf(this.volts)) return true;
      this.evaluateAll(0);
      // A power that nothing takes has no volts: here it stays as it is near its set point.
      for (const element of this.active) if (element.law === Law.powerSource) evaluate(element, element.b);
    }
    return true;
  }

  /**
   * Newton from the present volts with every constant-power and constant-current sink at `share` (0 to 1) of its figure.
   * Returns false where it does not settle on the high-voltage branch. `heldMoved`: a held voltage has just been changed.
   */
  solve(share: number, heldMoved = false): boolean {
    if (share > 0 && this.power.some((element) => this.isShorted(element))) return false;
    let best = Number.POSITIVE_INFINITY;
    let stalled = 0;
    let lastMoved = Number.POSITIVE_INFINITY;
    for (let pass = 0; pass < 80; pass++) {
      this.evaluateAll(share);
      // Just after a held voltage was moved the currents at it mean nothing yet: nothing is told across before one step.
      const moved = heldMoved && pass === 0 ? Number.POSITIVE_INFINITY : this.coupling.update(share);
      const { norm, floor } = this.residual();
      // Coupled sides go on telling each other until that no longer brings them closer.
      const agreed = moved === 0 || (moved <= 16 * floor && moved > 0.25 * lastMoved);
      lastMoved = moved;
      if (norm <= floor && agreed) return this.isHighBranch();
      if (norm >= 0.5 * best && norm <= 64 * floor && moved <= 256 * floor && ++stalled >= 2)
        return this.isHighBranch();
      best = Math.min(best, norm);
      if (!this.newtonStep()) return false;
    }
    return false;
  }

  /** A constant power between two points that ties hold at no volts, or the wrong way round, can never be had. */
  private isShorted({ from, to, a }: Element): boolean {
    const { node, offset } = this.reduction;
    return a > 0 && node[from] === node[to] && offset[from]! - offset[to]! <= 0;
  }

  /**
   * From a nearby solution, steps with a fixed (updated) factorisation until the balance holds; false where that does not
   * get there. The elements may have changed since the factors were made: only the speed depends on them, not the answer.
   */
  solveByChord(update: LowRankUpdate): boolean {
    for (let pass = 0; pass < 60; pass++) {
      this.evaluateAll(1);
      const moved = this.coupling.update(1);
      const { norm, floor } = this.residual();
      if (norm <= 4 * floor && moved <= 16 * floor) return true;
      const { r, step } = this;
      for (let k = 0; k < r.length; k++) r[k] = -r[k]!;
      update.solve(r, step);
      this.move(step, 1);
    }
    return false;
  }

  /** Refactors at the present slopes; true when no pivot is negative. */
  isHighBranch(): boolean {
    this.fillValues();
    const report = this.factorisation.refactor(this.values);
    return report.regular && report.negativePivots === 0;
  }

  /** Re-evaluates every element at the present volts. */
  evaluateAll(share: number): void {
    const { volts } = this;
    for (const element of this.active) {
      evaluate(element, volts[element.from]! - volts[element.to]!);
      if (share !== 1 && isSink(element)) {
        // Not 0 times infinity: a load of no share takes nothing, even from a short.
        element.i = share === 0 ? 0 : element.i * share;
        element.slope = share === 0 ? 0 : element.slope * share;
      }
    }
  }

  /** Solves J x = b for the present factors, in terms of unknowns. */
  solveLinear(b: Float64Array, x: Float64Array): void {
    this.factorisation.solve(b, x);
  }

  /** Sets the volts of every junction from the unknowns' change `d` times `t`. */
  private move(d: Float64Array, t: number): void {
    const { node } = this.reduction;
    for (let j = 0; j < node.length; j++) if (node[j]! >= 0) this.volts[j]! += t * d[node[j]!]!;
  }

  /** Every junction at its offset: as if the unknowns were zero. */
  private placeOffsets(): void {
    const { volts } = this;
    const { offset } = this.reduction;
    for (let j = 0; j < volts.length; j++) volts[j] = offset[j]!;
  }

  /** Largest remainder over all unknowns, and the size below which it is rounding. */
  private residual(): { norm: number; floor: number } {
    const { node } = this.reduction;
    const { r, volts } = this;
    r.fill(0);
    let floor = 1e-18;
    for (const { from, to, i, slope } of this.active) {
      const p = node[from]!;
      const q = node[to]!;
      if (p >= 0) r[p]! += i;
      if (q >= 0) r[q]! -= i;
      // A difference of volts is known to about one unit in the last place of the volts themselves.
      const rounding = EPSILON * (Math.abs(i) + Math.abs(slope) * (Math.abs(volts[from]!) + Math.abs(volts[to]!)));
      if (rounding > floor) floor = rounding;
    }
    let norm = 0;
    for (let k = 0; k < r.length; k++) norm = Math.max(norm, Math.abs(r[k]!));
    return { norm: Number.isNaN(norm) ? Number.POSITIVE_INFINITY : norm, floor };
  }

  private newtonStep(): boolean {
    this.fillValues();
    const { r, step } = this;
    for (let k = 0; k < r.length; k++) r[k] = -r[k]!;
    const report = this.factorisation.refactorAndSolve(this.values, r, step);
    if (!report.regular || report.negativePivots > 0) return false;
    this.iterations++;
    this.move(step, this.longestStep(step));
    return true;
  }

  /** The share of a step that keeps every constant-power element above a tenth of its present volts. */
  private longestStep(step: Float64Array): number {
    const { node } = this.reduction;
    let t = 1;
    for (const { from, to, law, v } of this.active) {
      if (law !== Law.power && law !== Law.powerSource) continue;
      const p = node[from]!;
      const q = node[to]!;
      const change = (p >= 0 ? step[p]! : 0) - (q >= 0 ? step[q]! : 0);
      if (v > 0 && v + t * change < 0.1 * v) t = (-0.9 * v) / change;
    }
    return t;
  }

  /** One linear solve in Norton form; returns the largest change of volts, or null when singular. */
  private linearStep(first: boolean): number | null {
    const { node, offset, size } = this.reduction;
    const b = this.r;
    b.fill(0);
    for (const element of this.active) {
      if (isSink(element)) continue;
      const p = node[element.from]!;
      const q = node[element.to]!;
      // i(v) ~ i0 + g (v - v0), and v = (U_p - U_q) + (offset_from - offset_to).
      const known = element.i + element.slope * (offset[element.from]! - offset[element.to]! - element.v);
      if (p >= 0) b[p]! -= known;
      if (q >= 0) b[q]! += known;
    }
    this.fillValues(true);
    const report = this.factorisation.refactorAndSolve(this.values, b, this.step);
    if (!report.regular) return null;
    this.iterations++;
    let change = first ? Number.POSITIVE_INFINITY : 0;
    for (let j = 0; j < node.length; j++) {
      if (node[j]! < 0) continue;
      const volts = this.step[node[j]!]! + offset[j]!;
      change = Math.max(change, Math.abs(volts - this.volts[j]!));
      this.volts[j] = volts;
    }
    return size === 0 ? 0 : change;
  }

  private fillValues(unloaded = false): void {
    const { values, stamped, slots } = this;
    values.fill(0);
    for (let k = 0; k < stamped.length; k++) {
      const element = stamped[k]!;
      if (unloaded && element.law === Law.power) continue;
      const g = element.slope;
      const pp = slots[3 * k]!;
      const qq = slots[3 * k + 1]!;
      const pq = slots[3 * k + 2]!;
      if (pp >= 0) values[pp]! += g;
      if (qq >= 0) values[qq]! += g;
      if (pq >= 0) values[pq]! -= g;
    }
  }
}

const EPSILON = 2 ** -52;

/** Constant power or current taken; a source limited to a current is no sink. */
function isSink(element: Element): boolean {
  return element.law === Law.power || (element.law === Law.current && element.a > 0);
}

/** Where an element's law is first linearised: where it conducts as it will in use. */
function firstGuessV(element: Element): number {
  if (element.law === Law.array) return openCircuitV(element.curve!);
  if (element.law === Law.powerSource) return element.b;
  if (element.law === Law.power) return 1;
  return 0;
}

function scaleOf(volts: Float64Array): number {
  let scale = 1e-3;
  for (let j = 0; j < volts.length; j++) scale = Math.max(scale, Math.abs(volts[j]!));
  return scale;
}

/** The pattern of the matrix, and for each stamped element its three slots: from-from, to-to, from-to. */
function assemble(reduction: Reduction, active: readonly Element[]) {
  const { node, size } = reduction;
  const stamped = active.filter((element) => element.law !== Law.current && node[element.from]! !== node[element.to]!);
  const rows = new Int32Array(3 * stamped.length);
  const columns = new Int32Array(3 * stamped.length);
  const places = new Int32Array(3 * stamped.length).fill(-1);
  let count = 0;
  const entry = (place: number, row: number, column: number): void => {
    if (row < 0 || column < 0) return;
    places[place] = count;
    rows[count] = row;
    columns[count++] = column;
  };
  for (let k = 0; k < stamped.length; k++) {
    const p = node[stamped[k]!.from]!;
    const q = node[stamped[k]!.to]!;
    entry(3 * k, p, p);
    entry(3 * k + 1, q, q);
    entry(3 * k + 2, p, q);
  }
  const shape = { symmetric: true };
  const { pattern, slots } = patternFromEntries(size, rows.subarray(0, count), columns.subarray(0, count), shape);
  for (let k = 0; k < places.length; k++) if (places[k]! >= 0) places[k] = slots[places[k]!]!;
  return { stamped, pattern, slots: places };
}
