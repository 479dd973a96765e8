/** From the places of the plan to lines, symbols and words. */
import type { Part } from '../job/part.ts';
import type { FigureBlock, Shape } from './document.ts';
import { metres, plain } from './figures.ts';
import { sizeAsGiven } from './sizes.ts';
import * as symbols from './symbols.ts';
import { label, line, U } from './symbols.ts';
import type { WiringGraph } from './wiringGraph.ts';
import type { Layout, PlacedBox, PlacedDevice, PlacedLink, PlacedPoint } from './wiringLayout.ts';
import { LAYER_PT, SIDE_PT } from './wiringLayout.ts';
import { CHEMISTRY_WORDS, KIND_WORDS } from './wording.ts';

const NAME_PT = 7;
const DETAIL_PT = 7;
const POINT_PT = 7;
/** Mean width of a character of the report's typeface as a fraction of its size; for cutting words to length only. */
const CHARACTER = 0.5;
const LEGEND_PT = 34;

export function drawWiring(graph: WiringGraph, layout: Layout): FigureBlock {
  const shapes: Shape[] = [
    ...layout.wires.map(({ x1, x2, y }) => line(x1, y, x2, y)),
    ...layout.points.flatMap((point) =>
      point.top === point.bottom ? [] : [line(point.x, point.top, point.x, point.bottom)],
    ),
    ...layout.links.flatMap((link) => drawLink(link)),
    ...layout.boxes.flatMap((box) => drawBox(box)),
    ...layout.devices.flatMap((device) => drawDevice(device)),
    ...layout.points.flatMap((point) => drawPoint(point, layout)),
    ...layout.earths.flatMap(({ id, x, y }) => [
      ...symbols.earthSymbol({ x, y }),
      label(id, { x: x + 1.4 * U, y: y + 2.2 * U }, { sizePt: DETAIL_PT, align: 'left', tone: 'quiet' }),
    ]),
    ...drawLegend(graph, layout),
  ];
  return {
    kind: 'figure',
    title: 'One-line diagram, both poles in full',
    alt: altText(graph),
    width: layout.width,
    height: layout.height + LEGEND_PT,
    shapes,
  };
}

function cut(text: string, widthPt: number, sizePt: number): string {
  const characters = Math.floor(widthPt / (sizePt * CHARACTER));
  return text.length <= characters ? text : `${text.slice(0, Math.max(1, characters - 1))}…`;
}

function drawLink({ link, x1, x2, y }: PlacedLink): readonly Shape[] {
  const { part } = link;
  if (part.kind === 'controller' || part.kind === 'converter') return [line(x1, y, x2, y)];
  const middle = { x: (x1 + x2) / 2, y };
  const widthPt = Math.abs(x2 - x1) - 8;
  return [
    line(x1, y, x2, y, part.kind === 'busbar' ? 'heavy' : 'line'),
    ...inLineSymbol(part, middle, x2 > x1 ? 1 : -1),
    label(cut(link.id, widthPt, NAME_PT), { x: middle.x, y: y - 6 }, { sizePt: NAME_PT, strong: true }),
    label(cut(linkDetail(part), widthPt, DETAIL_PT), { x: middle.x, y: y + 12 }, { sizePt: DETAIL_PT, tone: 'quiet' }),
  ];
}

function inLineSymbol(part: Part, at: { readonly x: number; readonly y: number }, forward: 1 | -1): readonly Shape[] {
  switch (part.kind) {
    case 'fuse':
      return symbols.fuseSymbol(at);
    case 'breaker':
      return symbols.breakerSymbol(at);
    case 'switch':
      return symbols.switchSymbol(at, part.loadBreak === true);
    case 'shunt':
      return symbols.shuntSymbol(at);
    case 'diode':
      return symbols.diodeSymbol(at, forward);
    case 'joint':
      return symbols.jointSymbol(at);
    default:
      return [];
  }
}

function linkDetail(part: Part): string {
  switch (part.kind) {
    case 'cable': {
      const several = part.inParallel === 1 ? '' : `${part.inParallel} × `;
      return part.size === undefined
        ? `${metres(part.lengthM)} m`
        : `${several}${sizeAsGiven(part.size)}, ${metres(part.lengthM)} m`;
    }
    case 'fuse':
    case 'breaker':
    case 'shunt':
      return `${plain(part.ratingA)} A`;
    case 'switch':
    case 'busbar':
      return part.ratingA === undefined ? '' : `${plain(part.ratingA)} A`;
    default:
      return '';
  }
}

function drawBox({ twoPort: { part }, x, plusY, minusY }: PlacedBox): readonly Shape[] {
  const detail = part.kind === 'controller' ? `${part.type.toUpperCase()}, ${plain(part.outputA)} A` : '';
  return [
    ...symbols.twoPortSymbol(x, plusY, minusY),
    label(cut(part.id, LAYER_PT, NAME_PT), { x, y: plusY - 8 }, { sizePt: NAME_PT, strong: true }),
    label(cut(detail, LAYER_PT, DETAIL_PT), { x, y: minusY + 13 }, { sizePt: DETAIL_PT, tone: 'quiet' }),
  ];
}

function drawDevice({ device: { part }, side, x, plusY, minusY }: PlacedDevice): readonly Shape[] {
  const outward = side === 'left' ? -1 : 1;
  const align = side === 'left' ? 'right' : 'left';
  const textX = x + outward * 4 * U;
  const middle = (plusY + minusY) / 2;
  const words = [
    part.label === undefined || part.label === part.id ? undefined : part.label,
    deviceDetail(part),
  ].filter((text) => text !== undefined && text !== '');
  return [
    ...deviceSymbol(part, x, plusY, minusY),
    label(
      cut(part.id, SIDE_PT - 5 * U, NAME_PT),
      { x: textX, y: middle - (words.length > 1 ? 5 : 1) },
      { sizePt: NAME_PT, align, strong: true },
    ),
    ...words.map((text, index) =>
      label(
        cut(text ?? '', SIDE_PT - 5 * U, DETAIL_PT),
        { x: textX, y: middle + (words.length > 1 ? 4 : 8) + index * 9 },
        { sizePt: DETAIL_PT, align, tone: 'quiet' },
      ),
    ),
  ];
}

function deviceSymbol(part: Part, x: number, plusY: number, minusY: number): readonly Shape[] {
  const middle = { x, y: (plusY + minusY) / 2 };
  switch (part.kind) {
    case 'string':
      return symbols.batterySymbol(x, plusY, minusY);
    case 'array':
      return symbols.arraySymbol(x, plusY, minusY);
    case 'inverter':
      return [line(x, plusY, x, minusY), ...symbols.converterSymbol(middle, { from: 'DC', to: 'AC' })];
    case 'charger':
      return [line(x, plusY, x, minusY), ...symbols.converterSymbol(middle, { from: 'AC', to: 'DC' })];
    default:
      return symbols.loadSymbol(x, plusY, minusY);
  }
}

function deviceDetail(part: Part): string {
  switch (part.kind) {
    case 'string':
      return `${part.blocksInSeries} × ${plain(part.blockNominalV)} V, ${plain(part.capacityAh)} Ah`;
    case 'array':
      return `${part.modulesInSeries} in series × ${part.stringsInParallel}`;
    case 'inverter':
      return `${plain(part.ratedW)} W`;
    case 'charger':
      return `${plain(part.outputA)} A`;
    case 'load':
      if (part.powerW !== undefined) return `${plain(part.powerW)} W`;
      return part.currentA === undefined ? '' : `${plain(part.currentA)} A`;
    default:
      return '';
  }
}

/** A dot where three or more lines meet, and the name of the point clear of the names of the parts. */
function drawPoint({ name, pole, x, top, bottom, meets }: PlacedPoint, layout: Layout): readonly Shape[] {
  const ends = (y: number): number =>
    [...layout.links, ...layout.wires].filter(
      (level) => Math.abs(level.y - y) < 0.01 && (level.x1 === x || level.x2 === x),
    ).length;
  const dots = meets
    .filter((y) => ends(y) + (y > top ? 1 : 0) + (y < bottom ? 1 : 0) > 2)
    .map((y) => symbols.dot({ x, y }));
  const place = pole === 'plus' ? { x, y: top - 14 } : { x, y: bottom + 21 };
  const marks = dots.length === 0 && top === bottom ? [symbols.terminal({ x, y: top })] : dots;
  return [...marks, label(cut(name, LAYER_PT, POINT_PT), place, { sizePt: POINT_PT, tone: 'copper' })];
}

const LEGEND_SYMBOLS: readonly {
  readonly kinds: readonly Part['kind'][];
  readonly word: string;
  readonly draw: (at: { readonly x: number; readonly y: number }) => readonly Shape[];
}[] = [
  { kinds: ['fuse'], word: KIND_WORDS.fuse, draw: symbols.fuseSymbol },
  { kinds: ['breaker'], word: KIND_WORDS.breaker, draw: symbols.breakerSymbol },
  { kinds: ['switch'], word: 'switch (ring: breaks load)', draw: (at) => symbols.switchSymbol(at, true) },
  { kinds: ['shunt'], word: KIND_WORDS.shunt, draw: symbols.shuntSymbol },
  { kinds: ['diode'], word: KIND_WORDS.diode, draw: (at) => symbols.diodeSymbol(at, 1) },
  { kinds: ['joint'], word: KIND_WORDS.joint, draw: symbols.jointSymbol },
  { kinds: ['busbar'], word: KIND_WORDS.busbar, draw: ({ x, y }) => [line(x - 1.5 * U, y, x + 1.5 * U, y, 'heavy')] },
];

/** A reader then needs no standard beside the sheet. */
function drawLegend(graph: WiringGraph, layout: Layout): readonly Shape[] {
  const kinds = new Set(graph.links.map(({ part }) => part.kind));
  const y = layout.height + LEGEND_PT - 12;
  let x = 12;
  return LEGEND_SYMBOLS.filter((entry) => entry.kinds.some((kind) => kinds.has(kind))).flatMap(({ word, draw }) => {
    const at = { x: x + 1.5 * U, y };
    const isLine = draw !== symbols.jointSymbol;
    const shapes = [
      ...(isLine ? [line(x - 3, y, x + 3 * U + 3, y)] : []),
      ...draw(at),
      label(word, { x: x + 3 * U + 8, y: y + 2.4 }, { sizePt: DETAIL_PT, align: 'left', tone: 'quiet' }),
    ];
    x += 3 * U + 20 + word.length * DETAIL_PT * CHARACTER;
    return shapes;
  });
}

/** Each device with its kind and its two points, then the count of what leads between them. */
function altText({ devices, links }: WiringGraph): string {
  const told = devices.map(
    ({ part, plus, minus }) =>
      `${part.kind === 'string' ? `battery ${CHEMISTRY_WORDS[part.chemistry]}` : KIND_WORDS[part.kind]} ${part.id} between ${plus} and ${minus}`,
  );
  return `Diagram of the wiring, both poles. ${told.join('; ')}. ${links.length} conductors and devices lead between these points; each stands with its two ends in the schedules.`;
}
