/** What field readings say of each string: its EMF and resistance, and what to read where they say nothing. */
import type { CheckedJob } from '../../job/job.ts';
import { originOf, type PartId, type StringPart } from '../../job/part.ts';
import type { OperatingPoint } from '../../network/answer.ts';
import { withoutPairs } from '../../network/wiring.ts';
import type { Tables } from '../../tables/tables.ts';
import { fixedText } from '../../units/numberText.ts';
import type { FromReadings, StringFromReadings, WithUncertainty } from '../answer.ts';
import { banksOf } from '../banks.ts';
import { listed } from '../words/sentence.ts';
import { Expectation, type ExpectedSource } from './expectation.ts';
import { standardOf } from './meter.ts';
import {
  type AcrossString,
  ampsOf,
  branchOf,
  caseName,
  isRest,
  type ReadState,
  readStates,
  voltsAcross,
} from './readStates.ts';
import { tieBreaksOf } from './tieBreak.ts';
import { type Measured, type TwoLoads, twoLoads } from './twoLoads.ts';

export interface FromReadingsRequest {
  readonly job: CheckedJob;
  readonly tables: Tables;
  /** Solves of the job's cases with slow resistances, where they are at hand; a case that is not among them is solved here. */
  readonly points?: readonly OperatingPoint[];
}

/** A string's current must change by this part of the larger reading; field practice for the two-load test, derived. */
const leastChange = 0.3;
/** A change under so many standard uncertainties is no change. */
const leastSignificance = 3;

/** One state in which both volts and amps of a string are known, between two given points. */
interface Load {
  readonly state: ReadState;
  readonly across: AcrossString;
  readonly amps: Measured;
}

/**
 * For each string, from the two of its loads that differ most in its current (same `set`, same two points for the volts; on
 * charge only where the others do not tell):
 * R = (U_a - U_b)/(I_b - I_a) and E = U_a + R I_a, see `twoLoads`. Volts at the string's own terminals give the string; read
 * further out they give all that lies in between as well, and the job's own expectation is taken between the same points.
 */
export function fromReadings(request: FromReadingsRequest): FromReadings {
  const { job } = request;
  const states = readStates(job);
  const expectation = new Expectation(request);
  const strings: StringFromReadings[] = [];
  const missing: string[] = [];
  const sets = new Set(states.map(({ set }) => set));
  for (const bank of banksOf(withoutPairs(job.parts))) {
    if (!states.some((state) => bank.strings.some(({ id }) => isRead(state, id)))) {
      missing.push(nothingRead(bank.strings));
      continue;
    }
    for (const set of sets) {
      const here = states.filter((state) => state.set === set);
      for (const string of bank.strings) {
        const found = ofString(string, here, expectation);
        if (typeof found !== 'string') strings.push(...found);
        else if (sets.size === 1 || here.some((state) => isRead(state, string.id))) missing.push(found);
      }
    }
  }
  const rest = restSum(states);
  return {
    strings,
    tieBreaks: tieBreaksOf({ ...request, states, found: strings, expectation }),
    restSumA: rest,
    ...(rest === null ? {} : { restText: restText(rest) }),
    missing,
  };
}

function isRead(state: ReadState, string: PartId): boolean {
  return ampsOf(state, string) !== undefined || voltsAcross(state, string).length > 0;
}

function nothingRead(strings: readonly StringPart[]): string {
  const names = listed(strings.map(({ id }) => id));
  return `Nothing was read of ${names}: read the volts across ${strings.length === 1 ? 'it' : 'them'} and the amps of each string with nothing on (case at-rest), and both again, at the same points, under a load that changes the amps of every string by at least 30 %.`;
}

/** The string's figures; a sentence where there are none; nothing where another string of its branch answers for it. */
function ofString(
  string: StringPart,
  states: readonly ReadState[],
  expectation: Expectation,
): readonly StringFromReadings[] | string {
  const pair = widestPair(string.id, states);
  if (pair === undefined) return whatIsMissing(string, states);
  const [a, b] = pair;
  const branch = branchOf(a.state, string.id)!;
  const [first, ...others] = a.across.away === 0 ? [string] : branch.strings;
  if (first!.id !== string.id) return [];
  const refusal = whyNot(string.id, pair);
  if (refusal !== null) return refusal;
  const found = twoLoads({ volts: a.across.measured, amps: a.amps }, { volts: b.across.measured, amps: b.amps });
  if (found.significance < leastSignificance) {
    return `${string.id}: its amps changed by ${amps(b.amps.value - a.amps.value)} from ${caseName(a.state)} to ${caseName(b.state)}, which is within what the meter may be off. Read it again with a load several times as large.`;
  }
  if (found.resistanceOhm.value <= 0) {
    return `${string.id}: its volts do not fall from ${caseName(a.state)} to ${caseName(b.state)} as it gives more. The readings are not of the same minutes, or one has its sign turned: read them again.`;
  }
  const expected = expectation.between({
    strings: [first!.id, ...others.map(({ id }) => id)],
    states: [a.state, b.state],
    plus: a.across.plus,
    minus: a.across.minus,
  });
  const { set } = a.state;
  return [
    {
      string: string.id,
      ...(others.length === 0 ? {} : { together: others.map(({ id }) => id) }),
      ...(set === undefined ? {} : { set }),
      cases: [caseName(a.state), caseName(b.state)],
      ...found,
      atTerminals: a.across.away === 0,
      expectedOhm: expected.ohm,
      expectedEmfV: expected.emfV,
      text: textOf([first!, ...others], a.across, found, expected),
    },
  ];
}

/** Of the loads read between one and the same two points, nearest to the string, the two furthest apart in amps; fewer amps first. */
function widestPair(string: PartId, states: readonly ReadState[]): readonly [Load, Load] | undefined {
  const byPoints = new Map<string, Load[]>();
  for (const state of states) {
    const current = ampsOf(state, string);
    if (current === undefined) continue;
    for (const across of voltsAcross(state, string)) {
      const key = JSON.stringify([across.plus, across.minus]);
      byPoints.set(key, [...(byPoints.get(key) ?? []), { state, across, amps: current }]);
    }
  }
  const pairs = [...byPoints.values()].filter(({ length }) => length > 1).map(extremes);
  const changeOf = ([a, b]: readonly [Load, Load]) => b.amps.value - a.amps.value;
  pairs.sort((one, two) => one[0].across.away - two[0].across.away || changeOf(two) - changeOf(one));
  return pairs[0];
}

/** Volts on charge stand above the EMF that the string gives from: such loads are taken only where the others do not tell. */
function extremes(loads: readonly Load[]): readonly [Load, Load] {
  const sorted = [...loads];
  sorted.sort((one, two) => one.amps.value - two.amps.value);
  const giving = sorted.filter(({ state, amps }) => amps.value >= 0 || isRest(state));
  const pair = [giving[0] ?? sorted[0]!, sorted.at(-1)!] as const;
  return changesEnough(pair) ? pair : [sorted[0]!, sorted.at(-1)!];
}

/** By 30 % of the larger current. */
function changesEnough([a, b]: readonly [Load, Load]): boolean {
  const largerA = Math.max(Math.abs(a.amps.value), Math.abs(b.amps.value));
  const changeA = b.amps.value - a.amps.value;
  return changeA > 0 && changeA >= leastChange * largerA;
}

function whyNot(string: PartId, pair: readonly [Load, Load]): string | null {
  if (changesEnough(pair)) return null;
  const [a, b] = pair;
  const changeA = b.amps.value - a.amps.value;
  const largerA = Math.max(Math.abs(a.amps.value), Math.abs(b.amps.value));
  const percent = largerA === 0 ? 0 : (100 * changeA) / largerA;
  return `${string}: its amps changed too little between ${caseName(a.state)} (${amps(a.amps.value)}) and ${caseName(b.state)} (${amps(b.amps.value)}), by ${fixedText({ value: percent, decimals: 0 })} %. At least 30 % is needed to tell its resistance: read it again under a larger or a smaller load.`;
}

function whatIsMissing({ id, plus, minus }: StringPart, states: readonly ReadState[]): string {
  const withAmps = states.filter((state) => ampsOf(state, id) !== undefined);
  const withVolts = states.filter((state) => voltsAcross(state, id).length > 0);
  const both = withAmps.filter((state) => withVolts.includes(state));
  const names = (some: readonly ReadState[]) => listed(some.map(caseName));
  const inCases = (some: readonly ReadState[]) => `${some.length > 1 ? 'cases' : 'case'} ${names(some)}`;
  const another =
    'a second case with another load, one that changes its amps by at least 30 %, at the same points and within minutes';
  if (withAmps.length === 0 && withVolts.length === 0) {
    return `${id}: nothing was read of it. Read the volts across it (${plus} to ${minus}) and its amps in two cases whose loads differ.`;
  }
  if (withAmps.length === 0) {
    const more = withVolts.length < 2 ? `, and both in ${another}` : '';
    return `${id}: its volts were read, its amps were not. Read its amps in ${inCases(withVolts)} (a clamp on any cable that carries its current alone)${more}.`;
  }
  if (both.length === 0) {
    const more = withAmps.length < 2 ? `, and both in ${another}` : '';
    return `${id}: its amps were read in ${inCases(withAmps)}, the volts across it were not. Read the volts from ${plus} to ${minus} there${more}.`;
  }
  if (both.length === 1)
    return `${id}: volts and amps were both read in case ${names(both)} only. Read both in ${another}.`;
  return `${id}: the volts in ${inCases(both)} were read at different points. Read them from ${plus} to ${minus} in each.`;
}

function textOf(
  strings: readonly StringPart[],
  { plus, minus, away }: AcrossString,
  { emfV, resistanceOhm }: TwoLoads,
  expected: ExpectedSource,
): string {
  const where = away === 0 ? 'at its own terminals' : `from ${plus} to ${minus}, what lies in between included`;
  const band = 2 * resistanceOhm.standard;
  const agrees = Math.abs(resistanceOhm.value - expected.ohm) <= band;
  const times = fixedText({ value: resistanceOhm.value / expected.ohm, decimals: 1, keepZeros: true });
  const verdict = agrees ? 'the two agree' : `this is ${times} times that, more than the meters can be off`;
  const assumed = strings.some((string) => originOf(string, 'resistanceOhm') === 'default')
    ? ' What the job expects rests on an assumed resistance: the one read is the better figure.'
    : '';
  const read = `${ohms(resistanceOhm.value)} ± ${ohms(band, resistanceOhm.value)} mΩ, and ${volts(emfV.value)} ± ${volts(2 * emfV.standard)} V behind it`;
  const names = strings.map(({ id }) => id).join(' + ');
  return `${names}: ${read} (95 % limits), read ${where}. The job expects ${ohms(expected.ohm)} mΩ and ${volts(expected.emfV)} V; ${verdict} in resistance.${assumed}`;
}

/** What the amps of a bank's branches add up to in a state of rest; of several the one furthest from nothing. */
function restSum(states: readonly ReadState[]): WithUncertainty | null {
  let worst: WithUncertainty | null = null;
  for (const state of states.filter(isRest)) {
    for (const { branches } of state.banks) {
      const currents = branches.map(({ strings }) => ampsOf(state, strings[0]!.id));
      if (branches.length < 2 || currents.some((one) => one === undefined)) continue;
      const terms = currents.map((one) => ({ ...one!, slope: 1 }));
      const sum = { value: terms.reduce((total, { value }) => total + value, 0), standard: standardOf(terms) };
      if (worst === null || Math.abs(sum.value) / sum.standard > Math.abs(worst.value) / worst.standard) worst = sum;
    }
  }
  return worst;
}

function restText({ value, standard }: WithUncertainty): string {
  const sum = `With nothing on the strings' amps add up to ${amps(value)} ± ${amps(2 * standard)}`;
  return Math.abs(value) <= 2 * standard
    ? `${sum}: nothing, as they must.`
    : `${sum}, and must add up to nothing. Something still draws or feeds, a clamp was not set to zero, or one was read the wrong way round: settle that before anything is made of these readings.`;
}

const amps = (value: number): string => `${fixedText({ value, decimals: 1, keepZeros: true }).replace('-', '−')} A`;
const volts = (value: number): string => fixedText({ value, decimals: 2, keepZeros: true });
/** In milliohms, with as many decimals as `like` is given with. */
const ohms = (value: number, like = value): string =>
  fixedText({ value: 1000 * value, decimals: like < 0.00095 ? 2 : 1, keepZeros: true });
