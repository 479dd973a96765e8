/** A job in one operating case as an electrical circuit: junctions, two-terminal elements, valves. */
import { stringSource } from '../battery/stringSource.ts';
import { conductorResistance } from '../conductor/resistance.ts';
import { Defect } from '../job/issue.ts';
import type { CheckedJob, OperatingCase } from '../job/job.ts';
import { partsInCase } from '../job/job.ts';
import type { CablePart, JunctionId, Part, StringPart } from '../job/part.ts';
import { cablesOfPair, junctionsOf } from '../job/part.ts';
import { arrayCurve } from '../solar/arrayCurve.ts';
import type { Tables } from '../tables/tables.ts';
import type { Assumption, BatteryModel } from './answer.ts';
import { Assumptions, arrayAssumptions, stringAssumptions } from './assumptions.ts';
import { type ConductorContext, conductorModel } from './conductorModel.ts';
import { Element, Law } from './element.ts';
import { inverterDcPowerW } from './inverter.ts';
import type { Valve } from './valve.ts';
import { enter } from './valve.ts';

/** A load, inverter or converter input that takes a set current or power: it can starve or drop out. */
export interface Sink {
  readonly element: Element;
  readonly minimumV: number | undefined;
  state: 'on' | 'dropped-out' | 'unfed';
  /** Its law while it is set aside because closed valves cut it off; null otherwise. */
  parkedLaw: Law | null;
}

export interface Circuit {
  readonly job: CheckedJob;
  readonly operatingCase: OperatingCase;
  readonly model: BatteryModel;
  /** The parts as they stand in the case, pairs replaced by their two cables. */
  readonly parts: readonly Part[];
  readonly junctions: readonly JunctionId[];
  readonly junctionIndex: ReadonlyMap<JunctionId, number>;
  readonly elements: readonly Element[];
  /** Elements of each part, by part index. */
  readonly elementsOfPart: readonly (readonly Element[])[];
  readonly valves: readonly Valve[];
  readonly sinks: readonly Sink[];
  /** Conductor temperature by part index: ambient + kelvinPerA2 i^2. */
  readonly temperatures: ReadonlyMap<number, { readonly ambientDegC: number; readonly kelvinPerA2: number }>;
  readonly assumptions: readonly Assumption[];
}

export interface CircuitRequest {
  readonly job: CheckedJob;
  readonly operatingCase: OperatingCase;
  readonly tables: Tables;
  readonly model: BatteryModel;
}

/** Ambient of a case: its own, else the site's design ambient, else 25 degC (common practice). */
export function ambientOf(job: CheckedJob, operatingCase: OperatingCase): number {
  return operatingCase.ambientDegC ?? job.site.ambientDesignDegC ?? DEFAULT_AMBIENT_DEG_C;
}
const DEFAULT_AMBIENT_DEG_C = 25;
/** Drop of a conducting silicon isolator where the label says nothing; common practice. */
const DEFAULT_DIODE_V = 0.6;
/** Converter and maximum-power controller efficiencies where the label says nothing; common practice. */
const DEFAULT_CONVERTER_EFFICIENCY = 0.9;
const DEFAULT_TRACKER_EFFICIENCY = 0.95;
/** Irradiance where a case does not say: full sun as on the module's label, IEC 61215 standard test conditions. */
const FULL_SUN_W_PER_M2 = 1000;

export function buildCircuit(request: CircuitRequest): Circuit {
  const builder = new CircuitBuilder(request);
  builder.addParts();
  return builder.finish();
}

class CircuitBuilder {
  readonly request: CircuitRequest;
  readonly parts: Part[] = [];
  readonly junctions: JunctionId[] = [];
  readonly junctionIndex = new Map<JunctionId, number>();
  readonly elements: Element[] = [];
  readonly elementsOfPart: Element[][] = [];
  readonly valves: Valve[] = [];
  readonly sinks: Sink[] = [];
  readonly temperatures = new Map<number, { readonly ambientDegC: number; readonly kelvinPerA2: number }>();
  readonly conductors: ConductorContext;
  readonly assumptions: Assumptions;
  readonly ambientDegC: number;

  constructor(request: CircuitRequest) {
    this.request = request;
    this.ambientDegC = ambientOf(request.job, request.operatingCase);
    this.assumptions = new Assumptions(request, this.ambientDegC);
    const { practice } = request.job;
    const detail = `${practice} ${this.ambientDegC}`;
    this.conductors = { practice, ambientDegC: this.ambientDegC, tables: request.tables, detail };
  }

  addParts(): void {
    const { job, operatingCase } = this.request;
    for (const part of partsInCase(job, operatingCase)) {
      // A pair's own junctions come first so that the drawing order of junctions is kept.
      for (const junction of junctionsOf(part)) this.junction(junction);
      if (part.kind === 'pair') for (const cable of cablesOfPair(part)) this.addPart(cable);
      else this.addPart(part);
    }
  }

  finish(): Circuit {
    const { job, operatingCase, model } = this.request;
    return {
      job,
      operatingCase,
      model,
      parts: this.parts,
      junctions: this.junctions,
      junctionIndex: this.junctionIndex,
      elements: this.elements,
      elementsOfPart: this.elementsOfPart,
      valves: this.valves,
      sinks: this.sinks,
      temperatures: this.temperatures,
      assumptions: this.assumptions.list,
    };
  }

  private junction(id: JunctionId): number {
    const known = this.junctionIndex.get(id);
    if (known !== undefined) return known;
    const index = this.junctions.length;
    this.junctions.push(id);
    this.junctionIndex.set(id, index);
    return index;
  }

  private add(role: string, from: JunctionId, to: JunctionId, law: Law, a: number, b = 0): Element {
    const partIndex = this.parts.length - 1;
    const element = new Element(
      { index: this.elements.length, partIndex, role, from: this.junction(from), to: this.junction(to) },
      law,
      a,
      b,
    );
    this.elements.push(element);
    this.elementsOfPart[partIndex]!.push(element);
    return element;
  }

  /** A plain resistance; exactly zero ohms becomes a tie, never a very small resistance. */
  private resistor(role: string, from: JunctionId, to: JunctionId, ohm: number): Element {
    return ohm === 0 ? this.add(role, from, to, Law.tie, 0) : this.add(role, from, to, Law.conductance, 1 / ohm);
  }

  private addPart(part: Part): void {
    this.parts.push(part);
    this.elementsOfPart.push([]);
    switch (part.kind) {
      case 'string':
        this.addString(part);
        return;
      case 'cable':
        this.addCable(part);
        return;
      case 'pair':
        throw new Defect('a pair is replaced by its two cables before it reaches the circuit');
      case 'busbar':
        for (let k = 1; k < part.junctions.length; k++) {
          this.resistor(`segment ${k - 1}`, part.junctions[k - 1]!, part.junctions[k]!, part.segmentOhm);
        }
        return;
      case 'fuse':
      case 'breaker':
      case 'switch':
        if (part.state === 'closed') this.resistor('', part.from, part.to, part.resistanceOhm ?? 0);
        return;
      case 'shunt':
        // By definition of its rating: ratingMv across it at ratingA.
        this.resistor('', part.from, part.to, part.ratingMv / 1000 / part.ratingA);
        return;
      case 'joint':
        this.resistor('', part.from, part.to, part.resistanceOhm);
        return;
      case 'bond':
        this.addBond(part);
        return;
      default:
        this.addActive(part);
    }
  }

  private addActive(part: Part): void {
    const partIndex = this.parts.length - 1;
    switch (part.kind) {
      case 'diode': {
        const element = this.add('', part.from, part.to, Law.none, 0);
        const forwardV = part.forwardV ?? DEFAULT_DIODE_V;
        if (part.forwardV === undefined) this.assumptions.plain(part, 'forwardV', forwardV, 'V');
        this.valve({ kind: 'diode', partIndex, state: 'held', element, forwardV, slopeOhm: part.slopeOhm ?? 0 });
        return;
      }
      case 'load':
        this.addLoad(part);
        return;
      case 'inverter':
        this.addInverter(part);
        return;
      case 'array':
        this.addArray(part);
        return;
      case 'charger': {
        if (!part.on) return;
        const element = this.add('', part.plus, part.minus, Law.none, 0);
        this.valve({
          kind: 'charger',
          partIndex,
          state: 'held',
          element,
          setpointV: part.setpointV,
          limitA: part.outputA,
        });
        return;
      }
      case 'converter':
        this.addConverter(part);
        return;
      case 'controller':
        this.addController(part);
        return;
      default:
        throw new Defect(`every part kind has an electrical form (${part.kind})`);
    }
  }

  private valve(valve: Valve): void {
    enter(valve, valve.state);
    this.valves.push(valve);
  }

  private addString(part: StringPart): void {
    const { tables, model } = this.request;
    const source = stringSource(part, { model, ambientDegC: this.ambientDegC, tables: tables.chemistry });
    this.assumptions.add(stringAssumptions(part, source));
    const emfV = source.emfV.value;
    const ohm = source.resistanceOhm.value + part.linkOhm;
    if (part.midpoint === undefined) {
      this.add('', part.plus, part.minus, Law.emf, 1 / ohm, emfV);
    } else {
      this.add('upper', part.plus, part.midpoint, Law.emf, 2 / ohm, emfV / 2);
      this.add('lower', part.midpoint, part.minus, Law.emf, 2 / ohm, emfV / 2);
    }
  }

  private addCable(part: CablePart): void {
    const { coldOhm, warmingOhmPerA2, temperature, assumptions } = conductorModel(part, this.conductors);
    this.assumptions.add(assumptions);
    if (temperature !== undefined) this.temperatures.set(this.parts.length - 1, temperature);
    if (warmingOhmPerA2 > 0 && coldOhm > 0) this.add('', part.from, part.to, Law.warming, coldOhm, warmingOhmPerA2);
    else this.resistor('', part.from, part.to, coldOhm);
  }

  private addBond(part: Extract<Part, { kind: 'bond' }>): void {
    const { job, tables } = this.request;
    let ohm = 0;
    if (part.size !== undefined && part.lengthM !== undefined) {
      const conductor = conductorResistance(
        { lengthM: part.lengthM, size: part.size, inParallel: 1, metal: undefined, stranding: undefined },
        { practice: job.practice, tables: tables.conductors },
      );
      if (!('missing' in conductor)) ohm = conductor.at20Ohm * (1 + conductor.alphaPerK * (this.ambientDegC - 20));
    }
    this.resistor('', part.from, part.to, ohm);
  }

  private addLoad(part: Extract<Part, { kind: 'load' }>): void {
    if (!part.on) return;
    const starting = this.request.operatingCase.surge === part.id ? part.surgeW : undefined;
    let element: Element;
    if (starting !== undefined) element = this.add('', part.plus, part.minus, Law.power, starting);
    else if (part.powerW !== undefined) element = this.add('', part.plus, part.minus, Law.power, part.powerW);
    else if (part.currentA !== undefined) element = this.add('', part.plus, part.minus, Law.current, part.currentA);
    else element = this.resistor('', part.plus, part.minus, part.resistanceOhm!);
    this.sinks.push({ element, minimumV: part.minimumV, state: 'on', parkedLaw: null });
  }

  private addInverter(part: Extract<Part, { kind: 'inverter' }>): void {
    if (!part.on) return;
    const starting = this.request.operatingCase.surge === part.id ? part.surgeW : undefined;
    const dc = inverterDcPowerW(part, starting ?? part.acPowerW ?? 0);
    if (part.efficiency === undefined) this.assumptions.plain(part, 'efficiency', dc.efficiency, '1');
    const element = this.add('', part.plus, part.minus, Law.power, dc.powerW);
    this.sinks.push({ element, minimumV: part.cutoffV, state: 'on', parkedLaw: null });
  }

  private addArray(part: Extract<Part, { kind: 'array' }>): void {
    const irradianceWPerM2 = this.request.operatingCase.irradianceWPerM2 ?? FULL_SUN_W_PER_M2;
    if (this.request.operatingCase.irradianceWPerM2 === undefined) {
      this.assumptions.plain(part, 'irradianceWPerM2', irradianceWPerM2, 'W/m2');
    }
    if (irradianceWPerM2 <= 0) return;
    const element = this.add('', part.plus, part.minus, Law.array, 0);
    element.curve = arrayCurve(part, { irradianceWPerM2, ambientDegC: this.ambientDegC });
    this.assumptions.add(arrayAssumptions(part, element.curve));
  }

  private addConverter(part: Extract<Part, { kind: 'converter' }>): void {
    if (!part.on) return;
    const partIndex = this.parts.length - 1;
    if (part.efficiency === undefined) this.assumptions.plain(part, 'efficiency', DEFAULT_CONVERTER_EFFICIENCY, '1');
    const standbyW = part.standbyW ?? 0;
    const input = this.add('input', part.from.plus, part.from.minus, Law.power, standbyW);
    const element = this.add('output', part.to.plus, part.to.minus, Law.none, 0);
    const efficiency = part.efficiency ?? DEFAULT_CONVERTER_EFFICIENCY;
    const shape = { partIndex, element, input, setpointV: part.outputV, limitA: part.outputA, efficiency, standbyW };
    this.valve({ kind: 'converter', state: 'held', ...shape });
    this.sinks.push({ element: input, minimumV: undefined, state: 'on', parkedLaw: null });
  }

  private addController(part: Extract<Part, { kind: 'controller' }>): void {
    const partIndex = this.parts.length - 1;
    const input = this.add('input', part.from.plus, part.from.minus, Law.none, 0);
    const element = this.add('output', part.to.plus, part.to.minus, Law.none, 0);
    const limits = { partIndex, element, input, setpointV: part.setpointV, limitA: part.outputA };
    if (part.type === 'pwm') {
      const plusLink = this.add('plus-link', part.from.plus, part.to.plus, Law.none, 0);
      const minusLink = this.add('minus-link', part.from.minus, part.to.minus, Law.tie, 0);
      this.valve({ kind: 'joiner', state: 'off', plusLink, minusLink, availableA: 0, shortA: 0, ...limits });
      return;
    }
    if (part.efficiency === undefined) this.assumptions.plain(part, 'efficiency', DEFAULT_TRACKER_EFFICIENCY, '1');
    const efficiency = part.efficiency ?? DEFAULT_TRACKER_EFFICIENCY;
    this.valve({ kind: 'tracker', state: 'off', efficiency, trackedV: 0, availableW: 0, ...limits });
    this.sinks.push({ element: input, minimumV: undefined, state: 'on', parkedLaw: null });
  }
}
