/**
 * A way to connect the bank, drawn from the person's own strings: the row of strings between its two bars, with the places where
 * loads and chargers are taken off; below it what each string then carries against its fair share.
 */
import type { ReactElement } from 'react';
import { formatQuantity, type Layout } from '../../core/api.ts';
import { type HatchNumber, hatchFill } from './Hatches.tsx';

export interface ThumbString {
  readonly id: string;
  readonly tag: string;
  readonly hatch: HatchNumber;
}

export interface LayoutThumbProps {
  readonly layout: Layout;
  /** In the order in which they lie. */
  readonly strings: readonly ThumbString[];
  /** Largest |deviation| of all layouts that are shown together: one scale for all. */
  readonly most: number;
}

const WIDTH = 216;
const BLOCK = { top: 34, bottom: 66 };
const BARS = { plus: 22, minus: 78 };
const CHART = { middle: 136, half: 26 };
const HEIGHT = 178;
const EDGE = 26;
/** Narrower strings have their tag under them, and only the worst has its figure. */
const ROOM_FOR_WORDS = 28;

export function LayoutThumb({ layout, strings, most }: LayoutThumbProps): ReactElement {
  const step = (WIDTH - 2 * EDGE) / strings.length;
  const x = (index: number): number => EDGE + (index + 0.5) * step;
  const width = Math.min(46, step * 0.66);
  const hasRoom = step >= ROOM_FOR_WORDS;
  return (
    <svg
      viewBox={`0 0 ${String(WIDTH)} ${String(HEIGHT)}`}
      width="100%"
      role="img"
      aria-label={spoken(layout, strings)}
    >
      <Links kind={layout.kind} xs={strings.map((_, index) => x(index))} />
      {strings.map(({ id, tag, hatch }, index) => (
        <g key={id}>
          <rect
            x={x(index) - width / 2}
            y={BLOCK.top}
            width={width}
            height={BLOCK.bottom - BLOCK.top}
            fill={hatchFill(hatch)}
            stroke="var(--ink)"
          />
          {hasRoom && <rect x={x(index) - width / 2 + 4} y={41} width={width - 8} height={18} fill="var(--sheet)" />}
          <text
            x={x(index)}
            y={hasRoom ? 54.5 : BLOCK.bottom + 10}
            textAnchor="middle"
            fontSize={hasRoom ? 13 : Math.min(12, step)}
            fontWeight="600"
            fill="var(--ink)"
          >
            {tag}
          </text>
        </g>
      ))}
      <Taps layout={layout} strings={strings} x={x} />
      <Deviations layout={layout} strings={strings} x={x} width={width} most={most} />
    </svg>
  );
}

interface LinksProps {
  readonly kind: Layout['kind'];
  readonly xs: readonly number[];
}

/** The bars: one line along the row where blocks are linked, leads of equal length to a point, a tree that halves, dashes as drawn. */
function Links({ kind, xs }: LinksProps): ReactElement {
  const first = xs[0] ?? 0;
  const last = xs.at(-1) ?? 0;
  const middle = (first + last) / 2;
  const stubs = xs.map(
    (x) =>
      `M${String(x)} ${String(BLOCK.top)}V${String(BARS.plus)}M${String(x)} ${String(BLOCK.bottom)}V${String(BARS.minus)}`,
  );
  const line = { fill: 'none', stroke: 'var(--copper)', strokeWidth: 2 } as const;
  if (kind === 'equal-leads') {
    const leads = xs.map(
      (x) =>
        `M${String(x)} ${String(BLOCK.top)}L${String(middle)} 10M${String(x)} ${String(BLOCK.bottom)}L${String(middle)} 90`,
    );
    return <path d={leads.join('')} {...line} />;
  }
  if (kind === 'halving-tree') return <path d={`${tree(xs, BLOCK.top, 10)}${tree(xs, BLOCK.bottom, 90)}`} {...line} />;
  const bars = `M${String(first)} ${String(BARS.plus)}H${String(last)}M${String(first)} ${String(BARS.minus)}H${String(last)}`;
  return (
    <>
      <path d={stubs.join('')} {...line} />
      <path d={bars} {...line} {...(kind === 'as-drawn' ? { strokeDasharray: '4 3' } : {})} />
    </>
  );
}

/** Pairs join halfway, and pairs of pairs again, up to one point. */
/** Where a tree that halves ends: pairs join halfway, an odd one out goes on as it is. */
function rootOf(xs: readonly number[]): number {
  let level = xs;
  while (level.length > 1) {
    const next: number[] = [];
    for (let index = 0; index < level.length; index += 2) {
      const a = level[index]!;
      next.push((a + (level[index + 1] ?? a)) / 2);
    }
    level = next;
  }
  return level[0] ?? 0;
}

function tree(xs: readonly number[], from: number, to: number): string {
  let path = '';
  let level = xs;
  const rounds = Math.max(1, Math.ceil(Math.log2(Math.max(2, xs.length))));
  let y = from;
  const step = (to - from) / rounds;
  while (level.length > 1) {
    const next: number[] = [];
    for (let index = 0; index < level.length; index += 2) {
      const a = level[index]!;
      const b = level[index + 1];
      const up = y + step * 0.7;
      if (b === undefined) {
        path += `M${String(a)} ${String(y)}V${String(y + step)}`;
        next.push(a);
        continue;
      }
      path += `M${String(a)} ${String(y)}V${String(up)}H${String(b)}V${String(y)}M${String((a + b) / 2)} ${String(up)}V${String(y + step)}`;
      next.push((a + b) / 2);
    }
    level = next;
    y += step;
  }
  return path;
}

interface TapsProps {
  readonly layout: Layout;
  readonly strings: readonly ThumbString[];
  readonly x: (index: number) => number;
}

function Taps({ layout, strings, x }: TapsProps): ReactElement {
  const { kind, plusAt, minusAt, chargePlusAt, chargeMinusAt } = layout;
  const xs = strings.map((_, index) => x(index));
  const middle = kind === 'halving-tree' ? rootOf(xs) : (x(0) + x(strings.length - 1)) / 2;
  const at = (id: string | null): number | null => {
    const index = strings.findIndex((one) => one.id === id);
    return index < 0 ? null : x(index);
  };
  const isBar = kind === 'equal-leads' || kind === 'halving-tree';
  const plusX = isBar ? middle : at(plusAt);
  const minusX = isBar ? middle : at(minusAt);
  const ends = { plus: isBar ? 10 : BARS.plus, minus: isBar ? 90 : BARS.minus };
  const chargePlusX = at(chargePlusAt);
  const chargeMinusX = at(chargeMinusAt);
  return (
    <g>
      {plusX !== null && <Tap x={plusX} y={ends.plus} sign="+" />}
      {minusX !== null && <Tap x={minusX} y={ends.minus} sign="−" />}
      {chargePlusX !== null && <ChargeTap x={chargePlusX} y={ends.plus} up />}
      {chargeMinusX !== null && <ChargeTap x={chargeMinusX} y={ends.minus} up={false} />}
    </g>
  );
}

/** Where loads are taken off: a filled disc with its sign. */
function Tap({ x, y, sign }: { readonly x: number; readonly y: number; readonly sign: string }): ReactElement {
  return (
    <g>
      <circle cx={x} cy={y} r="8" fill="var(--copper)" stroke="var(--sheet)" />
      <text x={x} y={y + 4.5} textAnchor="middle" fontSize="13" fontWeight="600" fill="var(--onCopper)">
        {sign}
      </text>
    </g>
  );
}

/** Where chargers come in, if that is elsewhere: an open arrow towards the bar. */
function ChargeTap({ x, y, up }: { readonly x: number; readonly y: number; readonly up: boolean }): ReactElement {
  const from = up ? y - 16 : y + 16;
  const head = up
    ? `M${String(x - 4)} ${String(y - 7)}L${String(x)} ${String(y - 1)}L${String(x + 4)} ${String(y - 7)}`
    : `M${String(x - 4)} ${String(y + 7)}L${String(x)} ${String(y + 1)}L${String(x + 4)} ${String(y + 7)}`;
  return (
    <path d={`M${String(x)} ${String(from)}V${String(y)}${head}`} fill="none" stroke="var(--volt)" strokeWidth="2" />
  );
}

interface DeviationsProps extends TapsProps {
  readonly width: number;
  readonly most: number;
}

/** Bars up where a string carries more than its fair share, down where less; the line is the fair share. */
function Deviations({ layout, strings, x, width, most }: DeviationsProps): ReactElement {
  const { middle, half } = CHART;
  const hasRoom = (WIDTH - 2 * EDGE) / strings.length >= ROOM_FOR_WORDS;
  return (
    <g>
      {strings.map(({ id, hatch }, index) => {
        const deviation = layout.strings.find((one) => one.id === id)?.deviation ?? 0;
        const height = most === 0 ? 0 : (Math.abs(deviation) / most) * half;
        const percent = Math.round(deviation * 100);
        const above = deviation >= 0;
        return (
          <g key={id}>
            <rect
              x={x(index) - width / 2}
              y={above ? middle - height : middle}
              width={width}
              height={height}
              fill={hatchFill(hatch)}
              stroke="var(--ink)"
            />
            {(hasRoom || id === layout.worst) && (
              <text
                x={x(index)}
                y={above ? middle - height - 4 : middle + height + 13}
                textAnchor="middle"
                fontSize="12"
                fontWeight={id === layout.worst ? 600 : 400}
                fill="var(--ink)"
              >
                {`${percent > 0 ? '+' : percent < 0 ? '−' : ''}${String(Math.abs(percent))}`}
              </text>
            )}
          </g>
        );
      })}
      <line x1="8" x2={WIDTH - 8} y1={middle} y2={middle} stroke="var(--copper)" strokeWidth="2" />
      <text x={WIDTH - 6} y={middle - 4} textAnchor="end" fontSize="12" fill="var(--soft)">
        %
      </text>
    </g>
  );
}

function spoken({ name, strings: shares }: Layout, strings: readonly ThumbString[]): string {
  const told = shares.map(({ id, currentA, deviation }) => {
    const tag = strings.find((one) => one.id === id)?.tag ?? id;
    return `${tag} ${formatQuantity({ value: currentA, unit: 'A', digits: 3 })}, ${String(Math.round(deviation * 100))} % off its fair share`;
  });
  return `${name}: ${told.join('; ')}.`;
}
