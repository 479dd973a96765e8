/** Strings in series, which should be alike in everything. */
import type { StringPart } from '../job/part.ts';
import { chainsOf } from '../strings/readings/chain.ts';
import type { CheckContext, SolvedCase } from './checkContext.ts';
import type { Rule, RuleOutcome } from './rule.ts';
import { GroupVerdicts, isOver, type Verdict } from './tally.ts';
import { agesApart, agesMissing, chemistriesApart, type Difference, toldTogether } from './unlikeStrings.ts';
import { list, percent } from './wording.ts';

/** Capacities in series further apart than this, as a fraction of the larger, are to be put right. Common practice, no source. */
const CAPACITY_APART = 0.1;
/** States of charge in series further apart than this are worth a look. Common practice, no source. */
const CHARGE_APART = 0.1;

export const seriesMismatch: Rule = {
  id: 'series-mismatch',
  family: 'strings',
  kinds: ['string'],
  title: 'Unlike blocks in series',
  compares:
    'of strings in series with one another: chemistry, capacity, the gap between their ages with ageGapYears, and their states of charge',
  remedy:
    'In series use blocks of the same make, capacity, age and charge: the least of them is empty first and full first.',
  byPractice: false,
  reads: 'drawing',
  basisFor: () => ({
    source: 'SRC-PRACTICE',
    text: 'a battery maker’s manual: within a string all blocks must be the same; the thresholds are common practice, no source',
    status: 'common-practice',
  }),
  run: runSeriesMismatch,
};

function runSeriesMismatch(context: CheckContext): RuleOutcome {
  const verdicts = new GroupVerdicts();
  for (const one of context.cases) {
    for (const strings of seriesIn(one)) {
      const ids = strings.map(({ id }) => id);
      verdicts.add(ids, seriesVerdict(context, one, strings));
    }
  }
  return verdicts.outcome(seriesMismatch, seriesMismatch.basisFor(context));
}

/** Strings in series, from minus to plus, whatever is tapped between them. */
function seriesIn(one: SolvedCase): readonly (readonly StringPart[])[] {
  return chainsOf(one.parts).flatMap(({ strings }) => (strings.length > 1 ? [strings] : []));
}

function seriesVerdict(context: CheckContext, one: SolvedCase, strings: readonly StringPart[]): Verdict {
  const differences = [
    ...chemistriesApart(strings, 'in series'),
    ...capacitiesApart(strings),
    ...chargesApart(strings),
    ...agesApart(context, strings, 'in series'),
  ];
  return differences.length > 0
    ? toldTogether(one, `Strings ${list(strings.map(({ id }) => id))} are in series`, differences)
    : agesMissing(strings);
}

function capacitiesApart(strings: readonly StringPart[]): readonly Difference[] {
  const low = strings.reduce((least, other) => (other.capacityAh < least.capacityAh ? other : least));
  const high = strings.reduce((most, other) => (other.capacityAh > most.capacityAh ? other : most));
  if (!isOver(high.capacityAh, low.capacityAh)) return [];
  const apart = 1 - low.capacityAh / high.capacityAh;
  return [
    {
      severity: isOver(apart, CAPACITY_APART) ? 'fix' : 'look',
      words: `${low.id} holds ${low.capacityAh} Ah and ${high.id} ${high.capacityAh} Ah, so ${low.id} is empty first and full first`,
      measured: { value: high.capacityAh, unit: 'Ah' },
      limit: { value: low.capacityAh, unit: 'Ah' },
    },
  ];
}

function chargesApart(strings: readonly StringPart[]): readonly Difference[] {
  const low = strings.reduce((least, other) => (other.stateOfCharge < least.stateOfCharge ? other : least));
  const high = strings.reduce((most, other) => (other.stateOfCharge > most.stateOfCharge ? other : most));
  const gap = high.stateOfCharge - low.stateOfCharge;
  if (!isOver(gap, CHARGE_APART)) return [];
  return [
    {
      severity: 'look',
      words: `${low.id} is at ${percent(low.stateOfCharge)} of its charge and ${high.id} at ${percent(high.stateOfCharge)}, and charging both in series cannot even that out`,
      measured: { value: gap, unit: '1' },
      limit: { value: CHARGE_APART, unit: '1' },
    },
  ];
}
