/** `faultlevel`: what a short circuit sends at every junction and through every fuse and breaker. */
import { faultSummary, faultLevel as studyFaults } from '../../core/api.ts';
import { tables } from '../../data/index.ts';
import { begin, print } from './commands.ts';
import { faultLevelAnswer } from './faultLevelAnswer.ts';
import { type FaultLevelOptions, shortedTo } from './faultLevelOptions.ts';
import { faultLevelText } from './faultLevelText.ts';
import type { Io } from './io.ts';
import { jsonText } from './jsonText.ts';
import { exitStatus } from './refusal.ts';

export async function faultLevel(path: string, options: FaultLevelOptions, io: Io): Promise<number> {
  const { read, job, cases } = await begin(path, options, io);
  const to = shortedTo(job, options);
  const method = options.method ?? 'plain';
  if (options.model === 'slow' && options.quiet !== true) {
    io.err('A fault is over in the first second; the battery’s fast resistance is taken.\n');
  }
  const studies = cases.map((operatingCase) => studyFaults({ job, tables, operatingCase, method, ...(to && { to }) }));
  const levels = { job, method, studies, summary: faultSummary({ job, tables, studies }) };
  await print(options.json === true ? jsonText(faultLevelAnswer(levels)) : faultLevelText(levels), read, options, io);
  return exitStatus.done;
}
