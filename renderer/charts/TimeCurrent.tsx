/**
 * When a device opens, over the current through it: its band hatched, those of its neighbours behind it, what starts, the highest and
 * lowest fault, and what its cable stands. Everything is named where it lies.
 */
import Box from '@mui/material/Box';
import { type ReactElement, useId } from 'react';
import { type DeviceBand, type DeviceStudy, formatQuantity } from '../../core/api.ts';
import { type HatchNumber, hatchFill } from './Hatches.tsx';
import { type Mark, type Plot, PlotFrame, pathOf, TIME_MARKS } from './lineFrame.tsx';
import {
  type Axes,
  axesOf,
  bandOutline,
  currentAt,
  decades,
  LONGEST_S,
  noLater,
  SHORTEST_S,
  withstandLine,
  xOf,
  yOf,
} from './timeCurrentShape.ts';

const WIDTH = 640;
const HEIGHT = 392;
/** Above the plot a row each for load, lowest and highest fault, so that their names never lie on one another. */
const ROW = 17;
const PLOT: Plot = { left: 48, right: WIDTH - 26, top: 3 * ROW + 16, bottom: HEIGHT - 30 };

export interface TimeCurrentProps {
  readonly study: DeviceStudy;
  /** The answer. */
  readonly title: string;
  /** All that the picture says, in words. */
  readonly spoken: string;
}

export function TimeCurrent({ study, title, spoken }: TimeCurrentProps): ReactElement {
  const clip = useId();
  const axes = axesOf(study, PLOT);
  const { window, fault, band, upstream, downstream, withstand, surges } = study;
  const across = decades(axes).map((currentA): Mark => ({ at: xOf(axes, currentA), text: amps(currentA) }));
  const up = TIME_MARKS.filter(([seconds]) => seconds >= SHORTEST_S && seconds <= LONGEST_S).map(
    ([seconds, text]): Mark => ({ at: yOf(axes, seconds), text }),
  );
  return (
    <Box component="figure" sx={{ m: 0, maxWidth: '44rem' }}>
      <Box component="figcaption" sx={{ fontWeight: 600, fontSize: '0.9375rem', lineHeight: 1.3 }}>
        {title}
      </Box>
      <svg viewBox={`0 0 ${String(WIDTH)} ${String(HEIGHT)}`} width="100%" role="img" aria-label={spoken}>
        <clipPath id={clip}>
          <rect x={PLOT.left} y={PLOT.top} width={PLOT.right - PLOT.left} height={PLOT.bottom - PLOT.top} />
        </clipPath>
        <PlotFrame plot={PLOT} across={across} up={up} upUnit="" />
        {decades(axes).map((currentA) => (
          <line
            key={currentA}
            x1={xOf(axes, currentA)}
            x2={xOf(axes, currentA)}
            y1={PLOT.top}
            y2={PLOT.bottom}
            stroke="var(--hair)"
          />
        ))}
        <g clipPath={`url(#${clip})`}>
          {upstream !== null && <Band band={upstream.band} axes={axes} hatch={1} isBehind />}
          {downstream !== null && <Band band={downstream.band} axes={axes} hatch={6} isBehind />}
          <Band band={band} axes={axes} hatch={0} />
          {withstand !== null && (
            <path
              d={pathOf(withstandLine(withstand.k2s2, axes))}
              fill="none"
              stroke="var(--fix)"
              strokeWidth="2.5"
              strokeDasharray="10 4 2 4"
            />
          )}
        </g>
        <UpTo
          axes={axes}
          currentA={'missing' in window ? null : window.loadA}
          row={0}
          text="load"
          stroke="var(--volt)"
          dash="2 4"
        />
        <UpTo
          axes={axes}
          currentA={fault?.lowestA ?? null}
          row={1}
          text="lowest fault"
          stroke="var(--ink)"
          dash="7 4"
        />
        <UpTo axes={axes} currentA={fault?.highestA ?? null} row={2} text="highest fault" stroke="var(--ink)" dash="" />
        <g fontSize="13" style={{ paintOrder: 'stroke' }} stroke="var(--sheet)" strokeWidth="4" fill="var(--ink)">
          {surges.map(({ part, currentA, seconds }) => (
            <Surge key={part} x={xOf(axes, currentA)} y={yOf(axes, seconds)} text={`${part} starts`} />
          ))}
          {upstream !== null && (
            <BandName band={upstream.band} axes={axes} seconds={60} text={`${upstream.device}, before it`} />
          )}
          {downstream !== null && (
            <BandName
              band={downstream.band}
              axes={axes}
              seconds={30}
              side="left"
              text={`${downstream.device}, after it`}
            />
          )}
          <BandName band={band} axes={axes} seconds={4} text={study.id} isOwn />
          {withstand !== null && <CableName axes={axes} k2s2={withstand.k2s2} cable={withstand.cable} />}
        </g>
      </svg>
    </Box>
  );
}

type MaybeBand = DeviceBand | { readonly missing: string };

interface BandProps {
  readonly band: MaybeBand;
  readonly axes: Axes;
  readonly hatch: HatchNumber;
  readonly isBehind?: boolean;
}

function Band({ band, axes, hatch, isBehind = false }: BandProps): ReactElement | null {
  const outline = 'missing' in band ? null : bandOutline(band, axes);
  if ('missing' in band || outline === null) return null;
  const stroke = isBehind ? 'var(--soft)' : 'var(--copper)';
  return (
    <g opacity={isBehind ? 0.6 : 0.92}>
      <path d={`${pathOf(outline)}Z`} fill={hatchFill(hatch)} stroke={stroke} strokeWidth={isBehind ? 1 : 2} />
      <path d={pathOf(noLater(band, axes))} fill="none" stroke={stroke} strokeWidth="1.5" strokeDasharray="1 4" />
    </g>
  );
}

interface BandNameProps {
  readonly band: MaybeBand;
  readonly axes: Axes;
  /** At the height of this time, each band another: right of where it has surely opened, or left of where it surely holds. */
  readonly seconds: number;
  readonly side?: 'left' | 'right';
  readonly text: string;
  readonly isOwn?: boolean;
}

function BandName({ band, axes, seconds, text, side = 'right', isOwn = false }: BandNameProps): ReactElement | null {
  const edge = side === 'right' ? 'clearS' : 'meltS';
  const currentA = 'missing' in band ? null : currentAt(band, edge, seconds);
  if (currentA === null) return null;
  const x = Math.max(PLOT.left, xOf(axes, currentA)) + (side === 'right' ? 6 : -6);
  const isEnd = side === 'left' ? x > PLOT.left + 90 : x > PLOT.right - 90;
  return (
    <text
      x={side === 'right' && isEnd ? PLOT.right - 4 : Math.max(PLOT.left + 4, x)}
      y={yOf(axes, seconds) + 4}
      textAnchor={isEnd ? 'end' : 'start'}
      fontWeight={isOwn ? 700 : 400}
      fill={isOwn ? 'var(--copper)' : 'var(--ink)'}
    >
      {text}
    </text>
  );
}

function CableName({
  axes,
  k2s2,
  cable,
}: {
  readonly axes: Axes;
  readonly k2s2: number;
  readonly cable: string;
}): ReactElement | null {
  const [[fromX, fromY], [toX, toY]] = withstandLine(k2s2, axes) as [
    readonly [number, number],
    readonly [number, number],
  ];
  if (fromX >= PLOT.right) {
    return (
      <text x={PLOT.right - 4} y={PLOT.bottom - 8} textAnchor="end" fill="var(--fix)">
        {`${cable} stands more than all this`}
      </text>
    );
  }
  const endX = Math.min(toX, PLOT.right);
  const share = 0.55;
  const x = fromX + (endX - fromX) * share;
  const y = fromY + ((toY - fromY) * (x - fromX)) / (toX - fromX);
  const isLate = x > PLOT.right - 160;
  return (
    <text
      x={isLate ? x - 8 : x + 8}
      y={isLate ? y + 14 : y - 4}
      textAnchor={isLate ? 'end' : 'start'}
      fill="var(--fix)"
    >
      {`${cable} stands this`}
    </text>
  );
}

interface UpToProps {
  readonly axes: Axes;
  readonly currentA: number | null;
  readonly row: number;
  readonly text: string;
  readonly stroke: string;
  readonly dash: string;
}

/** A line across all times at one current, with its name in a row of its own above the plot. */
function UpTo({ axes, currentA, row, text, stroke, dash }: UpToProps): ReactElement | null {
  if (currentA === null || currentA <= 0) return null;
  const x = Math.max(PLOT.left, xOf(axes, currentA));
  const y = 12 + row * ROW;
  const isLate = x > WIDTH / 2;
  return (
    <g>
      <line x1={x} x2={x} y1={y + 4} y2={PLOT.bottom} stroke={stroke} strokeWidth="2" strokeDasharray={dash} />
      <text
        x={isLate ? x - 5 : x + 5}
        y={y + 4}
        fontSize="13"
        textAnchor={isLate ? 'end' : 'start'}
        fill={stroke}
        stroke="var(--sheet)"
        strokeWidth="4"
        style={{ paintOrder: 'stroke' }}
      >
        {`${text} ${amps(currentA)}`}
      </text>
    </g>
  );
}

function Surge({ x, y, text }: { readonly x: number; readonly y: number; readonly text: string }): ReactElement {
  const isLate = x > PLOT.right - 110;
  return (
    <>
      <path d={`M${String(x)} ${String(y - 6)}l6 6l-6 6l-6 -6Z`} fill="var(--volt)" strokeWidth="2" />
      <text x={isLate ? x - 10 : x + 10} y={y + 4} textAnchor={isLate ? 'end' : 'start'} fill="var(--volt)">
        {text}
      </text>
    </>
  );
}

function amps(value: number): string {
  return formatQuantity({ value, unit: 'A', digits: 3 });
}
