/**
 * Where grips stand that are larger than their parts because the drawing stands small: neighbours that would cover each other are
 * pushed apart, so that a hand hits the one it means.
 */
import { create } from 'zustand';
import type { PartId, Point } from '../../core/api.ts';
import { roomOf } from '../../core/api.ts';
import type { PlacedPart } from './placedParts.ts';

/** How far from the middle of its part a grip stands, for those that had to give way. */
export const useGripShifts = create<{ readonly shifts: ReadonlyMap<PartId, Point> }>()(() => ({ shifts: new Map() }));

interface Box {
  readonly id: PartId;
  x: number;
  y: number;
  readonly halfWidth: number;
  readonly halfHeight: number;
}
/** Pushing one pair apart may push it onto the next. */
const ROUNDS = 60;
/** A drawing of more parts than this stands too small on any screen for grips of its own. */
const MOST_PARTS = 300;

/** `leastSize` in units of the drawing. */
export function gripShifts(parts: readonly PlacedPart[], leastSize: number): ReadonlyMap<PartId, Point> {
  if (parts.length > MOST_PARTS) return new Map();
  // A busbar is long enough, and what hangs on it must stand on it.
  const placed = parts.filter(({ drawn }) => drawn.bar === undefined);
  const boxes = placed.map(({ part, drawn, at }): Box => {
    const { halfWidth, halfHeight } = roomOf(part, drawn.pose);
    const half = leastSize / 2;
    return { id: part.id, ...at, halfWidth: Math.max(half, halfWidth), halfHeight: Math.max(half, halfHeight) };
  });
  for (let round = 0; round < ROUNDS && pushApart(boxes); round++);
  return new Map(
    boxes.flatMap(({ id, x, y }, index) => {
      const at = placed[index]?.at ?? { x, y };
      return x === at.x && y === at.y ? [] : [[id, { x: x - at.x, y: y - at.y }] as const];
    }),
  );
}

/** Whether any had to move. */
function pushApart(boxes: readonly Box[]): boolean {
  let moved = false;
  for (const [index, a] of boxes.entries()) {
    for (const b of boxes.slice(index + 1)) {
      const overX = a.halfWidth + b.halfWidth - Math.abs(a.x - b.x);
      const overY = a.halfHeight + b.halfHeight - Math.abs(a.y - b.y);
      if (overX <= 0.5 || overY <= 0.5) continue;
      moved = true;
      if (overX <= overY) push(a, b, 'x', overX);
      else push(a, b, 'y', overY);
    }
  }
  return moved;
}

function push(a: Box, b: Box, axis: 'x' | 'y', over: number): void {
  const by = ((a[axis] <= b[axis] ? 1 : -1) * over) / 2;
  a[axis] -= by;
  b[axis] += by;
}
