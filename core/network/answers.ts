/** From a solved circuit to the answer about each part and junction. */
import { Defect } from '../job/issue.ts';
import type { JunctionId, Part, PartId } from '../job/part.ts';
import type { PartAnswer } from './answer.ts';
import type { Circuit, Sink } from './circuit.ts';
import type { Element } from './element.ts';
import { Law } from './element.ts';
import type { GraphView } from './graph.ts';
import type { Assembled } from './newton.ts';
import type { Valve } from './valve.ts';

const SIDE_BY_SIDE = 'zero-ohm parts lie side by side here: how the current splits between them is not determined';

/** An answer while it is put together. */
type Mutable<T> = { -readonly [K in keyof T]: T[K] };

/** Reads volts and currents of one solved circuit. */
export class Reader {
  readonly circuit: Circuit;
  readonly graph: GraphView;
  readonly assembled: Assembled | null;
  private readonly valveOfPart: ReadonlyMap<number, Valve>;
  private readonly sinkOf: ReadonlyMap<Element, Sink>;

  constructor(circuit: Circuit, graph: GraphView, assembled: Assembled | null) {
    this.circuit = circuit;
    this.graph = graph;
    this.assembled = assembled;
    this.valveOfPart = new Map(circuit.valves.map((valve) => [valve.partIndex, valve]));
    this.sinkOf = new Map(circuit.sinks.map((sink) => [sink.element, sink]));
    assembled?.coupling.balance();
  }

  /** Volts of a junction against its island's 0 V; null where nothing defines them. */
  voltsOf(j: number): number | null {
    const { assembled } = this;
    if (assembled === null || assembled.reduction.node[j] === -2 || assembled.reduction.drifting[j] === 1) return null;
    return assembled.volts[j]!;
  }

  /** Volts between two junctions; defined within a drifting group too. */
  voltsAcross(element: { readonly from: number; readonly to: number }): number | null {
    const { assembled } = this;
    if (assembled === null) return null;
    const { node, group } = assembled.reduction;
    if (node[element.from] === -2 || node[element.to] === -2) return null;
    if (group[element.from] !== group[element.to]) return null;
    if (this.graph.island[element.from] !== this.graph.island[element.to]) return null;
    return assembled.volts[element.from]! - assembled.volts[element.to]!;
  }

  /** Current through an element from `from` to `to`; null where ties side by side leave it open. */
  currentIn(element: Element): number | null {
    const { assembled } = this;
    if (assembled === null || element.law === Law.none || assembled.reduction.node[element.from] === -2) return 0;
    if (element.law !== Law.tie) return element.i;
    if (assembled.reduction.forest.undetermined.has(element)) return null;
    return assembled.coupling.ties.get(element) ?? 0;
  }

  junctions(): Map<JunctionId, number | null> {
    return new Map(this.circuit.junctions.map((id, j) => [id, this.voltsOf(j)]));
  }

  parts(): Map<PartId, PartAnswer> {
    const answers = new Map<PartId, PartAnswer>();
    this.circuit.parts.forEach((part, index) => {
      answers.set(part.id, this.partAnswer(part, index));
    });
    return answers;
  }

  private partAnswer(part: Part, index: number): PartAnswer {
    const elements = this.circuit.elementsOfPart[index]!;
    switch (part.kind) {
      case 'string':
        return this.twoPole(part, elements, -1);
      case 'array':
      case 'charger':
        return this.twoPole(part, elements, -1, this.stateOf(index));
      case 'load':
      case 'inverter':
        return this.twoPole(part, elements, 1, this.sinkState(part, elements));
      case 'controller':
      case 'converter':
        return this.twoPort(part, elements, this.stateOf(index));
      case 'busbar':
        return this.busbar(part, elements);
      case 'pair':
        throw new Defect('a pair is replaced by its two cables before it is answered');
      default:
        return this.twoEnded(part, index, elements);
    }
  }

  private twoPole(
    part: Extract<Part, { plus: JunctionId }>,
    elements: readonly Element[],
    sign: 1 | -1,
    state?: string,
  ): PartAnswer {
    const ends = this.ends(part.plus, part.minus);
    const voltageV = this.voltsAcross(ends);
    const first = elements[0];
    const through = first === undefined ? 0 : this.currentIn(first);
    const currentA = through === null ? null : positive(sign * through);
    // The halves of a string with a midpoint may carry different currents: the power is that of both.
    let powerW: number | null = 0;
    for (const element of elements)
      powerW = plusPower(powerW, sign, this.currentIn(element), this.voltsAcross(element));
    const answer: Mutable<PartAnswer> = { id: part.id, currentA, voltageV, powerW, dropV: null };
    if (state !== undefined) answer.state = state;
    if (currentA === null) answer.undetermined = SIDE_BY_SIDE;
    return answer;
  }

  private twoEnded(part: Extract<Part, { from: JunctionId }>, index: number, elements: readonly Element[]): PartAnswer {
    const element = elements[0];
    const voltageV = this.voltsAcross(this.ends(part.from, part.to));
    const currentA = element === undefined ? 0 : this.currentIn(element);
    let state = element === undefined ? 'open' : this.stateOf(index);
    if (part.kind === 'diode') state = element?.law === Law.none ? 'blocking' : 'conducting';
    const carries = element !== undefined && element.law !== Law.none;
    const dropV = voltageV === null ? null : Math.abs(voltageV);
    // A zero-ohm part turns nothing to heat, whatever its current.
    const powerW = !carries || dropV === 0 ? 0 : currentA === null || voltageV === null ? null : voltageV * currentA;
    const plainA = currentA === null ? null : positive(currentA);
    const answer: Mutable<PartAnswer> = { id: part.id, currentA: plainA, voltageV, powerW, dropV };
    const conductorDegC = this.temperature(index, currentA);
    if (conductorDegC !== undefined) answer.conductorDegC = conductorDegC;
    if (state !== undefined) answer.state = state;
    if (currentA === null) answer.undetermined = SIDE_BY_SIDE;
    return answer;
  }

  /** Conductor temperature: ambient + rise with the square of the current. */
  private temperature(index: number, currentA: number | null): number | undefined {
    const law = this.circuit.temperatures.get(index);
    if (law === undefined || (currentA === null && law.kelvinPerA2 > 0)) return undefined;
    return law.ambientDegC + law.kelvinPerA2 * (currentA ?? 0) ** 2;
  }

  private busbar(part: Extract<Part, { kind: 'busbar' }>, elements: readonly Element[]): PartAnswer {
    const segmentsA = elements.map((element) => this.currentIn(element));
    const known = segmentsA.filter((a): a is number => a !== null);
    const open = known.length < segmentsA.length;
    const largest = known.reduce((most, a) => (Math.abs(a) > Math.abs(most) ? a : most), 0);
    const ends = this.ends(part.junctions[0]!, part.junctions[part.junctions.length - 1]!);
    const voltageV = this.voltsAcross(ends);
    let powerW = 0;
    for (const element of elements)
      if (element.law !== Law.tie && element.law !== Law.none) powerW += element.i * element.v;
    return {
      id: part.id,
      currentA: open ? null : Math.abs(largest),
      voltageV,
      powerW,
      dropV: voltageV === null ? null : Math.abs(voltageV),
      segmentsA: segmentsA.map((a) => (a === null ? null : positive(a))),
      ...(open ? { undetermined: SIDE_BY_SIDE } : {}),
    };
  }

  private twoPort(
    part: Extract<Part, { kind: 'controller' | 'converter' }>,
    elements: readonly Element[],
    state: string | undefined,
  ): PartAnswer {
    const inputV = this.voltsAcross(this.ends(part.from.plus, part.from.minus));
    const outputV = this.voltsAcross(this.ends(part.to.plus, part.to.minus));
    const { inputA, outputA } = this.portCurrents(elements);
    const undetermined = inputA === null || outputA === null;
    const inputW = inputA === 0 ? 0 : inputA === null || inputV === null ? null : inputV * inputA;
    const outputW = outputA === 0 ? 0 : outputA === null || outputV === null ? null : outputV * outputA;
    return {
      id: part.id,
      currentA: outputA,
      voltageV: outputV,
      powerW: inputW === null || outputW === null ? null : inputW - outputW,
      dropV: null,
      state: state ?? 'off',
      inputA,
      inputV,
      outputA,
      outputV,
      ...(undetermined ? { undetermined: SIDE_BY_SIDE } : {}),
    };
  }

  private portCurrents(elements: readonly Element[]): { inputA: number | null; outputA: number | null } {
    const role = (name: string) => elements.find((element) => element.role === name);
    const input = role('input');
    const output = role('output');
    const link = role('plus-link');
    if (link !== undefined && link.law === Law.tie) {
      const a = this.currentIn(link);
      return { inputA: a, outputA: a };
    }
    const inputA = input === undefined ? 0 : this.currentIn(input);
    const out = output === undefined ? 0 : this.currentIn(output);
    return { inputA, outputA: out === null ? null : positive(-out) };
  }

  private sinkState(part: Part, elements: readonly Element[]): string | undefined {
    if (elements.length === 0) return 'off';
    const sink = this.sinkOf.get(elements[0]!);
    if (sink !== undefined && sink.state !== 'on') return sink.state;
    if (this.assembled === null || this.graph.island[elements[0]!.from]! < 0) return 'unfed';
    return part.kind === 'inverter' && part.acPowerW === undefined ? 'idle' : undefined;
  }

  /** What a valve is doing, in words. */
  private stateOf(index: number): string | undefined {
    const part = this.circuit.parts[index]!;
    const valve = this.valveOfPart.get(index);
    if (valve === undefined)
      return part.kind === 'charger' || part.kind === 'converter' ? 'off' : arrayState(this.circuit, index);
    return STATE_WORDS[valve.state](valve);
  }

  private ends(from: JunctionId, to: JunctionId): { from: number; to: number } {
    return { from: this.circuit.junctionIndex.get(from)!, to: this.circuit.junctionIndex.get(to)! };
  }
}

const STATE_WORDS: Record<Valve['state'], (valve: Valve) => string> = {
  off: (valve) => (valve.kind === 'charger' ? 'idle' : 'off'),
  held: () => 'voltage-held',
  limited: () => 'current-limited',
  tracking: () => 'tracking',
  direct: () => 'direct',
};

function arrayState(circuit: Circuit, index: number): string | undefined {
  return circuit.parts[index]!.kind === 'array' && circuit.elementsOfPart[index]!.length === 0 ? 'dark' : undefined;
}

function plusPower(sum: number | null, sign: 1 | -1, i: number | null, v: number | null): number | null {
  if (i === 0) return sum;
  return sum === null || i === null || v === null ? null : positive(sum + sign * i * v);
}

/** No minus zero in an answer. */
function positive(value: number): number {
  return value === 0 ? 0 : value;
}
