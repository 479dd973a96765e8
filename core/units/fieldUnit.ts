/** The unit that stands beside a field: what a number without a unit means in it. */
import type { UnitName } from './unitName.ts';

/** Which units are shown first. It never changes a stored figure. */
export type UnitsFirst = 'metric' | 'us';

export interface FieldUnit {
  /** As written in a job file behind the number; empty where the number stands for itself. */
  readonly word: string;
  /** As shown beside the field. */
  readonly sign: string;
  /** How many of the field's own unit one of it is; a temperature has none. */
  readonly worth: number | undefined;
}

const plain = (word: string, sign: string = word): FieldUnit => ({ word, sign, worth: 1 });

const own: Readonly<Record<Exclude<UnitName, 'm'>, FieldUnit>> = {
  ohm: plain('ohm', 'Ω'),
  W: plain('W'),
  A: plain('A'),
  V: plain('V'),
  mV: plain('mV'),
  Ah: plain('Ah'),
  Wh: plain('Wh'),
  degC: { word: 'degC', sign: '°C', worth: undefined },
  s: plain('s'),
  h: plain('h'),
  day: plain('days'),
  year: plain('years'),
  deg: plain('deg', '°'),
  '1': { word: '%', sign: '%', worth: 0.01 },
  '1/K': { word: '%/degC', sign: '%/°C', worth: 0.01 },
  'W/m2': plain('W/m2', 'W/m²'),
  'kWh/m2/day': plain('kWh/m2/day', 'kWh/m² a day'),
  cm2: plain('cm2', 'cm²'),
  'm3/h': plain('m3/h', 'm³/h'),
  A2s: plain('A2s', 'A²s'),
};

/** Resistances of wiring are spoken of in milliohms. */
export const milliohm: FieldUnit = { word: 'mohm', sign: 'mΩ', worth: 1e-3 };
/** A ratio that is no share of a whole, as a margin of 1.25. */
export const factor: FieldUnit = { word: '', sign: '×', worth: 1 };
const fahrenheit: FieldUnit = { word: 'degF', sign: '°F', worth: undefined };

/** The unit beside a field; none for a length, where a bare number may be metres or feet and is asked about. */
export function fieldUnit(unit: UnitName, first: UnitsFirst): FieldUnit | undefined {
  if (unit === 'm') return undefined;
  return unit === 'degC' && first === 'us' ? fahrenheit : own[unit];
}
