/** Where a copy of a group of parts goes, so that it stands and is wired clear of everything. */
import type { CheckedJob } from '../job/job.ts';
import type { JunctionId, Part, PartId } from '../job/part.ts';
import { clearRoute } from './clearRoute.ts';
import type { Point, Positions } from './point.ts';
import { GRID } from './point.ts';
import { type Box, boxAround, isConductor, type PlaceOf, terminalPlaces } from './pose.ts';
import { TakenRoom } from './separate.ts';
import { drawParts, roomFor } from './surroundings.ts';
import { boxOf, type WireRoom } from './wireRoom.ts';

/** What is copied: parts, junctions, and cables from a copied junction to one that stays. */
export interface CopiedGroup {
  readonly parts: ReadonlySet<PartId>;
  readonly junctions: ReadonlySet<JunctionId>;
  readonly cables: readonly { readonly from: JunctionId; readonly to: JunctionId }[];
}

/** Around a dot. */
const DOT = 14;
/** Words stand over and under what is in line, and beside a device. */
const WORDS = { over: 30, beside: 70, end: 14 } as const;
/** A shift to the side makes a drawing harder to read than one up or down. */
const SIDEWAYS_WEIGHT = 4;
/** Shifts that are tried: to the side, and up or down in steps. */
const SIDEWAYS = [0, -240, 240, -400, 400];
const STEP = 4 * GRID;
const MOST_STEPS = 40;
/** Free shifts whose cables are laid to compare them. */
const MOST_LAID = 24;
/** Where nothing is free: below, by the height of a row. */
const BELOW: Point = { x: 0, y: 160 };

/** The shift at which the group stands free and its cables have the least to cross, to turn and to run. */
export function freeShift(job: CheckedJob, positions: Positions, group: CopiedGroup): Point {
  const room = takenRoom(job, positions);
  const boxes = boxesOf(job, positions, group);
  const isFree = (by: Point): boolean => boxes.every((box) => room.isFree(moved(box, by)));
  const wires = roomFor(job.parts, positions);
  for (const [part, { wires: drawn }] of drawParts(job.parts, positions))
    for (const { points } of drawn) wires.addWire(points, { owner: part, junction: '' as JunctionId });
  let best: { readonly by: Point; readonly cost: number } | undefined;
  for (const by of shifts().filter(isFree).slice(0, MOST_LAID)) {
    const cost = far(by) + cablesCost(wires, positions, { group, by });
    if (best === undefined || cost < best.cost) best = { by, cost };
  }
  return best?.by ?? BELOW;
}

/** Nearest first, those straight below before those above and aside. */
function shifts(): readonly Point[] {
  const all: Point[] = [];
  for (const x of SIDEWAYS) {
    for (let step = 0; step <= MOST_STEPS; step += 1) {
      if (x !== 0 || step !== 0) all.push({ x, y: step * STEP });
      if (step !== 0) all.push({ x, y: -step * STEP });
    }
  }
  all.sort((a, b) => far(a) - far(b));
  return all;
}
function far({ x, y }: Point): number {
  return SIDEWAYS_WEIGHT * Math.abs(x) + Math.abs(y);
}

/** Symbols with their words, dots and wires of the drawing. */
function takenRoom(job: CheckedJob, positions: Positions): TakenRoom {
  const room = new TakenRoom();
  const placeOf = (junction: JunctionId): Point | undefined => positions.junctions.get(junction);
  for (const at of positions.junctions.values()) room.take(around(at));
  for (const part of job.parts) {
    const at = positions.parts.get(part.id);
    if (at !== undefined && part.kind !== 'busbar' && !isConductor(part)) room.take(withWords(part, at, placeOf));
  }
  for (const { wires, bar } of drawParts(job.parts, positions).values()) {
    for (const points of [...wires.map((wire) => wire.points), bar ?? []]) {
      for (const [index, b] of points.entries()) {
        const a = points[index - 1];
        if (a !== undefined) room.take(boxOf(a, b));
      }
    }
  }
  return room;
}

function boxesOf(job: CheckedJob, positions: Positions, { parts, junctions }: CopiedGroup): readonly Box[] {
  const placeOf = (junction: JunctionId): Point | undefined => positions.junctions.get(junction);
  const symbols = job.parts.flatMap((part): readonly Box[] => {
    const at = positions.parts.get(part.id);
    if (at === undefined || !parts.has(part.id) || isConductor(part)) return [];
    const leads = terminalPlaces(part, at, placeOf).flatMap((terminal) => {
      const end = placeOf(terminal.junction);
      return end === undefined || !junctions.has(terminal.junction) ? [around(terminal)] : [boxOf(terminal, end)];
    });
    return [withWords(part, at, placeOf), ...leads];
  });
  const dots = [...junctions].flatMap((junction) => {
    const at = placeOf(junction);
    return at === undefined ? [] : [around(at)];
  });
  return [...symbols, ...dots];
}
function withWords(part: Part, at: Point, placeOf: PlaceOf): Box {
  const { x1, y1, x2, y2 } = boxAround(part, at, placeOf);
  const [across, up] = 'plus' in part ? [WORDS.beside, WORDS.end] : [WORDS.end, WORDS.over];
  return { x1: x1 - across, y1: y1 - up, x2: x2 + across, y2: y2 + up };
}
function around({ x, y }: Point): Box {
  return { x1: x - DOT, y1: y - DOT, x2: x + DOT, y2: y + DOT };
}
function moved({ x1, y1, x2, y2 }: Box, by: Point): Box {
  return { x1: x1 + by.x, y1: y1 + by.y, x2: x2 + by.x, y2: y2 + by.y };
}

function cablesCost(
  room: WireRoom,
  positions: Positions,
  { group, by }: { readonly group: CopiedGroup; readonly by: Point },
): number {
  return group.cables.reduce((sum, { from, to }) => {
    const [a, end] = [positions.junctions.get(from), positions.junctions.get(to)];
    if (a === undefined || end === undefined) return sum;
    const start = { x: a.x + by.x, y: a.y + by.y };
    return sum + clearRoute(room, cableBetween(start, { end, to })).cost;
  }, 0);
}

/** A cable from one point to a junction, free to leave any way. */
export function cableBetween(start: Point, { end, to }: { readonly end: Point; readonly to: JunctionId }) {
  return {
    owner: '',
    junction: to,
    terminal: { ...start, role: 'from', junction: to, way: wayTo(start, end) },
    end,
    entry: 'any',
    start: 'pole',
    otherHalf: [],
  } as const;
}
function wayTo(a: Point, b: Point): 'left' | 'right' | 'up' | 'down' {
  if (Math.abs(b.x - a.x) >= Math.abs(b.y - a.y)) return b.x < a.x ? 'left' : 'right';
  return b.y < a.y ? 'up' : 'down';
}
