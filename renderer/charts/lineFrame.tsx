/** What charts over time have in common: a frame with marks at round figures, and lines told apart by dash and a tag at their end. */
import type { ReactElement } from 'react';
import { numberText } from '../../core/api.ts';

/** The place of the lines inside the chart's own units; text of 13 stands at its real size while the chart is as wide as it may be. */
export interface Plot {
  readonly left: number;
  readonly right: number;
  readonly top: number;
  readonly bottom: number;
}

export interface Mark {
  /** In units of the plot. */
  readonly at: number;
  readonly text: string;
}

/** At most six round figures from `from` to `to`. */
export function roundMarks(from: number, to: number): readonly number[] {
  const span = to - from;
  if (!(span > 0)) return [from];
  const rough = span / 5;
  const power = 10 ** Math.floor(Math.log10(rough));
  const step = [1, 2, 5, 10].map((one) => one * power).find((one) => one >= rough) ?? rough;
  const first = Math.ceil(from / step - 1e-9);
  const last = Math.floor(to / step + 1e-9);
  return Array.from({ length: last - first + 1 }, (_, index) => (first + index) * step);
}

/** Marks of time that people count in. */
export const TIME_MARKS: readonly (readonly [seconds: number, text: string])[] = [
  [0.001, '1 ms'],
  [0.01, '10 ms'],
  [0.1, '0.1 s'],
  [1, '1 s'],
  [10, '10 s'],
  [60, '1 min'],
  [600, '10 min'],
  [3600, '1 h'],
  [36_000, '10 h'],
  [360_000, '100 h'],
];

export function markText(value: number): string {
  return numberText({ value, digits: 4 });
}

export function PlotFrame({
  plot,
  across,
  up,
  upUnit,
}: {
  readonly plot: Plot;
  readonly across: readonly Mark[];
  readonly up: readonly Mark[];
  readonly upUnit: string;
}): ReactElement {
  const { left, right, top, bottom } = plot;
  return (
    <g fontSize="13" fill="var(--soft)">
      {up.map(({ at, text }) => (
        <g key={`up ${text}`}>
          <line x1={left} x2={right} y1={at} y2={at} stroke="var(--hair)" />
          <text x={left - 6} y={at + 4} textAnchor="end">
            {text}
          </text>
        </g>
      ))}
      <text x={left - 6} y={top - 8} textAnchor="end">
        {upUnit}
      </text>
      {across.map(({ at, text }) => (
        <g key={`across ${text}`}>
          <line x1={at} x2={at} y1={bottom} y2={bottom + 4} stroke="var(--edge)" />
          <text x={at} y={bottom + 18} textAnchor="middle">
            {text}
          </text>
        </g>
      ))}
      <line x1={left} x2={right} y1={bottom} y2={bottom} stroke="var(--edge)" />
    </g>
  );
}

export function pathOf(points: readonly (readonly [number, number])[]): string {
  return points.map(([x, y], index) => `${index === 0 ? 'M' : 'L'}${x.toFixed(1)} ${y.toFixed(1)}`).join('');
}

/** Labels at the ends of lines, moved apart so that none lies on another; each as near its line's end as that allows. */
export function spread(wanted: readonly number[], gap: number): readonly number[] {
  const order = wanted.map((at, index) => ({ at, index })).toSorted((a, b) => a.at - b.at);
  let last = Number.NEGATIVE_INFINITY;
  const placed = order.map(({ at, index }) => {
    last = Math.max(at, last + gap);
    return { at: last, index };
  });
  const middle = (some: readonly { readonly at: number }[]) =>
    some.reduce((sum, { at }) => sum + at, 0) / Math.max(1, some.length);
  const shift = middle(order) - middle(placed);
  return placed.toSorted((a, b) => a.index - b.index).map(({ at }) => at + shift);
}
