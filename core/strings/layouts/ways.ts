/** What carries the current of one branch of a bank and of nothing else, from its posts outwards. */
import type { JunctionId, PartId } from '../../job/part.ts';
import { isOpen, isWiring, meetings, type PartEnd, type SinglePart, type WiringPart } from '../../network/wiring.ts';

/** A part with two ends: every wiring part but a bar. */
export type LinePart = Exclude<WiringPart, { kind: 'busbar' }>;

/** Parts in line from a junction to the first one where something else joins. */
export interface Way {
  readonly start: JunctionId;
  readonly parts: readonly LinePart[];
  /** Junction behind each of the parts. */
  readonly junctions: readonly JunctionId[];
  readonly end: JunctionId;
}

/** What meets at each junction, with open switches, fuses and breakers left out. */
export type Meetings = ReadonlyMap<JunctionId, readonly PartEnd[]>;

export function closedMeetings(parts: readonly SinglePart[]): Meetings {
  return meetings(parts.filter((part) => !isOpen(part)));
}

/** Follows what stands in line behind `start`, away from the part that was come from. Bars, loads and branchings end it. */
export function wayFrom(start: JunctionId, cameFrom: PartId, at: Meetings): Way {
  const parts: LinePart[] = [];
  const junctions: JunctionId[] = [];
  let [from, end] = [cameFrom, start];
  for (;;) {
    const others = (at.get(end) ?? []).filter(({ part }) => part.id !== from);
    const only = others.length === 1 ? others[0]!.part : undefined;
    if (only === undefined || !isLine(only) || parts.includes(only)) break;
    parts.push(only);
    end = otherEnd(only, end);
    junctions.push(end);
    from = only.id;
  }
  return { start, parts, junctions, end };
}

/** The way cut off behind its first `count` parts. */
export function beginning(way: Way, count: number): Way {
  const junctions = way.junctions.slice(0, count);
  return { start: way.start, parts: way.parts.slice(0, count), junctions, end: junctions.at(-1) ?? way.start };
}

export function isLine(part: SinglePart): part is LinePart {
  return isWiring(part) && part.kind !== 'busbar';
}

export function otherEnd(part: LinePart, end: JunctionId): JunctionId {
  return part.from === end ? part.to : part.from;
}
