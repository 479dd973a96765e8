/** A job as the file writes it, through the engine; what the tests of this folder share. */
import { type CheckedJob, checkJob, type OperatingCase, type OperatingPoint, operatingPoint } from '../../core/api.ts';
import { tables } from '../../data/index.ts';
import type { JobValue, JunctionValue, PartValue } from './jobDraft.ts';

export interface Answered {
  readonly job: CheckedJob;
  readonly operatingCase: OperatingCase;
  readonly point: OperatingPoint;
}

export function checked(value: JobValue): { readonly job: CheckedJob; readonly operatingCase: OperatingCase } {
  const result = checkJob(value);
  if (!result.ok) throw new Error(result.issues.map(({ path, message }) => `${path}: ${message}`).join('\n'));
  return { job: result.value, operatingCase: result.value.cases[0]! };
}

export function answered(value: JobValue): Answered {
  const { job, operatingCase } = checked(value);
  return { job, operatingCase, point: operatingPoint({ job, operatingCase, tables, model: 'slow' }) };
}

/** A job of a few parts, for tests that draw their own. */
export function jobOf(
  parts: readonly PartValue[],
  more: { readonly junctions?: Record<string, JunctionValue>; readonly conditions?: Record<string, unknown> } = {},
): JobValue {
  return {
    format: 'ohmwright-job',
    version: 1,
    title: 'Drawn for a test (invented)',
    practice: 'iec-land',
    junctions: more.junctions ?? {},
    parts: [...parts],
    cases: [{ id: 'drawn', ambientDegC: 20, irradianceWPerM2: 800, ...more.conditions }],
  };
}

/** A string with its figures given: an ideal source behind its own ohms. */
export function stringOf(
  id: string,
  at: {
    readonly plus: string;
    readonly minus: string;
    readonly emfV: number;
    readonly resistanceOhm: number;
    readonly midpoint?: string;
  },
): PartValue {
  return { id, kind: 'string', chemistry: 'agm', blocksInSeries: 2, blockNominalV: 6, capacityAh: 100, ...at };
}

export function voltsAt(point: OperatingPoint, junction: string): number {
  const volts = new Map<string, number | null>(point.junctions).get(junction);
  if (volts === null || volts === undefined) throw new Error(`no volts at ${junction}`);
  return volts;
}

export function ampsIn(point: OperatingPoint, part: string): number {
  const amps = new Map<string, { readonly currentA: number | null }>(point.parts).get(part)?.currentA;
  if (amps === null || amps === undefined) throw new Error(`no amps in ${part}`);
  return amps;
}
