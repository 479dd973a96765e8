/** What stands in the way of wires: symbols, dots of junctions, bars and wires laid before; and what a route costs among them. */
import type { JunctionId } from '../job/part.ts';
import type { Point } from './point.ts';
import type { Box } from './pose.ts';

/** Width of a cell of the index: about a symbol with its leads. */
const CELL = 80;
/** Nearer than this a wire would seem joined to a dot or to a wire beside it. */
export const CLEAR = 6;

/** A cost of this or more: something is touched that is better kept clear of. */
export const TOUCHING = 1e4;
/** A cost of this or more: a dot of others is touched. */
export const CROSSING_DOT = 1e6;
const CROSSING_SYMBOL = 1e8;
const BEND = 1000;
const PLAIN_CROSSING = 150;
const MOST_PLAIN_CROSSINGS = 18;
const PER_LENGTH = 1 / 20;

/** Of what it is; `bar` lies where its taps are, `line` is a stretch of a wire. */
type Kind = 'symbol' | 'dot' | 'bar' | 'line';
interface Thing extends Box {
  readonly kind: Kind;
  readonly junctions: readonly JunctionId[];
  /** Of a line: whose it is. */
  readonly owner: string;
  /** Number of the last question that met it: a thing in several cells, or met by several stretches, counts once. */
  met: number;
}

/** Whose wire it is, and the junction that it leads to, whose dot, bar and other wires it may touch. */
export interface WireEnds {
  /** The other half of the same conductor has the same owner. */
  readonly owner: string;
  readonly junction: JunctionId;
}

export class WireRoom {
  private readonly cells = new Map<number, Thing[]>();
  private readonly trunks = new Map<string, { readonly low: number; readonly high: number }>();
  private question = 0;
  private readonly standing = new Map<string, Box>();

  /** All but wires, each by what it is and where. */
  get things(): ReadonlyMap<string, Box> {
    return this.standing;
  }

  addSymbol(box: Box): void {
    this.add({ ...box, kind: 'symbol', junctions: [], owner: '', met: 0 });
  }
  addDot({ x, y }: Point, junction: JunctionId): void {
    this.add({ x1: x, y1: y, x2: x, y2: y, kind: 'dot', junctions: [junction], owner: '', met: 0 });
  }
  addBar([a, b]: readonly [Point, Point], junctions: readonly JunctionId[]): void {
    this.add({ ...boxOf(a, b), kind: 'bar', junctions, owner: '', met: 0 });
  }
  addWire(points: readonly Point[], { owner, junction }: WireEnds): void {
    for (let index = 1; index < points.length; index += 1) {
      const [a, b] = [points[index - 1], points[index]];
      if (a === undefined || b === undefined) continue;
      for (const box of this.newOf(boxOf(a, b), junction))
        this.add({ ...box, kind: 'line', junctions: [junction], owner, met: 0 });
    }
  }
  /** What of a stretch no other wire of the junction covers: hundreds may share one trunk. */
  private newOf(box: Box, junction: JunctionId): readonly Box[] {
    const isLevel = box.y1 === box.y2;
    const key = `${isLevel ? `y${box.y1}` : `x${box.x1}`} ${junction}`;
    const covered = this.trunks.get(key);
    const [low, high] = isLevel ? [box.x1, box.x2] : [box.y1, box.y2];
    if (covered === undefined || covered.high < low || covered.low > high) {
      if (covered === undefined) this.trunks.set(key, { low, high });
      return [box];
    }
    const pieces = [
      ...(low < covered.low ? [{ low, high: covered.low }] : []),
      ...(high > covered.high ? [{ low: covered.high, high }] : []),
    ];
    this.trunks.set(key, { low: Math.min(low, covered.low), high: Math.max(high, covered.high) });
    return pieces.map((piece) =>
      isLevel ? { ...box, x1: piece.low, x2: piece.high } : { ...box, y1: piece.low, y2: piece.high },
    );
  }

  private add(thing: Thing): void {
    if (thing.kind !== 'line') {
      const { kind, x1, y1, x2, y2, junctions } = thing;
      this.standing.set(`${kind} ${x1} ${y1} ${x2} ${y2} ${junctions.join(' ')}`, thing);
    }
    eachCell(thing, CLEAR, (key) => {
      const cell = this.cells.get(key);
      if (cell === undefined) this.cells.set(key, [thing]);
      else cell.push(thing);
      return true;
    });
  }

  /**
   * What a route costs: first the symbols that it crosses, then the dots of others that it touches, then stretches and
   * corners shared with bars and with wires of other junctions, then bends, plain crossings and length. Given up once it costs `most`.
   */
  costOf(points: readonly Point[], ends: WireEnds, most: number = Number.POSITIVE_INFINITY): number {
    let cost = BEND * (points.length - 2) + PER_LENGTH * lengthOf(points);
    // What it costs by its shape alone is known at once: most candidates end here.
    if (cost >= most) return cost;
    this.question += 1;
    let crossings = 0;
    for (let index = 1; index < points.length && cost < most; index += 1) {
      const [a, b] = [points[index - 1], points[index]];
      if (a === undefined || b === undefined) continue;
      const stretch = boxOf(a, b);
      const right = Math.floor(stretch.x2 / CELL);
      const foot = Math.floor(stretch.y2 / CELL);
      for (let column = Math.floor(stretch.x1 / CELL); column <= right; column += 1) {
        for (let row = Math.floor(stretch.y1 / CELL); row <= foot; row += 1) {
          const cell = this.cells.get(keyOf(column, row));
          if (cell === undefined) continue;
          if (cost >= most) return cost;
          for (const thing of cell) {
            if (thing.met === this.question) continue;
            const weight = weightOf(thing, stretch, ends);
            if (weight === 0) continue;
            thing.met = this.question;
            if (weight !== PLAIN_CROSSING) cost += weight;
            else if (crossings < MOST_PLAIN_CROSSINGS) {
              crossings += 1;
              cost += weight;
            }
          }
        }
      }
    }
    return cost;
  }

  /** The part of that cost that no route between two points can save: what stands in the points themselves. */
  costAtEnds(a: Point, b: Point, ends: WireEnds): number {
    this.question += 1;
    let cost = 0;
    for (const { x, y } of [a, b]) {
      const point: Box = { x1: x, y1: y, x2: x, y2: y };
      eachCell(point, 0, (key) => {
        for (const thing of this.cells.get(key) ?? []) {
          if (thing.met === this.question) continue;
          const weight = weightOf(thing, point, ends);
          if (weight > 0) thing.met = this.question;
          cost += weight;
        }
        return true;
      });
    }
    return cost;
  }

  /** Symbols, dots and wires of others that a route meets and should not. */
  obstaclesOf(points: readonly Point[], ends: WireEnds): readonly Box[] {
    this.question += 1;
    const found: Box[] = [];
    for (let index = 1; index < points.length; index += 1) {
      const [a, b] = [points[index - 1], points[index]];
      if (a === undefined || b === undefined) continue;
      const stretch = boxOf(a, b);
      eachCell(stretch, 0, (key) => {
        for (const thing of this.cells.get(key) ?? []) {
          if (thing.met === this.question || weightOf(thing, stretch, ends) < TOUCHING) continue;
          thing.met = this.question;
          found.push(thing);
        }
        return true;
      });
    }
    return found;
  }
}

export function boxOf(a: Point, b: Point): Box {
  return { x1: Math.min(a.x, b.x), y1: Math.min(a.y, b.y), x2: Math.max(a.x, b.x), y2: Math.max(a.y, b.y) };
}

function weightOf(thing: Thing, stretch: Box, { owner, junction }: WireEnds): number {
  if (thing.kind === 'symbol') return overlap(thing, stretch, 0) ? CROSSING_SYMBOL : 0;
  if (!overlap(thing, stretch, CLEAR)) return 0;
  const isOwn = thing.junctions.includes(junction);
  if (thing.kind === 'dot') return isOwn ? 0 : CROSSING_DOT;
  // A bar is crossed as a wire is, but no wire lies on it, not even one of its own.
  if (thing.kind === 'bar') return isOwn && !isAlong(thing, stretch) ? 0 : lineWeight(thing, stretch);
  return isOwn || thing.owner === owner ? 0 : lineWeight(thing, stretch);
}
/** Longer than from an outermost tap over the end of its bar. */
const ALONG = 20;
function isAlong(bar: Box, stretch: Box): boolean {
  const [low, high] = bar.x1 === bar.x2 ? (['y1', 'y2'] as const) : (['x1', 'x2'] as const);
  return Math.min(stretch[high], bar[high]) - Math.max(stretch[low], bar[low]) > ALONG;
}
function overlap(a: Box, b: Box, room: number): boolean {
  return a.x1 < b.x2 + room && b.x1 < a.x2 + room && a.y1 < b.y2 + room && b.y1 < a.y2 + room;
}
/** Two stretches near each other: clear across, or so that they seem joined (side by side, or one ends on the other). */
function lineWeight(one: Box, other: Box): number {
  const isLevel = (box: Box): boolean => box.y1 === box.y2;
  if (isLevel(one) === isLevel(other)) return TOUCHING;
  const [level, upright] = isLevel(one) ? [one, other] : [other, one];
  const isAcross =
    level.x1 < upright.x1 - CLEAR &&
    level.x2 > upright.x1 + CLEAR &&
    upright.y1 < level.y1 - CLEAR &&
    upright.y2 > level.y1 + CLEAR;
  return isAcross ? PLAIN_CROSSING : TOUCHING;
}

function keyOf(column: number, row: number): number {
  return column * 0x1_00_00 + row;
}
function lengthOf(points: readonly Point[]): number {
  let length = 0;
  for (let index = 1; index < points.length; index += 1) {
    const [a, b] = [points[index - 1], points[index]];
    if (a !== undefined && b !== undefined) length += Math.abs(b.x - a.x) + Math.abs(b.y - a.y);
  }
  return length;
}

/** Cells that a box with some room around it lies in, until told to stop. */
function eachCell({ x1, y1, x2, y2 }: Box, room: number, visit: (key: number) => boolean): void {
  const right = Math.floor((x2 + room) / CELL);
  const foot = Math.floor((y2 + room) / CELL);
  for (let column = Math.floor((x1 - room) / CELL); column <= right; column += 1) {
    for (let row = Math.floor((y1 - room) / CELL); row <= foot; row += 1) {
      if (!visit(keyOf(column, row))) return;
    }
  }
}
