/** What is left when one of several strings side by side cuts out. */
import { originOf, type StringPart } from '../job/part.ts';
import type { OperatingPoint } from '../network/answer.ts';
import { operatingPoint } from '../network/operatingPoint.ts';
import type { Bank, Branch } from '../strings/banks.ts';
import { bankCurrent, branchCurrent } from '../strings/sharing/bankCurrents.ts';
import { largestBankA, limitsOfBank } from '../strings/sharing/bankLimits.ts';
import { withoutStrings } from '../strings/sharing/losses.ts';
import { assumedSources } from './assumed.ts';
import type { CheckContext, SolvedCase } from './checkContext.ts';
import { quietOf } from './quiet.ts';
import type { Rule, RuleOutcome } from './rule.ts';
import { branchCurrents, branchName, branchTitle, idsOf, sharedBanks } from './sharedBanks.ts';
import { CHEMISTRY_RATES, limitFor } from './stringRules.ts';
import { ELSEWHERE, isOver, missingField, PASS, Tally, type Verdict } from './tally.ts';
import { amps, apart, list } from './wording.ts';

export const oneOutOverload: Rule = {
  id: 'one-out-overload',
  family: 'strings',
  kinds: ['string'],
  title: 'With one string out the others pass their limits',
  compares:
    'each string of a bank gone in turn (cut out, or its own fuse open): current solved out of each that is left with its maxDischargeA, else with the usual continuous rate of its chemistry, in the case without a starting load in which the bank gives most',
  remedy: 'Cut the load to what the others can give, or add a string.',
  byPractice: false,
  reads: 'steady-cases',
  basisFor: () => CHEMISTRY_RATES,
  run: runOneOut,
};

interface Heaviest {
  readonly one: SolvedCase;
  readonly bank: Bank;
  readonly bankA: number;
}

/** Each bank in the case in which it gives most; of banks with the same first string (a relay joins more to them) the heaviest. */
function runOneOut(context: CheckContext): RuleOutcome {
  const tally = new Tally(oneOutOverload, CHEMISTRY_RATES);
  const heaviest = new Map<string, Heaviest>();
  for (const one of context.steady) {
    for (const bank of sharedBanks(one)) {
      const bankA = bankCurrent(one.point, bank) ?? 0;
      const key = bank.strings[0]!.id;
      if (bankA > (heaviest.get(key)?.bankA ?? 0)) heaviest.set(key, { one, bank, bankA });
    }
  }
  for (const at of heaviest.values()) tally.judge(idsOf(at.bank), verdictsFor(context, at));
  return tally.outcome();
}

/** One verdict for each string that goes. */
function verdictsFor(context: CheckContext, at: Heaviest): readonly Verdict[] {
  const { one, bank } = at;
  const currents = branchCurrents(one, bank);
  if (currents === undefined) return [];
  const without = bank.strings.filter((string) => 'wants' in limitFor(context, string, 'discharge'));
  if (without.length > 0) return without.map((string) => missingField(string, 'maxDischargeA'));
  const limits = bank.branches.map((branch) => dischargeLimit(context, branch));
  // A string that is beyond its limit with all of them in is told as such.
  if (limits.some((limit, k) => limit !== undefined && isOver(currents[k]!, limit.softA))) return [ELSEWHERE];
  return bank.branches.map((lost, gone) => {
    const isBearable = bank.branches.every((_, k) => {
      const limit = limits[k];
      return k === gone || limit === undefined || canTakeAll(currents[k]!, currents[gone]!, limit.softA);
    });
    return isBearable ? PASS : lossVerdict(context, at, lost);
  });
}

/** With a string's whole current on top of its own a string is still within its limit: no solve is needed to know that it holds. */
function canTakeAll(ownA: number, lostA: number, limitA: number): boolean {
  return WITH_SAG * (Math.max(0, ownA) + Math.max(0, lostA)) <= limitA;
}
/** Loads of set power draw more as the volts of a smaller bank sag; by a tenth would be starved already. */
const WITH_SAG = 1.1;

interface BranchLimit {
  readonly softA: number;
  readonly hardA: number;
  readonly what: string;
  /** The string's own electronics cut it out there. */
  readonly cutsOut: boolean;
}

/** The least of what the strings of a branch may give; `undefined` where none is known. */
function dischargeLimit(context: CheckContext, { strings }: Branch): BranchLimit | undefined {
  const known = strings.flatMap((string): readonly BranchLimit[] => {
    const limit = limitFor(context, string, 'discharge');
    return 'wants' in limit ? [] : [{ ...limit, cutsOut: isElectronic(string) }];
  });
  return known.length === 0 ? undefined : known.reduce((least, limit) => (limit.softA < least.softA ? limit : least));
}

function isElectronic(string: StringPart): boolean {
  const isLithium = string.chemistry === 'lfp' || string.chemistry === 'nmc';
  return isLithium && string.maxDischargeA !== undefined && originOf(string, 'maxDischargeA') !== 'default';
}

function lossVerdict(context: CheckContext, at: Heaviest, lost: Branch): Verdict {
  const { one, bank, bankA } = at;
  const remaining = withoutBranch(bank, lost);
  const point = pointWithout(context, one, lost);
  const left = remaining.branches.flatMap((branch) => {
    const limit = dischargeLimit(context, branch);
    return limit === undefined ? [] : [{ branch, limit, currentA: branchCurrent(point, branch) ?? bankA }];
  });
  const over = left.filter(({ currentA, limit }) => isOver(currentA, limit.softA));
  if (over.length === 0) return PASS;
  const worst = over.reduce((most, other) =>
    other.currentA / other.limit.softA > most.currentA / most.limit.softA ? other : most,
  );
  const cutsOut = worst.limit.cutsOut;
  const isGrave = cutsOut || (isOver(worst.currentA, worst.limit.hardA) && feedsCritical(one));
  const [carries, allowed] = apart(worst.currentA, worst.limit.softA, 'A');
  return {
    kind: 'fail',
    severity: isGrave ? 'fix' : 'look',
    case: one.id,
    measured: { value: worst.currentA, unit: 'A' },
    limit: { value: worst.limit.softA, unit: 'A' },
    excess: worst.currentA / worst.limit.softA,
    message: () => {
      const fails = point.outcome !== 'solved' ? `cannot bring the ${amps(bankA)} of the case at all` : undefined;
      const does = `${branchTitle(worst.branch)} ${fails ?? `would give ${carries}`}`;
      const rest = remaining.branches.filter(({ strings }) => strings !== worst.branch.strings).map(branchName);
      const follow = rest.length === 0 ? '' : `, and ${list(rest)} may follow`;
      const cascade = cutsOut ? `: fine until one cuts out, then the rest follow, a cascade` : follow;
      return `With ${branchName(lost)} out, ${does}; ${allowed} is ${worst.limit.what}${cascade}${survives(context, at)}${assumedSources(one.point)}.`;
    },
  };
}

function withoutBranch(bank: Bank, lost: Branch): Bank {
  const branches = bank.branches.filter((branch) => branch !== lost);
  const strings = branches.flatMap((branch) => branch.strings);
  return { branches, strings, capacityAh: branches.reduce((sum, { capacityAh }) => sum + capacityAh, 0) };
}

function pointWithout(
  context: CheckContext,
  { operatingCase, point: { model } }: SolvedCase,
  lost: Branch,
): OperatingPoint {
  const job = withoutStrings(context.job, new Set(idsOf(lost)));
  return operatingPoint({ job, operatingCase, tables: context.tables, model });
}

/** The most that the bank can give so that any one string may go, by the straight line from rest; asked of a failure only. */
function survives(context: CheckContext, { one, bank, bankA }: Heaviest): string {
  const rest = quietOf(context, one);
  if (rest === undefined) return '';
  const limits = limitsOfBank(bank, context.tables.chemistry);
  const all = largestBankA(bank, { rest: rest.point, loaded: one.point, direction: 1 }, limits);
  const each = bank.branches.map((lost) => {
    const remaining = withoutBranch(bank, lost);
    const points = {
      rest: pointWithout(context, rest, lost),
      loaded: pointWithout(context, one, lost),
      direction: 1,
    } as const;
    return largestBankA(remaining, points, limits);
  });
  if (!each.every((a) => a !== null)) return '';
  const whole = all === null ? '' : ` and ${amps(all)} with all in`;
  return `; the largest that survives any one loss is ${amps(Math.min(...each))}${whole}, of the ${amps(bankA)} here`;
}

/** A critical load is on in the case. */
function feedsCritical({ parts }: SolvedCase): boolean {
  return parts.some((part) => part.kind === 'load' && part.on && part.dropClass === 'critical');
}
