/** The one-line diagram, both poles in full; where it cannot be drawn legibly, the connections as a table, and why. */
import type { CheckedJob } from '../job/job.ts';
import type { Part } from '../job/part.ts';
import { cablesOfPair } from '../job/part.ts';
import type { Block, Cell, FigureBlock, TableBlock } from './document.ts';
import { drawWiring } from './drawWiring.ts';
import { wiringGraph } from './wiringGraph.ts';
import { layWiring } from './wiringLayout.ts';
import { KIND_WORDS } from './wording.ts';

/** Width and height that a figure may take at full size on the paper in each orientation, in points; the smaller paper decides. */
const ROOM_PT = { portrait: { width: 499, height: 600 }, landscape: { width: 696, height: 420 } } as const;
/** Below this scale the smallest words of the drawing could not be read: 5.5 pt at full size 7. */
const SMALLEST_SCALE = 0.74;

type Orientation = keyof typeof ROOM_PT;

export function diagramSection(job: CheckedJob): readonly Block[] {
  const drawn = diagram(job);
  const heading: Block = { kind: 'heading', level: 1, text: 'One-line diagram' };
  if ('reason' in drawn) {
    return [
      { kind: 'pageBreak', orientation: 'portrait' },
      heading,
      {
        kind: 'paragraph',
        tone: 'body',
        text: `No diagram is drawn: ${drawn.reason}. The connections stand in the table instead.`,
      },
      connectionTable(job),
      { kind: 'pageBreak', orientation: 'portrait' },
    ];
  }
  return [
    { kind: 'pageBreak', orientation: drawn.orientation },
    heading,
    {
      kind: 'paragraph',
      tone: 'small',
      text: 'Symbols after IEC 60617. Lines that cross without a dot are not joined. Contacts are drawn open, as is usual; their state stands in the schedules. Not to scale, and no plan of places.',
    },
    drawn.figure,
    { kind: 'pageBreak', orientation: 'portrait' },
  ];
}

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
  if (part.kind === 'busbar') return part.junctions.join(' – ');
  if ('plus' in part)
    return `plus ${part.plus}, minus ${part.minus}${part.kind === 'string' && part.midpoint !== undefined ? `, midpoint ${part.midpoint}` : ''}`;
  if (typeof part.from === 'string') return `${part.from} → ${String(part.to)}`;
  if (typeof part.to === 'string') return '';
  return `${part.from.plus}, ${part.from.minus} → ${part.to.plus}, ${part.to.minus}`;
}
