/**
 * How a part stands on the drawing: level or upright, which way round, where its terminals are and how much room its symbol takes.
 * It follows from where its junctions are; nothing of it is stored.
 */
import type { JunctionId, Part } from '../job/part.ts';
import type { Point } from './point.ts';
import { EARTH, middleOf, POLES } from './point.ts';

export type Way = 'left' | 'right' | 'up' | 'down';

/** A place of a part where a wire begins, and the way in which the wire leaves. */
export interface TerminalPlace extends Point {
  /** As the field of the part: `from`, `plus`, `from.plus`, `midpoint` … */
  readonly role: string;
  readonly junction: JunctionId;
  readonly way: Way;
}

export interface Pose {
  /** Its line runs up and down. Devices between the poles and two-port parts have their poles one above the other and are not. */
  readonly isUpright: boolean;
  /** Two-ended: `from` is at the right (or at the foot). Between poles: plus is at the foot. Two-port: `from` is at the right. */
  readonly isTurned: boolean;
}

export type PlaceOf = (junction: JunctionId) => Point | undefined;

/** From the middle of a two-ended symbol to its terminals. */
export const LINK_REACH = 30;
/** From the middle of a device to its poles. */
export const POLE_REACH = POLES / 2;
/** From the middle of a two-port box to its sides. */
export const BOX_REACH = 40;

/** Parts that are their line: they have a label and no symbol that interrupts it. */
export function isConductor(part: Part): boolean {
  return part.kind === 'cable' || part.kind === 'pair';
}

/** Of a part whose middle stands at `at`; its ends alone decide where that is not known. */
export function poseOf(part: Part, placeOf: PlaceOf, at?: Point): Pose {
  switch (part.kind) {
    case 'string':
    case 'load':
    case 'inverter':
    case 'array':
    case 'charger': {
      const [plus, minus] = [placeOf(part.plus), placeOf(part.minus)];
      return { isUpright: false, isTurned: plus !== undefined && minus !== undefined && plus.y > minus.y };
    }
    case 'controller':
    case 'converter':
    case 'pair':
      return portPose(part, placeOf);
    case 'busbar':
      return {
        isUpright: isSpreadUpright(
          part.junctions.flatMap((each) => placeOf(each) ?? []),
          true,
        ),
        isTurned: false,
      };
    case 'bond':
      if (part.from === EARTH || part.to === EARTH) return { isUpright: true, isTurned: part.from === EARTH };
      return linePose(placeOf(part.from), placeOf(part.to), at);
    default:
      return linePose(placeOf(part.from), placeOf(part.to), at);
  }
}

/** In line with an end that lies straight beside or above the part; else by where its ends lie more. */
function linePose(from: Point | undefined, to: Point | undefined, at?: Point): Pose {
  if (from === undefined || to === undefined) return { isUpright: false, isTurned: false };
  const isUpright = at === undefined ? isSteep(from, to) : isInLine(from, to, at);
  return { isUpright, isTurned: isUpright ? from.y > to.y : from.x > to.x };
}
function isSteep(from: Point, to: Point): boolean {
  return Math.abs(to.y - from.y) > Math.abs(to.x - from.x);
}
function isInLine(from: Point, to: Point, at: Point): boolean {
  const level = [from, to].filter(({ y }) => y === at.y).length;
  const upright = [from, to].filter(({ x }) => x === at.x).length;
  if (level !== upright) return upright > level;
  const apart = (axis: 'x' | 'y'): number => Math.abs(to[axis] - at[axis]) + Math.abs(from[axis] - at[axis]);
  return apart('y') > apart('x');
}

function portPose(part: Extract<Part, { from: { plus: JunctionId } }>, placeOf: PlaceOf): Pose {
  const from = [part.from.plus, part.from.minus].flatMap((each) => placeOf(each) ?? []);
  const to = [part.to.plus, part.to.minus].flatMap((each) => placeOf(each) ?? []);
  if (from.length === 0 || to.length === 0) return { isUpright: false, isTurned: false };
  const [a, b] = [middleOf(from), middleOf(to)];
  const isUpright = isSteep(a, b);
  // A two-port box stands level; only a run of two conductors goes upright.
  if (part.kind !== 'pair') return { isUpright: false, isTurned: a.x > b.x };
  return { isUpright, isTurned: isUpright ? a.y > b.y : a.x > b.x };
}

function isSpreadUpright(points: readonly Point[], otherwise: boolean): boolean {
  if (points.length < 2) return otherwise;
  const xs = points.map(({ x }) => x);
  const ys = points.map(({ y }) => y);
  return Math.max(...ys) - Math.min(...ys) >= Math.max(...xs) - Math.min(...xs);
}

/** The terminals of a part whose middle stands at `at`. A busbar has none: its junctions lie on it. */
export function terminalPlaces(part: Part, at: Point, placeOf: PlaceOf): readonly TerminalPlace[] {
  const pose = poseOf(part, placeOf, at);
  switch (part.kind) {
    case 'busbar':
      return [];
    case 'string':
    case 'load':
    case 'inverter':
    case 'array':
    case 'charger':
      return poleTerminals(part, at, pose);
    case 'controller':
    case 'converter':
      return boxTerminals(part, at, { pose, placeOf });
    case 'pair':
      return laneTerminals(part, at, { pose, placeOf });
    case 'bond':
      return part.from === EARTH || part.to === EARTH
        ? [
            {
              role: part.from === EARTH ? 'to' : 'from',
              junction: part.from === EARTH ? part.to : part.from,
              x: at.x,
              y: at.y - 10,
              way: 'up',
            },
          ]
        : endTerminals(part, at, pose, LINK_REACH);
    case 'cable':
      return endTerminals(part, at, pose, 0);
    default:
      return endTerminals(part, at, pose, LINK_REACH);
  }
}

function endTerminals(
  part: { readonly from: JunctionId; readonly to: JunctionId },
  at: Point,
  { isUpright, isTurned }: Pose,
  reach: number,
): readonly TerminalPlace[] {
  const first: Omit<TerminalPlace, 'role' | 'junction'> = isUpright
    ? { x: at.x, y: at.y - reach, way: 'up' }
    : { x: at.x - reach, y: at.y, way: 'left' };
  const last: Omit<TerminalPlace, 'role' | 'junction'> = isUpright
    ? { x: at.x, y: at.y + reach, way: 'down' }
    : { x: at.x + reach, y: at.y, way: 'right' };
  const [from, to] = isTurned ? [last, first] : [first, last];
  return [
    { ...from, role: 'from', junction: part.from },
    { ...to, role: 'to', junction: part.to },
  ];
}

function poleTerminals(
  part: Extract<Part, { plus: JunctionId }>,
  at: Point,
  { isTurned }: Pose,
): readonly TerminalPlace[] {
  const up = isTurned ? -1 : 1;
  const poles: readonly TerminalPlace[] = [
    { role: 'plus', junction: part.plus, x: at.x, y: at.y - up * POLE_REACH, way: isTurned ? 'down' : 'up' },
    { role: 'minus', junction: part.minus, x: at.x, y: at.y + up * POLE_REACH, way: isTurned ? 'up' : 'down' },
  ];
  if (part.kind !== 'string' || part.midpoint === undefined) return poles;
  return [...poles, { role: 'midpoint', junction: part.midpoint, x: at.x - 30, y: at.y, way: 'left' }];
}

function boxTerminals(
  part: Extract<Part, { kind: 'controller' | 'converter' }>,
  at: Point,
  { pose, placeOf }: { readonly pose: Pose; readonly placeOf: PlaceOf },
): readonly TerminalPlace[] {
  const isMinusAbove = isPoleTurned(part, placeOf, 'y');
  const side = (port: 'from' | 'to'): readonly TerminalPlace[] => {
    const isLeft = (port === 'from') !== pose.isTurned;
    const x = at.x + (isLeft ? -BOX_REACH : BOX_REACH);
    const way = isLeft ? 'left' : 'right';
    const up = isMinusAbove ? -1 : 1;
    return [
      { role: `${port}.plus`, junction: part[port].plus, x, y: at.y - up * POLE_REACH, way },
      { role: `${port}.minus`, junction: part[port].minus, x, y: at.y + up * POLE_REACH, way },
    ];
  };
  return [...side('from'), ...side('to')];
}

/** The two conductors of a run lie one above the other (or beside each other), `POLES` apart, plus on the side of its ends. */
function laneTerminals(
  part: Extract<Part, { kind: 'pair' }>,
  at: Point,
  { pose: { isUpright, isTurned }, placeOf }: { readonly pose: Pose; readonly placeOf: PlaceOf },
): readonly TerminalPlace[] {
  const isPlusLast = isPoleTurned(part, placeOf, isUpright ? 'x' : 'y');
  return (['plus', 'minus'] as const).flatMap((pole): readonly TerminalPlace[] => {
    const offset = (pole === 'plus') === isPlusLast ? POLE_REACH : -POLE_REACH;
    const lane = isUpright ? { x: at.x + offset, y: at.y } : { x: at.x, y: at.y + offset };
    const [first, last]: readonly [Way, Way] = isUpright ? ['up', 'down'] : ['left', 'right'];
    return [
      { ...lane, role: `from.${pole}`, junction: part.from[pole], way: isTurned ? last : first },
      { ...lane, role: `to.${pole}`, junction: part.to[pole], way: isTurned ? first : last },
    ];
  });
}

/**
 * Whether the plus ends lie further along an axis than the minus ends. Where the two ports disagree, the one counts whose poles
 * stand more exactly one above the other.
 */
function isPoleTurned(part: Extract<Part, { from: { plus: JunctionId } }>, placeOf: PlaceOf, axis: 'x' | 'y'): boolean {
  const across = axis === 'x' ? 'y' : 'x';
  const ports = (['from', 'to'] as const).flatMap((port) => {
    const [plus, minus] = [placeOf(part[port].plus), placeOf(part[port].minus)];
    if (plus === undefined || minus === undefined || plus[axis] === minus[axis]) return [];
    return [{ further: plus[axis] - minus[axis], aside: Math.abs(plus[across] - minus[across]) }];
  });
  const [first, second] = ports;
  if (first === undefined) return false;
  return (second === undefined || first.aside <= second.aside ? first : second).further > 0;
}

export interface Box {
  readonly x1: number;
  readonly y1: number;
  readonly x2: number;
  readonly y2: number;
}

/** Half the room of a symbol with its lines, by its kind. A busbar's is that of its name: the bar follows its junctions. */
export function roomOf(part: Part, { isUpright }: Pose): { readonly halfWidth: number; readonly halfHeight: number } {
  const level = levelRoom(part);
  return isUpright ? { halfWidth: level.halfHeight, halfHeight: level.halfWidth } : level;
}

function levelRoom(part: Part): { readonly halfWidth: number; readonly halfHeight: number } {
  switch (part.kind) {
    case 'string':
    case 'load':
    case 'inverter':
    case 'array':
    case 'charger':
      return { halfWidth: 30, halfHeight: 30 };
    case 'controller':
    case 'converter':
      return { halfWidth: BOX_REACH, halfHeight: 54 };
    case 'cable':
    case 'pair':
      return { halfWidth: 20, halfHeight: 8 };
    case 'busbar':
      return { halfWidth: 4, halfHeight: 10 };
    case 'bond':
      return { halfWidth: 16, halfHeight: 16 };
    default:
      return { halfWidth: 20, halfHeight: 12 };
  }
}

export function boxAround(part: Part, at: Point, placeOf: PlaceOf): Box {
  const { halfWidth, halfHeight } = roomOf(part, poseOf(part, placeOf, at));
  return { x1: at.x - halfWidth, y1: at.y - halfHeight, x2: at.x + halfWidth, y2: at.y + halfHeight };
}
export function boxesOverlap(a: Box, b: Box): boolean {
  return a.x1 < b.x2 && b.x1 < a.x2 && a.y1 < b.y2 && b.y1 < a.y2;
}
