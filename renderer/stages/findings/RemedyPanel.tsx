/** What the remedy would change, as found by trying it; and the button that makes the change. */
import Box from '@mui/material/Box';
import Button from '@mui/material/Button';
import LinearProgress from '@mui/material/LinearProgress';
import { type ReactElement, useEffect, useState } from 'react';
import type { Finding } from '../../../core/api.ts';
import { formatQuantity, plainFields } from '../../../core/api.ts';
import { useOpenJob } from '../../state/openJob.ts';
import type { TriedRemedy } from '../../workers/remedyMessages.ts';
import { FindingsMoved } from './FindingsMoved.tsx';
import { useRemedy } from './useRemedy.ts';

export interface RemedyPanelProps {
  readonly finding: Finding;
  /** The change is made: the list will follow. */
  readonly onMade: () => void;
}

export function RemedyPanel({ finding, onMade }: RemedyPanelProps): ReactElement {
  const { state, stop, again } = useRemedy(finding);
  return (
    <Box component="section" aria-label="What the remedy would change" sx={{ display: 'grid', gap: '0.5rem' }}>
      <Box component="h4" sx={{ m: 0, fontSize: '0.9375rem', fontWeight: 600 }}>
        What it would change
      </Box>
      {state.status === 'trying' && <Trying onStop={stop} />}
      {state.status === 'stopped' && (
        <Box>
          Stopped; nothing was changed. <Button onClick={again}>Try again</Button>
        </Box>
      )}
      {state.status === 'failed' && <Box role="alert">The remedy could not be tried: {state.message}</Box>}
      {state.status === 'tried' && state.trials.length === 0 && (
        <Box sx={{ color: 'var(--soft)' }}>
          Nothing that this program could try by itself: what to do here needs a person's judgement. Change the drawing,
          and the list follows.
        </Box>
      )}
      {state.status === 'tried' &&
        state.trials.map((trial) => (
          <Trial key={trial.label} trial={trial} itself={finding} generation={state.generation} onMade={onMade} />
        ))}
    </Box>
  );
}

/** A trial shorter than this needs no bar. */
const WORTH_A_BAR_MS = 300;

function Trying({ onStop }: { readonly onStop: () => void }): ReactElement {
  const [long, setLong] = useState(false);
  useEffect(() => {
    const timer = setTimeout(() => setLong(true), WORTH_A_BAR_MS);
    return () => clearTimeout(timer);
  }, []);
  return (
    <Box sx={{ display: 'flex', alignItems: 'center', gap: '0.75rem', minHeight: '2rem' }}>
      <span>Trying it on a copy of the job …</span>
      {long && (
        <>
          <LinearProgress aria-label="Trying the remedy" sx={{ flex: '1 1 6rem', maxWidth: '14rem' }} />
          <Button variant="outlined" onClick={onStop}>
            Stop
          </Button>
        </>
      )}
    </Box>
  );
}

interface TrialProps {
  readonly trial: TriedRemedy;
  readonly itself: Finding;
  readonly generation: number;
  readonly onMade: () => void;
}

function Trial({ trial, itself, generation, onMade }: TrialProps): ReactElement {
  const edit = useOpenJob(({ edit }) => edit);
  const current = useOpenJob((open) => open.generation === generation);
  const [refused, setRefused] = useState<string | null>(null);

  const make = (): void => {
    const made = edit({ label: trial.label, apply: () => trial.leaves });
    if (made.ok) onMade();
    else setRefused(made.issues.map(({ message }) => message).join(' '));
  };
  return (
    <Box sx={{ display: 'grid', gap: '0.375rem', borderLeft: '2px solid var(--copper)', paddingLeft: '0.75rem' }}>
      <Box sx={{ fontWeight: 600 }}>{plainFields(trial.label)}</Box>
      {trial.cost !== undefined && <Box sx={{ color: 'var(--soft)' }}>Takes: {trial.cost}</Box>}
      <Box sx={{ fontVariantNumeric: 'tabular-nums' }}>{beforeAndAfter(trial)}</Box>
      <FindingsMoved title="Goes with it" findings={trial.gone} itself={itself} none="No finding goes with it." />
      <FindingsMoved title="Comes by it" findings={trial.arisen} itself={itself} none="No new finding comes by it." />
      <Box>
        <Button
          variant={trial.stillThere || trial.arisen.length > 0 ? 'outlined' : 'contained'}
          disabled={!current}
          onClick={make}
        >
          Make this change
        </Button>
        <Box component="span" sx={{ marginLeft: '0.75rem', color: 'var(--soft)' }}>
          On the drawing only; undo takes it back.
        </Box>
      </Box>
      {refused !== null && (
        <Box role="alert" sx={{ color: 'var(--stop)' }}>
          {refused}
        </Box>
      )}
    </Box>
  );
}

function beforeAndAfter({ before, after, stillThere }: TriedRemedy): string {
  const was = `${formatQuantity(before.measured)} (limit ${formatQuantity(before.limit)})`;
  if (after.measured === null) return `${was} → within the limit of ${formatQuantity(after.limit)}`;
  const now = `${formatQuantity(after.measured)} (limit ${formatQuantity(after.limit)})`;
  return `${was} → ${now}${stillThere ? ': better, not enough' : ''}`;
}
