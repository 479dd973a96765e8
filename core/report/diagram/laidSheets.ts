/** The drawing as it lies on the screen, divided into sheets; a line that goes on says on which sheet. */
import { CHEMISTRY_WORDS, KIND_WORDS } from '../../diagram/kindWords.ts';
import type { Box } from '../../diagram/labelPlacer.ts';
import { placeShapes } from '../../diagram/placeShapes.ts';
import type { Point } from '../../diagram/point.ts';
import type { Shape } from '../../diagram/shape.ts';
import { goesOn, label } from '../../diagram/symbols.ts';
import { WORD_PT } from '../../diagram/wiringWords.ts';
import type { CheckedJob } from '../../job/job.ts';
import type { Part } from '../../job/part.ts';
import type { FigureBlock } from '../document.ts';
import { drawLegend } from './diagramLegend.ts';
import { drawAsLaid, type LaidDrawing, stretchLine } from './drawAsLaid.ts';

/** Points to a unit of the screen, largest first: words keep their size, so more room lets them stand clear. */
const SCALES = [0.5, 0.44, 0.38];
/** Words are 7 pt at full size and shrink no further than to 6 pt. */
const SMALLEST = 6 / WORD_PT;
const MARGIN_PT = 14;
const LEGEND_PT = 30;
/** A cut moves by up to two thirds of this to where it cuts least; what stands on it reaches over. */
const SLACK_PT = 60;
/** Between a cut and what it should not cut. */
const CLEAR_PT = 5;
/** More sheets than this are no drawing to find one's way in. */
const MOST_SHEETS = 8;
/** More parts than this need more sheets than that. */
const MOST_PARTS = 250;

interface Room {
  readonly width: number;
  readonly height: number;
}

/** One figure a sheet; `undefined` where more sheets are needed than anybody would follow. */
export function laidSheets(job: CheckedJob, room: Room): readonly FigureBlock[] | undefined {
  if (job.parts.length > MOST_PARTS) return undefined;
  const most = { width: room.width / SMALLEST, height: room.height / SMALLEST };
  const drawings = SCALES.map((scale) => drawAsLaid(job, scale));
  const sheetsOf = ({ box }: LaidDrawing): number => countOf(box, most).columns * countOf(box, most).rows;
  const fewest = Math.min(...drawings.map(sheetsOf));
  const drawing = drawings.find((each) => sheetsOf(each) === fewest);
  if (drawing === undefined) return undefined;
  const { columns, rows } = countOf(drawing.box, most);
  if (columns * rows > MOST_SHEETS) return undefined;
  const xs = cuts(drawing, 'x', columns);
  const ys = cuts(drawing, 'y', rows);
  const tiles = ys
    .slice(1)
    .flatMap((y2, row) => xs.slice(1).map((x2, column): Box => ({ x1: xs[column] ?? 0, y1: ys[row] ?? 0, x2, y2 })));
  const filled = tiles.filter((tile) => drawing.things.some(({ middle }) => holds(tile, middle)));
  return filled.map((tile, index) => sheetOf(job, drawing, { tile, index, tiles: filled }));
}

function countOf({ x1, y1, x2, y2 }: Box, most: Room): { readonly columns: number; readonly rows: number } {
  return {
    columns: Math.max(1, Math.ceil((x2 - x1) / (most.width - 2 * MARGIN_PT - SLACK_PT))),
    rows: Math.max(1, Math.ceil((y2 - y1) / (most.height - 2 * MARGIN_PT - LEGEND_PT - SLACK_PT))),
  };
}

/** Even cuts, each moved a little to where it runs through the fewest symbols and words. */
function cuts({ box, things }: LaidDrawing, axis: 'x' | 'y', count: number): readonly number[] {
  const [low, high] = axis === 'x' ? [box.x1, box.x2] : [box.y1, box.y2];
  const size = (high - low) / count;
  const spans = things.map(({ box: each }) =>
    axis === 'x' ? { from: each.x1, to: each.x2 } : { from: each.y1, to: each.y2 },
  );
  const through = (at: number): number =>
    spans.filter(({ from, to }) => from - CLEAR_PT < at && at < to + CLEAR_PT).length;
  const inner = Array.from({ length: count - 1 }, (_, index) => {
    const even = low + size * (index + 1);
    const tried = Array.from(
      { length: 41 },
      (_each, step) => even + (step % 2 === 0 ? 1 : -1) * Math.ceil(step / 2) * 2,
    );
    return tried.reduce((best, at) => (through(at) < through(best) ? at : best), even);
  });
  return [low, ...inner, high];
}

function holds({ x1, y1, x2, y2 }: Box, { x, y }: Point): boolean {
  return x1 <= x && x <= x2 && y1 <= y && y <= y2;
}

interface Sheet {
  readonly tile: Box;
  readonly index: number;
  readonly tiles: readonly Box[];
}

function sheetOf(job: CheckedJob, drawing: LaidDrawing, sheet: Sheet): FigureBlock {
  const { tile, index, tiles } = sheet;
  const here = drawing.things.filter(({ middle }) => tiles.findIndex((each) => holds(each, middle)) === index);
  const boxes = [tile, ...here.map(({ box }) => box)];
  // What stands on the cut reaches over it: the sheet is as large as what is drawn on it.
  const [left, top] = [Math.min(...boxes.map(({ x1 }) => x1)), Math.min(...boxes.map(({ y1 }) => y1))];
  const [right, foot] = [Math.max(...boxes.map(({ x2 }) => x2)), Math.max(...boxes.map(({ y2 }) => y2))];
  const width = Math.max(right - left + 2 * MARGIN_PT, 400);
  const height = foot - top + 2 * MARGIN_PT + LEGEND_PT;
  const shapes = [
    ...drawing.stretches.flatMap((stretch) => stretchOn(stretch, sheet)),
    ...here.flatMap((thing) => thing.shapes),
  ];
  const isOneOf = tiles.length === 1 ? '' : `, sheet ${index + 1} of ${tiles.length}`;
  const parts = job.parts.filter(({ id }) => {
    const at = drawing.parts.get(id);
    return at !== undefined && tiles.findIndex((each) => holds(each, at)) === index;
  });
  return {
    kind: 'figure',
    title: `One-line diagram, both poles in full${isOneOf}`,
    alt: altText(parts, isOneOf),
    width,
    height,
    shapes: [
      ...placeShapes(shapes, { scale: 1, quarters: 0, to: { x: MARGIN_PT - left, y: MARGIN_PT - top } }),
      label(AS_LAID, { x: 4, y: height - 18 }, { sizePt: WORD_PT, align: 'left', tone: 'quiet' }),
      ...drawLegend(new Set(parts.map(({ kind }) => kind)), {
        widthPt: width,
        y: height - 7,
        isDivided: tiles.length > 1,
      }),
    ],
  };
}

const AS_LAID = 'Drawn as it is laid out on the screen; the plan in rows does not fit this wiring.';

/** What of a stretch lies on a sheet; a cut end has a triangle and the number of the sheet on which it goes on. */
function stretchOn({ a, b, isBar }: LaidDrawing['stretches'][number], { tile, tiles }: Sheet): readonly Shape[] {
  const isLevel = a.y === b.y;
  const [from, to] = (isLevel ? a.x < b.x : a.y < b.y) ? [a, b] : [b, a];
  const first = { x: Math.max(from.x, tile.x1), y: Math.max(from.y, tile.y1) };
  const last = { x: Math.min(to.x, tile.x2), y: Math.min(to.y, tile.y2) };
  if (first.x > last.x || first.y > last.y) return [];
  if (first.x === last.x && first.y === last.y) return [];
  const shapes = [stretchLine(first, last, isBar)];
  const ends = [
    ...(first.x === from.x && first.y === from.y ? [] : [{ at: first, way: -1 as const }]),
    ...(last.x === to.x && last.y === to.y ? [] : [{ at: last, way: 1 as const }]),
  ];
  return [...shapes, ...ends.flatMap(({ at, way }) => cutEnd(at, { way, isLevel, tiles }))];
}

function cutEnd(
  at: Point,
  { way, isLevel, tiles }: { readonly way: 1 | -1; readonly isLevel: boolean; readonly tiles: readonly Box[] },
): readonly Shape[] {
  const [mark] = placeShapes([goesOn({ x: 0, y: 0 }, way)], { scale: 1, quarters: isLevel ? 3 : 0, to: at });
  const beyond = isLevel ? { x: at.x + way, y: at.y } : { x: at.x, y: at.y + way };
  const other = tiles.findIndex((tile) => holds(tile, beyond));
  const words = isLevel ? { x: at.x + way * 8, y: at.y + 2.5 } : { x: at.x, y: at.y + (way > 0 ? 12 : -6) };
  const number = other < 0 ? [] : [label(String(other + 1), words, { sizePt: WORD_PT, tone: 'quiet' })];
  return mark === undefined ? number : [mark, ...number];
}

function altText(parts: readonly Part[], sheet: string): string {
  const told = parts.map((part) => {
    const kind = part.kind === 'string' ? `battery ${CHEMISTRY_WORDS[part.chemistry]}` : KIND_WORDS[part.kind];
    return 'plus' in part ? `${kind} ${part.id} between ${part.plus} and ${part.minus}` : `${kind} ${part.id}`;
  });
  return `Diagram of the wiring, both poles${sheet}. ${told.join('; ')}. Drawn as it is laid out on the screen; each part stands with its ends in the schedules.`;
}
