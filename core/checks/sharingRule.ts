/** Strings side by side against the share of the bank's current that their capacity entitles them to. */
import { stringSource } from '../battery/stringSource.ts';
import { originOf, type StringPart } from '../job/part.ts';
import type { SharedString } from '../strings/answer.ts';
import type { Bank, Branch } from '../strings/banks.ts';
import { branchCurrent } from '../strings/sharing/bankCurrents.ts';
import { sharingOf } from '../strings/sharing/sharing.ts';
import { assumedSources, overRange } from './assumed.ts';
import { COMMON_PRACTICE } from './bases.ts';
import { type CheckContext, SolvedCase } from './checkContext.ts';
import { quietOf } from './quiet.ts';
import type { Rule, RuleOutcome } from './rule.ts';
import { branchName, branchTitle, idsOf, sharedBanks } from './sharedBanks.ts';
import { ELSEWHERE, GroupVerdicts, isOver, PASS, type Verdict } from './tally.ts';
import { amps, apart, list, percent } from './wording.ts';

/** Beyond this many times the limit that is worth a look, it is to be put right. Common practice, no source. */
const fixFactor = 2;
/** From this part of what a string is off, that flows with nothing switched on, leads are not what is to be changed. */
const MOSTLY = 0.5;

export const shareUneven: Rule = {
  id: 'share-uneven',
  family: 'strings',
  kinds: ['string'],
  title: 'Strings side by side share unevenly',
  compares:
    'current solved in each string with its fair share by capacity among the strings joined to the same two poles (strings in series counting as one), in every case without a starting load in which the bank gives or takes at least C/50',
  remedy:
    'Make the leads of all strings alike in length, size and joints, and join them where none is nearer the load than another.',
  byPractice: false,
  reads: 'steady-cases',
  basisFor: () => COMMON_PRACTICE,
  run: runShareUneven,
};

/** Each bank is judged by the string that is furthest off. */
function runShareUneven(context: CheckContext): RuleOutcome {
  const verdicts = new GroupVerdicts();
  for (const one of context.steady) {
    const banks = sharedBanks(one);
    if (banks.length === 0) continue;
    const shared = sharesIn(context, one);
    for (const bank of banks) verdicts.add(idsOf(bank), verdictFor(context, { one, bank, shared }));
  }
  return verdicts.outcome(shareUneven, COMMON_PRACTICE);
}

/** The study's own sharing of a case, so that the two never differ. */
function sharesIn(context: CheckContext, one: SolvedCase): ReadonlyMap<string, SharedString> {
  const { job, tables } = context;
  const rest = quietOf(context, one)?.point ?? one.point;
  const { operatingCase, point } = one;
  const { strings } = sharingOf({ job, tables, operatingCase, model: point.model, point, rest });
  return new Map(strings.map((string) => [string.id, string]));
}

interface BankInCase {
  readonly one: SolvedCase;
  readonly bank: Bank;
  readonly shared: ReadonlyMap<string, SharedString>;
}

interface Branched {
  readonly branch: Branch;
  readonly givenA: number;
  readonly fairA: number;
  readonly deviation: number;
}

/** Share against fair share of the worst branch; nothing where the bank does not carry enough to tell. */
function verdictFor(context: CheckContext, { one, bank, shared }: BankInCase): Verdict | undefined {
  const shares = bank.branches.flatMap((branch): readonly Branched[] => {
    const { currentA, share, fairShare, deviation } = shared.get(branch.strings[0]!.id)!;
    if (currentA === null || share === null || deviation === null) return [];
    return [{ branch, givenA: currentA, fairA: (currentA / share) * fairShare, deviation: Math.abs(deviation) }];
  });
  if (shares.length < bank.branches.length) return undefined;
  const worst = shares.reduce((most, share) => (isOver(share.deviation, most.deviation) ? share : most));
  const limit = context.job.settings.shareLimit;
  if (!isOver(worst.deviation, limit)) return PASS;
  const restA = restCurrent(context, one, worst);
  // A fuller string takes less, and charging evens that out; what it does at rest is the matter of another rule.
  if (restA !== undefined && worst.fairA < 0) return ELSEWHERE;
  return {
    kind: 'fail',
    severity: isOver(worst.deviation, fixFactor * limit) && areKnown(bank.strings) ? 'fix' : 'look',
    case: one.id,
    measured: { value: worst.deviation, unit: '1' },
    limit: { value: limit, unit: '1' },
    excess: worst.deviation / limit,
    message: () =>
      `${sentence(bank, worst, shares)}${restWords(restA)}${assumedSources(one.point)}${overRange(holdsAtBest(context, { one, bank, shared }, worst))}.`,
    ...(restA === undefined ? {} : { remedy: EVEN_THE_CHARGE }),
  };
}

const EVEN_THE_CHARGE =
  'Bring the strings to the same charge and let them rest, then judge again: most of the difference comes from their rest volts, not from their leads.';

/** `… gives 56 A of the 100 A that it and B2 give; its fair share …`. */
function sentence(bank: Bank, worst: Branched, shares: readonly Branched[]): string {
  const bankA = shares.reduce((sum, { givenA }) => sum + givenA, 0);
  const isGiving = bankA > 0;
  const total = amps(Math.abs(bankA));
  const [given, fair] = apart(Math.abs(worst.givenA), Math.abs(worst.fairA), 'A');
  const who = branchTitle(worst.branch);
  const one = isSingle(worst.branch) ? 's' : '';
  if (worst.givenA * bankA < 0) {
    const [does, bankDoes] = isGiving ? ['take', 'gives'] : ['give', 'takes'];
    return `${who} ${does}${one} ${given} while the bank ${bankDoes} ${total}; ${isSingle(worst.branch) ? 'its' : 'their'} fair share by capacity is ${fair} the other way, and ${isSingle(worst.branch) ? 'it is' : 'they are'} ${percent(worst.deviation)} off`;
  }
  const verb = isGiving ? 'give' : 'take';
  const others = bank.branches.filter((other) => other !== worst.branch).map(branchName);
  const [it, its, is] = isSingle(worst.branch) ? ['it', 'its', 'it is'] : ['they', 'their', 'they are'];
  return `${who} ${verb}${one} ${given} of the ${total} that ${it} and ${list(others)} ${verb}; ${its} fair share by capacity is ${fair}, and ${is} ${percent(worst.deviation)} off`;
}

function isSingle({ strings }: Branch): boolean {
  return strings.length === 1;
}

/** What the branch carries with nothing switched on, where that is most of what it is off by. */
function restCurrent(context: CheckContext, one: SolvedCase, { branch, givenA, fairA }: Branched): number | undefined {
  const rest = quietOf(context, one);
  const restA = rest === undefined ? null : branchCurrent(rest.point, branch);
  return restA !== null && restA / (givenA - fairA) > MOSTLY ? restA : undefined;
}

function restWords(restA: number | undefined): string {
  if (restA === undefined) return '';
  return `; most of that comes from rest volts, for with nothing switched on ${amps(Math.abs(restA))} flow ${restA > 0 ? 'out of it' : 'into it'} already`;
}

/** On resistances that are only assumed nobody can be told to put something right: they are worth a look, and a measurement. */
function areKnown(strings: readonly StringPart[]): boolean {
  return strings.every((string) => ['measured', 'label'].includes(originOf(string, 'resistanceOhm')));
}

/**
 * Would the worst branch keep its share with the assumed figures that favour it most? One that carries too much: itself with the
 * highest resistance, the others with the lowest; their rest volts alike. `undefined` where no figure is assumed.
 */
function holdsAtBest(context: CheckContext, at: BankInCase, worst: Branched): boolean | undefined {
  const { one, bank } = at;
  // It carries too much, whichever way the bank's current runs.
  const tooMuch = worst.givenA / worst.fairA > 1;
  const isGiving = worst.fairA > 0;
  const changes = bank.branches.flatMap(({ strings }, k) => {
    const isWorst = bank.branches[k] === worst.branch;
    return strings.flatMap((string) =>
      atBound(context, one, string, { ohm: isWorst === tooMuch, volts: (isWorst === tooMuch) !== isGiving }),
    );
  });
  if (changes.length === 0) return undefined;
  const point = context.solveChanged(one, changes);
  if (point.outcome !== 'solved') return false;
  const eased = new SolvedCase(context.job, one.operatingCase, point);
  const share = sharesIn(context, eased).get(worst.branch.strings[0]!.id)!;
  if (share.deviation === null) return true;
  // Past its fair share on the other side: somewhere between it keeps to it.
  const isPast = share.deviation > 0 !== tooMuch;
  return isPast || !isOver(Math.abs(share.deviation), context.job.settings.shareLimit);
}

/** The string with its assumed figures at the high (true) or low end of their range; nothing where none is assumed. */
function atBound(
  context: CheckContext,
  one: SolvedCase,
  string: StringPart,
  high: { readonly ohm: boolean; readonly volts: boolean },
): readonly StringPart[] {
  const source = stringSource(string, {
    model: one.point.model,
    ambientDegC: one.ambientDegC,
    tables: context.tables.chemistry,
  });
  const [emf, ohm] = [source.emfV, source.resistanceOhm];
  const isAssumed = ({ origin }: { readonly origin: string }) => origin === 'default' || origin === 'guess';
  if (!isAssumed(emf) && !isAssumed(ohm)) return [];
  const bound = (figure: typeof emf, isHigh: boolean) =>
    isAssumed(figure) ? (isHigh ? figure.high : figure.low) : figure.value;
  return [{ ...string, emfV: bound(emf, high.volts), resistanceOhm: bound(ohm, high.ohm) }];
}
