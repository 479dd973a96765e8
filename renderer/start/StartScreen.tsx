/** Before a job is open: go on with one, start small, start from a pattern, or open a file. */
import Box from '@mui/material/Box';
import Button from '@mui/material/Button';
import Typography from '@mui/material/Typography';
import { lazy, type ReactElement, Suspense, useRef, useState } from 'react';
import { enter, openPicked } from '../frame/openings.ts';
import { PreferencesDialog } from '../frame/PreferencesDialog.tsx';
import { useRoom } from '../frame/useRoom.ts';
import { useChannel, useSession } from '../state/session.ts';
import { JobList } from './JobList.tsx';
import { StartSmall } from './StartSmall.tsx';

/** The patterns are whole jobs: they come after the first screen stands. */
const Patterns = lazy(async () => ({ default: (await import('./Patterns.tsx')).Patterns }));

export function StartScreen(): ReactElement {
  const isTight = useRoom() === 'tight';
  return (
    <Box component="main" sx={{ height: '100%', overflow: 'auto' }}>
      <Box
        sx={{
          maxWidth: '76rem',
          mx: 'auto',
          px: 3,
          py: 3,
          display: 'grid',
          columnGap: 5,
          rowGap: 3,
          gridTemplateColumns: isTight ? 'minmax(0, 1fr)' : 'minmax(0, 5fr) minmax(0, 4fr)',
        }}
      >
        <Box sx={{ gridColumn: '1 / -1' }}>
          <Head />
        </Box>
        <StartSmall />
        <Box sx={{ display: 'grid', rowGap: 3, alignContent: 'start' }}>
          <JobList />
          <Suspense fallback={null}>
            <Patterns />
          </Suspense>
        </Box>
      </Box>
    </Box>
  );
}

function Head(): ReactElement {
  const [looks, setLooks] = useState(false);
  return (
    <Box
      sx={{
        display: 'flex',
        flexWrap: 'wrap',
        alignItems: 'end',
        gap: 2,
        borderBottom: '2px solid var(--ink)',
        pb: 1.5,
      }}
    >
      <Box sx={{ flex: '1 1 24rem' }}>
        <Typography variant="h1" sx={{ fontSize: '2rem' }}>
          Ohmwright
        </Typography>
        <Typography sx={{ color: 'var(--soft)', maxWidth: '46rem' }}>
          Solves an off-grid 12, 24 or 48 V system as it is really wired: what every cable carries, where the volts go,
          what the rule books say to it.
        </Typography>
      </Box>
      <OpenFile />
      <Button variant="outlined" onClick={() => setLooks(true)}>
        Looks
      </Button>
      <PreferencesDialog open={looks} onClose={() => setLooks(false)} />
    </Box>
  );
}

function OpenFile(): ReactElement {
  const channel = useChannel();
  const asks = useSession((session) => session.about?.can.askForFile === true);
  const picker = useRef<HTMLInputElement>(null);
  const open = async (): Promise<void> => {
    if (asks) await enter(channel, await channel.call('files.open', {}));
    else picker.current?.click();
  };
  return (
    <>
      <Button variant="outlined" onClick={() => void open()}>
        Open a job file …
      </Button>
      <input
        ref={picker}
        type="file"
        accept=".json,application/json"
        hidden
        aria-label="Job file"
        onChange={(event) => {
          const file = event.target.files?.[0];
          event.target.value = '';
          if (file !== undefined) void openPicked(channel, file);
        }}
      />
    </>
  );
}
