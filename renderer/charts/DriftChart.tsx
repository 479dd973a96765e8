/** The charge of each string through the cycles: a dash and a tag a string, from empty to full. */
import Box from '@mui/material/Box';
import type { ReactElement } from 'react';
import { type DriftMoment, type DriftStudy, formatQuantity } from '../../core/api.ts';
import { dashOf, type HatchNumber } from './Hatches.tsx';
import { type Mark, markText, type Plot, PlotFrame, pathOf, roundMarks, spread } from './lineFrame.tsx';

const WIDTH = 640;
const HEIGHT = 210;
const PLOT: Plot = { left: 44, right: WIDTH - 110, top: 22, bottom: HEIGHT - 30 };
const LINE_GAP = 15;
const DAY_H = 24;

export interface DriftLine {
  readonly at: number;
  readonly tag: string;
  readonly hatch: HatchNumber;
}

export interface DriftChartProps {
  readonly drift: DriftStudy;
  readonly title: string;
  /** What is drawn: a place in `drift.strings`, and how it is told. */
  readonly lines: readonly DriftLine[];
}

export function DriftChart({ drift, title, lines }: DriftChartProps): ReactElement | null {
  const { moments, hours } = drift;
  const last = moments.at(-1);
  if (last === undefined || hours <= 0) return null;
  const inDays = hours > 4 * DAY_H;
  const x = (at: number): number => PLOT.left + (at / hours) * (PLOT.right - PLOT.left);
  const y = (charge: number): number => PLOT.bottom - charge * (PLOT.bottom - PLOT.top);
  const across = roundMarks(0, inDays ? hours / DAY_H : hours).map(
    (value): Mark => ({ at: x(inDays ? value * DAY_H : value), text: `${markText(value)} ${inDays ? 'd' : 'h'}` }),
  );
  const up = [0, 0.25, 0.5, 0.75, 1].map((value): Mark => ({ at: y(value), text: String(value * 100) }));
  const runs = unbroken(drift);
  const tagsAt = spread(
    lines.map(({ at }) => y(last.stateOfCharge[at] ?? 0)),
    LINE_GAP,
  );
  return (
    <Box component="figure" sx={{ m: 0, maxWidth: '44rem' }}>
      <Box component="figcaption" sx={{ fontWeight: 600, fontSize: '0.875rem' }}>
        {title}
      </Box>
      <svg viewBox={`0 0 ${String(WIDTH)} ${String(HEIGHT)}`} width="100%" role="img" aria-label={spoken(drift, lines)}>
        <PlotFrame plot={PLOT} across={across} up={up} upUnit="%" />
        {lines.map(({ at: string, tag, hatch }, line) => (
          <g key={tag}>
            <path
              d={runs
                .map((run) => pathOf(run.map(({ hours: at, stateOfCharge }) => [x(at), y(stateOfCharge[string] ?? 0)])))
                .join('')}
              fill="none"
              stroke="var(--ink)"
              strokeWidth="1.6"
              strokeDasharray={dashOf(hatch)}
            />
            <text x={PLOT.right + 8} y={(tagsAt[line] ?? 0) + 4} fontSize="14" fontWeight="600" fill="var(--ink)">
              {tag}
            </text>
          </g>
        ))}
      </svg>
    </Box>
  );
}

/** The moments in stretches without a cycle left out between them: what was not kept is not drawn. */
function unbroken({ moments, hours, cycles }: DriftStudy): readonly (readonly DriftMoment[])[] {
  const gapH = (hours / cycles) * NEARLY_ONE;
  const runs: DriftMoment[][] = [];
  for (const moment of moments) {
    const run = runs.at(-1);
    const before = run?.at(-1);
    if (run === undefined || before === undefined || moment.hours - before.hours > gapH) runs.push([moment]);
    else run.push(moment);
  }
  return runs;
}
const NEARLY_ONE = 0.98;

function spoken({ strings }: DriftStudy, lines: DriftChartProps['lines']): string {
  const percent = (value: number): string => formatQuantity({ value, unit: '1', digits: 2 });
  const told = strings.map(
    ({ lowestCharge, highestCharge, endCharge }, index) =>
      `${lines[index]?.tag ?? ''} between ${percent(lowestCharge)} and ${percent(highestCharge)}, at the end ${percent(endCharge)}`,
  );
  return `Charge of each string through the cycles: ${told.join('; ')}.`;
}
