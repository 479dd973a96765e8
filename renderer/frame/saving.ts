/** Writes the open job to a file of the person's: by the host, or as a download where the host cannot ask. */
import { draftText } from '../../core/api.ts';
import type { HostChannel } from '../../core/host.ts';
import { hasUnkept, useOpenJob } from '../state/openJob.ts';
import { useSession } from '../state/session.ts';

export async function saveJob(channel: HostChannel, where: 'known' | 'ask'): Promise<void> {
  const { key, line } = useOpenJob.getState();
  const revision = line.states[line.at]?.revision ?? null;
  if (key === null || revision === null || hasUnkept()) {
    useSession
      .getState()
      .tell({ code: 'busy', message: 'The last change is still on its way to the disk; save again in a moment.' });
    return;
  }
  const answer = await channel.call('files.saveJob', { job: key, revision, where });
  if (!answer.ok) useSession.getState().tell(answer.trouble);
  else if (answer.value !== null) {
    useOpenJob.setState({ file: answer.value.path, said: `Saved as ${answer.value.path}.` });
  }
}

/** The job file as a download of the browser. */
export function downloadJob(): void {
  const { draft, job } = useOpenJob.getState();
  download(`${fileNameFrom(job.title)}.job.json`, draftText(draft), 'application/json');
}

/** A name that every file system takes. */
export function fileNameFrom(title: string): string {
  const plain = title
    .normalize('NFKD')
    .replace(/[^\w .-]/g, '')
    .trim()
    .replace(/\s+/g, '-')
    .replace(/^[.-]+/, '')
    .slice(0, 60)
    .toLowerCase();
  return plain === '' ? 'job' : plain;
}

export function download(name: string, content: string | Uint8Array<ArrayBuffer>, type: string): void {
  const url = URL.createObjectURL(new Blob([content], { type }));
  const link = document.createElement('a');
  link.href = url;
  link.download = name;
  link.click();
  // The browser reads the blob after the click; a minute is more than it needs.
  setTimeout(() => URL.revokeObjectURL(url), 60_000);
}
