/** The whole catalogue of rules and the fault level at every junction: how they grow, and against a solve with a real short each. */
import {
  type CheckedJob,
  checkJob,
  faultLevel,
  type JunctionId,
  operatingPoint,
  type Part,
  type PartId,
  runChecks,
} from '../../core/api.ts';
import { tables } from '../../data/index.ts';
import { figure, type Report } from './report.ts';
import { median, microseconds } from './stopwatch.ts';
import { wiringJob } from './wiringJob.ts';

const SIZES = [200, 500, 1000];

export function run(report: Report): void {
  rules(report);
  faults(report);
}

function jobOf(parts: number): CheckedJob {
  const read = checkJob(wiringJob(parts));
  if (!read.ok) throw new Error(JSON.stringify(read.issues.slice(0, 3)));
  return read.value;
}

function milliseconds(report: Report, work: () => void): number {
  const times = Array.from({ length: Math.min(5, report.rounds) }, () => {
    const start = performance.now();
    work();
    return performance.now() - start;
  });
  return median(times);
}

function rules(report: Report): void {
  const rows = SIZES.map((parts) => {
    const job = jobOf(parts);
    const solveAll = () =>
      job.cases.map((operatingCase) => operatingPoint({ job, operatingCase, tables, model: 'slow' }));
    const points = solveAll();
    runChecks({ job, tables, points });
    const checkMs = milliseconds(report, () => {
      runChecks({ job, tables, points });
    });
    const solveMs = milliseconds(report, solveAll);
    return [String(job.parts.length), figure(solveMs), figure(checkMs), `${figure(checkMs / solveMs)} ×`];
  });
  report.table(
    'The whole catalogue over four cases (ms)',
    ['parts', 'solve all cases', 'all rules', 'rules over solving'],
    rows,
  );
}

function faults(report: Report): void {
  const rows = SIZES.map((parts) => {
    const job = jobOf(parts);
    const operatingCase = job.cases[0]!;
    let junctions = 0;
    const study = () => {
      junctions = faultLevel({ job, tables, operatingCase, method: 'plain' }).junctions.length;
    };
    study();
    const ms = milliseconds(report, study);
    const short = { id: 'SHORT' as PartId, kind: 'switch', from: 'bus+' as JunctionId, to: 'bus-' as JunctionId };
    const template = job.parts.find((part) => part.kind === 'joint')!;
    const shorted = {
      ...job,
      parts: [
        ...job.parts.map((part) => ('on' in part ? { ...part, on: false } : part)),
        { ...template, ...short, kind: 'joint', resistanceOhm: 0.001 } as Part,
      ],
    };
    const one = microseconds(
      () =>
        operatingPoint({
          job: shorted,
          operatingCase: { ...operatingCase, changed: new Map() },
          tables,
          model: 'fast',
        }),
      report.seconds,
    );
    const all = (2 * junctions * one) / 1000;
    return [
      String(job.parts.length),
      String(junctions),
      figure(ms),
      figure((1000 * ms) / junctions),
      figure(all),
      `${figure(all / ms)} ×`,
    ];
  });
  report.table(
    'Fault level, highest and lowest, at every junction (ms)',
    ['parts', 'junctions', 'all', 'a junction, µs', 'a solve with a real short for each', 'shorts over ours'],
    rows,
  );
}
