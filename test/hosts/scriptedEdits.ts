/** A page that edits as fast as its host acknowledges, and what can be said of the store afterwards. */
import { join } from 'node:path';
import Database from 'better-sqlite3';
import type { HostAnswer, HostAsk, HostChannel, HostMethod, HostValue, RevisionSummary } from '../../core/host.ts';
import { tenAmps } from './smallJobs.ts';

export function titled(title: string): string {
  return `${JSON.stringify({ ...tenAmps, title })}\n`;
}

export async function ask<M extends HostMethod>(
  channel: HostChannel,
  method: M,
  question: HostAsk<M>,
): Promise<HostValue<M>> {
  const answer: HostAnswer<HostValue<M>> = await channel.call(method, question);
  if (!answer.ok) throw new Error(`${method}: ${answer.trouble.code}: ${answer.trouble.message}`);
  return answer.value;
}

export interface EditRun {
  readonly channel: HostChannel;
  readonly job: string;
  readonly from: number;
  readonly edits: number;
  /** Called when an edit has been sent and its answer is awaited. */
  readonly sent?: (edit: number) => void;
}

/** Edits one after the other, each titled by its number, until one is not acknowledged; answers how many were, and the trouble. */
export async function editAll({ channel, job, from, edits, sent }: EditRun): Promise<{
  readonly acknowledged: number;
  readonly head: number;
  readonly trouble: string | undefined;
}> {
  let head = from;
  for (let edit = 1; edit <= edits; edit += 1) {
    const title = `Edit ${String(edit)}`;
    const waiting = channel.call('jobs.keep', { job, after: head, text: titled(title), label: title });
    sent?.(edit);
    const answer = await waiting;
    if (!answer.ok) return { acknowledged: edit - 1, head, trouble: answer.trouble.code };
    head = answer.value.head;
  }
  return { acknowledged: edits, head, trouble: undefined };
}

/** Every revision of a job, oldest first. */
export async function allRevisions(channel: HostChannel, job: string): Promise<readonly RevisionSummary[]> {
  const pages: RevisionSummary[] = [];
  for (;;) {
    const before = pages.at(-1)?.revision;
    const { revisions } = await ask(channel, 'jobs.history', {
      job,
      most: 200,
      ...(before === undefined ? {} : { before }),
    });
    if (revisions.length === 0) return pages.toReversed();
    pages.push(...revisions);
  }
}

/** What the database's own check says of its file; `ok` where nothing is wrong. */
export function integrity(storeFolder: string): unknown {
  const database = new Database(join(storeFolder, 'ohmwright.db'), { readonly: true });
  try {
    return database.pragma('integrity_check', { simple: true });
  } finally {
    database.close();
  }
}
