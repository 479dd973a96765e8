/** Cables that lie together and warm each other, where no factor of the book has been applied. */

import { ratingOf } from '../conductor/ampacity.ts';
import type { CablePart } from '../job/part.ts';
import { sizeText } from '../units/conductorSize.ts';
import type { CheckContext, SolvedCase } from './checkContext.ts';
import { clauseOf } from './clauses.ts';
import type { Rule } from './rule.ts';
import { ELSEWHERE, isOver, missing, missingField, PASS, sizeWanted, Tally, type Verdict } from './tally.ts';
import { amps, apart, titleOf, together } from './wording.ts';

/**
 * Where the book's grouping factor binds, it is in the ampacity already and the rule for overloaded cables judges it. Left are
 * bundles for which nobody said how many cables lie in them, and those for which the book has a factor that does not bind.
 */
export const tightBundle: Rule = {
  id: 'tight-bundle',
  family: 'cable',
  kinds: ['cable'],
  title: 'Cables that lie together without a grouping factor',
  compares:
    "current solved in each cable that lies with others with its ampacity times the book's grouping factor, also where the factor does not bind (boat law below 50 V)",
  remedy: 'Apply the grouping factor (a larger cable), or spread the cables.',
  byPractice: true,
  reads: 'steady-cases',
  basisFor: (judge) => clauseOf('tight-bundle', judge),
  run: (context) => {
    const tally = new Tally(tightBundle, tightBundle.basisFor(context));
    for (const cable of context.drawn) {
      if (cable.kind !== 'cable' || !liesWithOthers(cable)) continue;
      tally.judge(
        [cable.id],
        context.steady.map((one) => bundleVerdict(context, one.part(cable.id) as CablePart, one)),
      );
    }
    return tally.outcome();
  },
};

function liesWithOthers({ run, loadedConductors }: CablePart): boolean {
  return run === 'bundle' || (loadedConductors !== undefined && loadedConductors > 2);
}

function bundleVerdict(context: CheckContext, cable: CablePart, one: SolvedCase): Verdict {
  if (cable.loadedConductors === undefined) {
    return missingField(cable, 'loadedConductors', ': how many that carry current lie together');
  }
  const ampacity = context.ampacityOf(cable, one.ambientDegC);
  const { practice } = context.job;
  const systemV = context.volts.nominalAt(cable.from);
  const tables = context.tables.conductors;
  const rating = ratingOf(cable, { practice, ambientDegC: one.ambientDegC, tables, systemV });
  if ('missing' in ampacity) return missing(ampacity.missing, ...sizeWanted(cable));
  if ('missing' in rating) return missing(rating.missing, ...sizeWanted(cable));
  const { currentA, undetermined } = one.answer(cable.id);
  if (currentA === null) {
    return missing(`current in cable ${cable.id} in case ${one.id}: ${undetermined ?? 'not determined'}`);
  }
  const carriedA = Math.abs(currentA);
  if (isOver(carriedA, ampacity.finalA)) return ELSEWHERE;
  const applied = ampacity.factors.find(({ kind }) => kind === 'bundle')?.factor ?? 1;
  const groupedA = (ampacity.finalA / applied) * rating.neighbours;
  if (!isOver(carriedA, groupedA)) return PASS;
  const [carried, grouped] = apart(carriedA, groupedA, 'A');
  const size = cable.size === undefined ? '' : ` (${sizeText(cable.size)})`;
  return {
    kind: 'fail',
    severity: 'look',
    case: one.id,
    measured: { value: carriedA, unit: 'A' },
    limit: { value: groupedA, unit: 'A' },
    excess: carriedA / groupedA,
    message: `${titleOf(cable)}${size} lies with others, ${cable.loadedConductors} loaded conductors together, and carries ${carried}; with the grouping factor of ${rating.neighbours}, which does not bind here, it would be ${grouped} (${amps(ampacity.finalA)} without).`,
    basis: together(tightBundle.basisFor(context), { text: ampacity.basis.text, status: ampacity.status }),
  };
}
