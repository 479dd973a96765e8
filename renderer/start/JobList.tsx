/** Jobs in the store, last changed first. */
import Box from '@mui/material/Box';
import Button from '@mui/material/Button';
import ButtonBase from '@mui/material/ButtonBase';
import Typography from '@mui/material/Typography';
import { type ReactElement, useCallback, useEffect, useState } from 'react';
import type { JobSummary } from '../../core/host.ts';
import { when } from '../frame/HistoryDrawer.tsx';
import { openKept } from '../frame/openings.ts';
import { useChannel, useSession } from '../state/session.ts';

/** Shown before "all jobs" is asked for. */
const FIRST = 6;

export function JobList(): ReactElement {
  const { jobs, removed, remove, restore } = useJobs();
  const [all, setAll] = useState(false);
  const shown = all ? jobs : jobs.slice(0, FIRST);
  return (
    <Box component="section" aria-labelledby="jobs-head">
      <Typography variant="h2" id="jobs-head" sx={{ mb: 0.5 }}>
        Go on with a job
      </Typography>
      {jobs.length === 0 && (
        <Typography variant="body2" sx={{ color: 'var(--soft)' }}>
          None yet. Every job that you start stands here, with every change kept.
        </Typography>
      )}
      {removed !== null && (
        <Box role="status" sx={{ display: 'flex', alignItems: 'center', gap: 1, my: 0.5 }}>
          <span>“{removed.title}” was taken off the list.</span>
          <Button variant="outlined" onClick={() => void restore()}>
            Bring it back
          </Button>
        </Box>
      )}
      <Box component="ul" sx={{ listStyle: 'none', m: 0, p: 0 }}>
        {shown.map((job) => (
          <JobRow key={job.job} job={job} onRemove={() => void remove(job)} />
        ))}
      </Box>
      {jobs.length > FIRST && (
        <Button onClick={() => setAll(!all)}>{all ? 'Fewer' : `All ${String(jobs.length)} jobs`}</Button>
      )}
    </Box>
  );
}

function useJobs() {
  const channel = useChannel();
  const [jobs, setJobs] = useState<readonly JobSummary[]>([]);
  const [removed, setRemoved] = useState<JobSummary | null>(null);
  const read = useCallback(async (): Promise<void> => {
    const answer = await channel.call('jobs.list', {});
    if (answer.ok) setJobs(answer.value);
    else useSession.getState().tell(answer.trouble);
  }, [channel]);
  useEffect(() => {
    queueMicrotask(() => void read());
  }, [read]);
  const remove = async (job: JobSummary): Promise<void> => {
    const answer = await channel.call('jobs.remove', { job: job.job });
    if (answer.ok) setRemoved(job);
    else useSession.getState().tell(answer.trouble);
    await read();
  };
  const restore = async (): Promise<void> => {
    if (removed === null) return;
    const answer = await channel.call('jobs.restore', { job: removed.job });
    if (!answer.ok) useSession.getState().tell(answer.trouble);
    setRemoved(null);
    await read();
  };
  return { jobs, removed, remove, restore };
}

function JobRow({ job, onRemove }: { readonly job: JobSummary; readonly onRemove: () => void }): ReactElement {
  const channel = useChannel();
  return (
    <Box component="li" sx={{ display: 'flex', alignItems: 'center', borderTop: '1px solid var(--hair)' }}>
      <ButtonBase
        onClick={() => void openKept(channel, job.job)}
        sx={{
          flex: 1,
          minWidth: 0,
          display: 'block',
          textAlign: 'left',
          py: 0.75,
          px: 0.5,
          '&:hover': { bgcolor: 'var(--lit)' },
        }}
      >
        <Box component="span" sx={{ display: 'block', fontWeight: 600, overflowWrap: 'anywhere' }}>
          {job.title}
        </Box>
        <Box component="span" sx={{ color: 'var(--soft)', fontSize: '0.8125rem', overflowWrap: 'anywhere' }}>
          {job.parts} parts · {when(job.changedAt)}
          {job.file === null ? '' : ` · ${job.file}`}
        </Box>
      </ButtonBase>
      <Button onClick={onRemove} aria-label={`Take ${job.title} off the list`}>
        Take off
      </Button>
    </Box>
  );
}
