/** Two windows changed the job at once: nothing is lost, the person says how to go on. */
import Button from '@mui/material/Button';
import Dialog from '@mui/material/Dialog';
import DialogActions from '@mui/material/DialogActions';
import DialogContent from '@mui/material/DialogContent';
import DialogTitle from '@mui/material/DialogTitle';
import type { ReactElement } from 'react';
import { keepOnTop, takeTheirs, useOpenJob } from '../state/openJob.ts';
import { useChannel, useSession } from '../state/session.ts';
import { startDraft } from './openings.ts';

export function ConflictDialog(): ReactElement | null {
  const kept = useOpenJob((job) => job.kept);
  const draft = useOpenJob((job) => job.draft);
  const channel = useChannel();
  if (kept.status !== 'trouble' || kept.trouble.code !== 'conflict') return null;
  const { head } = kept.trouble;
  const showTheirs = async (): Promise<void> => {
    const trouble = await takeTheirs();
    if (trouble !== null) useSession.getState().tell(trouble);
  };
  return (
    <Dialog open aria-labelledby="conflict-title">
      <DialogTitle id="conflict-title">This job was changed in another window</DialogTitle>
      <DialogContent>
        Your last {kept.steps === 1 ? 'change' : `${String(kept.steps)} changes`} here and the change made there are
        both whole; only one can be the present state. Whatever you choose, the other stays in the history.
      </DialogContent>
      <DialogActions sx={{ flexWrap: 'wrap', gap: 1 }}>
        <Button onClick={() => void showTheirs()}>Show the other window’s state</Button>
        <Button onClick={() => void startDraft(channel, draft, 'Copied after two windows changed the job')}>
          Keep mine as a job of its own
        </Button>
        {head !== undefined && (
          <Button variant="contained" onClick={() => keepOnTop(head)}>
            Put mine on top
          </Button>
        )}
      </DialogActions>
    </Dialog>
  );
}
