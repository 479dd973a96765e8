/** The page's end of a worker of studies: questions wait their turn, and each can be stopped. */
import type { StudyAsk, StudyReply, StudySaid } from './studyMessages.ts';

interface Waiting {
  readonly ask: StudyAsk;
  readonly onReply: (reply: StudySaid) => void;
}

export class StudyDesk {
  private worker: Worker | null = null;
  private running: Waiting | null = null;
  private waiting: readonly Waiting[] = [];
  private asked = 0;
  private readonly start: () => Worker;
  private readonly ends: boolean;

  /**
   * With `ends`, stopping a study that runs ends its worker with it, since it cannot be interrupted from inside. Without, a study is
   * short: it is let run out and its answer dropped.
   */
  constructor(start: () => Worker, ends: boolean) {
    this.start = start;
    this.ends = ends;
  }

  /** Asks; the returned function stops it, and then nothing more is heard of it. */
  ask(ask: Omit<StudyAsk, 'ask'>, onReply: (reply: StudySaid) => void): () => void {
    this.asked += 1;
    const number = this.asked;
    this.waiting = [...this.waiting, { ask: { ...ask, ask: number }, onReply }];
    this.next();
    return () => this.stop(number);
  }

  private stop(number: number): void {
    this.waiting = this.waiting.filter(({ ask }) => ask.ask !== number);
    if (this.running?.ask.ask !== number) return;
    if (!this.ends) {
      this.running = { ...this.running, onReply: () => undefined };
      return;
    }
    this.running = null;
    this.worker?.terminate();
    this.worker = null;
    this.next();
  }

  private next(): void {
    const [first, ...others] = this.waiting;
    if (this.running !== null || first === undefined) return;
    this.waiting = others;
    this.running = first;
    this.worker ??= this.begin();
    this.worker.postMessage(first.ask);
  }

  private begin(): Worker {
    const worker = this.start();
    worker.addEventListener('message', ({ data }: MessageEvent<StudyReply>) => this.receive(data));
    worker.addEventListener('error', (event) => {
      event.preventDefault();
      const ask = this.running?.ask.ask ?? 0;
      this.receive({ kind: 'failed', ask, message: `The study stopped: ${event.message}` });
    });
    return worker;
  }

  private receive(reply: StudyReply): void {
    if (this.running?.ask.ask !== reply.ask) return;
    const { onReply } = this.running;
    if (reply.kind !== 'progress') this.running = null;
    onReply(reply);
    this.next();
  }
}
