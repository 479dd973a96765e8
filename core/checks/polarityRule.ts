/** Leads the wrong way round, told by the sign of the volts at rest and by the drawing. */
import type { JunctionId, PartId } from '../job/part.ts';
import { nameOf } from '../job/part.ts';
import type { SinglePart } from '../network/wiring.ts';
import { CIRCUIT_LAW } from './bases.ts';
import type { CheckContext, SolvedCase } from './checkContext.ts';
import { quietStates } from './quiet.ts';
import type { Rule, RuleOutcome } from './rule.ts';
import { PASS, Tally, type Verdict } from './tally.ts';
import { list, titleOf, volts } from './wording.ts';

export const polarityCrossed: Rule = {
  id: 'polarity-crossed',
  family: 'wiring',
  kinds: ['load', 'inverter', 'charger', 'array', 'string', 'controller', 'converter'],
  title: 'Plus and minus crossed',
  compares:
    'volts from plus to minus of each load, inverter, charger, controller, converter, array and string, with everything off (where no string reaches: while it runs), with nought; plus and minus of each string and array with those of the others that it is joined to',
  remedy: 'Swap the leads, and check with a meter before anything is closed.',
  byPractice: false,
  reads: 'drawing',
  basisFor: () => CIRCUIT_LAW,
  run: runPolarity,
};

/** Less than this the wrong way round is a dead network's rounding, not a crossed lead. */
const CROSSED_BELOW_V = -1e-3;

function runPolarity(context: CheckContext): RuleOutcome {
  const tally = new Tally(polarityCrossed, CIRCUIT_LAW);
  const atRest = quietStates(context)
    .map(({ rest }) => rest)
    .filter((rest) => rest.isSolved);
  for (const part of context.drawn) {
    const pole = polesToTest(part);
    if (pole.length === 0) continue;
    const verdicts: Verdict[] = pole.flatMap(({ plus, minus, which }) => {
      // At rest the sign tells how the leads lie; only what no string reaches is judged while it runs.
      const resting = signsAt({ part, plus, minus, which }, atRest);
      return resting.length > 0 ? resting : signsAt({ part, plus, minus, which }, context.solved);
    });
    verdicts.push(...againstOthers(context, part));
    tally.judge([part.id], verdicts);
  }
  return tally.outcome();
}

function signsAt(
  { part, plus, minus, which }: { part: SinglePart; plus: JunctionId; minus: JunctionId; which: string },
  answered: readonly SolvedCase[],
): readonly Verdict[] {
  return answered.flatMap((one): readonly Verdict[] => {
    const [high, low] = [one.point.junctions.get(plus), one.point.junctions.get(minus)];
    if (typeof high !== 'number' || typeof low !== 'number') return [];
    const acrossV = high - low;
    if (acrossV >= CROSSED_BELOW_V) return [PASS];
    return [crossed(part, one.id, acrossV, `has ${volts(acrossV)} from plus to minus${which}`)];
  });
}

function polesToTest(part: SinglePart): readonly { plus: JunctionId; minus: JunctionId; which: string }[] {
  switch (part.kind) {
    case 'load':
    case 'inverter':
    case 'charger':
    case 'array':
    case 'string':
      return [{ plus: part.plus, minus: part.minus, which: '' }];
    case 'controller':
    case 'converter':
      return [
        { ...part.from, which: ' at its input' },
        { ...part.to, which: ' at its output' },
      ];
    default:
      return [];
  }
}

function crossed(
  part: SinglePart,
  caseId: string,
  acrossV: number,
  what: string,
  others: readonly PartId[] = [],
): Verdict {
  return {
    kind: 'fail',
    severity: 'stop',
    case: caseId,
    measured: { value: acrossV, unit: 'V' },
    limit: { value: 0, unit: 'V' },
    excess: Number.POSITIVE_INFINITY,
    message: `${titleOf(part)} ${what}: its leads are crossed.`,
    others,
  };
}

/** Strings joined plus to minus and minus to plus; an array joined so to a controller's input. Told by the drawing alone. */
function againstOthers(context: CheckContext, part: SinglePart): readonly Verdict[] {
  if (part.kind !== 'string' && part.kind !== 'array') return [];
  const wrong = context.drawn.filter((other) => {
    if (other.id === part.id) return false;
    if (part.kind === 'string' && other.kind === 'string') return isSwapped(context, part, other);
    if (part.kind === 'array' && other.kind === 'controller') return isSwapped(context, part, other.from);
    return part.kind === 'array' && other.kind === 'array' && isSwapped(context, part, other);
  });
  if (wrong.length === 0) return [];
  const what = `is joined plus to minus and minus to plus with ${list(wrong.map(nameOf))}`;
  const caseId = context.cases[0]?.id ?? '';
  return [
    crossed(
      part,
      caseId,
      0,
      what,
      wrong.map(({ id }) => id),
    ),
  ];
}

type Ends = { readonly plus: JunctionId; readonly minus: JunctionId };
function isSwapped({ nets }: CheckContext, a: Ends, b: Ends): boolean {
  return nets.same(a.plus, b.minus) && nets.same(a.minus, b.plus) && !nets.same(a.plus, a.minus);
}
