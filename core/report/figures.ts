/** How the report prints its figures: at most the digits that the figure deserves, a real minus sign, both units for lengths. */

import { formatQuantity } from '../units/formatQuantity.ts';

/** Exact by definition of the international foot. */
const METRES_PER_FOOT = 0.3048;
/** What stands where a figure was not given; every table that uses it says so below. */
export const NOT_GIVEN = '—';

const MINUS = '\u2212';
const NO_BREAK_SPACE = '\u00a0';

/** A number with fixed decimals; `-0.0` prints as `0.0`. */
export function fixed(value: number, decimals: number): string {
  const text = Math.abs(value).toFixed(decimals);
  const isZero = Number(text) === 0;
  return value < 0 && !isZero ? `${MINUS}${grouped(text)}` : grouped(text);
}

/** Thousands apart from 10 000 on, by a space that does not break. */
function grouped(text: string): string {
  const [whole = '', fraction] = text.split('.');
  const spaced = whole.length < 5 ? whole : whole.replaceAll(/\B(?=(?:\d{3})+$)/g, NO_BREAK_SPACE);
  return fraction === undefined ? spaced : `${spaced}.${fraction}`;
}

export function amps(currentA: number): string {
  return fixed(currentA, Math.abs(currentA) >= 1000 ? 0 : Math.abs(currentA) >= 1 || currentA === 0 ? 1 : 2);
}
export function volts(voltageV: number): string {
  const size = Math.abs(voltageV);
  return fixed(voltageV, size >= 100 ? 1 : size < 1 && size > 0 ? 3 : 2);
}
export function millivolts(voltageV: number): string {
  const millivolt = voltageV * 1000;
  return fixed(millivolt, Math.abs(millivolt) >= 10 || millivolt === 0 ? 0 : 1);
}
export function watts(powerW: number): string {
  return fixed(powerW, Math.abs(powerW) >= 100 || powerW === 0 ? 0 : Math.abs(powerW) >= 10 ? 1 : 2);
}
export function milliohms(resistanceOhm: number): string {
  const milliohm = resistanceOhm * 1000;
  return milliohm === 0 ? '0' : fixed(milliohm, Math.abs(milliohm) >= 100 ? 0 : Math.abs(milliohm) >= 10 ? 1 : 2);
}
export function degrees(temperatureDegC: number): string {
  return fixed(temperatureDegC, 0);
}
export function percent(fraction: number): string {
  return fraction === 0 ? '0' : fixed(fraction * 100, Math.abs(fraction) >= 0.1 ? 0 : 1);
}
/** Metres to the centimetre. */
export function metres(lengthM: number): string {
  return plain(Number(lengthM.toFixed(2)));
}
/** Feet of a length, for the second line of a cell. */
export function feet(lengthM: number): string {
  return `${plain(Number((lengthM / METRES_PER_FOOT).toPrecision(3)))} ft`;
}

/** A figure as it was entered: all its digits up to six, no more. */
export function plain(value: number): string {
  const rounded = Number(value.toPrecision(6));
  const size = Math.abs(rounded);
  if (rounded !== 0 && (size < 1e-4 || size >= 1e9)) return scientific(value);
  const text = String(size);
  return rounded < 0 ? `${MINUS}${grouped(text)}` : grouped(text);
}

/** Power-of-ten form for remainders: `2.1 × 10⁻¹²`. */
export function scientific(value: number): string {
  if (value === 0) return '0';
  const [mantissa = '', exponent = ''] = Math.abs(value).toExponential(1).split('e');
  return `${value < 0 ? MINUS : ''}${mantissa}${NO_BREAK_SPACE}×${NO_BREAK_SPACE}10${superscript(exponent)}`;
}

const SUPERSCRIPTS = '⁰¹²³⁴⁵⁶⁷⁸⁹';
function superscript(exponent: string): string {
  const sign = exponent.startsWith('-') ? '⁻' : '';
  return sign + exponent.replaceAll(/\D/g, '').replaceAll(/\d/g, (digit) => SUPERSCRIPTS.charAt(Number(digit)));
}

/** A measured or limiting value as the findings themselves write it, e.g. `{ value: 0.041, unit: '1' }` → `4.1 %`. */
export function withUnit(quantity: { readonly value: number; readonly unit: string }): string {
  return formatQuantity(quantity).replaceAll(' ', NO_BREAK_SPACE).replace(/^-/, MINUS);
}

/** Units of assumptions and measures as they are printed; any other is printed as it stands. */
const UNIT_WORDS: Readonly<Record<string, string>> = {
  degC: '°C',
  ohm: 'Ω',
  mm2: 'mm²',
  'ohm/m': 'Ω/m',
  '1/degC': 'per °C',
  A2s: 'A²s',
  '1': '',
  '': '',
};
export function unitWord(unit: string): string {
  return UNIT_WORDS[unit] ?? unit;
}
