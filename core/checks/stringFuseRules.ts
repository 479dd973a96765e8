/** Strings side by side that have no fuse or breaker of their own. */
import type { Basis } from '../tables/status.ts';
import { ownDevices } from './branchDevices.ts';
import type { CheckContext, SolvedCase } from './checkContext.ts';
import type { Rule, RuleOutcome } from './rule.ts';
import { branchName, idsOf, sharedBanks } from './sharedBanks.ts';
import { GroupVerdicts, PASS, type Verdict } from './tally.ts';
import { list, shortList } from './wording.ts';

/** From so many side by side the others together can burn the one that fails. */
const STOP_FROM = 3;

export const stringUnfused: Rule = {
  id: 'string-unfused',
  family: 'strings',
  kinds: ['string'],
  title: 'String beside others without a fuse or breaker of its own',
  compares:
    'of strings joined to the same two poles: has each a fuse or breaker that carries its current alone; three or more: not to be energised without, two: to be looked at',
  remedy: 'Fit one fuse for each string, right at its post, sized for its cable and its share of the current.',
  byPractice: false,
  reads: 'drawing',
  basisFor: () => STRING_FUSES,
  run: runStringUnfused,
};

const STRING_FUSES: Basis = {
  source: 'SRC-PRACTICE',
  text: 'common practice for batteries; NEC (NFPA 70) 240.21 by principle; strings of solar modules have rules of their own',
  status: 'common-practice',
};

function runStringUnfused(context: CheckContext): RuleOutcome {
  const verdicts = new GroupVerdicts();
  for (const one of context.cases) {
    for (const bank of sharedBanks(one)) verdicts.add(idsOf(bank), bankVerdict(context, one, bank));
  }
  return verdicts.outcome(stringUnfused, STRING_FUSES);
}

function bankVerdict(context: CheckContext, one: SolvedCase, bank: ReturnType<typeof sharedBanks>[number]): Verdict {
  const without = bank.branches.filter((branch) => ownDevices(context, bank, branch).length === 0);
  if (without.length === 0) return PASS;
  const count = bank.branches.length;
  const others = count === 2 ? 'the other' : `the ${count - 1} others`;
  const verb = without.length === 1 ? 'has' : 'have';
  return {
    kind: 'fail',
    severity: count >= STOP_FROM ? 'stop' : 'look',
    case: one.id,
    measured: { value: without.length, unit: '1' },
    limit: { value: 0, unit: '1' },
    excess: count / (STOP_FROM - 1),
    message: `${count} strings stand side by side (${shortList(bank.branches.map(branchName))}); ${list(without.map(branchName))} ${verb} no fuse or breaker alone: if one fails inside, ${others} feed it through nothing of its own.`,
  };
}
