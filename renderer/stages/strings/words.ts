/** The answers of the stage in one sentence each, as its titles say them. */
import {
  type Bank,
  type BankMeasure,
  fixedText,
  formatQuantity,
  type Joining,
  type OneLoss,
  type SharedString,
  type SharingCase,
  wholeFigureText,
} from '../../../core/api.ts';
import { type Tags, tagList, tagOf } from './tags.ts';

/** Amps as an assumed resistance deserves them. */
export const amps = (value: number, digits = 2): string =>
  wholeFigureText({ value: Math.abs(value), unit: 'A', digits });
export const percent = (fraction: number): string => `${String(Math.round(Math.abs(fraction) * 100))}\u00a0%`;

/** Less than this between strings is nothing to speak of: a clamp meter cannot tell it. Common practice, no source. */
export const NOTICED_A = 0.05;

/** True where a bank has no two strings side by side: there is nothing that it could share. */
export function isLone(bank: Bank | undefined): boolean {
  return bank === undefined || bank.branches.length < 2;
}

/** The string of a case that is furthest off its fair share; null where none is judged. */
export function worstOf({ strings }: SharingCase, banks: readonly Bank[]): SharedString | null {
  const sharing = strings.filter(({ bank }) => !isLone(banks[bank]));
  return sharing.reduce<SharedString | null>((worst, one) => {
    if (one.deviation === null) return worst;
    return worst?.deviation === undefined ||
      worst.deviation === null ||
      Math.abs(one.deviation) > Math.abs(worst.deviation)
      ? one
      : worst;
  }, null);
}

export interface SharingTold {
  readonly sharing: SharingCase;
  readonly banks: readonly Bank[];
  readonly tags: Tags;
  readonly shareLimit: number;
  /** False where the range of what was assumed leaves the verdict open. */
  readonly isSure: boolean;
}

/** `String C carries 57 A of 80 A; fair would be 27 A`. */
export function sharingTitle({ sharing, banks, tags, shareLimit, isSure }: SharingTold): string {
  if (sharing.outcome !== 'solved') return 'This case has no operating point, so nothing is shared in it';
  if (banks.every(isLone)) return loneTitle(sharing, banks, tags);
  const worst = worstOf(sharing, banks);
  if (worst?.deviation === undefined || worst.deviation === null || worst.currentA === null || worst.fairA === null) {
    return restingTitle(sharing, tags);
  }
  const bankA = sharing.banksA[worst.bank] ?? 0;
  if (Math.abs(worst.deviation) <= shareLimit) {
    const off = percent(worst.deviation);
    const even =
      off === percent(0) ? 'every string carries its fair share' : `no string more than ${off} off its fair share`;
    return isSure ? `The bank works as one: ${even}` : `On the figures assumed, the bank works as one: ${even}`;
  }
  const name = `String ${tagOf(tags, worst.id)}`;
  const fair = `fair would be ${amps(worst.fairA)}`;
  const against = Math.sign(worst.currentA) !== Math.sign(bankA);
  if (bankA > 0) {
    return against
      ? `${name} is charged with ${amps(worst.currentA)} while its bank gives ${amps(bankA)}; ${fair}`
      : `${name} carries ${amps(worst.currentA)} of ${amps(bankA)}; ${fair}`;
  }
  return against
    ? `${name} gives ${amps(worst.currentA)} while its bank is charged with ${amps(bankA)}; ${fair}`
    : `${name} takes ${amps(worst.currentA)} of ${amps(bankA)} of charge; ${fair}`;
}

function loneTitle(sharing: SharingCase, banks: readonly Bank[], tags: Tags): string {
  const [first] = sharing.strings;
  if (banks.length !== 1 || first === undefined || first.currentA === null)
    return 'Every string works alone: nothing is shared';
  if (Math.abs(first.currentA) < NOTICED_A) return `One string alone: ${tagOf(tags, first.id)} rests`;
  const does = first.currentA < 0 ? 'takes' : 'gives';
  return `One string alone: ${tagOf(tags, first.id)} ${does} ${amps(first.currentA)}`;
}

/** The bank as a whole carries next to nothing. */
function restingTitle({ strings }: SharingCase, tags: Tags): string {
  const givers = strings.filter(({ currentA }) => currentA !== null && currentA > NOTICED_A);
  const takers = strings.filter(({ currentA }) => currentA !== null && currentA < -NOTICED_A);
  if (givers.length === 0 || takers.length === 0)
    return 'The bank rests, and nothing to speak of flows between its strings';
  const lone =
    givers.length === 1 ? `String ${tagList(tags, ids(givers))} feeds` : `Strings ${tagList(tags, ids(givers))} feed`;
  return `${lone} ${tagList(tags, ids(takers))} while the bank as a whole rests`;
}

function ids(strings: readonly SharedString[]): readonly string[] {
  return strings.map(({ id }) => id);
}

/** What a case comes to in a word or two, for the row of cases. */
export function sharingInShort(sharing: SharingCase, banks: readonly Bank[], tags: Tags): string {
  if (sharing.outcome !== 'solved') return 'no answer';
  const [first] = sharing.strings;
  if (banks.every(isLone)) {
    if (banks.length !== 1 || first === undefined || first.currentA === null) return 'alone';
    return Math.abs(first.currentA) < NOTICED_A ? 'rests' : amps(first.currentA);
  }
  const worst = worstOf(sharing, banks);
  if (worst?.deviation === undefined || worst.deviation === null) return 'rests';
  const off = percent(worst.deviation);
  if (off === percent(0)) return 'even';
  return `${tagOf(tags, worst.id)} ${worst.deviation < 0 ? '−' : '+'}${off}`;
}

/** What is to be said of one string beside its figures; empty where there is nothing. */
export function sharedRemark({ opposes, signChangeA, currentA }: SharedString, bankA: number | null): string {
  const told: string[] = [];
  if (opposes && currentA !== null) {
    told.push(currentA < 0 ? 'It is charged while its bank gives.' : 'It gives while its bank is charged.');
  }
  if (signChangeA !== null && Math.abs(signChangeA) > NOTICED_A && currentA !== null && bankA !== null) {
    const at = amps(signChangeA);
    const asNow = currentA < 0 ? 'takes' : 'gives';
    const other = currentA < 0 ? 'gives' : 'takes';
    // On the way from rest to this case it turns over once: before that load it does the other thing.
    const isPassed = Math.abs(signChangeA) <= Math.abs(bankA);
    const side = bankA < 0 ? 'of charge into the bank' : 'from the bank';
    told.push(
      isPassed ? `It ${asNow} only beyond ${at} ${side}; below, it ${other}.` : `Beyond ${at} ${side} it ${other}.`,
    );
  }
  return told.join(' ');
}

/** `23 % → 3 %`; with a decimal where whole per cents would hide the difference. */
export function changeEffect(before: BankMeasure, after: BankMeasure): string {
  const [was, is] = [before, after].map(({ spread }) => percent(spread));
  if (was !== is) return `${was ?? ''} → ${is ?? ''}`;
  const fine = [before, after].map(({ spread }) => fixedText({ value: spread * 100, decimals: 1, keepZeros: true }));
  return `${fine.join(' → ')}\u00a0%`;
}

/** `Wait: 0.8 V apart drives 67 A, the limit is 50 A`. */
export function joiningTitle({ within, gapV, inrushA, limitA, limits }: Joining): string {
  const gap = formatQuantity({ value: Math.abs(gapV), unit: 'V', digits: 2 });
  const least = limits.find((limit) => limit.limitA === limitA);
  if (inrushA < NOTICED_A) return `${gap} apart: nothing to speak of flows when they are joined`;
  const against = `${amps(limitA)}${least === undefined ? '' : ` (${least.what})`}`;
  return within
    ? `${gap} apart drives ${amps(inrushA)} at the first instant: within ${against}`
    : `Not as they stand: ${gap} apart drives ${amps(inrushA)} at the first instant, against ${against}`;
}

/** What cuts out after a loss, wave by wave; empty where all hold. */
export function cascadeWords({ cascade, strings }: OneLoss, tags: Tags): string {
  if (cascade.length === 0) return '';
  const waves = cascade.map((wave) => tagList(tags, wave)).join(', then ');
  const gone = new Set(cascade.flat());
  const isAll = strings.every(({ id, currentA }) => currentA === null || currentA === 0 || gone.has(id));
  return `${waves} ${cascade.length === 1 && cascade[0]?.length === 1 ? 'goes' : 'go'} next${isAll ? ': a cascade, nothing holds' : ''}`;
}
