/** Reads what a person typed into a field of a quantity, and writes what stands in the field. Nothing is converted unseen. */
import { bareText, echoOf } from './fieldEcho.ts';
import { commaQuestion, type FieldReading, isBareNumber, sentence } from './fieldReading.ts';
import { type FieldUnit, fieldUnit, type UnitsFirst } from './fieldUnit.ts';
import { feetText } from './imperial.ts';
import { numberText } from './numberText.ts';
import { parseQuantity } from './parseQuantity.ts';
import type { UnitName } from './unitName.ts';

export interface FieldRequest {
  readonly text: string;
  readonly unit: UnitName;
  /** What stands beside the field; else the usual one of the unit. */
  readonly bare?: FieldUnit;
  readonly first: UnitsFirst;
}

/**
 * `10 ft`, `10'6"`, `210 mV`, `95F`, or a bare number, which is taken in the unit beside the field. A bare length asks metres or feet,
 * a bare share of 1 or less asks whether per cent were meant, a comma asks what it stands for.
 */
export function readField({ text, unit, bare, first }: FieldRequest): FieldReading<number> {
  const typed = text.trim();
  if (typed === '') return { reading: 'empty' };
  const comma = commaQuestion(typed);
  if (comma !== undefined) return comma;
  if (isBareNumber(typed)) return readBare(typed.replace('−', '-'), unit, bare ?? fieldUnit(unit, first), first);
  const read = parseQuantity({ text: typed, unit });
  if (!read.ok) return { reading: 'trouble', message: sentence(read.message) };
  return { reading: 'value', value: read.value, store: typed, echo: echoOf({ value: read.value, unit, typed, first }) };
}

function readBare(typed: string, unit: UnitName, bare: FieldUnit | undefined, first: UnitsFirst): FieldReading<number> {
  if (bare === undefined) return metresOrFeet(typed, first);
  const number = Number(typed);
  if (bare.sign === '%' && number > 0 && number <= 1) return shareOrPercent(typed, number);
  if (keptAsNumber(unit, bare) || (bare.sign === '%' && number === 0)) {
    if (!Number.isFinite(number)) return { reading: 'trouble', message: 'That number is too large.' };
    return { reading: 'value', value: number + 0, store: number + 0, echo: echoOf({ value: number, unit, first }) };
  }
  return readField({ text: `${typed} ${bare.word}`, unit, bare, first });
}

/** True where the unit beside the field is the one that the job file's bare numbers are in. */
function keptAsNumber(unit: UnitName, bare: FieldUnit): boolean {
  return unit === 'degC' ? bare.word === 'degC' : bare.worth === 1;
}

function metresOrFeet(typed: string, first: UnitsFirst): FieldReading<number> {
  const metres = { label: `${typed} m`, text: `${typed} m` };
  const feet = { label: `${typed} ft`, text: `${typed} ft` };
  const choices = first === 'us' ? [feet, metres] : [metres, feet];
  return { reading: 'ask', question: `${typed}: metres or feet?`, choices };
}

function shareOrPercent(typed: string, number: number): FieldReading<number> {
  const whole = `${numberText({ value: number * 100, digits: 12 })} %`;
  const choices = [whole, `${typed} %`].map((text) => ({ label: text, text }));
  return { reading: 'ask', question: `${typed}: a share, or per cent?`, choices };
}

export interface ShownField {
  /** What stands in the field. */
  readonly text: string;
  /** The unit beside it, in a lighter weight; empty where the text has its own. */
  readonly sign: string;
  /** Grey figure in other units. */
  readonly echo: string;
}

/** A figure of the job file as its field shows it: a text as it was typed, a bare number in the units that come first. */
export function shownField({
  given,
  unit,
  bare,
  first,
}: Omit<FieldRequest, 'text'> & { readonly given: number | string | undefined }): ShownField {
  if (given === undefined) return { text: '', sign: '', echo: '' };
  if (typeof given === 'string') {
    const read = readField({ text: given, unit, first });
    return { text: given, sign: '', echo: read.reading === 'value' ? read.echo : '' };
  }
  const echo = echoOf({ value: given, unit, first });
  const beside = bare ?? fieldUnit(unit, first);
  if (beside !== undefined) return { text: bareText(given, unit, beside), sign: beside.sign, echo };
  const text = first === 'us' ? feetText({ lengthM: given }) : `${numberText({ value: given, digits: 12 })} m`;
  return { text, sign: '', echo };
}
