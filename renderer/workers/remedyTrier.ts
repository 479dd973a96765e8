/** The page's end of the remedy worker: one trial at a time; asking again, or stopping, ends the one that runs. */
import type { RemedyAsk, RemedyReply } from './remedyMessages.ts';

export class RemedyTrier {
  private worker: Worker | null = null;
  private running: { readonly ask: number; readonly onReply: (reply: RemedyReply) => void } | null = null;
  private asked = 0;

  /** Tries remedies; the returned function stops the trial. `onReply` is called once, unless it was stopped before. */
  ask(ask: Omit<RemedyAsk, 'ask'>, onReply: (reply: RemedyReply) => void): () => void {
    this.stop();
    this.asked += 1;
    const number = this.asked;
    this.running = { ask: number, onReply };
    this.worker ??= this.begin();
    this.worker.postMessage({ ...ask, ask: number } satisfies RemedyAsk);
    return () => {
      if (this.running?.ask === number) this.stop();
    };
  }

  /** A trial cannot be interrupted from inside, so its worker goes with it; one that waits is kept, since it holds the tables. */
  stop(): void {
    if (this.running === null) return;
    this.running = null;
    this.worker?.terminate();
    this.worker = null;
  }

  private begin(): Worker {
    const worker = new Worker(new URL('./remedy.worker.ts', import.meta.url), { type: 'module' });
    worker.addEventListener('message', ({ data }: MessageEvent<RemedyReply>) => this.receive(data));
    worker.addEventListener('error', (event) => {
      event.preventDefault();
      this.receive({ ok: false, ask: this.asked, message: `The trial stopped: ${event.message}` });
    });
    return worker;
  }

  private receive(reply: RemedyReply): void {
    if (this.running?.ask !== reply.ask) return;
    const { onReply } = this.running;
    this.running = null;
    onReply(reply);
  }
}
