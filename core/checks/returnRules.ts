/** Return conductors against the ones that they bring back: their own circuit's, or several circuits' together. */
import type { Ampacity } from '../conductor/ampacity.ts';
import type { Missing } from '../conductor/size.ts';
import type { CablePart, JunctionId } from '../job/part.ts';
import type { Poles } from '../network/wiring.ts';
import { isWiring, joined, type Nets, netsOf, polesOf } from '../network/wiring.ts';
import type { Basis } from '../tables/status.ts';
import type { CheckContext } from './checkContext.ts';
import { livePole } from './livePoles.ts';
import type { Rule, RuleOutcome } from './rule.ts';
import { ELSEWHERE, isOver, isUnder, missing, PASS, sizeWanted, Tally, type Verdict } from './tally.ts';
import { amps, apart, shortList, titleOf, together, withEdition } from './wording.ts';

export const returnSmaller: Rule = {
  id: 'return-smaller',
  family: 'cable',
  kinds: ['cable'],
  title: 'Return conductor smaller than what it brings back',
  compares:
    'ampacity of the return of each load, inverter and charger with that of the cable out to it, as far as both carry its current alone; and of a return that several share with the sum of the most that each takes in any case without a starting load',
  remedy: 'Give the return at least the size of the cable out, or of the sum of what it brings back.',
  byPractice: true,
  reads: 'steady-cases',
  basisFor: (judge) => withEdition(RETURN_PRACTICE, judge),
  run: runReturns,
};

const RETURN_PRACTICE: Basis = {
  source: 'SRC-PRACTICE',
  text: 'common practice: the return carries what the cable out carries; NEC (NFPA 70) 215.2 by principle',
  status: 'common-practice',
};

function runReturns(context: CheckContext): RuleOutcome {
  const tally = new Tally(returnSmaller, returnSmaller.basisFor(context));
  const ambientDegC = Math.max(...context.cases.map((one) => one.ambientDegC));
  for (const poles of context.drawn.flatMap((part) => polesOf(part))) {
    if (poles.part.kind === 'string') continue;
    const verdict = ownReturn(context, poles, ambientDegC);
    if (verdict !== undefined) tally.judge([poles.part.id], [verdict]);
  }
  for (const shared of sharedReturns(context)) {
    tally.judge([shared.cable.id], [sharedVerdict(context, shared, ambientDegC)]);
  }
  return tally.outcome();
}

type Rated =
  | { readonly cable: CablePart; readonly ampacity: Ampacity }
  | { readonly cable: CablePart; readonly missing: Missing['missing'] };

/** `undefined` where one of the two ways has no cable of its own: there is nothing to compare. */
function ownReturn(context: CheckContext, poles: Poles, ambientDegC: number): Verdict | undefined {
  const live = livePole(context, poles);
  const back = live === 'plus' ? 'minus' : 'plus';
  const weakest = (pole: 'plus' | 'minus') =>
    weakestOf(context, inSeries(context, poles[pole], poles.part.id), ambientDegC);
  const [out, home] = [weakest(live), weakest(back)];
  if (out === undefined || home === undefined) return undefined;
  for (const one of [home, out]) if ('missing' in one) return missing(one.missing, ...sizeWanted(one.cable));
  if ('missing' in out || 'missing' in home) return undefined;
  if (!isUnder(home.ampacity.finalA, out.ampacity.finalA)) return PASS;
  const [less, more] = apart(home.ampacity.finalA, out.ampacity.finalA, 'A');
  return {
    kind: 'fail',
    severity: 'fix',
    case: context.cases[0]?.id ?? '',
    measured: { value: home.ampacity.finalA, unit: 'A' },
    limit: { value: out.ampacity.finalA, unit: 'A' },
    excess: out.ampacity.finalA / home.ampacity.finalA,
    message: `The return of ${poles.part.id}, cable ${home.cable.id}, may carry ${less}; cable ${out.cable.id} out to it may carry ${more}.`,
    basis: together(returnSmaller.basisFor(context), { text: home.ampacity.basis.text, status: home.ampacity.status }),
    others: [home.cable.id, out.cable.id],
  };
}

/** Cables from a post on that carry its current and no other. */
function inSeries({ meetings }: CheckContext, post: JunctionId, behind: string): readonly CablePart[] {
  const found: CablePart[] = [];
  let [junction, last] = [post, behind];
  for (;;) {
    const ends = meetings.get(junction) ?? [];
    const next = ends.find(({ part }) => part.id !== last)?.part;
    if (ends.length !== 2 || next === undefined || !isWiring(next) || joined(next).length !== 2) return found;
    if (next.kind === 'cable') {
      if (found.includes(next)) return found;
      found.push(next);
    }
    junction = joined(next).find((end) => end !== junction)!;
    last = next.id;
  }
}

function weakestOf(context: CheckContext, cables: readonly CablePart[], ambientDegC: number): Rated | undefined {
  let weakest: Extract<Rated, { readonly ampacity: Ampacity }> | undefined;
  for (const cable of cables) {
    const ampacity = context.ampacityOf(cable, ambientDegC);
    if ('missing' in ampacity) return { cable, missing: ampacity.missing };
    if (weakest === undefined || ampacity.finalA < weakest.ampacity.finalA) weakest = { cable, ampacity };
  }
  return weakest;
}

interface SharedReturn {
  readonly cable: CablePart;
  /** Sinks that have no other way back. */
  readonly users: readonly Poles[];
}

/** Cables of the pole that wants no devices by which two or more sinks lose every string once the cable is away. */
function sharedReturns(context: CheckContext): readonly SharedReturn[] {
  const poles = context.drawn.flatMap((part) => polesOf(part));
  const backOf = (one: Poles) => one[livePole(context, one) === 'plus' ? 'minus' : 'plus'];
  const sources = poles.filter(({ part }) => part.kind === 'string').map(backOf);
  const sinks = poles.filter(({ role }) => role === 'sink');
  const returns = new Set([...sinks.map(backOf), ...sources].map((junction) => context.nets.of(junction)));
  const live = new Set(sinks.map((one) => context.nets.of(one[livePole(context, one)])));
  const cables = context.drawn.filter((part): part is CablePart => {
    const net = part.kind === 'cable' ? context.nets.of(part.from) : undefined;
    return net !== undefined && returns.has(net) && !live.has(net);
  });
  const corners = netsOf(context.drawn, (part) => part.kind !== 'cable' && part.kind !== 'bond');
  return cables.flatMap((cable) => {
    const fed = reachedFrom(
      sources,
      cables.filter((other) => other !== cable),
      corners,
    );
    const users = sinks.filter(
      (sink) => !fed.has(corners.of(backOf(sink))!) && context.nets.same(backOf(sink), cable.from),
    );
    return users.length < 2 ? [] : [{ cable, users }];
  });
}

/** Corners that sources reach over cables. */
function reachedFrom(sources: readonly JunctionId[], cables: readonly CablePart[], corners: Nets): ReadonlySet<number> {
  const around = new Map<number, number[]>();
  const link = (a: number, b: number) => {
    const here = around.get(a);
    if (here === undefined) around.set(a, [b]);
    else here.push(b);
  };
  for (const { from, to } of cables) {
    const [a, b] = [corners.of(from)!, corners.of(to)!];
    link(a, b);
    link(b, a);
  }
  const reached = new Set(sources.map((source) => corners.of(source)!));
  for (const net of reached) for (const next of around.get(net) ?? []) reached.add(next);
  return reached;
}

function sharedVerdict(context: CheckContext, { cable, users }: SharedReturn, ambientDegC: number): Verdict {
  const ampacity = context.ampacityOf(cable, ambientDegC);
  if ('missing' in ampacity) return missing(ampacity.missing, ...sizeWanted(cable));
  const isOverloaded = context.steady.some((one) =>
    isOver(Math.abs(one.answer(cable.id).currentA ?? 0), ampacity.finalA),
  );
  // What it carries in a case is told by the rule on overloaded cables.
  if (isOverloaded) return ELSEWHERE;
  const sumA = users.reduce((sum, { part }) => sum + largestA(context, part.id), 0);
  if (!isOver(sumA, ampacity.finalA)) return PASS;
  const [sum, may] = apart(sumA, ampacity.finalA, 'A');
  return {
    kind: 'fail',
    severity: 'look',
    case: context.cases[0]?.id ?? '',
    measured: { value: sumA, unit: 'A' },
    limit: { value: ampacity.finalA, unit: 'A' },
    excess: sumA / ampacity.finalA,
    message: `${titleOf(cable)} brings back the current of ${shortList(users.map(({ part }) => `${part.id} (${amps(largestA(context, part.id))})`))}: ${sum} if all take their most at once; it may carry ${may}.`,
    basis: together(returnSmaller.basisFor(context), { text: ampacity.basis.text, status: ampacity.status }),
    others: users.map(({ part }) => part.id),
  };
}

function largestA(context: CheckContext, id: Poles['part']['id']): number {
  return Math.max(0, ...context.steady.map((one) => Math.abs(one.answer(id).currentA ?? 0)));
}
