/** Whether what is on the screen is on the disk. */
import Box from '@mui/material/Box';
import Button from '@mui/material/Button';
import type { ReactElement } from 'react';
import { tryKeepingAgain, useOpenJob } from '../state/openJob.ts';
import { useSession } from '../state/session.ts';
import { downloadJob } from './saving.ts';

export function KeptMark(): ReactElement {
  const kept = useOpenJob((job) => job.kept);
  const isHostThere = useSession((session) => session.isHostThere);
  if (!isHostThere && kept.status !== 'trouble') return <HostGone />;
  switch (kept.status) {
    case 'kept':
      return <Word tone="var(--soft)" text="✓ kept" title="Every change so far is on the disk." />;
    case 'keeping':
      return <Word tone="var(--soft)" text="… keeping" title="The last change is on its way to the disk." />;
    case 'trouble':
      return (
        <Box role="alert" sx={{ display: 'flex', alignItems: 'center', gap: 1, color: 'var(--stop)', fontWeight: 600 }}>
          <span>
            ! not kept ({kept.steps}): {kept.trouble.message}
          </span>
          <Button variant="outlined" onClick={tryKeepingAgain}>
            Try again
          </Button>
          <Button variant="outlined" onClick={downloadJob}>
            Download the job
          </Button>
        </Box>
      );
  }
}

/** Said as soon as the way is cut, not only once a change cannot be kept. */
function HostGone(): ReactElement {
  return (
    <Box role="alert" sx={{ display: 'flex', alignItems: 'center', gap: 1, color: 'var(--stop)', fontWeight: 600 }}>
      <span>! The program does not answer. What was kept is kept; start it again.</span>
      <Button variant="outlined" onClick={downloadJob}>
        Download the job
      </Button>
    </Box>
  );
}

function Word({
  tone,
  text,
  title,
}: {
  readonly tone: string;
  readonly text: string;
  readonly title: string;
}): ReactElement {
  return (
    <Box component="span" title={title} sx={{ color: tone, fontSize: '0.875rem', minWidth: '4.5rem' }} data-kept={text}>
      {text}
    </Box>
  );
}
