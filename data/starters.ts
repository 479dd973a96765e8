/** What a new job can start from: the invented example jobs as text, and the usual patterns of small systems that they show. */
import { type Example, examples } from './examples/index.ts';

/** `weekend-hut` to the text of `examples/weekend-hut.job.json`. */
export const starters: ReadonlyMap<string, string> = new Map(examples.map(({ name, text }) => [name, text]));

/** A usual pattern of small systems, and the example that shows it. */
export interface StarterPattern {
  /** As a person would call it. */
  readonly pattern: string;
  readonly example: Example;
}

const patterns: readonly (readonly [pattern: string, example: string])[] = [
  ['Weekend hut, 12 V, one block', 'weekend-hut'],
  ['Hut with a bank of 6 V blocks', 'six-volt-hut'],
  ['Cabin, 24 V, three strings', 'ridge-cabin'],
  ['Shed or workshop, 48 V', 'valley-workshop'],
  ['Van, lithium, charged by its alternator', 'coast-van'],
  ['Boat with two banks and a relay', 'two-bank-sloop'],
  ['Boat, 24 V, with 12 V through an equaliser', 'estuary-ketch'],
  ['Boat, 12 V, four lithium blocks in a row', 'canal-boat'],
];

/** Simplest first, on land and then afloat. A pattern whose example is not there is left out. */
export const starterPatterns: readonly StarterPattern[] = patterns.flatMap(([pattern, name]) => {
  const example = examples.find((candidate) => candidate.name === name);
  return example === undefined ? [] : [{ pattern, example }];
});
