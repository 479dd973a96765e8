/** Switches that isolate sources: is there one, and can it break its load; and breakers that close again by themselves. */
import type { BreakerPart, StringPart, SwitchPart } from '../job/part.ts';
import { nameOf } from '../job/part.ts';
import type { Nets, Poles, SinglePart } from '../network/wiring.ts';
import { netsOf, polesOf } from '../network/wiring.ts';
import type { CheckContext } from './checkContext.ts';
import { clauseOf } from './clauses.ts';
import { livePole } from './livePoles.ts';
import type { Rule, RuleOutcome } from './rule.ts';
import { ELSEWHERE, missing, missingField, PASS, Tally, type Verdict, wanted } from './tally.ts';
import { amps, list, shortList, titleOf } from './wording.ts';

const NONE_FOUND = {
  measured: { value: 0, unit: '1' },
  limit: { value: 1, unit: '1' },
  excess: Number.POSITIVE_INFINITY,
} as const;

export const sourceWithoutIsolator: Rule = {
  id: 'source-without-isolator',
  family: 'fuse',
  kinds: ['string', 'array', 'charger'],
  title: 'Source without a switch that isolates it',
  compares:
    'for each string, array and charger: does a switch that breaks its load, or a breaker, in the pole that is not earthed lie between it and everything else (of a charger: the strings); critical loads may stay joined to strings',
  remedy: 'Add a marked switch rated to break its direct current for each source, one that can be secured open.',
  byPractice: true,
  reads: 'drawing',
  basisFor: (judge) => clauseOf('source-without-isolator', judge),
  run: runIsolator,
};

/** An alternator cut off while it charges throws a surge (load dump). */
const SOURCE_REMEDY =
  'Add a marked switch rated to break its direct current between it and the strings; stop an alternator before its switch is opened.';

type Source = Extract<SinglePart, { readonly kind: 'string' | 'array' | 'charger' }>;

/** Junctions joined with some switches open: those that surely isolate, and those that may. */
interface Isolated {
  readonly surely: Nets;
  readonly perhaps: Nets;
  readonly unknown: readonly SwitchPart[];
}

function runIsolator(context: CheckContext): RuleOutcome {
  const tally = new Tally(sourceWithoutIsolator, sourceWithoutIsolator.basisFor(context));
  const { drawn } = context;
  const breaks = (part: SinglePart) => part.kind === 'breaker' || (part.kind === 'switch' && part.loadBreak === true);
  const unknown = drawn.filter((part): part is SwitchPart => part.kind === 'switch' && part.loadBreak === undefined);
  const isolated: Isolated = {
    surely: netsOf(drawn, (part) => !breaks(part)),
    perhaps: netsOf(drawn, (part) => !breaks(part) && !(part.kind === 'switch' && part.loadBreak === undefined)),
    unknown,
  };
  for (const group of sourceGroups(context, isolated.surely)) {
    tally.judge(
      group.map(({ id }) => id),
      [isolatorVerdict(context, isolated, group)],
    );
  }
  return tally.outcome();
}

/** Strings that are joined with every isolator open are one source; arrays and chargers stand for themselves. */
function sourceGroups(context: CheckContext, nets: Nets): readonly (readonly Source[])[] {
  const groups: Source[][] = [];
  for (const part of context.drawn) {
    if (part.kind !== 'string' && part.kind !== 'array' && part.kind !== 'charger') continue;
    const beside =
      part.kind !== 'string' ? undefined : groups.find((group) => group.some((one) => isJoined(one, part, nets)));
    if (beside === undefined) groups.push([part]);
    else beside.push(part);
  }
  return groups;
}

/** Side by side, or one above the other. */
function isJoined(one: Source, other: StringPart, nets: Nets): boolean {
  if (one.kind !== 'string') return false;
  return nets.same(one.plus, other.plus) || nets.same(one.plus, other.minus) || nets.same(one.minus, other.plus);
}

function isolatorVerdict(context: CheckContext, isolated: Isolated, group: readonly Source[]): Verdict {
  const still = stillJoined(context, isolated.surely, group);
  if (still.length === 0) return PASS;
  // Strings without a switch of their own are told as such: a charger on them has nothing to add.
  if (group[0]!.kind === 'charger' && still.every(({ part }) => isOpenTo(context, isolated, part))) return ELSEWHERE;
  if (stillJoined(context, isolated.perhaps, group).length === 0) {
    const asked = isolated.unknown.filter((part) =>
      group.some((source) => context.nets.same(part.from, source[livePole(context, source)])),
    );
    return missing(
      `loadBreak of ${list(asked.map(({ id }) => `switch ${id}`))}: does it isolate ${list(group.map(({ id }) => id))}`,
      ...asked.map((part) => wanted(part, 'loadBreak')),
    );
  }
  const isString = group[0]!.kind === 'string';
  const verb = group.length > 1 ? 'are' : 'is';
  return {
    kind: 'fail',
    severity: isString && isBinding(still) ? 'fix' : 'look',
    ...(isString ? {} : { remedy: SOURCE_REMEDY }),
    case: context.cases[0]?.id ?? '',
    ...NONE_FOUND,
    message: `${group.length > 1 ? `Strings ${list(group.map(nameOf))}` : titleOf(group[0]!)} ${verb} joined to ${shortList([...new Set(still.map(({ part }) => nameOf(part)))])} with no switch in between that breaks its load.`,
    others: [...new Set(still.map(({ part }) => part.id))],
  };
}

function isOpenTo(context: CheckContext, { surely }: Isolated, part: SinglePart): boolean {
  return part.kind === 'string' && stillJoined(context, surely, [part]).some((other) => other.part.kind !== 'string');
}

/** What a group stays joined to; loads that are critical may be, as a bilge pump or an alarm; and the strings of its own. */
function stillJoined(context: CheckContext, nets: Nets, group: readonly Source[]): readonly Poles[] {
  const isString = group[0]!.kind === 'string';
  return context.drawn
    .flatMap((part) => polesOf(part))
    .filter(({ part, ...poles }) => {
      if (group.some(({ id }) => id === part.id)) return false;
      // A charger or array is told of itself, a charger against strings alone.
      if (isString && (part.kind === 'array' || part.kind === 'charger')) return false;
      if (isString && part.kind === 'controller' && poles.role === 'source') return false;
      if (group[0]!.kind === 'charger' && part.kind !== 'string') return false;
      if (part.kind === 'load' && part.dropClass === 'critical' && part.cranking !== true) return false;
      return group.some((source) => {
        const pole = livePole(context, source);
        return nets.same(source[pole], poles[pole]);
      });
    });
}

/** The battery of an engine is often without a switch on land; what only feeds in is a person's to judge. */
function isBinding(users: readonly Poles[]): boolean {
  return (
    users.some(({ role }) => role === 'sink') &&
    !users.some(({ part }) => part.kind === 'load' && part.cranking === true)
  );
}

export const switchNotBreaking: Rule = {
  id: 'switch-not-breaking',
  family: 'rating',
  kinds: ['switch'],
  title: 'Switch that cannot break its load carries current',
  compares:
    'for each switch: does it break its load (loadBreak), or carry no current in any case, or bear a mark not to open it under load',
  remedy: 'Use a switch that breaks its direct current, or mark it not to be opened under load.',
  byPractice: true,
  reads: 'every-case',
  basisFor: (judge) => clauseOf('switch-not-breaking', judge),
  run: runNotBreaking,
};

/** Below this a switch carries nothing worth the name. */
const NO_CURRENT_A = 0.01;

function runNotBreaking(context: CheckContext): RuleOutcome {
  const tally = new Tally(switchNotBreaking, switchNotBreaking.basisFor(context));
  for (const part of context.drawn) {
    if (part.kind === 'switch') tally.judge([part.id], breakingVerdicts(context, part));
  }
  return tally.outcome();
}

function breakingVerdicts(context: CheckContext, part: SwitchPart): readonly Verdict[] {
  if (part.loadBreak === true || part.marked === true) return [PASS];
  return context.solved.map((one): Verdict => {
    const carriedA = Math.abs(one.answer(part.id).currentA ?? 0);
    if (carriedA <= NO_CURRENT_A) return PASS;
    if (part.loadBreak === undefined) return missingField(part, 'loadBreak');
    return {
      kind: 'fail',
      severity: 'fix',
      case: one.id,
      measured: { value: carriedA, unit: 'A' },
      limit: { value: 0, unit: 'A' },
      excess: Number.POSITIVE_INFINITY,
      message: `${titleOf(part)} cannot break its load and carries ${amps(carriedA)}: opened then, it arcs.`,
    };
  });
}

export const autoReset: Rule = {
  id: 'auto-reset',
  family: 'fuse',
  kinds: ['breaker'],
  title: 'Breaker that closes again by itself',
  compares: 'for each breaker: is it reset by hand (manualReset)',
  remedy: 'Use a breaker that stays open until it is reset by hand and cannot be held closed on a fault.',
  byPractice: true,
  reads: 'drawing',
  basisFor: (judge) => clauseOf('auto-reset', judge),
  run: (context) => {
    const tally = new Tally(autoReset, autoReset.basisFor(context));
    for (const part of context.drawn)
      if (part.kind === 'breaker') tally.judge([part.id], [resetVerdict(context, part)]);
    return tally.outcome();
  },
};

function resetVerdict(context: CheckContext, part: BreakerPart): Verdict {
  if (part.manualReset === undefined) return missingField(part, 'manualReset');
  if (part.manualReset) return PASS;
  return {
    kind: 'fail',
    severity: 'fix',
    case: context.cases[0]?.id ?? '',
    measured: { value: 1, unit: '1' },
    limit: { value: 0, unit: '1' },
    excess: Number.POSITIVE_INFINITY,
    message: `${titleOf(part)} closes again by itself: a fault comes back as often as it cools.`,
  };
}
