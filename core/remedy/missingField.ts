/** From a check that could not be made to the fields that would let it be made. */
import type { NotChecked } from '../checks/finding.ts';
import type { Fields, Rule } from '../job/field.ts';
import type { CheckedJob } from '../job/job.ts';
import { settingFields, siteFields, topFields } from '../job/jobFields.ts';
import type { PartId } from '../job/part.ts';
import { partFields } from '../job/partFields.ts';

/** A field of a part, or (with `part` null) of the job itself as a path: `practice`, `settings.nominalV`, `site.ambientMinDegC`. */
export interface MissingField {
  readonly part: PartId | null;
  readonly field: string;
  /** What it may hold; null where the path leads to no single field of the job file. */
  readonly holds: Rule | null;
}

/**
 * The fields to fill in for a check that was not done, ready to be set in a draft: a cable of an out-and-back run is named by the
 * run. Empty where no field would settle it (a case without an operating point, a current that the network leaves open).
 */
export function missingField({ fields = [] }: NotChecked, job: CheckedJob): readonly MissingField[] {
  return fields.map(({ part, field }): MissingField => {
    if (part === null) return { part, field, holds: ruleOfJob(field) };
    const owner = ownerOf(part, job);
    const known = owner === undefined ? undefined : partFields.get(owner.kind)?.[field];
    return { part: owner?.id ?? part, field, holds: known?.rule ?? null };
  });
}

function ownerOf(id: PartId, { parts }: CheckedJob) {
  const run = id.replace(/\.(plus|minus)$/, '');
  return parts.find((part) => part.id === id) ?? parts.find((part) => part.kind === 'pair' && part.id === run);
}

function ruleOfJob(path: string): Rule | null {
  const [group = '', field] = path.split('.');
  const fields: Fields = group === 'settings' ? settingFields : group === 'site' ? siteFields : topFields;
  return fields[field ?? group]?.rule ?? null;
}
