/** Studies of the bank for the stage Strings, off the screen's thread. */
/// <reference lib="webworker" />
import type { BatteryModel, CheckedJob, Draft, OperatingCase, OperatingPoint } from '../../core/api.ts';
import {
  atRestOf,
  bandOf,
  bankChanges,
  banksOf,
  caseById,
  checkJob,
  driftOf,
  fromReadings,
  joiningOf,
  layoutsOf,
  leadToleranceOf,
  oneOutOf,
  operatingPoint,
  partsInCase,
  seriesOf,
  sharingOf,
  usualCycle,
  withoutPairs,
} from '../../core/api.ts';
import { tables } from '../../data/index.ts';
import { SameParts } from './sameParts.ts';
import type {
  BankNow,
  InCase,
  LayoutsAnswer,
  StringsAsk,
  StringsReply,
  Studies,
  StudyName,
  TriedChange,
} from './stringsMessages.ts';

const sameParts = new SameParts();

self.addEventListener('message', ({ data }: MessageEvent<StringsAsk>) => {
  reply(answered(data));
});

function reply(said: StringsReply): void {
  self.postMessage(said);
}

function answered({ ask, draft, question }: StringsAsk): StringsReply {
  try {
    const kept = sameParts.in(draft);
    const read = checkJob(kept);
    if (!read.ok) return { kind: 'failed', ask, message: read.issues.map(({ message }) => message).join(' ') };
    const study = new Study(ask, kept, read.value);
    return { kind: 'answer', ask, answer: study.answer(question) };
  } catch (error) {
    return { kind: 'failed', ask, message: error instanceof Error ? error.message : String(error) };
  }
}

/** No more than this often a word about progress, ms: each is painted. */
const BETWEEN_WORDS_MS = 60;

class Study {
  private readonly ask: number;
  private readonly draft: Draft;
  private readonly job: CheckedJob;
  private said = 0;

  constructor(ask: number, draft: Draft, job: CheckedJob) {
    this.ask = ask;
    this.draft = draft;
    this.job = job;
  }

  answer(question: StringsAsk['question']): Studies[StudyName]['answers'] {
    const { job } = this;
    switch (question.name) {
      case 'now':
        return this.now();
      case 'oneOut':
        return oneOutOf(this.inCase(question.asks));
      case 'joining':
        return joiningOf({ job, tables, ...question.asks });
      case 'layouts':
        return this.layouts(question.asks);
      case 'changes':
        return this.changes(question.asks);
      case 'band':
        return bandOf({ ...this.inCase(question.asks), ...question.asks, progress: this.progress });
      case 'drift':
        return driftOf({ job, tables, request: question.asks, progress: this.progress });
    }
  }

  private now(): BankNow {
    const { job } = this;
    const cases = casesOf(job);
    const points = cases.flatMap((operatingCase) => MODELS.map((model) => solved({ job, operatingCase, model })));
    const asked = cases.map((operatingCase) => {
      const of = (model: BatteryModel) => {
        const point = points.find((one) => one.case === operatingCase.id && one.model === model);
        return sharingOf({ job, tables, operatingCase, model, ...(point === undefined ? {} : { point }) });
      };
      const banks = banksOf(withoutPairs(partsInCase(job, operatingCase)));
      return [operatingCase.id, { fast: of('fast'), slow: of('slow'), banks }] as const;
    });
    return {
      banks: banksOf(withoutPairs(job.parts)),
      cases: new Map(asked),
      atRest: atRestOf({ job, tables }),
      series: seriesOf({ job, tables, points: points.filter(({ model }) => model === 'slow') }),
      fromReadings: fromReadings({ job, tables }),
      usualCycle: usualCycle({ job, tables }),
    };
  }

  private layouts(asks: InCase): LayoutsAnswer {
    const { progress } = this;
    const inCase = this.inCase(asks);
    return {
      layouts: layoutsOf({ ...inCase, progress }),
      leads: leadToleranceOf({ ...inCase, limit: this.job.settings.shareLimit }),
    };
  }

  private changes(asks: InCase): readonly TriedChange[] {
    const { draft, progress } = this;
    return bankChanges({ ...this.inCase(asks), draft, progress }).map(({ edit, ...change }) => ({
      ...change,
      leaves: edit.apply(draft),
    }));
  }

  private inCase({ caseId, model }: InCase) {
    const operatingCase = caseById(this.job, caseId);
    if (operatingCase === undefined) throw new Error(`the job has no case ${caseId}`);
    return { job: this.job, tables, operatingCase, model };
  }

  private readonly progress = (done: number, of: number): void => {
    const now = performance.now();
    if (now - this.said < BETWEEN_WORDS_MS) return;
    this.said = now;
    reply({ kind: 'progress', ask: this.ask, done, of });
  };
}

const MODELS: readonly BatteryModel[] = ['slow', 'fast'];

/** The job's own cases, and the one that every job has. */
function casesOf(job: CheckedJob): readonly OperatingCase[] {
  const rest = caseById(job, 'at-rest');
  return rest === undefined || job.cases.some(({ id }) => id === rest.id) ? job.cases : [...job.cases, rest];
}

function solved(request: {
  readonly job: CheckedJob;
  readonly operatingCase: OperatingCase;
  readonly model: BatteryModel;
}): OperatingPoint {
  return operatingPoint({ ...request, tables });
}
