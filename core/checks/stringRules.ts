/** Battery strings against the current that they may give and take. */

import type { Banded } from '../battery/banded.ts';
import { currentLimits } from '../battery/limits.ts';
import type { StringPart } from '../job/part.ts';
import type { Basis } from '../tables/status.ts';
import { assumedSources } from './assumed.ts';
import { COMMON_PRACTICE, entered } from './bases.ts';
import { bulkChargeShares } from './chargeShare.ts';
import type { CheckContext, SolvedCase } from './checkContext.ts';
import type { Rule, RuleOutcome } from './rule.ts';
import { isOver, missing, missingField, PASS, Tally, type Verdict } from './tally.ts';
import { amps, apart, titleOf } from './wording.ts';

export const CHEMISTRY_RATES: Basis = {
  source: 'SRC-BAT-LIMIT-PRACTICE',
  text: "the string's own limit where entered, else the usual rate of its chemistry",
  status: 'common-practice',
};

export const stringDischargeHigh: Rule = {
  id: 'string-discharge-high',
  family: 'battery',
  kinds: ['string'],
  title: 'String gives more than it may',
  compares:
    'current solved out of each string with its maxDischargeA, else with the usual continuous rate of its chemistry, in every case without a starting load',
  remedy: 'Add strings, cut the load, or raise the bank voltage.',
  byPractice: false,
  reads: 'steady-cases',
  basisFor: () => CHEMISTRY_RATES,
  run: (context) => eachString(context, stringDischargeHigh, dischargeVerdict),
};

export const stringChargeHigh: Rule = {
  id: 'string-charge-high',
  family: 'battery',
  kinds: ['string'],
  title: 'String takes more charge current than it may',
  compares:
    'current solved into each string with its maxChargeA, else with the largest usual charge rate of its chemistry, in every case without a starting load',
  remedy:
    'Limit the charger, add capacity, or even out the strings: the one with the least resistance or charge takes the most.',
  byPractice: false,
  reads: 'steady-cases',
  basisFor: () => CHEMISTRY_RATES,
  run: (context) => eachString(context, stringChargeHigh, chargeVerdict),
};

export const chargeTooStrong: Rule = {
  id: 'charge-too-strong',
  family: 'charging',
  kinds: ['string'],
  title: 'Chargers together too strong for the strings',
  compares:
    'for each string its share by capacity of what all chargers that are on can give at once while no load takes any, with its maxChargeA, else with the largest usual charge rate of its chemistry',
  remedy: 'Limit the charger current, or add capacity.',
  byPractice: false,
  reads: 'drawing',
  basisFor: () => CHEMISTRY_RATES,
  run: runChargeTooStrong,
};

/** A limit on a string's current: above `softA` to be looked at, above `hardA` to be fixed. */
interface CurrentLimit {
  readonly softA: number;
  readonly hardA: number;
  readonly what: string;
  readonly basis: Basis;
}

export function limitFor(
  context: CheckContext,
  string: StringPart,
  direction: 'charge' | 'discharge',
): CurrentLimit | { readonly wants: 'maxChargeA' | 'maxDischargeA' } {
  const name = direction === 'charge' ? 'maxChargeA' : 'maxDischargeA';
  const own = string[name];
  if (own !== undefined) return { softA: own, hardA: own, what: `its ${name}`, basis: entered(string, name) };
  const usual = currentLimits(string, context.tables.chemistry);
  const rate: Banded | undefined = direction === 'charge' ? usual.chargeMaxA : usual.dischargeA;
  if (rate === undefined) return { wants: name };
  const what = `usual for ${string.chemistry} of ${string.capacityAh} Ah`;
  return { softA: rate.value, hardA: rate.high, what, basis: rate.basis };
}

type Judgement = (context: CheckContext, string: StringPart, one: SolvedCase) => Verdict;

function eachString(context: CheckContext, rule: Rule, judgement: Judgement): RuleOutcome {
  const tally = new Tally(rule, CHEMISTRY_RATES);
  for (const drawn of context.drawn) {
    if (drawn.kind !== 'string') continue;
    const verdicts = context.steady.map((one) => judgement(context, one.part(drawn.id) as StringPart, one));
    tally.judge([drawn.id], verdicts);
  }
  return tally.outcome();
}

const dischargeVerdict: Judgement = (context, string, one) => {
  const { currentA } = one.answer(string.id);
  if (currentA === null) return missing(`current of string ${string.id} in case ${one.id}`);
  const limit = limitFor(context, string, 'discharge');
  if ('wants' in limit) return missingField(string, limit.wants);
  return currentVerdict({ string, one, flowA: Math.max(0, currentA), verb: 'gives' }, limit);
};

const chargeVerdict: Judgement = (context, string, one) => {
  const { currentA } = one.answer(string.id);
  if (currentA === null) return missing(`current of string ${string.id} in case ${one.id}`);
  const limit = limitFor(context, string, 'charge');
  if ('wants' in limit) return missingField(string, limit.wants);
  return currentVerdict({ string, one, flowA: Math.max(0, -currentA), verb: 'takes' }, limit);
};

function currentVerdict(
  at: { readonly string: StringPart; readonly one: SolvedCase; readonly flowA: number; readonly verb: string },
  limit: CurrentLimit,
): Verdict {
  const { string, one, flowA } = at;
  if (!isOver(flowA, limit.softA)) return PASS;
  const [flow, allowed] = apart(flowA, limit.softA, 'A');
  return {
    kind: 'fail',
    severity: isOver(flowA, limit.hardA) ? 'fix' : 'look',
    case: one.id,
    measured: { value: flowA, unit: 'A' },
    limit: { value: limit.softA, unit: 'A' },
    excess: flowA / limit.softA,
    message: `${titleOf(string)} ${at.verb} ${flow}; ${allowed} is ${limit.what}${assumedSources(one.point)}.`,
    basis: limit.basis,
  };
}

function runChargeTooStrong(context: CheckContext): RuleOutcome {
  const tally = new Tally(chargeTooStrong, COMMON_PRACTICE);
  const verdicts = new Map<StringPart['id'], Verdict[]>();
  for (const one of context.cases) {
    for (const share of bulkChargeShares(context, one)) {
      const { string } = share;
      const verdict =
        'missing' in share ? missing(share.missing) : shareVerdict(share, one, limitFor(context, string, 'charge'));
      verdicts.set(string.id, [...(verdicts.get(string.id) ?? []), verdict]);
    }
  }
  for (const [id, found] of verdicts) tally.judge([id], found);
  return tally.outcome();
}

type BulkShare = Extract<ReturnType<typeof bulkChargeShares>[number], { shareA: number }>;

function shareVerdict(share: BulkShare, one: SolvedCase, limit: ReturnType<typeof limitFor>): Verdict {
  const { string, shareA, totalA, chargers } = share;
  if ('wants' in limit) return missingField(string, limit.wants);
  if (!isOver(shareA, limit.softA)) return PASS;
  const [found, allowed] = apart(shareA, limit.softA, 'A');
  const names = chargers.map(({ id }) => id).join(', ');
  return {
    kind: 'fail',
    severity: isOver(shareA, limit.hardA) ? 'fix' : 'look',
    case: one.id,
    measured: { value: shareA, unit: 'A' },
    limit: { value: limit.softA, unit: 'A' },
    excess: shareA / limit.softA,
    message: `${titleOf(string)} would take ${found} of the ${amps(totalA)} that ${names} can give${chargers.length > 1 ? ' together' : ''}; ${allowed} is ${limit.what}.`,
    basis: limit.basis,
    others: chargers.map(({ id }) => id),
  };
}
