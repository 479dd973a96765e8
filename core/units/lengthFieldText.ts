/** Reads a length of a run, which people give one way or as the wire out and back. */
import { commaQuestion, type FieldReading, isBareNumber, type Way } from './fieldReading.ts';
import { readField } from './fieldText.ts';
import type { UnitsFirst } from './fieldUnit.ts';
import { numberText } from './numberText.ts';

export interface LengthRequest {
  readonly text: string;
  /** How the person says that they measured; `unasked` where they have not said. */
  readonly way: Way | 'unasked';
  readonly first: UnitsFirst;
}

/** The length one way. A length there and back is halved in its own units, and the halving is put into words. */
export function readLength({ text, way, first }: LengthRequest): FieldReading<number> {
  const read = readField({ text, unit: 'm', first });
  if (read.reading !== 'value' || way === 'one-way') return read;
  const typed = text.trim();
  const half = halvedText(typed);
  if (way === 'there-and-back') {
    const halved = readField({ text: half, unit: 'm', first });
    return halved.reading === 'value' ? { ...halved, note: `${typed} there and back = ${half} one way` } : halved;
  }
  return {
    reading: 'ask',
    question: `${typed}: one way, or there and back?`,
    choices: [
      { label: `${typed} one way`, text: typed, way: 'one-way' },
      { label: `${typed} there and back (${half} one way)`, text: typed, way: 'there-and-back' },
    ],
  };
}

const amount = /(?:(\d+)\s+)?(\d+)\/(\d+)|(?:\d+(?:\.\d*)?|\.\d+)(?:e[+-]?\d+)?/gi;

/** Every figure of a length halved, its units left as they are: `10 ft 6 in` is `5 ft 3 in`. The text must be readable as a length. */
export function halvedText(text: string): string {
  if (isBareNumber(text) || commaQuestion(text) !== undefined) return text;
  return plainFractions(text).replace(amount, (whole: string, ...groups: (string | undefined)[]) => {
    const [wholePart, above, below] = groups;
    const value =
      above === undefined || below === undefined
        ? Number(whole)
        : Number(wholePart ?? 0) + Number(above) / Number(below);
    return numberText({ value: value / 2, digits: 12 });
  });
}

const vulgar: Readonly<Record<string, string>> = {
  '¼': ' 1/4',
  '½': ' 1/2',
  '¾': ' 3/4',
  '⅛': ' 1/8',
  '⅜': ' 3/8',
  '⅝': ' 5/8',
  '⅞': ' 7/8',
  '⁄': '/',
};

function plainFractions(text: string): string {
  return text.replace(/[¼½¾⅛⅜⅝⅞⁄]/g, (sign) => vulgar[sign] ?? sign);
}
