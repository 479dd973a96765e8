/** The drawing as it is laid out on the screen, in points of paper: for wiring that does not go into the rows of the plan. */
import type { DrawnPart } from '../../diagram/drawPart.ts';
import { freeSide } from '../../diagram/drawPart.ts';
import type { Box } from '../../diagram/labelPlacer.ts';
import { minusSide } from '../../diagram/minusSide.ts';
import { partSymbol } from '../../diagram/partSymbol.ts';
import { placeShapes } from '../../diagram/placeShapes.ts';
import type { Point, Positions } from '../../diagram/point.ts';
import { EARTH } from '../../diagram/point.ts';
import { isConductor } from '../../diagram/pose.ts';
import { positionsOf } from '../../diagram/positions.ts';
import { longestStretch } from '../../diagram/routeWire.ts';
import type { Shape } from '../../diagram/shape.ts';
import { drawParts, symbolBox } from '../../diagram/surroundings.ts';
import { dot, label, line } from '../../diagram/symbols.ts';
import { cut, ratingWords, WORD_PT } from '../../diagram/wiringWords.ts';
import type { CheckedJob } from '../../job/job.ts';
import type { JunctionId, Part, PartId } from '../../job/part.ts';
import { junctionsOf } from '../../job/part.ts';
import { type BlockPlace, baseline, blockBox, LINE_PT, WordPlacer } from './wordPlacer.ts';

/** Longest name beside a part; longer ones are cut. */
const NAME_PT = 84;
/** Between a symbol or a line and its words. */
const GAP_PT = 3;

/** One thing of the drawing, which is drawn whole on the sheet where its middle lies. */
export interface LaidThing {
  readonly middle: Point;
  readonly box: Box;
  readonly shapes: readonly Shape[];
}
export interface LaidDrawing {
  /** Level and upright stretches, which sheets may cut. */
  readonly stretches: readonly { readonly a: Point; readonly b: Point; readonly isBar: boolean }[];
  readonly things: readonly LaidThing[];
  readonly parts: ReadonlyMap<PartId, Point>;
  readonly box: Box;
}

/** Everything at `ptPerUnit` points to a unit of the screen; words keep their size. */
export function drawAsLaid(job: CheckedJob, ptPerUnit: number): LaidDrawing {
  return new LaidPaper(job, ptPerUnit).drawing();
}

class LaidPaper {
  private readonly job: CheckedJob;
  private readonly scale: number;
  private readonly positions: Positions;
  private readonly drawn: ReadonlyMap<PartId, DrawnPart>;
  private readonly placer = new WordPlacer();
  private readonly things: LaidThing[] = [];

  constructor(job: CheckedJob, scale: number) {
    this.job = job;
    this.scale = scale;
    this.positions = positionsOf(job);
    this.drawn = drawParts(job.parts, this.positions);
  }

  drawing(): LaidDrawing {
    const stretches = this.stretches();
    for (const { a, b } of stretches) this.placer.take(boxAbout([a, b]));
    for (const part of this.job.parts) this.symbol(part);
    this.dots();
    // Symbols find their words first, then conductors, which have more places, then the names of points.
    for (const part of this.job.parts) if (!isConductor(part)) this.wordsOf(part);
    for (const part of this.job.parts) if (isConductor(part)) this.wordsOf(part);
    this.names();
    const parts = new Map([...this.positions.parts].map(([id, at]) => [id, this.put(at)]));
    const corners = this.things.flatMap(({ box: { x1, y1, x2, y2 } }) => [
      { x: x1, y: y1 },
      { x: x2, y: y2 },
    ]);
    return {
      stretches,
      things: this.things,
      parts,
      box: boxAbout([...corners, ...stretches.flatMap(({ a, b }) => [a, b])]),
    };
  }

  private put({ x, y }: Point): Point {
    return { x: x * this.scale, y: y * this.scale };
  }
  private putBox({ x1, y1, x2, y2 }: Box): Box {
    return { x1: x1 * this.scale, y1: y1 * this.scale, x2: x2 * this.scale, y2: y2 * this.scale };
  }
  private readonly placeOf = (junction: JunctionId): Point | undefined => this.positions.junctions.get(junction);

  private stretches(): LaidDrawing['stretches'] {
    return [...this.drawn.values()].flatMap(({ wires, bar }) => {
      const lines = wires.map(({ points }) => ({ points, isBar: false }));
      const all = bar === undefined ? lines : [...lines, { points: bar, isBar: true }];
      return all.flatMap(({ points, isBar }) =>
        points.slice(1).flatMap((b, index) => {
          const a = points[index];
          return a === undefined ? [] : [{ a: this.put(a), b: this.put(b), isBar }];
        }),
      );
    });
  }

  private symbol(part: Part): void {
    const [at, drawn] = [this.positions.parts.get(part.id), this.drawn.get(part.id)];
    if (at === undefined || drawn === undefined || isConductor(part) || part.kind === 'busbar') return;
    const to = this.put(at);
    // Contacts are drawn open on paper, as is usual; a fuse is whole.
    const shapes = placeShapes(partSymbol(part, drawn.pose, { isClosed: part.kind === 'fuse' }), {
      scale: this.scale,
      quarters: 0,
      to,
    });
    const box = this.putBox(symbolBox(part, at, this.placeOf));
    const plus = drawn.terminals.find(({ role }) => part.kind === 'string' && role === 'plus');
    const sign =
      plus === undefined
        ? []
        : [label('+', { x: to.x - 6, y: (this.put(plus).y + to.y) / 2 - 1 }, { sizePt: WORD_PT })];
    this.placer.take(box);
    this.things.push({ middle: to, box, shapes: [...shapes, ...sign] });
  }

  /** A dot where conductors meet, a bar excepted. */
  private dots(): void {
    const touching = new Map<JunctionId, number>();
    for (const part of this.job.parts) {
      for (const junction of junctionsOf(part))
        touching.set(junction, (touching.get(junction) ?? 0) + (part.kind === 'busbar' ? 3 : 1));
    }
    for (const [junction, at] of this.positions.junctions) {
      if (junction === EARTH || (touching.get(junction) ?? 0) < 3) continue;
      const to = this.put(at);
      this.things.push({ middle: to, box: grown(to, 2), shapes: [dot(to)] });
      this.placer.take(grown(to, 2));
    }
  }

  private wordsOf(part: Part): void {
    const at = this.positions.parts.get(part.id);
    if (at === undefined) return;
    const name = part.label === undefined || part.label === part.id ? [] : [cut(part.label, NAME_PT)];
    const rating = ratingWords(part);
    const quiet = [...name, ...(rating === '' ? [] : [rating])];
    // Where there is no room for all its words, the name is left to the schedules.
    const whole = [part.id, ...quiet];
    const brief = [part.id, ...(rating === '' ? [] : [rating])];
    const lines = [whole, brief].find((words) => this.placer.hasFree(words, this.placesFor(part, at, words))) ?? brief;
    const place = this.placer.choose(lines, this.placesFor(part, at, lines));
    if (place === undefined) return;
    const shapes = lines.map((text, index) =>
      label(
        text,
        { x: place.x, y: baseline(place, index) },
        { sizePt: WORD_PT, align: place.align, strong: index === 0, tone: index === 0 ? 'ink' : 'quiet' },
      ),
    );
    const box = blockBox(lines, place);
    // Words along a line belong to where they stand, those of a symbol to the symbol.
    const isAlong = isConductor(part) || part.kind === 'busbar';
    const middle = isAlong ? { x: (box.x1 + box.x2) / 2, y: (box.y1 + box.y2) / 2 } : this.put(at);
    this.things.push({ middle, box, shapes });
  }

  private placesFor(part: Part, at: Point, lines: readonly string[]): readonly BlockPlace[] {
    const drawn = this.drawn.get(part.id);
    if (drawn === undefined) return [];
    const height = lines.length * LINE_PT;
    if (isConductor(part)) return alongWires(drawn, height, (point) => this.put(point));
    if (drawn.bar !== undefined) {
      const [a, b] = [this.put(drawn.bar[0]), this.put(drawn.bar[1])];
      return [
        ...about(grown(a, 1), height, ['above', 'right', 'left']),
        ...about(grown(b, 1), height, ['below', 'right', 'left']),
      ];
    }
    const box = this.putBox(symbolBox(part, at, this.placeOf));
    if ('plus' in part) {
      const far = junctionsOf(part).flatMap((each) => this.placeOf(each) ?? []);
      const side = freeSide(at, far) === 'left' ? (['left', 'right'] as const) : (['right', 'left'] as const);
      return about(box, height, [...side, 'above', 'below']);
    }
    return about(
      box,
      height,
      drawn.pose.isUpright ? ['right', 'left', 'above', 'below'] : ['above', 'below', 'right', 'left'],
    );
  }

  /** Names of points, over a plus and under a minus; the taps of a bar go by the name of the bar. */
  private names(): void {
    const low = minusSide(this.job);
    const taps = new Set(this.job.parts.flatMap((part) => (part.kind === 'busbar' ? part.junctions : [])));
    for (const [junction, at] of this.positions.junctions) {
      if (junction === EARTH || taps.has(junction)) continue;
      const text = cut(this.job.junctions.get(junction)?.label ?? junction, NAME_PT / 2);
      const to = this.put(at);
      const sides = low.has(junction) ? (['below', 'above'] as const) : (['above', 'below'] as const);
      const place = this.placer.choose([text], about(grown(to, 1), LINE_PT, [...sides, 'right', 'left']));
      if (place === undefined) continue;
      const word = label(
        text,
        { x: place.x, y: baseline(place, 0) },
        { sizePt: WORD_PT, align: place.align, tone: 'copper' },
      );
      this.things.push({ middle: to, box: blockBox([text], place), shapes: [word] });
    }
  }
}

type Side = 'above' | 'below' | 'left' | 'right';

/** Places around a box, nearest first: on the sides in the order given, then at their corners, then further out. */
function about({ x1, y1, x2, y2 }: Box, height: number, sides: readonly Side[]): readonly BlockPlace[] {
  const middle = { x: (x1 + x2) / 2, y: (y1 + y2) / 2 };
  return [0, 5, 11, 18, 26].flatMap((out) =>
    sides.flatMap((side): readonly BlockPlace[] => {
      const gap = GAP_PT + out;
      if (side === 'above' || side === 'below') {
        const top = side === 'above' ? y1 - height - gap + 2 : y2 + gap - 1;
        return [
          { x: middle.x, top, align: 'centre' },
          { x: middle.x + GAP_PT, top, align: 'left' },
          { x: middle.x - GAP_PT, top, align: 'right' },
          { x: x1, top, align: 'left' },
          { x: x2, top, align: 'right' },
          { x: x2 + GAP_PT, top, align: 'left' },
          { x: x1 - GAP_PT, top, align: 'right' },
        ];
      }
      const [x, align] = side === 'left' ? ([x1 - gap, 'right'] as const) : ([x2 + gap, 'left'] as const);
      return [
        { x, top: middle.y - height / 2, align },
        { x, top: middle.y - height - GAP_PT, align },
        { x, top: middle.y + GAP_PT, align },
      ];
    }),
  );
}

/** Along the longest stretches of a conductor, over and under a level one, beside an upright one. */
function alongWires({ wires }: DrawnPart, height: number, put: (point: Point) => Point): readonly BlockPlace[] {
  return wires.flatMap(({ points }) => {
    const { at, isUpright, length } = longestStretch(points);
    const stretches = points.slice(1).flatMap((b, index) => {
      const a = points[index];
      return a === undefined
        ? []
        : [
            {
              at: { x: (a.x + b.x) / 2, y: (a.y + b.y) / 2 },
              isUpright: a.x === b.x,
              length: Math.abs(a.x - b.x) + Math.abs(a.y - b.y),
            },
          ];
    });
    return [{ at, isUpright, length }, ...stretches].flatMap((stretch) =>
      [0, 0.2, -0.2, 0.35, -0.35].flatMap((off): readonly BlockPlace[] => {
        const shift = off * stretch.length;
        const to = put(
          stretch.isUpright
            ? { x: stretch.at.x, y: stretch.at.y + shift }
            : { x: stretch.at.x + shift, y: stretch.at.y },
        );
        if (stretch.isUpright)
          return [
            { x: to.x + GAP_PT, top: to.y - height / 2, align: 'left' },
            { x: to.x - GAP_PT, top: to.y - height / 2, align: 'right' },
          ];
        return [
          { x: to.x, top: to.y - height - 1, align: 'centre' },
          { x: to.x, top: to.y + 2, align: 'centre' },
        ];
      }),
    );
  });
}

function boxAbout(points: readonly Point[]): Box {
  const [xs, ys] = [points.map(({ x }) => x), points.map(({ y }) => y)];
  return { x1: Math.min(...xs), y1: Math.min(...ys), x2: Math.max(...xs), y2: Math.max(...ys) };
}
function grown({ x, y }: Point, by: number): Box {
  return { x1: x - by, y1: y - by, x2: x + by, y2: y + by };
}
/** The line of a stretch. */
export function stretchLine(a: Point, b: Point, isBar: boolean): Shape {
  return line(a.x, a.y, b.x, b.y, isBar ? 'heavy' : 'line');
}
