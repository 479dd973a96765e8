/** Parts come, go and get other names; what refers to them follows. */
import type { PartKind } from '../job/part.ts';
import { dropDangling } from './dangling.ts';
import { changed, type OpenDraft, type OpenPart, type Point } from './draft.ts';
import type { Edit } from './edit.ts';
import { fillGuesses, surroundingsOf } from './guesses.ts';
import { derivedIds, freshId, freshJunction, idLike, idsOf, junctionNamesOf, keep } from './naming.ts';
import { isTerminalPath, junctionAt, pathsOf, putTerminal } from './terminals.ts';
import { partsWords } from './words.ts';

/** A part's fields without its id; junctions and figures that are left out are put in by the edit. */
export interface PartFieldsGiven {
  readonly kind: PartKind;
  readonly [field: string]: unknown;
}

export interface NewPart {
  readonly part: PartFieldsGiven;
  /** The id wanted; one like it is taken where it is in use. Without it, the kind's letters and a number. */
  readonly id?: string;
  readonly at?: Point;
  /** Junction by terminal path (`from`, `to.plus`, `junctions[0]`); a terminal not named gets a junction of its own. */
  readonly junctions?: Readonly<Record<string, string>>;
}

/** Puts in a part. Required figures that are not given are guessed and marked so. */
export function addPart(added: NewPart): Edit {
  return {
    label: `Added ${added.part.kind}${added.id === undefined ? '' : ` ${added.id}`}`,
    apply: (draft) =>
      changed(draft, (open) => {
        putIn(open, added);
      }),
  };
}

/** Puts a part into an open draft and answers it. */
export function putIn(open: OpenDraft, { part: fields, id: wanted, at, junctions = {} }: NewPart): OpenPart {
  const ids = idsOf(open);
  const { kind } = fields;
  const isFree =
    wanted !== undefined && ![wanted, ...(kind === 'pair' ? derivedIds(wanted) : [])].some((id) => ids.has(id));
  const id = wanted === undefined ? freshId(kind, ids) : isFree ? wanted : idLike(wanted, kind, ids);
  const part = { id, ...structuredCopy(fields) } as OpenPart;
  part.id = id;
  for (const [path, junction] of Object.entries(junctions)) if (isTerminalPath(path)) putTerminal(part, path, junction);
  const taken = junctionNamesOf(open);
  for (const path of pathsOf(kind)) {
    if (junctionAt(part, path) === undefined) putTerminal(part, path, freshJunction(id, path, taken));
  }
  fillGuesses(part, surroundingsOf(open));
  if (at !== undefined) part['at'] = { x: at.x, y: at.y };
  open.parts.push(part);
  return part;
}

/** A copy that may be written to, of a plain value that may not. */
export function structuredCopy<T>(value: T): T {
  if (Array.isArray(value)) return value.map((item: unknown) => structuredCopy(item)) as T;
  if (typeof value !== 'object' || value === null) return value;
  const copy: Record<string, unknown> = {};
  for (const [name, item] of Object.entries(value)) if (item !== undefined) keep(copy, name, structuredCopy(item));
  return copy as T;
}

/** Takes parts out, with all that cases and readings say of them and notes on junctions that nothing touches any more. */
export function removeParts(ids: readonly string[]): Edit {
  const gone = new Set(ids);
  return {
    label: `Removed ${partsWords(ids)}`,
    apply: (draft) =>
      changed(draft, (open) => {
        if (!open.parts.some(({ id }) => gone.has(id))) return;
        open.parts = open.parts.filter(({ id }) => !gone.has(id));
        dropDangling(open);
      }),
  };
}

/** Gives a part another id, in cases and readings too. */
export function renamePart(id: string, newId: string): Edit {
  return {
    label: `Renamed ${id} to ${newId}`,
    apply: (draft) =>
      changed(draft, (open) => {
        const part = open.parts.find((candidate) => candidate.id === id);
        if (part === undefined || id === newId) return;
        const isTaken = idsOf(open).has(newId);
        part.id = newId;
        // A clash is for the check to name; what refers to the other part must not be mixed with it before.
        if (!isTaken) followName(open, { id, newId, kind: part.kind });
      }),
  };
}

function followName(
  open: OpenDraft,
  { id, newId, kind }: { readonly id: string; readonly newId: string; readonly kind: string },
): void {
  for (const operatingCase of open.cases ?? []) {
    if (operatingCase.surge === id) operatingCase.surge = newId;
    for (const field of ['set', 'stateOfChargeByString'] as const) {
      const record = operatingCase[field];
      if (record !== undefined && Object.hasOwn(record, id)) {
        operatingCase[field] = renamedKey<never>(record as Record<string, never>, id, newId);
      }
    }
  }
  const names = new Map([[id, newId]]);
  if (kind === 'pair') {
    for (const pole of ['plus', 'minus']) names.set(`${id}.${pole}`, `${newId}.${pole}`);
  }
  for (const reading of open.readings ?? []) {
    const name = reading.part === undefined ? undefined : names.get(reading.part);
    if (name !== undefined) reading.part = name;
  }
}

/** The same record with one key called otherwise, in its old place. */
export function renamedKey<T>(record: Record<string, T>, key: string, newKey: string): Record<string, T> {
  const renamed: Record<string, T> = {};
  for (const [name, value] of Object.entries(record)) keep(renamed, name === key ? newKey : name, value);
  return renamed;
}
