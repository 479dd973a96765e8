/** Studies of fuses, faults and rule books for the stage Findings, off the screen's thread. */
/// <reference lib="webworker" />
import type { Draft, Finding, OperatingPoint, ProtectionProposal } from '../../core/api.ts';
import {
  applyEdit,
  checkJob,
  operatingPoint,
  proposeProtection,
  protectionStudy,
  runChecks,
  together,
  withPractice,
} from '../../core/api.ts';
import { tables } from '../../data/index.ts';
import type { ListedProposals, ProtectionStudies, TickedOutcome } from './protectionMessages.ts';
import { type Asked, serveStudies } from './serveStudies.ts';
import type { AnswerOf, QuestionOf } from './studyMessages.ts';

serveStudies<ProtectionStudies>(answer);

function answer(question: QuestionOf<ProtectionStudies>, asked: Asked): AnswerOf<ProtectionStudies> {
  const { job } = asked;
  switch (question.name) {
    case 'now':
      return protectionStudy({ job, tables, points: solved(asked), ...question.asks });
    case 'practice': {
      // The edition in hand is that of the job's own book.
      const judged = { ...withPractice(job, question.asks.practice), practiceEdition: undefined };
      return runChecks({ job: judged, tables, cases: judged.cases, points: solved(asked) });
    }
    case 'proposals':
      return listed(proposed(asked));
    case 'ticked':
      return ticked(asked, new Set(question.asks.runs));
  }
}

/** Every case of the job; a start by the battery's first second, all else over minutes. */
function solved({ job }: Pick<Asked, 'job'>): readonly OperatingPoint[] {
  return job.cases.map((operatingCase) =>
    operatingPoint({ job, operatingCase, tables, model: operatingCase.surge === undefined ? 'slow' : 'fast' }),
  );
}

/** The last proposals, by the text of the job that they are for: ticking one asks for them again. */
let last: { readonly of: string; readonly proposal: ProtectionProposal } | null = null;

function proposed(asked: Asked): ProtectionProposal {
  const { draft, job, progress } = asked;
  const of = JSON.stringify(draft);
  if (last?.of !== of) {
    last = { of, proposal: proposeProtection({ draft, job, tables, points: solved(asked), progress }) };
  }
  return last.proposal;
}

function listed({ runs, cost, solves, left, cautions }: ProtectionProposal): ListedProposals {
  return {
    cost,
    solves,
    left,
    cautions,
    runs: runs.map(({ edit, ...run }) => ({ ...run, canTake: edit !== null })),
  };
}

function ticked(asked: Asked, ids: ReadonlySet<string>): TickedOutcome | { readonly refused: string } {
  const taken = proposed(asked).runs.filter(({ id, edit }) => edit !== null && ids.has(id));
  const label = taken.length === 1 ? `protection: ${taken[0]!.words}` : `protection of ${String(taken.length)} runs`;
  const edits = taken.flatMap(({ edit }) => (edit === null ? [] : [edit]));
  const edited = applyEdit(asked.draft, together(label, edits), tables);
  if (!edited.ok) return { refused: edited.issues.map(({ message }) => message).join(' ') };
  const before = findingsOf(asked.draft);
  const after = findingsOf(edited.value.draft);
  return {
    leaves: edited.value.draft,
    label,
    gone: without(before, after),
    arisen: without(after, before),
  };
}

function findingsOf(draft: Draft): readonly Finding[] {
  const read = checkJob(draft);
  return read.ok ? runChecks({ job: read.value, tables }).findings : [];
}

/** Told apart by rule and parts: a figure may change while the trouble stays. */
function without(some: readonly Finding[], others: readonly Finding[]): readonly Finding[] {
  const nameOf = ({ rule, parts }: Finding): string => [rule, ...parts].join(' ');
  const known = new Set(others.map(nameOf));
  return some.filter((finding) => !known.has(nameOf(finding)));
}
