/** Changes to a bank, each really made on a copy of the job, ranked by how evenly its strings then share. */
import type { Draft } from '../draft/draft.ts';
import { applyEdit, type Edit } from '../draft/edit.ts';
import type { CheckedJob, OperatingCase } from '../job/job.ts';
import { caseById, withPractice } from '../job/job.ts';
import type { BatteryModel } from '../network/answer.ts';
import type { BankMeasure } from '../strings/answer.ts';
import { solveBank } from '../strings/layouts/layouts.ts';
import { measureBank } from '../strings/layouts/measure.ts';
import type { Tables } from '../tables/tables.ts';
import { bankCandidates } from './bankCandidates.ts';
import { EFFORTS, type Effort } from './candidate.ts';
import { withKeptParts } from './keptParts.ts';

export interface BankChange {
  readonly label: string;
  /** What has to be bought or done, in words. */
  readonly cost: string;
  readonly effort: Effort;
  readonly edit: Edit;
  readonly before: BankMeasure;
  readonly after: BankMeasure;
}

export interface BankChangesRequest {
  readonly draft: Draft;
  /** The draft, read. */
  readonly job: CheckedJob;
  readonly tables: Tables;
  readonly operatingCase: OperatingCase;
  readonly model: BatteryModel;
  readonly progress?: (done: number, of: number) => void;
}

/** A spread that shrinks by less than this has not been helped. */
const NOTICEABLE = 1e-4;

/**
 * What could be done about the largest bank of a case, each change made on a copy of the job and solved anew: before and after side by
 * side. Those that help come first, the most even first; of equals the least effort. Those that change nothing or make it worse come last.
 * Empty where the job has no bank of two branches, or it carries next to nothing in the case.
 */
export function bankChanges(request: BankChangesRequest): readonly BankChange[] {
  const { progress } = request;
  const solved = solveBank(request);
  const before = solved === null ? undefined : measureBank(solved);
  if (solved === null || before === undefined) return [];
  const candidates = bankCandidates(solved, request.draft);
  const changes = candidates.flatMap((candidate, k): readonly BankChange[] => {
    const after = measureAfter(request, candidate.edit);
    progress?.(k + 1, candidates.length);
    const { edit, cost, effort } = candidate;
    return after === undefined ? [] : [{ label: edit.label, cost, effort, edit, before, after }];
  });
  const helps = ({ after }: BankChange) => before.spread - after.spread > NOTICEABLE;
  const ranked = [...changes];
  ranked.sort(
    (a, b) =>
      Number(helps(b)) - Number(helps(a)) ||
      a.after.spread - b.after.spread ||
      EFFORTS.indexOf(a.effort) - EFFORTS.indexOf(b.effort),
  );
  return ranked;
}

/** `undefined` where the change cannot be made, or leaves no answer. */
function measureAfter(request: BankChangesRequest, edit: Edit): BankMeasure | undefined {
  const { draft, job, tables, operatingCase, model } = request;
  const edited = applyEdit(draft, edit, tables);
  if (!edited.ok || edited.value.draft === draft) return undefined;
  const kept = withKeptParts({ draft, job }, edited.value);
  const after = kept.practice === job.practice ? kept : withPractice(kept, job.practice);
  const sameCase = caseById(after, operatingCase.id);
  const solved = sameCase === undefined ? null : solveBank({ job: after, tables, operatingCase: sameCase, model });
  return solved === null ? undefined : measureBank(solved);
}
