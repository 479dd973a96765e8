/** How the current between two sides fades after they are joined, over time in equal ratios; with the limit, and through a resistor. */
import Box from '@mui/material/Box';
import type { ReactElement } from 'react';
import { formatQuantity, type Joining } from '../../core/api.ts';
import { type Mark, markText, type Plot, PlotFrame, pathOf, roundMarks, TIME_MARKS } from './lineFrame.tsx';

const WIDTH = 400;
const HEIGHT = 190;
const PLOT: Plot = { left: 44, right: WIDTH - 12, top: 22, bottom: HEIGHT - 30 };

export function SettlingCurve({
  joining,
  title,
}: {
  readonly joining: Joining;
  readonly title: string;
}): ReactElement | null {
  const { curve, limitA, resistor } = joining;
  const later = curve.filter(({ seconds }) => seconds > 0);
  const [first] = later;
  const last = later.at(-1);
  if (first === undefined || last === undefined || first === last) return null;
  const mostA = Math.max(limitA, ...curve.map(({ currentA }) => currentA)) * 1.05;
  const x = (seconds: number): number =>
    PLOT.left + (Math.log(seconds / first.seconds) / Math.log(last.seconds / first.seconds)) * (PLOT.right - PLOT.left);
  const y = (currentA: number): number => PLOT.bottom - (currentA / mostA) * (PLOT.bottom - PLOT.top);
  const across = TIME_MARKS.filter(([seconds]) => seconds >= first.seconds && seconds <= last.seconds).map(
    ([seconds, text]): Mark => ({ at: x(seconds), text }),
  );
  const up = roundMarks(0, mostA).map((value): Mark => ({ at: y(value), text: markText(value) }));
  const straight = later.map(({ seconds, currentA }) => [x(seconds), y(currentA)] as const);
  const eased = later.flatMap(({ seconds, withResistorA }) =>
    withResistorA === null ? [] : [[x(seconds), y(withResistorA)] as const],
  );
  return (
    <Box component="figure" sx={{ m: 0, flex: '1 1 21rem', minWidth: 0, maxWidth: '26rem' }}>
      <Box component="figcaption" sx={{ fontWeight: 600, fontSize: '0.875rem' }}>
        {title}
      </Box>
      <svg viewBox={`0 0 ${String(WIDTH)} ${String(HEIGHT)}`} width="100%" role="img" aria-label={spoken(joining)}>
        <PlotFrame plot={PLOT} across={across} up={up} upUnit="A" />
        <line
          x1={PLOT.left}
          x2={PLOT.right}
          y1={y(limitA)}
          y2={y(limitA)}
          stroke="var(--fix)"
          strokeWidth="2"
          strokeDasharray="8 4"
        />
        <path d={pathOf(straight)} fill="none" stroke="var(--copper)" strokeWidth="2.5" />
        {eased.length > 1 && (
          <path d={pathOf(eased)} fill="none" stroke="var(--volt)" strokeWidth="2" strokeDasharray="2 4" />
        )}
        <g fontSize="13" style={{ paintOrder: 'stroke' }} stroke="var(--ground)" strokeWidth="4">
          <text x={PLOT.right} y={y(limitA) - 5} textAnchor="end" fill="var(--fix)">
            {`limit ${formatQuantity({ value: limitA, unit: 'A', digits: 3 })}`}
          </text>
          <Label points={straight} at={0.3} text="joined directly" fill="var(--copper)" />
          {resistor !== null && (
            <Label
              points={eased}
              at={0.12}
              text={`through ${formatQuantity({ value: resistor.ohm, unit: 'ohm', digits: 2 })}`}
              fill="var(--volt)"
              below
            />
          )}
        </g>
      </svg>
    </Box>
  );
}

interface LabelProps {
  readonly points: readonly (readonly [number, number])[];
  /** Where along the line, 0 to 1. */
  readonly at: number;
  readonly text: string;
  readonly fill: string;
  readonly below?: boolean;
}

function Label({ points, at, text, fill, below = false }: LabelProps): ReactElement | null {
  const point = points[Math.round((points.length - 1) * at)];
  if (point === undefined) return null;
  return (
    <text x={point[0] + 6} y={point[1] + (below ? 16 : -6)} fill={fill}>
      {text}
    </text>
  );
}

function spoken({ curve, limitA }: Joining): string {
  const told = [0, 0.25, 0.5, 0.75, 1].flatMap((part) => {
    const moment = curve[Math.round((curve.length - 1) * part)];
    if (moment === undefined) return [];
    const after = formatQuantity({ value: moment.seconds, unit: 's', digits: 2 });
    return [`${formatQuantity({ value: moment.currentA, unit: 'A', digits: 2 })} after ${after}`];
  });
  return `Current after joining: ${told.join(', ')}; limit ${formatQuantity({ value: limitA, unit: 'A', digits: 3 })}.`;
}
