/** Batteries where they stand: held down, away from fuel, and cut off before they are drained. */
import { cellsPerBlock } from '../battery/cells.ts';
import type { StringPart } from '../job/part.ts';
import type { SinglePart } from '../network/wiring.ts';
import { COMMON_PRACTICE } from './bases.ts';
import type { CheckContext } from './checkContext.ts';
import { clauseOf } from './clauses.ts';
import { askOnce, fact, isAsked } from './flags.ts';
import type { Rule, RuleOutcome } from './rule.ts';
import { isUnder, missing, PASS, Tally, type Verdict, wanted } from './tally.ts';
import { apart, titleOf, together } from './wording.ts';

export const batteryLoose: Rule = {
  id: 'battery-loose',
  family: 'battery',
  kinds: ['string'],
  title: 'Battery not held down',
  compares: 'heldDown of each string: is it strapped or boxed so that it cannot move',
  remedy: 'Strap or box it.',
  byPractice: true,
  reads: 'drawing',
  basisFor: (judge) => clauseOf('battery-loose', judge),
  run: (context) =>
    byFlag(context, batteryLoose, {
      field: 'heldDown',
      good: true,
      message: (string) => `${titleOf(string)} is not held down: thrown over, it tears its leads and spills.`,
    }),
};

export const batteryByFuel: Rule = {
  id: 'battery-by-fuel',
  family: 'battery',
  kinds: ['string'],
  title: 'Battery beside fuel',
  compares:
    'besideFuel of each string: is it right above, below or beside a tank, filter or fitting of fuel, unshielded',
  remedy: 'Move it, or shield the metal parts of the fuel line with insulating material.',
  byPractice: true,
  reads: 'drawing',
  basisFor: (judge) => clauseOf('battery-by-fuel', judge),
  run: (context) =>
    byFlag(context, batteryByFuel, {
      field: 'besideFuel',
      good: false,
      message: (string) => `${titleOf(string)} stands beside a tank, filter or fitting of fuel.`,
    }),
};

interface Flag {
  readonly field: 'heldDown' | 'besideFuel';
  readonly good: boolean;
  readonly message: (string: StringPart) => string;
}

/** Where the book has a clause the figure is asked for and a bad one is to be put right; else a bad one is to be looked at. */
function byFlag(context: CheckContext, rule: Rule, { field, good, message }: Flag): RuleOutcome {
  const tally = new Tally(rule, rule.basisFor(context));
  const asks = isAsked(context, rule.id);
  const strings = context.drawn.filter((part): part is StringPart => part.kind === 'string');
  for (const string of strings) {
    const said = string[field];
    if (said === undefined) continue;
    tally.judge([string.id], [said === good ? PASS : fact(context, asks ? 'fix' : 'look', message(string))]);
  }
  const unsaid = strings.filter((string) => string[field] === undefined);
  if (asks) askOnce(tally, unsaid, field);
  return tally.outcome();
}

export const noLowCutoff: Rule = {
  id: 'no-low-cutoff',
  family: 'battery',
  kinds: ['string'],
  title: 'Nothing cuts the loads off before the battery is drained',
  compares:
    'lowCutoffV of each string that feeds loads with the volts at which its chemistry is empty; inverters with a cut-off of their own need none',
  remedy: 'Add a cut-off set above the volts at which the battery is damaged.',
  byPractice: false,
  reads: 'drawing',
  basisFor: () => COMMON_PRACTICE,
  run: (context) => {
    const tally = new Tally(noLowCutoff, COMMON_PRACTICE);
    const unsaid: StringPart[] = [];
    const feeds = feedsOf(context);
    for (const string of context.drawn) {
      if (string.kind !== 'string') continue;
      const drains = context.drawn.filter((part) => isDrain(part) && feeds(string, part));
      if (drains.length === 0) continue;
      if (string.lowCutoffV !== undefined)
        tally.judge([string.id], [cutoffVerdict(context, string, string.lowCutoffV)]);
      else if (drains.every((part) => part.kind === 'inverter' && part.cutoffV !== undefined))
        tally.judge([string.id], [PASS]);
      else unsaid.push(string);
    }
    askOnce(tally, unsaid, 'lowCutoffV', ': what cuts the loads off, and at how many volts');
    return tally.outcome();
  },
};

type Drain = Extract<SinglePart, { readonly kind: 'load' | 'inverter' }>;

/** A starter motor turns for seconds, by hand. */
function isDrain(part: SinglePart): part is Drain {
  return part.kind === 'inverter' || (part.kind === 'load' && part.cranking !== true);
}

/** Does a string lie on a way from the minus of a consumer up to its plus, from string to string? */
function feedsOf({ drawn, nets }: CheckContext): (string: StringPart, drain: Drain) => boolean {
  const above = new Map<number, number[]>();
  for (const part of drawn) {
    if (part.kind !== 'string') continue;
    const minus = nets.of(part.minus)!;
    const places = [part.midpoint ?? part.plus, part.plus].map((place) => nets.of(place)!);
    above.set(minus, [...(above.get(minus) ?? []), ...places]);
    if (part.midpoint !== undefined) above.set(places[0]!, [...(above.get(places[0]!) ?? []), places[1]!]);
  }
  const known = new Map<number, ReadonlySet<number>>();
  const upFrom = (start: number): ReadonlySet<number> => {
    let reached = known.get(start);
    if (reached === undefined) {
      const found = new Set([start]);
      for (const net of found) for (const next of above.get(net) ?? []) found.add(next);
      known.set(start, found);
      reached = found;
    }
    return reached;
  };
  return (string, drain) => {
    const [low, high] = [nets.of(drain.minus)!, nets.of(drain.plus)!];
    const tops = [string.midpoint, string.plus].flatMap((place) => (place === undefined ? [] : [nets.of(place)!]));
    return upFrom(low).has(nets.of(string.minus)!) && tops.some((top) => upFrom(top).has(high));
  };
}

function cutoffVerdict(context: CheckContext, string: StringPart, cutoffV: number): Verdict {
  const end = context.tables.chemistry.limits[string.chemistry].get('endV');
  const count = cellsPerBlock(string.chemistry, string.blockNominalV, context.tables.chemistry);
  if (!count.known) return missing(`${count.missing} (string ${string.id})`, wanted(string, 'blockNominalV'));
  if (end === undefined) return missing(`the volts at which ${string.chemistry} is empty (string ${string.id})`);
  const emptyV = end.low * count.cells * string.blocksInSeries;
  if (!isUnder(cutoffV, emptyV)) return PASS;
  const [cut, empty] = apart(cutoffV, emptyV, 'V');
  return {
    kind: 'fail',
    severity: 'look',
    case: context.cases[0]?.id ?? '',
    measured: { value: cutoffV, unit: 'V' },
    limit: { value: emptyV, unit: 'V' },
    excess: emptyV / cutoffV,
    message: `${titleOf(string)} is cut off at ${cut}; ${string.chemistry} is empty at ${empty} even under a heavy load, so it can be drained to harm.`,
    basis: together(COMMON_PRACTICE, end.basis),
  };
}
