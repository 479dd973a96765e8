/** Conductors of one pole side by side: are they alike, and does their fuse protect each of them should another open. */
import { areaOf } from '../conductor/size.ts';
import type { CablePart } from '../job/part.ts';
import { type Device, isDevice } from '../network/wiring.ts';
import type { Status } from '../tables/status.ts';
import { sizeText } from '../units/conductorSize.ts';
import type { CheckContext, SolvedCase } from './checkContext.ts';
import { clauseOf } from './clauses.ts';
import type { WantedField } from './finding.ts';
import { largestDevice } from './fuseRules.ts';
import { protectedCablesOf } from './protectedCables.ts';
import type { Rule, RuleOutcome } from './rule.ts';
import { isOver, isUnder, missing, NOMINAL_VOLTS, PASS, sizeWanted, Tally, type Verdict, wanted } from './tally.ts';
import { amps, apart, field, list, titleOf, together, withEdition } from './wording.ts';

/** Conductors between the same two junctions: cables drawn each by itself, or one cable of several in parallel. */
interface Legs {
  readonly cables: readonly CablePart[];
  readonly count: number;
}

function legsOf({ drawn }: CheckContext): readonly Legs[] {
  const byEnds = new Map<string, CablePart[]>();
  for (const part of drawn) {
    if (part.kind !== 'cable') continue;
    const ends = part.from < part.to ? `${part.from}\n${part.to}` : `${part.to}\n${part.from}`;
    const beside = byEnds.get(ends);
    if (beside === undefined) byEnds.set(ends, [part]);
    else beside.push(part);
  }
  return [...byEnds.values()]
    .map((cables) => ({ cables, count: cables.reduce((sum, { inParallel }) => sum + inParallel, 0) }))
    .filter(({ count }) => count > 1);
}

export const parallelLegsUnequal: Rule = {
  id: 'parallel-legs-unequal',
  family: 'cable',
  kinds: ['cable'],
  title: 'Parallel conductors that are not alike, or too thin to be paralleled',
  compares:
    'of cables of one pole between the same two junctions: length, size, metal, stranding and insulation; and, where the practice names one, their size with the smallest that may be paralleled',
  remedy: 'Lay one larger cable instead, or make the conductors alike in all and of the size that may be paralleled.',
  byPractice: true,
  reads: 'drawing',
  basisFor: (judge) => clauseOf('parallel-legs-unequal', judge),
  run: (context) => {
    const tally = new Tally(parallelLegsUnequal, parallelLegsUnequal.basisFor(context));
    for (const legs of legsOf(context)) {
      tally.judge(
        legs.cables.map(({ id }) => id),
        [alikeVerdict(context, legs), thinVerdict(context, legs)],
      );
    }
    return tally.outcome();
  },
};

/** What has to be the same, with how it is told apart; `undefined` for a figure not given. */
const TRAITS: readonly (readonly [field: string, trait: (cable: CablePart) => string | number | undefined])[] = [
  ['lengthM', ({ lengthM }) => Math.round(lengthM * MILLIMETRES)],
  ['size', ({ size }) => (size === undefined ? undefined : sizeText(size))],
  ['metal', ({ metal }) => (metal === 'aluminium' ? metal : metal === undefined ? undefined : 'copper')],
  ['stranding', ({ stranding }) => stranding],
  ['insulationDegC', ({ insulationDegC }) => insulationDegC],
];
const MILLIMETRES = 1000;

function alikeVerdict(context: CheckContext, { cables }: Legs): Verdict {
  const unlike = TRAITS.filter(([, trait]) => new Set(cables.flatMap((cable) => trait(cable) ?? [])).size > 1);
  const names = list(cables.map(({ id }) => id));
  if (unlike.length > 0) {
    const lengthsM = cables.map(({ lengthM }) => lengthM);
    const [longestM, shortestM] = [Math.max(...lengthsM), Math.min(...lengthsM)];
    return {
      kind: 'fail',
      severity: 'fix',
      case: context.cases[0]?.id ?? '',
      measured: { value: longestM, unit: 'm' },
      limit: { value: shortestM, unit: 'm' },
      excess: 1 + unlike.length,
      message: `Cables ${names} lie side by side in one pole and differ in ${list(unlike.map(([name]) => name))}: the current does not share evenly.`,
    };
  }
  const gaps: WantedField[] = [];
  const words: string[] = [];
  for (const [name, trait] of TRAITS) {
    // What none of them says is the same for all as far as anyone knows.
    const silent = cables.filter((cable) => trait(cable) === undefined);
    if (silent.length === 0 || silent.length === cables.length) continue;
    for (const cable of silent) {
      gaps.push(wanted(cable, name));
      words.push(field(cable, name));
    }
  }
  return gaps.length === 0 ? PASS : missing(`${list(words)}: are ${names} alike`, ...gaps);
}

function thinVerdict(context: CheckContext, { cables }: Legs): Verdict {
  const smallest = context.practice.smallestParalleled;
  if (smallest === undefined) return PASS;
  const least = areaOf(smallest.size, context.tables.conductors);
  if ('missing' in least) return PASS;
  for (const cable of cables) {
    if (cable.size === undefined) return missing(field(cable, 'size'), ...sizeWanted(cable));
    const area = areaOf(cable.size, context.tables.conductors);
    if ('missing' in area) return missing(`${area.missing} (cable ${cable.id})`);
    if (!isUnder(area.value, least.value)) continue;
    return {
      kind: 'fail',
      severity: 'fix',
      case: context.cases[0]?.id ?? '',
      measured: { value: area.value, unit: 'mm2' },
      limit: { value: least.value, unit: 'mm2' },
      excess: least.value / area.value,
      message: `${titleOf(cable)} is one of several in parallel and ${sizeText(cable.size)}; ${sizeText(smallest.size)} is the smallest that may be paralleled.`,
      basis: withEdition(smallest.basis, context),
    };
  }
  return PASS;
}

export const parallelLegsUnfused: Rule = {
  id: 'parallel-legs-unfused',
  family: 'cable',
  kinds: ['fuse', 'breaker'],
  title: 'Fuse that does not protect one of several parallel conductors should another open',
  compares:
    'for parallel conductors with one out: the current of the others in any case without a starting load with the ampacity of one, and the rating of their fuse with the largest that the practice allows over one',
  remedy: 'Fuse each conductor, or choose one fuse for a single conductor, or lay one larger cable.',
  byPractice: true,
  reads: 'steady-cases',
  basisFor: (judge) => clauseOf('parallel-legs-unfused', judge),
  run: runLegsUnfused,
};

function runLegsUnfused(context: CheckContext): RuleOutcome {
  const tally = new Tally(parallelLegsUnfused, parallelLegsUnfused.basisFor(context));
  const groups = legsOf(context);
  if (groups.length === 0) return tally.outcome();
  const devices = context.drawn.filter(isDevice);
  for (const legs of groups) {
    const first = legs.cables[0]!;
    const over = devices.filter((device) => protectedCablesOf(context).of(device).includes(first));
    const verdicts = context.steady.flatMap((one) => legVerdict(context, one, { legs, over }));
    tally.judge(
      legs.cables.map(({ id }) => id),
      verdicts,
    );
  }
  return tally.outcome();
}

function legVerdict(
  context: CheckContext,
  one: SolvedCase,
  { legs, over }: { readonly legs: Legs; readonly over: readonly Device[] },
): readonly Verdict[] {
  const { cables, count } = legs;
  const currents = cables.map(({ id }) => one.answer(id).currentA);
  if (currents.some((currentA) => currentA === null))
    return [missing(`current in ${list(cables.map(({ id }) => id))}`)];
  const leg = weakestLeg(context, one, cables);
  if ('missing' in leg) return [missing(leg.missing, ...sizeWanted(leg.cable))];
  // Drawn each by itself they may be turned against one another.
  const totalA = Math.abs(
    cables.reduce((sum, { from }, k) => sum + (from === cables[0]!.from ? 1 : -1) * currents[k]!, 0),
  );
  const leftA = totalA / (count - 1);
  if (!isOver(leftA, leg.ampacityA)) return [PASS];
  const ratingA = over.length === 0 ? undefined : Math.min(...over.map((device) => device.ratingA));
  const nominalV = context.volts.nominalAt(leg.cable.from);
  const allowed = largestDevice({ ampacityA: leg.ampacityA, nominalV }, context);
  if ('missing' in allowed) return [missing(`${allowed.missing} (cable ${leg.cable.id})`, NOMINAL_VOLTS)];
  if (ratingA !== undefined && !isOver(ratingA, allowed.ratingA)) return [PASS];
  const [carries, may] = apart(leftA, leg.ampacityA, 'A');
  const fuse = ratingA === undefined ? 'no fuse is over them' : `the fuse over them is ${amps(ratingA)}`;
  return [
    {
      kind: 'fail',
      severity: 'fix',
      case: one.id,
      measured: { value: leftA, unit: 'A' },
      limit: { value: leg.ampacityA, unit: 'A' },
      excess: leftA / leg.ampacityA,
      message: `With one of the ${count} parallel conductors of ${list(cables.map(({ id }) => id))} open, each other carries ${carries}; one may carry ${may}, and ${fuse}.`,
      basis: together(parallelLegsUnfused.basisFor(context), leg.basis),
      others: over.map(({ id }) => id),
    },
  ];
}

interface RatedLeg {
  readonly cable: CablePart;
  readonly ampacityA: number;
  readonly basis: { readonly text: string; readonly status: Status };
}
type Leg = RatedLeg | { readonly cable: CablePart; readonly missing: string };

/** The conductor of least ampacity, taken alone. */
function weakestLeg(context: CheckContext, one: SolvedCase, cables: readonly CablePart[]): Leg {
  let weakest: RatedLeg | undefined;
  for (const cable of cables) {
    const ampacity = context.ampacityOf(singleLeg(cable), one.ambientDegC);
    if ('missing' in ampacity) return { cable, missing: ampacity.missing };
    if (weakest !== undefined && weakest.ampacityA <= ampacity.finalA) continue;
    const basis = { text: ampacity.basis.text, status: ampacity.status };
    weakest = { cable, ampacityA: ampacity.finalA, basis };
  }
  return weakest!;
}

const singles = new WeakMap<CablePart, CablePart>();

/** One conductor of a cable of several in parallel; the same each time, so that its ampacity is found once. */
function singleLeg(cable: CablePart): CablePart {
  if (cable.inParallel === 1) return cable;
  let single = singles.get(cable);
  if (single === undefined) {
    single = { ...cable, inParallel: 1 };
    singles.set(cable, single);
  }
  return single;
}
