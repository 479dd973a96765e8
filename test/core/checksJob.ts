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
