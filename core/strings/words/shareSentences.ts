/** What is to be said of how the strings share in the cases. */
import type { SharedString, SharingCase } from '../answer.ts';
import type { Bank } from '../banks.ts';
import type { StringsStudy } from '../study.ts';
import { amps, listed, mostOf, percent, type StudySentence, said } from './sentence.ts';

/** What flows at rest, over what the bank carries, from which the split over hours is another than the one at once. */
const NOTICED_AT_REST = 0.02;

type Carrying = SharedString & { readonly currentA: number; readonly share: number; readonly deviation: number };
interface BankCase {
  readonly case: string;
  readonly name: string;
  /** Discharge positive. */
  readonly bankA: number;
  readonly strings: readonly Carrying[];
}

/** Of each bank: its heaviest discharge (by preference the case that losses and layouts are about), its heaviest charge, and how the split of the first will drift. */
export function shareSentences(study: StringsStudy, nameOf: (caseId: string) => string): readonly StudySentence[] {
  return [...withoutAnswer(study.cases, nameOf), ...ofBanks(study, nameOf)];
}

function withoutAnswer(cases: readonly SharingCase[], nameOf: (caseId: string) => string): readonly StudySentence[] {
  return cases
    .filter(({ model, outcome }) => model === cases[0]?.model && outcome === 'collapse')
    .map((one) =>
      said('sharing', `${nameOf(one.case)}: no operating point, the loads ask for more than can reach them.`),
    );
}

function ofBanks(study: StringsStudy, nameOf: (caseId: string) => string): readonly StudySentence[] {
  return study.banks.flatMap((bank) => {
    if (bank.branches.length < 2) return [];
    const cases = bankCases(study.cases, bank).map((one) => ({ ...one, name: nameOf(one.case) }));
    const judged = cases.find((one) => one.case === study.judgedCase && one.bankA > 0);
    const discharge =
      judged ??
      mostOf(
        cases.filter(({ bankA }) => bankA > 0),
        ({ bankA }) => bankA,
      );
    const charge = mostOf(
      cases.filter(({ bankA }) => bankA < 0),
      ({ bankA }) => -bankA,
    );
    return [
      ...(discharge === undefined
        ? []
        : [inCase(discharge, study), ...charged(discharge), ...split(study, bank, discharge)]),
      ...(charge === undefined ? [] : [inCase(charge, study)]),
    ];
  });
}

/**
 * The cases of the first model in which a bank is whole and carries enough to speak of shares, with whatever else a case joins to
 * it. One string stands for its branch.
 */
function bankCases(cases: readonly SharingCase[], { branches }: Bank): readonly Omit<BankCase, 'name'>[] {
  const first = branches.map(({ strings }) => strings[0]?.id);
  const further = branches.flatMap(({ strings }) => strings.slice(1).map(({ id }) => id));
  return cases.flatMap((one) => {
    const places = new Set(one.strings.filter(({ id }) => first.includes(id)).map(({ bank }) => bank));
    const [place] = places;
    if (one.model !== cases[0]?.model || places.size !== 1 || place === undefined) return [];
    const strings = one.strings.filter(
      (string): string is Carrying => string.bank === place && string.share !== null && !further.includes(string.id),
    );
    const bankA = one.banksA[place];
    return typeof bankA === 'number' && strings.length >= first.length ? [{ case: one.case, bankA, strings }] : [];
  });
}

/** `C carries 72 % of the 80 A; its fair share is 40 %, so it works at 180 % of it`. */
function inCase({ name, bankA, strings }: BankCase, { shareLimit }: StringsStudy): StudySentence {
  const worst = strings.reduce((most, one) => (Math.abs(one.deviation) > Math.abs(most.deviation) + 1e-9 ? one : most));
  const most = strings.reduce((top, one) => (one.deviation > top.deviation ? one : top));
  // Where one carries too much the others carry too little: the one that is worked harder is told.
  const told = bankA > 0 ? most : worst;
  const verb = bankA > 0 ? 'carries' : 'takes';
  if (Math.abs(worst.deviation) <= shareLimit) {
    return said('sharing', `${name}: the strings share the ${amps(bankA)} ${evenly(worst.deviation)}.`);
  }
  const outOf = told.share < 0 ? `goes against the rest of the bank by ${amps(told.currentA)}` : '';
  const words =
    outOf === ''
      ? `${verb} ${percent(told.share)} of the ${amps(bankA)}; its fair share is ${percent(told.fairShare)}, so it works at ${percent(told.share / told.fairShare)} of it`
      : `${outOf} while the bank carries ${amps(bankA)}`;
  return said('sharing', `${name}: ${told.id} ${words}.`);
}

function evenly(deviation: number): string {
  return Math.abs(deviation) < 0.0005 ? 'evenly' : `within ${percent(deviation)} of their fair shares`;
}

/** Strings that are charged while the bank gives, now or below some load. */
function charged({ name, strings }: BankCase): readonly StudySentence[] {
  const opposed = strings.filter(({ opposes }) => opposes);
  if (opposed.length > 0) {
    const verb = opposed.length === 1 ? 'is' : 'are';
    return [
      said(
        'sharing',
        `${name}: ${listed(opposed.map((one) => one.id))} ${verb} charged by the others while the bank gives.`,
      ),
    ];
  }
  const turning = strings.filter(({ signChangeA }) => signChangeA !== null && signChangeA > 0);
  if (turning.length === 0) return [];
  const from = Math.max(...turning.map(({ signChangeA }) => signChangeA ?? 0));
  const verb = turning.length === 1 ? 'gives' : 'give';
  return [
    said(
      'sharing',
      `Until the bank gives about ${amps(from)}, not all of ${listed(turning.map((one) => one.id))} ${verb} anything: below it the others charge what lags.`,
    ),
  ];
}

/**
 * The part of a load that falls to each string by resistance alone: (I_k - I_k at rest) / (bank's current - bank's current at rest).
 * Told only where what flows at rest hides it, and where the case is the same bank as at rest.
 */
function split({ atRest, cases }: StringsStudy, bank: Bank, { bankA, strings }: BankCase): readonly StudySentence[] {
  const resting = strings.map(({ id }) => atRest.strings.find((one) => one.id === id)?.currentA);
  if (atRest.outcome !== 'solved' || !resting.every((currentA) => currentA !== undefined)) return [];
  if (Math.max(...resting.map(Math.abs)) < NOTICED_AT_REST * Math.abs(bankA)) return [];
  if (strings.length !== bank.branches.length || cases.length === 0) return [];
  const restA = resting.reduce((sum, currentA) => sum + currentA, 0);
  if (Math.abs(bankA - restA) < NOTICED_AT_REST * Math.abs(bankA)) return [];
  const parts = strings.map(({ currentA }, index) => (currentA - resting[index]!) / (bankA - restA));
  if (parts.some((part) => part <= 0 || part >= 1)) return [];
  const by = (of: readonly number[]) => listed(strings.map(({ id }, index) => `${id} ${percent(of[index]!)}`));
  return [
    said(
      'sharing',
      `Once the rest volts meet, the split is by resistance alone: ${by(parts)}; over hours it drifts towards capacity: ${by(strings.map(({ fairShare }) => fairShare))}.`,
    ),
  ];
}
