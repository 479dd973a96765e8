/** Operating cases: what each changes on the drawing, applied to whole parts and checked again. */
import { quoted } from '../units/parsed.ts';
import { checkIdField, checkLooseFields, checkPart, ownerOf } from './checkPart.ts';
import { described, type Fields, isRawObject, own, type Place, type RawObject } from './field.ts';
import type { IssueList } from './issueList.ts';
import { atRestChanges, type OperatingCase } from './job.ts';
import { keyedObject } from './keyedObject.ts';
import { nearestNameHint } from './nearestName.ts';
import type { Part, PartId } from './part.ts';
import { fieldPath, itemPath } from './path.ts';
import { readFields, readValue } from './readField.ts';

/** The parts of the file as cases need them: checked, and raw beside it for `set`. */
export interface PartsRead {
  /** Parts without issues, in file order. */
  readonly checked: readonly Part[];
  readonly checkedById: ReadonlyMap<string, Part>;
  /** Every part of the file that has an id, those with issues too. */
  readonly rawById: ReadonlyMap<string, RawObject>;
}

const mostCases = 1000;
/** Bound on the changed parts of all cases together, so that a small file cannot ask for unbounded work. */
const mostChangedParts = 1_000_000;

const caseFields: Fields = {
  id: { rule: { holds: 'anything' } },
  label: { rule: { holds: 'text', longest: 200 } },
  stateOfCharge: { rule: { holds: 'quantity', unit: '1', atLeast: 0, atMost: 1 } },
  stateOfChargeByString: { rule: { holds: 'anything' } },
  ambientDegC: { rule: { holds: 'quantity', unit: 'degC', atLeast: -90, atMost: 150 } },
  irradianceWPerM2: { rule: { holds: 'quantity', unit: 'W/m2', atLeast: 0, atMost: 2000 } },
  surge: { rule: { holds: 'anything' } },
  set: { rule: { holds: 'anything' } },
};

/** The cases of a job; without a list of them, or with an empty one, the one case `as-drawn`. */
export function checkCases(raw: unknown, parts: PartsRead, issues: IssueList): readonly OperatingCase[] {
  if (raw === undefined) return [asDrawn];
  if (!Array.isArray(raw)) {
    issues.add('cases', 'wrong-type', () => `cases must be a list, got ${described(raw)}.`);
    return [];
  }
  if (raw.length === 0) return [asDrawn];
  if (raw.length > mostCases) {
    issues.add(
      'cases',
      'too-many',
      () => `A job may have ${String(mostCases)} cases, this one has ${String(raw.length)}.`,
    );
    return [];
  }
  const strings = parts.checked.filter((part) => part.kind === 'string').length;
  const wholesale = raw.filter((item: unknown) => isRawObject(item) && own(item, 'stateOfCharge') !== undefined).length;
  if (strings * wholesale > mostChangedParts) {
    issues.add('cases', 'too-many', () => {
      return `${String(wholesale)} cases that set the state of charge of ${String(strings)} strings are more than ${String(mostChangedParts)} changes.`;
    });
    return [];
  }
  return readCases(raw, parts, issues);
}

const asDrawn: OperatingCase = {
  id: 'as-drawn',
  label: undefined,
  ambientDegC: undefined,
  irradianceWPerM2: undefined,
  surge: undefined,
  changed: new Map(),
};

function readCases(raw: readonly unknown[], parts: PartsRead, issues: IssueList): readonly OperatingCase[] {
  const firstAt = new Map<string, number>();
  const cases: OperatingCase[] = [];
  for (const [index, item] of raw.entries()) {
    const path = itemPath('cases', index);
    if (!isRawObject(item)) {
      issues.add(path, 'wrong-type', () => `A case must be an object with an id, got ${described(item)}.`);
      continue;
    }
    const id = checkIdField(item, 'case', { issues, path, owner: '' });
    if (id === undefined) continue;
    const earlier = firstAt.get(id);
    if (earlier !== undefined) {
      issues.add(
        fieldPath(path, 'id'),
        'duplicate-id',
        () => `Case id ${id} is already used by ${itemPath('cases', earlier)}.`,
      );
    }
    firstAt.set(id, earlier ?? index);
    cases.push(readCase(item, id, parts, { issues, path, owner: `case ${id}` }));
  }
  return cases;
}

/**
 * Later words win: the drawing (for a case called `at-rest`, with everything off), then `stateOfCharge`, then
 * `stateOfChargeByString`, then `set`.
 */
function readCase(raw: RawObject, id: string, parts: PartsRead, place: Place): OperatingCase {
  const values = readFields(raw, caseFields, place);
  const resting = id === 'at-rest';
  const changed = new Map<PartId, Part>(resting ? atRestChanges(parts.checked) : []);
  const charges = chargesOf(raw, values['stateOfCharge'] as number | undefined, parts, place);
  for (const [stringId, stateOfCharge] of charges) {
    const part = parts.checkedById.get(stringId);
    if (part?.kind === 'string') changed.set(part.id, withStateOfCharge(part, stateOfCharge));
  }
  for (const [part, fields, at] of settings(own(raw, 'set'), parts, place)) {
    const base = overridden(parts.rawById.get(part.id)!, restingFields(resting, part));
    const charge = charges.get(part.id);
    const charged = charge === undefined ? base : overridden(base, { stateOfCharge: charge });
    const after = checkPart(overridden(charged, fields), at.path, place.issues);
    if (after !== undefined) changed.set(part.id, after);
  }
  return {
    id,
    label: values['label'] as string | undefined,
    ambientDegC: values['ambientDegC'] as number | undefined,
    irradianceWPerM2: (values['irradianceWPerM2'] as number | undefined) ?? (resting ? 0 : undefined),
    surge: surgeOf(raw, changed, parts, place),
    changed,
  };
}

function restingFields(resting: boolean, part: Part): RawObject {
  return resting && 'on' in part ? { on: false } : {};
}

type StringPart = Extract<Part, { kind: 'string' }>;

function withStateOfCharge(part: StringPart, stateOfCharge: number): Part {
  const [origin, range] = [new Map(part.origin), new Map(part.range)];
  origin.delete('stateOfCharge');
  range.delete('stateOfCharge');
  return { ...part, stateOfCharge, origin, range, given: new Set([...part.given, 'stateOfCharge']) };
}

/** State of charge by string id, as the case sets it. */
function chargesOf(
  raw: RawObject,
  all: number | undefined,
  parts: PartsRead,
  place: Place,
): ReadonlyMap<string, number> {
  const charges = new Map<string, number>();
  if (all !== undefined) {
    for (const part of parts.checked) if (part.kind === 'string') charges.set(part.id, all);
  }
  const byString = own(raw, 'stateOfChargeByString');
  for (const [id, value, at] of entriesByPart(byString, 'stateOfChargeByString', parts, place)) {
    if (own(parts.rawById.get(id)!, 'kind') !== 'string') {
      at.issues.add(at.path, 'contradiction', () => `Part ${id} is no battery string, so it has no state of charge.`);
      continue;
    }
    const charge = readValue(value, caseFields['stateOfCharge']!.rule, {
      ...at,
      name: '',
      owner: `stateOfCharge of string ${id}`,
    });
    if (typeof charge === 'number') charges.set(id, charge);
  }
  return charges;
}

/** The parts that `set` changes, each with its new fields; only parts that are right as drawn. */
function* settings(
  raw: unknown,
  parts: PartsRead,
  place: Place,
): Generator<[part: Part, fields: RawObject, at: Place]> {
  for (const [id, fields, at] of entriesByPart(raw, 'set', parts, place)) {
    if (!isRawObject(fields)) {
      at.issues.add(
        at.path,
        'wrong-type',
        () => `Expected an object of fields to set on part ${id}, got ${described(fields)}.`,
      );
      continue;
    }
    const fixed = Object.keys(fields).filter((name) => name === 'id' || name === 'kind');
    for (const name of fixed) {
      at.issues.add(fieldPath(at.path, name), 'forbidden-field', () => `A case cannot change the ${name} of a part.`);
    }
    const part = parts.checkedById.get(id);
    if (part === undefined) {
      const raw = parts.rawById.get(id)!;
      checkLooseFields(fields, own(raw, 'kind'), { ...at, owner: ownerOf(raw) });
    } else if (fixed.length === 0) yield [part, fields, at];
  }
}

/** The entries of an object keyed by the ids of parts; an entry under another name is an issue. */
function* entriesByPart(
  raw: unknown,
  field: string,
  parts: PartsRead,
  place: Place,
): Generator<[id: string, value: unknown, at: Place]> {
  const entries = keyedObject(raw, field, 'part ids', place);
  if (entries === undefined) return;
  for (const id of Object.keys(entries.raw)) {
    const at = { ...place, path: fieldPath(entries.path, id) };
    if (parts.rawById.has(id)) yield [id, entries.raw[id], at];
    else if (!id.startsWith('x-')) place.issues.add(at.path, 'unknown-reference', () => unknownPart(id, parts));
  }
}

/** The sentence for an id that no part has. */
function unknownPart(id: string, parts: PartsRead): string {
  const pairId = /^(.*)\.(?:plus|minus)$/.exec(id)?.[1];
  if (pairId !== undefined && own(parts.rawById.get(pairId) ?? {}, 'kind') === 'pair') {
    return `${quoted(id)} is one cable of pair ${pairId}; change the pair itself.`;
  }
  return `There is no part ${quoted(id)}${nearestNameHint(id, parts.rawById.keys())}.`;
}

/**
 * The raw part with other fields put in. What was known of a replaced figure (its origin, its range) goes with it. The three ways
 * to state a load replace each other.
 */
function overridden(raw: RawObject, fields: RawObject): RawObject {
  const names = Object.keys(fields);
  if (names.length === 0) return raw;
  const gone = new Set(names);
  const loadFigures = ['powerW', 'currentA', 'resistanceOhm'];
  if (own(raw, 'kind') === 'load' && names.some((name) => loadFigures.includes(name))) {
    for (const figure of loadFigures) gone.add(figure);
  }
  const kept = without(raw, gone);
  for (const field of ['origin', 'range']) {
    const known = own(raw, field);
    if (isRawObject(known)) kept[field] = without(known, gone);
  }
  return { ...kept, ...fields };
}

function without(raw: RawObject, gone: ReadonlySet<string>): Record<string, unknown> {
  return Object.fromEntries(Object.entries(raw).filter(([name]) => !gone.has(name)));
}

function surgeOf(
  raw: RawObject,
  changed: ReadonlyMap<string, Part>,
  parts: PartsRead,
  place: Place,
): PartId | undefined {
  const id = own(raw, 'surge');
  if (id === undefined) return undefined;
  const path = fieldPath(place.path, 'surge');
  if (typeof id !== 'string') {
    place.issues.add(
      path,
      'wrong-type',
      () => `surge of ${place.owner} must be the id of a load or inverter, got ${described(id)}.`,
    );
    return undefined;
  }
  if (!parts.rawById.has(id)) {
    place.issues.add(path, 'unknown-reference', () => unknownPart(id, parts));
    return undefined;
  }
  const part = changed.get(id) ?? parts.checkedById.get(id);
  if (part === undefined) return undefined; // it has issues of its own
  if (part.kind !== 'load' && part.kind !== 'inverter') {
    place.issues.add(
      path,
      'contradiction',
      () => `Part ${id} is a ${part.kind}; only a load or an inverter can surge.`,
    );
  } else if (part.surgeW === undefined) {
    place.issues.add(
      path,
      'missing',
      () => `${part.kind} ${id} has no surgeW, so ${place.owner} cannot show it starting.`,
    );
  } else if (!part.on) {
    place.issues.add(
      path,
      'contradiction',
      () => `${part.kind} ${id} is off in ${place.owner}, so it cannot start up there.`,
    );
  }
  return part.id;
}
