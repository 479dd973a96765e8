/** The page's end of the report worker: the newest ask wins; an answer that was overtaken is dropped. */
import type { ReportAsk, ReportReply } from './reportMessages.ts';

export class ReportMaker {
  private worker: Worker | null = null;
  private waiting: { readonly ask: number; readonly onReply: (reply: ReportReply) => void } | null = null;
  private asked = 0;

  /** Words the report; the returned function forgets the ask. `onReply` is called once, unless it was overtaken or forgotten. */
  ask(ask: Omit<ReportAsk, 'ask'>, onReply: (reply: ReportReply) => void): () => void {
    this.asked += 1;
    const number = this.asked;
    this.waiting = { ask: number, onReply };
    this.worker ??= this.begin();
    this.worker.postMessage({ ...ask, ask: number } satisfies ReportAsk);
    return () => {
      if (this.waiting?.ask === number) this.waiting = null;
    };
  }

  private begin(): Worker {
    const worker = new Worker(new URL('./report.worker.ts', import.meta.url), { type: 'module' });
    worker.addEventListener('message', ({ data }: MessageEvent<ReportReply>) => this.receive(data));
    worker.addEventListener('error', (event) => {
      event.preventDefault();
      this.receive({ ok: false, ask: this.asked, message: `The preview could not be made: ${event.message}` });
    });
    return worker;
  }

  private receive(reply: ReportReply): void {
    if (this.waiting?.ask !== reply.ask) return;
    const { onReply } = this.waiting;
    this.waiting = null;
    onReply(reply);
  }
}
