/** Hours to months of use, each string with a charge of its own. */
import { Defect } from '../../job/issue.ts';
import type { CheckedJob, OperatingCase } from '../../job/job.ts';
import { caseById, partsInCase } from '../../job/job.ts';
import type { StringPart } from '../../job/part.ts';
import { nameOf } from '../../job/part.ts';
import { withoutPairs } from '../../network/wiring.ts';
import type { Tables } from '../../tables/tables.ts';
import type { CycleStep, DriftRequest, DriftStudy } from '../answer.ts';
import { type Bank, banksOf } from '../banks.ts';
import { isBeyond, limitFor, type StringLimits, stringLimits } from '../sharing/currentLimit.ts';
import { driftAssumptions } from './driftAssumed.ts';
import { DriftBooks, shownCharge } from './driftBooks.ts';
import { ampsText, DriftEvents } from './driftEvents.ts';
import { DriftMoments } from './driftMoments.ts';
import { DriftNetwork, type Step, type Store } from './driftNetwork.ts';

export interface DriftContext {
  readonly job: CheckedJob;
  readonly tables: Tables;
  readonly request: DriftRequest;
  /** Told after every cycle: cycles done, of so many. */
  readonly progress?: (done: number, of: number) => void;
}

/**
 * Runs a cycle of cases again and again. Every string (and each half of one with a junction at its middle) starts at its charge
 * in the first case of the cycle and keeps its own from there on; the network of each case is solved whole in every step, with
 * the slow resistance of the batteries. See `stepLine` for the method: second order, with Ah and Wh that add up to rounding.
 * Loads that drop out stay out to the end of their stretch; where a load asks for more than can be delivered the rest of the
 * stretch is spent with everything off. Both are told in `events`. Throws a `Defect` for a case that the job does not have.
 */
export function driftOf(context: DriftContext): DriftStudy {
  return new DriftRun(context).study();
}

/** A step that was taken; `strayed` where a longer one had no answer. */
interface Taken {
  readonly step: Step;
  readonly seconds: number;
  readonly strayed: boolean;
}

/** Short steps after a change of load, doubling from this part of a step: ringing of what is faster than a step dies out. */
const FIRST_STEPS = 32;

class DriftRun {
  private readonly context: DriftContext;
  private readonly stores: readonly Store[];
  private readonly banks: readonly Bank[];
  private readonly shownBank: Bank | undefined;
  private readonly limits: readonly StringLimits[];
  private readonly networks = new Map<string, DriftNetwork>();
  private readonly charge: Float64Array;
  private readonly books: DriftBooks;
  private readonly moments = new DriftMoments();
  private readonly events = new DriftEvents();
  private seconds = 0;
  private steps = 0;

  constructor(context: DriftContext) {
    this.context = context;
    const { job, tables, request } = context;
    if (!(request.stepS > 0)) throw new Defect('a step of a drift run takes time');
    const first = request.cycle[0];
    const parts = withoutPairs(first === undefined ? job.parts : partsInCase(job, this.caseOf(first.case)));
    const strings = parts.filter((part): part is StringPart => part.kind === 'string');
    this.stores = strings.flatMap((string): Store[] =>
      string.midpoint === undefined
        ? [{ string, half: null }]
        : [
            { string, half: 'upper' },
            { string, half: 'lower' },
          ],
    );
    this.banks = banksOf(parts);
    const largestAh = Math.max(...this.banks.map(({ capacityAh }) => capacityAh));
    this.shownBank = this.banks.find(({ capacityAh }) => capacityAh === largestAh);
    this.limits = this.stores.map(({ string }) => stringLimits(string, tables.chemistry));
    this.charge = Float64Array.from(this.stores, ({ string }) => string.stateOfCharge);
    this.books = new DriftBooks(this.stores, this.charge);
  }

  study(): DriftStudy {
    const { request, progress } = this.context;
    const cycleEnds: (readonly number[])[] = [];
    for (let cycle = 0; cycle < request.cycles; cycle++) {
      this.moments.beginCycle(cycle);
      this.events.cycle = cycle;
      for (const stretch of request.cycle) this.runStretch(stretch);
      cycleEnds.push(Array.from(this.charge, shownCharge));
      progress?.(cycle + 1, request.cycles);
    }
    return {
      cycle: request.cycle,
      cycles: request.cycles,
      hours: this.seconds / 3600,
      steps: this.steps,
      strings: this.books.strings(this.banks),
      moments: this.moments.list,
      cycleEnds,
      books: this.books.books,
      events: this.events.list,
      assumed: driftAssumptions(this.stores, this.context.tables),
    };
  }

  /** A stretch of one case; what a collapse leaves of it is spent at rest. */
  private runStretch({ case: id, hours }: CycleStep): void {
    const left = this.runCase(this.networkOf(id), hours * 3600);
    if (left === 0) return;
    // Should even rest have no answer, time passes all the same.
    const lost = this.runCase(this.networkOf('at-rest'), left);
    this.seconds += lost;
  }

  /** Seconds left when the case had no answer any more; 0 where it ran to its end. */
  private runCase(network: DriftNetwork, seconds: number): number {
    const longest = this.context.request.stepS;
    const shortest = longest / FIRST_STEPS;
    const end = this.seconds + seconds;
    network.stepper.restore();
    let currents: readonly number[] = this.stores.map(() => 0);
    let span = shortest;
    let careful = 0;
    for (let left = seconds; left > NO_TIME_S; left = end - this.seconds) {
      const wanted = Math.min(span, network.longestStep(this.charge, currents, span), left);
      const taken = this.tryStep(network, Math.max(wanted, Math.min(shortest, left)), shortest);
      if (taken === null) return left;
      currents = taken.step.stores.map(({ currentA }) => currentA);
      // Where longer steps found no answer the end may be near: on in short ones for a while.
      careful = taken.strayed ? FIRST_STEPS : careful - 1;
      span = careful > 0 ? shortest : Math.min(2 * Math.max(taken.seconds, shortest), longest);
    }
    this.seconds = end;
    return 0;
  }

  /** The step, or a shorter one where it is too long for what happens in it; null where the network has no answer. */
  private tryStep(network: DriftNetwork, seconds: number, shortest: number): Taken | null {
    const { stepper } = network;
    let strayed = false;
    for (let trial = seconds; ; ) {
      const canShorten = trial > shortest * (1 + 1e-9);
      const marked = stepper.mark();
      const outBefore = network.droppedOut.length;
      const step = network.step(this.charge, trial, !canShorten);
      if (!('stores' in step)) {
        stepper.restore(marked);
        if (!canShorten) {
          this.tellCollapse(network, step.collapse?.message, step.collapse?.load ?? null);
          return null;
        }
        strayed = true;
        trial = shortest;
      } else if (canShorten && (network.droppedOut.length > outBefore || this.isTooLong(network, step, trial))) {
        stepper.restore(marked);
        trial = Math.max(0.5 * trial, shortest);
      } else {
        this.accept(network, step, trial);
        return { step, seconds: trial, strayed };
      }
    }
  }

  private isTooLong(network: DriftNetwork, { stores }: Step, seconds: number): boolean {
    const ends = stores.map(({ stateOfCharge }) => stateOfCharge);
    const currents = stores.map(({ currentA }) => currentA);
    return network.longestStep(ends, currents, seconds) < 0.5 * seconds;
  }

  private accept(network: DriftNetwork, step: Step, seconds: number): void {
    const storedJ = step.stores.map(
      ({ stateOfCharge }, k) => network.energyJ(k, stateOfCharge) - network.energyJ(k, this.charge[k]!),
    );
    this.books.enter(step, seconds, storedJ);
    this.tellStep(network, step, seconds);
    step.stores.forEach(({ stateOfCharge }, k) => {
      this.charge[k] = stateOfCharge;
    });
    this.seconds += seconds;
    this.steps += 1;
    this.moments.add({
      hours: this.seconds / 3600,
      case: network.operatingCase.id,
      currentA: step.stores.map(({ currentA }) => currentA),
      stateOfCharge: Array.from(this.charge, shownCharge),
      bankV: this.shownBank === undefined ? 0 : bankVolts(network, this.shownBank),
    });
  }

  private tellStep(network: DriftNetwork, step: Step, seconds: number): void {
    const hours = this.seconds / 3600;
    const { id } = network.operatingCase;
    step.stores.forEach(({ currentA, stateOfCharge }, k) => {
      const { string } = this.stores[k]!;
      const name = this.nameOfStore(k);
      const before = this.charge[k]!;
      if (before > 0 && stateOfCharge <= 0) {
        const at = hours + (seconds / 3600) * (before / (before - stateOfCharge));
        this.events.tell(`empty ${name}`, { hours: at, part: string.id, text: `${name} empty` });
      }
      const limits = this.limits[k]!;
      if (!isBeyond(limits, currentA)) return;
      const does = currentA > 0 ? 'gives' : 'takes';
      const limitText = ampsText(limitFor(limits, currentA)!.limitA);
      const text = `${name} ${does} ${ampsText(Math.abs(currentA))} in case ${id}, beyond its limit of ${limitText},`;
      this.events.tell(`beyond ${does} ${name} ${id}`, { hours, part: string.id, text });
    });
    for (const part of network.droppedOut) {
      const text = `load ${this.nameOfPart(part)} drops out in case ${id}: too few volts,`;
      this.events.tell(`dropped ${id}`, { hours, part, text });
    }
  }

  private tellCollapse(network: DriftNetwork, message: string | undefined, part: Store['string']['id'] | null): void {
    const { id } = network.operatingCase;
    const why = message ?? 'the network finds no operating point.';
    const text = `case ${id} cannot go on (${why.replace(/\.$/, '')}); everything off for the rest of the stretch,`;
    this.events.tell(`collapse ${id}`, { hours: this.seconds / 3600, part, text });
  }

  private nameOfStore(k: number): string {
    const { string, half } = this.stores[k]!;
    return half === null ? `string ${nameOf(string)}` : `${half} half of string ${nameOf(string)}`;
  }

  private nameOfPart(id: Store['string']['id']): string {
    return nameOf(this.context.job.parts.find((part) => part.id === id)!);
  }

  private networkOf(id: string): DriftNetwork {
    let network = this.networks.get(id);
    if (network === undefined) {
      const { job, tables } = this.context;
      network = new DriftNetwork({ job, tables, stores: this.stores }, this.caseOf(id));
      this.networks.set(id, network);
    }
    return network;
  }

  private caseOf(id: string): OperatingCase {
    const found = caseById(this.context.job, id);
    if (found === undefined) throw new Defect(`a drift run names cases of its job (${id})`);
    return found;
  }
}

/** Shorter than this a stretch is over: what is left is rounding of the time. */
const NO_TIME_S = 1e-6;

function bankVolts(network: DriftNetwork, { branches }: Bank): number {
  const { plus, minus } = branches[0]!;
  return network.voltsBetween(plus, minus);
}
