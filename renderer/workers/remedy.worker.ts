/** Tries remedies on a copy of the job, off the screen's thread. */
/// <reference lib="webworker" />
import type { Draft, RemedyTrial } from '../../core/api.ts';
import { checkJob, remedyTrials } from '../../core/api.ts';
import { tables } from '../../data/index.ts';
import type { RemedyAsk, RemedyReply, TriedRemedy } from './remedyMessages.ts';

self.addEventListener('message', ({ data }: MessageEvent<RemedyAsk>) => {
  self.postMessage(answer(data));
});

function answer({ ask, draft, finding, report, points }: RemedyAsk): RemedyReply {
  try {
    const read = checkJob(draft);
    if (!read.ok) return { ok: false, ask, message: read.issues.map(({ message }) => message).join(' ') };
    const trials = remedyTrials({ draft, job: read.value, tables, finding, report, points });
    return { ok: true, ask, trials: trials.map((trial) => travelling(trial, draft)) };
  } catch (error) {
    return { ok: false, ask, message: error instanceof Error ? error.message : String(error) };
  }
}

function travelling({ edit, ...trial }: RemedyTrial, draft: Draft): TriedRemedy {
  return { ...trial, leaves: edit.apply(draft) };
}
