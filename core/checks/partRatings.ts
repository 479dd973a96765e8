/** Devices, switches, bars, shunts and diodes against the volts and the current that they are made for. */
import type { BusbarPart, DiodePart, ShuntPart, SwitchPart } from '../job/part.ts';
import { isOpen, joined } from '../network/wiring.ts';
import { entered, PART_RATING, VOLTS_RATING } from './bases.ts';
import type { CheckContext, SolvedCase } from './checkContext.ts';
import type { Rule, RuleOutcome } from './rule.ts';
import { isOver, missing, missingField, PASS, Tally, type Verdict } from './tally.ts';
import { amps, apart, titleOf, together } from './wording.ts';

export const voltsRatingLow: Rule = {
  id: 'volts-rating-low',
  family: 'rating',
  kinds: ['fuse', 'breaker', 'switch', 'busbar'],
  title: 'Part not rated for the highest volts',
  compares:
    'ratingV of each fuse, breaker, switch and busbar with the highest volts on its net: charge set-points, solved volts, and for an array its open-circuit volts in the coldest air',
  remedy: 'Use a part rated for direct current at or above the highest charging (or cold array) volts.',
  byPractice: false,
  reads: 'every-case',
  basisFor: () => VOLTS_RATING,
  run: runVoltsRating,
};

function runVoltsRating(context: CheckContext): RuleOutcome {
  const tally = new Tally(voltsRatingLow, VOLTS_RATING);
  for (const part of context.drawn) {
    if (part.kind !== 'fuse' && part.kind !== 'breaker' && part.kind !== 'switch' && part.kind !== 'busbar') continue;
    const highest = context.volts.highestAt(joined(part)[0]!);
    if (part.ratingV === undefined) {
      tally.judge([part.id], [missingField(part, 'ratingV')]);
    } else if (highest === undefined) {
      tally.judge(
        [part.id],
        [missing(`a source on the net of ${part.kind} ${part.id}: its highest volts are not known`)],
      );
    } else if (isOver(highest.volts, part.ratingV)) {
      const [found, rated] = apart(highest.volts, part.ratingV, 'V');
      tally.judge(
        [part.id],
        [
          {
            kind: 'fail',
            severity: 'stop',
            case: highest.case ?? context.cases[0]?.id ?? '',
            measured: { value: highest.volts, unit: 'V' },
            limit: { value: part.ratingV, unit: 'V' },
            excess: highest.volts / part.ratingV,
            message: `${titleOf(part)} is rated ${rated} and can have ${found} across it (${highest.from}).`,
          },
        ],
      );
    } else {
      tally.judge(
        [part.id],
        [highest.missing === undefined ? PASS : missing(highest.missing.words, highest.missing.field)],
      );
    }
  }
  return tally.outcome();
}

export const ratingUnderCurrent: Rule = {
  id: 'rating-under-current',
  family: 'rating',
  kinds: ['switch', 'busbar', 'diode'],
  title: 'Switch, busbar or diode carries more than its rating',
  compares:
    'ratingA of each switch, busbar and diode with the current solved in it (of a busbar: in its fullest segment), in every case without a starting load',
  remedy: 'Use a part rated for the current, or place feeds and taps so that no part carries their sum.',
  byPractice: false,
  reads: 'steady-cases',
  basisFor: () => PART_RATING,
  run: (context) =>
    eachRated(context, ratingUnderCurrent, ['switch', 'busbar', 'diode'], (part, one) => {
      const carriedA = currentIn(part, one);
      if (typeof carriedA !== 'number') return missing(carriedA.missing);
      if (part.ratingA === undefined) return missingField(part, 'ratingA');
      return againstRating({ part, one, carriedA, ratingA: part.ratingA });
    }),
};

/** Trade practice: a shunt is used for long at no more than two thirds of its rating, since it warms and drifts. */
const SHUNT_CONTINUOUS = 2 / 3;

export const shuntSmall: Rule = {
  id: 'shunt-small',
  family: 'rating',
  kinds: ['shunt'],
  title: 'Shunt too small for its current',
  compares:
    'current solved in each shunt with two thirds of its ratingA (to be looked at) and with its ratingA (to be fixed)',
  remedy: 'Use the next larger shunt.',
  byPractice: false,
  reads: 'steady-cases',
  basisFor: () => ({
    source: 'SRC-PRACTICE',
    text: 'shunts at no more than two thirds of their rating for long, common practice, no source',
    status: 'common-practice',
  }),
  run: (context) =>
    eachRated(context, shuntSmall, ['shunt'], (part, one) => {
      const carriedA = currentIn(part, one);
      if (typeof carriedA !== 'number') return missing(carriedA.missing);
      const ratingA = part.ratingA as number;
      if (isOver(carriedA, ratingA)) return againstRating({ part, one, carriedA, ratingA });
      const lastingA = SHUNT_CONTINUOUS * ratingA;
      if (!isOver(carriedA, lastingA)) return PASS;
      const [carried, lasting] = apart(carriedA, lastingA, 'A');
      return {
        kind: 'fail',
        severity: 'look',
        case: one.id,
        measured: { value: carriedA, unit: 'A' },
        limit: { value: lastingA, unit: 'A' },
        excess: carriedA / lastingA,
        message: `${titleOf(part)}, rated ${amps(ratingA)}, carries ${carried}; for long it should carry ${lasting} at most.`,
      };
    }),
};

type RatedPart = SwitchPart | BusbarPart | DiodePart | ShuntPart;

function eachRated(
  context: CheckContext,
  rule: Rule,
  kinds: readonly RatedPart['kind'][],
  judgement: (part: RatedPart, one: SolvedCase) => Verdict,
): RuleOutcome {
  const tally = new Tally(rule, rule.basisFor(context));
  for (const drawn of context.drawn) {
    if (!kinds.some((kind) => kind === drawn.kind)) continue;
    const verdicts = context.steady.flatMap((one) => {
      const part = one.part(drawn.id) as RatedPart;
      return isOpen(part) ? [] : [judgement(part, one)];
    });
    tally.judge([drawn.id], verdicts);
  }
  return tally.outcome();
}

/** Current in a part; the fullest segment of a busbar. */
function currentIn(part: RatedPart, one: SolvedCase): number | { readonly missing: string } {
  const answer = one.answer(part.id);
  if (answer.currentA !== null) return Math.abs(answer.currentA);
  return {
    missing: `current in ${part.kind} ${part.id} in case ${one.id}: ${answer.undetermined ?? 'not determined'}`,
  };
}

function againstRating(at: {
  readonly part: RatedPart;
  readonly one: SolvedCase;
  readonly carriedA: number;
  readonly ratingA: number;
}): Verdict {
  const { part, one, carriedA, ratingA } = at;
  if (!isOver(carriedA, ratingA)) return PASS;
  const [carried, rated] = apart(carriedA, ratingA, 'A');
  return {
    kind: 'fail',
    severity: 'fix',
    case: one.id,
    measured: { value: carriedA, unit: 'A' },
    limit: { value: ratingA, unit: 'A' },
    excess: carriedA / ratingA,
    message: `${titleOf(part)} is rated ${rated} and carries ${carried}${part.kind === 'busbar' ? ' in its fullest segment' : ''}.`,
    basis: together(PART_RATING, entered(part, 'ratingA')),
  };
}
