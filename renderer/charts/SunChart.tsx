/** The sun of twelve months as bars from nought; its title says which month has least. */
import Box from '@mui/material/Box';
import type { ReactElement } from 'react';
import { formatQuantity, numberText } from '../../core/api.ts';
import { MONTHS } from '../controls/MonthsField.tsx';

export interface SunChartProps {
  /** Twelve daily means, kWh/m² a day, January first; `null` where a month has no figure. */
  readonly months: readonly (number | null)[];
}

/** `Least sun in December: 1.3 kWh/m² a day`; what is missing where a month has no figure. */
export function sunAnswer(months: readonly (number | null)[]): string {
  const given = months.flatMap((value, month) => (value === null ? [] : [{ value, month }]));
  if (given.length === 0) return 'No month has a figure yet';
  const least = given.reduce((low, next) => (next.value < low.value ? next : low));
  const amount = formatQuantity({ value: least.value, unit: 'kWh/m2/day', digits: 3 });
  const among = given.length < months.length ? ` (of ${String(given.length)} months given)` : '';
  return `Least sun in ${MONTHS[least.month] ?? ''}: ${amount}${among}`;
}

const WIDTH = 480;
const TOP = 20;
const FOOT = 132;
const STEP = WIDTH / 12;
const BAR = 26;

export function SunChart({ months }: SunChartProps): ReactElement {
  const most = Math.max(1, ...months.map((value) => value ?? 0));
  const least = Math.min(...months.map((value) => value ?? Number.POSITIVE_INFINITY));
  return (
    <Box component="figure" sx={{ m: 0, maxWidth: '34rem' }}>
      <Box component="figcaption" sx={{ fontWeight: 600, mb: '0.25rem' }}>
        {sunAnswer(months)}
      </Box>
      <svg viewBox={`0 0 ${String(WIDTH)} 156`} width="100%" role="img" aria-label={spoken(months)}>
        {months.map((value, month) => (
          <Month key={MONTHS[month]} value={value} month={month} most={most} isLeast={value === least} />
        ))}
        <line x1="0" x2={WIDTH} y1={FOOT} y2={FOOT} stroke="var(--edge)" strokeWidth="1" />
      </svg>
    </Box>
  );
}

interface MonthProps {
  readonly value: number | null;
  readonly month: number;
  readonly most: number;
  readonly isLeast: boolean;
}

function Month({ value, month, most, isLeast }: MonthProps): ReactElement {
  const x = (month + 0.5) * STEP;
  const height = value === null ? 0 : (value / most) * (FOOT - TOP);
  return (
    <g>
      {value === null ? (
        <line x1={x} x2={x} y1={TOP} y2={FOOT} stroke="var(--edge)" strokeWidth="1" strokeDasharray="2 4" />
      ) : (
        <rect
          x={x - BAR / 2}
          y={FOOT - height}
          width={BAR}
          height={height}
          fill={isLeast ? 'var(--copper)' : 'var(--hair)'}
          stroke={isLeast ? 'var(--copper)' : 'var(--edge)'}
          strokeWidth="1"
        />
      )}
      <text
        x={x}
        y={FOOT - height - 5}
        textAnchor="middle"
        fontSize="13"
        fill="var(--ink)"
        fontWeight={isLeast ? 600 : 400}
      >
        {value === null ? '' : numberText({ value, digits: 3 })}
      </text>
      <text x={x} y={FOOT + 17} textAnchor="middle" fontSize="13" fill="var(--soft)">
        {MONTHS[month]?.charAt(0)}
      </text>
    </g>
  );
}

function spoken(months: readonly (number | null)[]): string {
  const told = months.map(
    (value, month) => `${MONTHS[month] ?? ''} ${value === null ? 'no figure' : numberText({ value, digits: 3 })}`,
  );
  return `Daily sun on level ground, kWh/m² a day: ${told.join(', ')}.`;
}
