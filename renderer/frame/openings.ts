/** The ways into a job: from the list, from a file, from a starter, and back to the one that was open. */
import { type Draft, draftText } from '../../core/api.ts';
import type { HostAnswer, HostChannel, KeptJob, Trouble } from '../../core/host.ts';
import { closeJob, hasUnkept, openJob } from '../state/openJob.ts';
import { stages, useSession } from '../state/session.ts';

const REMEMBERED = 'ohmwright.open-job';
const STAGE = 'ohmwright.stage';

/** Larger files are no jobs; the host would refuse them too. */
const LARGEST_FILE_BYTES = 32 * 1024 * 1024;

/** Shows a job that the host has handed over, or tells why not. */
export async function enter(channel: HostChannel, answer: HostAnswer<KeptJob | null>): Promise<boolean> {
  if (!answer.ok) return refuse(answer.trouble);
  if (answer.value === null) return false;
  const opened = await openJob(channel, answer.value);
  if (!opened.ok) {
    return refuse({ code: 'issues', message: `${answer.value.title} cannot be read.`, issues: opened.issues });
  }
  sessionStorage.setItem(REMEMBERED, answer.value.job);
  useSession.getState().tell(null);
  return true;
}

function refuse(trouble: Trouble): false {
  useSession.getState().tell(trouble);
  return false;
}

/** Opens a job of the store at its wiring. */
export async function openKept(channel: HostChannel, job: string): Promise<boolean> {
  return atWiring(await enter(channel, await channel.call('jobs.open', { job })));
}

function atWiring(entered: boolean): boolean {
  if (entered) useSession.getState().goStage('wiring');
  return entered;
}

export async function startJob(channel: HostChannel, text: string, label: string): Promise<boolean> {
  return atWiring(await enter(channel, await channel.call('jobs.create', { text, label })));
}

export function startDraft(channel: HostChannel, draft: Draft, label: string): Promise<boolean> {
  return startJob(channel, draftText(draft), label);
}

/** Reads a file that the person picked or dropped; the file itself stays as it is. */
export async function openPicked(channel: HostChannel, file: File): Promise<boolean> {
  if (file.size > LARGEST_FILE_BYTES) {
    return refuse({ code: 'refused', message: `${file.name} is too large to be a job; it was not read.` });
  }
  const text = await file.text();
  const answer = await channel.call('jobs.create', { text, label: `Read from ${file.name}`, file: file.name });
  if (answer.ok || answer.trouble.issues === undefined) return atWiring(await enter(channel, answer));
  const message = `${file.name} cannot be read as a job; the file is as it was.`;
  return refuse({ ...answer.trouble, message });
}

/** After a reload of the page. */
export async function rememberedJob(channel: HostChannel): Promise<void> {
  const job = sessionStorage.getItem(REMEMBERED);
  if (job !== null) await enter(channel, await channel.call('jobs.open', { job }));
  const stage = stages.find((one) => one === sessionStorage.getItem(STAGE));
  if (stage !== undefined) useSession.getState().goStage(stage);
  useSession.subscribe((session) => sessionStorage.setItem(STAGE, session.stage));
}

/** Back to the list of jobs. Changes on their way are waited for by the person, never dropped: the mark in the top bar tells. */
export function leaveJob(): void {
  if (hasUnkept()) {
    refuse({
      code: 'busy',
      message: 'The last change is still on its way to the disk. Leave the job once it is kept.',
    });
    return;
  }
  sessionStorage.removeItem(REMEMBERED);
  closeJob();
}
