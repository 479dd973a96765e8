/**
 * Which part of a current lasts three hours or more. The network does not label its amperes, so the case is solved once more with
 * everything that is not continuous switched off; what then flows is continuous, the rest is not.
 */
import type { LoadPart, PartId } from '../job/part.ts';
import type { OperatingPoint } from '../network/answer.ts';
import type { CheckContext, SolvedCase } from './checkContext.ts';

/** Ampere demand on a cable or device: factor · continuous + the rest. */
export interface Demand {
  readonly runningA: number;
  /** With loads that do not say how long they run taken as not continuous. */
  readonly leastA: number;
  /** The same, taken as continuous. */
  readonly mostA: number;
  /** Loads whose `continuous` would decide between the two. */
  readonly unmarked: readonly LoadPart[];
}

/**
 * Demands of one case: I_need = f · I_cont + max(0, |I| − I_cont), f from the job's settings.
 *
 * Loads marked `continuous: false` are not continuous; inverters, chargers, controllers, converters and arrays count as
 * continuous, since each can run for three hours; an unmarked load is taken both ways.
 */
export class Demands {
  private readonly base: SolvedCase;
  private readonly factor: number;
  private readonly unmarked: readonly LoadPart[];
  private readonly least: OperatingPoint;
  private readonly most: OperatingPoint;

  constructor(context: CheckContext, base: SolvedCase) {
    this.base = base;
    this.factor = context.job.settings.continuousFactor;
    const running = base.parts.filter((part): part is LoadPart => part.kind === 'load' && part.on);
    const brief = running.filter((part) => part.continuous === false);
    this.unmarked = running.filter((part) => part.continuous === undefined);
    this.most = context.solveChanged(base, brief.map(switchedOff));
    this.least =
      this.unmarked.length === 0
        ? this.most
        : context.solveChanged(base, [...brief, ...this.unmarked].map(switchedOff));
  }

  /** `undefined` where the current of the part is not determined. */
  of(id: PartId): Demand | undefined {
    if (this.least.outcome !== 'solved' || this.most.outcome !== 'solved') return undefined;
    const running = this.base.answer(id).currentA;
    const least = this.least.parts.get(id)?.currentA;
    const most = this.most.parts.get(id)?.currentA;
    if (running === null || typeof least !== 'number' || typeof most !== 'number') return undefined;
    const needs = [least, most].map((lasting) => this.need(Math.abs(running), Math.abs(lasting)));
    return {
      runningA: Math.abs(running),
      leastA: Math.min(...needs),
      mostA: Math.max(...needs),
      unmarked: this.unmarked,
    };
  }

  private need(runningA: number, lastingA: number): number {
    return this.factor * lastingA + Math.max(0, runningA - lastingA);
  }
}

function switchedOff(load: LoadPart): LoadPart {
  return { ...load, on: false };
}

const ofContext = new WeakMap<CheckContext, Map<SolvedCase, Demands>>();

/** The demands of a case, found once for all rules that ask. */
export function demandsOf(context: CheckContext, base: SolvedCase): Demands {
  let known = ofContext.get(context);
  if (known === undefined) {
    known = new Map();
    ofContext.set(context, known);
  }
  let demands = known.get(base);
  if (demands === undefined) {
    demands = new Demands(context, base);
    known.set(base, demands);
  }
  return demands;
}
