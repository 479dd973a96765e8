/** From a check that could not be made to the fields that would let it be made. */
import type { NotChecked } from '../checks/finding.ts';
import type { Rule } from '../job/field.ts';
import type { CheckedJob } from '../job/job.ts';
import type { PartId } from '../job/part.ts';

/** A field of a part, or (with `part` null) of the job itself as a path: `practice`, `settings.nominalV`, `site.ambientDesignDegC`. */
export interface MissingField {
  readonly part: PartId | null;
  readonly field: string;
  /** What it may hold; null where the path leads to no single field of the job file. */
  readonly holds: Rule | null;
}

export function missingField(_row: NotChecked, _job: CheckedJob): readonly MissingField[] {
  return [];
}
