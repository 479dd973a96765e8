/** The job as a fault sees it: loads off, conductors at one temperature, strings as the fault takes them. */
import type { CheckedJob, OperatingCase } from '../job/job.ts';
import { partsInCase } from '../job/job.ts';
import type { ChargerPart, JointPart, JunctionId, LoadPart, Part, PartId, StringPart } from '../job/part.ts';
import { junctionsOf } from '../job/part.ts';
import { type FaultMoment, type FaultRequest, faultString, type LimitedSource } from './faultSources.ts';

export interface NetworkRequest extends FaultRequest {
  readonly moment: FaultMoment;
  /** Only these strings; all where not said. */
  readonly strings?: ReadonlySet<PartId>;
}

/** Conductors of the highest fault are cold (as resistances are listed, IEC 60228). */
const COLD_DEG_C = 20;
/** Those of the lowest are as hot as their insulation bears, else at this: the common PVC of house wiring. Common practice. */
const HOT_DEG_C = 70;

/** One zone of a job, its limited sources as chargers. */
export interface FaultZone {
  readonly chargers: readonly LimitedSource[];
  readonly holds: (junction: JunctionId) => boolean;
}

/** Loads, chargers and the like stay as junctions without current; the chargers of a zone are added as parts of their own. */
export function faultJob(request: NetworkRequest, zone?: FaultZone) {
  const { job, operatingCase, moment } = request;
  const all = partsInCase(job, operatingCase).flatMap((part) => faultParts(part, request));
  const parts = zone === undefined ? all : all.filter((part) => junctionsOf(part).some(zone.holds));
  const faulted: CheckedJob = { ...job, parts: [...parts, ...(zone?.chargers.map(asCharger) ?? [])] };
  const still: OperatingCase = {
    ...operatingCase,
    ambientDegC: moment.most ? COLD_DEG_C : HOT_DEG_C,
    irradianceWPerM2: 0,
    surge: undefined,
    changed: new Map(),
  };
  return { job: faulted, operatingCase: still };
}

function faultParts(part: Part, request: NetworkRequest): readonly Part[] {
  switch (part.kind) {
    case 'string':
      if (request.strings !== undefined && !request.strings.has(part.id)) return [asOff(part)];
      return [{ ...part, ...faultString(part, request, request.moment) }];
    case 'cable':
    case 'pair':
      return [{ ...part, conductorDegC: degC(part.insulationDegC, request.moment.most) }];
    case 'load':
    case 'inverter':
    case 'charger':
    case 'converter':
      return [{ ...part, on: false }];
    case 'controller': {
      const { kind: _kind, type: _type, maxInputV: _maxInputV, setpointV, efficiency: _efficiency, ...rest } = part;
      const idle: Part = { ...rest, kind: 'converter', outputV: setpointV, efficiency: 1, standbyW: 0, on: false };
      // A switching controller joins the two minuses always.
      return part.type === 'pwm' ? [idle, commonMinus(part)] : [idle];
    }
    default:
      return [part];
  }
}

function degC(insulationDegC: number | undefined, most: boolean): number {
  return most ? COLD_DEG_C : Math.max(COLD_DEG_C, insulationDegC ?? HOT_DEG_C);
}

const bare = {
  label: undefined,
  note: undefined,
  locationTag: undefined,
  at: undefined,
  origin: new Map(),
  range: new Map(),
  given: new Set<string>(),
} as const;

/** A string that is switched off leaves its two junctions. */
function asOff({ id, plus, minus }: StringPart): Part {
  const off = {
    ...bare,
    id,
    plus,
    minus,
    kind: 'load',
    powerW: 1,
    currentA: undefined,
    resistanceOhm: undefined,
    on: false,
    minimumV: undefined,
    maximumV: undefined,
    surgeW: undefined,
    surgeS: undefined,
    continuous: undefined,
    dropClass: undefined,
  };
  return off as unknown as LoadPart;
}

function commonMinus({ id, from, to }: Extract<Part, { kind: 'controller' }>): JointPart {
  return { ...bare, id: `${id} minus` as PartId, kind: 'joint', from: from.minus, to: to.minus, resistanceOhm: 0 };
}

function asCharger({ part: id, plus, minus, limitA, openV }: LimitedSource): ChargerPart {
  const charger = {
    ...bare,
    id,
    kind: 'charger',
    plus,
    minus,
    source: undefined,
    outputA: limitA,
    setpointV: openV,
    on: true,
  };
  return charger as unknown as ChargerPart;
}
