/** Reads a whole number from a field. */
import { type FieldReading, isBareNumber } from './fieldReading.ts';
import { quoted } from './parsed.ts';

/** `4`; anything with a fraction, a unit or a comma is refused. */
export function readCount(text: string): FieldReading<number> {
  const typed = text.trim();
  if (typed === '') return { reading: 'empty' };
  const value = Number(typed.replace('−', '-'));
  if (isBareNumber(typed) && Number.isSafeInteger(value)) return { reading: 'value', value, store: value, echo: '' };
  return { reading: 'trouble', message: `Expected a whole number such as 4, got ${quoted(typed)}.` };
}
