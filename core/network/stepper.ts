/**
 * One case solved again and again while its sources slowly change: the assembled network is kept from step to step, and its
 * valves are settled anew only where they disagree.
 */
import type { PartId } from '../job/part.ts';
import type { Collapse } from './answer.ts';
import type { Circuit, CircuitRequest } from './circuit.ts';
import { buildCircuit } from './circuit.ts';
import { disagreements } from './disagree.ts';
import type { Element } from './element.ts';
import { Law } from './element.ts';
import type { GraphView } from './graph.ts';
import { readGraph } from './graph.ts';
import type { Assembled } from './newton.ts';
import { dropMostStarved, settledCircuit } from './operatingPoint.ts';
import { settle } from './settle.ts';
import { startStates, unpark } from './startStates.ts';
import { trackMaximumPower } from './track.ts';
import { enter } from './valve.ts';

/** Why a step has no answer: the collapse that the full solve names, or null where the sums did not come to an end. */
export interface NoStep {
  readonly collapse: Collapse | null;
}

/** What a load was doing, to go back to where a step was tried in vain. */
export interface Marked {
  readonly states: readonly Circuit['sinks'][number]['state'][];
  readonly laws: readonly Law[];
}

/** Passes of Newton's method over the moving sources; a handful is usual. */
const PASSES = 60;
/** Times that valves may change in one step before it is given up. */
const ROUNDS = 24;
/** Times that the way to the answer may lead nowhere before a step is given up. */
const MOST_ASTRAY = 6;

export class Stepper {
  readonly circuit: Circuit;
  private readonly graph: GraphView;
  private readonly drawn: Marked;
  private readonly hasTrackers: boolean;
  private assembled: Assembled | null = null;

  constructor(request: CircuitRequest) {
    this.circuit = buildCircuit(request);
    this.graph = readGraph(this.circuit);
    this.drawn = this.mark();
    this.hasTrackers = this.circuit.valves.some((valve) => valve.kind === 'tracker');
  }

  /** False where no source supplies anything: then nothing flows. */
  get isSupplied(): boolean {
    return this.graph.reference.length > 0;
  }

  /** Loads that are out because their volts fell below their own minimum. */
  get droppedOut(): readonly PartId[] {
    const { sinks, parts } = this.circuit;
    return sinks.flatMap((sink) => (sink.state === 'dropped-out' ? [parts[sink.element.partIndex]!.id] : []));
  }

  mark(): Marked {
    const { sinks } = this.circuit;
    return {
      states: sinks.map(({ state, parkedLaw }) => (parkedLaw === null ? state : 'on')),
      laws: sinks.map(({ element, parkedLaw }) => parkedLaw ?? element.law),
    };
  }

  /** Loads as they were at `marked`; as drawn where nothing is given. */
  restore(marked: Marked = this.drawn): void {
    let changed = false;
    this.circuit.sinks.forEach((sink, k) => {
      if (sink.state === marked.states[k]! && sink.element.law === marked.laws[k]!) return;
      sink.state = marked.states[k]!;
      sink.element.law = marked.laws[k]!;
      sink.parkedLaw = null;
      changed = true;
    });
    if (changed) this.forget();
  }

  /**
   * The operating point with the moving sources where `aim` puts them: after every solve it may set their a and b anew, and
   * says when they have come to rest. Null when solved. `thorough`: where there is no answer, find out why (slow), and let loads
   * drop out that keep others from one; else it is only said that there is none.
   */
  solve(aim: () => boolean, thorough: boolean): NoStep | null {
    if (!this.isSupplied) return null;
    let astray = 0;
    for (let round = 0; round < ROUNDS; round++) {
      if (this.assembled === null) {
        const ending = this.start(thorough);
        if (!('assembled' in ending)) return ending;
        this.assembled = ending.assembled;
      }
      if (!this.follow(this.assembled, aim)) {
        // Sources that have moved on the way may want other states of the valves than those they set out with.
        this.forget();
        if (++astray > MOST_ASTRAY) break;
        continue;
      }
      if (!this.revise(this.assembled)) return null;
    }
    this.forget();
    return { collapse: null };
  }

  /** Volts across an element in the last solution; 0 where it is out of everything. */
  voltsAcross({ from, to }: { readonly from: number; readonly to: number }): number {
    const { assembled } = this;
    if (assembled === null || assembled.reduction.node[from] === -2 || assembled.reduction.node[to] === -2) return 0;
    return assembled.volts[from]! - assembled.volts[to]!;
  }

  /** Whether an element takes part in the last solution. */
  isLive({ from }: Element): boolean {
    return this.assembled !== null && this.assembled.reduction.node[from] !== -2;
  }

  /** What all elements together take, W: nothing but rounding where the balance holds (Tellegen). */
  powerSumW(): number {
    const { assembled } = this;
    if (assembled === null) return 0;
    let sum = 0;
    for (const element of assembled.active) sum += element.i * this.voltsAcross(element);
    for (const [tie, currentA] of assembled.coupling.ties) sum += currentA * this.voltsAcross(tie);
    return sum;
  }

  private start(thorough: boolean): { readonly assembled: Assembled } | NoStep {
    const { circuit, graph } = this;
    if (thorough) {
      const ending = settledCircuit(circuit, graph);
      return 'assembled' in ending ? ending : { collapse: ending };
    }
    startStates(circuit, graph);
    const settled = settle(circuit, graph, 1);
    return settled.ok ? settled : { collapse: null };
  }

  private follow(assembled: Assembled, aim: () => boolean): boolean {
    for (let pass = 0; pass < PASSES; pass++) {
      if (!assembled.solve(1)) return false;
      if (!aim()) continue;
      if (!this.hasTrackers) return true;
      if (!trackMaximumPower(assembled, 1)) return false;
      if (aim()) return true;
    }
    return false;
  }

  /** Puts right what does not agree with the solution; false where everything does. */
  private revise(assembled: Assembled): boolean {
    const { circuit, graph } = this;
    assembled.coupling.balance();
    const changes = disagreements(circuit, assembled);
    if (changes.length > 0) {
      unpark(circuit);
      for (const { valve, state } of changes) enter(valve, state);
      this.forget();
      const settled = settle(circuit, graph, 1);
      if (settled.ok) this.assembled = settled.assembled;
      return true;
    }
    if (!dropMostStarved(circuit, assembled) && !this.pushesBack()) return false;
    this.forget();
    return true;
  }

  /** A set current that only flows because the sums turn the volts round: the full solve says what that is. */
  private pushesBack(): boolean {
    return this.circuit.sinks.some(
      ({ element, state }) => state === 'on' && element.law === Law.current && element.a > 0 && element.v < -1e-9,
    );
  }

  private forget(): void {
    this.assembled?.factorisation.release();
    this.assembled = null;
  }
}
