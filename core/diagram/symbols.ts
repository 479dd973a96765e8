/**
 * Graphical symbols after IEC 60617, drawn by us on a grid of `U` points. Parts in a line are drawn level, the line running
 * through (`x`, `y`); devices between the poles are drawn upright. Symbols of contacts show them open on paper, as is usual; a live drawing asks for them closed.
 */
import type { Shape, Stroke, Tone } from './shape.ts';

/** Grid module. */
export const U = 4.5;
const INK: Tone = 'ink';

interface At {
  readonly x: number;
  readonly y: number;
}

export function line(x1: number, y1: number, x2: number, y2: number, stroke: Stroke = 'line', tone: Tone = INK): Shape {
  return { shape: 'line', x1, y1, x2, y2, stroke, tone };
}
export function label(
  text: string,
  at: At,
  options: {
    readonly sizePt: number;
    readonly align?: 'left' | 'centre' | 'right';
    readonly strong?: boolean;
    readonly tone?: Tone;
  },
): Shape {
  return {
    shape: 'text',
    text,
    ...at,
    sizePt: options.sizePt,
    align: options.align ?? 'centre',
    strong: options.strong ?? false,
    tone: options.tone ?? INK,
  };
}
function box({ x, y }: At, width: number, height: number, fill: 'none' | 'paper' = 'paper'): Shape {
  return { shape: 'rect', x: x - width / 2, y: y - height / 2, width, height, fill, stroke: 'line', tone: INK };
}
function ring({ x, y }: At, radius: number, fill: 'paper' | 'ink' = 'paper'): Shape {
  return { shape: 'circle', x, y, radius, fill, stroke: 'line', tone: INK };
}
/** Wipes a stretch of the line on which a contact is drawn. */
function gap({ x, y }: At, width: number): Shape {
  return {
    shape: 'rect',
    x: x - width / 2,
    y: y - 1.5,
    width,
    height: 3,
    fill: 'paper',
    stroke: 'hair',
    tone: 'paper',
  };
}

export function dot(at: At): Shape {
  return ring(at, U * 0.4, 'ink');
}
/** A point of the wiring where nothing branches off. */
export function terminal(at: At): Shape {
  return ring(at, U * 0.3);
}
/** The line goes on on another sheet: a small triangle at its cut end, `way` −1 upwards and +1 downwards. */
export function goesOn({ x, y }: At, way: 1 | -1): Shape {
  const half = U * 0.5;
  return {
    shape: 'polyline',
    points: [
      [x - half, y],
      [x + half, y],
      [x, y + way * U * 0.9],
    ],
    closed: true,
    filled: true,
    stroke: 'hair',
    tone: INK,
  };
}
/** Rectangle with the conductor running straight through. */
export function fuseSymbol({ x, y }: At): readonly Shape[] {
  return [box({ x, y }, 3 * U, U * 1.2), line(x - 1.5 * U, y, x + 1.5 * U, y)];
}
/** Rectangle without the line: shunt or resistor; a shunt has two fine taps. */
export function shuntSymbol({ x, y }: At): readonly Shape[] {
  return [
    box({ x, y }, 3 * U, U * 1.2),
    line(x - U, y + U * 0.6, x - U, y + U * 1.4, 'hair'),
    line(x + U, y + U * 0.6, x + U, y + U * 1.4, 'hair'),
  ];
}
/** Make contact: the blade stands off the fixed end, or lies on it where the contact is closed. */
function contactSymbol({ x, y }: At, isClosed: boolean): readonly Shape[] {
  if (isClosed) return [line(x - 1.2 * U, y, x + 1.2 * U, y)];
  return [gap({ x, y }, 2.4 * U), line(x - 1.2 * U, y, x + 1.1 * U, y - 0.9 * U)];
}
/** Disconnector: make contact with a bar across the fixed end; a small ring where it may be opened under load. */
export function switchSymbol({ x, y }: At, breaksLoad: boolean, isClosed = false): readonly Shape[] {
  const right = x + 1.2 * U;
  const bar = line(right, y - 0.55 * U, right, y + 0.55 * U);
  const hinge = isClosed ? [dot({ x: x - 1.2 * U, y })] : [];
  return [
    ...contactSymbol({ x, y }, isClosed),
    bar,
    ...(breaksLoad ? [ring({ x: right - 0.35 * U, y }, 0.35 * U)] : []),
    ...hinge,
  ];
}
/** Circuit-breaker: make contact with a cross at the fixed end. */
export function breakerSymbol({ x, y }: At, isClosed = false): readonly Shape[] {
  const right = x + 1.2 * U;
  const arm = 0.45 * U;
  const hinge = isClosed ? [dot({ x: x - 1.2 * U, y })] : [];
  return [
    ...contactSymbol({ x, y }, isClosed),
    line(right - arm, y - arm, right + arm, y + arm),
    line(right - arm, y + arm, right + arm, y - arm),
    ...hinge,
  ];
}
/** Triangle to a bar; `forward` is +1 where it conducts to the right. */
export function diodeSymbol({ x, y }: At, forward: 1 | -1): readonly Shape[] {
  const tip = x + forward * U;
  const back = x - forward * U;
  return [
    {
      shape: 'polyline',
      points: [
        [back, y - U * 0.8],
        [back, y + U * 0.8],
        [tip, y],
      ],
      closed: true,
      filled: true,
      stroke: 'line',
      tone: INK,
    },
    line(tip, y - U * 0.9, tip, y + U * 0.9),
  ];
}
/** Terminal or joint: an open ring. */
export function jointSymbol(at: At): readonly Shape[] {
  return [ring(at, U * 0.5)];
}
/** Stem and three bars, each shorter than the last. */
export function earthSymbol({ x, y }: At): readonly Shape[] {
  const bars = [2, 1.3, 0.6].map((width, index) => {
    const barY = y + U * (1.2 + 0.45 * index);
    return line(x - (width * U) / 2, barY, x + (width * U) / 2, barY);
  });
  return [line(x, y, x, y + 1.2 * U), ...bars];
}

/** Two cells: long bars to plus (above), short to minus, joined by a broken line where there are more. */
export function batterySymbol(x: number, plusY: number, minusY: number): readonly Shape[] {
  const middle = (plusY + minusY) / 2;
  const bars = [-1.5, -0.7, 0.7, 1.5].map((step, index) => {
    const half = index % 2 === 0 ? 2 * U : U;
    return line(x - half, middle + step * U, x + half, middle + step * U);
  });
  return [
    line(x, plusY, x, middle - 1.5 * U),
    ...bars,
    {
      shape: 'line',
      x1: x,
      y1: middle - 0.7 * U,
      x2: x,
      y2: middle + 0.7 * U,
      stroke: 'hair',
      tone: INK,
      dashed: true,
    },
    line(x, middle + 1.5 * U, x, minusY),
    label('+', { x: x - 2.6 * U, y: middle - 1.4 * U }, { sizePt: 7 }),
  ];
}
/** A load in general: an upright rectangle. */
export function loadSymbol(x: number, plusY: number, minusY: number): readonly Shape[] {
  return [line(x, plusY, x, minusY), box({ x, y: (plusY + minusY) / 2 }, 2 * U, 4 * U)];
}
/** Rectangle with a triangle at one end, as solar modules are drafted. */
export function arraySymbol(x: number, plusY: number, minusY: number): readonly Shape[] {
  const middle = (plusY + minusY) / 2;
  const top = middle - 2.2 * U;
  return [
    line(x, plusY, x, minusY),
    box({ x, y: middle }, 3.4 * U, 4.4 * U),
    {
      shape: 'polyline',
      points: [
        [x - 1.7 * U, top],
        [x, top + 1.5 * U],
        [x + 1.7 * U, top],
      ],
      closed: false,
      filled: false,
      stroke: 'line',
      tone: INK,
    },
  ];
}
/** A square with a diagonal: what goes in stands upper left, what comes out lower right. */
export function converterSymbol(
  at: At,
  kinds: { readonly from: 'DC' | 'AC'; readonly to: 'DC' | 'AC' },
): readonly Shape[] {
  const half = 2.4 * U;
  return [
    box(at, 2 * half, 2 * half),
    line(at.x - half, at.y + half, at.x + half, at.y - half, 'hair'),
    ...currentSign({ x: at.x - 1.15 * U, y: at.y - 1.2 * U }, kinds.from),
    ...currentSign({ x: at.x + 1.15 * U, y: at.y + 1.2 * U }, kinds.to),
  ];
}
/** A converter between two pairs of lines: one box over both. */
export function twoPortSymbol(x: number, plusY: number, minusY: number): readonly Shape[] {
  const half = 3 * U;
  const [top, bottom] = [plusY - U, minusY + U];
  return [
    {
      shape: 'rect',
      x: x - half,
      y: top,
      width: 2 * half,
      height: bottom - top,
      fill: 'paper',
      stroke: 'line',
      tone: INK,
    },
    line(x - half, bottom, x + half, top, 'hair'),
    ...currentSign({ x: x - 1.5 * U, y: top + 2 * U }, 'DC'),
    ...currentSign({ x: x + 1.5 * U, y: bottom - 2 * U }, 'DC'),
  ];
}
/** Direct: a whole line over a broken one. Alternating: one wave. */
function currentSign({ x, y }: At, kind: 'DC' | 'AC'): readonly Shape[] {
  const half = 0.8 * U;
  if (kind === 'DC') {
    return [
      line(x - half, y - 1, x + half, y - 1, 'hair'),
      { shape: 'line', x1: x - half, y1: y + 1, x2: x + half, y2: y + 1, stroke: 'hair', tone: INK, dashed: true },
    ];
  }
  const points = Array.from(
    { length: 13 },
    (_, step) => [x - half + (step * half) / 6, y - Math.sin((step * Math.PI) / 6) * 0.4 * U] as const,
  );
  return [{ shape: 'polyline', points, closed: false, filled: false, stroke: 'hair', tone: INK }];
}

/** A conductor alone, for a list of parts: a line with its two ends. */
export function cableSymbol({ x, y }: At): readonly Shape[] {
  return [line(x - 1.5 * U, y, x + 1.5 * U, y), dot({ x: x - 1.5 * U, y }), dot({ x: x + 1.5 * U, y })];
}
/** Two conductors side by side, out and back. */
export function pairSymbol({ x, y }: At): readonly Shape[] {
  return [...cableSymbol({ x, y: y - 0.6 * U }), ...cableSymbol({ x, y: y + 0.6 * U })];
}
/** An upright bar with its taps. */
export function busbarSymbol({ x, y }: At): readonly Shape[] {
  const taps = [-1, 0, 1].map((step) => line(x, y + step * U, x + 1.4 * U, y + step * U));
  return [line(x, y - 1.6 * U, x, y + 1.6 * U, 'heavy'), ...taps];
}
