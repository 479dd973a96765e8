/** Unknown JSON in, a checked job or every issue out. Nothing downstream parses. */
import { quoted } from '../units/parsed.ts';
import { checkCases, type PartsRead } from './checkCases.ts';
import { checkPart, extraOf } from './checkPart.ts';
import { checkReadings } from './checkReadings.ts';
import { described, isRawObject, own, type RawObject } from './field.ts';
import type { Issue, Result } from './issue.ts';
import { IssueList } from './issueList.ts';
import type { CheckedJob, JunctionNote } from './job.ts';
import { checkDemand, checkSettings, checkSite, checkTargets, junctionFields, topFields } from './jobFields.ts';
import { type Migration, migrate, migrations } from './migrate.ts';
import { nearestNameHint } from './nearestName.ts';
import { type JunctionId, junctionsOf, type Part } from './part.ts';
import { fieldPath, itemPath } from './path.ts';
import { readFields } from './readField.ts';
import { readJson } from './readJson.ts';

/** A job of more parts is no job of this trade; the limit keeps every later step bounded. */
export const mostParts = 20_000;

export interface CheckOptions {
  /** Migrations to walk instead of the program's own; for tests of the chain. */
  readonly migrations?: ReadonlyMap<number, Migration>;
}

/**
 * Reads the text of a job file. Every issue of shape, unit, range and reference is returned at once, each with the path of the
 * field and a sentence; a text that is no JSON, too large or too deep has that one issue. Never throws for what is in the text.
 */
export function parseJob(text: string, options: CheckOptions = {}): Result<CheckedJob, readonly Issue[]> {
  const json = readJson(text);
  return json.ok ? checkJob(json.value, options) : json;
}

/** Checks a job that is already a value; as `parseJob`. */
export function checkJob(value: unknown, options: CheckOptions = {}): Result<CheckedJob, readonly Issue[]> {
  const issues = new IssueList();
  if (!isRawObject(value)) {
    issues.add(
      '',
      'wrong-type',
      () => `A job must be an object with format, version and parts, got ${described(value)}.`,
    );
    return { ok: false, issues: issues.all() };
  }
  const format = own(value, 'format');
  if (format !== 'ohmwright-job') {
    issues.add('format', format === undefined ? 'missing' : 'wrong-format', () => {
      return `A job says "format": "ohmwright-job" at its head, got ${format === undefined ? 'nothing' : described(format)}.`;
    });
    return { ok: false, issues: issues.all() };
  }
  const migrated = migrate(value, { steps: options.migrations ?? migrations });
  if (!migrated.ok) return migrated;
  const job = readWholeJob(migrated.value, issues);
  return issues.size === 0 ? { ok: true, value: job } : { ok: false, issues: issues.all() };
}

function readWholeJob(raw: RawObject, issues: IssueList): CheckedJob {
  const values = readFields(raw, topFields, { issues, path: '', owner: 'the job' });
  const parts = readParts(own(raw, 'parts'), issues);
  const junctionNames = junctionNamesOf(parts);
  const cases = checkCases(own(raw, 'cases'), parts, issues);
  for (const operatingCase of cases) {
    for (const part of operatingCase.changed.values()) for (const name of junctionsOf(part)) junctionNames.add(name);
  }
  const known = {
    junctions: junctionNames,
    partIds: new Set([...parts.rawById.keys(), ...derivedIds(parts)]),
    pairIds: pairIds(parts),
    caseIds: new Set([...cases.map((operatingCase) => operatingCase.id), 'at-rest']),
  };
  const job: Omit<CheckedJob, symbol> = {
    title: (values['title'] as string | undefined) ?? 'Untitled job',
    notes: values['notes'] as string | undefined,
    preparedFor: values['preparedFor'] as string | undefined,
    preparedBy: values['preparedBy'] as string | undefined,
    practice: (values['practice'] as CheckedJob['practice'] | undefined) ?? 'iec-land',
    practiceAssumed: values['practice'] === undefined,
    practiceEdition: values['practiceEdition'] as string | undefined,
    site: checkSite(own(raw, 'site'), issues),
    junctions: readJunctionNotes(own(raw, 'junctions'), junctionNames, issues),
    parts: parts.checked,
    cases,
    demand: checkDemand(own(raw, 'demand'), issues),
    targets: checkTargets(own(raw, 'targets'), issues),
    readings: checkReadings(own(raw, 'readings'), known, issues),
    settings: checkSettings(own(raw, 'settings'), issues),
    extra: extraOf(raw),
  };
  return job as CheckedJob;
}

function readParts(raw: unknown, issues: IssueList): PartsRead {
  const checked: Part[] = [];
  const rawById = new Map<string, RawObject>();
  const none = { checked, checkedById: new Map<string, Part>(), rawById };
  if (raw === undefined) {
    issues.add('parts', 'missing', () => 'The job needs parts: a list, which may be empty.');
    return none;
  }
  if (!Array.isArray(raw)) {
    issues.add('parts', 'wrong-type', () => `parts must be a list, got ${described(raw)}.`);
    return none;
  }
  if (raw.length > mostParts) {
    issues.add(
      'parts',
      'too-many',
      () => `A job may have ${String(mostParts)} parts, this one has ${String(raw.length)}.`,
    );
    return none;
  }
  const items: readonly unknown[] = raw;
  const indexById = new Map<string, number>();
  for (const [index, item] of items.entries()) {
    const part = partFrom(item, index, issues);
    if (part !== undefined) checked.push(part);
    if (!isRawObject(item)) continue;
    const id = own(item, 'id');
    if (typeof id !== 'string') continue;
    const earlier = indexById.get(id);
    if (earlier === undefined) {
      indexById.set(id, index);
      rawById.set(id, item);
    } else duplicate(index, `id ${quoted(id)} is already used by ${itemPath('parts', earlier)}`, issues);
  }
  const parts = { checked, checkedById: new Map<string, Part>(checked.map((part) => [part.id, part])), rawById };
  for (const id of derivedIds(parts)) {
    const index = indexById.get(id);
    if (index !== undefined)
      duplicate(index, `id ${quoted(id)} is the id of one cable of the pair of that name`, issues);
  }
  return parts;
}

const readBefore = new WeakMap<object, Part>();

/**
 * A part of the file. One that can never change any more (a job that is being edited shares its parts with the one before the edit)
 * gives the very part that it gave before, so that whatever has been found out about it still holds. A part with issues is
 * always read anew: its path may be another.
 */
function partFrom(item: unknown, index: number, issues: IssueList): Part | undefined {
  const known = isRawObject(item) ? readBefore.get(item) : undefined;
  if (known !== undefined) return known;
  const before = issues.size;
  const part = checkPart(item, itemPath('parts', index), issues);
  if (part !== undefined && issues.size === before && isRawObject(item) && isForGood(item)) readBefore.set(item, part);
  return part;
}

/** Frozen, and all that is in it. */
function isForGood(value: unknown): boolean {
  if (typeof value !== 'object' || value === null) return true;
  return Object.isFrozen(value) && Object.values(value).every(isForGood);
}

function duplicate(index: number, words: string, issues: IssueList): void {
  issues.add(
    fieldPath(itemPath('parts', index), 'id'),
    'duplicate-id',
    () => `Part ${words}; every id must be its own.`,
  );
}

function pairIds(parts: PartsRead): ReadonlySet<string> {
  return new Set([...parts.rawById].filter(([, raw]) => own(raw, 'kind') === 'pair').map(([id]) => id));
}

/** The ids of the two cables that each pair stands for. */
function derivedIds(parts: PartsRead): readonly string[] {
  return [...pairIds(parts)].flatMap((id) => [`${id}.plus`, `${id}.minus`]);
}

/** Every junction that some part names, parts with issues included, so that one slip is not reported twice. */
function junctionNamesOf(parts: PartsRead): Set<string> {
  const names = new Set<string>();
  for (const part of parts.checked) for (const name of junctionsOf(part)) names.add(name);
  for (const [id, raw] of parts.rawById) {
    if (parts.checkedById.has(id)) continue;
    for (const field of ['plus', 'minus', 'from', 'to', 'midpoint', 'junctions']) addNames(own(raw, field), names);
  }
  return names;
}

function addNames(value: unknown, names: Set<string>): void {
  if (typeof value === 'string') names.add(value);
  else if (Array.isArray(value)) for (const item of value) addNamesOfText(item, names);
  else if (isRawObject(value)) for (const pole of ['plus', 'minus']) addNamesOfText(own(value, pole), names);
}

function addNamesOfText(value: unknown, names: Set<string>): void {
  if (typeof value === 'string') names.add(value);
}

function readJunctionNotes(
  raw: unknown,
  names: ReadonlySet<string>,
  issues: IssueList,
): ReadonlyMap<JunctionId, JunctionNote> {
  const notes = new Map<JunctionId, JunctionNote>();
  if (raw === undefined) return notes;
  if (!isRawObject(raw)) {
    issues.add(
      'junctions',
      'wrong-type',
      () => `junctions must be an object keyed by junction names, got ${described(raw)}.`,
    );
    return notes;
  }
  for (const name of Object.keys(raw)) {
    const path = fieldPath('junctions', name);
    const note = raw[name];
    if (!names.has(name)) {
      if (!name.startsWith('x-')) {
        issues.add(
          path,
          'unknown-reference',
          () => `No part touches a junction ${quoted(name)}${nearestNameHint(name, names)}.`,
        );
      }
    } else if (!isRawObject(note)) {
      issues.add(
        path,
        'wrong-type',
        () => `The note on junction ${quoted(name)} must be an object, got ${described(note)}.`,
      );
    } else {
      const values = readFields(note, junctionFields, { issues, path, owner: `junction ${name}` });
      notes.set(name as JunctionId, values as unknown as JunctionNote);
    }
  }
  return notes;
}
