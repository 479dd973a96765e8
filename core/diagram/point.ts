/** Places on the drawing, in screen units: x to the right, y down. A junction or a part stands on a grid of `GRID` units. */
import type { JunctionId, PartId } from '../job/part.ts';

/** What a hand snaps to. */
export const GRID = 10;
/** Between the plus line and the minus line of a row, as the example jobs have it. */
export const POLES = 80;

export interface Point {
  readonly x: number;
  readonly y: number;
}

/** Where everything of a job stands. The junction `earth` has no place: each bond draws its own earth. */
export interface Positions {
  readonly parts: ReadonlyMap<PartId, Point>;
  readonly junctions: ReadonlyMap<JunctionId, Point>;
}

export const EARTH = 'earth';

export function samePoint(a: Point, b: Point): boolean {
  return a.x === b.x && a.y === b.y;
}
export function middleOf(points: readonly Point[]): Point {
  const sum = points.reduce((so, { x, y }) => ({ x: so.x + x, y: so.y + y }), { x: 0, y: 0 });
  return { x: sum.x / Math.max(1, points.length), y: sum.y / Math.max(1, points.length) };
}
export function onGrid({ x, y }: Point, grid: number = GRID): Point {
  return { x: Math.round(x / grid) * grid, y: Math.round(y / grid) * grid };
}
