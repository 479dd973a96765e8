/** Arrays as the drawing joins them: which lie between two junctions, and what the wiring between carries of theirs. */
import type { ArrayPart, JunctionId, PartId } from '../job/part.ts';
import { isWiring, joined, type PartEnd, type WiringPart } from '../network/wiring.ts';
import type { CheckContext } from './checkContext.ts';

/** Arrays in series, from the minus side to the plus side. */
export type ArrayChain = readonly ArrayPart[];

/** Every chain of arrays from one net to another, every switch and device closed; chains side by side are several. */
export function chainsBetween(
  { drawn, nets }: Pick<CheckContext, 'drawn' | 'nets'>,
  { plus, minus }: { readonly plus: JunctionId; readonly minus: JunctionId },
): readonly ArrayChain[] {
  const arrays = drawn.filter((part): part is ArrayPart => part.kind === 'array');
  const start = nets.of(minus);
  const upTo = (net: number | undefined, above: ArrayChain): readonly ArrayChain[] =>
    arrays.flatMap((array) => {
      if (nets.of(array.plus) !== net || above.includes(array)) return [];
      const chain = [array, ...above];
      return nets.of(array.minus) === start ? [chain] : upTo(nets.of(array.minus), chain);
    });
  return start === nets.of(plus) ? [] : upTo(nets.of(plus), []);
}

/** What a chain can drive at most by its labels: the least of its arrays. */
export function chainIscA(chain: ArrayChain): number {
  return Math.min(...chain.map(arrayIscA));
}

/** I_sc of the label times the strings side by side. */
export function arrayIscA({ iscA, stringsInParallel }: ArrayPart): number {
  return iscA * stringsInParallel;
}

/**
 * Short-circuit amperes of the labels that each wiring part carries, arrays side by side added up. Found from the terminals of
 * the arrays inwards: at a junction where the current of all parts but one is known, the one carries their sum; where anything
 * else meets (a controller, a string, a load) it ends. Parts in a ring, and those that no array reaches so, are not in it.
 */
export function arrayCurrents({ meetings }: Pick<CheckContext, 'meetings'>): ReadonlyMap<PartId, number> {
  const carried = new Map<PartId, number>();
  /** What has arrived at each place of a wiring part. */
  const arrived = new Map<WiringPart, Map<JunctionId, number>>();
  const waiting = [...meetings.keys()];
  const given = new Map<JunctionId, Map<PartId, number>>();
  for (const junction of waiting) {
    const ends = meetings.get(junction) ?? [];
    const open = ends.filter((end) => amperesOf(end, given.get(junction)) === undefined);
    const [next] = open;
    if (open.length !== 1 || next === undefined || !isWiring(next.part)) continue;
    const sum = ends.reduce((soFar, end) => soFar + (amperesOf(end, given.get(junction)) ?? 0), 0);
    const { part } = next;
    const places = arrived.get(part) ?? new Map<JunctionId, number>();
    if (places.has(junction)) continue;
    arrived.set(part, places.set(junction, sum));
    // The places of a longer bar carry each their own sum: a bar has no one current.
    if (joined(part).length === 2) carried.set(part.id, sum);
    const left = joined(part).filter((place) => !places.has(place));
    if (left.length !== 1) continue;
    const total = [...places.values()].reduce((soFar, one) => soFar + one, 0);
    given.set(left[0]!, (given.get(left[0]!) ?? new Map()).set(part.id, total));
    waiting.push(left[0]!);
  }
  return new Map([...carried].filter(([, amperes]) => amperes > 0));
}

/** What is known of one end at a junction: an array's own current, or what a wiring part brings there. */
function amperesOf({ part }: PartEnd, given: ReadonlyMap<PartId, number> | undefined): number | undefined {
  return part.kind === 'array' ? arrayIscA(part) : given?.get(part.id);
}
