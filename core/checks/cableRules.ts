/** Cables against the current that they carry. */

import type { Ampacity } from '../conductor/ampacity.ts';
import type { CablePart } from '../job/part.ts';
import type { Basis } from '../tables/status.ts';
import { sizeText } from '../units/conductorSize.ts';
import type { CheckContext, SolvedCase } from './checkContext.ts';
import { clauseOf } from './clauses.ts';
import { demandsOf } from './continuousCurrent.ts';
import type { Judge, Rule, RuleOutcome } from './rule.ts';
import { ELSEWHERE, isOver, missing, PASS, sizeWanted, Tally, type Verdict, wanted } from './tally.ts';
import { amps, apart, field, list, percent, shortList, titleOf, together, withEdition } from './wording.ts';

export const cableOverloaded: Rule = {
  id: 'cable-overloaded',
  family: 'cable',
  kinds: ['cable'],
  title: 'Cable carries more than it may',
  compares:
    'current solved in each cable with its ampacity after all corrections, in every case without a starting load',
  remedy: 'Use a larger cable, or let it carry less.',
  byPractice: true,
  reads: 'steady-cases',
  basisFor: (judge) => clauseOf('cable-overloaded', judge),
  run: (context) => eachCable(context, cableOverloaded, overloaded),
};

export const cableUnderContinuous: Rule = {
  id: 'cable-under-continuous',
  family: 'cable',
  kinds: ['cable'],
  title: 'Cable has no margin for current that lasts',
  compares:
    'ampacity of each cable before correction with 125 % (or as set) of the current that lasts three hours or more plus the rest; a cable that is overloaded outright is told by the other rule',
  remedy: 'Take the next larger cable, or cut the load that runs for hours.',
  byPractice: true,
  reads: 'steady-cases',
  basisFor: (judge) => withEdition(cableMarginBasis(judge), judge),
  run: (context) => eachCable(context, cableUnderContinuous, withoutMargin),
};

/** NEC 690.8(B) asks for both: 125 % before correction, 100 % after; elsewhere the same sum is trade practice. */
function cableMarginBasis({ practice }: Judge): Basis {
  const clause = practice.clauses.get('cable-under-continuous');
  const { basis } = practice.continuousFactor;
  return clause === undefined ? basis : together(basis, clause);
}

type Judgement = (context: CheckContext, at: { cable: CablePart; one: SolvedCase; ampacity: Ampacity }) => Verdict;

/** Runs a judgement over every cable and steady case; an unsized cable or one without a table row is not done. */
function eachCable(context: CheckContext, rule: Rule, judgement: Judgement): RuleOutcome {
  const tally = new Tally(rule, rule.basisFor(context));
  for (const drawn of context.drawn) {
    if (drawn.kind !== 'cable') continue;
    const verdicts = context.steady.map((one) => {
      const cable = one.part(drawn.id) as CablePart;
      const ampacity = context.ampacityOf(cable, one.ambientDegC);
      if ('missing' in ampacity) return missing(ampacity.missing, ...sizeWanted(cable));
      return judgement(context, { cable, one, ampacity });
    });
    tally.judge([drawn.id], verdicts);
  }
  return tally.outcome();
}

function undetermined(cable: CablePart, one: SolvedCase): Verdict {
  return missing(
    `current in cable ${cable.id} in case ${one.id}: ${one.answer(cable.id).undetermined ?? 'not determined'}`,
  );
}

const overloaded: Judgement = (context, { cable, one, ampacity }) => {
  const { currentA } = one.answer(cable.id);
  if (currentA === null) return undetermined(cable, one);
  const carriedA = Math.abs(currentA);
  if (!isOver(carriedA, ampacity.finalA)) return PASS;
  const excess = carriedA / ampacity.finalA;
  const [carried, allowed] = apart(carriedA, ampacity.finalA, 'A');
  return {
    kind: 'fail',
    severity: isOver(excess, context.job.settings.cableStopFactor) ? 'stop' : 'fix',
    case: one.id,
    measured: { value: carriedA, unit: 'A' },
    limit: { value: ampacity.finalA, unit: 'A' },
    excess,
    message: `${titleOf(cable)}, ${sizeOf(cable)}, carries ${carried}; it may carry ${allowed}${workings(ampacity)}.`,
    basis: ampacityOnRow(context, ampacity),
  };
};

const withoutMargin: Judgement = (context, { cable, one, ampacity }) => {
  const demand = demandsOf(context, one).of(cable.id);
  if (demand === undefined) return undetermined(cable, one);
  const uncorrected = context.uncorrectedAmpacityOf(cable, ampacity);
  if ('missing' in uncorrected) return missing(uncorrected.missing, ...sizeWanted(cable));
  const baseA = uncorrected.finalA;
  if (!isOver(demand.mostA, baseA)) return PASS;
  if (isOver(demand.runningA, ampacity.finalA)) return ELSEWHERE;
  if (!isOver(demand.leastA, baseA)) {
    return missing(
      `${shortList(demand.unmarked.map((load) => field(load, 'continuous')))}: it decides whether cable ${cable.id} has margin enough`,
      ...demand.unmarked.map((load) => wanted(load, 'continuous')),
    );
  }
  const [need, base] = apart(demand.leastA, baseA, 'A');
  const { continuousFactor } = context.job.settings;
  return {
    kind: 'fail',
    // Where only trade practice asks for the margin, a person judges.
    severity: context.practice.continuousFactor.basis.status === 'common-practice' ? 'look' : 'fix',
    case: one.id,
    measured: { value: demand.leastA, unit: 'A' },
    limit: { value: baseA, unit: 'A' },
    excess: demand.leastA / baseA,
    message: `${titleOf(cable)}, ${sizeOf(cable)}, carries ${amps(demand.runningA)}; with ${percent(continuousFactor)} of what lasts for hours it should be good for ${need} before correction, and its table gives ${base}.`,
    basis: together(cableUnderContinuous.basisFor(context), ampacity.basis),
  };
};

function ampacityOnRow(context: CheckContext, ampacity: Ampacity): Pick<Basis, 'text' | 'status'> {
  return together(cableOverloaded.basisFor(context), { text: ampacity.basis.text, status: ampacity.status });
}

function sizeOf(cable: CablePart): string {
  const size = cable.size === undefined ? 'of no stated size' : sizeText(cable.size);
  return cable.inParallel === 1 ? size : `${cable.inParallel} x ${size}`;
}

/** How the table's figure became the limit, and what was filled in. */
function workings(ampacity: Ampacity): string {
  const factors = ampacity.factors
    .filter(({ factor }) => factor !== 1)
    .map(({ name, factor }) => `${factor.toPrecision(3)} for ${name}`);
  const assumed = ampacity.assumed.length === 0 ? '' : `, assuming ${list(ampacity.assumed)}`;
  const steps = factors.length === 0 ? '' : ` (${amps(ampacity.baseA)} in the table, times ${list(factors)})`;
  return `${steps}${assumed}`;
}
