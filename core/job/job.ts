/** The nouns of a job, after checking. Only `parseJob` makes a `CheckedJob`. */
import type { Chemistry, JunctionId, Part, PartId } from './part.ts';

export type Practice = 'us-land' | 'us-marine' | 'iso-marine' | 'iec-land';

export interface Site {
  /** North positive. */
  readonly latitudeDeg: number | undefined;
  readonly ambientMinDegC: number | undefined;
  readonly ambientDesignDegC: number | undefined;
  readonly ambientMaxDegC: number | undefined;
  /** Twelve daily means on the horizontal, January first. */
  readonly irradiationKWhPerM2Day: readonly number[] | undefined;
  readonly albedo: number | undefined;
  /** The engine or the tanks share a closed space with petrol (gasoline). */
  readonly gasolineSpace?: boolean | undefined;
  /** Wet or salty air. */
  readonly dampSpace?: boolean | undefined;
  /** Signs that name every source are fitted. */
  readonly sourceSign?: boolean | undefined;
}

export interface JunctionNote {
  readonly label: string | undefined;
  readonly at: { readonly x: number; readonly y: number } | undefined;
  /** This junction is 0 V for its island. */
  readonly reference: boolean;
}

/** An operating case with its overrides already applied to whole parts. */
export interface OperatingCase {
  readonly id: string;
  readonly label: string | undefined;
  readonly ambientDegC: number | undefined;
  readonly irradianceWPerM2: number | undefined;
  /** The load or inverter that starts up in this case (it draws its surge power). */
  readonly surge: PartId | undefined;
  /** Parts that differ from the drawing in this case, whole, after `set`, `stateOfCharge` and `stateOfChargeByString`. */
  readonly changed: ReadonlyMap<PartId, Part>;
}

export interface DemandRow {
  readonly label: string | undefined;
  readonly powerW: number;
  readonly quantity: number;
  /** Twelve values, January first (a single number in the file is repeated). */
  readonly hoursPerDay: readonly number[];
  readonly supply: 'dc' | 'ac';
  readonly surgeW: number | undefined;
  readonly together: boolean;
  /** 24 fractions of the row's daily energy. */
  readonly hourProfile: readonly number[] | undefined;
}

export interface Targets {
  readonly autonomyDays: number | undefined;
  readonly maxDepthOfDischarge: number | undefined;
  readonly systemV: number | undefined;
  readonly chemistry: Chemistry | undefined;
  readonly designMargin: number | undefined;
  readonly ageFactor: number | undefined;
  readonly coldestBatteryDegC: number | undefined;
  readonly wireLoss: number | undefined;
  readonly inverterEfficiency: number | undefined;
  readonly batteryEfficiency: number | undefined;
  readonly arrayDerate: number | undefined;
  /** Hours a year. */
  readonly lossOfLoad: number | undefined;
  readonly dropLimit: number | undefined;
}

interface ReadingBase {
  readonly id: string;
  readonly case: string | undefined;
  readonly meter: string | undefined;
  readonly standardUncertainty: number | undefined;
  readonly set: 'as-found' | 'as-left' | undefined;
  readonly takenAt: string | undefined;
  readonly takenBy: string | undefined;
  readonly restedHours: number | undefined;
}
export type Reading =
  | (ReadingBase & {
      readonly quantity: 'voltage';
      readonly plus: JunctionId;
      readonly minus: JunctionId;
      readonly valueV: number;
    })
  | (ReadingBase & { readonly quantity: 'current'; readonly part: PartId; readonly valueA: number })
  | (ReadingBase & { readonly quantity: 'temperature'; readonly part: PartId; readonly valueDegC: number });

/**
 * Thresholds that have no published source, each with its default. All are *common practice, no published source* unless a
 * practice supplies a value; `undefined` means "the practice's own figure".
 */
export interface Settings {
  /** Allowed voltage drop of a critical load, as a fraction of nominal volts. */
  readonly dropCritical: number | undefined;
  /** Allowed voltage drop of an ordinary load, as a fraction of nominal volts. */
  readonly dropOrdinary: number | undefined;
  /** Nominal system volts that percentages refer to; else from the strings. */
  readonly nominalV: number | undefined;
  /** Cable current over ampacity above which the finding is `stop` instead of `fix`. Default 1.2. */
  readonly cableStopFactor: number;
  /** Factor on continuous current for fuses and cables. Default 1.25. */
  readonly continuousFactor: number;
  /** Share deviation from fair share that is worth a look. Default 0.10. */
  readonly shareLimit: number;
  /** Strings in parallel above which a look is asked for. Default 4. */
  readonly maxParallelStrings: number;
  /** Age gap between parallel strings, years. Default 1. */
  readonly ageGapYears: number;
  /** Half-string volts off centre, as fractions of total volts: watch, act. Defaults 0.005, 0.01. */
  readonly midpointWatch: number;
  readonly midpointAct: number;
  /** A fault at its weakest is to open its device within this many seconds. Default 5. */
  readonly faultClearS: number;
}

declare const checked: unique symbol;

/** A job that has passed every check of shape, unit, range and reference. */
export interface CheckedJob {
  readonly [checked]: true;
  readonly title: string;
  readonly notes: string | undefined;
  readonly preparedFor: string | undefined;
  readonly preparedBy: string | undefined;
  readonly practice: Practice;
  /** True where the job names no practice and `practice` is only assumed: enough to solve with, not to judge by. */
  readonly practiceAssumed?: boolean;
  readonly practiceEdition: string | undefined;
  readonly site: Site;
  readonly junctions: ReadonlyMap<JunctionId, JunctionNote>;
  readonly parts: readonly Part[];
  /** As given, or the one case `as-drawn`; `at-rest` is not in the list but always available, see `caseById`. */
  readonly cases: readonly OperatingCase[];
  readonly demand: readonly DemandRow[];
  readonly targets: Targets;
  readonly readings: readonly Reading[];
  readonly settings: Settings;
  /** `x-…` fields of the job itself, carried along untouched. */
  readonly extra: ReadonlyMap<string, unknown>;
}

/** The parts of a job as they stand in a case, in job order. */
export function partsInCase(job: CheckedJob, operatingCase: OperatingCase): readonly Part[] {
  return job.parts.map((part) => operatingCase.changed.get(part.id) ?? part);
}

/** A case of the job by its id; `at-rest` (all loads, inverters, chargers and arrays off) exists in every job. */
export function caseById(job: CheckedJob, id: string): OperatingCase | undefined {
  return job.cases.find((candidate) => candidate.id === id) ?? (id === 'at-rest' ? atRest(job) : undefined);
}

function atRest(job: CheckedJob): OperatingCase {
  const changed = atRestChanges(job.parts);
  return { id: 'at-rest', label: 'At rest', ambientDegC: undefined, irradianceWPerM2: 0, surge: undefined, changed };
}

/** The parts that differ from the drawing when the system rests: loads, inverters, chargers and converters off. */
export function atRestChanges(parts: readonly Part[]): ReadonlyMap<PartId, Part> {
  const changed = new Map<PartId, Part>();
  for (const part of parts) if ('on' in part) changed.set(part.id, { ...part, on: false });
  return changed;
}

/** The same job judged by another practice. */
export function withPractice(job: CheckedJob, practice: Practice): CheckedJob {
  return { ...job, practice, practiceAssumed: false };
}
