/** Halves and blocks of a string in series against one another. */
import type { SeriesImbalance } from '../strings/answer.ts';
import { chainsOf } from '../strings/readings/chain.ts';
import { seriesOf } from '../strings/readings/series.ts';
import type { Basis } from '../tables/status.ts';
import { assumedSources } from './assumed.ts';
import type { CheckContext } from './checkContext.ts';
import type { Rule, RuleOutcome } from './rule.ts';
import { GroupVerdicts, isOver, PASS, type Verdict } from './tally.ts';
import { apart, list, percent, volts } from './wording.ts';

const MIDPOINT: Basis = {
  source: 'SRC-PRACTICE',
  text: 'midpointWatch and midpointAct, common practice, no published source; two makers print the percentage on bases that differ by a factor of two',
  status: 'common-practice',
};

export const midpointOff: Rule = {
  id: 'midpoint-off',
  family: 'strings',
  kinds: ['string'],
  title: 'Midpoint or block of a string off centre',
  compares:
    'volts by which a midpoint lies off the centre of its string, or a block off the mean, as read and as solved in every case without a starting load, with midpointWatch and midpointAct of the volts of the whole string',
  remedy: 'Read every block at rest and on charge, then equalise, charge the low one alone, or replace it.',
  byPractice: false,
  reads: 'steady-cases',
  basisFor: () => MIDPOINT,
  run: runMidpoint,
};

function runMidpoint(context: CheckContext): RuleOutcome {
  const verdicts = new GroupVerdicts();
  if (!hasPointBetween(context)) return verdicts.outcome(midpointOff, MIDPOINT);
  const { job, tables } = context;
  const found = seriesOf({ job, tables, points: context.steady.map(({ point }) => point) });
  for (const one of found) {
    if (!isSuperseded(one, found)) verdicts.add(one.strings, verdictFor(context, one));
  }
  return verdicts.outcome(midpointOff, MIDPOINT);
}

/** A string with a midpoint, or strings in series, in some case: else there is no point between blocks to read or to solve. */
function hasPointBetween({ drawn, cases }: CheckContext): boolean {
  const hasMidpoint = drawn.some((part) => part.kind === 'string' && part.midpoint !== undefined);
  return hasMidpoint || cases.some(({ parts }) => chainsOf(parts).some(({ strings }) => strings.length > 1));
}

/** What was found and then put right: read again, as left, in the same case. */
function isSuperseded(one: SeriesImbalance, all: readonly SeriesImbalance[]): boolean {
  return (
    one.set === 'as-found' &&
    all.some(
      (other) =>
        other.set === 'as-left' && other.case === one.case && other.strings.join(' ') === one.strings.join(' '),
    )
  );
}

/** How far off centre: of the midpoint half the difference of the halves, of a block its distance from the mean. */
interface Off {
  readonly offV: number;
  readonly words: (off: string, limit: string, share: string) => string;
}

function verdictFor(context: CheckContext, one: SeriesImbalance): Verdict {
  const { midpointWatch, midpointAct } = context.job.settings;
  const { totalV, strings } = one;
  const worst = offsOf(one).reduce((most, other) => (isOver(other.offV, most.offV) ? other : most));
  if (!isOver(worst.offV, midpointWatch * totalV)) return PASS;
  const isAct = isOver(worst.offV, midpointAct * totalV);
  const limitV = (isAct ? midpointAct : midpointWatch) * totalV;
  const [off, limit] = apart(worst.offV, limitV, 'V');
  const base = `${percent(worst.offV / totalV)} of the ${volts(totalV)} across the whole`;
  const caseId = one.case ?? context.cases[0]?.id ?? '';
  const point = context.steady.find(({ id }) => id === caseId)?.point;
  const assumed = one.from === 'solved' && point !== undefined ? assumedSources(point) : '';
  return {
    kind: 'fail',
    severity: isAct ? 'fix' : 'look',
    case: caseId,
    measured: { value: worst.offV, unit: 'V' },
    limit: { value: limitV, unit: 'V' },
    excess: worst.offV / limitV,
    message: `${strings.length > 1 ? 'Strings' : 'String'} ${list(strings)}, ${one.from === 'readings' ? 'as read' : 'as solved'}: ${worst.words(off, limit, base)}${assumed}.`,
  };
}

function offsOf({ midpoint, blocks }: SeriesImbalance): readonly Off[] {
  const furthest = blocks.reduce((most, block) =>
    Math.abs(block.fromMeanV) > Math.abs(most.fromMeanV) ? block : most,
  );
  const ofBlock: Off = {
    offV: Math.abs(furthest.fromMeanV),
    words: (off, limit, base) =>
      `${furthest.name} at ${volts(furthest.voltageV)} is ${off} ${furthest.fromMeanV < 0 ? 'below' : 'above'} the mean, ${base}, more than ${limit}${hidden(midpoint)}`,
  };
  if (midpoint === null) return [ofBlock];
  const { upperV, lowerV, differenceV, onTotal, onMeanHalf } = midpoint;
  const ofMidpoint: Off = {
    offV: Math.abs(differenceV) / 2,
    words: (off, limit, base) =>
      `the upper half holds ${volts(upperV)} and the lower ${volts(lowerV)}, ${volts(Math.abs(differenceV))} apart (${percent(Math.abs(onTotal))} of the total, ${percent(Math.abs(onMeanHalf))} of the mean half), so that the midpoint lies ${off} off centre, ${base}, more than ${limit}`,
  };
  // The halves themselves are blocks where no finer ones are known: then the midpoint tells it.
  return [ofMidpoint, ofBlock];
}

/** Faults in one half that cancel. */
function hidden(midpoint: SeriesImbalance['midpoint']): string {
  return midpoint === null
    ? ''
    : `, while the midpoint is only ${volts(Math.abs(midpoint.differenceV) / 2)} off centre: a good midpoint hides blocks that cancel`;
}
