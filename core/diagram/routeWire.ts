/** Wires run level and upright only. A wire leaves its terminal the way that the terminal looks and ends at a junction. */

import type { Point } from './point.ts';
import type { TerminalPlace } from './pose.ts';

/** How a wire must come in: `level` into an upright bar, `upright` into a level one, `any` into a junction alone. */
export type Entry = 'level' | 'upright' | 'any';

/** How far a wire goes straight on before it turns back. */
const STUB = 20;

/**
 * Corner points of the wire from a terminal to a junction, both ends included. Straight where it can be; one corner into a plain
 * junction, so that wires in a row of rows share one upright line; two corners into a bar, so that the tap is seen.
 */
export function routeWire(
  terminal: Pick<TerminalPlace, 'x' | 'y' | 'way'>,
  end: Point,
  entry: Entry = 'any',
): readonly Point[] {
  const start: Point = { x: terminal.x, y: terminal.y };
  const isLevel = terminal.way === 'left' || terminal.way === 'right';
  // The rules are written for a level start; an upright one is the same with the axes changed over.
  if (isLevel) return straightened(levelRoute(start, { end, ahead: terminal.way === 'right' ? 1 : -1, entry }));
  const swap = ({ x, y }: Point): Point => ({ x: y, y: x });
  const turned: Entry = entry === 'level' ? 'upright' : entry === 'upright' ? 'level' : 'any';
  const route = levelRoute(swap(start), {
    end: swap(end),
    ahead: terminal.way === 'down' ? 1 : -1,
    entry: turned,
    isPole: true,
  });
  return straightened(route.map(swap));
}

function levelRoute(
  start: Point,
  {
    end,
    ahead,
    entry,
    isPole = false,
  }: { readonly end: Point; readonly ahead: 1 | -1; readonly entry: Entry; readonly isPole?: boolean },
): readonly Point[] {
  if (start.y === end.y || start.x === end.x) return [start, end];
  // A pole stands clear of its symbol: its wire may leave across, and shares the line of the row.
  if (isPole) {
    if (entry !== 'upright') return [start, { x: start.x, y: end.y }, end];
    const middle = halfway(start.y, end.y);
    return [start, { x: start.x, y: middle }, { x: end.x, y: middle }, end];
  }
  const isAhead = (end.x - start.x) * ahead > 0;
  if (!isAhead) {
    const out = start.x + ahead * STUB;
    return [start, { x: out, y: start.y }, { x: out, y: end.y }, end];
  }
  if (entry === 'level') {
    const middle = halfway(start.x, end.x);
    return [start, { x: middle, y: start.y }, { x: middle, y: end.y }, end];
  }
  return [start, { x: end.x, y: start.y }, end];
}

function halfway(a: number, b: number): number {
  return Math.round((a + b) / 20) * 10;
}

/** Without points that say nothing: repeated ones, and those in the middle of a straight stretch. */
export function straightened(points: readonly Point[]): readonly Point[] {
  const kept: Point[] = [];
  for (const point of points) {
    const last = kept.at(-1);
    if (last !== undefined && last.x === point.x && last.y === point.y) continue;
    const before = kept.at(-2);
    const isStraight =
      last !== undefined &&
      before !== undefined &&
      ((before.x === last.x && last.x === point.x && between(before.y, last.y, point.y)) ||
        (before.y === last.y && last.y === point.y && between(before.x, last.x, point.x)));
    if (isStraight) kept.pop();
    kept.push(point);
  }
  return kept;
}
function between(a: number, middle: number, b: number): boolean {
  return (middle - a) * (b - middle) >= 0;
}

/** The middle of the longest stretch of a line, and the way in which that stretch runs. */
export function longestStretch(points: readonly Point[]): {
  readonly at: Point;
  readonly isUpright: boolean;
  readonly forward: 1 | -1;
  readonly length: number;
} {
  let best: { at: Point; isUpright: boolean; forward: 1 | -1; length: number } = {
    at: points[0] ?? { x: 0, y: 0 },
    isUpright: false,
    forward: 1,
    length: 0,
  };
  for (const [index, b] of points.entries()) {
    const a = points[index - 1];
    if (a === undefined) continue;
    const length = Math.abs(b.x - a.x) + Math.abs(b.y - a.y);
    if (length <= best.length) continue;
    const isUpright = a.x === b.x;
    best = {
      at: { x: (a.x + b.x) / 2, y: (a.y + b.y) / 2 },
      isUpright,
      forward: (isUpright ? b.y > a.y : b.x > a.x) ? 1 : -1,
      length,
    };
  }
  return best;
}
