/** Bases of rules whose clause differs by practice: the rows of the practice's own table, for print with their edition. */
import { Defect } from '../job/issue.ts';
import type { Basis } from '../tables/status.ts';
import type { Judge } from './rule.ts';
import { withEdition } from './wording.ts';

/** The clause that a rule rests on in the practice of a job. */
export function clauseOf(rule: string, judge: Judge): Basis {
  const basis = judge.practice.clauses.get(rule);
  if (basis === undefined) throw new Defect(`clauses.csv has ${rule} for ${judge.job.practice}`);
  return withEdition(basis, judge);
}
