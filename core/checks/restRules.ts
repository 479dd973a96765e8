/** What flows between strings side by side with nothing switched on. */
import type { SinglePart } from '../network/wiring.ts';
import { type Bank, type Branch, banksOf } from '../strings/banks.ts';
import { LEAST_RATE_PER_H } from '../strings/sharing/bankCurrents.ts';
import type { Basis } from '../tables/status.ts';
import { assumedSources } from './assumed.ts';
import type { CheckContext, SolvedCase } from './checkContext.ts';
import { quietStates } from './quiet.ts';
import type { Rule, RuleOutcome } from './rule.ts';
import { branchCurrents, branchName, branchSource, idsOf, sharedBanks } from './sharedBanks.ts';
import { isShortAtRest } from './shortRules.ts';
import { limitFor } from './stringRules.ts';
import { ELSEWHERE, GroupVerdicts, isOver, PASS, type Verdict } from './tally.ts';
import { amps, apart, list, volts, watts } from './wording.ts';

/**
 * Rest volts this far below a neighbour's, per 12 V of nominal volts, are no matter of charge any more: a lead block falls by some
 * 1.2 V from full to empty (SRC-BAT-FLOODED-REST), and a dead lead cell takes 2.1 V away. Common practice, no source.
 */
const DEAD_CELL_V_PER_12_V = 1.5;

const AT_REST: Basis = {
  source: 'SRC-PRACTICE',
  text: 'C/50 between strings at rest, and 1.5 V per 12 V as the mark of a dead cell: common practice, no source',
  status: 'common-practice',
};

export const circulatingAtRest: Rule = {
  id: 'circulating-at-rest',
  family: 'strings',
  kinds: ['string'],
  title: 'Strings feed one another with nothing switched on',
  compares:
    'current solved into each string side by side with others, all loads and chargers off, with C/50 of the smallest, and with what it may take on charge; and its rest volts with its neighbours’',
  remedy:
    'Bring the strings to the same charge and let them rest; if it comes back, look for an old or failing string with a clamp meter and a voltmeter on each.',
  byPractice: false,
  reads: 'drawing',
  basisFor: () => AT_REST,
  run: (context) =>
    eachBankAtRest(context, circulatingAtRest, (_, at) => (rests(context, at) ? restVerdict(context, at) : undefined)),
};

export interface BankAtRest {
  readonly rest: SolvedCase;
  /** The cases with the same switches and charges. */
  readonly cases: readonly SolvedCase[];
  readonly bank: Bank;
}

/** Runs a judgement over every bank with everything off, in each state of switches and charge that the cases have. */
export function eachBankAtRest(
  context: CheckContext,
  rule: Rule,
  judgement: (context: CheckContext, at: BankAtRest) => Verdict | undefined,
): RuleOutcome {
  const verdicts = new GroupVerdicts();
  for (const { rest, cases } of quietStates(context)) {
    // What cannot be solved at rest is told by the rule about short circuits.
    if (!rest.isSolved) continue;
    for (const bank of sharedBanks(rest)) verdicts.add(idsOf(bank), judgement(context, { rest, cases, bank }));
  }
  return verdicts.outcome(rule, rule.basisFor(context));
}

/** False for strings that only a case with charging joins, as a combining relay does: with nothing switched on they are apart. */
function rests(context: CheckContext, { cases, bank }: BankAtRest): boolean {
  const ids = idsOf(bank).join(' ');
  const asDrawn = banksOf(context.drawn).some((drawn) => idsOf(drawn).join(' ') === ids);
  return asDrawn || cases.some((one) => !one.parts.some((part) => isCharging(part, one)));
}

function isCharging(part: SinglePart, { operatingCase }: SolvedCase): boolean {
  if (part.kind === 'controller') return operatingCase.irradianceWPerM2 !== 0;
  return (part.kind === 'charger' || part.kind === 'converter') && part.on;
}

/** A branch at rest: what it gives (negative: takes) and its rest volts. */
interface Resting {
  readonly branch: Branch;
  readonly currentA: number;
  readonly emfV: number;
  readonly nominalV: number;
}

function restVerdict(context: CheckContext, { rest, bank }: BankAtRest): Verdict | undefined {
  const currents = branchCurrents(rest, bank);
  if (currents === undefined) return undefined;
  if (bank.strings.some((string) => isShortAtRest(context, string, rest))) return ELSEWHERE;
  const at = { model: rest.point.model, ambientDegC: rest.ambientDegC };
  const all = bank.branches.map((branch, k): Resting => {
    const { emfV, nominalV } = branchSource(context, branch, at);
    return { branch, currentA: currents[k]!, emfV, nominalV };
  });
  const taker = all.reduce((most, one) => (one.currentA < most.currentA ? one : most));
  const takesA = -taker.currentA;
  const leastA = LEAST_RATE_PER_H * Math.min(...bank.branches.map(({ capacityAh }) => capacityAh));
  if (!isOver(takesA, leastA)) return PASS;
  const gapV = Math.max(...all.map(({ emfV }) => emfV)) - taker.emfV;
  const isDead = isOver(gapV, (DEAD_CELL_V_PER_12_V * taker.nominalV) / 12);
  const charge = chargeLimitA(context, taker.branch);
  const limitA = charge !== undefined && isOver(takesA, charge) && !isDead ? charge : leastA;
  return {
    kind: 'fail',
    severity: isDead ? 'stop' : limitA === charge ? 'fix' : 'look',
    case: rest.id,
    measured: { value: takesA, unit: 'A' },
    limit: { value: limitA, unit: 'A' },
    excess: takesA / limitA,
    message: () =>
      `${flows(all)}${isDead ? deadWords(taker, gapV) : restWords(all, takesA, charge)}${assumedSources(rest.point)}.`,
    ...(isDead ? { remedy: ISOLATE } : {}),
  };
}

const ISOLATE = 'Isolate that block now: gas and heat hazard; do not charge it, and let it cool before it is handled.';

/** The least of what the strings of a branch may take. */
export function chargeLimitA(context: CheckContext, { strings }: Branch): number | undefined {
  const limits = strings.map((string) => limitFor(context, string, 'charge'));
  const known = limits.flatMap((limit) => ('wants' in limit ? [] : [limit.hardA]));
  return known.length === 0 ? undefined : Math.min(...known);
}

/** `With nothing switched on, A takes 10 A and B takes 10 A from C (20 A)`. */
function flows(all: readonly Resting[]): string {
  const shown = all.filter(({ currentA }) => Math.abs(currentA) > SMALL_A);
  const takers = shown.filter(({ currentA }) => currentA < 0);
  const givers = shown.filter(({ currentA }) => currentA > 0);
  const taking = takers.map(
    ({ branch, currentA }) => `${branchName(branch)} ${verb(branch, 'take')} ${amps(-currentA)}`,
  );
  const giving = givers.map(({ branch, currentA }) => `${branchName(branch)} (${amps(currentA)})`);
  return `With nothing switched on, ${list(taking)} from ${list(giving)}`;
}
/** Less than this is not worth a word in the sentence. */
const SMALL_A = 1e-3;

function verb({ strings }: Branch, word: string): string {
  return strings.length === 1 ? `${word}s` : word;
}

function deadWords({ branch, emfV }: Resting, gapV: number): string {
  return `, and the rest volts of ${branchName(branch)}, ${volts(emfV)}, lie ${volts(gapV)} below: a dead cell, or a block run empty; the current is that of the first moment and an upper bound, and falls as the bad block polarises`;
}

function restWords(all: readonly Resting[], takesA: number, chargeA: number | undefined): string {
  // What EMFs give less what EMFs take is what turns to heat: nothing else is on.
  const lostW = all.reduce((sum, { emfV, currentA }) => sum + emfV * currentA, 0);
  const lost = lostW > 0 ? `; ${watts(lostW)} turn to heat on the way` : '';
  if (chargeA === undefined || !isOver(takesA, chargeA)) return lost;
  const [took, may] = apart(takesA, chargeA, 'A');
  return `${lost}; ${took} is more than the ${may} that it may take on charge`;
}

/** A bank whose current at rest alone is told by the rule above, and gravely. */
export function isGraveAtRest(context: CheckContext, at: BankAtRest): boolean {
  const verdict = restVerdict(context, at);
  return (
    verdict?.kind === 'elsewhere' || (verdict?.kind === 'fail' && verdict.severity !== 'look' && rests(context, at))
  );
}
