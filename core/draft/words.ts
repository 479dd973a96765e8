/** Words for the history of edits: fields and figures as a person would say them. */
import { partFields } from '../job/partFields.ts';
import { formatQuantity } from '../units/formatQuantity.ts';
import type { UnitName } from '../units/unitName.ts';

/** Longest text that is repeated in a label. */
const longestText = 40;

const unitTails: ReadonlyMap<UnitName, string> = new Map(
  Object.entries({
    m: 'M',
    ohm: 'Ohm',
    W: 'W',
    A: 'A',
    V: 'V',
    mV: 'Mv',
    Ah: 'Ah',
    degC: 'DegC',
    s: 'S',
    year: 'Years',
    deg: 'Deg',
    cm2: 'Cm2',
    'm3/h': 'M3PerH',
  }) as [UnitName, string][],
);

/** Each field of a part that is a quantity, with its unit; a name has one unit whatever the kind. */
const unitOfField: ReadonlyMap<string, UnitName> = new Map(
  [...partFields.values()].flatMap((fields) =>
    Object.entries(fields).flatMap(([name, { rule }]): [string, UnitName][] =>
      rule.holds === 'quantity' ? [[name, rule.unit]] : [],
    ),
  ),
);

/** `blockNominalV` is `block nominal`, `lengthM` is `length`, `stateOfCharge` is `state of charge`. */
export function fieldWords(field: string): string {
  const unit = unitOfField.get(field);
  const tail = unit === undefined ? undefined : unitTails.get(unit);
  const bare =
    tail !== undefined && field.length > tail.length && field.endsWith(tail) ? field.slice(0, -tail.length) : field;
  return bare
    .replace(/([a-z0-9])([A-Z])/g, '$1 $2')
    .replaceAll('.', ' ')
    .toLowerCase();
}

/** A value in words: `60 A`, `35 mm2`, `on`; nothing for what is too long to say. */
export function valueWords(field: string, value: unknown): string {
  const unit = unitOfField.get(field);
  if (typeof value === 'number') return unit === undefined ? String(value) : formatQuantity({ value, unit });
  if (typeof value === 'boolean') return value ? 'yes' : 'no';
  if (typeof value !== 'string') return 'changed';
  return value.length > longestText ? `${value.slice(0, longestText)}…` : value;
}

/** `F3`, `F3 and F4`, `5 parts`. */
export function partsWords(ids: readonly string[]): string {
  if (ids.length > 3) return `${String(ids.length)} parts`;
  return ids.length < 2 ? (ids[0] ?? 'nothing') : `${ids.slice(0, -1).join(', ')} and ${ids.at(-1) ?? ''}`;
}
