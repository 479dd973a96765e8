/** Faults of a network without diodes: one factorisation, one solve a fault. */
import type { PartId } from '../job/part.ts';
import type { Circuit } from '../network/circuit.ts';
import { readGraph } from '../network/graph.ts';
import type { Assembled } from '../network/newton.ts';
import { settledCircuit } from '../network/operatingPoint.ts';
import type { LimitedSource } from './faultSources.ts';
import { type FaultState, faultState } from './faultState.ts';
import { type FixedNetwork, type Injection, shortBetween, solveInjected } from './shortBetween.ts';

/** Limited sources are set currents; each lies across a network that conducts. */
export class LinearFaults {
  private readonly circuit: Circuit;
  private readonly limited: readonly LimitedSource[];
  private readonly placeOf: ReadonlyMap<PartId, number>;
  private readonly network: FixedNetwork | null;
  private readonly fed = new Map<LimitedSource, Injection>();

  constructor(circuit: Circuit, limited: readonly LimitedSource[]) {
    this.circuit = circuit;
    this.limited = limited;
    this.placeOf = new Map(circuit.parts.map(({ id }, index) => [id, index]));
    this.network = this.openNetwork();
  }

  /** Gives the factors' memory back. */
  release(): void {
    this.network?.assembled.factorisation.release();
  }

  fault(from: number, to: number): FaultState | null {
    const { network, circuit, limited, placeOf } = this;
    const shorted = network === null ? null : shortBetween(network, from, to);
    if (shorted === null) return null;
    const { currentA, openV, sourceOhm, currentIn } = shorted;
    const givenBy = (source: LimitedSource) => this.fed.get(source)?.currentA ?? 0;
    return faultState({ circuit, placeOf, limited, head: { currentA, openV, sourceOhm }, currentIn, givenBy });
  }

  /** The strings and the set currents, solved without a short; null where there is no source. */
  private openNetwork(): FixedNetwork | null {
    const { circuit } = this;
    const assembled = solvedOpen(circuit);
    if (assembled === null) return null;
    const { node } = assembled.reduction;
    for (const source of this.limited) {
      const [plus, minus] = [circuit.junctionIndex.get(source.plus)!, circuit.junctionIndex.get(source.minus)!];
      if (node[plus] !== -2) this.fed.set(source, { plus, minus, currentA: source.limitA });
    }
    const injections = [...this.fed.values()];
    const x = solveInjected(assembled, injections);
    const openVolts = assembled.volts.map((volts, j) => volts + (node[j]! >= 0 ? x[node[j]!]! : 0));
    return { circuit, assembled, openVolts, injections, figures: (element) => element };
  }
}

/** The strings alone, solved; null where there is none. The factors are those of the answer. */
function solvedOpen(circuit: Circuit): Assembled | null {
  const graph = readGraph(circuit);
  if (graph.reference.length === 0) return null;
  const ending = settledCircuit(circuit, graph);
  return 'assembled' in ending && ending.assembled.isHighBranch() ? ending.assembled : null;
}
