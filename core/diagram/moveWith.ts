/** What moves when a hand moves parts: the parts, the junctions that belong to them alone or sit on them, and the conductors between. */
import type { JunctionId, Part, PartId } from '../job/part.ts';
import { junctionsOf } from '../job/part.ts';
import type { Point, Positions } from './point.ts';
import { EARTH, GRID, samePoint } from './point.ts';
import { isConductor, terminalPlaces } from './pose.ts';

export interface Moved {
  readonly parts: ReadonlyMap<PartId, Point>;
  readonly junctions: ReadonlyMap<JunctionId, Point>;
}

/** Junctions that go along with parts: no other part touches them, or they sit on the part (a pole of a device, a tap of a bar). */
export function junctionsMovedBy(
  parts: readonly Part[],
  moved: ReadonlySet<PartId>,
  positions: Positions,
): ReadonlySet<JunctionId> {
  const touching = new Map<JunctionId, Part[]>();
  for (const part of parts) {
    for (const junction of junctionsOf(part)) {
      const list = touching.get(junction);
      if (list === undefined) touching.set(junction, [part]);
      else list.push(part);
    }
  }
  const along = new Set<JunctionId>();
  for (const part of parts) {
    if (!moved.has(part.id)) continue;
    for (const junction of junctionsOf(part)) {
      // Conductors hang on: a junction of moved parts and conductors alone belongs to the parts.
      const isOwn = (touching.get(junction) ?? []).every(
        (other) => moved.has(other.id) || (isConductor(other) && !isConductor(part)),
      );
      if (junction !== EARTH && (isOwn || sitsOn(part, junction, positions))) along.add(junction);
    }
  }
  return along;
}

function sitsOn(part: Part, junction: JunctionId, positions: Positions): boolean {
  if (part.kind === 'busbar') return true;
  const at = positions.parts.get(part.id);
  const place = positions.junctions.get(junction);
  if (at === undefined || place === undefined || isConductor(part)) return false;
  const terminals = terminalPlaces(part, at, (each) => positions.junctions.get(each));
  return terminals.some((terminal) => terminal.junction === junction && samePoint(terminal, place));
}

/** New places of everything that a move by `by` touches; conductors follow their ends. */
export function moveBy(
  all: readonly Part[],
  {
    parts,
    junctions,
    by,
    positions,
  }: {
    readonly parts: ReadonlySet<PartId>;
    readonly junctions: ReadonlySet<JunctionId>;
    readonly by: Point;
    readonly positions: Positions;
  },
): Moved {
  const along = new Set([...junctions, ...junctionsMovedBy(all, parts, positions)]);
  const newJunctions = new Map<JunctionId, Point>();
  for (const id of along) {
    const at = positions.junctions.get(id);
    if (at !== undefined) newJunctions.set(id, { x: at.x + by.x, y: at.y + by.y });
  }
  const newParts = new Map<PartId, Point>();
  for (const part of all) {
    const at = positions.parts.get(part.id);
    if (at === undefined) continue;
    if (parts.has(part.id)) newParts.set(part.id, { x: at.x + by.x, y: at.y + by.y });
    else if (isConductor(part) && junctionsOf(part).some((each) => along.has(each))) {
      newParts.set(part.id, followed(part, at, { along, by, positions, newJunctions }));
    }
  }
  return { parts: newParts, junctions: newJunctions };
}

/** A conductor whose ends all move goes along; one with some ends moving keeps the middle, and the line of its fixed end. */
function followed(
  part: Part,
  at: Point,
  {
    along,
    by,
    positions,
    newJunctions,
  }: {
    readonly along: ReadonlySet<JunctionId>;
    readonly by: Point;
    readonly positions: Positions;
    readonly newJunctions: ReadonlyMap<JunctionId, Point>;
  },
): Point {
  const ends = junctionsOf(part);
  const moving = ends.filter((each) => along.has(each)).length;
  if (moving === ends.length) return { x: at.x + by.x, y: at.y + by.y };
  const places = ends.flatMap((each) => newJunctions.get(each) ?? positions.junctions.get(each) ?? []);
  const share = moving / ends.length;
  const xs = places.map(({ x }) => x);
  const ys = places.map(({ y }) => y);
  const keep = (value: number, delta: number, low: number, high: number): number => {
    const wanted = Math.round((value + delta * share) / GRID) * GRID;
    return Math.min(Math.max(wanted, low), high);
  };
  const isLevel = Math.max(...xs) - Math.min(...xs) >= Math.max(...ys) - Math.min(...ys);
  if (part.kind === 'pair')
    return {
      x: keep(at.x, by.x, Math.min(...xs), Math.max(...xs)),
      y: Math.round((at.y + by.y * share) / GRID) * GRID,
    };
  const [first] = places;
  if (first === undefined) return at;
  // A straight conductor stays straight as long as its ends allow it.
  const fixed =
    ends
      .map((each) => (along.has(each) ? undefined : positions.junctions.get(each)))
      .find((each) => each !== undefined) ?? first;
  return isLevel
    ? { x: keep(at.x, by.x, Math.min(...xs), Math.max(...xs)), y: fixed.y }
    : { x: fixed.x, y: keep(at.y, by.y, Math.min(...ys), Math.max(...ys)) };
}
