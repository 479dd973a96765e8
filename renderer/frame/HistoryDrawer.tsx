/** Every change of the job, newest first; any state can be named and gone back to. Nothing is ever lost by going back. */
import Box from '@mui/material/Box';
import Button from '@mui/material/Button';
import Drawer from '@mui/material/Drawer';
import TextField from '@mui/material/TextField';
import Typography from '@mui/material/Typography';
import { type ReactElement, useCallback, useEffect, useState } from 'react';
import type { RevisionNumber, RevisionSummary } from '../../core/host.ts';
import { goToRevision, useOpenJob } from '../state/openJob.ts';
import { useChannel, useSession } from '../state/session.ts';

const AT_ONCE = 200;

export function HistoryDrawer({
  open,
  onClose,
}: {
  readonly open: boolean;
  readonly onClose: () => void;
}): ReactElement {
  return (
    <Drawer
      anchor="right"
      open={open}
      onClose={onClose}
      slotProps={{
        paper: {
          'aria-label': 'History',
          sx: { width: 'min(26rem, 92vw)', p: 2, borderLeft: '1px solid var(--edge)' },
        },
      }}
    >
      {open && <History onClose={onClose} />}
    </Drawer>
  );
}

function History({ onClose }: { readonly onClose: () => void }): ReactElement {
  const { revisions, head, onlyNamed, setOnlyNamed, read } = useHistory();
  const shown = onlyNamed ? revisions.filter(({ snapshot }) => snapshot !== null) : revisions;
  return (
    <>
      <Box sx={{ display: 'flex', alignItems: 'baseline', gap: 1, mb: 1 }}>
        <Typography variant="h2" sx={{ flex: 1 }}>
          History
        </Typography>
        <Button onClick={onClose}>Close</Button>
      </Box>
      <Typography variant="body2" sx={{ mb: 1.5, color: 'var(--soft)' }}>
        Every change is kept. Going back loses nothing: the states you leave stay in this list.
      </Typography>
      {head !== null && <NameThis revision={head} onNamed={read} />}
      <Button
        variant="text"
        aria-pressed={onlyNamed}
        onClick={() => setOnlyNamed(!onlyNamed)}
        sx={{ alignSelf: 'start', my: 1 }}
      >
        {onlyNamed ? 'Show every change' : 'Show only named snapshots'}
      </Button>
      <Box component="ol" sx={{ listStyle: 'none', m: 0, p: 0 }}>
        {shown.map((one) => (
          <Entry key={one.revision} one={one} isHere={one.revision === head} onGone={read} />
        ))}
      </Box>
      {shown.length === 0 && <Typography variant="body2">No snapshot has a name yet.</Typography>}
    </>
  );
}

function useHistory() {
  const channel = useChannel();
  const key = useOpenJob((job) => job.key);
  const [revisions, setRevisions] = useState<readonly RevisionSummary[]>([]);
  const [head, setHead] = useState<RevisionNumber | null>(null);
  const [onlyNamed, setOnlyNamed] = useState(false);
  const read = useCallback(async (): Promise<void> => {
    if (key === null) return;
    const answer = await channel.call('jobs.history', { job: key, most: AT_ONCE });
    if (!answer.ok) return useSession.getState().tell(answer.trouble);
    setRevisions(answer.value.revisions);
    setHead(answer.value.head);
  }, [channel, key]);
  useEffect(() => {
    queueMicrotask(() => void read());
  }, [read]);
  return { revisions, head, onlyNamed, setOnlyNamed, read };
}

function NameThis({ revision, onNamed }: { readonly revision: RevisionNumber; readonly onNamed: () => Promise<void> }) {
  const channel = useChannel();
  const key = useOpenJob((job) => job.key);
  const [name, setName] = useState('');
  const keepName = async (): Promise<void> => {
    if (key === null || name.trim() === '') return;
    const answer = await channel.call('jobs.snapshot', { job: key, revision, name: name.trim() });
    if (!answer.ok) return useSession.getState().tell(answer.trouble);
    setName('');
    useOpenJob.setState({ said: `Snapshot ${answer.value.snapshot ?? ''} kept.` });
    await onNamed();
  };
  return (
    <Box
      component="form"
      sx={{ display: 'flex', gap: 1, alignItems: 'center' }}
      onSubmit={(event) => {
        event.preventDefault();
        void keepName();
      }}
    >
      <TextField
        label="Name this state"
        value={name}
        onChange={(event) => setName(event.target.value)}
        slotProps={{ htmlInput: { maxLength: 100 } }}
        sx={{ flex: 1 }}
      />
      <Button type="submit" variant="contained" disabled={name.trim() === ''}>
        Keep snapshot
      </Button>
    </Box>
  );
}

function Entry({
  one,
  isHere,
  onGone,
}: {
  readonly one: RevisionSummary;
  readonly isHere: boolean;
  readonly onGone: () => Promise<void>;
}): ReactElement {
  const go = async (): Promise<void> => {
    const trouble = await goToRevision(one.revision);
    if (trouble !== null) useSession.getState().tell(trouble);
    await onGone();
  };
  return (
    <Box
      component="li"
      sx={{ display: 'flex', gap: 1, alignItems: 'center', borderTop: '1px solid var(--hair)', py: 0.75 }}
    >
      <Box sx={{ flex: 1, minWidth: 0 }}>
        {one.snapshot !== null && (
          <Typography component="div" sx={{ fontWeight: 600, color: 'var(--copper)' }}>
            ◆ {one.snapshot}
          </Typography>
        )}
        <Typography variant="body2" component="div" sx={{ overflowWrap: 'anywhere' }}>
          {one.label}
        </Typography>
        <Typography variant="caption" component="div">
          {when(one.at)}
        </Typography>
      </Box>
      {isHere ? (
        <Typography variant="caption">you are here</Typography>
      ) : (
        <Button variant="outlined" onClick={() => void go()} aria-label={`Go to: ${one.snapshot ?? one.label}`}>
          Go to
        </Button>
      )}
    </Box>
  );
}

/** As the person's own system writes dates. */
export function when(at: string): string {
  const date = new Date(at);
  return Number.isNaN(date.getTime())
    ? at
    : date.toLocaleString(undefined, { dateStyle: 'medium', timeStyle: 'short' });
}
