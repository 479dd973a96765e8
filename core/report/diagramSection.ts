/** The one-line diagram, both poles in full; where it cannot be drawn legibly, the connections as a table, and why. */
import type { CheckedJob } from '../job/job.ts';
import type { Part } from '../job/part.ts';
import { cablesOfPair } from '../job/part.ts';
import type { Block, Cell, FigureBlock, TableBlock } from './document.ts';
import { drawWiring } from './drawWiring.ts';
import { wiringGraph } from './wiringGraph.ts';
import { layWiring } from './wiringLayout.ts';
import { KIND_WORDS } from './wording.ts';

/** Width and height left for a figure below its heading, in points, on the smaller of A4 and Letter in each direction. */
const ROOM_PT = { portrait: { width: 499, height: 560 }, landscape: { width: 696, height: 366 } } as const;
/** Below this scale the smallest words of the drawing could not be read: 5.5 pt at full size 7. */
const SMALLEST_SCALE = 0.79;

type Orientation = keyof typeof ROOM_PT;

export function diagramSection(job: CheckedJob): readonly Block[] {
  const drawn = diagram(job);
  const heading: Block = { kind: 'heading', level: 1, text: 'One-line diagram' };
  if ('reason' in drawn) {
    const text = `No diagram is drawn: ${drawn.reason}. The connections stand in the table instead.`;
    return [heading, { kind: 'paragraph', tone: 'body', text }, connectionTable(job)];
  }
  const section: readonly Block[] = [heading, { kind: 'paragraph', tone: 'small', text: HOW_TO_READ }, drawn.figure];
  if (drawn.orientation === 'portrait') return section;
  return [{ kind: 'pageBreak', orientation: 'landscape' }, ...section, { kind: 'pageBreak', orientation: 'portrait' }];
}

const HOW_TO_READ =
  'Symbols after IEC 60617. Lines that cross without a dot are not joined. Contacts are drawn open, as is usual; their state stands in the schedules. Not to scale, and no plan of places.';

function diagram(
  job: CheckedJob,
): { readonly figure: FigureBlock; readonly orientation: Orientation } | { readonly reason: string } {
  const graph = wiringGraph(job);
  if ('reason' in graph) return graph;
  const layout = layWiring(graph);
  if ('reason' in layout) return layout;
  const figure = drawWiring(graph, layout);
  const scaleIn = (orientation: Orientation): number =>
    Math.min(ROOM_PT[orientation].width / figure.width, ROOM_PT[orientation].height / figure.height);
  const orientation = scaleIn('portrait') >= Math.min(1, scaleIn('landscape')) ? 'portrait' : 'landscape';
  if (scaleIn(orientation) < SMALLEST_SCALE)
    return { reason: 'the job is larger than what can be read on one sheet of this paper' };
  return { figure, orientation };
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
