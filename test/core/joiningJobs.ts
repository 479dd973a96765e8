/** Small jobs of strings to be joined. */
import type { CheckedJob } from '../../core/job/job.ts';
import { parseJob } from '../../core/job/parseJob.ts';
import type { PartId } from '../../core/job/part.ts';
import type { Joining } from '../../core/strings/answer.ts';
import { type JoiningRequest, joiningOf } from '../../core/strings/joining/joining.ts';
import { tables } from '../../data/index.ts';

type Fields = Readonly<Record<string, unknown>>;

export function jobOf(parts: readonly Fields[]): CheckedJob {
  const job = { format: 'ohmwright-job', version: 1, title: 'Strings', practice: 'iec-land', parts };
  const read = parseJob(JSON.stringify(job));
  if (!read.ok) throw new Error(JSON.stringify(read.issues));
  return read.value;
}

/** A 12 V 100 Ah AGM string between `<id>+` and `<id>-`. */
export function stringPart(id: string, fields: Fields = {}): Fields {
  const poles = { plus: `${id}+`, minus: `${id}-` };
  return {
    id,
    kind: 'string',
    chemistry: 'agm',
    blocksInSeries: 1,
    blockNominalV: 12,
    capacityAh: 100,
    ...poles,
    ...fields,
  };
}

export function joint(id: string, from: string, to: string, resistanceOhm: number): Fields {
  return { id, kind: 'joint', from, to, resistanceOhm };
}

export const ids = (...names: readonly string[]) => names as readonly PartId[];

/** The answer, where there must be one. */
export function answerOf(request: Omit<JoiningRequest, 'tables'>): Joining {
  const answer = joiningOf({ ...request, tables });
  if ('missing' in answer) throw new Error(answer.missing);
  return answer;
}
