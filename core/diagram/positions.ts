/** Where everything of a job stands: as stored; what has no place yet finds one near what it touches. */
import type { CheckedJob } from '../job/job.ts';
import type { JunctionId, Part, PartId } from '../job/part.ts';
import { junctionsOf } from '../job/part.ts';
import { clearRoute } from './clearRoute.ts';
import { cableBetween } from './freeShift.ts';
import { placeBetween } from './layered.ts';
import type { Point, Positions } from './point.ts';
import { EARTH, middleOf, onGrid, POLES, samePoint } from './point.ts';
import { boxAround, terminalPlaces } from './pose.ts';
import { longestStretch } from './routeWire.ts';
import { TakenRoom } from './separate.ts';
import { roomFor } from './surroundings.ts';
import { tidyPositions } from './tidy.ts';

/** From the terminal of a two-ended part to a junction that has no place of its own. */
const LEAD = 20;

/** Stored places, filled up. A job without any is laid out by `tidyPositions`. */
export function positionsOf(job: CheckedJob): Positions {
  const parts = new Map<PartId, Point>();
  const junctions = new Map<JunctionId, Point>();
  for (const { id, at } of job.parts) if (at !== undefined) parts.set(id, at);
  for (const [id, { at }] of job.junctions) if (at !== undefined && id !== EARTH) junctions.set(id, at);
  if (parts.size === 0 && junctions.size === 0) return tidyPositions(job);
  fillJunctions(job, parts, junctions);
  fillParts(job, parts, junctions);
  fillJunctions(job, parts, junctions);
  fillRest(job, parts, junctions);
  return { parts, junctions };
}

/** A junction without a place goes where the parts that touch it expect it: at the poles of a device, at the end of a lead. */
function fillJunctions(job: CheckedJob, parts: ReadonlyMap<PartId, Point>, junctions: Map<JunctionId, Point>): void {
  const wishes = new Map<JunctionId, { readonly pole: Point[]; readonly lead: Point[] }>();
  for (const part of job.parts) {
    const at = parts.get(part.id);
    if (at === undefined) continue;
    for (const { junction, isPole, place } of wishesOf(part, at, junctions)) {
      if (junctions.has(junction) || junction === EARTH) continue;
      const wish = wishes.get(junction) ?? { pole: [], lead: [] };
      wishes.set(junction, wish);
      (isPole ? wish.pole : wish.lead).push(place);
    }
  }
  const found = new Map<JunctionId, Point>();
  for (const [junction, { pole, lead }] of wishes) {
    const wanted = pole[0] ?? onGrid(middleOfLeads(lead));
    found.set(junction, wanted);
  }
  for (const [junction, wanted] of found) junctions.set(junction, freeFor(wanted, junctions));
}

/** Leads of one row meet in the middle between them; leads of several rows meet in the uppermost. */
function middleOfLeads(leads: readonly Point[]): Point {
  const top = Math.min(...leads.map(({ y }) => y));
  return { x: middleOf(leads).x, y: top };
}

interface Wish {
  readonly junction: JunctionId;
  readonly isPole: boolean;
  readonly place: Point;
}
function wishesOf(part: Part, at: Point, junctions: ReadonlyMap<JunctionId, Point>): readonly Wish[] {
  if (part.kind === 'busbar') {
    const first = -40 * Math.floor((part.junctions.length - 1) / 2);
    return part.junctions.map((junction, index) => ({
      junction,
      isPole: true,
      place: { x: at.x, y: at.y + first + 40 * index },
    }));
  }
  const isDevice = 'plus' in part;
  const reach = part.kind === 'cable' || part.kind === 'pair' ? LEAD * 3 : LEAD;
  return terminalPlaces(part, at, (each) => junctions.get(each)).map(({ junction, way, x, y }) => ({
    junction,
    isPole: isDevice,
    place: isDevice
      ? way === 'left'
        ? { x: x - 30, y }
        : { x, y }
      : { x: x + reach * STEP_X[way], y: y + reach * STEP_Y[way] },
  }));
}
const STEP_X = { left: -1, right: 1, up: 0, down: 0 } as const;
const STEP_Y = { left: 0, right: 0, up: -1, down: 1 } as const;

function freeFor(wanted: Point, junctions: ReadonlyMap<JunctionId, Point>): Point {
  let place = wanted;
  while ([...junctions.values()].some((other) => samePoint(other, place))) place = { x: place.x, y: place.y + 20 };
  return place;
}

/** A part without a place stands between its junctions, clear of other symbols. */
function fillParts(job: CheckedJob, parts: Map<PartId, Point>, junctions: ReadonlyMap<JunctionId, Point>): void {
  const missing = job.parts.filter(({ id }) => !parts.has(id));
  if (missing.length === 0) return;
  const placeOf = (junction: JunctionId): Point | undefined => junctions.get(junction);
  const room = new TakenRoom();
  for (const part of job.parts) {
    const at = parts.get(part.id);
    if (at !== undefined) room.take(boxAround(part, at, placeOf));
  }
  // A name on a dot would hide it.
  for (const { x, y } of junctions.values()) room.take({ x1: x - 1, y1: y - 1, x2: x + 1, y2: y + 1 });
  for (const part of missing) {
    if (!junctionsOf(part).some((each) => junctions.has(each))) continue;
    const wanted =
      (part.kind === 'cable' ? onClearRoute(part, { job, parts, junctions }) : undefined) ??
      wantedPlace(part, junctions);
    const at = part.kind === 'busbar' ? wanted : room.nearestFree(wanted, (place) => boxAround(part, place, placeOf));
    room.take(boxAround(part, at, placeOf));
    parts.set(part.id, at);
  }
}

/** A cable between two known junctions has its name on the longest stretch of a route clear of symbols. */
function onClearRoute(
  part: Extract<Part, { kind: 'cable' }>,
  { job, parts, junctions }: { readonly job: CheckedJob } & Positions,
): Point | undefined {
  const [start, end] = [junctions.get(part.from), junctions.get(part.to)];
  if (start === undefined || end === undefined || samePoint(start, end)) return undefined;
  const { points } = clearRoute(roomFor(job.parts, { parts, junctions }), cableBetween(start, { end, to: part.to }));
  return onGrid(longestStretch(points).at);
}

/** Between its junctions; a run between its lines; something with one junction known, beside it. */
function wantedPlace(part: Part, junctions: ReadonlyMap<JunctionId, Point>): Point {
  const known = junctionsOf(part).flatMap((each) => junctions.get(each) ?? []);
  const [only] = known;
  if (known.length === 1 && only !== undefined && part.kind !== 'bond' && part.kind !== 'busbar') {
    const isMinus = 'minus' in part && junctions.has(part.minus);
    if ('plus' in part) return { x: only.x, y: only.y + (isMinus ? -POLES / 2 : POLES / 2) };
    const isTo = 'to' in part && typeof part.to === 'string' && junctions.has(part.to);
    return { x: only.x + (isTo ? -60 : 60), y: only.y };
  }
  return placeBetween(part, junctions);
}

/** Groups that have no place at all are laid out by themselves, below the rest. */
function fillRest(job: CheckedJob, parts: Map<PartId, Point>, junctions: Map<JunctionId, Point>): void {
  const rest = job.parts.filter(({ id }) => !parts.has(id));
  if (rest.length === 0) return;
  const low = Math.max(0, ...[...parts.values(), ...junctions.values()].map(({ y }) => y));
  const tidy = tidyPositions({ ...job, parts: rest });
  const shift = low + POLES;
  for (const [id, { x, y }] of tidy.parts) parts.set(id, { x, y: y + shift });
  for (const [id, { x, y }] of tidy.junctions) if (!junctions.has(id)) junctions.set(id, { x, y: y + shift });
}

/** The nearest place to a wanted one where a symbol of usual size stands clear of all others. */
export function freePlace(job: CheckedJob, positions: Positions, wanted: Point): Point {
  const room = new TakenRoom();
  for (const part of job.parts) {
    const at = positions.parts.get(part.id);
    if (at !== undefined) room.take(boxAround(part, at, (each) => positions.junctions.get(each)));
  }
  const half = { x: 60, y: 50 };
  return room.nearestFree(onGrid(wanted), ({ x, y }) => ({
    x1: x - half.x,
    y1: y - half.y,
    x2: x + half.x,
    y2: y + half.y,
  }));
}
