/** What one written unit word is worth in a unit of the program: `ft` is 0.3048 `m`. */
import { create, type Unit, unitDependencies } from 'mathjs';
import { type UnitName, unitKinds } from './unitName.ts';

// Only the unit part of the library is loaded, so that no text of a user can reach a function, a variable or an expression.
let created: ReturnType<typeof create> | undefined;

/** Made when the first unit is read, since making it takes longer than reading a whole job of plain numbers. */
function library(): ReturnType<typeof create> {
  created ??= create(unitDependencies!, {});
  return created;
}

/**
 * Spellings of the trade that the unit library does not know, or reads as something else. The right side is the library's
 * own spelling. A spelling stands here only where it can be read in one way.
 */
const spellings: ReadonlyMap<string, string> = new Map([
  ["'", 'ft'],
  ['"', 'in'],
  ["''", 'in'],
  ['feet', 'ft'],
  ['foot', 'ft'],
  ['inches', 'in'],
  ['metre', 'm'],
  ['metres', 'm'],
  ['centimetre', 'cm'],
  ['centimetres', 'cm'],
  ['millimetre', 'mm'],
  ['millimetres', 'mm'],
  ['yd', 'yard'],
  ['yards', 'yard'],
  ['Ohm', 'ohm'],
  ['OHM', 'ohm'],
  ['Ohms', 'ohm'],
  ['mOhm', 'mohm'],
  ['mOhms', 'mohm'],
  ['uOhm', 'uohm'],
  ['uOhms', 'uohm'],
  ['kOhm', 'kohm'],
  ['MOhm', 'Mohm'],
  ['milliOhm', 'milliohm'],
  ['microOhm', 'microohm'],
  ['v', 'V'],
  ['mv', 'mV'],
  ['Volt', 'V'],
  ['Volts', 'V'],
  ['a', 'A'],
  ['amp', 'A'],
  ['amps', 'A'],
  ['Amp', 'A'],
  ['Amps', 'A'],
  ['w', 'W'],
  ['kw', 'kW'],
  ['KW', 'kW'],
  ['Watt', 'W'],
  ['Watts', 'W'],
  ['kilowatts', 'kW'],
  ['ah', 'A h'],
  ['Ah', 'A h'],
  ['AH', 'A h'],
  ['mAh', 'mA h'],
  ['wh', 'W h'],
  ['WH', 'W h'],
  ['kwh', 'kW h'],
  ['KWH', 'kW h'],
  ['KWh', 'kW h'],
  ['hr', 'h'],
  ['hrs', 'h'],
  ['d', 'day'],
  ['yr', 'year'],
  ['yrs', 'year'],
  ['degrees', 'deg'],
  ['°', 'deg'],
  ['W/m2', 'W/m^2'],
  ['W/m^2', 'W/m^2'],
  ['kW/m2', 'kW/m^2'],
  ['kW/m^2', 'kW/m^2'],
]);

/** Kinds whose words are a closed list of ours, since the library has no such unit. */
const closedLists: Readonly<Partial<Record<UnitName, ReadonlyMap<string, number>>>> = {
  '1': new Map([['%', 0.01]]),
  '1/K': new Map([
    ['%/K', 0.01],
    ['%/degC', 0.01],
    ['%/C', 0.01],
    ['/K', 1],
    ['/degC', 1],
  ]),
  'kWh/m2/day': new Map([
    ['kWh/m2/day', 1],
    ['kWh/m^2/day', 1],
    ['kWh/m2/d', 1],
    ['kWh/m^2/d', 1],
    ['kWh/m2', 1],
    ['kWh/m^2', 1],
    ['Wh/m2/day', 0.001],
    ['Wh/m2', 0.001],
  ]),
  cm2: new Map([
    ['cm2', 1],
    ['cm^2', 1],
    ['mm2', 0.01],
    ['mm^2', 0.01],
    ['m2', 1e4],
    ['m^2', 1e4],
    ['in2', 6.4516],
    ['in^2', 6.4516],
  ]),
  'm3/h': new Map([
    ['m3/h', 1],
    ['m^3/h', 1],
    ['l/s', 3.6],
    ['L/s', 3.6],
    // A cubic foot is 0.3048³ m³ exactly, an hour 60 minutes.
    ['cfm', 60 * 0.3048 ** 3],
    ['ft3/min', 60 * 0.3048 ** 3],
  ]),
  // No prefix: kA²s is written for thousands of A²s by some and for the square of kA by others.
  A2s: new Map([
    ['A2s', 1],
    ['A^2s', 1],
    ['A2.s', 1],
  ]),
};

const remembered = new Map<string, number>();

/**
 * How many of `unit` one of `word` is, or `undefined` where the word is no unit of that kind. Temperatures are not scaled and
 * are not found here.
 */
export function worthOf({ word, unit }: { word: string; unit: UnitName }): number | undefined {
  const closed = closedLists[unit];
  if (closed !== undefined) return closed.get(word);
  const key = `${unit} ${word}`;
  const known = remembered.get(key);
  if (known !== undefined) return known;
  const target = unitKinds[unit].library;
  const written = libraryUnit(spellings.get(word) ?? word);
  if (target === undefined || written === undefined) return undefined;
  if (!written.equalBase(library().unit(1, target))) return undefined;
  const worth = written.toNumber(target);
  if (!Number.isFinite(worth) || worth <= 0) return undefined;
  if (remembered.size < 1000) remembered.set(key, worth);
  return worth;
}

function libraryUnit(name: string): Unit | undefined {
  if (!/^[A-Za-z][A-Za-z ]{0,24}(\/m\^2)?$/.test(name)) return undefined;
  try {
    return library().unit(1, name);
  } catch {
    return undefined; // the library's way of saying that it knows no such unit
  }
}
