/** From the places of the plan to lines, symbols and words; a drawing of many rows is divided into sheets, row by row. */

import { CHEMISTRY_WORDS, KIND_WORDS } from '../../diagram/kindWords.ts';
import type { Place } from '../../diagram/labelPlacer.ts';
import { boxOf, LabelPlacer } from '../../diagram/labelPlacer.ts';
import type { Shape } from '../../diagram/shape.ts';
import * as symbols from '../../diagram/symbols.ts';
import { label, line, U } from '../../diagram/symbols.ts';
import type { Pole, WiringGraph } from '../../diagram/wiringGraph.ts';
import type { Layout, PlacedBox, PlacedDevice, PlacedLink, PlacedPoint } from '../../diagram/wiringLayout.ts';
import { POLES_PT, ROW_PT, SIDE_PT, TOP_PT, yOf } from '../../diagram/wiringLayout.ts';
import { cut, deviceDetail, linkDetail, nameWidthPt, WORD_PT } from '../../diagram/wiringWords.ts';
import type { Part } from '../../job/part.ts';
import type { FigureBlock } from '../document.ts';
import { plain } from '../figures.ts';
import { drawLegend } from './diagramLegend.ts';

const LEGEND_PT = 26;
/** Between the middle of a symbol and an upright line that crosses beside it. */
const CLEAR_PT = 3 * U;

/** Rows of a sheet, from the first to the one before `to`. */
export interface Band {
  readonly from: number;
  readonly to: number;
}

/** Height of a sheet of so many rows. */
export function sheetHeightPt(rows: number): number {
  return TOP_PT + (rows - 1) * ROW_PT + POLES_PT + TOP_PT + LEGEND_PT;
}

/** One figure a band, drawn to the same scale. */
export function drawWiring(graph: WiringGraph, layout: Layout, bands: readonly Band[]): readonly FigureBlock[] {
  const parts = [...graph.links.map(({ part }) => part), ...[...graph.bars.values()].flat()];
  const kinds = new Set(parts.map(({ kind }) => kind));
  return bands.map((band, index) => {
    const isOneOf = bands.length === 1 ? '' : `, sheet ${index + 1} of ${bands.length}`;
    return {
      kind: 'figure',
      title: `One-line diagram, both poles in full${isOneOf}`,
      alt: altText(graph, layout, band, isOneOf),
      width: layout.width,
      height: sheetHeightPt(band.to - band.from),
      shapes: [
        ...new SheetOfRows(layout, band).shapes(),
        ...drawLegend(kinds, {
          widthPt: layout.width,
          y: sheetHeightPt(band.to - band.from) - 8,
          isDivided: bands.length > 1,
        }),
      ],
    };
  });
}

class SheetOfRows {
  private readonly layout: Layout;
  private readonly band: Band;
  private readonly placer = new LabelPlacer();

  constructor(layout: Layout, band: Band) {
    this.layout = layout;
    this.band = band;
  }

  shapes(): readonly Shape[] {
    const { links, wires, devices, boxes, points, earths } = this.layout;
    const here = <T extends { readonly row: number }>(things: readonly T[]): readonly T[] =>
      things.filter(({ row }) => row >= this.band.from && row < this.band.to);
    for (const level of [...here(wires), ...here(links)]) {
      const y = this.y(level);
      this.placer.take({ x1: Math.min(level.x1, level.x2), x2: Math.max(level.x1, level.x2), y1: y, y2: y });
    }
    for (const point of points) {
      const stretch = this.stretch(point);
      if (stretch !== undefined) this.placer.take({ x1: point.x, x2: point.x, y1: stretch.top, y2: stretch.bottom });
    }
    const lines = here(wires).map((wire) => line(wire.x1, this.y(wire), wire.x2, this.y(wire)));
    const parts = [
      ...points.flatMap((point) => this.upright(point)),
      ...here(links).flatMap((link) => this.link(link)),
      ...here(boxes).flatMap((box) => this.box(box)),
      ...here(devices).flatMap((device) => this.device(device)),
    ];
    for (const shape of parts) {
      if (shape.shape === 'text') this.placer.take(boxOf(shape.text, shape));
    }
    // Bars first: many lines lead to their names.
    const named = [...points.filter(({ isBar }) => isBar), ...points.filter(({ isBar }) => !isBar)];
    return [
      ...lines,
      ...parts,
      ...here(earths).flatMap((earth) => this.earth(earth)),
      ...named.flatMap((point) => this.point(point)),
    ];
  }

  private y({ row, pole }: { readonly row: number; readonly pole: Pole }): number {
    return yOf({ row: row - this.band.from, pole });
  }
  /** Top and bottom of the sheet, where lines that go on are cut. */
  private get edges(): readonly [number, number] {
    return [TOP_PT - 10, yOf({ row: this.band.to - this.band.from - 1, pole: 'minus' }) + 10];
  }

  /** The stretch of an upright line that lies on this sheet. */
  private stretch({
    rows,
    pole,
  }: PlacedPoint):
    | { readonly top: number; readonly bottom: number; readonly isCutAbove: boolean; readonly isCutBelow: boolean }
    | undefined {
    const first = rows[0] ?? 0;
    const last = rows.at(-1) ?? 0;
    if (last < this.band.from || first >= this.band.to) return undefined;
    const [above, below] = this.edges;
    const isCutAbove = first < this.band.from;
    const isCutBelow = last >= this.band.to;
    return {
      top: isCutAbove ? above : this.y({ row: first, pole }),
      bottom: isCutBelow ? below : this.y({ row: last, pole }),
      isCutAbove,
      isCutBelow,
    };
  }

  private upright(point: PlacedPoint): readonly Shape[] {
    const stretch = this.stretch(point);
    if (stretch === undefined || (stretch.top === stretch.bottom && !point.isBar)) return [];
    const { isCutAbove, isCutBelow } = stretch;
    // A bar stands out beyond its outermost taps.
    const beyond = point.isBar ? U : 0;
    const top = stretch.top - (isCutAbove ? 0 : beyond);
    const bottom = stretch.bottom + (isCutBelow ? 0 : beyond);
    return [
      line(point.x, top, point.x, bottom, point.isBar ? 'heavy' : 'line'),
      ...(isCutAbove ? [symbols.goesOn({ x: point.x, y: top }, -1)] : []),
      ...(isCutBelow ? [symbols.goesOn({ x: point.x, y: bottom }, 1)] : []),
    ];
  }

  /** A dot where three or more lines meet, a ring where it is only a joint, and the name clear of the names of the parts. */
  private point(point: PlacedPoint): readonly Shape[] {
    const stretch = this.stretch(point);
    if (stretch === undefined) return [];
    const { name, pole, x, rows, isBar } = point;
    const here = rows.filter((row) => row >= this.band.from && row < this.band.to);
    const dots = here
      .filter((row) => this.meeting(point, row) > 2)
      .map((row) => symbols.dot({ x, y: this.y({ row, pole }) }));
    const onlyRow = rows.length === 1 ? rows[0] : undefined;
    const marks =
      dots.length === 0 && onlyRow !== undefined ? [symbols.terminal({ x, y: this.y({ row: onlyRow, pole }) })] : dots;
    const text = cut(name, nameWidthPt(name, this.layout.longestPt) + 1);
    const place = this.placer.choose(text, placesFor(pole, { x, ...stretch }));
    if (place === undefined) return [];
    const words = label(text, place, {
      sizePt: WORD_PT,
      align: place.align,
      tone: isBar ? 'ink' : 'copper',
      strong: isBar,
    });
    return [...(isBar ? [] : marks), words];
  }
  /** How many lines meet at a point in a row. */
  private meeting({ x, pole, rows }: PlacedPoint, row: number): number {
    const level = [...this.layout.links, ...this.layout.wires].filter(
      (each) => each.row === row && each.pole === pole && (each.x1 === x || each.x2 === x),
    ).length;
    return level + (rows.some((other) => other < row) ? 1 : 0) + (rows.some((other) => other > row) ? 1 : 0);
  }

  private link(placed: PlacedLink): readonly Shape[] {
    const { link, x1, x2 } = placed;
    const y = this.y(placed);
    const { part } = link;
    const middle = { x: this.symbolX(placed, y), y };
    const widthPt = Math.abs(x2 - x1) - 6;
    if (part.kind === 'controller' || part.kind === 'converter') {
      const isBoxed = this.layout.boxes.some(({ twoPort }) => twoPort.part === part);
      return isBoxed
        ? [line(x1, y, x2, y)]
        : [
            line(x1, y, x2, y),
            ...symbols.converterSymbol(middle, { from: 'DC', to: 'DC' }),
            label(cut(part.id, widthPt + 6), { x: middle.x, y: y - 3.2 * U }, { sizePt: WORD_PT, strong: true }),
          ];
    }
    return [
      line(x1, y, x2, y),
      ...inLineSymbol(part, middle, x2 > x1 ? 1 : -1),
      label(cut(link.id, widthPt), { x: middle.x, y: y - 5 }, { sizePt: WORD_PT, strong: true }),
      label(
        cut(linkDetail(part), widthPt),
        { x: middle.x, y: y + (part.kind === 'shunt' ? 13.5 : 11) },
        { sizePt: WORD_PT, tone: 'quiet' },
      ),
    ];
  }

  /** Where a symbol stands on its line: in the middle, or as near to it as no upright line runs through the symbol. */
  private symbolX({ x1, x2 }: PlacedLink, y: number): number {
    const [left, right] = [Math.min(x1, x2), Math.max(x1, x2)];
    const middle = (left + right) / 2;
    const crossing = this.layout.points.flatMap((point) => {
      const stretch = this.stretch(point);
      const isCrossing =
        stretch !== undefined && stretch.top <= y && y <= stretch.bottom && point.x > left && point.x < right;
      return isCrossing ? [point.x] : [];
    });
    for (let step = 0; step < (right - left) / 2 - CLEAR_PT; step += 4) {
      for (const x of [middle - step, middle + step]) {
        if (crossing.every((other) => Math.abs(other - x) >= CLEAR_PT)) return x;
      }
    }
    return middle;
  }

  private box({ twoPort: { part }, x, row }: PlacedBox): readonly Shape[] {
    const plusY = this.y({ row, pole: 'plus' });
    const minusY = this.y({ row, pole: 'minus' });
    const detail =
      part.kind === 'controller'
        ? part.type.toUpperCase()
        : part.kind === 'converter'
          ? `${plain(part.outputV)}\u00a0V`
          : '';
    return [
      ...symbols.twoPortSymbol(x, plusY, minusY),
      label(part.id, { x, y: plusY - 7 }, { sizePt: WORD_PT, strong: true }),
      label(detail, { x, y: minusY + 12 }, { sizePt: WORD_PT, tone: 'quiet' }),
    ];
  }

  private device({ device: { part }, side, x, row }: PlacedDevice): readonly Shape[] {
    const plusY = this.y({ row, pole: 'plus' });
    const minusY = this.y({ row, pole: 'minus' });
    const outward = side === 'left' ? -1 : 1;
    const align = side === 'left' ? 'right' : 'left';
    const textX = x + outward * 3.6 * U;
    const room = SIDE_PT - 3.6 * U - 2;
    const quiet = [part.label === part.id ? undefined : part.label, deviceDetail(part)].filter(
      (words) => words !== undefined && words !== '',
    );
    const top = (plusY + minusY) / 2 - 4.5 * quiet.length + 2.5;
    return [
      ...deviceSymbol(part, x, plusY, minusY),
      label(cut(part.id, room), { x: textX, y: top }, { sizePt: WORD_PT, align, strong: true }),
      ...quiet.map((words, index) =>
        label(
          cut(words ?? '', room),
          { x: textX, y: top + (index + 1) * 9 },
          { sizePt: WORD_PT, align, tone: 'quiet' },
        ),
      ),
    ];
  }

  private earth({ id, x, row, pole }: Layout['earths'][number]): readonly Shape[] {
    const y = this.y({ row, pole });
    const beside = 1.5 * U;
    const place = this.placer.choose(id, [
      { x: x - beside, y: y + 2.4 * U, align: 'right' },
      { x: x + beside, y: y + 2.4 * U, align: 'left' },
      { x, y: y + 4.4 * U, align: 'centre' },
    ]);
    this.placer.take({ x1: x - U, x2: x + U, y1: y, y2: y + 2.2 * U });
    if (place === undefined) return symbols.earthSymbol({ x, y });
    return [...symbols.earthSymbol({ x, y }), label(id, place, { sizePt: WORD_PT, align: place.align, tone: 'quiet' })];
  }
}

/** Where the name of a point may stand: over a plus point, under a minus point, clear of the names of the parts; else beside it. */
function placesFor(
  pole: Pole,
  { x, top, bottom }: { readonly x: number; readonly top: number; readonly bottom: number },
): readonly Place[] {
  const way = pole === 'plus' ? -1 : 1;
  const nearest = pole === 'plus' ? top - 13 : bottom + 19;
  const steps = [0, 8, 16].flatMap((step): readonly Place[] => {
    const y = nearest + way * step;
    return [
      { x, y, align: 'centre' },
      { x: x + 3, y, align: 'left' },
      { x: x - 3, y, align: 'right' },
    ];
  });
  const near = pole === 'plus' ? top - 4 : bottom + 9;
  return [...steps, { x: x + 3, y: near, align: 'left' }, { x: x - 3, y: near, align: 'right' }];
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

/** Each device of the sheet with its kind and its two points. */
function altText({ links }: WiringGraph, { devices }: Layout, band: Band, sheet: string): string {
  const here = devices.filter(({ row }) => row >= band.from && row < band.to);
  const told = here.map(({ device: { part } }) => {
    const kind = part.kind === 'string' ? `battery ${CHEMISTRY_WORDS[part.chemistry]}` : KIND_WORDS[part.kind];
    return 'plus' in part ? `${kind} ${part.id} between ${part.plus} and ${part.minus}` : `${kind} ${part.id}`;
  });
  return `Diagram of the wiring, both poles${sheet}. ${told.join('; ')}. The whole diagram has ${links.length} conductors and devices between these points; each stands with its two ends in the schedules.`;
}
