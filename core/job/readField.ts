/** Reads the fields of an object of the file, each by its rule. */
import { type ConductorSize, parseSize } from '../units/conductorSize.ts';
import { quoted } from '../units/parsed.ts';
import { parseQuantity } from '../units/parseQuantity.ts';
import type { UnitName } from '../units/unitName.ts';
import {
  type Bounds,
  described,
  expectation,
  type Field,
  type Fields,
  isRawObject,
  own,
  type Place,
  type RawObject,
  type Rule,
} from './field.ts';
import type { IssueCode } from './issue.ts';
import { troubleWithJunction, troubleWithText } from './names.ts';
import { nearestNameHint } from './nearestName.ts';
import type { CurvePoint } from './part.ts';
import { fieldPath, itemPath } from './path.ts';

/** Numbers beyond this are slips of the keyboard in every unit of a job. */
const largestNumber = 1e9;
const mostBarJunctions = 500;
const mostCurvePoints = 100;

/**
 * Reads every field of an object by its rule: values in the units of their names, contract defaults filled in, `undefined` for
 * what was not given. Unknown fields are issues; `x-…` fields are passed over. Fields that had an issue are `undefined`.
 */
export function readFields(raw: RawObject, fields: Fields, place: Place): Record<string, unknown> {
  for (const name of Object.keys(raw)) {
    if (Object.hasOwn(fields, name) || name.startsWith('x-')) continue;
    place.issues.add(fieldPath(place.path, name), 'unknown-field', () => {
      const hint = nearestNameHint(name, Object.keys(fields));
      return `${capital(place.owner)} has no field ${quoted(name)}${hint}.`;
    });
  }
  const values: Record<string, unknown> = {};
  for (const name in fields) values[name] = readOne(raw, name, fields[name]!, place);
  return values;
}

function readOne(raw: RawObject, name: string, field: Field, place: Place): unknown {
  const value = own(raw, name);
  if (value !== undefined) {
    return readValue(value, field.rule, { issues: place.issues, path: place.path, owner: place.owner, name });
  }
  if (field.required === true) {
    place.issues.add(fieldPath(place.path, name), 'missing', () => {
      return `${capital(place.owner)} needs ${name}: ${expectation(field.rule)}.`;
    });
  }
  return field.standard;
}

interface FieldPlace extends Place {
  /** The field's name, or the field and the item in it. */
  readonly name: string;
}

function trouble(place: FieldPlace, code: IssueCode, words: () => string): undefined {
  place.issues.add(pathOf(place), code, () => `${named(place)}: ${words()}.`);
  return undefined;
}

function pathOf(place: FieldPlace): string {
  return place.name === '' ? place.path : fieldPath(place.path, place.name);
}

/** Reads one value by its rule; adds an issue and answers `undefined` where it does not fit. */
export function readValue(value: unknown, rule: Rule, place: FieldPlace): unknown {
  switch (rule.holds) {
    case 'quantity':
      return readQuantity(value, rule, place);
    case 'count':
      return readCount(value, rule, place);
    case 'numbers':
      return readNumbers(value, rule, place);
    case 'efficiency':
      return Array.isArray(value) ? readCurve(value, place) : readQuantity(value, efficiencyBounds, place);
    case 'curve':
      return readTimeCurve(value, rule, place);
    case 'flag':
      return typeof value === 'boolean' ? value : wrongType(value, rule, place);
    case 'choice':
      return readChoice(value, rule.of, place);
    case 'size':
      return readSize(value, place);
    case 'text':
      return readText(value, rule.longest, place);
    case 'junction':
      return readJunction(value, place);
    case 'poles':
      return readPoles(value, place);
    case 'junction-list':
      return readJunctionList(value, place);
    case 'point':
      return readPoint(value, place);
    case 'anything':
      return value;
  }
}

function wrongType(value: unknown, rule: Rule, place: FieldPlace): undefined {
  const more = value === null ? '; leave the field out where there is nothing to say' : '';
  return trouble(place, 'wrong-type', () => `expected ${expectation(rule)}, got ${described(value)}${more}`);
}

function readQuantity(
  value: unknown,
  rule: Extract<Rule, { holds: 'quantity' }>,
  place: FieldPlace,
): number | undefined {
  if (typeof value === 'number') return bounded(value, rule, unitSuffix(rule.unit), place);
  if (typeof value !== 'string') return wrongType(value, rule, place);
  const read = parseQuantity({ text: value, unit: rule.unit });
  if (!read.ok) return trouble(place, 'wrong-unit', () => read.message);
  return bounded(read.value, rule, unitSuffix(rule.unit), place);
}

function unitSuffix(unit: UnitName): string {
  if (unit === '1') return '';
  return unit === '1/K' ? ' per kelvin' : ` ${unit}`;
}

function readCount(value: unknown, rule: Extract<Rule, { holds: 'count' }>, place: FieldPlace): number | undefined {
  if (typeof value !== 'number') return wrongType(value, rule, place);
  if (Number.isFinite(value) && !Number.isInteger(value)) {
    return trouble(place, 'out-of-range', () => `expected a whole number, got ${String(value)}`);
  }
  return bounded(value, rule, '', place);
}

function bounded(value: number, bounds: Bounds, suffix: string, place: FieldPlace): number | undefined {
  if (!Number.isFinite(value)) {
    return trouble(place, 'out-of-range', () => 'expected a finite number, got one that is too large or none at all');
  }
  const { atLeast = -largestNumber, above, atMost = largestNumber, below } = bounds;
  const tooLow = value < atLeast || (above !== undefined && value <= above);
  const tooHigh = value > atMost || (below !== undefined && value >= below);
  if (!tooLow && !tooHigh) return value + 0; // -0 becomes 0
  const low = above === undefined ? `${String(atLeast)}${suffix} or more` : `more than ${String(above)}${suffix}`;
  const high = below === undefined ? `${String(atMost)}${suffix} or less` : `less than ${String(below)}${suffix}`;
  return trouble(place, 'out-of-range', () => `must be ${tooLow ? low : high}, got ${String(value)}${suffix}`);
}

function readNumbers(
  value: unknown,
  rule: Extract<Rule, { holds: 'numbers' }>,
  place: FieldPlace,
): readonly number[] | undefined {
  const suffix = unitSuffix(rule.unit);
  if (rule.orSame === true && !Array.isArray(value)) {
    const same = readQuantity(value, { ...rule, holds: 'quantity' }, place);
    return same === undefined ? undefined : Array.from({ length: rule.length }, () => same);
  }
  if (!Array.isArray(value)) return wrongType(value, rule, place);
  if (value.length !== rule.length) {
    return trouble(place, 'out-of-range', () => `expected ${String(rule.length)} numbers, got ${String(value.length)}`);
  }
  const items: readonly unknown[] = value;
  const numbers = items.map((item, index) => {
    const at = itemPlace(place, index);
    return typeof item === 'number'
      ? bounded(item, rule, suffix, at)
      : readQuantity(item, { ...rule, holds: 'quantity' }, at);
  });
  return numbers.every((number) => number !== undefined) ? numbers : undefined;
}

/** The place of an item of a list field: its own path, and the field's name with the item's number in the sentence. */
function itemPlace(place: FieldPlace, index: number): FieldPlace {
  return {
    ...place,
    path: itemPath(pathOf(place), index),
    name: '',
    owner: `item ${String(index + 1)} in ${named(place)}`,
  };
}

function named(place: FieldPlace): string {
  return place.name === '' ? place.owner : `${place.name} of ${place.owner}`;
}

const efficiencyBounds = { holds: 'quantity', unit: '1', above: 0, atMost: 1 } as const;

function readCurve(value: readonly unknown[], place: FieldPlace): readonly (readonly [number, number])[] | undefined {
  if (value.length === 0 || value.length > mostCurvePoints) {
    return trouble(
      place,
      'out-of-range',
      () => `expected 1 to ${String(mostCurvePoints)} points, got ${String(value.length)}`,
    );
  }
  const points: (readonly [number, number])[] = [];
  for (const [index, item] of value.entries()) {
    const point = readCurvePoint(item, itemPlace(place, index));
    if (point === undefined) return undefined;
    const before = points.at(-1);
    if (before !== undefined && point[0] <= before[0]) {
      return trouble(
        place,
        'contradiction',
        () =>
          `the fractions of rated output must rise from point to point, got ${String(point[0])} after ${String(before[0])}`,
      );
    }
    points.push(point);
  }
  return points;
}

function readCurvePoint(item: unknown, place: FieldPlace): readonly [number, number] | undefined {
  if (!Array.isArray(item) || item.length !== 2) {
    return trouble(
      place,
      'wrong-type',
      () => `expected [fraction of rated output, efficiency], got ${described(item)}`,
    );
  }
  const [fraction, efficiency]: readonly unknown[] = item;
  const x = readQuantity(fraction, { holds: 'quantity', unit: '1', atLeast: 0, atMost: 3 }, place);
  const y = readQuantity(
    efficiency,
    x === 0 ? { ...efficiencyBounds, above: -1, atLeast: 0 } : efficiencyBounds,
    place,
  );
  return x === undefined || y === undefined ? undefined : [x, y];
}

/** Points of a fuse's curve: currents rise, times never do, and no fuse clears before it has melted. */
function readTimeCurve(value: unknown, rule: Rule, place: FieldPlace): readonly CurvePoint[] | undefined {
  if (!Array.isArray(value)) return wrongType(value, rule, place);
  if (value.length === 0 || value.length > mostCurvePoints) {
    return trouble(
      place,
      'out-of-range',
      () => `expected 1 to ${String(mostCurvePoints)} points, got ${String(value.length)}`,
    );
  }
  const points: CurvePoint[] = [];
  for (const [index, item] of value.entries()) {
    const at = itemPlace(place, index);
    const point = readTimePoint(item, at);
    if (point === undefined) return undefined;
    const wrong = troubleAfter(points.at(-1), point);
    if (wrong !== undefined) return trouble(at, 'contradiction', () => wrong);
    points.push(point);
  }
  return points;
}

function readTimePoint(item: unknown, place: FieldPlace): CurvePoint | undefined {
  if (!Array.isArray(item) || item.length !== 3) {
    return trouble(place, 'wrong-type', () => {
      return `expected [current in A, melting time in s, clearing time in s], got ${described(item)}`;
    });
  }
  const raw: readonly unknown[] = item;
  const currentA = readQuantity(raw[0], { holds: 'quantity', unit: 'A', above: 0, atMost: 1e6 }, place);
  const meltS = readQuantity(raw[1], { holds: 'quantity', unit: 's', above: 0, atMost: 1e7 }, place);
  const clearS = readQuantity(raw[2], { holds: 'quantity', unit: 's', above: 0, atMost: 1e7 }, place);
  return currentA === undefined || meltS === undefined || clearS === undefined ? undefined : [currentA, meltS, clearS];
}

function troubleAfter(before: CurvePoint | undefined, [currentA, meltS, clearS]: CurvePoint): string | undefined {
  if (clearS < meltS) return `it cannot clear (${String(clearS)} s) before it has melted (${String(meltS)} s)`;
  if (before === undefined) return undefined;
  if (currentA <= before[0]) {
    return `the currents must rise from point to point, got ${String(currentA)} A after ${String(before[0])} A`;
  }
  if (meltS > before[1] || clearS > before[2]) return 'a larger current must not take longer than a smaller one';
  return undefined;
}

function readChoice(value: unknown, of: readonly string[], place: FieldPlace): string | undefined {
  if (typeof value === 'string' && of.includes(value)) return value;
  return trouble(place, typeof value === 'string' ? 'not-in-list' : 'wrong-type', () => {
    const hint = typeof value === 'string' ? nearestNameHint(value, of) : '';
    return `expected one of ${of.join(', ')}, got ${described(value)}${hint}`;
  });
}

function readSize(value: unknown, place: FieldPlace): ConductorSize | undefined {
  if (typeof value === 'number') {
    const read = parseSize(String(value));
    return trouble(place, 'wrong-unit', () => (read.ok ? 'a size needs its system' : read.message));
  }
  if (typeof value !== 'string') return wrongType(value, { holds: 'size' }, place);
  const read = parseSize(value);
  return read.ok ? read.value : trouble(place, 'wrong-unit', () => read.message);
}

function readText(value: unknown, longest: number, place: FieldPlace): string | undefined {
  if (typeof value !== 'string') return wrongType(value, { holds: 'text', longest }, place);
  const wrong = troubleWithText(value, longest);
  return wrong === undefined ? value : trouble(place, 'out-of-range', () => `the text ${wrong}`);
}

function readJunction(value: unknown, place: FieldPlace): string | undefined {
  if (typeof value !== 'string') return wrongType(value, { holds: 'junction' }, place);
  const wrong = troubleWithJunction(value);
  return wrong === undefined
    ? value
    : trouble(place, 'out-of-range', () => `the junction's name ${wrong}, got ${quoted(value)}`);
}

const polesFields: Fields = {
  plus: { rule: { holds: 'junction' }, required: true },
  minus: { rule: { holds: 'junction' }, required: true },
};

function readPoles(value: unknown, place: FieldPlace): unknown {
  if (!isRawObject(value)) return wrongType(value, { holds: 'poles' }, place);
  const before = place.issues.size;
  const poles = readFields(value, polesFields, { issues: place.issues, path: pathOf(place), owner: named(place) });
  return place.issues.size === before ? { plus: poles['plus'], minus: poles['minus'] } : undefined;
}

function readJunctionList(value: unknown, place: FieldPlace): readonly string[] | undefined {
  if (!Array.isArray(value)) return wrongType(value, { holds: 'junction-list' }, place);
  if (value.length < 2 || value.length > mostBarJunctions) {
    return trouble(
      place,
      'out-of-range',
      () => `expected 2 to ${String(mostBarJunctions)} junctions, got ${String(value.length)}`,
    );
  }
  const items: readonly unknown[] = value;
  const names = items.map((item, index) => readJunction(item, itemPlace(place, index)));
  const twice = names.find((name, index) => name !== undefined && names.indexOf(name) < index);
  if (twice !== undefined) return trouble(place, 'contradiction', () => `junction ${twice} stands twice along the bar`);
  return names.every((name) => name !== undefined) ? names : undefined;
}

const pointFields: Fields = {
  x: { rule: { holds: 'quantity', unit: '1', atLeast: -1e6, atMost: 1e6 }, required: true },
  y: { rule: { holds: 'quantity', unit: '1', atLeast: -1e6, atMost: 1e6 }, required: true },
};

function readPoint(value: unknown, place: FieldPlace): unknown {
  if (!isRawObject(value)) return wrongType(value, { holds: 'point' }, place);
  const before = place.issues.size;
  const point = readFields(value, pointFields, { issues: place.issues, path: pathOf(place), owner: named(place) });
  return place.issues.size === before ? { x: point['x'], y: point['y'] } : undefined;
}

function capital(text: string): string {
  return text.charAt(0).toUpperCase() + text.slice(1);
}
