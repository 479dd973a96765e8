/** A written quantity, `3 m + 40 cm`, becomes a number in the unit that its field keeps. */
import { type Parsed, quoted } from './parsed.ts';
import { describeUnit, type UnitName } from './unitName.ts';
import { worthOf } from './unitWords.ts';

/** Longest text that is read as a quantity; a longer one is no quantity of this trade. */
const longestQuantityText = 80;
const mostTerms = 12;
const absoluteZeroDegC = -273.15;

interface Term {
  readonly amount: number;
  readonly word: string;
  /** A term without a sign of its own, as the inches of `10 ft 6 in`. */
  readonly joined: boolean;
}

/**
 * Reads figures with units, added or subtracted: `12 ft`, `3 m + 40 cm`, `10'6"`, `10 ft 6 1/2 in`, `95 degF`, `85 %`.
 * The answer is in `unit`. Nothing but figures, units, `+` and `-` is understood. A temperature is one figure, never a sum.
 */
export function parseQuantity({ text, unit }: { text: string; unit: UnitName }): Parsed<number> {
  const refuse = (why = ''): Parsed<number> => ({
    ok: false,
    message: `expected ${describeUnit(unit)}, got ${quoted(text)}${why}`,
  });
  if (text.length > longestQuantityText) return refuse(`, longer than ${longestQuantityText} characters`);
  if (/\d,\d/.test(text)) return refuse('; write a decimal point and no comma');
  const terms = termsOf(plain(text));
  if (terms === undefined || terms.length === 0) return refuse();
  if (terms.some((term) => term.word === '')) return refuse(', which has no unit');
  if (unit === 'degC') return temperature(terms) ?? refuse();
  if (terms.some((term) => term.joined) && unit !== 'm') return refuse('; put + between the figures');
  let sum = 0;
  for (const term of terms) {
    const worth = worthOf({ word: term.word, unit });
    if (worth === undefined) return refuse();
    sum += term.amount * worth;
  }
  return Number.isFinite(sum) ? { ok: true, value: tidy(sum) } : refuse();
}

/** 0.1 + 0.2 style dust of a sum or a conversion is removed: 15 significant digits are kept, and -0 is 0. */
function tidy(value: number): number {
  return Number(value.toPrecision(15)) + 0;
}

function temperature(terms: readonly Term[]): Parsed<number> | undefined {
  const [only, ...others] = terms;
  if (only === undefined || others.length > 0) return undefined;
  const value = toDegC(only.amount, only.word);
  if (value === undefined || !Number.isFinite(value) || value < absoluteZeroDegC) return undefined;
  return { ok: true, value: tidy(value) };
}

function toDegC(amount: number, word: string): number | undefined {
  switch (word) {
    case 'degC':
    case 'C':
    case 'celsius':
      return amount;
    case 'degF':
    case 'F':
    case 'fahrenheit':
      return ((amount - 32) * 5) / 9;
    case 'K':
    case 'kelvin':
      return amount + absoluteZeroDegC;
    default:
      return undefined;
  }
}

const vulgarFractions: ReadonlyMap<string, string> = new Map([
  ['¼', ' 1/4'],
  ['½', ' 1/2'],
  ['¾', ' 3/4'],
  ['⅛', ' 1/8'],
  ['⅜', ' 3/8'],
  ['⅝', ' 5/8'],
  ['⅞', ' 7/8'],
]);

/** Typographic signs as plain ones, so that `8 mΩ`, `25 °C` and `10′6″` read as `8 mohm`, `25 degC` and `10'6"`. */
function plain(text: string): string {
  if (/^[ -~]*$/.test(text) && !text.includes('deg')) return text.trim(); // most texts hold no such sign
  return text
    .replace(/[\u00a0\u2007\u2009\u202f]/g, ' ')
    .replace(/[−–]/g, '-')
    .replace(/[µμ]/g, 'u')
    .replace(/[ΩΩ]/g, 'ohm')
    .replace(/[’′]/g, "'")
    .replace(/[”“″]/g, '"')
    .replace(/⁄/g, '/')
    .replace(/(?<=[A-Za-z])²/g, '2')
    .replace(/(?<=[A-Za-z])³/g, '3')
    .replace(/[¼½¾⅛⅜⅝⅞]/g, (sign) => vulgarFractions.get(sign) ?? sign)
    .replace(/℃|°\s*C/g, 'degC')
    .replace(/℉|°\s*F/g, 'degF')
    .replace(/\bdeg(?:rees?)?\s+([CF])\b/g, 'deg$1')
    .trim();
}

const amountPattern = /(?:(\d+)\s+)?(\d+)\/(\d+)|(?:\d+(?:\.\d*)?|\.\d+)(?:[eE][+-]?\d+)?/y;
// Powers stand in a word only where no figure of a next term is meant: `10ft2in` is a length.
const wordPattern =
  /''|['"°]|(?:[cm]?m|in)\^?2(?=\s*(?:$|[+-]))|A\^?2\.?s|(?:m|ft)\^?3\/[a-z]+|[%A-Za-z]*(?:\/(?:m\^?2(?!\d)|[A-Za-z]+))*/y;

/** The signed terms of a text, or `undefined` where it is not a row of terms. */
function termsOf(text: string): readonly Term[] | undefined {
  const terms: Term[] = [];
  let at = 0;
  let sign = 1;
  const skipSpaces = (): void => {
    while (text[at] === ' ') at += 1;
  };
  while (at < text.length) {
    const mark = text[at];
    const signed = mark === '+' || mark === '-';
    if (signed) {
      sign = mark === '-' ? -1 : 1;
      at += 1;
      skipSpaces();
    }
    amountPattern.lastIndex = at;
    const amount = amountPattern.exec(text);
    if (amount === null) return undefined;
    at = amountPattern.lastIndex;
    skipSpaces();
    wordPattern.lastIndex = at;
    const word = wordPattern.exec(text)?.[0] ?? '';
    at += word.length;
    skipSpaces();
    terms.push({ amount: sign * amountOf(amount), word, joined: terms.length > 0 && !signed });
    if (terms.length > mostTerms) return undefined;
  }
  return terms;
}

function amountOf([whole, wholePart, above, below]: RegExpExecArray): number {
  if (above === undefined || below === undefined) return Number(whole);
  return Number(wholePart ?? 0) + Number(above) / Number(below);
}
