/** What lies in series with a terminal: the parts that carry its current and no other. */
import type { JunctionId, PartId } from '../job/part.ts';
import { isWiring, joined, type WiringPart } from '../network/wiring.ts';
import type { CheckContext } from './checkContext.ts';

/**
 * Wiring from a junction on, away from the part at its back, nearest first, as long as exactly two parts meet at each junction.
 * Ends at a branch, a bar with more than two places, a terminal or a loose end.
 */
export function inSeries(
  { meetings }: Pick<CheckContext, 'meetings'>,
  start: JunctionId,
  behind: PartId,
): readonly WiringPart[] {
  const found: WiringPart[] = [];
  const passed = new Set<PartId>([behind]);
  let [junction, last] = [start, behind];
  for (;;) {
    const ends = meetings.get(junction) ?? [];
    const next = ends.find(({ part }) => part.id !== last)?.part;
    if (ends.length !== 2 || next === undefined || passed.has(next.id) || !isWiring(next)) return found;
    const places = joined(next);
    if (places.length !== 2) return found;
    passed.add(next.id);
    found.push(next);
    last = next.id;
    junction = places[0] === junction ? places[1]! : places[0]!;
  }
}
