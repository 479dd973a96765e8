/** Reads the curve of a fuse or breaker: points of current, melting time and clearing time as its maker gives them. */
import { commaQuestion, type FieldReading, isBareNumber, sentence } from './fieldReading.ts';
import { readField } from './fieldText.ts';
import { numberText } from './numberText.ts';
import { quoted } from './parsed.ts';
import type { UnitName } from './unitName.ts';

/** A figure as the job file takes it: a number in A or s, or a text such as `2 min`. */
type Figure = number | string;
export type Curve = readonly (readonly [Figure, Figure, Figure])[];

const units: readonly UnitName[] = ['A', 's', 's'];

/** `400: 2: 10; 800: 0.2: 1`: amps, seconds to melt and seconds to clear; figures may have units of their own. */
export function readCurve(text: string): FieldReading<Curve> {
  const typed = text.trim();
  if (typed === '') return { reading: 'empty' };
  const comma = commaQuestion(typed);
  if (comma !== undefined) return comma;
  const points: (readonly [Figure, Figure, Figure])[] = [];
  for (const point of typed.split(/[;\n]/).filter((part) => part.trim() !== '')) {
    const figures = point.split(':').map((part, index) => figureOf(part, units[index] ?? 's'));
    const [current, melt, clear] = figures;
    if (figures.length !== 3 || current === undefined || melt === undefined || clear === undefined) {
      const told = `expected amps, seconds to melt and seconds to clear such as 400: 2: 10, got ${quoted(point.trim())}`;
      return { reading: 'trouble', message: sentence(`${told}.`) };
    }
    points.push([current, melt, clear]);
  }
  return { reading: 'value', value: points, store: typed, echo: '' };
}

function figureOf(text: string, unit: UnitName): Figure | undefined {
  const typed = text.trim();
  if (isBareNumber(typed)) return Number.isFinite(Number(typed)) ? Number(typed) : undefined;
  const read = readField({ text: typed, unit, first: 'metric' });
  return read.reading === 'value' ? read.store : undefined;
}

/** A curve of the job file as its field shows it. */
export function curveText(given: unknown): string {
  if (!Array.isArray(given)) return '';
  return given.map((point: unknown) => (Array.isArray(point) ? point.map(figureText).join(': ') : '')).join('; ');
}

function figureText(figure: unknown): string {
  return typeof figure === 'number' ? numberText({ value: figure, digits: 12 }) : String(figure);
}
