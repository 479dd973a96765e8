/** The worker's end of a desk of studies: reads the job, answers, and tells how far it is. */
/// <reference lib="webworker" />
import type { CheckedJob, Draft } from '../../core/api.ts';
import { checkJob } from '../../core/api.ts';
import { SameParts } from './sameParts.ts';
import type { AnswerOf, QuestionOf, StudyAsk, StudyReply } from './studyMessages.ts';

export interface Asked {
  readonly draft: Draft;
  readonly job: CheckedJob;
  readonly progress: (done: number, of: number) => void;
}

/** No more than this often a word about progress, ms: each is painted. */
const BETWEEN_WORDS_MS = 60;

/** Answers every question that comes to this worker; what is thrown becomes a failed study in its own words. */
export function serveStudies<Table>(answer: (question: QuestionOf<Table>, asked: Asked) => AnswerOf<Table>): void {
  const sameParts = new SameParts();
  const reply = (said: StudyReply): void => self.postMessage(said);

  const answered = ({ ask, draft, question }: StudyAsk): StudyReply => {
    try {
      const kept = sameParts.in(draft);
      const read = checkJob(kept);
      if (!read.ok) return { kind: 'failed', ask, message: read.issues.map(({ message }) => message).join(' ') };
      let said = 0;
      const progress = (done: number, of: number): void => {
        const now = performance.now();
        if (now - said < BETWEEN_WORDS_MS) return;
        said = now;
        reply({ kind: 'progress', ask, done, of });
      };
      return {
        kind: 'answer',
        ask,
        answer: answer(question as QuestionOf<Table>, { draft: kept, job: read.value, progress }),
      };
    } catch (error) {
      return { kind: 'failed', ask, message: error instanceof Error ? error.message : String(error) };
    }
  };

  self.addEventListener('message', ({ data }: MessageEvent<StudyAsk>) => reply(answered(data)));
}
