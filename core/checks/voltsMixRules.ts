/** Parts on volts that they are not made for, taps on part of a series string, and what the DC and AC wiring lose together. */
import type { InverterPart, StringPart } from '../job/part.ts';
import { nameOf } from '../job/part.ts';
import type { SinglePart } from '../network/wiring.ts';
import { CIRCUIT_LAW, COMMON_PRACTICE } from './bases.ts';
import type { CheckContext, SolvedCase } from './checkContext.ts';
import { dropOf } from './dropRules.ts';
import { askOnce, fact } from './flags.ts';
import type { Rule } from './rule.ts';
import { ELSEWHERE, isOver, isUnder, missingField, PASS, Tally, type Verdict } from './tally.ts';
import { apart, percent, titleOf, withEdition } from './wording.ts';

/** 12 V means 12 to 15 in this trade (12.8 V blocks, 32 V and 36 V systems apart): labels within this factor are one system. */
const ONE_SYSTEM = 1.25;

type Rated = Extract<SinglePart, { readonly kind: 'load' | 'inverter' | 'charger' | 'converter' }>;

export const mixedVolts: Rule = {
  id: 'mixed-volts',
  family: 'voltage',
  kinds: ['load', 'inverter', 'charger', 'converter'],
  title: 'Part on volts that it is not made for, or on part of a string',
  compares:
    'nominalV of each load, inverter, charger and converter with the nominal volts of its net (one system within a factor of 1.25); and whether a consumer taps a string between its blocks',
  remedy: 'Feed it from a DC-DC converter, or move it to the net it is made for; never tap a string.',
  byPractice: false,
  reads: 'drawing',
  basisFor: () => COMMON_PRACTICE,
  run: (context) => {
    const tally = new Tally(mixedVolts, COMMON_PRACTICE);
    const inside = netsInsideStrings(context);
    const unsaid: Rated[] = [];
    for (const part of context.drawn) {
      if (part.kind !== 'load' && part.kind !== 'inverter' && part.kind !== 'charger' && part.kind !== 'converter')
        continue;
      const poles = part.kind === 'converter' ? part.from : part;
      const nominalV = context.volts.nominalBetween(poles.plus, poles.minus);
      if (nominalV === undefined) continue;
      const tapped = part.kind === 'charger' ? undefined : tappedString(context, poles, inside);
      // A converter or charger on the same two nets makes up for what the tap takes: an evened-out tap.
      const isEven = context.volts.setpointBetween(poles.plus, poles.minus) !== undefined;
      if (tapped !== undefined && !isEven) tally.judge([part.id], [tapVerdict(context, part, tapped)]);
      else if (part.nominalV !== undefined)
        tally.judge([part.id], [matchVerdict(context, part, part.nominalV, nominalV)]);
      else if (!isToldByOthers(part)) unsaid.push(part);
    }
    askOnce(tally, unsaid, 'nominalV', ': what volts it is made for');
    return tally.outcome();
  },
};

/** Its own limits of volts are given, so that other rules tell whether its net suits it. */
function isToldByOthers(part: Rated): boolean {
  if (part.kind === 'charger') return true;
  if (part.kind === 'inverter') return part.cutoffV !== undefined;
  if (part.kind !== 'load') return false;
  // A resistor (a heater, a lamp filament) as a bare figure is made for nothing in particular.
  return part.resistanceOhm !== undefined || (part.minimumV !== undefined && part.maximumV !== undefined);
}

function matchVerdict(context: CheckContext, part: Rated, madeForV: number, nominalV: number): Verdict {
  const ratio = Math.max(madeForV / nominalV, nominalV / madeForV);
  if (!isOver(ratio, ONE_SYSTEM)) return PASS;
  const [net, made] = apart(nominalV, madeForV, 'V');
  return {
    kind: 'fail',
    severity: 'stop',
    case: context.cases[0]?.id ?? '',
    measured: { value: nominalV, unit: 'V' },
    limit: { value: madeForV, unit: 'V' },
    excess: ratio / ONE_SYSTEM,
    message: `${titleOf(part)} is made for ${made} and stands on a net of ${net} nominal.`,
  };
}

function tapVerdict(context: CheckContext, part: Rated, string: StringPart): Verdict {
  return {
    ...fact(
      context,
      'stop',
      `${titleOf(part)} taps the series string at ${nameOf(string)}: the blocks that feed it are drained below the others and these are overcharged.`,
    ),
    others: [string.id],
    basis: CIRCUIT_LAW,
  };
}

/** Nets between the blocks of a series string: a plus post and a minus post, or a midpoint, and whose string it is. */
function netsInsideStrings({ drawn, nets }: CheckContext): ReadonlyMap<number, StringPart> {
  const strings = drawn.filter((part): part is StringPart => part.kind === 'string');
  const minus = new Set(strings.map((string) => nets.of(string.minus)!));
  const inside = new Map<number, StringPart>();
  for (const string of strings) {
    const plus = nets.of(string.plus)!;
    if (minus.has(plus)) inside.set(plus, string);
    if (string.midpoint !== undefined) inside.set(nets.of(string.midpoint)!, string);
  }
  return inside;
}

function tappedString(
  { nets }: CheckContext,
  { plus, minus }: { readonly plus: StringPart['plus']; readonly minus: StringPart['plus'] },
  inside: ReadonlyMap<number, StringPart>,
): StringPart | undefined {
  return inside.get(nets.of(plus)!) ?? inside.get(nets.of(minus)!);
}

export const dropAddedUp: Rule = {
  id: 'drop-added-up',
  family: 'voltage',
  kinds: ['inverter'],
  title: 'DC and AC wiring together lose too many volts',
  compares:
    'volts lost before each inverter and, by its acDrop, behind it, 1 − (1 − a)(1 − b), with the most that both may lose, in every case without a starting load',
  remedy: 'Share the allowance: spend less on the DC side, or less behind the inverter.',
  byPractice: true,
  reads: 'steady-cases',
  basisFor: (judge) => withEdition(judge.practice.dropWithAc.basis, judge),
  run: (context) => {
    const tally = new Tally(dropAddedUp, dropAddedUp.basisFor(context));
    for (const drawn of context.drawn) {
      if (drawn.kind !== 'inverter') continue;
      const verdicts = context.steady.flatMap((one) => addedVerdict(context, one, one.part(drawn.id) as InverterPart));
      tally.judge([drawn.id], verdicts);
    }
    return tally.outcome();
  },
};

function addedVerdict(context: CheckContext, one: SolvedCase, part: InverterPart): readonly Verdict[] {
  const before = dropOf(context, { part, one })?.fraction;
  if (before === undefined) return [];
  const dcDrop = Math.max(0, before);
  const limit = context.practice.dropWithAc.value;
  if (part.acDrop === undefined) {
    // Too much before the inverter already: told by the rule for volts lost on the way.
    if (isOver(dcDrop, limit)) return [ELSEWHERE];
    return isUnder(dcDrop, SLIGHT * limit)
      ? []
      : [missingField(part, 'acDrop', `: ${percent(dcDrop)} is lost before it`)];
  }
  const total = addedUp(dcDrop, part.acDrop);
  if (!isOver(total, limit)) return [PASS];
  const [lost, allowed] = apart(total, limit, '1');
  return [
    {
      kind: 'fail',
      severity: 'look',
      case: one.id,
      measured: { value: total, unit: '1' },
      limit: { value: limit, unit: '1' },
      excess: total / limit,
      message: `${titleOf(part)}: ${percent(dcDrop)} is lost before it and ${percent(part.acDrop)} behind it, ${lost} in all; ${allowed} is the usual allowance from battery to outlet.`,
    },
  ];
}

/** Below this share of the allowance the DC side leaves the AC side all that its own rules give it. */
const SLIGHT = 0.4;

/** Two losses one after the other: 1 − (1 − a)(1 − b), fractions. */
export function addedUp(first: number, second: number): number {
  return 1 - (1 - first) * (1 - second);
}
