/** What the readings show of one string: at rest, on load, on charge, across its joints, inside. */

import { factsOf } from '../../battery/stringSource.ts';
import type { CheckedJob } from '../../job/job.ts';
import type { JunctionId, PartId, StringPart } from '../../job/part.ts';
import { ambientOf } from '../../network/circuit.ts';
import type { Tables } from '../../tables/tables.ts';
import type { StringFromReadings } from '../answer.ts';
import type { Bank } from '../banks.ts';
import { LEAST_RATE_PER_H } from '../sharing/bankCurrents.ts';
import type { Expectation } from './expectation.ts';
import { meterError, standardOf } from './meter.ts';
import type { OwnRun } from './ownRun.ts';
import { ampsOf, isRest, type ReadState, runIn } from './readStates.ts';

type Side = 'more' | 'less' | 'fair';

/** Null where it was not read, or where the meter leaves it open. */
export interface Seen {
  readonly rest: 'gives' | 'takes' | 'nothing' | null;
  readonly load: Side | null;
  readonly charge: Side | null;
  readonly ohm: 'high' | 'normal' | null;
  /** The resistance was read at the string's own terminals: no lead or joint is in it. */
  readonly atTerminals: boolean;
  readonly joint: 'high' | 'normal' | null;
  /** Its EMF is low by about a cell. */
  readonly cellLow: boolean;
  /** Its chemistry hardly shows its charge in its volts. */
  readonly flat: boolean;
}

export interface SeenRequest {
  readonly job: CheckedJob;
  readonly tables: Tables;
  readonly states: readonly ReadState[];
  readonly found: readonly StringFromReadings[];
  readonly expectation: Expectation;
}

/** +20 % over the baseline is worth notice (published vendor guide for testing sealed blocks). */
const highOhm = 1.2;
/** A joint drop over three times its like is the joint: ranking hint, derived. */
const badJoint = 3;
/** What a good joint is taken to be at most, Ω; common practice, no source. */
const goodJointOhm = 0.0001;
/** Low by at least this part of a cell counts as a cell. */
const aboutACell = 0.75;

export function seenOf(string: PartId, request: SeenRequest): Seen {
  const { states, found, job } = request;
  const shares = states.flatMap((state) => shareInState(state, string, job.settings.shareLimit) ?? []);
  shares.sort((a, b) => b.bankA - a.bankA);
  const widest = (charging: boolean) => shares.find((one) => one.charging === charging)?.side ?? null;
  const mine = found.filter((one) => one.string === string).at(-1);
  const part = job.parts.find((one): one is StringPart => one.kind === 'string' && one.id === string);
  return {
    rest: firstOf(states, (state) => restIn(state, string)),
    load: widest(false),
    charge: widest(true),
    ohm: mine === undefined ? null : ohmOf(mine, request),
    atTerminals: mine?.atTerminals ?? false,
    joint: jointOf(string, request),
    cellLow: mine !== undefined && part !== undefined && isCellLow(part, mine, request),
    flat: part?.chemistry === 'lfp',
  };
}

function firstOf<T>(states: readonly ReadState[], find: (state: ReadState) => T | null): T | null {
  for (const state of states) {
    const found = find(state);
    if (found !== null) return found;
  }
  return null;
}

function bankWith({ banks }: ReadState, string: PartId): Bank | undefined {
  return banks.find(({ strings }) => strings.some(({ id }) => id === string));
}

export interface ReadShare {
  readonly side: Side | null;
  readonly charging: boolean;
  /** Size of the current of the bank. */
  readonly bankA: number;
}

/**
 * How a string stands to its fair share, where the amps of all branches of its bank were read and the bank carries at least C/50.
 * Beyond the limit, but by less than two standard uncertainties, it is left open.
 */
export function shareInState(state: ReadState, string: PartId, limit: number): ReadShare | null {
  const bank = bankWith(state, string);
  if (bank === undefined || bank.branches.length < 2) return null;
  const currents = bank.branches.map(({ strings }) => ampsOf(state, strings[0]!.id));
  if (currents.some((one) => one === undefined)) return null;
  const read = currents.map((one) => one!);
  const totalA = read.reduce((sum, { value }) => sum + value, 0);
  if (Math.abs(totalA) < LEAST_RATE_PER_H * bank.capacityAh) return null;
  const place = bank.branches.findIndex(({ strings }) => strings.some(({ id }) => id === string));
  const fair = bank.branches[place]!.capacityAh / bank.capacityAh;
  const terms = read.map((one, index) => ({ ...one, slope: (index === place ? 1 : 0) - fair }));
  const missesA = terms.reduce((sum, { value, slope }) => sum + value * slope, 0);
  const deviation = missesA / (fair * totalA);
  const clear = Math.abs(missesA) > 2 * standardOf(terms);
  const far = clear ? (deviation < 0 ? 'less' : 'more') : null;
  return { side: Math.abs(deviation) <= limit ? 'fair' : far, charging: totalA < 0, bankA: Math.abs(totalA) };
}

function restIn(state: ReadState, string: PartId): Seen['rest'] {
  if (!isRest(state)) return null;
  const amps = ampsOf(state, string);
  if (amps === undefined) return null;
  if (Math.abs(amps.value) <= 2 * standardOf([{ ...amps, slope: 1 }])) return 'nothing';
  return amps.value > 0 ? 'gives' : 'takes';
}

/** Against the others of its bank where theirs was read the same way (by Ah), else against what the job expects. */
function ohmOf(mine: StringFromReadings, { job, found }: SeenRequest): Seen['ohm'] {
  const capacityOf = (id: PartId) => {
    const part = job.parts.find((one) => one.id === id);
    return part?.kind === 'string' ? part.capacityAh : 0;
  };
  const others = found
    .filter((one) => one.string !== mine.string && one.set === mine.set && one.atTerminals === mine.atTerminals)
    .map((one) => (one.resistanceOhm.value * capacityOf(one.string)) / capacityOf(mine.string));
  others.sort((a, b) => a - b);
  const usual = others[Math.floor((others.length - 1) / 2)] ?? mine.expectedOhm;
  const { value, standard } = mine.resistanceOhm;
  if (value - 2 * standard > highOhm * usual) return 'high';
  return value <= highOhm * usual ? 'normal' : null;
}

/** Millivolts an amp along its own wiring, against what the drawing makes of it: high anywhere, or normal all the way. */
function jointOf(string: PartId, { states, expectation }: SeenRequest): Seen['joint'] {
  const good = new Set<string>();
  let steps = 0;
  for (const state of states) {
    const run = runIn(state, string);
    const amps = ampsOf(state, string);
    if (run === undefined || amps === undefined || amps.value === 0) continue;
    steps = Math.max(steps, run.plusWay.length + run.minusWay.length - 2);
    for (const reading of state.volts) {
      const { plus, minus } = reading;
      const between = stepsBetween(run, plus, minus);
      if (between.length === 0) continue;
      const ohm = Math.abs(reading.valueV / amps.value);
      const error = meterError(reading, state.shunts);
      const standard = standardOf([
        { value: reading.valueV, error, slope: 1 / amps.value },
        { ...amps, slope: -reading.valueV / amps.value ** 2 },
      ]);
      const most = badJoint * Math.max(goodJointOhm, expectedOhm(state, string, { plus, minus, expectation }));
      if (ohm - 2 * standard > most) return 'high';
      if (ohm + 2 * standard < most) for (const step of between) good.add(step);
    }
  }
  return steps > 0 && good.size === steps ? 'normal' : null;
}

/** The steps of a string's own wiring that two probes take in; none where they are not on one side of it. */
function stepsBetween({ plusWay, minusWay }: OwnRun, a: JunctionId, b: JunctionId): readonly string[] {
  for (const way of [plusWay, minusWay]) {
    const [one, two] = [way.indexOf(a), way.indexOf(b)];
    if (one < 0 || two < 0) continue;
    return way.slice(Math.min(one, two) + 1, Math.max(one, two) + 1);
  }
  return [];
}

function expectedOhm(
  state: ReadState,
  string: PartId,
  { plus, minus, expectation }: Pick<SeenRequest, 'expectation'> & Pick<ReadState['volts'][number], 'plus' | 'minus'>,
): number {
  const [dropV, currentA] = [expectation.volts(state, plus, minus), expectation.amps(state, string)];
  return dropV === null || currentA === null || Math.abs(currentA) < 1e-6 ? 0 : Math.abs(dropV / currentA);
}

function isCellLow(
  part: StringPart,
  { emfV, expectedEmfV }: StringFromReadings,
  { job, tables, states }: SeenRequest,
): boolean {
  const { cells } = factsOf(part, { ambientDegC: ambientOf(job, states[0]!.operatingCase), tables: tables.chemistry });
  const cellV = (part.blocksInSeries * part.blockNominalV) / cells;
  return expectedEmfV - emfV.value - 2 * emfV.standard > 0 && expectedEmfV - emfV.value > aboutACell * cellV;
}
