/** Tries the remedies of the finding that is open; leaves off as soon as another is opened or the job changes. */
import { useEffect, useMemo, useState } from 'react';
import type { Finding } from '../../../core/api.ts';
import type { Answers } from '../../state/answers.ts';
import { useOpenJob } from '../../state/openJob.ts';
import type { TriedRemedy } from '../../workers/remedyMessages.ts';
import { RemedyTrier } from '../../workers/remedyTrier.ts';

export type RemedyState =
  | { readonly status: 'trying' }
  | { readonly status: 'stopped' }
  | { readonly status: 'failed'; readonly message: string }
  /** `generation`: the state of the job that was tried on; the change may be made only to that. */
  | { readonly status: 'tried'; readonly trials: readonly TriedRemedy[]; readonly generation: number };

export interface Remedy {
  readonly state: RemedyState;
  readonly stop: () => void;
  readonly again: () => void;
}

interface Wanted {
  readonly answers: Answers | null;
  readonly finding: Finding;
  readonly attempt: number;
}

const TRYING: RemedyState = { status: 'trying' };
const trier = new RemedyTrier();

export function useRemedy(finding: Finding): Remedy {
  const answers = useOpenJob((open) => (open.answers?.generation === open.generation ? open.answers : null));
  const [attempt, setAttempt] = useState(0);
  const wanted = useMemo<Wanted>(() => ({ answers, finding, attempt }), [answers, finding, attempt]);
  const [outcome, setOutcome] = useState<{ readonly of: Wanted; readonly state: RemedyState } | null>(null);

  useEffect(() => {
    if (wanted.answers === null) return undefined;
    const { generation, points, report } = wanted.answers;
    const { draft } = useOpenJob.getState();
    return trier.ask({ draft, finding: wanted.finding, report, points: [...points.values()] }, (reply) => {
      const state: RemedyState = reply.ok
        ? { status: 'tried', trials: reply.trials, generation }
        : { status: 'failed', message: reply.message };
      setOutcome({ of: wanted, state });
    });
  }, [wanted]);

  return {
    state: outcome?.of === wanted ? outcome.state : TRYING,
    stop: () => {
      trier.stop();
      setOutcome({ of: wanted, state: { status: 'stopped' } });
    },
    again: () => setAttempt(attempt + 1),
  };
}
