/** Sources joined pole to pole, and sources that feed something with no device in between. */

import { currentLimits } from '../battery/limits.ts';
import { stringSource } from '../battery/stringSource.ts';
import type { StringPart } from '../job/part.ts';
import { nameOf } from '../job/part.ts';
import { isDevice, netsOf, polesOf } from '../network/wiring.ts';
import { CIRCUIT_LAW, FUSE_AT_SOURCE } from './bases.ts';
import type { CheckContext, SolvedCase } from './checkContext.ts';
import { type Quiet, quietStates } from './quiet.ts';
import type { Rule, RuleOutcome } from './rule.ts';
import { mayGoUnfused } from './starterRules.ts';
import { stringsBetween } from './stringsBetween.ts';
import { banksOf } from './systemVolts.ts';
import { isOver, missing, PASS, Tally, type Verdict } from './tally.ts';
import { amps, apart, ohms, percent, shortList, titleOf } from './wording.ts';

/**
 * A short circuit is told in two ways, both with every load, inverter, charger and array off, since then nothing but wiring and
 * other strings can take current:
 *
 * 1. by the drawing: wiring parts that are closed join the two poles of a source;
 * 2. by the sum: a string's current at rest is above a fifth of what it would give into a bolted short (E / R, links included).
 *    Unequal strings that even out between themselves stay far below that; a string joined to another of twice its volts does not.
 *
 * A path by 1 whose current at rest stays below the fifth, and below what the string may give for long, is a leak through a
 * resistance: still to be removed, but no short circuit.
 */
const SHORT_FRACTION = 0.2;

export const deadShort: Rule = {
  id: 'dead-short',
  family: 'wiring',
  kinds: ['string', 'array', 'charger', 'controller', 'converter'],
  title: 'Short circuit across a source',
  compares:
    'for each string, array, charger, controller and converter: do closed wiring parts join its two poles; and for each string its current with everything off with a fifth of its short-circuit current',
  remedy: 'Do not close anything: find the link that joins plus and minus, and remove it.',
  byPractice: false,
  reads: 'drawing',
  basisFor: () => CIRCUIT_LAW,
  run: runDeadShort,
};

function runDeadShort(context: CheckContext): RuleOutcome {
  const tally = new Tally(deadShort, CIRCUIT_LAW);
  const states = quietStates(context);
  for (const drawn of context.drawn) {
    if (drawn.kind === 'string') {
      tally.judge(
        [drawn.id],
        states.map(({ rest, joins }) =>
          stringVerdict(context, { string: rest.part(drawn.id) as StringPart, rest, joins }),
        ),
      );
      continue;
    }
    const outputs = polesOf(drawn).filter(({ role }) => role === 'source');
    const verdicts = outputs.flatMap(({ plus, minus }) =>
      states.map(({ rest, joins }): Verdict => {
        if (!joins(plus, minus)) return PASS;
        return {
          kind: 'fail',
          severity: 'stop',
          case: rest.id,
          measured: { value: 0, unit: 'V' },
          limit: { value: 0, unit: 'V' },
          excess: Number.POSITIVE_INFINITY,
          message: `${titleOf(drawn)} has its plus (${plus}) and minus (${minus}) joined by closed wiring parts.`,
        };
      }),
    );
    tally.judge([drawn.id], verdicts);
  }
  return tally.outcome();
}

/** E / R of a string, links included. */
function boltedShortA(context: CheckContext, string: StringPart, ambientDegC: number): number {
  const tables = context.tables.chemistry;
  const { emfV, resistanceOhm } = stringSource(string, { model: 'slow', ambientDegC, tables });
  return emfV.value / (resistanceOhm.value + string.linkOhm);
}

/** True where the current at rest of a string is that of a short circuit (2. above). */
export function isShortAtRest(context: CheckContext, string: StringPart, rest: SolvedCase): boolean {
  const { currentA } = rest.answer(string.id);
  const shortA = boltedShortA(context, string, rest.ambientDegC);
  return currentA !== null && isOver(Math.abs(currentA), SHORT_FRACTION * shortA);
}

function stringVerdict(
  context: CheckContext,
  { string, rest, joins }: Omit<Quiet, 'cases'> & { readonly string: StringPart },
): Verdict {
  const { currentA } = rest.answer(string.id);
  const isJoined = joins(string.plus, string.minus);
  if (currentA === null || !rest.isSolved) {
    return isJoined
      ? joinedOnly(string, rest.id)
      : missing(`current of string ${string.id} at rest in case ${rest.id}`);
  }
  const shortA = boltedShortA(context, string, rest.ambientDegC);
  const lastingA = string.maxDischargeA ?? currentLimits(string, context.tables.chemistry).dischargeA?.value ?? shortA;
  const restA = Math.abs(currentA);
  const limitA = isJoined ? Math.min(SHORT_FRACTION * shortA, lastingA) : SHORT_FRACTION * shortA;
  if (isOver(restA, limitA)) {
    const [found, limit] = apart(restA, limitA, 'A');
    const why = isJoined
      ? `closed wiring parts join its plus (${string.plus}) and minus (${string.minus})`
      : 'what is joined to it is reversed or of other volts';
    const against =
      limitA < SHORT_FRACTION * shortA
        ? 'what it may give for long'
        : `${percent(SHORT_FRACTION)} of its short-circuit current`;
    return {
      kind: 'fail',
      severity: 'stop',
      case: rest.id,
      measured: { value: restA, unit: 'A' },
      limit: { value: limitA, unit: 'A' },
      excess: restA / limitA,
      message: `${titleOf(string)} carries ${found} with everything off, more than ${limit} (${against}): ${why}.`,
    };
  }
  if (!isJoined) return PASS;
  const pathOhm = restA > 0 ? Math.abs(rest.answer(string.id).voltageV ?? 0) / restA : 0;
  return {
    kind: 'fail',
    severity: 'fix',
    case: rest.id,
    measured: { value: restA, unit: 'A' },
    limit: { value: 0, unit: 'A' },
    excess: 1,
    message: `${titleOf(string)} gives ${amps(restA)} with everything off: closed wiring parts of ${ohms(pathOhm)} together join its plus (${string.plus}) and minus (${string.minus}).`,
  };
}

function joinedOnly(string: StringPart, caseId: string): Verdict {
  return {
    kind: 'fail',
    severity: 'stop',
    case: caseId,
    measured: { value: 0, unit: 'V' },
    limit: { value: 0, unit: 'V' },
    excess: Number.POSITIVE_INFINITY,
    message: `${titleOf(string)} has its plus (${string.plus}) and minus (${string.minus}) joined by closed wiring parts.`,
  };
}

/**
 * With every fuse and breaker taken out, no string may feed anything any more: whatever still lies between nets of its plus and
 * of its minus has no device in either conductor. How far the device is from the string is another question. A starter motor alone on
 * its cable is excepted by most books, up to the volts that the practice names.
 */
export const noFuseOnSource: Rule = {
  id: 'no-fuse-on-source',
  family: 'fuse',
  kinds: ['string'],
  title: 'String feeds or is fed without a fuse or breaker in between',
  compares:
    'for each string: with every fuse and breaker taken out, is any load, inverter, charger, controller or converter still joined to both its poles? A starter motor (cranking) alone on its cable may be, as far as the practice lets it',
  remedy:
    'Put a fuse or a breaker with manual reset in the ungrounded conductor right at the string; most books except only the cable of a starter motor.',
  byPractice: false,
  reads: 'drawing',
  basisFor: () => FUSE_AT_SOURCE,
  run: runNoFuse,
};

function runNoFuse(context: CheckContext): RuleOutcome {
  const tally = new Tally(noFuseOnSource, FUSE_AT_SOURCE);
  const bare = netsOf(context.drawn, (part) => !isDevice(part));
  const bankOfNet = banksOf(context.drawn, bare);
  /** The stretch of nominal volts that two junctions span in a bank; `undefined` where no bank joins them. */
  const spanOf = ({ plus, minus }: { plus: StringPart['plus']; minus: StringPart['plus'] }) => {
    const [p, m] = [bare.of(plus)!, bare.of(minus)!];
    const bank = bankOfNet.get(p);
    if (bank === undefined || bank !== bankOfNet.get(m)) return undefined;
    const ends = [bank.potentialV.get(p)!, bank.potentialV.get(m)!];
    return { bank, lowV: Math.min(...ends), highV: Math.max(...ends) };
  };
  const users = context.drawn
    .flatMap((part) => (part.kind === 'string' || part.kind === 'array' ? [] : polesOf(part)))
    .flatMap((poles) => {
      const span = spanOf(poles);
      if (span === undefined) return [];
      const nets = { plus: bare.of(poles.plus)!, minus: bare.of(poles.minus)! };
      return [{ ...poles, ...span, strings: stringsBetween(context.drawn, bare, nets) }];
    });
  for (const string of context.drawn) {
    if (string.kind !== 'string') continue;
    const span = spanOf(string)!;
    // A tap is fed by the strings whose stretch of volts it shares.
    const own = users.filter(
      (user) =>
        user.bank === span.bank &&
        user.strings.has(string) &&
        Math.min(user.highV, span.highV) > Math.max(user.lowV, span.lowV) &&
        !mayGoUnfused(context, user.part, string),
    );
    const ids = [...new Set(own.map(({ part }) => part.id))];
    if (ids.length === 0) {
      tally.judge([string.id], [PASS]);
      continue;
    }
    const names = [...new Set(own.map(({ part }) => nameOf(part)))];
    tally.judge(
      [string.id],
      [
        {
          kind: 'fail',
          severity: 'stop',
          case: context.cases[0]?.id ?? '',
          measured: { value: ids.length, unit: '1' },
          limit: { value: 0, unit: '1' },
          excess: Number.POSITIVE_INFINITY,
          message: `${titleOf(string)} is joined to ${shortList(names)} with no fuse or breaker in between.`,
          others: ids,
        },
      ],
    );
  }
  return tally.outcome();
}
