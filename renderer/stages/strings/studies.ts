/**
 * The studies of the open job: each asked once for a state of the job, kept while the person looks at another stage, and never shown
 * as that of another state. Quick ones have a worker of their own, so that a long one does not hold them up.
 */
import { useEffect } from 'react';
import { create } from 'zustand';
import { useOpenJob } from '../../state/openJob.ts';
import { StringsDesk } from '../../workers/stringsDesk.ts';
import type { Studies, StudyName, StudyQuestion } from '../../workers/stringsMessages.ts';

export type StudyState<Answer> =
  | { readonly status: 'waiting'; readonly done: number; readonly of: number }
  | { readonly status: 'stopped' }
  | { readonly status: 'failed'; readonly message: string }
  | { readonly status: 'answered'; readonly answer: Answer };

interface Kept {
  /** Job, state of the job, and question. */
  readonly key: string;
  readonly state: StudyState<Studies[StudyName]['answers']>;
  /** The answer before this one, of the same job. */
  readonly before: { readonly job: string | null; readonly answer: Studies[StudyName]['answers'] } | null;
}

const useKept = create<Readonly<Record<StudyName, Kept | null>>>()(() => ({
  now: null,
  oneOut: null,
  joining: null,
  layouts: null,
  changes: null,
  band: null,
  drift: null,
}));

const QUICK: ReadonlySet<StudyName> = new Set(['now', 'oneOut', 'joining']);
const quick = new StringsDesk(false);
const long = new StringsDesk(true);
const stops = new Map<StudyName, () => void>();

export interface Study<Answer> {
  /** Null until it is asked for. */
  readonly state: StudyState<Answer> | null;
  readonly answer: Answer | null;
  /** The newest answer, perhaps of an earlier state of the same job. */
  readonly last: Answer | null;
  readonly ask: () => void;
  readonly stop: () => void;
}

/**
 * The study that answers a question about the open job as it stands. With `wanted` it is asked by itself, once the job's own answers
 * are there; without, when `ask` is called.
 */
export function useStudy<Name extends StudyName>(
  name: Name,
  asks: Studies[Name]['asks'] | null,
  wanted: boolean,
): Study<Studies[Name]['answers']> {
  const job = useOpenJob((open) => open.key);
  const generation = useOpenJob((open) => open.generation);
  const isSolved = useOpenJob((open) => open.answers?.generation === open.generation);
  const key = asks === null ? '' : `${String(job)} ${String(generation)} ${JSON.stringify(asks)}`;
  const kept = useKept((all) => all[name]);
  const isHere = kept?.key === key;
  const begin = (): void => {
    if (asks !== null) ask(key, { name, asks } as unknown as StudyQuestion);
  };
  useEffect(() => {
    const known = useKept.getState()[name];
    if (known?.key === key) return;
    if (wanted && isSolved && key !== '') begin();
    // What runs for a state of the job that has been left is of no use any more.
    else if (known?.state.status === 'waiting') {
      stops.get(name)?.();
      useKept.setState({ [name]: null });
    }
  });
  type Answer = Studies[Name]['answers'];
  const state = isHere ? (kept.state as StudyState<Answer>) : null;
  const answer = state?.status === 'answered' ? state.answer : null;
  return {
    state,
    answer,
    last: answer ?? lastOf(kept, job),
    ask: begin,
    stop: () => {
      stops.get(name)?.();
      if (isHere) useKept.setState({ [name]: { ...kept, state: { status: 'stopped' } } });
    },
  };
}

function lastOf(kept: Kept | null, job: string | null): Studies[StudyName]['answers'] | null {
  if (kept === null) return null;
  if (kept.state.status === 'answered') return kept.key.startsWith(`${String(job)} `) ? kept.state.answer : null;
  return kept.before?.job === job ? kept.before.answer : null;
}

function ask(key: string, question: StudyQuestion): void {
  const { name } = question;
  const { draft, key: job } = useOpenJob.getState();
  stops.get(name)?.();
  const answer = lastOf(useKept.getState()[name], job);
  const before = answer === null ? null : { job, answer };
  const keep = (state: Kept['state']): void => useKept.setState({ [name]: { key, state, before } });
  keep({ status: 'waiting', done: 0, of: 0 });
  const desk = QUICK.has(name) ? quick : long;
  const stop = desk.ask({ draft, question }, (reply) => {
    if (reply.kind === 'progress') keep({ status: 'waiting', done: reply.done, of: reply.of });
    else if (reply.kind === 'answer') keep({ status: 'answered', answer: reply.answer });
    else keep({ status: 'failed', message: reply.message });
  });
  stops.set(name, stop);
}
