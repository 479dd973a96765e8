/** Reads an efficiency: one share, or points of output and efficiency as a maker's curve gives them. */
import { commaQuestion, type FieldReading, isBareNumber, sentence } from './fieldReading.ts';
import { readField } from './fieldText.ts';
import { numberText } from './numberText.ts';
import { quoted } from './parsed.ts';

/** A share of 0 to 1 as the job file takes it, a number or a text such as `92 %`. */
type Share = number | string;
export type Efficiency = Share | readonly (readonly [Share, Share])[];

/** `92 %`, or points `10 %: 85 %; 50 %: 94 %` of rated output and efficiency. Figures without a sign are asked about or are per cent. */
export function readPoints(text: string): FieldReading<Efficiency> {
  const typed = text.trim();
  if (typed === '') return { reading: 'empty' };
  const comma = commaQuestion(typed);
  if (comma !== undefined) return comma;
  if (!typed.includes(':')) {
    const share = readField({ text: typed, unit: '1', first: 'metric' });
    return share.reading === 'value' ? { ...share, value: share.store } : share;
  }
  const pairs = typed
    .split(/[;,\n]/)
    .filter((part) => part.trim() !== '')
    .map((pair) => pair.split(':').map((part) => part.trim()));
  const figures = pairs.flat();
  if (figures.some((figure) => isBareNumber(figure))) {
    return figures.every((figure) => isBareNumber(figure) && Number(figure) <= 1) ? shares(pairs) : asPercent(pairs);
  }
  return read(pairs, typed);
}

function read(pairs: readonly (readonly string[])[], typed: string): FieldReading<Efficiency> {
  const points: (readonly [Share, Share])[] = [];
  for (const pair of pairs) {
    const [output, efficiency] = pair.map((text) => readField({ text, unit: '1', first: 'metric' }));
    if (pair.length !== 2 || output?.reading !== 'value' || efficiency?.reading !== 'value') {
      const why = [output, efficiency].find((one) => one?.reading === 'trouble');
      const told =
        why?.reading === 'trouble'
          ? why.message
          : `expected output and efficiency such as 50 %: 94 %, got ${quoted(pair.join(': '))}`;
      return { reading: 'trouble', message: sentence(told) };
    }
    points.push([output.store, efficiency.store]);
  }
  return { reading: 'value', value: points, store: typed, echo: '' };
}

/** All figures from 0 to 1: shares, or very small percentages. The person says. */
function shares(pairs: readonly (readonly string[])[]): FieldReading<Efficiency> {
  const asShares = pairs
    .map((pair) => pair.map((text) => `${numberText({ value: Number(text) * 100, digits: 12 })} %`).join(': '))
    .join('; ');
  return {
    reading: 'ask',
    question: 'Shares, or per cent?',
    choices: [asShares, withPercent(pairs)].map((text) => ({ label: text, text })),
  };
}

function asPercent(pairs: readonly (readonly string[])[]): FieldReading<Efficiency> {
  return readPoints(withPercent(pairs));
}

function withPercent(pairs: readonly (readonly string[])[]): string {
  return pairs.map((pair) => pair.map((text) => (isBareNumber(text) ? `${text} %` : text)).join(': ')).join('; ');
}

/** An efficiency of the job file as its field shows it. */
export function pointsText(given: unknown): string {
  if (Array.isArray(given)) {
    return given.map((point: unknown) => (Array.isArray(point) ? point.map(shareText).join(': ') : '')).join('; ');
  }
  return given === undefined ? '' : shareText(given);
}

function shareText(share: unknown): string {
  return typeof share === 'number' ? `${numberText({ value: share * 100, digits: 12 })} %` : String(share);
}
