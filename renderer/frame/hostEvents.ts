/** What the host tells without being asked, and what the page does then. */
import type { HostChannel, HostEvent, MenuCommand } from '../../core/host.ts';
import { readAgain, useOpenJob } from '../state/openJob.ts';
import { useSession } from '../state/session.ts';
import { useFind } from './find.ts';
import { enter, leaveJob, openKept } from './openings.ts';
import { saveJob } from './saving.ts';

export function listenToHost(channel: HostChannel): () => void {
  return channel.listen((event) => void take(channel, event));
}

async function take(channel: HostChannel, event: HostEvent): Promise<void> {
  switch (event.event) {
    case 'job-changed': {
      if (event.job !== useOpenJob.getState().key) return;
      const trouble = await readAgain();
      if (trouble !== null) useSession.getState().tell(trouble);
      return;
    }
    case 'open-job':
      await openKept(channel, event.job);
      return;
    case 'file-trouble':
      useSession.getState().tell(event.trouble);
      return;
    case 'menu':
      await command(channel, event.command);
  }
}

async function command(channel: HostChannel, chosen: MenuCommand): Promise<void> {
  const { undo, redo, key } = useOpenJob.getState();
  switch (chosen) {
    case 'new':
      leaveJob();
      return;
    case 'open':
      await enter(channel, await channel.call('files.open', {}));
      return;
    case 'save':
    case 'save-as':
      if (key !== null) await saveJob(channel, chosen === 'save' ? 'known' : 'ask');
      return;
    case 'undo':
      await undo();
      return;
    case 'redo':
      await redo();
      return;
    case 'find':
      useFind.setState({ open: true });
      return;
    case 'handover':
      useSession.getState().goStage('handover');
  }
}
