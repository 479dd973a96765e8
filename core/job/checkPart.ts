/** One part of the file, unknown, becomes a checked part. */
import { quoted } from '../units/parsed.ts';
import { described, type Fields, isRawObject, own, type Place, type RawObject, type Rule } from './field.ts';
import type { IssueList } from './issueList.ts';
import { keyedObject } from './keyedObject.ts';
import { troubleWithId } from './names.ts';
import { nearestNameHint } from './nearestName.ts';
import type { Origin, Part } from './part.ts';
import { findContradictions } from './partContradictions.ts';
import { commonFields, partFields } from './partFields.ts';
import { fieldPath } from './path.ts';
import { readFields, readValue } from './readField.ts';

const origins: readonly string[] = ['measured', 'label', 'default', 'guess'] satisfies Origin[];

/** The checked part, or `undefined` where at least one issue about it was added. */
export function checkPart(raw: unknown, path: string, issues: IssueList): Part | undefined {
  const before = issues.size;
  if (!isRawObject(raw)) {
    issues.add(path, 'wrong-type', () => `A part must be an object with id and kind, got ${described(raw)}.`);
    return undefined;
  }
  const place: Place = { issues, path, owner: ownerOf(raw) };
  checkId(raw, place);
  const fields = fieldsOf(raw, place);
  if (fields === undefined) return undefined;
  const values = readFields(raw, fields, place);
  values['origin'] = readOrigins(own(raw, 'origin'), fields, place);
  values['range'] = readRanges(raw, fields, values, place);
  values['given'] = givenOf(raw, fields);
  values['extra'] = extraOf(raw);
  const part = values as unknown as Part;
  // Only a part whose fields are each right can be asked whether they fit together.
  if (issues.size === before) findContradictions(part, place);
  return issues.size === before ? part : undefined;
}

/** How a part is called in a sentence: `cable C1`. */
export function ownerOf(raw: RawObject): string {
  const kind = own(raw, 'kind');
  const id = own(raw, 'id');
  const what = typeof kind === 'string' && partFields.has(kind) ? kind : 'part';
  return typeof id === 'string' && troubleWithId(id) === undefined ? `${what} ${id}` : `this ${what}`;
}

/** Shared by the many parts that have nothing to put in a map of their own. */
const nothing: ReadonlyMap<string, never> = new Map<string, never>();

/** The `x-…` fields of an object, as they are. */
export function extraOf(raw: RawObject): ReadonlyMap<string, unknown> {
  const names = Object.keys(raw).filter((name) => name.startsWith('x-'));
  return names.length === 0 ? nothing : new Map(names.map((name) => [name, raw[name]]));
}

function givenOf(raw: RawObject, fields: Fields): ReadonlySet<string> {
  const given = new Set<string>();
  for (const name of Object.keys(raw)) {
    if (Object.hasOwn(fields, name) && !Object.hasOwn(commonFields, name) && raw[name] !== undefined) given.add(name);
  }
  return given;
}

function checkId(raw: RawObject, place: Place): void {
  checkIdField(raw, 'part', place);
}

/** Checks the `id` of a part, case or reading, and answers it where it is one. */
export function checkIdField(raw: RawObject, what: string, { issues, path }: Place): string | undefined {
  const id = own(raw, 'id');
  const idPath = fieldPath(path, 'id');
  if (id === undefined) {
    issues.add(idPath, 'missing', () => `This ${what} needs an id of its own, such as "C1".`);
    return undefined;
  }
  if (typeof id !== 'string') {
    issues.add(idPath, 'wrong-type', () => `The id of a ${what} must be a text, got ${described(id)}.`);
    return undefined;
  }
  const wrong = troubleWithId(id);
  if (wrong === undefined) return id;
  issues.add(idPath, 'out-of-range', () => `The id of a ${what} ${wrong}, got ${quoted(id)}.`);
  return undefined;
}

const fieldsByKind = new Map(
  [...partFields].map(([kind, fields]): [string, Fields] => [kind, { ...commonFields, ...fields }]),
);

function fieldsOf(raw: RawObject, { issues, path, owner }: Place): Fields | undefined {
  const kind = own(raw, 'kind');
  const fields = typeof kind === 'string' ? fieldsByKind.get(kind) : undefined;
  if (fields !== undefined) return fields;
  const kinds = [...fieldsByKind.keys()];
  const code = kind === undefined ? 'missing' : typeof kind === 'string' ? 'not-in-list' : 'wrong-type';
  issues.add(fieldPath(path, 'kind'), code, () => {
    if (kind === undefined) return `${owner} needs a kind: one of ${kinds.join(', ')}.`;
    const hint = typeof kind === 'string' ? nearestNameHint(kind, kinds) : '';
    return `kind of ${owner}: expected one of ${kinds.join(', ')}, got ${described(kind)}${hint}.`;
  });
  return undefined;
}

/** Checks some fields for a part of a kind by themselves, where the whole part cannot be judged. */
export function checkLooseFields(raw: RawObject, kind: unknown, place: Place): void {
  const fields = typeof kind === 'string' ? fieldsByKind.get(kind) : undefined;
  if (fields === undefined) return;
  readFields(raw, Object.fromEntries(Object.entries(fields).map(([name, { rule }]) => [name, { rule }])), place);
}

function readOrigins(raw: unknown, fields: Fields, place: Place): ReadonlyMap<string, Origin> {
  if (raw === undefined) return nothing;
  const found = new Map<string, Origin>();
  for (const [name, value, at] of entriesByField(raw, 'origin', fields, place)) {
    const origin = readValue(value, { holds: 'choice', of: origins }, { ...at, name });
    if (origin !== undefined) found.set(name, origin as Origin);
  }
  return found;
}

function readRanges(
  raw: RawObject,
  fields: Fields,
  values: Readonly<Record<string, unknown>>,
  place: Place,
): ReadonlyMap<string, readonly [number, number]> {
  if (own(raw, 'range') === undefined) return nothing;
  const found = new Map<string, readonly [number, number]>();
  for (const [name, value, at] of entriesByField(own(raw, 'range'), 'range', fields, place)) {
    const range = readRange(name, value, fields[name]?.rule, at);
    if (range === undefined) continue;
    const stated = values[name];
    if (own(raw, name) !== undefined && typeof stated === 'number' && (stated < range[0] || stated > range[1])) {
      at.issues.add(fieldPath(at.path, name), 'contradiction', () => {
        return `The range of ${name} of ${place.owner} is ${range.join(' to ')}, which leaves out its value ${String(stated)}.`;
      });
    }
    found.set(name, range);
  }
  return found;
}

function readRange(
  name: string,
  value: unknown,
  rule: Rule | undefined,
  at: Place,
): readonly [number, number] | undefined {
  const path = fieldPath(at.path, name);
  if (rule === undefined || (rule.holds !== 'quantity' && rule.holds !== 'count' && rule.holds !== 'efficiency')) {
    at.issues.add(path, 'wrong-type', () => `${name} is no figure, so it has no range.`);
    return undefined;
  }
  if (!Array.isArray(value) || value.length !== 2) {
    at.issues.add(
      path,
      'wrong-type',
      () => `The range of ${name} must be a list [low, high], got ${described(value)}.`,
    );
    return undefined;
  }
  const [low, high] = value.map((bound: unknown, index) => {
    return readValue(bound, rule, {
      ...at,
      path: `${path}[${String(index)}]`,
      name: '',
      owner: `the range of ${name}`,
    });
  });
  if (typeof low !== 'number' || typeof high !== 'number') return undefined;
  if (low <= high) return [low, high];
  at.issues.add(
    path,
    'contradiction',
    () => `The range of ${name} must go from low to high, got ${String(low)} to ${String(high)}.`,
  );
  return undefined;
}

/** The entries of an object that is keyed by the names of fields; an entry under another name is an issue. */
function* entriesByField(
  raw: unknown,
  field: string,
  fields: Fields,
  place: Place,
): Generator<[name: string, value: unknown, at: Place]> {
  const entries = keyedObject(raw, field, 'field names', place);
  if (entries === undefined) return;
  const { path } = entries;
  const at = { issues: place.issues, path, owner: `${field} of ${place.owner}` };
  for (const name of Object.keys(entries.raw)) {
    if (Object.hasOwn(fields, name) && !Object.hasOwn(commonFields, name)) yield [name, entries.raw[name], at];
    else if (!name.startsWith('x-')) {
      at.issues.add(fieldPath(path, name), 'unknown-field', () => {
        return `${field} names ${quoted(name)}, which is no field of ${place.owner}${nearestNameHint(name, Object.keys(fields))}.`;
      });
    }
  }
}
