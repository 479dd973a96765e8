/** The words of `strings`: which joints, from what readings, over what lead, how many draws, which cycle. */
import { Option } from 'commander';
import {
  type CheckedJob,
  type CycleStep,
  caseById,
  type DriftRequest,
  type JoinAsk,
  type JoinSideAsk,
  nearestNameHint,
  type PartId,
  parseQuantity,
  quoted,
  type UnitName,
  usualCycle,
} from '../../core/api.ts';
import { tables } from '../../data/index.ts';
import type { CommandOptions } from './options.ts';
import { exitStatus, Refusal } from './refusal.ts';

export interface StringsOptions extends CommandOptions {
  readonly join?: readonly string[];
  readonly volts?: readonly string[];
  readonly charge?: readonly string[];
  readonly limit?: readonly string[];
  readonly lead?: string;
  readonly draws?: string;
  readonly seed?: string;
  readonly drift?: string;
  readonly cycle?: string;
}

const again = (word: string, earlier: readonly string[] | undefined): readonly string[] => [...(earlier ?? []), word];

export const stringsOptions: readonly Option[] = [
  new Option(
    '--join <a,b>',
    'what happens when two strings or banks (A+B) are joined now (may be given again)',
  ).argParser(again),
  new Option('--volts <a,b>', 'volts read at rest on the two sides of a joint, as "12.8 V,12.1 V"').argParser(again),
  new Option('--charge <a,b>', 'states of charge of the two sides of a joint, as "0.9,0.4"').argParser(again),
  new Option('--limit <amps>', 'the most that may flow between the two sides of a joint, as "50 A"').argParser(again),
  new Option('--lead <ohms>', 'resistance of what joins two sides, both ways together, as "2 mOhm"'),
  new Option('--draws <n>', 'draws over the assumed figures, 1000 where not said'),
  new Option('--seed <n>', 'where the draws begin, 1 where not said'),
  new Option('--drift <n>', 'so many cycles of use, each string with its own charge'),
  new Option('--cycle <steps>', 'what a cycle is, as "evening:6 h,charge:8 h,at-rest:10 h"'),
];

/** Bounds of what may be asked for, so that an answer comes in minutes. */
const mostDraws = 1_000_000;
const largestSeed = 0xff_ff_ff_ff;
const mostCycles = 1000;
const longestStepS = 900;

export const drawsOf = ({ draws }: StringsOptions): number => wholeNumber('--draws', draws, 1000, 1, mostDraws);
export const seedOf = ({ seed }: StringsOptions): number => wholeNumber('--seed', seed, 1, 0, largestSeed);

export function leadOf({ lead }: StringsOptions): number | undefined {
  return lead === undefined ? undefined : quantity('--lead', lead, 'ohm');
}

function wholeNumber(word: string, text: string | undefined, standard: number, least: number, most: number): number {
  if (text === undefined) return standard;
  const value = /^\d+$/.test(text) ? Number(text) : Number.NaN;
  if (value >= least && value <= most) return value;
  throw refused(`${word} wants a whole number from ${String(least)} to ${String(most)}, got ${quoted(text)}.`);
}

function refused(message: string): Refusal {
  return new Refusal(exitStatus.words, message);
}

function quantity(word: string, text: string, unit: UnitName): number {
  const read = parseQuantity({ text: text.trim(), unit });
  if (!read.ok) throw refused(`${word}: ${read.message}.`);
  if (read.value >= 0) return read.value;
  throw refused(`${word}: ${quoted(text)} is below nought.`);
}

/** The joints asked for; `undefined` where none was, and the usual ones are to be told. */
export function joinsOf(job: CheckedJob, options: StringsOptions): readonly JoinAsk[] | undefined {
  const { join, volts, charge, limit } = options;
  if (join === undefined) {
    for (const [word, given] of Object.entries({ volts, charge, limit })) {
      if (given !== undefined) throw refused(`--${word} belongs to a joint; name its two sides with --join a,b.`);
    }
    return undefined;
  }
  asOften('--volts', volts, join);
  asOften('--charge', charge, join);
  if (limit !== undefined && limit.length > 1) asOften('--limit', limit, join);
  return join.map((sides, index) => {
    const [a, b] = sidesOf(job, sides);
    const read = pairOf('--volts', volts?.[index], (text) => quantity('--volts', text, 'V'));
    const full = pairOf('--charge', charge?.[index], chargeOf);
    const limitText = limit?.[index] ?? limit?.[0];
    return {
      a: { ...a, volts: read?.[0], charge: full?.[0] },
      b: { ...b, volts: read?.[1], charge: full?.[1] },
      limitA: limitText === undefined ? undefined : quantity('--limit', limitText, 'A'),
    };
  });
}

function asOften(word: string, given: readonly string[] | undefined, join: readonly string[]): void {
  if (given === undefined || given.length === join.length) return;
  throw refused(
    `Give ${word} once for each --join, in the same order: ${String(given.length)} for ${String(join.length)} now.`,
  );
}

function pairOf(
  word: string,
  text: string | undefined,
  read: (text: string) => number,
): readonly [number, number] | undefined {
  if (text === undefined) return undefined;
  const [first, second, ...more] = text.split(',');
  if (first === undefined || second === undefined || more.length > 0) {
    throw refused(`${word} wants two figures with a comma between them, got ${quoted(text)}.`);
  }
  return [read(first), read(second)];
}

function chargeOf(text: string): number {
  const written = text.trim();
  const value = written.endsWith('%')
    ? quantity('--charge', written, '1')
    : written === ''
      ? Number.NaN
      : Number(written);
  if (value >= 0 && value <= 1) return value;
  throw refused(`--charge wants states of charge from 0 to 1, got ${quoted(written)}.`);
}

/** Names may hold commas and plus signs themselves, so a name as a whole is tried first. */
function sidesOf(job: CheckedJob, text: string): readonly [JoinSideAsk, JoinSideAsk] {
  const pieces = text.split(',');
  if (pieces.length < 2) throw refused(`--join wants two sides with a comma between them, got ${quoted(text)}.`);
  const ids = job.parts.flatMap((part) => (part.kind === 'string' ? [part.id] : []));
  for (let at = 1; at < pieces.length; at++) {
    const a = sideOf(ids, pieces.slice(0, at).join(','));
    const b = sideOf(ids, pieces.slice(at).join(','));
    if (!('unknown' in a || 'unknown' in b)) return distinct(a.strings, b.strings, text);
  }
  const unknown = [pieces[0]!, pieces.slice(1).join(',')]
    .map((side) => sideOf(ids, side))
    .flatMap((side) => ('unknown' in side ? [side.unknown] : []))[0]!;
  throw refused(
    `--join: the job has no string ${quoted(unknown)}${nearestNameHint(unknown, ids)}. It has ${ids.slice(0, 20).join(', ')}.`,
  );
}

function sideOf(
  ids: readonly PartId[],
  text: string,
): { readonly strings: readonly PartId[] } | { readonly unknown: string } {
  const whole = ids.find((id) => id === text.trim());
  if (whole !== undefined) return { strings: [whole] };
  const names = text.split('+').map((name) => name.trim());
  const found = names.map((name) => ids.find((id) => id === name));
  const missing = found.indexOf(undefined);
  return missing < 0 ? { strings: found.filter((id) => id !== undefined) } : { unknown: names[missing]! };
}

function distinct(a: readonly PartId[], b: readonly PartId[], text: string): readonly [JoinSideAsk, JoinSideAsk] {
  if (a.some((id) => b.includes(id))) throw refused(`--join ${quoted(text)} has the same string on both sides.`);
  return [{ strings: a }, { strings: b }];
}

/** The cycles of use asked for; throws a `Refusal` where there is no cycle to run. */
export function driftAsked(job: CheckedJob, { drift, cycle }: StringsOptions): DriftRequest | undefined {
  if (drift === undefined) {
    if (cycle !== undefined) throw refused('--cycle says what a cycle is; say how many with --drift N.');
    return undefined;
  }
  const cycles = wholeNumber('--drift', drift, 1, 1, mostCycles);
  if (cycle !== undefined)
    return { cycle: cycle.split(',').map((step) => stepOf(job, step)), cycles, stepS: longestStepS };
  const usual = usualCycle({ job, tables });
  if (usual !== null) return { ...usual, cycles };
  throw refused(
    '--drift: the cases of the job make no cycle of use and charge; say one with --cycle "case:6 h,other:8 h".',
  );
}

function stepOf(job: CheckedJob, text: string): CycleStep {
  const at = text.lastIndexOf(':');
  if (at < 1) throw refused(`--cycle wants steps such as "evening:6 h", got ${quoted(text)}.`);
  const id = text.slice(0, at).trim();
  if (caseById(job, id) === undefined) {
    const known = [...job.cases.map((each) => each.id), 'at-rest'];
    throw refused(`--cycle: the job has no case ${quoted(id)}${nearestNameHint(id, known)}.`);
  }
  const hours = quantity('--cycle', text.slice(at + 1), 'h');
  if (hours > 0) return { case: id, hours };
  throw refused(`--cycle: a step takes more than nought hours, got ${quoted(text)}.`);
}
