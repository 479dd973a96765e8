/** The one-line diagram, both poles in full; where it cannot be drawn legibly, the connections as a table, and why. */

import { KIND_WORDS } from '../../diagram/kindWords.ts';
import { wiringGraph } from '../../diagram/wiringGraph.ts';
import type { Layout } from '../../diagram/wiringLayout.ts';
import { layWiring } from '../../diagram/wiringLayout.ts';
import { LONGEST_PT } from '../../diagram/wiringWords.ts';
import type { CheckedJob } from '../../job/job.ts';
import type { Part } from '../../job/part.ts';
import { cablesOfPair } from '../../job/part.ts';
import type { Block, Cell, FigureBlock, Paper, TableBlock } from '../document.ts';
import type { Band } from './drawWiring.ts';
import { drawWiring, sheetHeightPt } from './drawWiring.ts';
import { laidSheets } from './laidSheets.ts';

type Orientation = 'portrait' | 'landscape';

/** Width and height left for a figure below its heading, in points. */
const ROOM_PT: Readonly<
  Record<Paper, Readonly<Record<Orientation, { readonly width: number; readonly height: number }>>>
> = {
  A4: { portrait: { width: 499, height: 614 }, landscape: { width: 745, height: 367 } },
  Letter: { portrait: { width: 516, height: 564 }, landscape: { width: 696, height: 384 } },
};
/** Below this scale the words of the drawing, 7 pt at full size, could not be read. */
const SMALLEST_SCALE = 0.77;
/** More sheets than this are no drawing to find one's way in. */
const MOST_SHEETS = 4;

export function diagramSection(job: CheckedJob, paper: Paper): readonly Block[] {
  const drawn = diagram(job, paper);
  const heading: Block = { kind: 'heading', level: 1, text: 'One-line diagram' };
  if (!('reason' in drawn)) return turned(drawn.orientation, [heading, small(HOW_TO_READ), ...drawn.figures]);
  const figures = job.parts.length === 0 ? undefined : laidSheets(job, roomBelow(ROOM_PT[paper].landscape));
  if (figures === undefined) {
    const text = `No diagram is drawn: ${drawn.reason}. The connections stand in the table instead.`;
    return [heading, { kind: 'paragraph', tone: 'body', text }, connectionTable(job)];
  }
  const why = `Drawn as it is laid out on the screen, because it does not go into the plan in rows: ${drawn.reason}.`;
  // Many sheets are hard to follow by eye alone.
  const table = figures.length > MOST_SHEETS ? [connectionTable(job)] : [];
  return turned('landscape', [heading, small(`${HOW_TO_READ} ${why}`), ...figures, ...table]);
}

/** Two more lines above the drawing say why it is drawn so. */
function roomBelow({ width, height }: { readonly width: number; readonly height: number }) {
  return { width, height: height - 24 };
}
function small(text: string): Block {
  return { kind: 'paragraph', tone: 'small', text };
}
function turned(orientation: Orientation, section: readonly Block[]): readonly Block[] {
  if (orientation === 'portrait') return section;
  return [{ kind: 'pageBreak', orientation }, ...section, { kind: 'pageBreak', orientation: 'portrait' }];
}

const HOW_TO_READ =
  'Symbols after IEC 60617. Lines that cross without a dot are not joined. Contacts are drawn open, as is usual; their state stands in the schedules. Not to scale, and no plan of places.';

interface Drawn {
  readonly figures: readonly FigureBlock[];
  readonly orientation: Orientation;
}

function diagram(job: CheckedJob, paper: Paper): Drawn | { readonly reason: string } {
  const graph = wiringGraph(job);
  if ('reason' in graph) return graph;
  for (const longestPt of [LONGEST_PT.roomy, LONGEST_PT.tight]) {
    const layout = layWiring(graph, longestPt);
    if ('reason' in layout) return layout;
    const sheets = sheetsFor(layout, paper);
    if (sheets !== undefined)
      return { figures: drawWiring(graph, layout, sheets.bands), orientation: sheets.orientation };
  }
  return { reason: 'the job is larger than what can be read on a few sheets of this paper' };
}

/** Upright or across, whichever takes fewer sheets; upright where both take as many. */
function sheetsFor(
  layout: Layout,
  paper: Paper,
): { readonly bands: readonly Band[]; readonly orientation: Orientation } | undefined {
  const ways = (['portrait', 'landscape'] as const).flatMap((orientation) => {
    const bands = bandsFor(layout, ROOM_PT[paper][orientation]);
    return bands === undefined ? [] : [{ orientation, bands }];
  });
  const [first, second] = ways;
  return first !== undefined && second !== undefined && second.bands.length < first.bands.length ? second : first;
}

/** How the rows divide into sheets, evenly; `undefined` where the drawing would be too small to read or need too many. */
function bandsFor(
  { width, rowCount }: Layout,
  room: { readonly width: number; readonly height: number },
): readonly Band[] | undefined {
  const widthScale = Math.min(1, room.width / width);
  if (widthScale < SMALLEST_SCALE) return undefined;
  for (let sheets = 1; sheets <= MOST_SHEETS; sheets += 1) {
    const rows = Math.ceil(rowCount / sheets);
    if (room.height / sheetHeightPt(rows) < SMALLEST_SCALE) continue;
    const bands = Array.from({ length: sheets }, (_, index) => ({
      from: index * rows,
      to: Math.min((index + 1) * rows, rowCount),
    }));
    return bands.filter(({ from, to }) => to > from);
  }
  return undefined;
}

function connectionTable(job: CheckedJob): TableBlock {
  const parts = job.parts.flatMap((part): readonly Part[] => (part.kind === 'pair' ? cablesOfPair(part) : [part]));
  return {
    kind: 'table',
    caption: 'Connections',
    columns: [
      { head: 'Part', kind: 'id', align: 'left' },
      { head: 'Kind', kind: 'text', align: 'left' },
      { head: 'Between', kind: 'text', align: 'left' },
    ],
    rows: parts.map((part): readonly Cell[] => [
      { text: part.id, under: part.label ?? '' },
      KIND_WORDS[part.kind],
      betweenText(part),
    ]),
    notes: [],
  };
}

function betweenText(part: Part): string {
  switch (part.kind) {
    case 'busbar':
      return part.junctions.join(' – ');
    case 'pair':
    case 'controller':
    case 'converter':
      return `${part.from.plus}, ${part.from.minus} → ${part.to.plus}, ${part.to.minus}`;
    case 'string': {
      const middle = part.midpoint === undefined ? '' : `, midpoint ${part.midpoint}`;
      return `plus ${part.plus}, minus ${part.minus}${middle}`;
    }
    case 'load':
    case 'inverter':
    case 'array':
    case 'charger':
      return `plus ${part.plus}, minus ${part.minus}`;
    default:
      return `${part.from} → ${part.to}`;
  }
}
