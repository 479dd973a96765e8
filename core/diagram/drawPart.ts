/** What is drawn for one part besides its symbol: wires to its junctions, the lanes of a run, the bar of a busbar. */
import type { JunctionId, Part, PartId } from '../job/part.ts';
import type { Point } from './point.ts';
import type { PlaceOf, Pose, TerminalPlace } from './pose.ts';
import { poseOf, terminalPlaces } from './pose.ts';
import type { Entry } from './routeWire.ts';
import { longestStretch, routeWire, straightened } from './routeWire.ts';

/** A line on the drawing that carries one current. */
export interface DrawnWire {
  /** As the terminal that it leads to; for a whole conductor `through`, `plus` or `minus`. */
  readonly role: string;
  /**
   * In the direction that counts as positive for `current`: a two-ended part from `from` to `to`; a source out of its plus and into
   * its minus; a load the other way round.
   */
  readonly points: readonly Point[];
  /** Which answer it carries, with the sign to take it by. */
  readonly current: WireCurrent;
}

export type WireCurrent =
  /** `currentA` of the part, or of `<id>.plus`, `<id>.minus` of a run. */
  | { readonly of: 'through'; readonly cable?: 'plus' | 'minus' }
  /** `inputA` or `outputA` of a two-port part. */
  | { readonly of: 'input' | 'output' }
  | { readonly of: 'segment'; readonly index: number }
  /** Carries the difference of other currents, told by none. */
  | { readonly of: 'none' };

export interface DrawnPart {
  readonly pose: Pose;
  readonly terminals: readonly TerminalPlace[];
  readonly wires: readonly DrawnWire[];
  /** The bar of a busbar, its ends included; else `undefined`. */
  readonly bar: readonly [Point, Point] | undefined;
}

export interface Surroundings {
  readonly placeOf: PlaceOf;
  /** How wires come into a junction: across the bar that it lies on. */
  readonly entryOf: (junction: JunctionId) => Entry;
  /** The route from a terminal to its junction, laid clear of the rest by `surroundingsOf`; else each wire runs by itself. */
  readonly routeOf?: (part: PartId, role: string) => readonly Point[] | undefined;
}

/** How far a bar reaches beyond its outermost taps. */
const BEYOND = 10;

/** A part that stands at `at` among its junctions. Junctions without a place get no wire. */
export function drawPart(part: Part, at: Point, around: Surroundings): DrawnPart {
  const pose = poseOf(part, around.placeOf, at);
  if (part.kind === 'busbar') return { pose, terminals: [], ...drawBar(part, at, { pose, placeOf: around.placeOf }) };
  const terminals = terminalPlaces(part, at, around.placeOf);
  return { pose, terminals, wires: wiresOf(part, terminals, around), bar: undefined };
}

function wiresOf(part: Part, terminals: readonly TerminalPlace[], around: Surroundings): readonly DrawnWire[] {
  const route = (terminal: TerminalPlace): readonly Point[] => {
    const laid = around.routeOf?.(part.id, terminal.role);
    if (laid !== undefined) return laid;
    const end = around.placeOf(terminal.junction);
    return end === undefined ? [] : routeWire(terminal, end, around.entryOf(terminal.junction));
  };
  const byRole = new Map(terminals.map((terminal) => [terminal.role, route(terminal)]));
  const inward = (role: string): readonly Point[] => {
    const points = [...(byRole.get(role) ?? [])];
    points.reverse();
    return points;
  };
  const outward = (role: string): readonly Point[] => byRole.get(role) ?? [];
  const through: WireCurrent = { of: 'through' };
  switch (part.kind) {
    case 'cable':
      return [{ role: 'through', points: joined(inward('from'), outward('to')), current: through }];
    case 'pair':
      return [
        {
          role: 'plus',
          points: joined(inward('from.plus'), outward('to.plus')),
          current: { of: 'through', cable: 'plus' },
        },
        {
          role: 'minus',
          points: joined(inward('to.minus'), outward('from.minus')),
          current: { of: 'through', cable: 'minus' },
        },
      ];
    case 'controller':
    case 'converter':
      return [
        { role: 'from.plus', points: inward('from.plus'), current: { of: 'input' } },
        { role: 'from.minus', points: outward('from.minus'), current: { of: 'input' } },
        { role: 'to.plus', points: outward('to.plus'), current: { of: 'output' } },
        { role: 'to.minus', points: inward('to.minus'), current: { of: 'output' } },
      ];
    case 'string':
      return [
        { role: 'plus', points: outward('plus'), current: through },
        { role: 'minus', points: inward('minus'), current: through },
        ...(part.midpoint === undefined
          ? []
          : [{ role: 'midpoint', points: outward('midpoint'), current: { of: 'none' } as const }]),
      ];
    case 'array':
    case 'charger':
      return [
        { role: 'plus', points: outward('plus'), current: through },
        { role: 'minus', points: inward('minus'), current: through },
      ];
    case 'load':
    case 'inverter':
      return [
        { role: 'plus', points: inward('plus'), current: through },
        { role: 'minus', points: outward('minus'), current: through },
      ];
    case 'busbar':
      return [];
    default:
      return [
        { role: 'from', points: inward('from'), current: through },
        { role: 'to', points: outward('to'), current: through },
      ].filter(({ points }) => points.length > 0);
  }
}

/** Two stretches that meet at a label, as one line. */
function joined(first: readonly Point[], second: readonly Point[]): readonly Point[] {
  return straightened([...first, ...second]);
}

/** A junction that stands off its bar hangs on a short tap. */
function drawBar(
  part: Extract<Part, { kind: 'busbar' }>,
  at: Point,
  { pose: { isUpright }, placeOf }: { readonly pose: Pose; readonly placeOf: PlaceOf },
): Pick<DrawnPart, 'wires' | 'bar'> {
  const bar = barOf(part, at, placeOf);
  const foot = ({ x, y }: Point): Point => (isUpright ? { x: at.x, y } : { x, y: at.y });
  const wires = part.junctions.flatMap((junction): readonly DrawnWire[] => {
    const tap = placeOf(junction);
    if (tap === undefined || (isUpright ? tap.x === at.x : tap.y === at.y)) return [];
    return [{ role: `tap ${junction}`, points: [foot(tap), tap], current: { of: 'none' } }];
  });
  return { wires, bar };
}

/** The ends of a bar that stands at `at`: it reaches over its junctions. */
export function barOf(part: Extract<Part, { kind: 'busbar' }>, at: Point, placeOf: PlaceOf): readonly [Point, Point] {
  const { isUpright } = poseOf(part, placeOf, at);
  const taps = part.junctions.flatMap((each) => placeOf(each) ?? []);
  const along = taps.map(({ x, y }) => (isUpright ? y : x));
  const [low, high] = [
    Math.min(...along, isUpright ? at.y : at.x) - BEYOND,
    Math.max(...along, isUpright ? at.y : at.x) + BEYOND,
  ];
  return isUpright
    ? [
        { x: at.x, y: low },
        { x: at.x, y: high },
      ]
    : [
        { x: low, y: at.y },
        { x: high, y: at.y },
      ];
}

/** How wires come into each junction of a bar that lies on the bar: across it. */
export function entriesOf(parts: readonly Part[], placeOf: PlaceOf): ReadonlyMap<JunctionId, Entry> {
  const entries = new Map<JunctionId, Entry>();
  for (const part of parts) {
    if (part.kind !== 'busbar') continue;
    const { isUpright } = poseOf(part, placeOf);
    for (const junction of part.junctions) entries.set(junction, isUpright ? 'level' : 'upright');
  }
  return entries;
}

/** Where the current of a wire is written: beside the middle of its longest stretch. */
export interface FigurePlace {
  readonly at: Point;
  readonly isUpright: boolean;
  /** +1 where the wire's positive direction runs to the right or down. */
  readonly forward: 1 | -1;
  readonly length: number;
}
export function figurePlace({ points }: DrawnWire): FigurePlace {
  return longestStretch(points);
}

/** The side of a device that is free for its words: away from what its poles lead to; right where neither side is. */
export function freeSide(at: Point, neighbours: readonly Point[]): 'left' | 'right' {
  const lean = neighbours.reduce((sum, { x }) => sum + Math.sign(x - at.x), 0);
  return lean > 0 ? 'left' : 'right';
}

/** Weight of a line in screen units for a current, against the largest of the drawing: 1.5 for nothing, 7 for the largest. */
export function lineWeight(currentA: number, largestA: number): number {
  if (largestA <= 0) return 1.5;
  return 1.5 + 5.5 * Math.sqrt(Math.min(1, Math.abs(currentA) / largestA));
}
