/** Switches and busbars against what the fuses before and behind them let through. */
import type { BusbarPart, JunctionId, SwitchPart } from '../job/part.ts';
import {
  type Device,
  isDevice,
  isWiring,
  joined,
  type Nets,
  netsOf,
  type Poles,
  polesOf,
  type SinglePart,
} from '../network/wiring.ts';
import type { CheckContext, SolvedCase } from './checkContext.ts';
import { clauseOf } from './clauses.ts';
import type { Rule } from './rule.ts';
import { inSeries } from './seriesWalk.ts';
import { isOver, missing, missingField, PASS, Tally, type Verdict } from './tally.ts';
import { amps, apart, titleOf } from './wording.ts';

export const mainSwitchSmall: Rule = {
  id: 'main-switch-small',
  family: 'rating',
  kinds: ['switch'],
  title: 'Switch smaller than the fuse in line with it, or than the current of a start',
  compares:
    'ratingA of each switch with the smallest fuse or breaker in line with it, and its shortTimeA with the current solved in it while a load starts',
  remedy: 'Fit a switch rated at least as high as the fuse in line with it, and for the current of the start.',
  byPractice: true,
  reads: 'every-case',
  basisFor: (judge) => clauseOf('main-switch-small', judge),
  run: (context) => {
    const tally = new Tally(mainSwitchSmall, mainSwitchSmall.basisFor(context));
    for (const part of context.drawn) {
      if (part.kind !== 'switch') continue;
      tally.judge([part.id], [...lineVerdicts(context, part), ...startVerdicts(context, part)]);
    }
    return tally.outcome();
  },
};

function lineVerdicts(context: CheckContext, part: SwitchPart): readonly Verdict[] {
  const line = [part.from, part.to].flatMap((end) => inSeries(context, end, part.id));
  const devices = line.filter((one) => isDevice(one)) as readonly Device[];
  if (devices.length === 0) return [];
  if (part.ratingA === undefined) return [missingField(part, 'ratingA')];
  const smallest = devices.reduce((least, one) => (one.ratingA < least.ratingA ? one : least));
  if (!isOver(smallest.ratingA, part.ratingA)) return [PASS];
  const [fused, rated] = apart(smallest.ratingA, part.ratingA, 'A');
  return [
    {
      kind: 'fail',
      severity: 'fix',
      case: context.cases[0]?.id ?? '',
      measured: { value: smallest.ratingA, unit: 'A' },
      limit: { value: part.ratingA, unit: 'A' },
      excess: smallest.ratingA / part.ratingA,
      message: `${titleOf(part)} is rated ${rated}; ${smallest.kind} ${smallest.id} in line with it lets ${fused} through for good.`,
      others: [smallest.id],
    },
  ];
}

function startVerdicts(context: CheckContext, drawn: SwitchPart): readonly Verdict[] {
  return context.solved.flatMap((one): readonly Verdict[] => {
    const part = one.part(drawn.id) as SwitchPart;
    if (!one.isStarting || part.state === 'open') return [];
    return [startVerdict(one, part)];
  });
}

function startVerdict(one: SolvedCase, part: SwitchPart): Verdict {
  const { currentA, undetermined } = one.answer(part.id);
  if (currentA === null) {
    return missing(`current in switch ${part.id} in case ${one.id}: ${undetermined ?? 'not determined'}`);
  }
  const carriedA = Math.abs(currentA);
  if (part.ratingA !== undefined && !isOver(carriedA, part.ratingA)) return PASS;
  if (part.shortTimeA === undefined) {
    return missingField(part, 'shortTimeA', `: it carries ${amps(carriedA)} in case ${one.id}`);
  }
  if (!isOver(carriedA, part.shortTimeA)) return PASS;
  const [carried, allowed] = apart(carriedA, part.shortTimeA, 'A');
  return {
    kind: 'fail',
    severity: 'fix',
    case: one.id,
    measured: { value: carriedA, unit: 'A' },
    limit: { value: part.shortTimeA, unit: 'A' },
    excess: carriedA / part.shortTimeA,
    message: `${titleOf(part)} carries ${carried} while ${one.operatingCase.surge ?? 'a load'} starts; it is made for ${allowed} for a few seconds.`,
  };
}

export const busbarSmall: Rule = {
  id: 'busbar-small',
  family: 'rating',
  kinds: ['busbar'],
  title: 'Busbar that its fuses do not protect',
  compares:
    'ratingA of each busbar with the most that the fuses of its feeds and outgoing ways let through any of its segments, by the places of the taps',
  remedy: 'Use a larger bar, or place feeds and taps so that no segment carries the sum.',
  byPractice: true,
  reads: 'drawing',
  basisFor: (judge) => clauseOf('busbar-small', judge),
  run: (context) => {
    const tally = new Tally(busbarSmall, busbarSmall.basisFor(context));
    for (const bar of context.drawn) if (bar.kind === 'busbar') tally.judge([bar.id], barVerdicts(context, bar));
    return tally.outcome();
  },
};

/** One way off a bar: what it can bring and take at most, infinite where nothing limits it. */
interface Way {
  readonly bringsA: number;
  readonly takesA: number;
}

/** No verdict where nothing limits the bar's current (minus bars) or it has no rating: other rules tell of both. */
function barVerdicts(context: CheckContext, bar: BusbarPart): readonly Verdict[] {
  if (bar.ratingA === undefined) return [];
  const apartFromBar = netsOf(context.drawn, (part) => part !== bar);
  const poles = polesByNet(context, apartFromBar);
  const taps = bar.junctions.map((tap) => waysAt(context, { bar, tap, nets: apartFromBar, poles }));
  const feeds = taps.flat().filter(({ bringsA }) => bringsA > 0);
  const mostA = mostThroughASegment(taps.map(together));
  if (!Number.isFinite(mostA) || mostA === 0) return [];
  if (!isOver(mostA, bar.ratingA)) return [PASS];
  const [through, rated] = apart(mostA, bar.ratingA, 'A');
  const isOne = feeds.some(({ bringsA }) => isOver(bringsA, bar.ratingA!));
  return [
    {
      kind: 'fail',
      severity: isOne ? 'fix' : 'look',
      case: context.cases[0]?.id ?? '',
      measured: { value: mostA, unit: 'A' },
      limit: { value: bar.ratingA, unit: 'A' },
      excess: mostA / bar.ratingA,
      message: `${titleOf(bar)} is rated ${rated}; the fuses of its ${feeds.length === 1 ? 'feed' : `${String(feeds.length)} feeds`} and outgoing ways let ${through} pass through one of its segments for good.`,
    },
  ];
}

/** Over all segments the most that can pass: what one side brings, no more than what the other takes, either way. */
function mostThroughASegment(taps: readonly Way[]): number {
  const fromRight: Way[] = [];
  let right: Way = NO_WAY;
  for (let tap = taps.length - 1; tap > 0; tap--) {
    right = together([right, taps[tap]!]);
    fromRight[tap] = right;
  }
  let [most, left] = [0, NO_WAY];
  for (let cut = 1; cut < taps.length; cut++) {
    left = together([left, taps[cut - 1]!]);
    const beyond = fromRight[cut]!;
    most = Math.max(most, Math.min(left.bringsA, beyond.takesA), Math.min(beyond.bringsA, left.takesA));
  }
  return most;
}

const NO_WAY: Way = { bringsA: 0, takesA: 0 };

function together(ways: readonly Way[]): Way {
  return ways.reduce((sum, way) => ({ bringsA: sum.bringsA + way.bringsA, takesA: sum.takesA + way.takesA }), NO_WAY);
}

function polesByNet({ drawn }: CheckContext, nets: Nets): ReadonlyMap<number, readonly Poles[]> {
  const found = new Map<number, Poles[]>();
  for (const poles of drawn.flatMap((part) => polesOf(part))) {
    for (const net of new Set([nets.of(poles.plus)!, nets.of(poles.minus)!])) {
      const here = found.get(net);
      if (here === undefined) found.set(net, [poles]);
      else here.push(poles);
    }
  }
  return found;
}

interface Tap {
  readonly bar: BusbarPart;
  readonly tap: JunctionId;
  /** What is joined without the bar. */
  readonly nets: Nets;
  readonly poles: ReadonlyMap<number, readonly Poles[]>;
}

function waysAt(context: CheckContext, at: Tap): readonly Way[] {
  const ends = (context.meetings.get(at.tap) ?? []).filter(({ part }) => part !== at.bar);
  return ends.map(({ part }) => wayThrough(context, part, at));
}

function wayThrough(context: CheckContext, first: SinglePart, { tap, nets, poles }: Tap): Way {
  if (!isWiring(first)) return ownLimit(first);
  const places = joined(first);
  if (places.length !== 2) return { bringsA: Number.POSITIVE_INFINITY, takesA: Number.POSITIVE_INFINITY };
  const beyond = places[0] === tap ? places[1]! : places[0]!;
  const line = [first, ...inSeries(context, beyond, first.id)];
  const devices = line.filter((one) => isDevice(one)) as readonly Device[];
  const fusedA = Math.min(Number.POSITIVE_INFINITY, ...devices.map(({ ratingA }) => ratingA));
  const reached = poles.get(nets.of(beyond)!) ?? [];
  if (reached.some(({ part }) => part.kind === 'string')) return { bringsA: fusedA, takesA: fusedA };
  const sources = reached.filter(({ role }) => role === 'source');
  const suppliedA = sources.reduce(
    (sum, { part }) => sum + ('outputA' in part ? part.outputA : Number.POSITIVE_INFINITY),
    0,
  );
  const isTaken = reached.some(({ role }) => role === 'sink');
  return { bringsA: Math.min(fusedA, suppliedA), takesA: isTaken ? fusedA : 0 };
}

/** A part with its terminal on the bar itself. */
function ownLimit(part: SinglePart): Way {
  if (part.kind === 'charger') return { bringsA: part.outputA, takesA: 0 };
  return {
    bringsA: polesOf(part).some(({ role }) => role === 'source') ? Number.POSITIVE_INFINITY : 0,
    takesA: Number.POSITIVE_INFINITY,
  };
}
