/** Strings side by side against the share of the bank's current that their capacity entitles them to. */
import { originOf, type StringPart } from '../job/part.ts';
import { closedNets } from '../network/wiring.ts';
import { assumedSources } from './assumed.ts';
import { COMMON_PRACTICE } from './bases.ts';
import type { CheckContext, SolvedCase } from './checkContext.ts';
import type { Rule, RuleOutcome } from './rule.ts';
import { isOver, isUnder, PASS, Tally, type Verdict } from './tally.ts';
import { amps, apart, list, percent, titleOf } from './wording.ts';

/**
 * Below this discharge, as amps per amp-hour of the bank (C/50), sharing is not judged: small differences of rest volts then
 * outweigh everything, and a clamp meter cannot tell. Common practice, no source.
 */
const leastRatePerH = 0.02;
/** Beyond this many times the limit that is worth a look, it is to be put right. Common practice, no source. */
const fixFactor = 2;

export const shareUneven: Rule = {
  id: 'share-uneven',
  family: 'battery',
  kinds: ['string'],
  title: 'Strings side by side share unevenly',
  compares:
    'current solved out of each string with its fair share by capacity among the strings joined to the same two poles, in every case without a starting load in which the bank gives at least C/50',
  remedy:
    'Make the leads of all strings alike in length, size and joints, and join them where none is nearer the load than another.',
  byPractice: false,
  reads: 'steady-cases',
  basisFor: () => COMMON_PRACTICE,
  run: runShareUneven,
};

/** Each bank is judged by the string that is furthest off. */
function runShareUneven(context: CheckContext): RuleOutcome {
  const tally = new Tally(shareUneven, COMMON_PRACTICE);
  const verdicts = new Map<string, { readonly bank: readonly StringPart[]; readonly found: Verdict[] }>();
  for (const one of context.steady) {
    for (const bank of sideBySide(one)) {
      const verdict = verdictFor(context, one, bank);
      if (verdict === undefined) continue;
      const name = bank.map(({ id }) => id).join(' ');
      const judged = verdicts.get(name) ?? { bank, found: [] };
      judged.found.push(verdict);
      verdicts.set(name, judged);
    }
  }
  for (const { bank, found } of verdicts.values()) {
    const ids = bank.map(({ id }) => id);
    tally.judge(ids, found);
  }
  return tally.outcome();
}

/** Strings by the two poles that they are joined to in a case, where there are two or more. */
function sideBySide(one: SolvedCase): readonly (readonly StringPart[])[] {
  const nets = closedNets(one.parts);
  const banks = new Map<string, StringPart[]>();
  for (const part of one.parts) {
    if (part.kind !== 'string') continue;
    const poles = `${String(nets.of(part.plus))} ${String(nets.of(part.minus))}`;
    banks.set(poles, [...(banks.get(poles) ?? []), part]);
  }
  return [...banks.values()].filter((bank) => bank.length > 1);
}

/** I_k against ΣI · C_k / ΣC; nothing where the bank does not give enough to tell. */
function verdictFor(context: CheckContext, one: SolvedCase, bank: readonly StringPart[]): Verdict | undefined {
  const currents = bank.map(({ id }) => one.point.parts.get(id)?.currentA);
  if (!currents.every((currentA) => typeof currentA === 'number')) return undefined;
  const totalA = currents.reduce((sum, currentA) => sum + currentA, 0);
  const totalAh = bank.reduce((sum, { capacityAh }) => sum + capacityAh, 0);
  if (isUnder(totalA, leastRatePerH * totalAh)) return undefined;
  const shares = bank.map((string, index) => {
    const fairA = (totalA * string.capacityAh) / totalAh;
    const givenA = currents[index] ?? 0;
    return { string, fairA, givenA, deviation: Math.abs(givenA - fairA) / fairA };
  });
  const worst = shares.reduce((most, share) => (share.deviation > most.deviation ? share : most));
  const limit = context.job.settings.shareLimit;
  if (!isOver(worst.deviation, limit)) return PASS;
  const [given, fair] = apart(worst.givenA, worst.fairA, 'A');
  const others = bank.filter((other) => other !== worst.string).map(({ id }) => id);
  return {
    kind: 'fail',
    severity: isOver(worst.deviation, fixFactor * limit) && areKnown(bank) ? 'fix' : 'look',
    case: one.id,
    measured: { value: worst.deviation, unit: '1' },
    limit: { value: limit, unit: '1' },
    excess: worst.deviation / limit,
    message: `${titleOf(worst.string)} gives ${given} of the ${amps(totalA)} that it and ${list(others)} give; its fair share by capacity is ${fair}, and it is ${percent(worst.deviation)} off${assumedSources(one.point)}.`,
  };
}

/** On resistances that are only assumed nobody can be told to put something right: they are worth a look, and a measurement. */
function areKnown(bank: readonly StringPart[]): boolean {
  return bank.every((string) => ['measured', 'label'].includes(originOf(string, 'resistanceOhm')));
}
