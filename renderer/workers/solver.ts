/** The page's end of the solving worker: the newest job wins, jobs that were overtaken are never solved. */
import type { SolveAsk, SolveReply } from './solveMessages.ts';

export class Solver {
  private readonly worker = new Worker(new URL('./solve.worker.ts', import.meta.url), { type: 'module' });
  private waiting: SolveAsk | null = null;
  private busy = false;
  private readonly onReply: (reply: SolveReply) => void;

  constructor(onReply: (reply: SolveReply) => void) {
    this.onReply = onReply;
    this.worker.addEventListener('message', ({ data }: MessageEvent<SolveReply>) => {
      this.busy = false;
      this.onReply(data);
      this.next();
    });
    this.worker.addEventListener('error', (event) => {
      event.preventDefault();
      this.busy = false;
      this.onReply({ ok: false, generation: -1, message: `The solver stopped: ${event.message}` });
    });
  }

  ask(ask: SolveAsk): void {
    this.waiting = ask;
    this.next();
  }

  private next(): void {
    if (this.busy || this.waiting === null) return;
    this.busy = true;
    this.worker.postMessage(this.waiting);
    this.waiting = null;
  }
}
