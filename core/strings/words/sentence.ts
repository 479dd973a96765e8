/** A sentence of a study of strings, and how figures stand in one. */
import { formatQuantity } from '../../units/formatQuantity.ts';

export type SentenceTopic =
  | 'rest'
  | 'sharing'
  | 'one-out'
  | 'layouts'
  | 'leads'
  | 'joining'
  | 'series'
  | 'band'
  | 'readings'
  | 'drift';

export interface StudySentence {
  readonly about: SentenceTopic;
  /** To be told before all else: something must be stopped. */
  readonly urgent: boolean;
  readonly text: string;
}

export const said = (about: SentenceTopic, text: string): StudySentence => ({ about, urgent: false, text });

/** Three digits carry more than the figures that they come from. */
export const amps = (value: number): string =>
  formatQuantity({ value: Math.abs(value) < 0.001 ? 0 : Math.abs(value), unit: 'A', digits: 3 });
/** Millivolts below a tenth of a volt. */
export const volts = (value: number): string =>
  Math.abs(value) < 0.1
    ? millivolts(value)
    : formatQuantity({ value, unit: 'V', digits: Math.abs(value) < 1 ? 2 : 4, prefix: false });
export const millivolts = (value: number): string => `${(value * 1000).toFixed(Math.abs(value) < 0.01 ? 1 : 0)} mV`;
export const metres = (value: number): string => `${value.toFixed(2)} m`;
export const ampHours = (value: number): string => formatQuantity({ value, unit: 'Ah', digits: 3 });
export const watts = (value: number): string => formatQuantity({ value, unit: 'W', digits: 3 });

/** Whole per cent from ten up, a decimal below; never a sign. */
export function percent(fraction: number): string {
  const size = Math.abs(fraction) * 100;
  return `${size.toFixed(size >= 9.95 || size < 0.05 ? 0 : 1)} %`;
}

/** `1.5 h`, `40 min`, `12 s`: a time as one would say it. */
export function timeText(seconds: number): string {
  if (seconds >= 5400) return formatQuantity({ value: seconds / 3600, unit: 'h', digits: 2 });
  if (seconds >= 90) return `${(seconds / 60).toPrecision(2)} min`;
  return formatQuantity({ value: seconds, unit: 's', digits: 2 });
}

/** `A`, `A and B`, `A, B and C`; beyond six only a count. */
export function listed(names: readonly string[]): string {
  if (names.length > 6) return `${names.slice(0, 5).join(', ')} and ${String(names.length - 5)} others`;
  return names.length < 2 ? names.join('') : `${names.slice(0, -1).join(', ')} and ${names.at(-1) ?? ''}`;
}

/** Those that carry most, in the order in which they stand; all where they are few. */
export function heaviest<T extends { readonly currentA: number | null }>(
  strings: readonly T[],
  most: number,
): readonly T[] {
  if (strings.length <= most) return strings;
  const sizes = strings.map(({ currentA }) => Math.abs(currentA ?? 0));
  sizes.sort((a, b) => b - a);
  const least = sizes[most - 1]!;
  return strings.filter(({ currentA }) => Math.abs(currentA ?? 0) >= least).slice(0, most);
}

/** The first of those with the largest figure. */
export function mostOf<T>(items: readonly T[], figure: (item: T) => number): T | undefined {
  let found: T | undefined;
  for (const item of items) if (found === undefined || figure(item) > figure(found)) found = item;
  return found;
}
