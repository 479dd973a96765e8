/** Breakers against the table of least interrupting capacities by the cranking amperes of the batteries. */
import type { BreakerPart, StringPart } from '../job/part.ts';
import type { BreakerInterruptRow } from '../tables/deviceTables.ts';
import type { CheckContext } from './checkContext.ts';
import { clauseOf } from './clauses.ts';
import { mainDevices } from './mainDevices.ts';
import type { Rule } from './rule.ts';
import { ELSEWHERE, isUnder, missingField, PASS, Tally, type Verdict } from './tally.ts';
import { amps, apart, list, titleOf } from './wording.ts';

export const breakerUnderTable: Rule = {
  id: 'breaker-under-table',
  family: 'fuse',
  kinds: ['breaker'],
  title: 'Breaker breaks less than the table asks for',
  compares:
    "interruptA of each breaker with the table's least for the cranking amperes of all strings that it is joined to, the first device at a battery as main, the others as branch; only where crankingA of every such string is given",
  remedy:
    'Fit a breaker of a higher interrupting rating, or a fuse ahead of it with which its maker states a higher one.',
  byPractice: true,
  reads: 'drawing',
  basisFor: (judge) => clauseOf('breaker-under-table', judge),
  run: (context) => {
    const tally = new Tally(breakerUnderTable, breakerUnderTable.basisFor(context));
    const mains = new Set(mainDevices(context).map(({ device }) => device.id));
    for (const part of context.drawn) {
      if (part.kind === 'breaker') tally.judge([part.id], [verdictOf(context, part, mains.has(part.id))]);
    }
    return tally.outcome();
  },
};

function verdictOf(context: CheckContext, breaker: BreakerPart, isMain: boolean): Verdict {
  const strings = joinedStrings(context, breaker);
  const cranking = strings.map(({ crankingA }) => crankingA);
  // Batteries that are no starter batteries have no such figure: their short-circuit current is told by the rule that solves it.
  if (strings.length === 0 || cranking.some((amperes) => amperes === undefined)) return ELSEWHERE;
  const crankingA = cranking.reduce<number>((sum, amperes) => sum + (amperes ?? 0), 0);
  const row = rowFor(context, breaker, crankingA);
  if (row === undefined) return ELSEWHERE;
  if (breaker.interruptA === undefined) return missingField(breaker, 'interruptA');
  const least = isMain ? row.mainA : row.branchA;
  if (!isUnder(breaker.interruptA, least.value)) return PASS;
  const [breaks, asked] = apart(breaker.interruptA, least.value, 'A');
  const { status } = breakerUnderTable.basisFor(context);
  return {
    kind: 'fail',
    severity: status === 'common-practice' ? 'look' : 'fix',
    case: context.cases[0]?.id ?? '',
    measured: { value: breaker.interruptA, unit: 'A' },
    limit: { value: least.value, unit: 'A' },
    excess: least.value / breaker.interruptA,
    message: `${titleOf(breaker)} can break ${breaks}; as ${isMain ? 'first device at' : 'branch of'} ${list(strings.map(({ id }) => id))} with ${amps(crankingA)} of cranking current the table asks for ${asked}.`,
    others: strings.map(({ id }) => id),
  };
}

/** Strings of which a pole is joined to the breaker with everything closed. */
function joinedStrings({ drawn, nets }: CheckContext, { from }: BreakerPart): readonly StringPart[] {
  return drawn.filter(
    (part): part is StringPart => part.kind === 'string' && (nets.same(part.plus, from) || nets.same(part.minus, from)),
  );
}

function rowFor(
  { tables, volts }: CheckContext,
  { from }: BreakerPart,
  crankingA: number,
): BreakerInterruptRow | undefined {
  const nominalV = volts.nominalAt(from);
  if (nominalV === undefined) return undefined;
  return tables.devices.breakerInterrupt.find(
    (row) =>
      nominalV >= row.fromV &&
      nominalV <= row.toV &&
      crankingA >= row.fromCrankingA &&
      crankingA < (row.toCrankingA ?? Number.POSITIVE_INFINITY) + 1,
  );
}
