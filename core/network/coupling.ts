/**
 * What one side of a converter or controller tells the other. The output's power follows from the output's network, the
 * input draws it; each Newton step takes the other side's latest figures, which settles as fast as the two sides are apart.
 */
import type { Circuit } from './circuit.ts';
import type { Element } from './element.ts';
import { evaluate, Law } from './element.ts';
import type { Reduction } from './ties.ts';
import { tieCurrents } from './ties.ts';
import type { ConverterValve, JoinerValve, TrackerValve, Valve } from './valve.ts';

type Coupler = ConverterValve | TrackerValve | JoinerValve;

/** At an array's very best power its volts are not fixed; a set power stays this little below it. */
export const SHORT_OF_NOSE = 1 - 1e-6;

export class Coupling {
  /** Current in each tie, from `from` to `to`, after `balance`. */
  readonly ties = new Map<Element, number>();
  private readonly couplers: readonly Coupler[];
  private readonly active: readonly Element[];
  private readonly reduction: Reduction;
  private readonly leaving: Float64Array;

  constructor(circuit: Circuit, reduction: Reduction, active: readonly Element[]) {
    this.couplers = circuit.valves.filter(isCoupler);
    this.reduction = reduction;
    this.active = active;
    this.leaving = new Float64Array(circuit.junctions.length);
  }

  /** Currents in all ties from the present currents in all other elements. */
  balance(): void {
    this.leaving.fill(0);
    for (const { from, to, i } of this.active) {
      this.leaving[from]! += i;
      this.leaving[to]! -= i;
    }
    tieCurrents(this.reduction.forest, this.leaving, this.ties);
  }

  /** Before the unloaded solve nothing is known of the other side: inputs draw nothing, trackers give a first guess. */
  reset(): void {
    for (const valve of this.couplers) {
      if (valve.kind === 'tracker' && valve.state === 'tracking') {
        valve.element.b = valve.setpointV;
        valve.element.a = 0.5 * valve.setpointV * valve.limitA;
        evaluate(valve.element, valve.setpointV);
      } else if (valve.kind !== 'joiner' && valve.input.law === Law.power) valve.input.a = 0;
      else if (valve.kind === 'joiner' && valve.state === 'held') valve.input.a = 0;
    }
  }

  /** Hands each side's figures to the other; returns the largest change of a current, A; 0 when nothing is coupled. */
  update(share: number): number {
    if (this.couplers.length === 0) return 0;
    this.balance();
    let moved = 0;
    for (const valve of this.couplers) {
      const target = valve.kind === 'tracker' && valve.state === 'tracking' ? valve.element : valve.input;
      const next = this.figureFor(valve);
      if (next === null || target.law === Law.none || target.law === Law.tie) continue;
      const before = target.i;
      target.a = next;
      evaluate(target, target.v);
      if (share !== 1 && target.law !== Law.powerSource) {
        target.i *= share;
        target.slope *= share;
      }
      moved = Math.max(moved, Math.abs(target.i - before));
    }
    return moved;
  }

  private figureFor(valve: Coupler): number | null {
    if (valve.state === 'off' || valve.state === 'direct') return valve.kind === 'converter' ? valve.standbyW : null;
    if (valve.kind === 'tracker' && valve.state === 'tracking') {
      const inputA = this.ties.get(valve.input) ?? 0;
      return Math.max(0, valve.efficiency * valve.trackedV * inputA);
    }
    // While states are being tried a held output may ask for more than its limit: the input is never asked for that.
    const heldA = Math.min(valve.limitA, Math.max(0, -(this.ties.get(valve.element) ?? 0)));
    const outputA = valve.state === 'held' ? heldA : valve.limitA;
    if (valve.kind === 'joiner') return Math.min(outputA, valve.state === 'held' ? valve.availableA : valve.shortA);
    const outputV = valve.state === 'held' ? valve.setpointV : Math.min(valve.setpointV, Math.max(0, valve.element.v));
    const inputW = (outputV * outputA) / valve.efficiency;
    return valve.kind === 'converter' ? inputW + valve.standbyW : Math.min(inputW, valve.availableW * SHORT_OF_NOSE);
  }
}

export function isCoupler(valve: Valve): valve is Coupler {
  return valve.kind === 'converter' || valve.kind === 'tracker' || valve.kind === 'joiner';
}
