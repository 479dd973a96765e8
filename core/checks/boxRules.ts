/** Boxes with more than one source in them, and the reach of the switches that isolate sources. */
import type { SwitchPart } from '../job/part.ts';
import type { Nets, PoledPart, SinglePart } from '../network/wiring.ts';
import { isWiring, joined, netsOf, polesOf } from '../network/wiring.ts';
import type { CheckContext } from './checkContext.ts';
import { clauseOf } from './clauses.ts';
import { askOfSite, askOnce, fact } from './flags.ts';
import { livePole } from './livePoles.ts';
import type { Rule } from './rule.ts';
import { isOver, PASS, Tally, type Verdict } from './tally.ts';
import { apart, list, shortList, titleOf, together, withEdition } from './wording.ts';

export const twoSourceBox: Rule = {
  id: 'two-source-box',
  family: 'wiring',
  kinds: ['string', 'array', 'charger', 'controller', 'converter'],
  title: 'Box with more than one source and no sign',
  compares:
    'for each enclosure that parts name: the sources in it or joined to what is in it (the strings of a bank as one), and whether signs name every source (sourceSign of the site)',
  remedy: 'Add a sign that names every source and its switch.',
  byPractice: true,
  reads: 'drawing',
  basisFor: (judge) => clauseOf('two-source-box', judge),
  run: (context) => {
    const tally = new Tally(twoSourceBox, twoSourceBox.basisFor(context));
    const { sourceSign } = context.job.site;
    const unsaid: SinglePart[] = [];
    for (const [box, parts] of boxesOf(context)) {
      if (!parts.some(isWiring)) continue;
      const sources = sourcesOf(context, parts);
      if (sources.length === 0) continue;
      const ids = parts.map(({ id }) => id);
      if (sources.length === 1 || sourceSign === true) tally.judge(ids, [PASS]);
      else if (sourceSign === undefined) unsaid.push(...parts);
      else {
        const words = `The box ${box} is fed by ${list(sources)}, and no sign names them: with one switched off it stays live.`;
        tally.judge(ids, [fact(context, 'look', words)]);
      }
    }
    if (unsaid.length > 0) {
      const boxes = [...new Set(unsaid.map(({ enclosure }) => enclosure ?? ''))];
      askOfSite(
        tally,
        unsaid,
        'sourceSign',
        `sourceSign of the site: is there a sign at ${shortList(boxes)} that names every source`,
      );
    }
    return tally.outcome();
  },
};

function boxesOf({ drawn }: CheckContext): ReadonlyMap<string, readonly SinglePart[]> {
  const boxes = new Map<string, SinglePart[]>();
  for (const part of drawn) {
    if (part.enclosure === undefined) continue;
    const here = boxes.get(part.enclosure);
    if (here === undefined) boxes.set(part.enclosure, [part]);
    else here.push(part);
  }
  return boxes;
}

/**
 * Names of the sources of a box; strings that are joined are one. What is joined to a box counts where there is wiring in it: a box of
 * batteries alone is no place where anybody works in the belief that it is dead.
 */
function sourcesOf(context: CheckContext, parts: readonly SinglePart[]): readonly string[] {
  const { nets, drawn } = context;
  const here = new Set(parts.flatMap((part) => livePlaces(context, part)).map((place) => nets.of(place)!));
  const inBox = new Set(parts.map(({ id }) => id));
  const sources = new Map<string, string[]>();
  for (const part of drawn) {
    for (const poles of polesOf(part)) {
      if (poles.role !== 'source') continue;
      const net = nets.of(poles[livePole(context, poles)])!;
      if (!inBox.has(part.id) && !here.has(net)) continue;
      const key = part.kind === 'string' ? `strings on ${String(net)}` : part.id;
      sources.set(key, [...(sources.get(key) ?? []), part.id]);
    }
  }
  return [...sources.values()].map((ids) => ids.join(' and '));
}

/** Live places of a part: of wiring those that no earthed pole touches, of others their live pole. */
function livePlaces(context: CheckContext, part: SinglePart) {
  if (!isWiring(part)) return polesOf(part).map((poles) => poles[livePole(context, poles)]);
  const dead = deadNets(context);
  return joined(part).filter((place) => !dead.has(context.nets.of(place)!));
}

const deadOf = new WeakMap<CheckContext, ReadonlySet<number>>();

/** Nets of the other pole of every source: the common return. */
function deadNets(context: CheckContext): ReadonlySet<number> {
  let known = deadOf.get(context);
  if (known === undefined) {
    known = new Set(
      context.drawn
        .flatMap((part) => polesOf(part))
        .flatMap((poles) => {
          const other = livePole(context, poles) === 'plus' ? 'minus' : 'plus';
          return [context.nets.of(poles[other])!];
        }),
    );
    deadOf.set(context, known);
  }
  return known;
}

export const isolatorOutOfReach: Rule = {
  id: 'isolator-out-of-reach',
  family: 'rating',
  kinds: ['switch'],
  title: 'Switch of a source out of reach',
  compares:
    'accessible and distanceFromSourceM of each switch next to a string or array: does a hand reach it at once, and (where the practice has a figure) is it near its source',
  remedy: 'Place the switch as close to its source as practicable and where a hand reaches it at once.',
  byPractice: true,
  reads: 'drawing',
  basisFor: (judge) => clauseOf('isolator-out-of-reach', judge),
  run: (context) => {
    const tally = new Tally(isolatorOutOfReach, isolatorOutOfReach.basisFor(context));
    const isolators = isolatorsOf(context);
    const unsaid: SwitchPart[] = [];
    for (const part of isolators) {
      const verdict = reachVerdict(context, part);
      if (verdict === undefined) unsaid.push(part);
      else tally.judge([part.id], [verdict]);
    }
    askOnce(tally, unsaid, 'accessible', ': does a hand reach it at once');
    return tally.outcome();
  },
};

/** Switches that stand between a source and the rest, no other switch before them. */
function isolatorsOf(context: CheckContext): readonly SwitchPart[] {
  const nets: Nets = netsOf(context.drawn, (part) => part.kind !== 'switch');
  const live = new Set(
    context.drawn
      .filter(
        (part): part is Extract<PoledPart, { kind: 'string' | 'array' }> =>
          part.kind === 'string' || part.kind === 'array',
      )
      .map((part) => nets.of(part[livePole(context, part)])!),
  );
  const isLive = (junction: SwitchPart['from']) => live.has(nets.of(junction)!);
  // Live on both sides it joins sources, as a charging relay does, and isolates none.
  return context.drawn.filter(
    (part): part is SwitchPart => part.kind === 'switch' && isLive(part.from) !== isLive(part.to),
  );
}

/** `undefined` where it is not said whether a hand reaches it. */
function reachVerdict(context: CheckContext, part: SwitchPart): Verdict | undefined {
  const most = context.practice.isolatorWithinM;
  if (most !== undefined && part.distanceFromSourceM !== undefined && isOver(part.distanceFromSourceM, most.value)) {
    const [far, near] = apart(part.distanceFromSourceM, most.value, 'm');
    return {
      kind: 'fail',
      severity: 'look',
      case: context.cases[0]?.id ?? '',
      measured: { value: part.distanceFromSourceM, unit: 'm' },
      limit: { value: most.value, unit: 'm' },
      excess: part.distanceFromSourceM / most.value,
      message: `${titleOf(part)} is ${far} from its source; within sight, which the practice asks for, ends at ${near}.`,
      basis: together(clauseOf('isolator-out-of-reach', context), withEdition(most.basis, context)),
    };
  }
  if (part.accessible === undefined) return undefined;
  return part.accessible
    ? PASS
    : fact(context, 'look', `${titleOf(part)} is not within reach: in a fire nobody opens it.`);
}
