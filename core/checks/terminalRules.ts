/** Terminals cooler than the conductor on them: the ampacity of hot insulation must not heat a terminal beyond its mark. */
import type { CablePart, JunctionId } from '../job/part.ts';
import { nameOf } from '../job/part.ts';
import type { SinglePart } from '../network/wiring.ts';
import type { CheckContext, SolvedCase } from './checkContext.ts';
import { clauseOf } from './clauses.ts';
import { askOnce } from './flags.ts';
import type { Rule } from './rule.ts';
import { ELSEWHERE, isOver, missing, PASS, sizeWanted, Tally, type Verdict } from './tally.ts';
import { amps, apart, degrees, titleOf, together } from './wording.ts';

/** No terminal of this trade is marked for less than the first; a book without that column starts with one of the others. */
const COOLEST_MARKS_DEG_C = [60, 70, 75];

/** No table's coolest column, uncorrected, is below this share of its hottest, also corrected for cold air; so read from the tables held. */
const LEAST_COLUMN = 0.3;

export const terminalTooCool: Rule = {
  id: 'terminal-too-cool',
  family: 'cable',
  kinds: ['cable'],
  title: 'Cable carries more than its terminals stand',
  compares:
    'largest current solved in each cable with its ampacity in the column of its coolest terminal (terminalDegC of the parts at its ends), before correction',
  remedy: "Size the cable by the temperature of its terminals; the hotter column serves for the air's correction only.",
  byPractice: true,
  reads: 'steady-cases',
  basisFor: (judge) => clauseOf('terminal-too-cool', judge),
  run: (context) => {
    const tally = new Tally(terminalTooCool, terminalTooCool.basisFor(context));
    const marked = markedAt(context);
    const unsaid = new Set<MarkedPart>();
    for (const cable of context.drawn) {
      if (cable.kind !== 'cable') continue;
      const ends = [...new Set([cable.from, cable.to].flatMap((junction) => marked.get(junction) ?? []))];
      if (ends.length === 0) continue;
      const verdicts = context.steady.map((one) =>
        terminalVerdict(context, one, one.part(cable.id) as CablePart, ends),
      );
      if (verdicts.includes(UNSAID)) for (const end of ends) if (end.terminalDegC === undefined) unsaid.add(end);
      if (!verdicts.includes(UNSAID)) tally.judge([cable.id], verdicts);
    }
    askOnce(tally, [...unsaid], 'terminalDegC', ': what temperature its terminals are marked for');
    return tally.outcome();
  },
};

type MarkedPart = Extract<SinglePart, { readonly terminalDegC?: number | undefined }>;
const MARKED: ReadonlySet<SinglePart['kind']> = new Set<MarkedPart['kind']>([
  'fuse',
  'breaker',
  'switch',
  'busbar',
  'load',
  'inverter',
  'charger',
  'controller',
  'converter',
]);

/** The parts with terminals at each junction that has some. */
function markedAt({ meetings }: CheckContext): ReadonlyMap<JunctionId, readonly MarkedPart[]> {
  const found = new Map<JunctionId, readonly MarkedPart[]>();
  for (const [junction, ends] of meetings) {
    const parts = ends.map(({ part }) => part).filter((part): part is MarkedPart => MARKED.has(part.kind));
    if (parts.length > 0) found.set(junction, [...new Set(parts)]);
  }
  return found;
}

/** What the terminals are marked for is not known, and matters. */
const UNSAID: Verdict = missing('terminalDegC');

function terminalVerdict(
  context: CheckContext,
  one: SolvedCase,
  cable: CablePart,
  ends: readonly MarkedPart[],
): Verdict {
  const { currentA, undetermined } = one.answer(cable.id);
  if (currentA === null) {
    return missing(`current in cable ${cable.id} in case ${one.id}: ${undetermined ?? 'not determined'}`);
  }
  const carriedA = Math.abs(currentA);
  const corrected = context.ampacityOf(cable, one.ambientDegC);
  if ('missing' in corrected) return missing(corrected.missing, ...sizeWanted(cable));
  // Too much for the insulation already: told by the rule for overloaded cables.
  if (isOver(carriedA, corrected.finalA)) return ELSEWHERE;
  const marked = ends.filter((end) => end.terminalDegC !== undefined);
  const coolest = Math.min(...marked.map((end) => end.terminalDegC!));
  const limit = marked.length === 0 ? corrected : columnOf(context, cable, coolest, corrected);
  if ('missing' in limit) return missing(limit.missing);
  if (isOver(carriedA, limit.finalA)) {
    const end = marked.find((part) => part.terminalDegC === coolest)!;
    const [carried, allowed] = apart(carriedA, limit.finalA, 'A');
    return {
      kind: 'fail',
      severity: 'fix',
      case: one.id,
      measured: { value: carriedA, unit: 'A' },
      limit: { value: limit.finalA, unit: 'A' },
      excess: carriedA / limit.finalA,
      message: `${titleOf(cable)} carries ${carried}; the terminals of ${nameOf(end)} are marked for ${degrees(coolest)}, at which it may carry ${allowed} (its insulation alone would allow ${amps(corrected.finalA)}).`,
      basis: together(clauseOf('terminal-too-cool', context), { text: limit.basis.text, status: limit.status }),
      others: [end.id],
    };
  }
  if (marked.length === ends.length) return PASS;
  // A cable within the coolest column needs no question.
  if (!isOver(carriedA, LEAST_COLUMN * corrected.finalA)) return PASS;
  const columns = COOLEST_MARKS_DEG_C.map((degC) => columnOf(context, cable, degC, corrected));
  const worst = columns.find((column) => !('missing' in column));
  return worst === undefined || 'missing' in worst || isOver(carriedA, worst.finalA) ? UNSAID : PASS;
}

/** The cable's ampacity in the column of a temperature, in its table's own air: a terminal has no correction. */
function columnOf(
  context: CheckContext,
  cable: CablePart,
  degC: number,
  corrected: Exclude<ReturnType<CheckContext['ampacityOf']>, { readonly missing: string }>,
): ReturnType<CheckContext['ampacityOf']> {
  const column = Math.min(degC, corrected.ratedDegC);
  return context.uncorrectedAmpacityOf({ ...cable, insulationDegC: column }, corrected);
}
