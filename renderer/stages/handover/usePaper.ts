/** The paper of the open job as a document tree, made anew as soon as the job has new answers. */
import { useEffect, useMemo, useState } from 'react';
import type { ReportDocument, ReportOptions } from '../../../core/api.ts';
import type { Answers } from '../../state/answers.ts';
import { useOpenJob } from '../../state/openJob.ts';
import { ReportMaker } from '../../workers/reportMaker.ts';

export interface Paper {
  readonly document: ReportDocument | null;
  readonly trouble: string | null;
  /** A newer one is on its way. */
  readonly busy: boolean;
}

interface Wanted {
  readonly answers: Answers | null;
  readonly options: Required<ReportOptions>;
}

const maker = new ReportMaker();

export function usePaper({ paper, preparedOn, programVersion }: Required<ReportOptions>): Paper {
  const answers = useOpenJob((open) => (open.answers?.generation === open.generation ? open.answers : null));
  const wanted = useMemo<Wanted>(
    () => ({ answers, options: { paper, preparedOn, programVersion } }),
    [answers, paper, preparedOn, programVersion],
  );
  const [made, setMade] = useState<(Omit<Paper, 'busy'> & { readonly of: Wanted }) | null>(null);

  useEffect(() => {
    if (wanted.answers === null) return undefined;
    const { points, report } = wanted.answers;
    const { draft, job } = useOpenJob.getState();
    // The job's own cases, in its own order: what the host prints.
    const printed = job.cases.flatMap(({ id }) => points.get(id) ?? []);
    return maker.ask({ draft, points: printed, report, options: wanted.options }, (reply) => {
      setMade(
        reply.ok
          ? { of: wanted, document: reply.document, trouble: null }
          : { of: wanted, document: null, trouble: reply.message },
      );
    });
  }, [wanted]);

  return { document: made?.document ?? null, trouble: made?.trouble ?? null, busy: made?.of !== wanted };
}
