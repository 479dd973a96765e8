/** Words the answers into the paper's document tree, off the screen's thread. */
/// <reference lib="webworker" />
import { buildReport, checkJob } from '../../core/api.ts';
import { tables } from '../../data/index.ts';
import type { ReportAsk, ReportReply } from './reportMessages.ts';

self.addEventListener('message', ({ data }: MessageEvent<ReportAsk>) => {
  self.postMessage(answer(data));
});

function answer({ ask, draft, points, report, options }: ReportAsk): ReportReply {
  try {
    const read = checkJob(draft);
    if (!read.ok) return { ok: false, ask, message: read.issues.map(({ message }) => message).join(' ') };
    const document = buildReport({ job: read.value, tables, points, checkReport: report, options });
    return { ok: true, ask, document };
  } catch (error) {
    return { ok: false, ask, message: error instanceof Error ? error.message : String(error) };
  }
}
