/** The operating case that is looked at, with its answers, and which edits may be made in it alone. */
import { type CheckedJob, caseById, type OperatingCase, type OperatingPoint } from '../../core/api.ts';
import { useOpenJob } from '../state/openJob.ts';

export interface ChosenCase {
  readonly caseId: string;
  readonly words: string;
  /** The job that the answers belong to: of an earlier state where newer ones are on their way. */
  readonly job: CheckedJob;
  readonly operatingCase: OperatingCase | undefined;
  readonly point: OperatingPoint | undefined;
  /** The answers are of an earlier state. */
  readonly isOld: boolean;
  /** The job file lists this case, so that a field may be set in it alone. */
  readonly isListed: boolean;
}

export function useChosenCase(): ChosenCase {
  const caseId = useOpenJob((open) => open.caseId);
  const answers = useOpenJob((open) => open.answers);
  const generation = useOpenJob((open) => open.generation);
  const current = useOpenJob((open) => open.job);
  const isListed = useOpenJob((open) => listedCases(open.draft).some(({ id }) => id === caseId));
  const job = answers?.job ?? current;
  const operatingCase = caseById(job, caseId);
  return {
    caseId,
    words: caseWords(operatingCase ?? { id: caseId, label: undefined }),
    job,
    operatingCase,
    point: answers?.points.get(caseId),
    isOld: answers !== null && answers.generation !== generation,
    isListed,
  };
}

export interface ListedCase {
  readonly id: string;
  readonly label?: string;
  readonly [field: string]: unknown;
}

/** The cases that the job file lists, as they stand in it. */
export function listedCases(draft: object): readonly ListedCase[] {
  return (draft as { readonly cases?: readonly ListedCase[] }).cases ?? [];
}

export function caseWords({ id, label }: Pick<OperatingCase, 'id' | 'label'>): string {
  if (label !== undefined) return label;
  return id === 'as-drawn' ? 'As drawn' : id;
}
