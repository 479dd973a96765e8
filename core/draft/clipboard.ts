/** Parts copied as text and put in again, in this job or another. */
import { isRawObject } from '../job/field.ts';
import type { Issue } from '../job/issue.ts';
import { currentVersion } from '../job/migrate.ts';
import { checkJob } from '../job/parseJob.ts';
import { readJson } from '../job/readJson.ts';
import {
  changed,
  type Draft,
  type OpenDraft,
  type OpenNote,
  type OpenPart,
  type Point,
  type RawPart,
  rawPart,
  rawParts,
} from './draft.ts';
import type { Edit } from './edit.ts';
import { addId, freeName, idLike, idsOf, junctionNamesOf, keep } from './naming.ts';
import { structuredCopy } from './parts.ts';
import { putTerminal, terminalsOf } from './terminals.ts';
import { partsWords } from './words.ts';

const clipFormat = 'ohmwright-parts';
const clipVersion = 1;
/** How far a copy stands from what it was made of, where nothing is said of it: one step of the drawing's grid, both ways. */
const usualOffset: Point = { x: 40, y: 40 };
/** The junction of that name is the earth, the same everywhere. */
const earth = 'earth';

interface Clip {
  readonly parts: readonly RawPart[];
  readonly notes: Readonly<Record<string, OpenNote>>;
  /** Junctions where the copied parts meet others. */
  readonly outer: readonly string[];
}

/** The parts and what is said of their junctions, as text for the clipboard. Ids that no part has are passed over. */
export function copyParts(draft: Draft, ids: readonly string[]): string {
  const { parts, notes, outer } = clipOf(draft, ids);
  return JSON.stringify({
    format: clipFormat,
    version: clipVersion,
    jobVersion: currentVersion,
    parts,
    junctions: notes,
    outer,
  });
}

function clipOf(draft: Draft, ids: readonly string[]): Clip {
  const copied = new Set(ids);
  const parts = rawParts(draft).filter(({ id }) => copied.has(id));
  const touched = new Set(parts.flatMap((part) => terminalsOf(part).map(({ junction }) => junction)));
  const met = new Set(
    rawParts(draft)
      .filter(({ id }) => !copied.has(id))
      .flatMap((part) => terminalsOf(part).map(({ junction }) => junction)),
  );
  const all = (draft['junctions'] ?? {}) as Readonly<Record<string, OpenNote>>;
  const notes: Record<string, OpenNote> = {};
  for (const name of touched) if (Object.hasOwn(all, name)) keep(notes, name, all[name] ?? {});
  return { parts, notes, outer: [...touched].filter((name) => met.has(name)) };
}

export interface Placing {
  /** The top left corner of the copies. */
  readonly at?: Point;
  /** Or how far they stand from where they were. */
  readonly offset?: Point;
}

/**
 * The edit that puts copied parts in: ids of their own; junctions among themselves stay joined under names of their own;
 * junctions where they met other parts are kept if this job has them, else they get names of their own too. Issues where the
 * text holds no parts of a job.
 */
export function pasteParts(text: string, placing: Placing = {}): Edit | readonly Issue[] {
  const clip = readClip(text);
  if ('issues' in clip) return clip.issues;
  return {
    label: `Pasted ${partsWords(clip.parts.map(({ id }) => id))}`,
    apply: (draft) =>
      changed(draft, (open) => {
        putClip(open, clip, placing);
      }),
  };
}

/** Puts copies of parts beside them: among themselves joined as they are, and with other parts at the same junctions. */
export function duplicateParts(ids: readonly string[], offset: Point = usualOffset): Edit {
  return {
    label: `Duplicated ${partsWords(ids)}`,
    apply: (draft) => {
      const clip = clipOf(
        draft,
        ids.filter((id) => rawPart(draft, id) !== undefined),
      );
      return clip.parts.length === 0
        ? draft
        : changed(draft, (open) => {
            putClip(open, clip, { offset });
          });
    },
  };
}

function notParts(message: string): { readonly issues: readonly Issue[] } {
  return { issues: [{ path: '', code: 'wrong-format', message }] };
}

function readClip(text: string): Clip | { readonly issues: readonly Issue[] } {
  const json = readJson(text);
  if (!json.ok) return notParts('The clipboard holds no parts of a job.');
  const value = json.value;
  if (!isRawObject(value) || value['format'] !== clipFormat) return notParts('The clipboard holds no parts of a job.');
  if (value['version'] !== clipVersion) return notParts('The copied parts were written by a newer program.');
  const notes = value['junctions'] ?? {};
  // What another job could not hold is refused here, before any of it is put in.
  const checked = checkJob({
    format: 'ohmwright-job',
    version: value['jobVersion'],
    parts: value['parts'],
    junctions: notes,
  });
  if (!checked.ok) return { issues: checked.issues };
  const outer = Array.isArray(value['outer']) ? value['outer'].filter((name) => typeof name === 'string') : [];
  return { parts: value['parts'] as readonly RawPart[], notes: notes as Clip['notes'], outer };
}

function putClip(open: OpenDraft, clip: Clip, placing: Placing): void {
  const known = junctionNamesOf(open);
  const taken = new Set(known);
  const names = new Map<string, string>();
  for (const part of clip.parts) {
    for (const { junction } of terminalsOf(part)) {
      if (names.has(junction)) continue;
      const isShared = junction === earth || (clip.outer.includes(junction) && known.has(junction));
      names.set(junction, isShared ? junction : freeName(junction, taken));
    }
  }
  const by = shiftOf(clip, placing);
  const ids = idsOf(open);
  for (const part of clip.parts) {
    const isFree =
      !ids.has(part.id) && !(part.kind === 'pair' && (ids.has(`${part.id}.plus`) || ids.has(`${part.id}.minus`)));
    const id = isFree ? part.id : idLike(part.id, part.kind, ids);
    addId(ids, id, part.kind);
    const copy = structuredCopy(part) as unknown as OpenPart;
    copy.id = id;
    for (const { path, junction } of terminalsOf(part)) putTerminal(copy, path, names.get(junction) ?? junction);
    const at = copy['at'] as Point | undefined;
    if (at !== undefined) copy['at'] = { x: at.x + by.x, y: at.y + by.y };
    open.parts.push(copy);
  }
  putNotes(open, clip, { names, known, by });
}

function putNotes(
  open: OpenDraft,
  clip: Clip,
  {
    names,
    known,
    by,
  }: { readonly names: ReadonlyMap<string, string>; readonly known: ReadonlySet<string>; readonly by: Point },
): void {
  for (const [junction, note] of Object.entries(clip.notes)) {
    const name = names.get(junction);
    if (name === undefined || known.has(name)) continue;
    // A copy is never 0 V by itself: its island may be the one that has a reference already.
    const { reference: _reference, at, ...rest } = note;
    const placed = at === undefined ? {} : { at: { x: at.x + by.x, y: at.y + by.y } };
    open.junctions ??= {};
    keep(open.junctions, name, { ...rest, ...placed });
  }
}

function shiftOf({ parts, notes }: Clip, { at, offset }: Placing): Point {
  if (at === undefined) return offset ?? usualOffset;
  const places = [...parts.map((part) => part['at']), ...Object.values(notes).map((note) => note.at)].filter(
    (place): place is Point => place !== undefined,
  );
  if (places.length === 0) return { x: 0, y: 0 };
  return { x: at.x - Math.min(...places.map(({ x }) => x)), y: at.y - Math.min(...places.map(({ y }) => y)) };
}
