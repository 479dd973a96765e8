/** Banks for the tests of what was read of them: strings on leads of their own to common bars, a load, a charger. */
import { type CheckedJob, caseById, type OperatingPoint, operatingPoint, parseJob } from '../../core/api.ts';
import type { JunctionId } from '../../core/job/part.ts';
import { tables } from '../../data/index.ts';

export interface BankString {
  readonly id: string;
  readonly emfV: number;
  readonly ohm: number;
  readonly leadOhm: number;
  /** The lead is drawn from the bus to the string. */
  readonly turned?: boolean;
}

export interface BankDraft {
  readonly strings: readonly BankString[];
  readonly chemistry?: string;
  readonly readings?: readonly Readonly<Record<string, unknown>>[];
}

/** 24 V strings of 100 Ah; their plus leads are cables `A lead` from `A+` to `bus+`. Cases `light`, `heavy`, `charge`. */
export function bankJob({ strings, chemistry = 'agm', readings = [] }: BankDraft): CheckedJob {
  const parts = strings.flatMap(({ id, emfV, ohm, leadOhm, turned = false }) => [
    {
      id,
      kind: 'string',
      chemistry,
      blocksInSeries: 2,
      blockNominalV: chemistry === 'lfp' ? 12.8 : 12,
      capacityAh: 100,
      emfV,
      resistanceOhm: ohm,
      plus: `${id}+`,
      minus: 'bus-',
    },
    {
      id: `${id} lead`,
      kind: 'joint',
      from: turned ? 'bus+' : `${id}+`,
      to: turned ? `${id}+` : 'bus+',
      resistanceOhm: leadOhm,
    },
  ]);
  return jobOf({
    parts: [
      ...parts,
      { id: 'load', kind: 'load', plus: 'bus+', minus: 'bus-', currentA: 20, on: false },
      { id: 'charger', kind: 'charger', plus: 'bus+', minus: 'bus-', outputA: 45, setpointV: 60, on: false },
    ],
    cases: [
      { id: 'light', set: { load: { on: true } } },
      { id: 'heavy', set: { load: { on: true, currentA: 150 } } },
      { id: 'charge', set: { charger: { on: true } } },
    ],
    readings,
  });
}

export function jobOf(draft: Readonly<Record<string, unknown>>): CheckedJob {
  const parsed = parseJob(JSON.stringify({ format: 'ohmwright-job', version: 1, practice: 'iec-land', ...draft }));
  if (!parsed.ok) throw new Error(parsed.issues.map(({ message }) => message).join('\n'));
  return parsed.value;
}

export function solvedAt(job: CheckedJob, caseId: string): OperatingPoint {
  return operatingPoint({ job, operatingCase: caseById(job, caseId)!, tables, model: 'slow' });
}

export interface Meter {
  readonly volts: (trueV: number) => number;
  readonly amps: (trueA: number) => number;
}
export const perfect: Meter = { volts: (trueV) => trueV, amps: (trueA) => trueA };

/** Bus volts and the amps of every string of a job, as a meter shows them in the cases. */
export function readAt(job: CheckedJob, points: readonly OperatingPoint[], meter: Meter = perfect) {
  return points.flatMap(({ case: caseId, junctions, parts }) => {
    const volts = (name: string) => junctions.get(name as JunctionId) ?? 0;
    const amps = job.parts
      .filter(({ kind }) => kind === 'string')
      .map(({ id }) => ({
        id: `${caseId} ${id}`,
        case: caseId,
        quantity: 'current',
        part: id,
        valueA: meter.amps(parts.get(id)?.currentA ?? 0),
      }));
    const bus = { id: `${caseId} bus`, case: caseId, quantity: 'voltage', plus: 'bus+', minus: 'bus-' };
    return [{ ...bus, valueV: meter.volts(volts('bus+') - volts('bus-')) }, ...amps];
  });
}
