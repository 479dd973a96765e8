/**
 * Sends every change to the host, in order and one at a time, and says what has been kept. A change that could not be sent stays in
 * the queue; nothing is dropped on the way.
 */
import { type Draft, draftText } from '../../core/api.ts';
import type { HostChannel, JobKey, RevisionNumber, Trouble } from '../../core/host.ts';

export interface KeepStep {
  readonly step: 'keep';
  readonly key: number;
  readonly label: string;
  readonly draft: Draft;
}
interface GoStep {
  readonly step: 'go';
  /** Key of the state on the line to go to; its revision is known by the time the step's turn comes. */
  readonly key: number;
}
type Step = KeepStep | GoStep;

export type KeepStatus =
  | { readonly status: 'kept' }
  | { readonly status: 'keeping'; readonly steps: number }
  | { readonly status: 'trouble'; readonly trouble: Trouble; readonly steps: number };

export interface KeeperEvents {
  readonly onStatus: (status: KeepStatus) => void;
  readonly onKept: (key: number, revision: RevisionNumber) => void;
}

/** Between tries when the host does not answer or the disk is full, ms. */
const RETRY_MS = 2000;

export class Keeper {
  private readonly channel: HostChannel;
  private readonly job: JobKey;
  private head: RevisionNumber;
  private readonly events: KeeperEvents;
  private readonly revisions = new Map<number, RevisionNumber>();
  private queue: Step[] = [];
  private running = false;
  private ended = false;
  private retry: ReturnType<typeof setTimeout> | undefined;

  constructor(channel: HostChannel, job: JobKey, head: RevisionNumber, events: KeeperEvents) {
    this.channel = channel;
    this.job = job;
    this.head = head;
    this.events = events;
  }

  know(key: number, revision: RevisionNumber): void {
    this.revisions.set(key, revision);
  }

  keep(step: Omit<KeepStep, 'step'>): void {
    this.queue.push({ step: 'keep', ...step });
    void this.run();
  }

  go(key: number): void {
    const last = this.queue.at(-1);
    // Only the last of several moves in a row matters: heads in between were never shown as work.
    if (last?.step === 'go' && this.queue.length > 1) this.queue[this.queue.length - 1] = { step: 'go', key };
    else this.queue.push({ step: 'go', key });
    void this.run();
  }

  get pending(): number {
    return this.queue.length;
  }

  get keptHead(): RevisionNumber {
    return this.head;
  }

  /** After a conflict: the page's states go on top of where the job is now. Resolves when they have, or have met new trouble. */
  async continueFrom(head: RevisionNumber): Promise<void> {
    this.head = head;
    await this.run();
  }

  tryAgain(): void {
    void this.run();
  }

  end(): void {
    this.ended = true;
    clearTimeout(this.retry);
  }

  private async run(): Promise<void> {
    if (this.running || this.ended) return;
    this.running = true;
    clearTimeout(this.retry);
    try {
      for (let step = this.queue[0]; step !== undefined && !this.ended; step = this.queue[0]) {
        this.events.onStatus({ status: 'keeping', steps: this.queue.length });
        const trouble = await this.take(step);
        if (trouble !== null) {
          this.stumble(trouble);
          return;
        }
        this.queue.shift();
      }
      if (!this.ended) this.events.onStatus({ status: 'kept' });
    } finally {
      this.running = false;
    }
  }

  private async take(step: Step): Promise<Trouble | null> {
    if (step.step === 'go') return this.move(step);
    const answer = await this.channel.call('jobs.keep', {
      job: this.job,
      after: this.head,
      text: draftText(step.draft),
      label: step.label,
    });
    if (!answer.ok) return answer.trouble;
    this.head = answer.value.head;
    this.revisions.set(step.key, this.head);
    this.events.onKept(step.key, this.head);
    return null;
  }

  private async move({ key }: GoStep): Promise<Trouble | null> {
    const to = this.revisions.get(key);
    if (to === undefined || to === this.head) return null;
    const answer = await this.channel.call('jobs.go', { job: this.job, from: this.head, to });
    if (!answer.ok) return answer.trouble;
    this.head = answer.value.head;
    return null;
  }

  private stumble(trouble: Trouble): void {
    if (this.ended) return;
    this.events.onStatus({ status: 'trouble', trouble, steps: this.queue.length });
    const mayPass = ['no-host', 'disk-full', 'busy', 'read-only'].includes(trouble.code);
    if (mayPass) this.retry = setTimeout(() => void this.run(), RETRY_MS);
  }
}
