/** Solves every operating case of a job and runs the checks, off the screen's thread. */
/// <reference lib="webworker" />
import type { CheckedJob, Draft, OperatingCase, OperatingPoint } from '../../core/api.ts';
import { checkJob, operatingPoint, runChecks } from '../../core/api.ts';
import { tables } from '../../data/index.ts';
import { starters } from '../../data/starters.ts';
import { casesOf } from './cases.ts';
import { SameParts } from './sameParts.ts';
import type { SolveAsk, SolveReply } from './solveMessages.ts';

let isAsked = false;
const sameParts = new SameParts();

self.addEventListener('message', ({ data }: MessageEvent<SolveAsk>) => {
  isAsked = true;
  self.postMessage(answer(data));
});

/** Times that it takes for the browser to have compiled what a solve runs through. */
const WARMING_ROUNDS = 6;

/** While the person still reads the start screen: the first answer then comes as fast as the hundredth. */
function warm(round: number): void {
  const [text] = starters.values();
  if (isAsked || round === 0 || text === undefined) return;
  answer({ generation: 0, draft: JSON.parse(text) as Draft });
  setTimeout(() => warm(round - 1));
}
setTimeout(() => warm(WARMING_ROUNDS));

function answer({ generation, draft }: SolveAsk): SolveReply {
  try {
    const start = performance.now();
    const read = checkJob(sameParts.in(draft));
    if (!read.ok) return { ok: false, generation, message: read.issues.map(({ message }) => message).join(' ') };
    const job = read.value;
    const readAt = performance.now();
    const points = new Map(casesOf(job).map((one) => [one.id, solve(job, one)]));
    const solvedAt = performance.now();
    const judged = job.cases.flatMap(({ id }) => points.get(id) ?? []);
    const report = runChecks({ job, tables, cases: job.cases, points: judged });
    const ms = { read: readAt - start, solve: solvedAt - readAt, check: performance.now() - solvedAt };
    return { ok: true, generation, points, report, ms };
  } catch (error) {
    return { ok: false, generation, message: error instanceof Error ? error.message : String(error) };
  }
}

/** A start by the battery's first second, all else over minutes; as the command line does. */
function solve(job: CheckedJob, operatingCase: OperatingCase): OperatingPoint {
  const model = operatingCase.surge === undefined ? 'slow' : 'fast';
  return operatingPoint({ job, operatingCase, tables, model });
}
