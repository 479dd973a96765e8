/** Which pole the fuses and switches stand in, given the pole that is earthed. */
import type { StringPart } from '../job/part.ts';
import type { Device, Poles, SinglePart } from '../network/wiring.ts';
import { isDevice, netsOf, polesOf } from '../network/wiring.ts';
import type { CheckContext } from './checkContext.ts';
import { clauseOf } from './clauses.ts';
import { deviceGraphOf } from './deviceGraph.ts';
import { EARTH, isEarthed } from './livePoles.ts';
import type { Rule, RuleOutcome } from './rule.ts';
import { ELSEWHERE, PASS, Tally, type Verdict } from './tally.ts';
import { list, titleOf } from './wording.ts';

type Breaking = Device | Extract<SinglePart, { readonly kind: 'switch' }>;

const ONE_POLE = { measured: { value: 1, unit: '1' }, limit: { value: 2, unit: '1' }, excess: 2 } as const;
const MISPLACED = {
  measured: { value: 1, unit: '1' },
  limit: { value: 0, unit: '1' },
  excess: Number.POSITIVE_INFINITY,
} as const;

export const bothPolesOpenSystem: Rule = {
  id: 'both-poles-open-system',
  family: 'fuse',
  kinds: ['string'],
  title: 'System without an earthed pole protected in one pole only',
  compares:
    'of strings neither pole of which a bond joins to earth: are fuses, breakers or switches in both poles, between the strings and what they feed',
  remedy:
    'Protect and switch both poles of a system without an earthed pole; where one is earthed, draw its bond to earth.',
  byPractice: true,
  reads: 'drawing',
  basisFor: (judge) => clauseOf('both-poles-open-system', judge),
  run: runBothPoles,
};

/** Strings on the same nets are one system and are told together. */
function runBothPoles(context: CheckContext): RuleOutcome {
  const tally = new Tally(bothPolesOpenSystem, bothPolesOpenSystem.basisFor(context));
  const systems: StringPart[][] = [];
  for (const string of context.drawn) {
    if (string.kind !== 'string') continue;
    const system = systems.find(([first]) => context.volts.sharesBank(first!.plus, string.plus));
    if (system === undefined) systems.push([string]);
    else system.push(string);
  }
  for (const system of systems) {
    tally.judge(
      system.map(({ id }) => id),
      [polesVerdict(context, system)],
    );
  }
  return tally.outcome();
}

function polesVerdict(context: CheckContext, system: readonly StringPart[]): Verdict {
  if (system.some(({ plus, minus }) => isEarthed(context, plus) || isEarthed(context, minus))) return PASS;
  const bare = netsOf(context.drawn, (part) => !isBreaking(part));
  const users = context.drawn.flatMap((part) => polesOf(part)).filter(({ part }) => part.kind !== 'string');
  const isBare = (pole: 'plus' | 'minus') =>
    users.some((user) => system.some((string) => bare.same(user[pole], string[pole])));
  const poles = (['plus', 'minus'] as const).filter(isBare);
  if (poles.length === 0) return PASS;
  // With a device in neither the strings have no fuse at all.
  if (poles.length === 2) return ELSEWHERE;
  const names = list(system.map(({ id }) => id));
  return {
    kind: 'fail',
    severity: 'look',
    case: context.cases[0]?.id ?? '',
    ...ONE_POLE,
    message: `No bond joins either pole of ${names} to earth, and the ${poles[0]!} pole has neither fuse nor switch: a first fault to earth goes unseen, a second one then passes by the devices.`,
  };
}

function isBreaking(part: SinglePart): part is Breaking {
  return isDevice(part) || part.kind === 'switch';
}

export const fuseInEarthedPole: Rule = {
  id: 'fuse-in-earthed-pole',
  family: 'fuse',
  kinds: ['fuse', 'breaker', 'switch'],
  title: 'Fuse or switch in the earthed pole alone',
  compares:
    'for each fuse, breaker and switch in a conductor that a bond joins to earth: has every circuit behind it a device (for a switch: a switch or breaker) in its other pole too',
  remedy: 'Move it to the pole that is not earthed, or use a device that opens both poles together.',
  byPractice: true,
  reads: 'drawing',
  basisFor: (judge) => clauseOf('fuse-in-earthed-pole', judge),
  run: runEarthedPole,
};

function runEarthedPole(context: CheckContext): RuleOutcome {
  const tally = new Tally(fuseInEarthedPole, fuseInEarthedPole.basisFor(context));
  for (const part of context.drawn) {
    if (!isBreaking(part)) continue;
    tally.judge([part.id], [isEarthed(context, part.from) ? earthedVerdict(context, part) : PASS]);
  }
  return tally.outcome();
}

function earthedVerdict(context: CheckContext, part: Breaking): Verdict {
  const without = netsOf(context.drawn, (wiring) => wiring.id !== part.id);
  const far = [part.from, part.to].filter((end) => !without.same(end, EARTH));
  const behind = context.drawn
    .flatMap((one) => polesOf(one))
    .flatMap((poles) => {
      const isBehind = (pole: 'plus' | 'minus') => far.some((end) => without.same(end, poles[pole]));
      return (['plus', 'minus'] as const)
        .filter(isBehind)
        .map((pole) => ({ poles, other: pole === 'plus' ? 'minus' : 'plus' }) as const);
    });
  const single = behind.filter(({ poles, other }) => !isBrokenIn(context, part, poles, other));
  if (behind.length > 0 && single.length === 0) return PASS;
  const ids = [...new Set(single.map(({ poles }) => poles.part.id))];
  const what =
    ids.length === 0
      ? 'what it parts stays joined to earth another way'
      : `the other pole of ${list(ids)} stays live when it opens`;
  return {
    kind: 'fail',
    severity: 'fix',
    case: context.cases[0]?.id ?? '',
    ...MISPLACED,
    message: `${titleOf(part)} is in the earthed conductor: ${what}.`,
    others: ids,
  };
}

/** Does a device (for a switch: something opened by hand) lie in a pole between a part and its counterparts? */
function isBrokenIn(
  context: CheckContext,
  part: Breaking,
  { role, part: of, ...poles }: Poles,
  pole: 'plus' | 'minus',
): boolean {
  const bare =
    part.kind === 'fuse'
      ? deviceGraphOf(context).bare
      : netsOf(context.drawn, (wiring) => wiring.kind !== 'switch' && wiring.kind !== 'breaker');
  // A string is a counterpart of chargers as of loads.
  const isCounterpart = (other: Poles) =>
    other.role !== role || (other.part.kind === 'string') !== (of.kind === 'string');
  return !context.drawn.some((one) =>
    polesOf(one).some((other) => isCounterpart(other) && bare.same(other[pole], poles[pole])),
  );
}
