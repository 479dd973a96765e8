/** Fields of a part: figures, their origins and ranges, and the kind itself. */

import type { Origin, PartKind } from '../job/part.ts';
import { partFields } from '../job/partFields.ts';
import { isForbiddenName } from '../job/readJson.ts';
import { dropDangling } from './dangling.ts';
import { changed, type Draft, type OpenDraft, type OpenPart } from './draft.ts';
import type { Edit } from './edit.ts';
import { figureOf, fillGuesses, guessFor, surroundingsOf } from './guesses.ts';
import { structuredCopy } from './parts.ts';
import { isTerminalPath, junctionAt, pathsOf, putTerminal, touchOf } from './terminals.ts';
import { fieldWords, valueWords } from './words.ts';

const loadFigures: readonly string[] = ['powerW', 'currentA', 'resistanceOhm'];
const kept: ReadonlySet<string> = new Set(['id', 'kind', 'origin', 'range']);

export interface FieldChange {
  readonly part: string;
  /** A field of the part, or a terminal path (`from.plus`). */
  readonly field: string;
  /** `undefined` takes the field away; a required figure becomes a marked guess instead. */
  readonly value: unknown;
  /** Where the figure comes from; without it, as read off a label. */
  readonly origin?: Origin;
}

/**
 * Sets one field. What was known of the old figure goes with it: its origin, and its range where the new figure lies outside.
 * The three ways to state a load replace each other.
 */
export function setField(change: FieldChange): Edit {
  const { part: id, field, value } = change;
  const said =
    value === undefined ? `took away ${fieldWords(field)}` : `${fieldWords(field)} ${valueWords(field, value)}`;
  return {
    label: `${id}: ${said}`,
    apply: (draft) =>
      withPart(draft, id, (part, open) => {
        if (kept.has(field) || isForbiddenName(field)) return;
        if (isTerminalPath(field) && (junctionAt(part, field) !== undefined || field === 'midpoint')) {
          setTerminal(part, field, value, open);
        } else if (value === undefined) takeAway(part, field, open);
        else put(part, change);
      }),
  };
}

function setTerminal(part: OpenPart, field: string, value: unknown, open: OpenDraft): void {
  if (typeof value === 'string') putTerminal(part, field, value);
  else if (value === undefined && field === 'midpoint') delete part['midpoint'];
  else return;
  dropDangling(open);
}

function put(part: OpenPart, { field, value, origin }: FieldChange): void {
  if (part.kind === 'load' && loadFigures.includes(field)) {
    for (const other of loadFigures) if (other !== field) drop(part, other);
  }
  const isSame = part[field] === value;
  part[field] = structuredCopy(value);
  if (origin !== undefined || !isSame) mark(part, field, origin);
  if (!isWithinRange(part, field, value)) forget(part, 'range', field);
}

function takeAway(part: OpenPart, field: string, open: OpenDraft): void {
  const guess = guessFor(part, field, surroundingsOf(open));
  if (guess === undefined) {
    drop(part, field);
    // The last way to state a load or a conductor may have gone: another is put in.
    fillGuesses(part, surroundingsOf(open));
  } else {
    part[field] = guess;
    mark(part, field, 'guess');
    forget(part, 'range', field);
  }
}

function drop(part: OpenPart, field: string): void {
  delete part[field];
  forget(part, 'origin', field);
  forget(part, 'range', field);
}

/** Sets or clears the origin of a field; common fields such as the label have none. */
function mark(part: OpenPart, field: string, origin: Origin | undefined): void {
  if (origin === undefined || !Object.hasOwn(partFields.get(part.kind) ?? {}, field)) forget(part, 'origin', field);
  else part['origin'] = { ...(part['origin'] as object | undefined), [field]: origin };
}

function forget(part: OpenPart, of: 'origin' | 'range', field: string): void {
  const known = part[of] as Record<string, unknown> | undefined;
  if (known === undefined || !Object.hasOwn(known, field)) return;
  delete known[field];
  if (Object.keys(known).length === 0) delete part[of];
}

function isWithinRange(part: OpenPart, field: string, value: unknown): boolean {
  const range = (part['range'] as Record<string, unknown> | undefined)?.[field];
  const rule = partFields.get(part.kind)?.[field]?.rule;
  if (!Array.isArray(range)) return true;
  const unit = rule?.holds === 'quantity' ? rule.unit : '1';
  const [low, high] = range.map((bound: unknown) => figureOf(bound, unit));
  const figure = figureOf(value, unit);
  return figure !== undefined && low !== undefined && high !== undefined && low <= figure && figure <= high;
}

/** States between which bounds a figure lies, or that nothing is known of them. */
export function setRange(change: {
  readonly part: string;
  readonly field: string;
  readonly range: readonly [number, number] | undefined;
}): Edit {
  const { part: id, field, range } = change;
  const said = range === undefined ? 'no range' : `${valueWords(field, range[0])} to ${valueWords(field, range[1])}`;
  return {
    label: `${id}: ${fieldWords(field)} ${said}`,
    apply: (draft) =>
      withPart(draft, id, (part) => {
        if (range === undefined) forget(part, 'range', field);
        else if (!isForbiddenName(field))
          part['range'] = { ...(part['range'] as object | undefined), [field]: [...range] };
      }),
  };
}

/** States where a figure comes from; `undefined` says nothing of it (read off a label if given, a default if not). */
export function setOrigin(change: {
  readonly part: string;
  readonly field: string;
  readonly origin: Origin | undefined;
}): Edit {
  const { part: id, field, origin } = change;
  return {
    label: `${id}: ${fieldWords(field)} ${origin === undefined ? 'of no stated origin' : `is ${originWords[origin]}`}`,
    apply: (draft) =>
      withPart(draft, id, (part) => {
        mark(part, field, origin);
      }),
  };
}

const originWords: Readonly<Record<Origin, string>> = {
  measured: 'measured',
  label: 'read off a label',
  default: 'a default',
  guess: 'a guess',
};

/** The kinds that touch junctions the same way as this one, itself among them: what `changeKind` can make of it. */
export function kindsAlike(kind: PartKind): readonly PartKind[] {
  const kinds = [...partFields.keys()] as PartKind[];
  return touchOf(kind) === 'taps' ? [kind] : kinds.filter((other) => touchOf(other) === touchOf(kind));
}

/** Makes another kind of part of one, in its place. Fields that both kinds have stay; what the new kind needs is guessed. */
export function changeKind(id: string, kind: PartKind): Edit {
  return {
    label: `${id} is now a ${kind}`,
    apply: (draft) =>
      withPart(draft, id, (part, open) => {
        if (part.kind === kind || !kindsAlike(part.kind).includes(kind)) return;
        const fields = partFields.get(kind) ?? {};
        const terminals = new Set(pathsOf(kind).map((path) => path.split('.')[0]));
        for (const field of Object.keys(partFields.get(part.kind) ?? {})) {
          if (!Object.hasOwn(fields, field) && !terminals.has(field)) drop(part, field);
        }
        part.kind = kind;
        if (kind === 'load' && loadFigures.filter((figure) => part[figure] !== undefined).length > 1)
          drop(part, 'resistanceOhm');
        fillGuesses(part, surroundingsOf(open));
        dropDangling(open);
      }),
  };
}

function withPart(draft: Draft, id: string, recipe: (part: OpenPart, open: OpenDraft) => void): Draft {
  return changed(draft, (open) => {
    const part = open.parts.find((candidate) => candidate.id === id);
    if (part !== undefined) recipe(part, open);
  });
}
