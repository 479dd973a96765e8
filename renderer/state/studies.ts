/**
 * Studies of the open job: each asked once for a state of the job, kept while the person looks at another stage, and never shown as
 * that of another state.
 */
import { useEffect } from 'react';
import { createStore, useStore } from 'zustand';
import type { StudyDesk } from '../workers/studyDesk.ts';
import type { AnswersOf, AsksOf, StudyAsk, StudyNameOf } from '../workers/studyMessages.ts';
import { useOpenJob } from './openJob.ts';

export type StudyState<Answer> =
  | { readonly status: 'waiting'; readonly done: number; readonly of: number }
  | { readonly status: 'stopped' }
  | { readonly status: 'failed'; readonly message: string }
  | { readonly status: 'answered'; readonly answer: Answer };

export interface Study<Answer> {
  /** Null until it is asked for. */
  readonly state: StudyState<Answer> | null;
  readonly answer: Answer | null;
  /** The newest answer, perhaps of an earlier state of the same job. */
  readonly last: Answer | null;
  readonly ask: () => void;
  readonly stop: () => void;
}

interface Kept<Answer> {
  /** Job, state of the job, and question. */
  readonly key: string;
  readonly state: StudyState<Answer>;
  /** The answer before this one, of the same job. */
  readonly before: { readonly job: string | null; readonly answer: Answer } | null;
}

/** What is kept of the studies of one table, each at its desk: a long one does not hold up those at another. */
export class Studies<Table> {
  /** Only a mark for the types: which table these are of. */
  declare readonly table: Table;
  private readonly deskOf: (name: string) => StudyDesk;
  private readonly stops = new Map<string, () => void>();
  readonly kept = createStore<ReadonlyMap<string, Kept<unknown>>>()(() => new Map());

  constructor(deskOf: (name: string) => StudyDesk) {
    this.deskOf = deskOf;
  }

  ask(key: string, question: StudyAsk['question']): void {
    const { name } = question;
    const { draft, key: job } = useOpenJob.getState();
    this.stops.get(name)?.();
    const answer = lastOf(this.keptOf(name), job);
    const before = answer === null ? null : { job, answer };
    const keepState = (state: StudyState<unknown>): void => this.keep(name, { key, state, before });
    keepState({ status: 'waiting', done: 0, of: 0 });
    const stop = this.deskOf(name).ask({ draft, question }, (reply) => {
      if (reply.kind === 'progress') keepState({ status: 'waiting', done: reply.done, of: reply.of });
      else if (reply.kind === 'answer') keepState({ status: 'answered', answer: reply.answer });
      else keepState({ status: 'failed', message: reply.message });
    });
    this.stops.set(name, stop);
  }

  /** Nothing is heard of it any more. */
  stop(name: string): void {
    this.stops.get(name)?.();
  }

  keptOf(name: string): Kept<unknown> | undefined {
    return this.kept.getState().get(name);
  }

  keep(name: string, kept: Kept<unknown> | undefined): void {
    const all = new Map(this.kept.getState());
    if (kept === undefined) all.delete(name);
    else all.set(name, kept);
    this.kept.setState(all, true);
  }
}

/** Which question, and whether it is asked by itself, once the job's own answers are there. Null asks nothing. */
export interface Wanted<Table, Name extends StudyNameOf<Table>> {
  readonly name: Name;
  readonly asks: AsksOf<Table, Name> | null;
  readonly wanted: boolean;
}

/** The study that answers a question about the open job as it stands. */
export function useStudyOf<Table, Name extends StudyNameOf<Table>>(
  studies: Studies<Table>,
  { name, asks, wanted }: Wanted<Table, Name>,
): Study<AnswersOf<Table, Name>> {
  type Answer = AnswersOf<Table, Name>;
  const job = useOpenJob((open) => open.key);
  const generation = useOpenJob((open) => open.generation);
  const isSolved = useOpenJob((open) => open.answers?.generation === open.generation);
  const key = asks === null ? '' : `${String(job)} ${String(generation)} ${JSON.stringify(asks)}`;
  // What is kept under a name answers the questions of that name.
  const kept = useStore(studies.kept, (all) => all.get(name)) as Kept<Answer> | undefined;
  const isHere = kept?.key === key;
  const begin = (): void => {
    if (asks !== null) studies.ask(key, { name, asks });
  };
  useEffect(() => {
    const known = studies.keptOf(name);
    if (known?.key === key) return;
    if (wanted && isSolved && key !== '') begin();
    // What runs for a state of the job that has been left is of no use any more.
    else if (known?.state.status === 'waiting') {
      studies.stop(name);
      studies.keep(name, undefined);
    }
  });
  const state = isHere ? kept.state : null;
  const answer = state?.status === 'answered' ? state.answer : null;
  return {
    state,
    answer,
    last: answer ?? lastOf(kept, job),
    ask: begin,
    stop: () => {
      studies.stop(name);
      if (isHere) studies.keep(name, { ...kept, state: { status: 'stopped' } });
    },
  };
}

function lastOf<Answer>(kept: Kept<Answer> | undefined, job: string | null): Answer | null {
  if (kept === undefined) return null;
  if (kept.state.status === 'answered') return kept.key.startsWith(`${String(job)} `) ? kept.state.answer : null;
  return kept.before?.job === job ? kept.before.answer : null;
}
