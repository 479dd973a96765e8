/** The whole page: waits for its host, then shows the start or the open job. */
import Box from '@mui/material/Box';
import Typography from '@mui/material/Typography';
import { lazy, type ReactElement, Suspense, useEffect, useState } from 'react';
import type { HostChannel } from '../../core/host.ts';
import { openChannel } from '../host/channel.ts';
import { StartScreen } from '../start/StartScreen.tsx';
import { useOpenJob, wakeSolver } from '../state/openJob.ts';
import { readPreferences } from '../state/preferences.ts';
import { useSession } from '../state/session.ts';
import { DropFile } from './DropFile.tsx';
import { listenToHost } from './hostEvents.ts';
import { rememberedJob } from './openings.ts';
import { TroubleBar } from './TroubleBar.tsx';
import { useKeys } from './useKeys.ts';
import { useUnkept } from './useUnkept.ts';

/** The board with its diagram is fetched while the person reads the start screen. */
const fetchFrame = async () => ({ default: (await import('./Frame.tsx')).Frame });
const Frame = lazy(fetchFrame);

export function App(): ReactElement {
  const ready = useHost();
  const isOpen = useOpenJob((job) => job.key !== null);
  useKeys();
  useUnkept();
  return (
    <DropFile>
      <TroubleBar />
      <Suspense fallback={<Waiting />}>{ready ? isOpen ? <Frame /> : <StartScreen /> : <Waiting />}</Suspense>
    </DropFile>
  );
}

/** Opens the channel once, reads what the host is, and goes back to the job that was open before a reload. */
function useHost(): boolean {
  const [ready, setReady] = useState(false);
  useEffect(() => {
    wakeSolver();
    const channel = openChannel((isHostThere) => useSession.setState({ isHostThere }));
    const stop = listenToHost(channel);
    void begin(channel).then(() => setReady(true));
    return stop;
  }, []);
  return ready;
}

async function begin(channel: HostChannel): Promise<void> {
  useSession.setState({ channel });
  const about = await channel.call('host.about', {});
  if (about.ok) useSession.setState({ about: about.value });
  else useSession.setState({ trouble: about.trouble });
  await readPreferences(channel);
  await rememberedJob(channel);
  void fetchFrame();
}

function Waiting(): ReactElement {
  const trouble = useSession((session) => session.trouble);
  return (
    <Box component="main" sx={{ display: 'grid', placeItems: 'center', height: '100%' }}>
      <Typography component="h1" variant="h2">
        {trouble === null ? 'Opening …' : 'The program behind this page does not answer.'}
      </Typography>
    </Box>
  );
}
