/** The study of a bank: draws over assumed figures, against re-solving each with a general library; how that grows. */
import { lusolve, matrix } from 'mathjs';
import {
  bandOf,
  type CheckedJob,
  checkJob,
  driftOf,
  layoutsOf,
  type OperatingCase,
  solveCircuit,
} from '../../core/api.ts';
import { Law } from '../../core/network/element.ts';
import { tables } from '../../data/index.ts';
import { figure, type Report } from './report.ts';
import { median, microseconds } from './stopwatch.ts';
import { wiringJob } from './wiringJob.ts';

export function run(report: Report): void {
  bands(report);
  layouts(report);
  drift(report);
}

/** All pairs of taps of a row of strings, the star and the tree. */
function layouts(report: Report): void {
  const rows = [4, 8].map((strings) => {
    const { job, operatingCase } = checkedJob(wiringJob(60, strings));
    let count = 0;
    const ours = seconds(report, () => {
      count = layoutsOf({ job, tables, operatingCase, model: 'slow' })!.layouts.length;
    });
    const library = count * denseMicroseconds(report, 2 * strings - 1) * 1e-6;
    return [String(strings), String(count), figure(1000 * ours), figure(1000 * library), `${figure(library / ours)} ×`];
  });
  report.table(
    'Layouts of a row of strings (ms)',
    ['strings', 'layouts', 'all', 'their nodal equations by mathjs lusolve', 'mathjs over ours'],
    rows,
  );
}

/** A day of evening and charging again and again, half an hour at most a step. */
function drift(report: Report): void {
  const { job, operatingCase } = checkedJob(wiringJob(60, 4));
  const cycle = [
    { case: 'evening', hours: 6 },
    { case: 'charging', hours: 8 },
    { case: 'at-rest', hours: 10 },
  ];
  const solveUs = libraryMicroseconds(report, job, operatingCase);
  const rows = [30, 365].map((cycles) => {
    let steps = 0;
    const ours = seconds(report, () => {
      steps = driftOf({ job, tables, request: { cycle, cycles, stepS: 1800 } }).steps;
    });
    const library = steps * solveUs * 1e-6;
    return [String(cycles), String(steps), figure(ours), figure(library), `${figure(library / ours)} ×`];
  });
  report.table(
    'Drift of 4 strings in a job of 60 parts',
    ['days', 'steps', 'all, s', 'one mathjs lusolve a Newton step, s', 'mathjs over ours'],
    rows,
  );
}

function denseMicroseconds(report: Report, size: number): number {
  const dense = Array.from({ length: size }, (_, row) =>
    Array.from({ length: size }, (__, column) => (row === column ? 4 : 1 / (1 + Math.abs(row - column)))),
  );
  const right = Array.from({ length: size }, (_, row) => row + 1);
  return microseconds(() => lusolve(matrix(dense), right), report.seconds);
}

function checkedJob(value: object): { readonly job: CheckedJob; readonly operatingCase: OperatingCase } {
  const read = checkJob(value);
  if (!read.ok) throw new Error(JSON.stringify(read.issues.slice(0, 3)));
  return { job: read.value, operatingCase: read.value.cases[0]! };
}

/** Seconds of one call, the best of some: a whole study is too long for the stopwatch of steps. */
function seconds(report: Report, work: () => void): number {
  const times = Array.from({ length: Math.max(2, Math.min(3, report.rounds)) }, () => {
    const start = performance.now();
    work();
    return (performance.now() - start) / 1000;
  });
  return median(times);
}

function bands(report: Report): void {
  const rows = [
    [60, 2500],
    [60, 10_000],
    [60, 40_000],
    [200, 10_000],
    [600, 10_000],
  ].map(([parts, draws]) => {
    const { job, operatingCase } = checkedJob(wiringJob(parts!, parts! > 300 ? 12 : 4));
    const ours = seconds(report, () => {
      bandOf({ job, tables, operatingCase, model: 'slow', draws: draws!, seed: 1 });
    });
    const library = libraryMicroseconds(report, job, operatingCase) * 1e-6 * draws!;
    return [
      `${String(job.parts.length)}, ${String(parts! > 300 ? 12 : 4)} strings`,
      String(draws),
      figure(ours),
      figure((1e6 * ours) / draws!),
      figure(library),
      `${figure(library / ours)} ×`,
    ];
  });
  report.table(
    'A band over assumed figures',
    ['parts', 'draws', 'all, s', 'a draw, µs', 'by mathjs lusolve, s', 'mathjs over ours'],
    rows,
  );
}

/** The nodal equations of the case, dense, solved once a Newton step as the case needs them: what one draw costs with mathjs. */
function libraryMicroseconds(report: Report, job: CheckedJob, operatingCase: OperatingCase): number {
  const { assembled } = solveCircuit({ job, operatingCase, tables, model: 'slow' });
  if (assembled === null) throw new Error('the case is supplied');
  const { node, size } = assembled.reduction;
  const dense = Array.from({ length: size }, () => Array.from({ length: size }, () => 0));
  const right = Array.from({ length: size }, () => 0);
  for (const { from, to, slope, law, a, b, i } of assembled.active) {
    const [p, q] = [node[from]!, node[to]!];
    const known = law === Law.emf ? a * b : -i;
    for (const [row, sign] of [
      [p, 1],
      [q, -1],
    ] as const) {
      if (row < 0) continue;
      right[row]! += sign * known;
      for (const [column, other] of [
        [p, 1],
        [q, -1],
      ] as const) {
        if (column >= 0) dense[row]![column]! += sign * other * slope;
      }
    }
  }
  const linear = assembled.active.every(({ law }) => law === Law.conductance || law === Law.emf);
  const steps = linear ? 1 : 2;
  return steps * microseconds(() => lusolve(matrix(dense), right), report.seconds);
}
