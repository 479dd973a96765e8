/** No symbol on another: whatever would stand on something moves to the nearest free place of the grid. */
import type { JunctionId, Part, PartId } from '../job/part.ts';
import type { Point, Positions } from './point.ts';
import type { Box, PlaceOf } from './pose.ts';
import { boxAround, boxesOverlap, isConductor } from './pose.ts';

/** Steps of the search for a free place. */
const STEP = 20;
/** How far to look before a part is put below everything, in steps. */
const MOST_RINGS = 60;
/** Width of a cell of the index; wider than any symbol. */
const CELL = 120;

/** Boxes by cells, so that a question looks at few of them. */
export class TakenRoom {
  private readonly cells = new Map<string, Box[]>();

  take(box: Box): void {
    for (const key of keysOf(box)) {
      const cell = this.cells.get(key);
      if (cell === undefined) this.cells.set(key, [box]);
      else cell.push(box);
    }
  }
  isFree(box: Box): boolean {
    return keysOf(box).every((key) => (this.cells.get(key) ?? []).every((other) => !boxesOverlap(box, other)));
  }
  /** The nearest free place for something whose box at a place is told by `boxAt`. */
  nearestFree(wanted: Point, boxAt: (at: Point) => Box): Point {
    for (let ring = 0; ring <= MOST_RINGS; ring += 1) {
      for (const { x, y } of ringPoints(ring)) {
        const at = { x: wanted.x + x * STEP, y: wanted.y + y * STEP };
        if (this.isFree(boxAt(at))) return at;
      }
    }
    return wanted;
  }
}

function keysOf({ x1, y1, x2, y2 }: Box): readonly string[] {
  const keys: string[] = [];
  for (let column = Math.floor(x1 / CELL); column <= Math.floor(x2 / CELL); column += 1) {
    for (let row = Math.floor(y1 / CELL); row <= Math.floor(y2 / CELL); row += 1) keys.push(`${column},${row}`);
  }
  return keys;
}

/** The points of a square ring, those nearest to the middle of a side first. */
function ringPoints(ring: number): readonly Point[] {
  if (ring === 0) return [{ x: 0, y: 0 }];
  const points: Point[] = [];
  for (let along = 0; along <= ring; along += 1) {
    for (const side of along === 0 ? [0] : [along, -along]) {
      points.push({ x: side, y: ring }, { x: side, y: -ring }, { x: ring, y: side }, { x: -ring, y: side });
    }
  }
  return points;
}

/** Parts in job order, those with a symbol before conductors; junctions keep their places unless two share one. */
export function separated(parts: readonly Part[], { parts: wanted, junctions: wantedJunctions }: Positions): Positions {
  const junctions = apart(wantedJunctions);
  const placeOf: PlaceOf = (junction) => junctions.get(junction);
  const room = new TakenRoom();
  const places = new Map<PartId, Point>();
  const ordered = [...parts.filter((part) => !isConductor(part)), ...parts.filter(isConductor)];
  for (const part of ordered) {
    const at = wanted.get(part.id);
    if (at === undefined) continue;
    const free = part.kind === 'busbar' ? at : room.nearestFree(at, (place) => boxAround(part, place, placeOf));
    room.take(boxAround(part, free, placeOf));
    places.set(part.id, free);
  }
  return { parts: places, junctions };
}

/** Two junctions in one place would look joined. */
function apart(wanted: ReadonlyMap<JunctionId, Point>): ReadonlyMap<JunctionId, Point> {
  const taken = new Set<string>();
  const places = new Map<JunctionId, Point>();
  for (const [junction, { x, y: wantedY }] of wanted) {
    let y = wantedY;
    while (taken.has(`${x},${y}`)) y += STEP;
    taken.add(`${x},${y}`);
    places.set(junction, { x, y });
  }
  return places;
}
