/** The operating cases that are answered: the job's own, and the one that every job has. */
import type { CheckedJob, OperatingCase } from '../../core/api.ts';
import { caseById } from '../../core/api.ts';

export function casesOf(job: CheckedJob): readonly OperatingCase[] {
  const rest = caseById(job, 'at-rest');
  return rest === undefined || job.cases.some(({ id }) => id === rest.id) ? job.cases : [...job.cases, rest];
}
