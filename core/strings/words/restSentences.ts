/** What is to be said of strings with nothing switched on. */
import type { PartId } from '../../job/part.ts';
import type { AtRest } from '../answer.ts';
import type { Bank } from '../banks.ts';
import type { RestingString, StringsStudy } from '../study.ts';
import { amps, listed, type StudySentence, said, volts } from './sentence.ts';

/** Less than this part of a bank's capacity an hour between its strings is nothing to speak of: a clamp meter cannot tell it. */
const NOTICED_PER_H = 0.001;
/** Strings within this part of each other are told together. */
const ALIKE = 0.02;
/** Rest volts a block that are worth naming, V. */
const NOTICED_V = 0.02;
/** One cell of lead and acid rests at about this (SRC-BAT tables, 12.6 V in six cells); a block lower by about as much has lost one. */
const LEAD_CELL_V = 2.1;
const CELL_BAND = 0.2;

export function restSentences(study: StringsStudy): readonly StudySentence[] {
  return study.banks.filter(({ branches }) => branches.length > 1).flatMap((bank) => bankAtRest(study, bank));
}

interface Resting {
  readonly id: PartId;
  readonly currentA: number;
}

function bankAtRest(study: StringsStudy, bank: Bank): readonly StudySentence[] {
  const { atRest } = study;
  const strings = firstOfBranches(bank, atRest);
  const givers = strings.filter(({ currentA }) => currentA > 0);
  const takers = strings.filter(({ currentA }) => currentA < 0);
  const givenA = givers.reduce((sum, { currentA }) => sum + currentA, 0);
  const names = listed(strings.map(({ id }) => id));
  if (atRest.outcome !== 'solved') return [said('rest', `With nothing switched on there is no answer for ${names}.`)];
  if (takers.length === 0 && givenA >= NOTICED_PER_H * bank.capacityAh) {
    return [
      said('rest', `With nothing switched on ${names} still give ${amps(givenA)}: something in the wiring draws it.`),
    ];
  }
  if (givenA < NOTICED_PER_H * bank.capacityAh) {
    const most = givenA < 0.005 ? 'nothing' : `next to nothing (${amps(givenA)})`;
    return [said('rest', `By the figures of the job ${most} flows between ${names} with nothing switched on.`)];
  }
  return [
    ...stops(study, takers),
    said(
      'rest',
      `${amps(givenA)} flows between the strings with nothing switched on: ${whoFeedsWhom(givers, takers)}.`,
    ),
    ...restVolts(study, bank),
    firstMoment(study, bank, takers),
  ];
}

/** One string stands for its branch: all of a branch carry the same. */
function firstOfBranches({ branches }: Bank, { strings }: AtRest): readonly Resting[] {
  return branches.flatMap((branch) => strings.find(({ id }) => id === branch.strings[0]?.id) ?? []);
}

function whoFeedsWhom(givers: readonly Resting[], takers: readonly Resting[]): string {
  const lone = givers.length === 1;
  const give = lone ? `${givers[0]!.id} gives` : told(givers, 'gives', 'give');
  return `${give}, ${told(takers, 'takes', 'take')}`;
}

/** `A and B take 10.1 A each`, or `A takes 3 A and B takes 5 A`. */
function told(strings: readonly Resting[], one: string, several: string): string {
  const sizes = strings.map(({ currentA }) => Math.abs(currentA));
  const alike = Math.max(...sizes) - Math.min(...sizes) <= ALIKE * Math.max(...sizes);
  if (strings.length > 1 && alike) {
    return `${listed(strings.map(({ id }) => id))} ${several} ${amps(Math.max(...sizes))} each`;
  }
  return listed(strings.map(({ id, currentA }) => `${id} ${one} ${amps(currentA)}`));
}

/** A string that is charged beyond what it may be, with nobody at the charger. */
function stops({ resting }: StringsStudy, takers: readonly Resting[]): readonly StudySentence[] {
  return takers.flatMap(({ id, currentA }) => {
    const limit = resting.find((one) => one.id === id)?.chargeLimit ?? null;
    if (limit === null || Math.abs(currentA) <= limit.limitA) return [];
    const text =
      `Stop: isolate ${id} now. It takes ${amps(currentA)} with nothing switched on; it may be charged with ` +
      `${amps(limit.limitA)} (${limit.basis.text}). Gas and heat hazard: ventilate, no flame, and do not charge it.`;
    return [{ about: 'rest', urgent: true, text } as const];
  });
}

/** `C rests 0.15 V a block above A and B`, and what a whole cell's difference points to. */
function restVolts({ resting }: StringsStudy, { strings }: Bank): readonly StudySentence[] {
  const own = resting.filter(({ id }) => strings.some((string) => string.id === id));
  const low = Math.min(...own.map(({ blockV }) => blockV));
  const high = Math.max(...own.map(({ blockV }) => blockV));
  if (high - low < NOTICED_V) return [];
  const near = (to: number) => own.filter(({ blockV }) => Math.abs(blockV - to) < (high - low) / 4);
  const [upper, lower] = [near(high), near(low)];
  const verb = (some: readonly RestingString[]) => (some.length === 1 ? 'rests' : 'rest');
  const names = (some: readonly RestingString[]) => listed(some.map(({ id }) => id));
  const text = `${names(upper)} ${verb(upper)} ${volts(high - low)} a block above ${names(lower)}.`;
  const lead = strings.every(({ chemistry }) => ['flooded', 'agm', 'gel'].includes(chemistry));
  const cell =
    lead && lower.length === 1 && Math.abs(high - low - LEAD_CELL_V) < CELL_BAND * LEAD_CELL_V
      ? [said('rest', `That is about one cell: ${names(lower)} may have a dead or shorted cell.`)]
      : [];
  return [said('rest', text), ...cell];
}

/** By the battery in its first second, whose resistance is the least that it has. */
function firstMoment({ atRestFirst }: StringsStudy, bank: Bank, takers: readonly Resting[]): StudySentence {
  const first = firstOfBranches(bank, atRestFirst).filter(({ currentA }) => currentA > 0);
  const givenA = first.reduce((sum, { currentA }) => sum + currentA, 0);
  const names = listed(takers.map(({ id }) => id));
  return said(
    'rest',
    `In the first moment it is up to ${amps(givenA)}, an upper bound: it falls as ${names} ${takers.length === 1 ? 'polarises' : 'polarise'} and the strings draw level.`,
  );
}
