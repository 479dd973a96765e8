/** Conductors that no device protects: a fuse at the end from which they are fed. */
import type { CheckContext } from '../../checks/checkContext.ts';
import { liveSides } from '../../checks/deviceSides.ts';
import { livePole } from '../../checks/livePoles.ts';
import { protectedCablesOf } from '../../checks/protectedCables.ts';
import { rules } from '../../checks/rules.ts';
import { inSeries } from '../../checks/seriesWalk.ts';
import { isOver, isUnder } from '../../checks/tally.ts';
import { amps, titleOf } from '../../checks/wording.ts';
import { connect, insertInto } from '../../draft/connect.ts';
import type { OpenDraft } from '../../draft/draft.ts';
import { type Edit, together } from '../../draft/edit.ts';
import { setField } from '../../draft/fields.ts';
import { freshId, freshJunction, idsOf, junctionNamesOf } from '../../draft/naming.ts';
import type { PartFieldsGiven } from '../../draft/parts.ts';
import {
  type CablePart,
  type JunctionId,
  type LoadPart,
  nameOf,
  type PartId,
  type StringPart,
} from '../../job/part.ts';
import { isDevice, isWiring, joined, netsOf, polesOf } from '../../network/wiring.ts';
import { standardRatings, upperOf, wireFigures } from './fuseWindow.ts';
import { needOf } from './need.ts';
import type { NewDevice, Plan } from './plan.ts';
import { inFile, isLink, runsOf } from './runs.ts';

/** Each round protects at least one conductor more; a drawing that wants more rounds is left to a person. */
const MOST_ROUNDS = 24;

export function newDevices(plan: Plan): void {
  const given = new Set<PartId>();
  for (let round = 0; round < MOST_ROUNDS; round += 1) {
    const cable = unprotected(plan).find(({ id }) => !given.has(id));
    if (cable === undefined) break;
    const posts = postsOn(plan, cable).filter((string) => !feedsStarter(plan, string));
    const isPut = posts.length > 0 ? posts.map((string) => atPost(plan, string)).some(Boolean) : atHead(plan, cable);
    if (!isPut) given.add(cable.id);
  }
  for (const string of foundBy(plan, 'no-fuse-on-source', 'string-unfused')) {
    if (string.kind !== 'string' || hasOwnDevice(plan, string)) continue;
    if (!feedsStarter(plan, string)) atPost(plan, string);
    else plan.reject({ part: string.id, words: `a fuse at ${nameOf(string)}`, why: STARTER_BEHIND });
  }
  for (const charger of foundBy(plan, 'charger-end-open')) atCharger(plan, charger.id);
}

/** A device already stands in the string's own lead: one more would change nothing. */
function hasOwnDevice({ context }: Plan, string: StringPart): boolean {
  return inSeries(context, string[livePole(context, string)], string.id).some(isDevice);
}

const STARTER_BEHIND = 'a starter motor hangs on it: take every other branch from a fuse of its own';

/** Parts that a rule finds, first of their findings. */
function foundBy(plan: Plan, ...ids: readonly string[]) {
  const found = new Set(
    rules
      .filter(({ id }) => ids.includes(id))
      .flatMap((rule) => rule.run(plan.context).findings.map(({ finding }) => finding.parts[0]!)),
  );
  return plan.context.drawn.filter(({ id }) => found.has(id));
}

/** Cables that strings feed and no device protects; links of a bank and cables of a starter motor are left as they are. */
function unprotected(plan: Plan): readonly CablePart[] {
  const { context } = plan;
  const near = hopsFromStrings(plan);
  const covered = new Set(context.drawn.filter(isDevice).flatMap((device) => protectedCablesOf(context).of(device)));
  const starters = starterCables(plan);
  return context.drawn.filter(
    (part): part is CablePart =>
      part.kind === 'cable' &&
      near.has(part.from) &&
      !covered.has(part) &&
      !isCoveredTogether(plan, part) &&
      !starters.has(part.id) &&
      !isLink(context, part.id),
  );
}

/**
 * A cable that several devices feed, each from its own side, is protected where their ratings together are no more than it admits:
 * the link between two fused strings, the bar behind them.
 */
function isCoveredTogether({ context }: Plan, cable: CablePart): boolean {
  const bare = netsOf(context.drawn, (part) => !isDevice(part));
  const sources = new Set(
    context.drawn.flatMap((part) => (part.kind === 'string' ? [bare.of(part.plus), bare.of(part.minus)] : [])),
  );
  const net = bare.of(cable.from)!;
  const figures = wireFigures(context, cable, cable);
  if (sources.has(net) || 'missing' in figures) return false;
  const devices = context.drawn.filter(isDevice);
  const edges = devices.map(({ id, from, to }) => ({ id, from: bare.of(from)!, to: bare.of(to)! }));
  const live = liveSides(edges, (one) => sources.has(one));
  const feeding = devices.filter(({ id, from, to }) => {
    const sides = live.get(id);
    return (bare.of(from) === net && sides?.to === true) || (bare.of(to) === net && sides?.from === true);
  });
  return !isOver(
    feeding.reduce((sum, { ratingA }) => sum + ratingA, 0),
    upperOf(figures),
  );
}

/** Cables of a starter motor alone, which most books leave without a fuse. */
function starterCables({ context }: Plan): ReadonlySet<PartId> {
  const starters = new Set(startersIn(context).map(({ id }) => id));
  return new Set(runsOf(context).flatMap(({ id, cables }) => (starters.has(id) ? cables : [])));
}

function startersIn({ drawn }: CheckContext): readonly LoadPart[] {
  return drawn.filter((part): part is LoadPart => part.kind === 'load' && part.cranking === true);
}

/** A fuse at the post would stand in the way of a starter motor: then each other branch gets its own. */
function feedsStarter({ context }: Plan, string: StringPart): boolean {
  const bare = netsOf(context.drawn, (part) => !isDevice(part));
  const post = string[livePole(context, string)];
  return startersIn(context).some((starter) => bare.same(starter[livePole(context, starter)], post));
}

/** Junctions that wiring joins to the live poles of strings, by the number of parts in between. */
function hopsFromStrings({ context }: Plan): ReadonlyMap<JunctionId, number> {
  const hops = new Map<JunctionId, number>();
  for (const part of context.drawn) if (part.kind === 'string') hops.set(part[livePole(context, part)], 0);
  for (const [junction, count] of hops) {
    for (const { part } of context.meetings.get(junction) ?? []) {
      if (!isWiring(part)) continue;
      for (const end of joined(part)) if (!hops.has(end)) hops.set(end, count + 1);
    }
  }
  return hops;
}

/** Strings that feed the cable with no device in between. */
function postsOn({ context }: Plan, cable: CablePart): readonly StringPart[] {
  const bare = netsOf(context.drawn, (part) => !isDevice(part));
  return context.drawn.filter(
    (part): part is StringPart => part.kind === 'string' && bare.same(part[livePole(context, part)], cable.from),
  );
}

function atPost(plan: Plan, string: StringPart): boolean {
  const { context } = plan;
  const pole = livePole(context, string);
  const post = string[pole];
  const ratingA = ownRating(plan, string.id);
  if (ratingA === undefined) return false;
  const others = (context.meetings.get(post) ?? []).filter(({ part }) => part.id !== string.id);
  const [only] = others;
  const words = context.practice.unfusedFromBattery.words;
  const added = {
    place: `in the ${pole} lead right at ${nameOf(string)}, ${words}`,
    why: `nothing parts ${nameOf(string)} from what it feeds`,
    ratingA,
    near: string.id,
  };
  if (others.length === 1 && only?.part.kind === 'cable') {
    const { id, from } = only.part;
    return putFuse(plan, added, (part, fuse) =>
      insertInto({ cable: id, end: from === post ? 'from' : 'to', part, id: fuse }),
    );
  }
  return putFuse(plan, added, splitPost(plan, { id: string.id, path: pole, post, pole }));
}

/** The post gets a junction of its own, and the fuse stands between it and all that was joined there. */
function splitPost(
  plan: Plan,
  { id, path, post, pole }: { id: PartId; path: string; post: JunctionId; pole: 'plus' | 'minus' },
): (part: PartFieldsGiven, fuse: string) => Edit {
  return (part, fuse) => {
    const own = freshJunction(id, path, junctionNamesOf(plan.draft));
    const ends = pole === 'plus' ? { from: own, to: post } : { from: post, to: own };
    return together('', [setField({ part: id, field: path, value: own }), connect({ ...ends, with: part, id: fuse })]);
  };
}

function atHead(plan: Plan, cable: CablePart): boolean {
  const hops = hopsFromStrings(plan);
  const end = (hops.get(cable.from) ?? 0) <= (hops.get(cable.to) ?? 0) ? 'from' : 'to';
  const ratingA = ownRating(plan, cable.id);
  return ratingA !== undefined && putAtEnd(plan, { cable, end, ratingA, why: `no device protects cable ${cable.id}` });
}

/** Puts a fuse into a cable at one end. */
export function putAtEnd(
  plan: Plan,
  { cable, end, ratingA, why }: { cable: CablePart; end: 'from' | 'to'; ratingA: number; why: string },
): boolean {
  const place = `in cable ${cable.id} at ${cable[end]}, where it branches off, ${plan.context.practice.unfusedElsewhere.words}`;
  return putFuse(plan, { place, why, ratingA, near: inFile(cable.id, plan.context) }, (part, id) =>
    insertInto({ cable: cable.id, end, part, id }),
  );
}

function atCharger(plan: Plan, id: PartId): boolean {
  const { context } = plan;
  const poles = context.drawn
    .filter((part) => part.id === id)
    .flatMap(polesOf)
    .find(({ role }) => role === 'source');
  const part = context.drawn.find((one) => one.id === id);
  if (poles === undefined || part === undefined || !('outputA' in part)) return false;
  const at = poles[livePole(context, poles)];
  const neededA = part.outputA * context.job.settings.continuousFactor;
  const ratingA = standardRatings(context).find((rating) => !isUnder(rating, neededA));
  if (ratingA === undefined) return false;
  const pole = livePole(context, poles);
  const path = part.kind === 'charger' ? pole : `to.${pole}`;
  const added = {
    place: `in the ${pole} lead right at ${nameOf(part)}, ${context.practice.unfusedElsewhere.words}`,
    why: `${titleOf(part)} may feed a short from its own end too: its output is ${amps(part.outputA)}`,
    ratingA,
    near: part.id,
  };
  return putFuse(plan, added, splitPost(plan, { id, path, post: at, pole }));
}

/** The next standard rating at or above what a part carries with its margin. */
export function ownRating(plan: Plan, id: PartId): number | undefined {
  const need = needOf(plan.context, id);
  if ('missing' in need) {
    plan.reject({ part: id, words: `a fuse for ${id}`, why: `not known: ${need.missing}` });
    return undefined;
  }
  return standardRatings(plan.context).find((ratingA) => !isUnder(ratingA, need.mostA));
}

function putFuse(
  plan: Plan,
  added: Omit<NewDevice, 'device' | 'put'>,
  edit: (part: PartFieldsGiven, id: string) => Edit,
): boolean {
  const id = freshId('fuse', idsOf(plan.draft as unknown as OpenDraft));
  const put = edit({ kind: 'fuse', ratingA: added.ratingA, origin: { ratingA: 'guess' } }, id);
  return plan.put({ device: id as PartId, put, ...added });
}
