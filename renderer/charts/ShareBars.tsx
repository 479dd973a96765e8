/**
 * What each string of a bank carries, as bars from nought on one scale with the fair share as a line across them. The table around
 * the bars says the same in figures.
 */
import { styled } from '@mui/material/styles';
import type { ReactElement, ReactNode } from 'react';
import { Figure } from '../controls/Figure.tsx';
import { type HatchNumber, hatchFill, StringKey } from './Hatches.tsx';

export interface ShareBar {
  readonly id: string;
  readonly tag: string;
  readonly name: string;
  readonly hatch: HatchNumber;
  readonly currentA: number | null;
  /** What it would carry at its fair share. */
  readonly fairA: number | null;
  readonly deviation: number | null;
  /** 5th and 95th percentile, where the band is known. */
  readonly band: { readonly lowA: number; readonly highA: number } | null;
  /** The one furthest off. */
  readonly isWorst: boolean;
  /** Further columns, in the order of `heads`. */
  readonly more: readonly ReactNode[];
  /** Said under the row. */
  readonly remark: ReactNode;
}

/** Amps at the left and right edge of the bars; nought always lies between. */
export interface BarScale {
  readonly fromA: number;
  readonly toA: number;
}

/** One scale for several sets of bars that are to be compared. */
export function barScale(bars: readonly Pick<ShareBar, 'currentA' | 'fairA' | 'band'>[]): BarScale {
  const all = bars.flatMap(({ currentA, fairA, band }) => [currentA, fairA, band?.lowA, band?.highA]);
  const given = all.filter((value) => value !== null && value !== undefined);
  const fromA = Math.min(0, ...given);
  const toA = Math.max(0, ...given);
  return fromA === toA ? { fromA: 0, toA: 1 } : { fromA, toA };
}

export interface ShareBarsProps {
  readonly caption: string;
  readonly bars: readonly ShareBar[];
  readonly scale: BarScale;
  /** Names of the further columns. */
  readonly heads: readonly string[];
}

export function ShareBars({ caption, bars, scale, heads }: ShareBarsProps): ReactElement {
  return (
    <Bars>
      <caption className="only-read">{caption}</caption>
      <thead>
        <tr>
          <th scope="col">String</th>
          <th scope="col" data-bar>
            <BarKeys bars={bars} />
          </th>
          <th scope="col">Current</th>
          <th scope="col">Off fair</th>
          {heads.map((head) => (
            <th scope="col" key={head}>
              {head}
            </th>
          ))}
        </tr>
      </thead>
      {bars.map((bar) => (
        <BarRows key={bar.id} bar={bar} scale={scale} columns={heads.length + 3} />
      ))}
    </Bars>
  );
}

/** What the marks on the bars are. */
function BarKeys({ bars }: { readonly bars: readonly ShareBar[] }): ReactElement {
  return (
    <span style={{ display: 'inline-flex', flexWrap: 'wrap', gap: '0 1rem' }}>
      <span className="only-read">Bar</span>
      {bars.some(({ fairA }) => fairA !== null) && <FairKey />}
      {bars.some(({ band }) => band !== null) && <BandKey />}
    </span>
  );
}

function BandKey(): ReactElement {
  return (
    <span style={KEY} title="Nine of ten draws of the assumed figures lie between its ends">
      <svg viewBox="0 0 24 16" aria-hidden style={{ width: '1.5em', height: '1em' }}>
        <path d="M1 8H23M1 4V12M23 4V12" fill="none" stroke="var(--volt)" strokeWidth="2" />
      </svg>
      9 of 10 draws
    </span>
  );
}

const KEY = { display: 'inline-flex', alignItems: 'center', gap: '0.375rem' } as const;

function FairKey(): ReactElement {
  return (
    <span style={KEY}>
      <svg viewBox="0 0 6 16" aria-hidden style={{ width: '0.375em', height: '1em' }}>
        <line x1="3" x2="3" y1="0" y2="16" stroke="var(--copper)" strokeWidth="3" />
      </svg>
      fair share
    </span>
  );
}

function BarRows({
  bar,
  scale,
  columns,
}: {
  readonly bar: ShareBar;
  readonly scale: BarScale;
  readonly columns: number;
}): ReactElement {
  return (
    <tbody>
      <tr data-worst={bar.isWorst ? '' : undefined}>
        <th scope="row" title={bar.name}>
          <StringKey tag={bar.tag} hatch={bar.hatch} />
        </th>
        <td data-bar>
          <Bar bar={bar} scale={scale} />
        </td>
        <td>
          <Figure value={bar.currentA} unit="A" digits={3} absent="–" />
        </td>
        <td>{bar.deviation === null ? <Quiet>–</Quiet> : <Off deviation={bar.deviation} />}</td>
        {bar.more.map((cell, column) => (
          // biome-ignore lint/suspicious/noArrayIndexKey: a column is known by its place
          <td key={column}>{cell}</td>
        ))}
      </tr>
      {bar.remark !== null && (
        <tr data-remark>
          <td colSpan={columns + 1}>{bar.remark}</td>
        </tr>
      )}
    </tbody>
  );
}

/** `+109 %`, with its sign always. */
export function Off({ deviation }: { readonly deviation: number }): ReactElement {
  const percent = Math.round(deviation * 100);
  const sign = percent > 0 ? '+' : percent < 0 ? '−' : '';
  return (
    <span style={{ fontVariantNumeric: 'tabular-nums', whiteSpace: 'nowrap' }}>
      {sign}
      {String(Math.abs(percent))}
      <span style={{ fontWeight: 300 }}>{'\u00a0'}%</span>
    </span>
  );
}

const Quiet = styled('span')({ color: 'var(--soft)' });

function Bar({ bar, scale }: { readonly bar: ShareBar; readonly scale: BarScale }): ReactElement {
  const at = (amps: number): number => ((amps - scale.fromA) / (scale.toA - scale.fromA)) * 100;
  const percent = (amps: number): string => `${String(at(amps))}%`;
  const { currentA, fairA, band } = bar;
  return (
    <svg aria-hidden style={{ display: 'block', width: '100%', height: '1.5rem', overflow: 'visible' }}>
      {currentA !== null && (
        <rect
          x={percent(Math.min(0, currentA))}
          y="15%"
          width={`${String(Math.abs(at(currentA) - at(0)))}%`}
          height="70%"
          fill={hatchFill(bar.hatch)}
          stroke="var(--ink)"
          strokeWidth={bar.isWorst ? 2 : 1}
        />
      )}
      {band !== null && (
        <g stroke="var(--volt)" strokeWidth="2">
          <line
            x1={percent(band.lowA)}
            x2={percent(band.highA)}
            y1="50%"
            y2="50%"
            strokeWidth="4"
            stroke="var(--sheet)"
          />
          <line x1={percent(band.lowA)} x2={percent(band.highA)} y1="50%" y2="50%" />
          <line x1={percent(band.lowA)} x2={percent(band.lowA)} y1="30%" y2="70%" />
          <line x1={percent(band.highA)} x2={percent(band.highA)} y1="30%" y2="70%" />
        </g>
      )}
      <line x1={percent(0)} x2={percent(0)} y1="0" y2="100%" stroke="var(--edge)" />
      {fairA !== null && (
        <line x1={percent(fairA)} x2={percent(fairA)} y1="0" y2="100%" stroke="var(--copper)" strokeWidth="3" />
      )}
    </svg>
  );
}

const Bars = styled('table')({
  width: '100%',
  tableLayout: 'fixed',
  borderCollapse: 'collapse',
  fontSize: '0.9375rem',
  '& th, & td': { textAlign: 'end', padding: '0 0.375rem', verticalAlign: 'middle', fontWeight: 400 },
  '& th:first-child': { textAlign: 'start', paddingInlineStart: 0 },
  '& thead th': { width: '4.5rem' },
  '& thead th:first-child': { width: '5rem' },
  '& th[data-bar], & td[data-bar]': { width: 'auto', textAlign: 'start' },
  '& thead th, & thead th[data-bar]': { color: 'var(--soft)', fontSize: '0.8125rem' },
  '& tbody': { borderTop: '1px solid var(--hair)' },
  '& [data-worst] td': { fontWeight: 600 },
  '& [data-remark] td': {
    textAlign: 'start',
    paddingInlineStart: '5.375rem',
    fontSize: '0.8125rem',
    color: 'var(--soft)',
    paddingBottom: '0.125rem',
    lineHeight: 1.35,
  },
});
