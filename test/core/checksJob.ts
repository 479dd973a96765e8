/** Small jobs for the tests of checks: plain JSON through the real reader and the real engine. */
import type { CheckReport, Finding } from '../../core/checks/finding.ts';
import { type CheckRequest, runChecks } from '../../core/checks/runChecks.ts';
import type { CheckedJob } from '../../core/job/job.ts';
import { parseJob } from '../../core/job/parseJob.ts';
import { tables } from '../../data/index.ts';

export type RawPart = { readonly id: string; readonly kind: string; readonly [field: string]: unknown };
export interface RawJob {
  readonly parts: readonly RawPart[];
  readonly [field: string]: unknown;
}

export function jobOf(raw: RawJob): CheckedJob {
  const parsed = parseJob(
    JSON.stringify({ format: 'ohmwright-job', version: 1, title: 'a job for a test', practice: 'iec-land', ...raw }),
  );
  if (!parsed.ok) throw new Error(JSON.stringify(parsed.issues, null, 1));
  return parsed.value;
}

export function check(raw: RawJob, options: Omit<CheckRequest, 'job' | 'tables'> = {}): CheckReport {
  return runChecks({ job: jobOf(raw), tables, ...options });
}

/** Findings of one rule. */
export function found(report: CheckReport, rule: string): readonly Finding[] {
  return report.findings.filter((finding) => finding.rule === rule);
}
/** What one rule could not check. */
export function gaps(report: CheckReport, rule: string): readonly string[] {
  return report.notChecked.filter((entry) => entry.rule === rule).map(({ missing }) => missing);
}
/** How many passes of one rule. */
export function passes(report: CheckReport, rule: string): number {
  return report.passed.find((entry) => entry.rule === rule)?.count ?? 0;
}

/** A string of 12 V nominal with entered figures, so that sums come out round. */
export function battery(id: string, fields: Record<string, unknown> = {}): RawPart {
  return {
    id,
    kind: 'string',
    plus: 'P',
    minus: 'N',
    chemistry: 'lfp',
    blocksInSeries: 1,
    blockNominalV: 12.8,
    capacityAh: 300,
    emfV: 13.2,
    resistanceOhm: 0.002,
    temperatureDegC: 25,
    ...fields,
  };
}

/**
 * One battery, one fuse in the plus lead, one cable out and one back, one load: P - F1 - Q - OUT - L, load L to M, M - BACK - N.
 * Air at 30 degC, the table's own in most books.
 */
export function oneCircuit(fields: {
  readonly battery?: Record<string, unknown>;
  readonly fuse?: Record<string, unknown>;
  readonly cable?: Record<string, unknown>;
  readonly load?: Record<string, unknown>;
  readonly more?: readonly RawPart[];
  readonly [field: string]: unknown;
}): RawJob {
  const { battery: string, fuse, cable, load, more, ...job } = fields;
  const lead = { kind: 'cable', lengthM: 1, size: '70 mm2', resistanceOhm: 0.0005, ...cable };
  const taker = load ?? { currentA: 10 };
  return {
    site: { ambientDesignDegC: 30 },
    parts: [
      battery('B1', string),
      { id: 'F1', kind: 'fuse', from: 'P', to: 'Q', ratingA: 200, ...fuse },
      { id: 'OUT', from: 'Q', to: 'L', ...lead },
      { id: 'BACK', from: 'M', to: 'N', ...lead },
      { id: 'L1', kind: 'load', plus: 'L', minus: 'M', ...taker },
      ...(more ?? []),
    ],
    ...job,
  };
}
