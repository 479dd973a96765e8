/** After an edit, most parts are what they were: kept as the same objects, what was found out about them is not sought again. */
import { type Draft, type Edited, rawPart } from '../draft/draft.ts';
import type { CheckedJob, OperatingCase } from '../job/job.ts';
import type { Part, PartId } from '../job/part.ts';

/** The job after an edit, with the very parts of the job before wherever the file says the same of them. */
export function withKeptParts(before: { readonly draft: Draft; readonly job: CheckedJob }, after: Edited): CheckedJob {
  const known = new Map(before.job.parts.map((part) => [part.id, part]));
  const isSame = (id: PartId) => rawPart(before.draft, id) === rawPart(after.draft, id);
  const kept = (part: Part, from: ReadonlyMap<PartId, Part>) => (isSame(part.id) ? (from.get(part.id) ?? part) : part);
  const parts = after.job.parts.map((part) => kept(part, known));
  const sameCases = before.draft['cases'] === after.draft['cases'];
  const cases = after.job.cases.map((one, k): OperatingCase => {
    const was = before.job.cases[k];
    if (!sameCases || was === undefined) return one;
    return { ...one, changed: new Map([...one.changed].map(([id, part]) => [id, kept(part, was.changed)])) };
  });
  return { ...after.job, parts, cases };
}
