/** Studies of the bank for the stage Strings, off the screen's thread. */
/// <reference lib="webworker" />
import type { BatteryModel, CheckedJob, Draft, OperatingCase, OperatingPoint } from '../../core/api.ts';
import {
  atRestOf,
  bandOf,
  bankChanges,
  banksOf,
  caseById,
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
import { casesOf } from './cases.ts';
import { type Asked, serveStudies } from './serveStudies.ts';
import type { BankNow, InCase, LayoutsAnswer, Studies, TriedChange } from './stringsMessages.ts';
import type { AnswerOf, QuestionOf } from './studyMessages.ts';

serveStudies<Studies>((question, asked) => new Study(asked).answer(question));

class Study {
  private readonly draft: Draft;
  private readonly job: CheckedJob;
  private readonly progress: Asked['progress'];

  constructor({ draft, job, progress }: Asked) {
    this.draft = draft;
    this.job = job;
    this.progress = progress;
  }

  answer(question: QuestionOf<Studies>): AnswerOf<Studies> {
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
}

const MODELS: readonly BatteryModel[] = ['slow', 'fast'];

function solved(request: {
  readonly job: CheckedJob;
  readonly operatingCase: OperatingCase;
  readonly model: BatteryModel;
}): OperatingPoint {
  return operatingPoint({ ...request, tables });
}
