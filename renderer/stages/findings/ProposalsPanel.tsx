/** Fuses and cables that pass, cheapest first, each with its reasons; what is ticked is judged anew before it can be made. */
import Box from '@mui/material/Box';
import Button from '@mui/material/Button';
import { type ReactElement, useMemo, useState } from 'react';
import { plainFields, sentenceCase } from '../../../core/api.ts';
import { CautionStrip } from '../../controls/CautionStrip.tsx';
import { Quiet } from '../../controls/Prose.tsx';
import { StudyPlace } from '../../controls/StudyPlace.tsx';
import { useOpenJob } from '../../state/openJob.ts';
import type { ListedProposals, TickedOutcome } from '../../workers/protectionMessages.ts';
import { FindingsMoved } from './FindingsMoved.tsx';
import { changeView, useFindingsView } from './findingsView.ts';
import { KeptRuns, ProposalItem } from './ProposalItem.tsx';
import { sortedProposals } from './proposalOrder.ts';
import { useProtectionStudy } from './protectionStudies.ts';

export function ProposalsPanel(): ReactElement {
  const study = useProtectionStudy('proposals', NOTHING_ASKED);
  return (
    <StudyPlace study={study} doing="Trying fuses and cables on a copy of the job" begin="Try fuses and cables">
      {(proposals) => <Proposals proposals={proposals} />}
    </StudyPlace>
  );
}

const NOTHING_ASKED = {};

function Proposals({ proposals }: { readonly proposals: ListedProposals }): ReactElement {
  const assumed = useOpenJob(({ job }) => job.practiceAssumed === true);
  const { ticked } = useFindingsView();
  const { open, kept } = useMemo(() => sortedProposals(proposals.runs), [proposals]);
  const canTake = open.filter((run) => run.canTake).map(({ id }) => id);
  const taken = canTake.filter((id) => ticked.has(id));
  if (assumed) return <Quiet>Choose a rule book first: without one there is nothing to propose by.</Quiet>;
  return (
    <>
      <CautionStrip texts={[...proposals.cautions, DC_PARTS]} title="Before anything is taken" />
      {open.length === 0 ? (
        <Quiet>Nothing to propose: by the figures given, no run asks for another fuse or cable.</Quiet>
      ) : (
        <>
          <Box
            component="ol"
            aria-label="Proposals, cheapest first"
            sx={{ m: 0, p: 0, listStyle: 'none', borderBottom: '1px solid var(--hair)' }}
          >
            {open.map((run) => (
              <ProposalItem key={run.id} run={run} isTicked={ticked.has(run.id)} onTick={(on) => tick(run.id, on)} />
            ))}
          </Box>
          {canTake.length > 0 && <Ticked taken={taken} all={canTake} />}
        </>
      )}
      <KeptRuns runs={kept} />
    </>
  );
}

/** Of the trade; those of the proposals themselves stand before it. */
const DC_PARTS =
  'Take parts marked for direct current at the highest voltage of the system: one marked for AC alone may not put out a DC arc.';

function tick(id: string, isOn: boolean): void {
  changeView(({ ticked }) => {
    const next = new Set(ticked);
    if (isOn) next.add(id);
    else next.delete(id);
    return { ticked: next };
  });
}

interface TickedProps {
  readonly taken: readonly string[];
  readonly all: readonly string[];
}

function Ticked({ taken, all }: TickedProps): ReactElement {
  const study = useProtectionStudy('ticked', taken.length === 0 ? null : { runs: taken });
  return (
    <Box sx={{ display: 'grid', gap: '0.375rem', mt: '0.5rem' }}>
      <Box sx={{ display: 'flex', flexWrap: 'wrap', gap: '0.5rem', alignItems: 'center' }}>
        <Button
          variant="outlined"
          onClick={() => changeView({ ticked: new Set(taken.length === all.length ? [] : all) })}
        >
          {taken.length === all.length ? 'Tick none' : 'Tick all'}
        </Button>
        <span>{`${String(taken.length)} of ${String(all.length)} ticked`}</span>
      </Box>
      {taken.length > 0 && (
        <StudyPlace study={study} doing="Judging what is ticked on a copy of the job" begin="Judge what is ticked">
          {(outcome) => ('refused' in outcome ? <Refused text={outcome.refused} /> : <Outcome outcome={outcome} />)}
        </StudyPlace>
      )}
    </Box>
  );
}

function Refused({ text }: { readonly text: string }): ReactElement {
  return (
    <Box role="alert" sx={{ color: 'var(--stop)' }}>
      These changes do not go together: {text}
    </Box>
  );
}

function Outcome({ outcome }: { readonly outcome: TickedOutcome }): ReactElement {
  const edit = useOpenJob((open) => open.edit);
  const [refused, setRefused] = useState('');
  const make = (): void => {
    const made = edit({ label: outcome.label, apply: () => outcome.leaves });
    if (made.ok) changeView({ ticked: new Set() });
    else setRefused(made.issues.map(({ message }) => message).join(' '));
  };
  return (
    <Box sx={{ display: 'grid', gap: '0.375rem', borderLeft: '2px solid var(--copper)', paddingLeft: '0.75rem' }}>
      <Box sx={{ fontWeight: 600 }}>{sentenceCase(plainFields(outcome.label))}</Box>
      <FindingsMoved title="Goes with it" findings={outcome.gone} none="No finding goes with it." />
      <FindingsMoved title="Comes by it" findings={outcome.arisen} none="No new finding comes by it." />
      <Box>
        <Button variant={outcome.arisen.length > 0 ? 'outlined' : 'contained'} onClick={make}>
          Make the ticked changes
        </Button>
        <Box component="span" sx={{ marginLeft: '0.75rem', color: 'var(--soft)' }}>
          On the drawing only; one undo takes all of it back.
        </Box>
      </Box>
      {refused !== '' && (
        <Box role="alert" sx={{ color: 'var(--stop)' }}>
          {refused}
        </Box>
      )}
    </Box>
  );
}
