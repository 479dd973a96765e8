/** Strings side by side that should be alike, and how many of them. */
import { factsOf } from '../battery/stringSource.ts';
import type { StringPart } from '../job/part.ts';
import type { Bank, Branch } from '../strings/banks.ts';
import type { Basis } from '../tables/status.ts';
import type { CheckContext, SolvedCase } from './checkContext.ts';
import type { Rule, RuleOutcome } from './rule.ts';
import { branchName, idsOf, sharedBanks } from './sharedBanks.ts';
import { GroupVerdicts, isOver, PASS, type Verdict } from './tally.ts';
import { agesApart, agesMissing, chemistriesApart, type Difference, familyOf, toldTogether } from './unlikeStrings.ts';
import { list, shortList, volts } from './wording.ts';

/** Nominal volts of different chemistries for one system differ by up to this (12 V lead, 12.8 V iron phosphate). */
const SAME_SYSTEM = 0.1;
export const tooManyStrings: Rule = {
  id: 'too-many-strings',
  family: 'strings',
  kinds: ['string'],
  title: 'Many strings side by side',
  compares: 'strings joined to the same two poles, those in series counting as one, with maxParallelStrings',
  remedy:
    'Take fewer strings of larger blocks, or give each string its own fuse, switch and equal leads to common bars, and ask the maker how many may stand side by side.',
  byPractice: false,
  reads: 'drawing',
  basisFor: () => ({
    source: 'SRC-PRACTICE',
    text: 'common practice, no published source for a general limit; makers differ: the manual of a tubular gel cell allows at most four strings, protection boards of iron phosphate blocks commonly four, some none',
    status: 'common-practice',
  }),
  run: (context) => eachBank(context, tooManyStrings, countVerdict),
};

export const parallelMix: Rule = {
  id: 'parallel-mix',
  family: 'strings',
  kinds: ['string'],
  title: 'Unlike strings side by side',
  compares:
    'of strings joined to the same two poles: cells in series and nominal volts, chemistry, and the gap between their ages with ageGapYears',
  remedy: 'Put like beside like: the same chemistry, the same volts, and what age asks for by the solved shares.',
  byPractice: false,
  reads: 'drawing',
  basisFor: () => MIX,
  run: (context) => eachBank(context, parallelMix, mixVerdict),
};

const MIX: Basis = {
  source: 'SRC-PRACTICE',
  text: 'common practice, no published source; on ages sources disagree: a maker’s manual lets strings of different age and model stand side by side if joined at full charge, others replace all together, others the worst alone',
  status: 'common-practice',
};

/** Runs a judgement over every bank of two or more branches, in every case. */
function eachBank(
  context: CheckContext,
  rule: Rule,
  judgement: (context: CheckContext, one: SolvedCase, bank: Bank) => Verdict,
): RuleOutcome {
  const verdicts = new GroupVerdicts();
  for (const one of context.cases) {
    for (const bank of sharedBanks(one)) verdicts.add(idsOf(bank), judgement(context, one, bank));
  }
  return verdicts.outcome(rule, rule.basisFor(context));
}

function countVerdict(context: CheckContext, one: SolvedCase, { branches, strings }: Bank): Verdict {
  const most = context.job.settings.maxParallelStrings;
  const count = branches.length;
  if (count <= most) return PASS;
  const lithium = strings.some(({ chemistry }) => familyOf(chemistry) === 'lithium')
    ? '; makers of lithium blocks limit how many their boards bear'
    : '';
  return {
    kind: 'fail',
    severity: 'look',
    case: one.id,
    measured: { value: count, unit: '1' },
    limit: { value: most, unit: '1' },
    excess: count / most,
    message: `${count} strings stand side by side (${shortList(branches.map(branchName))}); more than ${most} is worth a look, since each further one makes even sharing harder${lithium}.`,
  };
}

/** All differences in one finding, ranked by the gravest; a missing age is told where nothing else is the matter. */
function mixVerdict(context: CheckContext, one: SolvedCase, bank: Bank): Verdict {
  const differences = [
    ...voltsApart(context, one, bank),
    ...chemistriesApart(bank.strings, 'side by side'),
    ...agesApart(context, bank.strings, 'side by side'),
  ];
  return differences.length > 0
    ? toldTogether(one, `Strings ${list(bank.branches.map(branchName))} stand side by side`, differences)
    : agesMissing(bank.strings);
}

function voltsApart(context: CheckContext, one: SolvedCase, { branches }: Bank): readonly Difference[] {
  const all = branches.map((branch) => ({
    branch,
    nominalV: sum(branch, (string) => string.blocksInSeries * string.blockNominalV),
    cells: sum(
      branch,
      (string) => factsOf(string, { ambientDegC: one.ambientDegC, tables: context.tables.chemistry }).cells,
    ),
    chemistry: branch.strings[0]!.chemistry,
  }));
  const low = all.reduce((least, other) => (other.nominalV < least.nominalV ? other : least));
  const high = all.reduce((most, other) => (other.nominalV > most.nominalV ? other : most));
  const byChemistry = all.filter(({ chemistry }) => chemistry === high.chemistry);
  const isSame = byChemistry.every(({ cells }) => cells === byChemistry[0]!.cells);
  const apart = (high.nominalV - low.nominalV) / high.nominalV;
  if (isSame && !isOver(apart, SAME_SYSTEM)) return [];
  return [
    {
      severity: 'stop',
      words: `${branchName(low.branch)} is of ${volts(low.nominalV)} (${low.cells} cells in series) and ${branchName(high.branch)} of ${volts(high.nominalV)} (${high.cells} cells)`,
      measured: { value: high.nominalV, unit: 'V' },
      limit: { value: low.nominalV, unit: 'V' },
    },
  ];
}

function sum({ strings }: Branch, figure: (string: StringPart) => number): number {
  return strings.reduce((total, string) => total + figure(string), 0);
}
