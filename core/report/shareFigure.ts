/** Bars of how strings share a case against the line of their fair share: told by letter, hatch and number, never by colour. */
import type { Shape } from '../diagram/shape.ts';
import { label, line } from '../diagram/symbols.ts';
import { cut, WORD_PT } from '../diagram/wiringWords.ts';
import type { FigureBlock } from './document.ts';
import { amps, percent } from './figures.ts';

export interface ShareBar {
  readonly id: string;
  readonly currentA: number;
  readonly share: number;
  readonly fairShare: number;
  /** Share at the 5th and 95th percentile over the ranges of the figures; null where no draws were made. */
  readonly whisker: readonly [number, number] | null;
}

const NAME_PT = 96;
const BAR_PT = 300;
const NUMBER_PT = 100;
const ROW_PT = 24;
const BAR_HEIGHT_PT = 12;
const TOP_PT = 16;
/** Slope and spacing of the hatch, one pair a string, so that neighbours differ; then they begin again. */
const HATCHES = [
  { leanPt: 6, everyPt: 6 },
  { leanPt: -6, everyPt: 6 },
  { leanPt: 0, everyPt: 4 },
  { leanPt: 6, everyPt: 12 },
  { leanPt: -6, everyPt: 12 },
  { leanPt: 0, everyPt: 9 },
] as const;

export function shareFigure(title: string, bars: readonly ShareBar[]): FigureBlock {
  const shares = bars.flatMap(({ share, fairShare, whisker }) => [share, fairShare, ...(whisker ?? [])]);
  const least = Math.min(0, ...shares);
  const most = Math.max(...shares) * 1.04;
  const at = (share: number) => NAME_PT + (BAR_PT * (share - least)) / (most - least);
  const height = TOP_PT + bars.length * ROW_PT + 2;
  return {
    kind: 'figure',
    title,
    alt: altText(title, bars),
    width: NAME_PT + BAR_PT + NUMBER_PT,
    height,
    shapes: [
      line(at(0), TOP_PT - 4, at(0), height, 'hair'),
      ...bars.flatMap((bar, index) => oneBar(bar, index, at)),
      small(legendOf(bars), at(0) + 2, 7),
    ],
  };
}

function legendOf(bars: readonly ShareBar[]): string {
  const fair = 'dashed: fair share by capacity';
  return bars.every(({ whisker }) => whisker === null) ? fair : `${fair}; line under a bar: where 90 of 100 draws lie`;
}

function small(text: string, x: number, y: number): Shape {
  return label(text, { x, y }, { sizePt: WORD_PT, align: 'left', tone: 'quiet' });
}

function oneBar(bar: ShareBar, index: number, at: (share: number) => number): readonly Shape[] {
  const { id, currentA, share, fairShare, whisker } = bar;
  const y = TOP_PT + index * ROW_PT + 4;
  const [from, to] = [Math.min(at(0), at(share)), Math.max(at(0), at(share))];
  const fairX = at(fairShare);
  const middle = y + BAR_HEIGHT_PT / 2;
  const word = { sizePt: WORD_PT + 1, align: 'left' as const };
  return [
    label(letterOf(index), { x: 2, y: middle + 3 }, { ...word, strong: true }),
    label(cut(id, NAME_PT - 20), { x: 16, y: middle + 3 }, word),
    ...hatch(from, to, y, index),
    { shape: 'rect', x: from, y, width: to - from, height: BAR_HEIGHT_PT, fill: 'none', stroke: 'line', tone: 'ink' },
    ...(whisker === null ? [] : whiskerShapes(at(whisker[0]), at(whisker[1]), y + BAR_HEIGHT_PT + 3)),
    { ...vertical(fairX, y - 4, y + BAR_HEIGHT_PT + 6), dashed: true },
    label(`${amps(currentA)} A, ${percent(share)} %`, { x: NAME_PT + BAR_PT + 6, y: middle + 3 }, word),
  ];
}

function vertical(x: number, y1: number, y2: number): Extract<Shape, { shape: 'line' }> {
  return { shape: 'line', x1: x, y1, x2: x, y2, stroke: 'heavy', tone: 'ink' };
}

/** Where 90 of 100 draws lie. */
function whiskerShapes(low: number, high: number, y: number): readonly Shape[] {
  return [line(low, y, high, y), line(low, y - 2, low, y + 2), line(high, y - 2, high, y + 2)];
}

/** Lines across a bar, cut at its ends. */
function hatch(from: number, to: number, y: number, index: number): readonly Shape[] {
  const { leanPt, everyPt } = HATCHES[index % HATCHES.length]!;
  const lines: Shape[] = [];
  for (let x = from + everyPt / 2; x < to; x += everyPt) {
    const foot = Math.min(Math.max(x - leanPt / 2, from), to);
    const head = Math.min(Math.max(x + leanPt / 2, from), to);
    lines.push(line(foot, y + BAR_HEIGHT_PT, head, y, 'hair'));
  }
  return lines;
}

export function letterOf(index: number): string {
  return String.fromCodePoint(97 + (index % 26));
}

function altText(title: string, bars: readonly ShareBar[]): string {
  const told = bars.map(
    ({ id, share, fairShare }) => `${id} ${percent(share)} % against a fair share of ${percent(fairShare)} %`,
  );
  return `${title}: ${told.join('; ')}.`;
}
