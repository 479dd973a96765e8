/** What each command does: read, ask the engine, print. No command decides anything that the engine did not. */
import {
  type CheckedJob,
  type CheckReport,
  missingFigures,
  type OperatingCase,
  type OperatingPoint,
  operatingPoint,
  type Practice,
  runChecks,
  withPractice,
} from '../../core/api.ts';
import { tables } from '../../data/index.ts';
import { makeReport, pdfOf } from '../services/makeReport.ts';
import { solveCases } from '../services/solveCases.ts';
import { type Beside, checkText } from './checkText.ts';
import type { Io } from './io.ts';
import { jsonText } from './jsonText.ts';
import { type CommandOptions, chosenCases, judgedJob } from './options.ts';
import { programVersion } from './programVersion.ts';
import { type JobRead, readJob } from './readJob.ts';
import { exitStatus, JobRefusal, Refusal } from './refusal.ts';
import { solveAnswer } from './solveAnswer.ts';
import { solveText } from './solveText.ts';
import { checkPlace, writeOut } from './writeOut.ts';

/** `solve`: volts, amps and watts of each case. */
export async function solve(path: string, options: CommandOptions, io: Io): Promise<number> {
  const { read, job, cases } = await begin(path, options, io);
  const model = options.model ?? 'slow';
  const points = cases.map((operatingCase) => operatingPoint({ job, operatingCase, tables, model }));
  await print(
    options.json === true ? jsonText(solveAnswer(job, model, points)) : solveText(job, points),
    read,
    options,
    io,
  );
  return collapsed(points) ? exitStatus.found : exitStatus.done;
}

/** `check`: findings by the practice in force. */
export async function check(path: string, options: CommandOptions, io: Io): Promise<number> {
  const { read, job, cases } = await begin(path, options, io);
  const points = solveCases(job, cases, options.model);
  const report = runChecks({ job, tables, cases, points });
  const beside = options.beside === undefined ? undefined : judgedBeside(job, cases, options.beside);
  const answer =
    options.json === true
      ? jsonText({
          ...checkAnswer(job, cases, report),
          ...(beside === undefined ? {} : { beside: { practice: beside.practice, ...beside.report } }),
        })
      : checkText(job, report, beside);
  await print(answer, read, options, io);
  return collapsed(points) || hasWork(report) ? exitStatus.found : exitStatus.done;
}

/** The same job by another book, whose tables of conductors may be others: solved anew. The job's edition is of its own book. */
function judgedBeside(job: CheckedJob, cases: readonly OperatingCase[], practice: Practice): Beside {
  const other = withPractice({ ...job, practiceEdition: undefined }, practice);
  return { practice, report: runChecks({ job: other, tables, cases }) };
}

/** `report`: the paper of a job as a PDF, or its document tree. */
export async function report(path: string, options: CommandOptions, io: Io): Promise<number> {
  if (options.out === undefined && options.json !== true) {
    throw new Refusal(exitStatus.words, 'report needs --out <file.pdf> for the PDF, or --json for its document tree.');
  }
  const { read, job, cases } = await begin(path, options, io);
  const { document, points } = makeReport({
    job,
    cases,
    model: options.model,
    options: { programVersion, preparedOn: io.today() },
  });
  if (options.out !== undefined) {
    const content = await pdfOf(document);
    writeOut({ path: options.out, content, input: read.file });
    if (options.quiet !== true) io.err(`Wrote ${options.out} (${String(Math.ceil(content.length / 1024))} kB).\n`);
  }
  if (options.json === true) await io.out(jsonText(document));
  return collapsed(points) ? exitStatus.found : exitStatus.done;
}

export interface Begun {
  readonly read: JobRead;
  readonly job: CheckedJob;
  readonly cases: readonly OperatingCase[];
}

/** The job that a command works on, fit to be solved, with the cases that it was asked for. */
export async function begin(path: string, options: CommandOptions, io: Io): Promise<Begun> {
  const read = await readJob(path, io);
  const job = judgedJob(read.job, options);
  const missing = missingFigures({ job, tables });
  if (missing.length > 0) throw new JobRefusal(read.name, missing);
  const cases = chosenCases(job, options);
  if (options.out !== undefined) checkPlace({ path: options.out, input: read.file });
  if (job.practiceAssumed === true && options.quiet !== true) {
    io.err(
      `The job names no practice; ${job.practice} is assumed for its tables. Name one in the job or with --practice.\n`,
    );
  }
  return { read, job, cases };
}

/** To standard output, or to the file that `--out` names. */
export async function print(answer: string, read: JobRead, options: CommandOptions, io: Io): Promise<void> {
  if (options.out === undefined) await io.out(answer);
  else writeOut({ path: options.out, content: answer, input: read.file });
}

export function collapsed(points: readonly OperatingPoint[]): boolean {
  return points.some((point) => point.outcome === 'collapse');
}

function hasWork({ findings }: CheckReport): boolean {
  return findings.some(({ severity }) => severity === 'stop' || severity === 'fix');
}

function checkAnswer(
  job: CheckedJob,
  cases: readonly OperatingCase[],
  { findings, notChecked, passed }: CheckReport,
): object {
  return {
    practice: job.practice,
    practiceAssumed: job.practiceAssumed === true,
    cases: cases.map(({ id }) => id),
    findings,
    notChecked,
    passed,
  };
}
