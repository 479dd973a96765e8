/** The network of a fault: loads off, strings as volts behind resistances, limited sources as set currents, one short. */
import type { JunctionId } from '../job/part.ts';
import { buildCircuit, type Circuit } from '../network/circuit.ts';
import { DisjointSets } from '../network/disjointSets.ts';
import { conducts } from '../network/element.ts';
import { faultJob, type NetworkRequest } from './faultJob.ts';
import type { LimitedSource } from './faultSources.ts';
import type { FaultState } from './faultState.ts';
import { LinearFaults } from './linearFaults.ts';
import { ValvedFaults } from './valvedFaults.ts';

export class FaultNetwork {
  private readonly request: NetworkRequest;
  private readonly fed: readonly LimitedSource[];
  private readonly circuit: Circuit;
  private readonly linear: LinearFaults;
  /** Junctions that conductors, strings and limited sources join, diodes in either direction. */
  private readonly zones: Int32Array;
  /** Those with a diode, or with a limited source whose two poles nothing else joins: it has volts only as a charger has them. */
  private readonly valvedZones: ReadonlySet<number>;
  private readonly valved = new Map<number, ValvedFaults>();

  /** `fed`: the limited sources that count; none in the lowest fault. */
  constructor(request: NetworkRequest, fed: readonly LimitedSource[]) {
    this.request = request;
    this.fed = fed;
    this.circuit = buildCircuit({ ...faultJob(request), tables: request.tables, model: 'fast' });
    this.zones = joinedGroups(this.circuit, fed);
    const groups = joinedGroups(this.circuit, []);
    const at = (junction: JunctionId) => this.circuit.junctionIndex.get(junction)!;
    const alone = fed.filter(({ plus, minus }) => groups[at(plus)] !== groups[at(minus)]);
    this.valvedZones = new Set([
      ...this.circuit.valves.map(({ element }) => this.zones[element.from]!),
      ...alone.map(({ plus }) => this.zoneOf(plus)!),
    ]);
    const plain = fed.filter(({ plus }) => !this.valvedZones.has(this.zoneOf(plus)!));
    this.linear = new LinearFaults(this.circuit, plain);
  }

  /** The short between two junctions. Null where no source reaches the two, or they are one conductor. */
  fault(at: JunctionId, to: JunctionId): FaultState | null {
    const zone = this.zoneOf(at);
    if (zone === undefined || zone !== this.zoneOf(to)) return null;
    const { junctionIndex } = this.circuit;
    if (!this.valvedZones.has(zone)) return this.linear.fault(junctionIndex.get(at)!, junctionIndex.get(to)!);
    let valved = this.valved.get(zone);
    if (valved === undefined) {
      valved = this.valvedZone(zone);
      this.valved.set(zone, valved);
    }
    return valved.fault(at, to);
  }

  /** Gives the memory of the factors back; no fault can be asked for after that. */
  release(): void {
    this.linear.release();
    for (const valved of this.valved.values()) valved.release();
  }

  private zoneOf(junction: JunctionId): number | undefined {
    const j = this.circuit.junctionIndex.get(junction);
    return j === undefined ? undefined : this.zones[j];
  }

  private valvedZone(zone: number): ValvedFaults {
    const chargers = this.fed.filter(({ plus }) => this.zoneOf(plus) === zone);
    const own = faultJob(this.request, { chargers, holds: (junction) => this.zoneOf(junction) === zone });
    return new ValvedFaults(buildCircuit({ ...own, tables: this.request.tables, model: 'fast' }), chargers);
  }
}

function joinedGroups(circuit: Circuit, fed: readonly LimitedSource[]): Int32Array {
  const sets = new DisjointSets(circuit.junctions.length);
  for (const element of circuit.elements) if (conducts(element)) sets.join(element.from, element.to);
  for (const { plus, minus } of fed) sets.join(circuit.junctionIndex.get(plus)!, circuit.junctionIndex.get(minus)!);
  return sets.groups();
}
