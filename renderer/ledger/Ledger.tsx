/** The right-hand ledger: the figures of what is selected, where each comes from, and its working. */
import type { ReactElement } from 'react';
import { useOpenJob } from '../state/openJob.ts';
import { JobLedger } from './JobLedger.tsx';
import { JunctionLedger } from './JunctionLedger.tsx';
import { PartLedger } from './PartLedger.tsx';
import { Page } from './parts.tsx';
import { SeveralLedger } from './SeveralLedger.tsx';

export function Ledger(): ReactElement {
  const { parts, junctions } = useOpenJob((open) => open.selection);
  const known = useOpenJob((open) => open.job.parts);
  const chosen = known === undefined ? [] : known.filter(({ id }) => parts.includes(id));
  const [part, second] = chosen;
  const [junction, otherJunction] = junctions;
  return (
    <Page>
      {part !== undefined && second === undefined && junction === undefined ? (
        <PartLedger key={part.id} part={part} />
      ) : junction !== undefined && otherJunction === undefined && part === undefined ? (
        <JunctionLedger key={junction} junction={junction} />
      ) : chosen.length + junctions.length > 1 ? (
        <SeveralLedger parts={chosen} junctions={junctions} />
      ) : (
        <JobLedger />
      )}
    </Page>
  );
}
