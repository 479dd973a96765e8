/** From a job file to what a report is made of, through the real engine. */
import { protectionFigures } from '../../core/checks/protectionFigures.ts';
import { runChecks } from '../../core/checks/runChecks.ts';
import type { CheckedJob } from '../../core/job/job.ts';
import { parseJob } from '../../core/job/parseJob.ts';
import { operatingPoint } from '../../core/network/operatingPoint.ts';
import type { ReportInput } from '../../core/report/input.ts';
import { studyStrings } from '../../core/strings/study.ts';
import { tables } from '../../data/index.ts';

export function checked(file: object): CheckedJob {
  const parsed = parseJob(JSON.stringify(file));
  if (!parsed.ok) throw new Error(parsed.issues.map(({ path, message }) => `${path}: ${message}`).join('\n'));
  return parsed.value;
}

export function solvedInput(file: object, options: Partial<ReportInput['options']> = {}): ReportInput {
  const job = checked(file);
  const points = job.cases.map((operatingCase) => operatingPoint({ job, operatingCase, tables, model: 'slow' }));
  return {
    job,
    tables,
    points,
    checkReport: runChecks({ job, tables, points }),
    options: { programVersion: '0.1.0', preparedOn: '2025-03-31', ...options },
  };
}

/** The same with the study of its strings; few draws, since no test of the paper is about them. */
export function studiedInput(file: object): ReportInput {
  const input = solvedInput(file);
  const { job } = input;
  const strings = studyStrings({ job, tables, cases: job.cases, models: ['slow', 'fast'], draws: 50, seed: 1 });
  return { ...input, strings };
}

/** The same with the study of its short circuits. */
export function protectedInput(file: object): ReportInput {
  const input = solvedInput(file);
  const { job, points } = input;
  return { ...input, protection: protectionFigures({ job, tables, cases: job.cases, points }) };
}
