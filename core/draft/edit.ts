/** An edit: a pure step from one draft to the next. It is taken only if the job that it leaves can be read. */
import type { Issue, Result } from '../job/issue.ts';
import { missingFigures } from '../network/figures.ts';
import type { Tables } from '../tables/tables.ts';
import { type Draft, type Edited, editedOf } from './draft.ts';

export interface Edit {
  /** What was done, in words, for the history: `F3: rating 60 A`. */
  readonly label: string;
  /** Another draft, or the same one where the edit names nothing that is there. Never throws for what is in the draft. */
  readonly apply: (draft: Draft) => Draft;
}

/**
 * Applies the edit and checks what it leaves: shape, references, and that every conductor's resistance is known. Issues mean that
 * nothing was changed. An edit that changes nothing gives the same draft object back.
 */
export function applyEdit(draft: Draft, edit: Edit, tables: Tables): Result<Edited, readonly Issue[]> {
  const after = edit.apply(draft);
  const edited = editedOf(sameValue(draft, after) ? draft : after);
  if (!edited.ok) return edited;
  const missing = missingFigures({ job: edited.value.job, tables });
  return missing.length === 0 ? edited : { ok: false, issues: missing };
}

/** Several edits as one step of the history. */
export function together(label: string, edits: readonly Edit[]): Edit {
  return { label, apply: (draft) => edits.reduce((before, edit) => edit.apply(before), draft) };
}

/** True for JSON values that say the same, whatever the order of their fields. */
export function sameValue(one: unknown, other: unknown): boolean {
  if (one === other) return true;
  if (typeof one !== 'object' || typeof other !== 'object' || one === null || other === null) return false;
  if (Array.isArray(one) !== Array.isArray(other)) return false;
  const names = Object.keys(one);
  if (names.length !== Object.keys(other).length) return false;
  return names.every(
    (name) =>
      Object.hasOwn(other, name) &&
      sameValue((one as Record<string, unknown>)[name], (other as Record<string, unknown>)[name]),
  );
}
