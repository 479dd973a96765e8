/** A route clear of what stands in the way: the plain one where it is clear, else others by their number of corners. */
import type { Point } from './point.ts';
import { GRID } from './point.ts';
import type { Box, TerminalPlace } from './pose.ts';
import type { Entry } from './routeWire.ts';
import { routeWire } from './routeWire.ts';
import type { WireEnds, WireRoom } from './wireRoom.ts';
import { boxOf, CROSSING_DOT, TOUCHING } from './wireRoom.ts';

/** A wire to lay, from a terminal to a junction. */
export interface WireToLay extends WireEnds {
  readonly terminal: TerminalPlace;
  readonly end: Point;
  readonly entry: Entry;
  /** A pole's wire may leave across; one of a symbol in line goes straight on; one of a conductor's name runs along the name. */
  readonly start: 'pole' | 'symbol' | 'name';
  /** The other half of the same conductor, on which this one must not double back. */
  readonly otherHalf: readonly Point[];
}

/** Channels tried on each axis with two, three and four corners. */
const MOST_CHANNELS = { two: 14, three: 9, four: 6 } as const;
/** Leaving a symbol otherwise than straight on counts as a corner and a half. */
const TURNED_START = 1500;

/** The corner points from the terminal to the junction, and all the room that was looked at. */
export function clearRoute(
  room: WireRoom,
  wire: WireToLay,
): { readonly points: readonly Point[]; readonly cost: number; readonly seen: Box } {
  const search = new Search(room, wire);
  searchClear(search, room, wire);
  return { points: search.best, cost: search.leastCost, seen: search.seen };
}
function searchClear(search: Search, room: WireRoom, wire: WireToLay): void {
  const plain = routeWire(wire.terminal, wire.end, wire.entry);
  search.offer(plain);
  if (search.isClear) return;
  const { x, y } = wire.terminal;
  const { end } = wire;
  search.offer([wire.terminal, { x: end.x, y }, end]);
  search.offer([wire.terminal, { x, y: end.y }, end]);
  if (search.isClear) return;
  const channels = channelsOf(room, wire, plain);
  twoCorners(search, wire, channels);
  if (search.isClear) return;
  threeCorners(search, wire, channels);
  if (search.isClear) return;
  if (search.isCrossing) fourCorners(search, wire, channels);
}

class Search {
  private readonly room: WireRoom;
  private readonly wire: WireToLay;
  leastCost: number = Number.POSITIVE_INFINITY;
  /** What every route costs, for what its two ends touch. */
  private readonly floor: number;
  best: readonly Point[] = [];
  /** Around everything that was offered. */
  seen: Box;

  constructor(room: WireRoom, wire: WireToLay) {
    this.room = room;
    this.wire = wire;
    this.seen = boxOf(wire.terminal, wire.end);
    this.floor = room.costAtEnds(wire.terminal, wire.end, wire);
  }
  get isClear(): boolean {
    return this.leastCost < this.floor + TOUCHING;
  }
  /** Whether the best still crosses a symbol or touches a dot that another may keep clear of. */
  get isCrossing(): boolean {
    return this.leastCost >= this.floor + CROSSING_DOT;
  }
  /** Places to turn at whose stretch to the end is no worse than the best route. */
  turns(places: readonly number[], stretch: (at: number) => readonly Point[]): readonly Turn[] {
    for (const at of places) this.see(stretch(at));
    return places
      .map((at) => ({ at, cost: this.room.costOf(stretch(at), this.wire, this.leastCost) }))
      .filter(({ cost }) => cost < this.leastCost);
  }
  /** Offers the routes of all pairs of turns that may be better than the best. */
  eachPair(
    first: readonly Turn[],
    last: readonly Turn[],
    route: (first: number, last: number) => readonly Point[],
  ): void {
    for (const one of first)
      for (const other of last)
        if (one.cost + other.cost - this.floor < this.leastCost) this.offer(route(one.at, other.at));
  }
  private see(route: readonly Point[]): void {
    let { x1, y1, x2, y2 } = this.seen;
    for (const { x, y } of route) {
      x1 = Math.min(x1, x);
      y1 = Math.min(y1, y);
      x2 = Math.max(x2, x);
      y2 = Math.max(y2, y);
    }
    this.seen = { x1, y1, x2, y2 };
  }
  offer(route: readonly Point[]): void {
    if (hasFoldedStretch(route)) return;
    this.see(route);
    const manner = mannerCost(route, this.wire);
    if (manner >= this.leastCost) return;
    const cost = manner + this.room.costOf(route, this.wire, this.leastCost - manner);
    if (cost >= this.leastCost) return;
    this.leastCost = cost;
    this.best = route.map(({ x, y }) => ({ x, y }));
  }
}

/** A stretch without length: the route has fewer corners than it seems, and is offered as such. */
function hasFoldedStretch(route: readonly Point[]): boolean {
  for (let index = 1; index < route.length; index += 1) {
    const [a, b] = [route[index - 1], route[index]];
    if (a !== undefined && b !== undefined && a.x === b.x && a.y === b.y) return true;
  }
  return false;
}

/** Costs of how a route leaves and comes in. */
function mannerCost(route: readonly Point[], { terminal, entry, start, otherHalf }: WireToLay): number {
  const [first, second] = route;
  const [last, beforeLast] = [route.at(-1), route.at(-2)];
  if (first === undefined || second === undefined || last === undefined || beforeLast === undefined) return 0;
  let cost = 0;
  const leavesLevel = first.y === second.y;
  const isLevelWay = terminal.way === 'left' || terminal.way === 'right';
  if (start !== 'pole' && leavesLevel !== isLevelWay) cost += start === 'name' ? TOUCHING : TURNED_START;
  const comesLevel = last.y === beforeLast.y;
  if (entry !== 'any' && comesLevel !== (entry === 'level')) cost += TOUCHING;
  if (doublesBack(route, otherHalf)) cost += TOUCHING;
  return cost;
}

/** Whether two routes that begin in one point share more than that point. */
function doublesBack(route: readonly Point[], other: readonly Point[]): boolean {
  const [start, next] = route;
  const otherNext = other[1];
  if (start === undefined || next === undefined || otherNext === undefined) return false;
  const isSame = (a: number, b: number): boolean => Math.sign(a) === Math.sign(b);
  return isSame(next.x - start.x, otherNext.x - start.x) && isSame(next.y - start.y, otherNext.y - start.y);
}

interface Channels {
  readonly xs: readonly number[];
  readonly ys: readonly number[];
}

/** Where lines may run: midway, near the ends, and beside whatever stands on the plain ways. */
function channelsOf(room: WireRoom, wire: WireToLay, plain: readonly Point[]): Channels {
  const { terminal: a, end: b } = wire;
  const middle = { x: onGrid((a.x + b.x) / 2), y: onGrid((a.y + b.y) / 2) };
  const ways: readonly (readonly Point[])[] = [
    plain,
    [a, { x: b.x, y: a.y }, b],
    [a, { x: a.x, y: b.y }, b],
    [a, { x: middle.x, y: a.y }, { x: middle.x, y: b.y }, b],
    [a, { x: a.x, y: middle.y }, { x: b.x, y: middle.y }, b],
  ];
  const boxes = new Set<Box>(ways.flatMap((way) => room.obstaclesOf(way, wire)));
  const xs = [middle.x];
  const ys = [middle.y];
  for (const step of [GRID, 2 * GRID, 4 * GRID]) {
    xs.push(a.x - step, a.x + step, b.x - step, b.x + step);
    ys.push(a.y - step, a.y + step, b.y - step, b.y + step);
  }
  for (const box of boxes) {
    for (const beside of [GRID, 2 * GRID]) {
      xs.push(down(box.x1 - beside), up(box.x2 + beside));
      ys.push(down(box.y1 - beside), up(box.y2 + beside));
    }
  }
  return { xs: nearest(xs, a.x, b.x), ys: nearest(ys, a.y, b.y) };
}
const onGrid = (value: number): number => Math.round(value / GRID) * GRID;
const down = (value: number): number => Math.ceil(value / GRID) * GRID;
const up = (value: number): number => Math.floor(value / GRID) * GRID;

/** Each once, those between the ends first, then by how far they lead away. */
function nearest(values: readonly number[], a: number, b: number): readonly number[] {
  const detour = (value: number): number => Math.abs(value - a) + Math.abs(value - b) - Math.abs(a - b);
  const each = [...new Set(values)];
  each.sort((one, other) => detour(one) - detour(other));
  return each;
}

function twoCorners(search: Search, { terminal: a, end: b }: WireToLay, { xs, ys }: Channels): void {
  for (const x of xs.slice(0, MOST_CHANNELS.two)) search.offer([a, { x, y: a.y }, { x, y: b.y }, b]);
  for (const y of ys.slice(0, MOST_CHANNELS.two)) search.offer([a, { x: a.x, y }, { x: b.x, y }, b]);
}

/** A place where a route turns first or last, with the cost of the stretch between it and the end. */
interface Turn {
  readonly at: number;
  readonly cost: number;
}

function threeCorners(search: Search, { terminal: a, end: b }: WireToLay, { xs, ys }: Channels): void {
  const [fewXs, fewYs] = [xs.slice(0, MOST_CHANNELS.three), ys.slice(0, MOST_CHANNELS.three)];
  const ways = {
    levelFirst: search.turns(fewXs, (x) => [a, { x, y: a.y }]),
    uprightLast: search.turns(fewYs, (y) => [{ x: b.x, y }, b]),
    uprightFirst: search.turns(fewYs, (y) => [a, { x: a.x, y }]),
    levelLast: search.turns(fewXs, (x) => [{ x, y: b.y }, b]),
  };
  search.eachPair(ways.levelFirst, ways.uprightLast, (x, y) => [a, { x, y: a.y }, { x, y }, { x: b.x, y }, b]);
  search.eachPair(ways.levelLast, ways.uprightFirst, (x, y) => [a, { x: a.x, y }, { x, y }, { x, y: b.y }, b]);
}
function fourCorners(search: Search, { terminal: a, end: b }: WireToLay, { xs, ys }: Channels): void {
  const [fewXs, fewYs] = [spread(xs, a.x, b.x), spread(ys, a.y, b.y)];
  const [levelFirst, levelLast] = [
    search.turns(fewXs, (x) => [a, { x, y: a.y }]),
    search.turns(fewXs, (x) => [{ x, y: b.y }, b]),
  ];
  for (const y of ys.slice(0, MOST_CHANNELS.three))
    search.eachPair(levelFirst, levelLast, (x, last) => [
      a,
      { x, y: a.y },
      { x, y },
      { x: last, y },
      { x: last, y: b.y },
      b,
    ]);
  const [uprightFirst, uprightLast] = [
    search.turns(fewYs, (y) => [a, { x: a.x, y }]),
    search.turns(fewYs, (y) => [{ x: b.x, y }, b]),
  ];
  for (const x of xs.slice(0, MOST_CHANNELS.three))
    search.eachPair(uprightFirst, uprightLast, (y, last) => [
      a,
      { x: a.x, y },
      { x, y },
      { x, y: last },
      { x: b.x, y: last },
      b,
    ]);
}
/** A few channels near either end: with four corners a wire goes around at both. */
function spread(values: readonly number[], a: number, b: number): readonly number[] {
  const far = (value: number): number => Math.min(Math.abs(value - a), Math.abs(value - b));
  const sorted = [...values];
  sorted.sort((one, other) => far(one) - far(other));
  return sorted.slice(0, MOST_CHANNELS.four);
}
