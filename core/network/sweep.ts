/** One solved case again and again with a few figures moved: draws over ranges, sweeps of a load, one figure at a time. */
import type { PartId } from '../job/part.ts';
import type { Tables } from '../tables/tables.ts';
import { buildCircuit, type Circuit } from './circuit.ts';
import { disagreements } from './disagree.ts';
import { type Element, evaluate, Law } from './element.ts';
import type { Assembled } from './newton.ts';
import { type SolvedCircuit, solveBuilt } from './operatingPoint.ts';
import { type Shift, type ShiftTarget, shifted, shiftTargets } from './shift.ts';
import { fitsLanes, SweepLanes } from './sweepLanes.ts';

export interface SweepRequest {
  readonly solved: SolvedCircuit;
  readonly tables: Tables;
  /** What moves. */
  readonly shifts: readonly Shift[];
  /** Strings, loads, cables … whose currents are wanted, signs as in `core/job/part.ts`. */
  readonly watched: readonly PartId[];
}

export interface Draws {
  readonly count: number;
  /** Writes the change of each shift, in its own unit, for one draw. */
  readonly draw: (index: number, changes: Float64Array) => void;
  /** Takes the currents of what is watched, A; null where the draw has no operating point. The array is used again. */
  readonly take: (index: number, currentsA: Float64Array | null) => void;
}

/**
 * Solves draws from the operating point of the case, several side by side where the network allows it (`SweepLanes`), else one
 * after the other. A draw in which a charger, diode or controller would change its state, a load would drop out or Newton does not
 * arrive is solved from the start as a circuit of its own, so that each draw is answered as a new solve would answer it.
 */
export class Sweep {
  private readonly request: SweepRequest;
  private readonly circuit: Circuit;
  private readonly assembled: Assembled | null;
  private readonly targets: readonly (readonly ShiftTarget[])[];
  private readonly watched: readonly { readonly element: Element | undefined; readonly sign: number }[];
  private readonly lanes: SweepLanes | null;
  private readonly placeOf: ReadonlyMap<Element, number>;
  /** Where the active elements stood at the operating point. */
  private readonly own: readonly { readonly a: number; readonly b: number }[];
  private readonly volts: Float64Array;

  constructor(request: SweepRequest) {
    const { circuit, assembled } = request.solved;
    this.request = request;
    this.circuit = circuit;
    this.assembled = assembled;
    this.watched = request.watched.map((id) => watch(circuit, id));
    const active = assembled?.active ?? [];
    const placeOf = new Map(active.map((element, place) => [element, place]));
    this.placeOf = placeOf;
    // What is cut off from every source does not matter, and is not put back after a draw.
    this.targets = request.shifts.map((shift) =>
      shiftTargets(circuit, shift).filter(({ element }) => placeOf.has(element)),
    );
    this.own = active.map(({ a, b }) => ({ a, b }));
    this.volts = assembled?.volts.slice() ?? new Float64Array(0);
    const isWatchable = this.watched.every(({ element }) => element?.law !== Law.tie);
    this.lanes = assembled !== null && isWatchable && fitsLanes(assembled) ? new SweepLanes(assembled) : null;
  }

  run(draws: Draws): void {
    if (this.assembled === null) {
      for (let index = 0; index < draws.count; index++) draws.take(index, null);
    } else if (this.lanes === null) this.oneByOne(draws);
    else this.sideBySide(this.lanes, this.assembled, draws);
  }

  private sideBySide(lanes: SweepLanes, assembled: Assembled, { count, draw, take }: Draws): void {
    const width = lanes.lanes;
    const changes = Array.from({ length: width }, () => new Float64Array(this.targets.length));
    const currents = new Float64Array(this.watched.length);
    const hasValves = this.circuit.valves.length > 0;
    for (let first = 0; first < count; first += width) {
      const filled = Math.min(width, count - first);
      lanes.reset();
      for (let s = 0; s < filled; s++) {
        draw(first + s, changes[s]!);
        this.fillLane(lanes, s, changes[s]!);
      }
      const failed = lanes.solve(filled);
      for (let s = 0; s < filled; s++) {
        const isSame = failed[s] === 0 && (hasValves ? this.statesHold(lanes, s, assembled) : this.sinksHold(lanes, s));
        if (!isSame) {
          take(first + s, this.afresh(changes[s]!, currents));
          continue;
        }
        this.watched.forEach(({ element, sign }, w) => {
          const place = element === undefined ? undefined : this.placeOf.get(element);
          currents[w] = place === undefined ? 0 : sign * lanes.i[place * width + s]!;
        });
        take(first + s, currents);
      }
    }
  }

  private fillLane(lanes: SweepLanes, s: number, changes: Float64Array): void {
    this.targets.forEach((targets, k) => {
      if (changes[k] === 0) return;
      for (const { element, share } of targets) {
        const place = this.placeOf.get(element);
        if (place === undefined) continue;
        const at = place * lanes.lanes + s;
        const figures = { law: element.law, a: lanes.a[at]!, b: lanes.b[at]! };
        const moved = shifted(figures, this.request.shifts[k]!.quantity, share * changes[k]!);
        lanes.a[at] = moved.a;
        lanes.b[at] = moved.b;
      }
    });
  }

  /** Whether chargers, diodes and loads that drop out would stay as they are in a lane's solution. */
  private statesHold(lanes: SweepLanes, s: number, assembled: Assembled): boolean {
    const { node, offset } = assembled.reduction;
    const width = lanes.lanes;
    for (let j = 0; j < node.length; j++) {
      if (node[j]! >= 0) assembled.volts[j] = lanes.x[node[j]! * width + s]! + offset[j]!;
    }
    lanes.elements.forEach((element, place) => {
      element.a = lanes.a[place * width + s]!;
      element.b = lanes.b[place * width + s]!;
    });
    assembled.evaluateAll(1);
    const holds = this.agrees(assembled);
    this.restore(assembled);
    return holds;
  }

  private agrees(assembled: Assembled): boolean {
    assembled.coupling.balance();
    if (disagreements(this.circuit, assembled).length > 0) return false;
    return this.fed(({ from, to }) => assembled.volts[from]! - assembled.volts[to]!);
  }

  /** The same for a lane of a network without valves: only loads may drop out there. */
  private sinksHold(lanes: SweepLanes, s: number): boolean {
    return this.fed((element) => lanes.voltsOf(this.placeOf.get(element)!, s));
  }

  /** Whether every load keeps its minimum volts; one that is out already might come back, which only a new solve tells. */
  private fed(voltsOf: (element: Element) => number): boolean {
    return this.circuit.sinks.every(({ element, state, minimumV }) => {
      if (minimumV === undefined) return true;
      return state === 'on' && voltsOf(element) >= minimumV;
    });
  }

  /** For networks whose laws lanes do not know: each draw from the operating point, on the network's own factors. */
  private oneByOne({ count, draw, take }: Draws): void {
    const assembled = this.assembled!;
    // The volts that a controller seeks out for its array belong to the drawing of the network: each draw has its own.
    const tracks = this.circuit.valves.some(({ kind, state }) => kind === 'tracker' && state === 'tracking');
    const changes = new Float64Array(this.targets.length);
    const currents = new Float64Array(this.watched.length);
    for (let index = 0; index < count; index++) {
      draw(index, changes);
      applyShifts(this.targets, this.request.shifts, changes);
      const isSame = !tracks && assembled.solve(1) && this.agrees(assembled);
      if (isSame) this.readElements(assembled, currents);
      this.restore(assembled);
      take(index, isSame ? currents : this.afresh(changes, currents));
    }
  }

  private readElements(assembled: Assembled, currents: Float64Array): void {
    this.watched.forEach(({ element, sign }, w) => {
      if (element === undefined || element.law === Law.none) currents[w] = 0;
      else currents[w] = sign * (element.law === Law.tie ? (assembled.coupling.ties.get(element) ?? 0) : element.i);
    });
  }

  /** Puts the operating point of the case back as it was. */
  private restore(assembled: Assembled): void {
    assembled.active.forEach((element, place) => {
      const { a, b } = this.own[place]!;
      element.a = a;
      element.b = b;
    });
    assembled.volts.set(this.volts);
    for (const element of assembled.active) {
      evaluate(element, this.volts[element.from]! - this.volts[element.to]!);
    }
  }

  /** A draw as a circuit of its own; null where it has no operating point. */
  private afresh(changes: Float64Array, currents: Float64Array): Float64Array | null {
    const { job, operatingCase, model } = this.circuit;
    const circuit = buildCircuit({ job, operatingCase, model, tables: this.request.tables });
    const { shifts, watched } = this.request;
    applyShifts(
      shifts.map((shift) => shiftTargets(circuit, shift)),
      shifts,
      changes,
    );
    const { point } = solveBuilt(circuit);
    if (point.outcome !== 'solved') return null;
    watched.forEach((id, w) => {
      currents[w] = point.parts.get(id)?.currentA ?? 0;
    });
    return currents;
  }
}

function applyShifts(
  targets: readonly (readonly ShiftTarget[])[],
  shifts: readonly Shift[],
  changes: Float64Array,
): void {
  targets.forEach((elements, k) => {
    for (const { element, share } of elements) {
      const moved = shifted(element, shifts[k]!.quantity, share * changes[k]!);
      element.a = moved.a;
      element.b = moved.b;
    }
  });
}

/** The element that answers for a part's current; none for a part that is off, open or not there. */
function watch(circuit: Circuit, id: PartId): { readonly element: Element | undefined; readonly sign: number } {
  const index = circuit.parts.findIndex((part) => part.id === id);
  const kind = circuit.parts[index]?.kind;
  const isSource = kind === 'string' || kind === 'array' || kind === 'charger';
  return { element: circuit.elementsOfPart[index]?.[0], sign: isSource ? -1 : 1 };
}
