/** Words the answers into the paper's document tree, off the screen's thread. */
/// <reference lib="webworker" />
import {
  buildReport,
  type CheckedJob,
  caseById,
  checkJob,
  isWorthStudying,
  type OperatingCase,
  type OperatingPoint,
  protectionFigures,
  studyStrings,
} from '../../core/api.ts';
import { tables } from '../../data/index.ts';
import type { ReportAsk, ReportReply } from './reportMessages.ts';

self.addEventListener('message', ({ data }: MessageEvent<ReportAsk>) => {
  self.postMessage(answer(data));
});

function answer({ ask, draft, points, report, options }: ReportAsk): ReportReply {
  try {
    const read = checkJob(draft);
    if (!read.ok) return { ok: false, ask, message: read.issues.map(({ message }) => message).join(' ') };
    const job = read.value;
    const cases = casesOf(job, points);
    const document = buildReport({
      job,
      tables,
      points,
      checkReport: report,
      strings: stringsOf(job, cases),
      protection: protectionFigures({ job, tables, cases, points }),
      options,
    });
    return { ok: true, ask, document };
  } catch (error) {
    return { ok: false, ask, message: error instanceof Error ? error.message : String(error) };
  }
}

/** Enough draws for percentiles on paper. */
const drawsOfReport = 400;

function casesOf(job: CheckedJob, points: readonly OperatingPoint[]): readonly OperatingCase[] {
  return [...new Set(points.map((point) => point.case))].flatMap((id) => caseById(job, id) ?? []);
}

function stringsOf(job: CheckedJob, cases: readonly OperatingCase[]) {
  if (!isWorthStudying(job)) return undefined;
  return studyStrings({ job, tables, cases, models: ['slow', 'fast'], draws: drawsOfReport, seed: 1 });
}
