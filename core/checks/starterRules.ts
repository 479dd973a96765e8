/** Starter motors: the one load whose cable most books let go unfused, and only while it feeds nothing else. */
import type { CablePart, LoadPart, StringPart } from '../job/part.ts';
import { nameOf } from '../job/part.ts';
import type { PoledPart } from '../network/wiring.ts';
import { isDevice, netsOf, polesOf } from '../network/wiring.ts';
import type { CheckContext } from './checkContext.ts';
import { clauseOf } from './clauses.ts';
import { livePole } from './livePoles.ts';
import type { Rule, RuleOutcome } from './rule.ts';
import { isOver, PASS, Tally, type Verdict } from './tally.ts';
import { shortList, titleOf } from './wording.ts';

export const starterCableShared: Rule = {
  id: 'starter-cable-shared',
  family: 'fuse',
  kinds: ['load'],
  title: 'Unfused starter cable feeds other loads too',
  compares:
    'for each load marked cranking that a string feeds without a fuse or breaker: does any cable on its way in the pole that is not earthed feed a load that is no starter motor',
  remedy: 'Take the other load from a fuse of its own at the battery; the starter cable feeds the starter motor alone.',
  byPractice: true,
  reads: 'drawing',
  basisFor: (judge) => clauseOf('starter-cable-shared', judge),
  run: runShared,
};

function runShared(context: CheckContext): RuleOutcome {
  const tally = new Tally(starterCableShared, starterCableShared.basisFor(context));
  for (const load of context.drawn) {
    if (load.kind !== 'load' || load.cranking !== true) continue;
    const verdicts = unfusedFeeders(context, load).map((string) => sharedVerdict(context, load, string));
    tally.judge([load.id], verdicts);
  }
  return tally.outcome();
}

/** Strings that feed a load with no device in between. */
function unfusedFeeders(context: CheckContext, load: LoadPart): readonly StringPart[] {
  const bare = netsOf(context.drawn, (part) => !isDevice(part));
  return context.drawn.filter(
    (part): part is StringPart =>
      part.kind === 'string' && bare.same(part.plus, load.plus) && bare.same(part.minus, load.minus),
  );
}

function sharedVerdict(context: CheckContext, load: LoadPart, string: StringPart): Verdict {
  const shared = sharedCables(context, load, string);
  const users = [...new Set(shared.flatMap((cable) => cable.users))];
  if (users.length === 0) return PASS;
  return {
    kind: 'fail',
    severity: 'fix',
    case: context.cases[0]?.id ?? '',
    measured: { value: users.length, unit: '1' },
    limit: { value: 0, unit: '1' },
    excess: Number.POSITIVE_INFINITY,
    message: `${titleOf(load)} is fed from ${string.id} without a fuse, and the same cable feeds ${shortList(users.map(nameOf))} too.`,
    others: [...shared.map(({ cable }) => cable.id), ...users.map(({ id }) => id)],
  };
}

interface SharedCable {
  readonly cable: CablePart;
  readonly users: readonly PoledPart[];
}

/** Cables in the live pole without which neither the starter motor nor another load has that pole any more. */
function sharedCables(context: CheckContext, load: LoadPart, string: StringPart): readonly SharedCable[] {
  const pole = livePole(context, load);
  const users = context.drawn
    .flatMap((part) => polesOf(part))
    .filter(({ role, part }) => role === 'sink' && !(part.kind === 'load' && part.cranking === true));
  const way = context.drawn.filter(
    (part): part is CablePart => part.kind === 'cable' && context.nets.same(part.from, load[pole]),
  );
  return way.flatMap((cable) => {
    const without = netsOf(context.drawn, (part) => part !== cable);
    if (without.same(load[pole], string[pole])) return [];
    const cut = users.filter(
      (user) => without.same(user[pole], load[pole]) && context.nets.same(user[pole], string[pole]),
    );
    return cut.length === 0 ? [] : [{ cable, users: cut.map(({ part }) => part) }];
  });
}

/** A starter motor alone on its cable, at no more volts than the book names: it may be fed without a device. */
export function mayGoUnfused(context: CheckContext, part: PoledPart, string: StringPart): boolean {
  if (part.kind !== 'load' || part.cranking !== true) return false;
  const { crankingUnfusedUpToV: limit } = context.practice;
  const nominalV = context.volts.nominalBetween(part.plus, part.minus);
  if (limit !== undefined && (nominalV === undefined || isOver(nominalV, limit.value))) return false;
  return sharedCables(context, part, string).length === 0;
}
