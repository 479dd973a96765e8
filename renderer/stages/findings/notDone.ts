/** Checks not done, gathered by the figure that they wait for. */
import type { CheckedJob, MissingField, NotChecked } from '../../../core/api.ts';
import { missingField } from '../../../core/api.ts';

export interface MissingFigure {
  readonly key: string;
  /** What is missing, in the checks' own words. */
  readonly missing: string;
  /** The fields to fill; none where no single field of the job would do. */
  readonly fields: readonly MissingField[];
  readonly checks: readonly NotChecked[];
}

/** One entry a missing figure: what can be filled in first, and of that what most checks wait for. */
export function missingFigures(rows: readonly NotChecked[], job: CheckedJob): readonly MissingFigure[] {
  const groups = new Map<string, { missing: string; fields: readonly MissingField[]; checks: NotChecked[] }>();
  for (const row of rows) {
    const fields = missingField(row, job);
    const key =
      fields.length === 0 ? row.missing : fields.map(({ part, field }) => `${part ?? ''} ${field}`).join(', ');
    const group = groups.get(key) ?? { missing: row.missing, fields, checks: [] };
    group.checks.push(row);
    groups.set(key, group);
  }
  const gathered = [...groups].map(([key, group]) => ({ key, ...group }));
  const canFill = ({ fields }: MissingFigure): number => (fields.length > 0 ? 1 : 0);
  return gathered.toSorted((a, b) => canFill(b) - canFill(a) || b.checks.length - a.checks.length);
}

/** True for a check that waits for the choice of a rule book; that choice stands at the head of the stage. */
export function waitsForPractice({ fields, missing }: MissingFigure): boolean {
  return (
    fields.some(({ part, field }) => part === null && field === 'practice') || missing.startsWith('practice of the job')
  );
}
