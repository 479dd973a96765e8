/**
 * A job while it is being edited: the plain JSON value of a job file of the current version that `checkJob` accepts. A draft is
 * never changed; an edit makes another that shares all it did not touch, so that thousands can be kept for undo.
 */
import { freeze, produce } from 'immer';
import { isRawObject } from '../job/field.ts';
import type { Issue, Result } from '../job/issue.ts';
import type { CheckedJob, Practice } from '../job/job.ts';
import { currentVersion, migrate } from '../job/migrate.ts';
import { checkJob } from '../job/parseJob.ts';
import type { PartKind } from '../job/part.ts';
import { readJson } from '../job/readJson.ts';

/** The fields of a job file. Read it through `rawPart`, `rawParts`, or the checked job beside it. */
export interface Draft {
  readonly [field: string]: unknown;
}

/** A part as it stands in the file, quantities as they were written (`2` or `"6 ft"`). */
export interface RawPart {
  readonly id: string;
  readonly kind: PartKind;
  readonly [field: string]: unknown;
}

/** A draft and what it says once checked. */
export interface Edited {
  readonly draft: Draft;
  readonly job: CheckedJob;
}

/** A name or a figure as a job file can hold it; anything else is refused by the check. */
export interface Point {
  readonly x: number;
  readonly y: number;
}

/** Reads the text of a job file of any known version into a draft of the current one, or says all that is wrong with it. */
export function draftOf(text: string): Result<Edited, readonly Issue[]> {
  const json = readJson(text);
  if (!json.ok) return json;
  const first = checkJob(json.value);
  if (!first.ok) return first;
  if (!isRawObject(json.value)) return { ok: true, value: { draft: {}, job: first.value } };
  const migrated = migrate(json.value);
  return migrated.ok ? editedOf(migrated.value) : migrated;
}

/** The value with its job beside it, frozen, or all that is wrong with it. */
export function editedOf(value: Draft): Result<Edited, readonly Issue[]> {
  const checked = checkJob(value);
  return checked.ok
    ? { ok: true, value: { draft: freeze(value as object, true) as Draft, job: checked.value } }
    : checked;
}

/** A job with a title and nothing in it. */
export function emptyDraft({ title, practice }: { readonly title: string; readonly practice: Practice }): Draft {
  return freeze({ format: 'ohmwright-job', version: currentVersion, title, practice, parts: [] }, true);
}

/** All parts in file order. */
export function rawParts(draft: Draft): readonly RawPart[] {
  return draft['parts'] as readonly RawPart[];
}

const partsById = new WeakMap<readonly RawPart[], ReadonlyMap<string, RawPart>>();

/** The part of that id as it stands in the file. */
export function rawPart(draft: Draft, id: string): RawPart | undefined {
  const parts = rawParts(draft);
  let byId = partsById.get(parts);
  if (byId === undefined) {
    byId = new Map(parts.map((part) => [part.id, part]));
    partsById.set(parts, byId);
  }
  return byId.get(id);
}

/** Ids of parts that stand in the second draft and not in the first: what an edit has put in. */
export function partsAdded(before: Draft, after: Draft): readonly string[] {
  return rawParts(after)
    .map(({ id }) => id)
    .filter((id) => rawPart(before, id) === undefined);
}

/** A part while an edit is under way. */
export interface OpenPart {
  id: string;
  kind: PartKind;
  [field: string]: unknown;
}
export interface OpenCase {
  id: string;
  label?: string;
  surge?: string;
  set?: Record<string, Record<string, unknown>>;
  stateOfChargeByString?: Record<string, unknown>;
  [field: string]: unknown;
}
export interface OpenNote {
  label?: string;
  at?: Point;
  reference?: boolean;
}
export interface OpenReading {
  id: string;
  case?: string;
  part?: string;
  plus?: string;
  minus?: string;
  [field: string]: unknown;
}
/** A draft while an edit is under way: may be written to. */
export interface OpenDraft {
  parts: OpenPart[];
  junctions?: Record<string, OpenNote>;
  cases?: OpenCase[];
  readings?: OpenReading[];
  [field: string]: unknown;
}

/** Another draft with the recipe's changes; the same draft where it makes none. */
export function changed(draft: Draft, recipe: (open: OpenDraft) => void): Draft {
  return produce(draft, (open) => {
    recipe(open as unknown as OpenDraft);
  });
}
