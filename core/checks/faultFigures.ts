/**
 * Fault currents of the drawing for the rules that rest on them, studied once for a run: everything closed and on, plain Thévenin.
 * Figures of a string that the job gives count as they are given; assumed ones over their whole range, the string full for the most.
 */
import { factsOf, type StringSource, stringEmf, stringEmfAtCharge, stringSource } from '../battery/stringSource.ts';
import type { CheckedJob, OperatingCase } from '../job/job.ts';
import type { BusbarPart, Part, PartId, StringPart } from '../job/part.ts';
import { ambientOf } from '../network/circuit.ts';
import { type Device, isDevice } from '../network/wiring.ts';
import type { DeviceFault, FaultMethod } from '../protection/answer.ts';
import { deviceBandOf } from '../protection/deviceBand.ts';
import { deviceFaults } from '../protection/deviceFaults.ts';
import { withFaultModel } from '../protection/faultModel.ts';
import type { FaultRequest } from '../protection/faultSources.ts';
import { formatQuantity } from '../units/formatQuantity.ts';
import { type BarFault, barFaults } from './barFaults.ts';
import type { CheckContext } from './checkContext.ts';

export class FaultFigures {
  /** Closed devices that a source reaches and of which an interrupting rating or a time is known. */
  readonly devices: ReadonlyMap<PartId, DeviceFault>;
  /** Of bars with a short-time withstand, and of all where a fault could bring more than any bar is taken to stand. */
  readonly bars: ReadonlyMap<PartId, BarFault>;
  private readonly context: CheckContext;
  private readonly operatingCase: OperatingCase;
  private readonly ranged: readonly RangedString[];
  private soft: ReadonlyMap<PartId, DeviceFault> | undefined;
  private stiff: ReadonlyMap<PartId, DeviceFault> | undefined;

  constructor(context: CheckContext) {
    this.context = context;
    this.operatingCase = everythingClosed(context);
    this.ranged = rangedStrings(context, this.operatingCase);
    const isStrong = mostOfAllA(context, this.operatingCase) > WITHSTOOD_A;
    const bars = context.drawn.filter(
      (part): part is BusbarPart => part.kind === 'busbar' && (isStrong || hasWithstand(part)),
    );
    // The least is asked for where a time is known to hold it against.
    const highestOnly = !context.drawn.some((part) => isDevice(part) && isTimed(context, part));
    const found = withFaultModel(this.request(withExactEntries(context.job), 'bounds'), (model) => ({
      devices: deviceFaults(model, { isWanted: (device) => isJudged(context, device), highestOnly }),
      bars: bars.map((bar) => barFaults(model, bar)),
    }));
    this.devices = new Map(found.devices.map((fault) => [fault.device, fault]));
    this.bars = new Map(found.bars.flatMap((fault) => (fault === null ? [] : [[fault.bar, fault] as const])));
  }

  /** The most that a device has to break with the softest strings that may be assumed; `undefined` where nothing is assumed. */
  kindestHighestA(device: PartId): number | undefined {
    if (this.ranged.length === 0) return undefined;
    this.soft ??= this.faultsWith('soft');
    return this.soft.get(device)?.highestA;
  }

  /** The least that has to open a device with the stiffest strings that may be assumed; `undefined` where nothing is assumed. */
  kindestLowestA(device: PartId): number | undefined {
    if (this.ranged.length === 0) return undefined;
    this.stiff ??= this.faultsWith('stiff');
    return this.stiff.get(device)?.lowestA ?? undefined;
  }

  /** `; this rests on assumed figures, first of all …`, or nothing where every figure of a string was given. */
  get assumed(): string {
    const told = this.ranged.slice(0, 2).map(({ string, source: { resistanceOhm, emfV }, ofOhm }) => {
      const [name, figure, unit] = ofOhm
        ? (['resistanceOhm', resistanceOhm, 'ohm'] as const)
        : (['emfV', emfV, 'V'] as const);
      const text = (value: number) => formatQuantity({ value, unit, digits: 3 });
      const { value, low, high } = figure;
      return `${name} of ${string.id} (${text(value)}, may be ${text(low)} to ${text(high)})`;
    });
    return told.length === 0 ? '' : `; this rests on assumed figures, first of all ${told.join(' and ')}`;
  }

  private request(job: CheckedJob, figures: FaultRequest['figures'] & string): FaultRequest {
    return { job, tables: this.context.tables, operatingCase: this.operatingCase, method: 'plain', figures };
  }

  private faultsWith(end: 'soft' | 'stiff'): ReadonlyMap<PartId, DeviceFault> {
    const { job } = this.context;
    const settled = new Map<PartId, Part>(
      this.ranged.map(({ string, source: { emfV, resistanceOhm } }) => {
        const [volts, ohm] = end === 'soft' ? [emfV.low, resistanceOhm.high] : [emfV.high, resistanceOhm.low];
        return [string.id, exact({ ...string, emfV: volts, resistanceOhm: ohm })];
      }),
    );
    const parts = job.parts.map((part) => settled.get(part.id) ?? part);
    const isWanted = (device: Device) => isJudged(this.context, device);
    return withFaultModel(this.request(withExactEntries({ ...job, parts }), 'entered'), (model) => {
      const faults = deviceFaults(model, { isWanted, highestOnly: end === 'soft' });
      return new Map(faults.map((fault) => [fault.device, fault]));
    });
  }
}

/** What every bar is taken to stand: up to this IEC 61439-1, 10.11.2 asks for no proof of a bar's withstand. From memory, of a.c. */
export const WITHSTOOD_A = 10_000;

/** More than any fault can bring: every string shorted at its own posts at once, the chargers at their limits. */
function mostOfAllA({ job, tables }: CheckContext, operatingCase: OperatingCase): number {
  const ambientDegC = ambientOf(job, operatingCase);
  return job.parts.reduce((sum, part) => {
    if ('outputA' in part) return sum + part.outputA;
    if (part.kind !== 'string') return sum;
    const string = exact({ ...part, stateOfCharge: 1 });
    const { emfV, resistanceOhm } = stringSource(string, { model: 'fast', ambientDegC, tables: tables.chemistry });
    return sum + emfV.high / resistanceOhm.low;
  }, 0);
}

export function hasWithstand({ withstandA, withstandS }: BusbarPart): boolean {
  return withstandA !== undefined && withstandS !== undefined;
}

/** A device of which neither an interrupting rating nor a time is known has nothing that a current could be held against. */
function isJudged(context: CheckContext, device: Device): boolean {
  return device.interruptA !== undefined || isTimed(context, device);
}

function isTimed({ tables }: CheckContext, device: Device): boolean {
  return !('missing' in deviceBandOf(device, tables));
}

/** The drawing with every switch and device closed and every source on, in full sun. */
function everythingClosed({ job, cases }: CheckContext): OperatingCase {
  const changed = new Map<PartId, Part>();
  for (const part of job.parts) {
    if ('state' in part) changed.set(part.id, { ...part, state: 'closed' });
    else if ('on' in part) changed.set(part.id, { ...part, on: true });
  }
  const id = cases[0]?.id ?? '';
  return { id, label: undefined, ambientDegC: undefined, irradianceWPerM2: undefined, surge: undefined, changed };
}

/** Given figures count as they stand, unless the job itself gives them a range. */
function withExactEntries(job: CheckedJob): CheckedJob {
  return { ...job, parts: job.parts.map((part) => (part.kind === 'string' ? exact(part) : part)) };
}

/** The faults of the drawing as the rules take them, for those who ask for every junction or by another method. */
export function drawnFaults(context: CheckContext, method: FaultMethod): FaultRequest {
  const [job, operatingCase] = [withExactEntries(context.job), everythingClosed(context)];
  return { job, tables: context.tables, operatingCase, method, figures: 'bounds' };
}

const EXACT_FIELDS = ['emfV', 'resistanceOhm', 'shortCircuitA'] as const;

function exact(string: StringPart): StringPart {
  const range = new Map(string.range);
  for (const name of EXACT_FIELDS) {
    const value = string[name];
    if (value !== undefined && !range.has(name) && string.origin.get(name) !== 'guess') range.set(name, [value, value]);
  }
  return { ...string, range };
}

interface RangedString {
  readonly string: StringPart;
  /** The string's figures, those that the job gives as exact ones; the highest rest volts are those of a full string. */
  readonly source: StringSource;
  /** Which of the two is the wider. */
  readonly ofOhm: boolean;
}

function rangedStrings({ job, tables }: CheckContext, operatingCase: OperatingCase): readonly RangedString[] {
  const ambientDegC = ambientOf(job, operatingCase);
  const ranged = job.parts.flatMap((part): readonly RangedString[] => {
    if (part.kind !== 'string') return [];
    const string = exact(part);
    const source = stringSource(string, { model: 'fast', ambientDegC, tables: tables.chemistry });
    const { emfV, resistanceOhm } = source;
    if (!isAssumed(emfV) && !isAssumed(resistanceOhm)) return [];
    const facts = factsOf(string, { ambientDegC, tables: tables.chemistry });
    const full = stringEmf({ ...facts, string: { ...string, stateOfCharge: 1 } }, tables.chemistry).high;
    const high =
      string.emfV === undefined ? Math.max(emfV.high, full, stringEmfAtCharge(facts, 1, tables.chemistry)) : emfV.high;
    return [{ string, source: { ...source, emfV: { ...emfV, high } }, ofOhm: isAssumed(resistanceOhm) }];
  });
  ranged.sort((a, b) => spread(b) - spread(a));
  return ranged;
}

/** What the rest volts of a state of charge may be decides no fault by itself: the resistance does. */
function isAssumed({ origin, low, high }: StringSource['emfV']): boolean {
  return (origin === 'default' || origin === 'guess') && high > low;
}

function spread({ source: { emfV, resistanceOhm }, ofOhm }: RangedString): number {
  const { low, high, value } = ofOhm ? resistanceOhm : emfV;
  return (high - low) / Math.abs(value);
}

const ofContext = new WeakMap<CheckContext, FaultFigures>();

/** The fault currents of a job as drawn, studied for the first rule that asks. */
export function faultsOf(context: CheckContext): FaultFigures {
  let known = ofContext.get(context);
  if (known === undefined) {
    known = new FaultFigures(context);
    ofContext.set(context, known);
  }
  return known;
}
