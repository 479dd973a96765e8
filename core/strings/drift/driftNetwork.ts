/** One case of a drift run: its network, the laws of its strings there, and one step of time. */
import { Defect } from '../../job/issue.ts';
import type { CheckedJob, OperatingCase } from '../../job/job.ts';
import type { JunctionId, PartId, StringPart } from '../../job/part.ts';
import { ambientOf } from '../../network/circuit.ts';
import type { Element } from '../../network/element.ts';
import { Law } from '../../network/element.ts';
import { type NoStep, Stepper } from '../../network/stepper.ts';
import type { Tables } from '../../tables/tables.ts';
import { type ChargeLaw, chargeLaw, type StepLine, settlingSeconds, stepLine } from './chargeLaw.ts';

/** What has one charge: a string, or a half of one with a junction at its middle. */
export interface Store {
  /** As in the first case of the cycle: its charge there is where the run begins. */
  readonly string: StringPart;
  readonly half: 'upper' | 'lower' | null;
}

/** What one store did in a step. Current positive on discharge; `voltageV` is that of the network at its terminals. */
export interface StoreStep extends StepLine {
  readonly currentA: number;
  readonly terminalV: number;
}

export interface Step {
  readonly stores: readonly StoreStep[];
  /** What all parts of the network together take, J: rounding, where the balance holds. */
  readonly imbalanceJ: number;
}

interface Placed {
  readonly element: Element | undefined;
  readonly law: ChargeLaw;
}

/** Volts of a string on its line and in the network agree to this part of them. */
const AGREED = 4e-13;
/** Newton on lines with corners may swing between two of them: after this many passes the lines move half-way only. */
const SWINGING = 8;
const NEXT_TO_NOTHING_A = 1e-9;

export class DriftNetwork {
  readonly operatingCase: OperatingCase;
  readonly stepper: Stepper;
  private readonly placed: readonly Placed[];
  /** Currents about which the strings are linearised, A. */
  private readonly aboutA: Float64Array;
  private readonly capacityAs: readonly number[];

  constructor(
    { job, tables, stores }: { readonly job: CheckedJob; readonly tables: Tables; readonly stores: readonly Store[] },
    operatingCase: OperatingCase,
  ) {
    this.operatingCase = operatingCase;
    this.stepper = new Stepper({ job, tables, operatingCase, model: 'slow' });
    const { circuit } = this.stepper;
    const ambientDegC = ambientOf(job, operatingCase);
    const context = { model: 'slow' as const, ambientDegC, tables: tables.chemistry };
    this.placed = stores.map(({ string, half }) => {
      const index = circuit.parts.findIndex(({ id }) => id === string.id);
      const there = circuit.parts[index] as StringPart | undefined;
      if (there === undefined) throw new Defect(`string ${string.id} stands in every case`);
      // A case may be warmer or colder; charge and rest volts are the run's own.
      const here = { ...string, temperatureDegC: there.temperatureDegC };
      const element = circuit.elementsOfPart[index]!.find(({ role }) => role === (half ?? ''));
      return { element, law: chargeLaw(here, { ...context, half: half !== null }) };
    });
    this.aboutA = new Float64Array(stores.length);
    this.capacityAs = this.placed.map(({ law }) => law.capacityAs);
  }

  /** Chemical energy in a store from empty, J. */
  energyJ(store: number, stateOfCharge: number): number {
    return this.capacityAs[store]! * this.placed[store]!.law.emfV.integral(stateOfCharge);
  }

  /** One step of `seconds` from these states of charge, or why there is none (only where asked to be `thorough`). */
  step(stateOfCharge: Float64Array, seconds: number, thorough: boolean): Step | NoStep {
    let failed = this.solve(stateOfCharge, seconds, false);
    if (failed !== null) {
      // Set out from the side of charge: strings that take little may leave others what they ask for.
      this.aboutA.fill(-NEXT_TO_NOTHING_A);
      failed = this.solve(stateOfCharge, seconds, thorough);
    }
    if (failed !== null) return failed;
    const stores = this.placed.map(({ element, law }, k) => {
      const currentA = this.currentIn(element);
      const terminalV = element === undefined ? 0 : this.stepper.voltsAcross(element);
      return { ...stepLine(law, stateOfCharge[k]!, currentA, seconds), currentA, terminalV };
    });
    return { stores, imbalanceJ: this.stepper.powerSumW() * seconds };
  }

  /**
   * The longest step at these states that follows the strings and does not ring: twice the shortest time in which a string
   * settles alone, and a tenth of its capacity. Strings whose rest volts hardly move in `seconds` are let go.
   */
  longestStep(stateOfCharge: ArrayLike<number>, currents: readonly number[], seconds: number): number {
    let longest = seconds;
    this.placed.forEach(({ law }, k) => {
      const currentA = Math.abs(currents[k]!);
      if (currentA * longest > LARGEST_CHANGE * law.capacityAs) longest = (LARGEST_CHANGE * law.capacityAs) / currentA;
      const slopeV = law.emfV.slopeAt(stateOfCharge[k]!);
      if ((slopeV * currentA * longest) / law.capacityAs < SMALL_SWING * law.emfV.at(stateOfCharge[k]!)) return;
      longest = Math.min(longest, 2 * settlingSeconds(law, stateOfCharge[k]!, currents[k]!));
    });
    return longest;
  }

  voltsBetween(plus: JunctionId, minus: JunctionId): number {
    const { circuit } = this.stepper;
    const [from, to] = [circuit.junctionIndex.get(plus), circuit.junctionIndex.get(minus)];
    return from === undefined || to === undefined ? 0 : this.stepper.voltsAcross({ from, to });
  }

  get droppedOut(): readonly PartId[] {
    return this.stepper.droppedOut;
  }

  private solve(stateOfCharge: Float64Array, seconds: number, thorough: boolean): NoStep | null {
    let passes = 0;
    this.placeLines(stateOfCharge, seconds);
    return this.stepper.solve(() => this.aim(stateOfCharge, { seconds, pass: passes++ }), thorough);
  }

  private placeLines(stateOfCharge: Float64Array, seconds: number): void {
    this.placed.forEach(({ element, law }, k) => {
      if (element !== undefined) place(element, law, { start: stateOfCharge[k]!, aboutA: this.aboutA[k]!, seconds });
    });
  }

  /** Lays each string's line about the current just found; true when all the lines already ran through it. */
  private aim(stateOfCharge: Float64Array, { seconds, pass }: { seconds: number; pass: number }): boolean {
    const part = pass < SWINGING ? 1 : 0.5;
    let agreed = true;
    this.placed.forEach(({ element, law }, k) => {
      if (element === undefined || !this.stepper.isLive(element)) return;
      const currentA = this.currentIn(element);
      const terminalV = this.stepper.voltsAcross(element);
      const { voltageV } = stepLine(law, stateOfCharge[k]!, currentA, seconds);
      if (Math.abs(voltageV - terminalV) > AGREED * Math.max(1, Math.abs(terminalV))) agreed = false;
      this.aboutA[k] = this.aboutA[k]! + part * (currentA - this.aboutA[k]!);
    });
    if (!agreed) this.placeLines(stateOfCharge, seconds);
    return agreed;
  }

  private currentIn(element: Element | undefined): number {
    if (element === undefined || element.law === Law.none || !this.stepper.isLive(element)) return 0;
    return -element.i;
  }
}

/** Of the capacity, in one step. */
const LARGEST_CHANGE = 0.1;
/** Rest volts that move by less than this part of themselves in a step need not be followed more closely. */
const SMALL_SWING = 1e-4;

/** A string as a straight line: the tangent of its volts at a current. */
function place(
  element: Element,
  law: ChargeLaw,
  { start, aboutA, seconds }: { readonly start: number; readonly aboutA: number; readonly seconds: number },
): void {
  const { voltageV, slopeOhm } = stepLine(law, start, aboutA, seconds);
  element.a = -1 / slopeOhm;
  element.b = voltageV - slopeOhm * aboutA;
}
