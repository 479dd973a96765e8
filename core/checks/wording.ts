/** How findings name parts and print figures. */
import { nameOf } from '../job/part.ts';
import type { SinglePart } from '../network/wiring.ts';
import type { Basis } from '../tables/status.ts';
import { weakest } from '../tables/status.ts';
import { formatQuantity } from '../units/formatQuantity.ts';
import type { Judge } from './rule.ts';

const KINDS: Readonly<Record<SinglePart['kind'], string>> = {
  string: 'string',
  cable: 'cable',
  busbar: 'busbar',
  fuse: 'fuse',
  breaker: 'breaker',
  switch: 'switch',
  shunt: 'shunt',
  joint: 'joint',
  diode: 'diode',
  load: 'load',
  inverter: 'inverter',
  array: 'array',
  controller: 'controller',
  charger: 'charger',
  converter: 'converter',
  bond: 'bond',
};

/** `Fuse F3 (main fuse)`, to begin a sentence. */
export function titleOf(part: SinglePart): string {
  const kind = KINDS[part.kind];
  return `${kind.charAt(0).toUpperCase()}${kind.slice(1)} ${nameOf(part)}`;
}

/** `ratingV of fuse F3`: a missing figure, so that a screen can offer the field. */
export function field(part: SinglePart, name: string): string {
  return `${name} of ${KINDS[part.kind]} ${part.id}`;
}

export function amps(value: number): string {
  return formatQuantity({ value, unit: 'A' });
}
export function volts(value: number): string {
  return formatQuantity({ value, unit: 'V' });
}
export function ohms(value: number): string {
  return formatQuantity({ value, unit: 'ohm' });
}
export function watts(value: number): string {
  return formatQuantity({ value, unit: 'W' });
}
export function percent(value: number): string {
  return formatQuantity({ value, unit: '1', digits: 3 });
}
export function degrees(value: number): string {
  return formatQuantity({ value, unit: 'degC' });
}

/** Two figures that are compared, with as many digits as it takes to tell them apart. */
export function apart(a: number, b: number, unit: string): readonly [string, string] {
  for (let digits = unit === '1' ? 3 : 4; digits < MOST_DIGITS; digits++) {
    const [first, second] = [formatQuantity({ value: a, unit, digits }), formatQuantity({ value: b, unit, digits })];
    if (first !== second) return [first, second];
  }
  return [
    formatQuantity({ value: a, unit, digits: MOST_DIGITS }),
    formatQuantity({ value: b, unit, digits: MOST_DIGITS }),
  ];
}
const MOST_DIGITS = 10;

/** `a, b and c`. */
export function list(words: readonly string[]): string {
  return words.length < 2 ? words.join('') : `${words.slice(0, -1).join(', ')} and ${words.at(-1)!}`;
}

/** At most `most` of the words, and how many more there are. */
export function shortList(words: readonly string[], most = 4): string {
  return words.length <= most ? list(words) : `${words.slice(0, most).join(', ')} and ${words.length - most} more`;
}

/** A basis of the practice with the edition that the job is judged by, for print. */
export function withEdition(basis: Basis, { job, practice }: Judge): Basis {
  return { ...basis, text: `${basis.text}; judged by ${job.practiceEdition ?? practice.books}` };
}

/** Several bases as one: all their texts, the weakest status. */
export function together(first: Basis, ...others: readonly Pick<Basis, 'text' | 'status'>[]): Basis {
  const texts = [...new Set([first.text, ...others.map(({ text }) => text)])];
  return {
    source: first.source,
    text: texts.join('; '),
    status: weakest(first.status, ...others.map(({ status }) => status)),
  };
}
