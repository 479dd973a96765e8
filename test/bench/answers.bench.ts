/** Whole answers: from the text of a job to its checked operating points, and how the parts of that grow with the job. */

import type { CheckedJob, JunctionId } from '../../core/api.ts';
import {
  caseById,
  operatingPoint,
  parseJob,
  runChecks,
  sensitivities,
  solveCircuit,
  theveninAt,
  whatIf,
} from '../../core/api.ts';
import { tables } from '../../data/index.ts';
import { figure, type Report } from './report.ts';
import { median, microseconds } from './stopwatch.ts';
import { wiringJob } from './wiringJob.ts';

const SIZES = [50, 200, 1000, 5000];
/** One picture in 60 a second. */
const FRAME_MS = 1000 / 60;

export function run(report: Report): void {
  const rows = SIZES.map((parts) => measure(report, parts));
  report.table(
    'Whole answers, four cases (times in ms)',
    ['parts', 'parse', 'solve all cases', 'rules over them', 'parse to checked', 'of one frame (16.7 ms)'],
    rows.map(({ parts, parseMs, solveMs, rulesMs }) => {
      const all = parseMs + solveMs + rulesMs;
      return [
        String(parts),
        figure(parseMs),
        figure(solveMs),
        figure(rulesMs),
        figure(all),
        `${figure(all / FRAME_MS)} ×`,
      ];
    }),
  );
  derived(report);
}

function checkedJob(text: string): CheckedJob {
  const parsed = parseJob(text);
  if (!parsed.ok) throw new Error(JSON.stringify(parsed.issues.slice(0, 3)));
  return parsed.value;
}

function measure(report: Report, parts: number) {
  const text = JSON.stringify(wiringJob(parts));
  const job = checkedJob(text);
  const solveAll = () =>
    job.cases.map((operatingCase) => operatingPoint({ job, operatingCase, tables, model: 'slow' }));
  const points = solveAll();
  const rounds = Array.from({ length: Math.min(report.rounds, 5) }, () => ({
    parse: microseconds(() => checkedJob(text), report.seconds),
    solve: microseconds(solveAll, report.seconds),
    rules: microseconds(() => runChecks({ job, tables, cases: job.cases, points }), report.seconds),
  }));
  const ms = (pick: (round: (typeof rounds)[number]) => number) => median(rounds.map(pick)) / 1000;
  return {
    parts: job.parts.length,
    parseMs: ms((r) => r.parse),
    solveMs: ms((r) => r.solve),
    rulesMs: ms((r) => r.rules),
  };
}

/** What is derived from a solved circuit, against solving it again. */
function derived(report: Report): void {
  const rows = SIZES.map((parts) => {
    const job = checkedJob(JSON.stringify(wiringJob(parts)));
    const operatingCase = caseById(job, job.cases[0]!.id)!;
    const solved = solveCircuit({ job, operatingCase, tables, model: 'slow' });
    const bus = { plus: 'bus+' as JunctionId, minus: 'bus-' as JunctionId };
    const joint = job.parts.find((part) => part.kind === 'joint')!.id;
    const again = microseconds(() => operatingPoint({ job, operatingCase, tables, model: 'slow' }), report.seconds);
    const each = {
      thevenin: microseconds(() => theveninAt(solved, bus), report.seconds),
      adjoint: microseconds(() => sensitivities(solved, { kind: 'voltage', ...bus }), report.seconds),
      whatIf: microseconds(() => whatIf(solved, [{ part: joint, resistanceOhm: 0.004 }]), report.seconds),
    };
    const cell = (us: number) => `${figure(us / 1000)} (${figure(us / again)} ×)`;
    return [String(job.parts.length), figure(again / 1000), cell(each.thevenin), cell(each.adjoint), cell(each.whatIf)];
  });
  report.table(
    'From a solved circuit (ms, and as a ratio to solving the case again)',
    ['parts', 'solve one case', 'Thévenin source', 'all sensitivities of one answer', 'one joint changed'],
    rows,
  );
}
