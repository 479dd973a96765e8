/** Field readings: what a meter said, at which junctions or in which part, in which case. */
import { quoted } from '../units/parsed.ts';
import type { UnitName } from '../units/unitName.ts';
import { checkIdField } from './checkPart.ts';
import { described, type Field, type Fields, isRawObject, own, type Place, type RawObject } from './field.ts';
import type { IssueList } from './issueList.ts';
import type { Reading } from './job.ts';
import { nearestNameHint } from './nearestName.ts';
import { fieldPath, itemPath } from './path.ts';
import { readFields } from './readField.ts';

/** The names that a reading may refer to. */
export interface Known {
  readonly junctions: ReadonlySet<string>;
  /** Ids of parts, the two cables of each pair included. */
  readonly partIds: ReadonlySet<string>;
  readonly pairIds: ReadonlySet<string>;
  readonly caseIds: ReadonlySet<string>;
}

const mostReadings = 20_000;

const text: Field = { rule: { holds: 'text', longest: 200 } };
const anything: Field = { rule: { holds: 'anything' } };

function fieldsFor(unit: UnitName, own: Fields): Fields {
  return {
    id: anything,
    quantity: anything,
    case: text,
    meter: text,
    standardUncertainty: { rule: { holds: 'quantity', unit, above: 0, atMost: 1e6 } },
    set: { rule: { holds: 'choice', of: ['as-found', 'as-left'] } },
    takenAt: text,
    takenBy: text,
    restedHours: { rule: { holds: 'quantity', unit: 'h', atLeast: 0, atMost: 100_000 } },
    ...own,
  };
}

const junction: Field = { rule: { holds: 'junction' }, required: true };
const part: Field = { ...text, required: true };

const fieldsByQuantity: ReadonlyMap<string, Fields> = new Map([
  [
    'voltage',
    fieldsFor('V', {
      plus: junction,
      minus: junction,
      valueV: { rule: { holds: 'quantity', unit: 'V', atLeast: -5000, atMost: 5000 }, required: true },
    }),
  ],
  [
    'current',
    fieldsFor('A', {
      part,
      valueA: { rule: { holds: 'quantity', unit: 'A', atLeast: -1e6, atMost: 1e6 }, required: true },
    }),
  ],
  [
    'temperature',
    fieldsFor('degC', {
      part,
      valueDegC: { rule: { holds: 'quantity', unit: 'degC', atLeast: -90, atMost: 1000 }, required: true },
    }),
  ],
]);

export function checkReadings(raw: unknown, known: Known, issues: IssueList): readonly Reading[] {
  if (raw === undefined) return [];
  if (!Array.isArray(raw)) {
    issues.add('readings', 'wrong-type', () => `readings must be a list, got ${described(raw)}.`);
    return [];
  }
  if (raw.length > mostReadings) {
    issues.add(
      'readings',
      'too-many',
      () => `A job may have ${String(mostReadings)} readings, this one has ${String(raw.length)}.`,
    );
    return [];
  }
  const firstAt = new Map<string, number>();
  const readings: Reading[] = [];
  for (const [index, item] of raw.entries()) {
    const path = itemPath('readings', index);
    if (!isRawObject(item)) {
      issues.add(path, 'wrong-type', () => `A reading must be an object, got ${described(item)}.`);
      continue;
    }
    const reading = readReading(item, known, firstAt, index, { issues, path, owner: '' });
    if (reading !== undefined) readings.push(reading);
  }
  return readings;
}

function readReading(
  raw: RawObject,
  known: Known,
  firstAt: Map<string, number>,
  index: number,
  at: Place,
): Reading | undefined {
  const { issues, path } = at;
  const id = checkIdField(raw, 'reading', at);
  const owner = id === undefined ? 'this reading' : `reading ${id}`;
  const earlier = id === undefined ? undefined : firstAt.get(id);
  if (earlier !== undefined) {
    issues.add(
      fieldPath(path, 'id'),
      'duplicate-id',
      () => `Reading id ${String(id)} is already used by ${itemPath('readings', earlier)}.`,
    );
  }
  if (id !== undefined) firstAt.set(id, earlier ?? index);
  const quantity = own(raw, 'quantity');
  const fields = typeof quantity === 'string' ? fieldsByQuantity.get(quantity) : undefined;
  if (fields === undefined) {
    const code = quantity === undefined ? 'missing' : typeof quantity === 'string' ? 'not-in-list' : 'wrong-type';
    issues.add(fieldPath(path, 'quantity'), code, () => {
      return `quantity of ${owner}: expected one of ${[...fieldsByQuantity.keys()].join(', ')}, got ${quantity === undefined ? 'nothing' : described(quantity)}.`;
    });
    return undefined;
  }
  const place = { issues, path, owner };
  const values = readFields(raw, fields, place);
  checkReferences(values, known, place);
  return { ...values, id, quantity } as unknown as Reading;
}

function checkReferences(values: Readonly<Record<string, unknown>>, known: Known, place: Place): void {
  refer(values['case'], 'case', 'case', known.caseIds, place);
  refer(values['plus'], 'plus', 'junction', known.junctions, place);
  refer(values['minus'], 'minus', 'junction', known.junctions, place);
  const id = values['part'];
  if (typeof id === 'string' && known.pairIds.has(id)) {
    place.issues.add(fieldPath(place.path, 'part'), 'unknown-reference', () => {
      return `${id} is a pair of cables: say which one was measured, ${id}.plus or ${id}.minus.`;
    });
  } else refer(id, 'part', 'part', known.partIds, place);
  if (typeof values['plus'] === 'string' && values['plus'] === values['minus']) {
    place.issues.add(
      fieldPath(place.path, 'minus'),
      'contradiction',
      () => `Both probes of ${place.owner} are at one junction.`,
    );
  }
}

function refer(name: unknown, field: string, what: string, names: ReadonlySet<string>, place: Place): void {
  if (typeof name !== 'string' || names.has(name)) return;
  place.issues.add(fieldPath(place.path, field), 'unknown-reference', () => {
    return `${field} of ${place.owner}: there is no ${what} ${quoted(name)}${nearestNameHint(name, names)}.`;
  });
}
