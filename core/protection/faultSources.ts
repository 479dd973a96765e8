/** What drives a fault: battery strings as volts behind a resistance, everything electronic as a limited current. */
import { factsOf, type StringSource, stringEmf, stringEmfAtCharge, stringSource } from '../battery/stringSource.ts';
import type { CheckedJob, OperatingCase } from '../job/job.ts';
import { partsInCase } from '../job/job.ts';
import type { JunctionId, Part, PartId, StringPart } from '../job/part.ts';
import { ambientOf } from '../network/circuit.ts';
import type { Tables } from '../tables/tables.ts';
import type { FaultMethod } from './answer.ts';

/**
 * `entered`: the highest fault by the figures' own values. `bounds`: by the end of their bands that gives more, strings full.
 * The lowest fault goes by the other end of the bands in either.
 */
export type FaultFigures = 'entered' | 'bounds';

export interface FaultRequest {
  readonly job: CheckedJob;
  readonly tables: Tables;
  readonly operatingCase: OperatingCase;
  readonly method: FaultMethod;
  /** `entered` where not said. */
  readonly figures?: FaultFigures;
  /** Every junction is shorted to this one; each to the reference of its island where not said. */
  readonly to?: JunctionId;
}

/** Volts at rest behind a resistance, inter-block links excluded. */
export interface StringEmf {
  readonly emfV: number;
  readonly resistanceOhm: number;
}

/** Which fault: the most that can flow, or the least, at its first instant or once settled. */
export interface FaultMoment {
  readonly most: boolean;
  readonly settled: boolean;
}

/** A charger, converter, controller or array: it gives no more than its limit into a fault. */
export interface LimitedSource {
  readonly part: PartId;
  readonly plus: JunctionId;
  readonly minus: JunctionId;
  readonly limitA: number;
  /** The volts that it goes up to with nothing connected. */
  readonly openV: number;
}

/** Factors of IEC 61660-1:1997 for a battery branch (SRC-BAT-IEC61660), as in `batteryFault`. */
const IEC_OPEN_CIRCUIT = 1.05;
const IEC_FIRST_RESISTANCE = 0.9;
const IEC_SETTLED_VOLTAGE = 0.95;
/** Irradiance where a case does not say, as in the circuit: full sun of IEC 61215 test conditions. */
const FULL_SUN_W_PER_M2 = 1000;

/**
 * A string in a fault. `plain`: E behind R, first instant and settled alike. `iec-61660`: first E behind 0.9 R, settled 0.95 E
 * behind R (0.9 R and 0.1 R more); for the highest E is 1.05 times nominal where the job does not give it.
 *
 * Highest: own values, or (`bounds`, and by IEC) full, high E, low R, and a rated short-circuit current of the label before an
 * entered resistance where that gives more. Lowest: low E, high R.
 */
export function faultString(string: StringPart, request: FaultRequest, moment: FaultMoment): StringEmf {
  const base = moment.most ? highestString(string, request) : lowestString(string, request);
  if (request.method === 'plain') return base;
  const { emfV, resistanceOhm } = base;
  if (moment.settled) return { emfV: IEC_SETTLED_VOLTAGE * emfV, resistanceOhm };
  return { emfV, resistanceOhm: IEC_FIRST_RESISTANCE * resistanceOhm };
}

function highestString(string: StringPart, request: FaultRequest): StringEmf {
  const { emfV, resistanceOhm } = sourceOf(string, request);
  const rating = string.shortCircuitA;
  const rated = (volts: number, ohm: number) => (rating === undefined ? ohm : Math.min(ohm, volts / rating));
  if (request.figures === 'bounds') {
    const full = Math.max(emfV.high, fullEmfV(string, request));
    return { emfV: full, resistanceOhm: rated(emfV.value, resistanceOhm.low) };
  }
  if (request.method === 'plain') return { emfV: emfV.value, resistanceOhm: resistanceOhm.value };
  const nominalV = string.blocksInSeries * string.blockNominalV;
  const volts = string.emfV ?? IEC_OPEN_CIRCUIT * nominalV;
  return { emfV: volts, resistanceOhm: rated(emfV.value, resistanceOhm.value) };
}

function lowestString(string: StringPart, request: FaultRequest): StringEmf {
  const { emfV, resistanceOhm } = sourceOf(string, request);
  return { emfV: emfV.low, resistanceOhm: resistanceOhm.high };
}

/** Rest volts of the string when full: along its chemistry's curve; an entered figure stands as it is. */
function fullEmfV(string: StringPart, { job, tables, operatingCase }: FaultRequest): number {
  if (string.emfV !== undefined) return string.emfV;
  const facts = factsOf(string, { ambientDegC: ambientOf(job, operatingCase), tables: tables.chemistry });
  const spread = stringEmf({ ...facts, string: { ...string, stateOfCharge: 1 } }, tables.chemistry);
  return Math.max(spread.high, stringEmfAtCharge(facts, 1, tables.chemistry));
}

export function sourceOf(string: StringPart, { job, tables, operatingCase }: FaultRequest): StringSource {
  const ambientDegC = ambientOf(job, operatingCase);
  return stringSource(string, { model: 'fast', ambientDegC, tables: tables.chemistry });
}

/** What gives a limited current in the case, by the parts as they stand in it. Nothing where it is off or dark. */
export function limitedSources({ job, operatingCase }: FaultRequest): readonly LimitedSource[] {
  const sun = (operatingCase.irradianceWPerM2 ?? FULL_SUN_W_PER_M2) / FULL_SUN_W_PER_M2;
  return partsInCase(job, operatingCase).flatMap((part) => limitedSource(part, sun));
}

function limitedSource(part: Part, sun: number): readonly LimitedSource[] {
  switch (part.kind) {
    case 'charger':
      return part.on ? [{ ...polesOf(part), limitA: part.outputA, openV: part.setpointV }] : [];
    case 'converter':
      return part.on ? [{ part: part.id, ...part.to, limitA: part.outputA, openV: part.outputV }] : [];
    case 'controller':
      return sun > 0 ? [{ part: part.id, ...part.to, limitA: part.outputA, openV: part.setpointV }] : [];
    case 'array': {
      const limitA = part.iscA * part.stringsInParallel * sun;
      return sun > 0 ? [{ ...polesOf(part), limitA, openV: part.vocV * part.modulesInSeries }] : [];
    }
    default:
      return [];
  }
}

function polesOf({ id, plus, minus }: Extract<Part, { plus: JunctionId }>) {
  return { part: id, plus, minus };
}
