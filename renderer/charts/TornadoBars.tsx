/** What each assumed figure does to one string's current, the widest first; the middle line is the current at the figures' own values. */
import { styled } from '@mui/material/styles';
import type { ReactElement } from 'react';
import { Figure } from '../controls/Figure.tsx';

export interface TornadoRow {
  readonly key: string;
  /** `resistance of C`. */
  readonly name: string;
  readonly lowText: string;
  readonly highText: string;
  readonly origin: string;
  readonly lowA: number;
  readonly highA: number;
}

export interface TornadoBarsProps {
  readonly caption: string;
  readonly nominalA: number;
  readonly rows: readonly TornadoRow[];
}

export function TornadoBars({ caption, nominalA, rows }: TornadoBarsProps): ReactElement {
  const all = rows.flatMap(({ lowA, highA }) => [lowA, highA]);
  const fromA = Math.min(nominalA, ...all);
  const toA = Math.max(nominalA, ...all);
  const at = (amps: number): number => (toA === fromA ? 50 : ((amps - fromA) / (toA - fromA)) * 100);
  return (
    <Rows>
      <caption>{caption}</caption>
      <thead>
        <tr>
          <th scope="col" data-text>
            Figure
          </th>
          <th scope="col" data-text>
            Taken between
          </th>
          <th scope="col" data-bar>
            <span className="only-read">Bar</span>
          </th>
          <th scope="col">Current then</th>
        </tr>
      </thead>
      <tbody>
        {rows.map(({ key, name, lowText, highText, origin, lowA, highA }) => (
          <tr key={key}>
            <th scope="row" data-text>
              {name}
            </th>
            <td data-text>
              {lowText} – {highText} <span style={{ color: 'var(--soft)' }}>{origin}</span>
            </td>
            <td data-bar>
              <RangeBar from={at(lowA)} to={at(highA)} middle={at(nominalA)} />
            </td>
            <td>
              <Figure value={Math.min(lowA, highA)} unit="A" digits={3} prefix={false} /> –{' '}
              <Figure value={Math.max(lowA, highA)} unit="A" digits={3} prefix={false} />
            </td>
          </tr>
        ))}
      </tbody>
    </Rows>
  );
}

interface RangeBarProps {
  /** Each in per cent of the width. */
  readonly from: number;
  readonly to: number;
  readonly middle: number;
}

function RangeBar({ from, to, middle }: RangeBarProps): ReactElement {
  const percent = (value: number): string => `${String(value)}%`;
  return (
    <svg aria-hidden style={{ display: 'block', width: '100%', height: '1.25rem', overflow: 'visible' }}>
      <rect
        x={percent(Math.min(from, to))}
        width={percent(Math.abs(to - from))}
        y="25%"
        height="50%"
        fill="var(--hair)"
        stroke="var(--edge)"
      />
      <line x1={percent(middle)} x2={percent(middle)} y1="0" y2="100%" stroke="var(--copper)" strokeWidth="2" />
    </svg>
  );
}

const Rows = styled('table')({
  width: '100%',
  maxWidth: '56rem',
  borderCollapse: 'collapse',
  fontSize: '0.875rem',
  '& caption': { textAlign: 'start', fontWeight: 600, paddingBottom: '0.125rem' },
  '& th, & td': { fontWeight: 400, textAlign: 'end', padding: '0.125rem 0.5rem' },
  '& [data-text]': { textAlign: 'start' },
  '& tr > :first-child': { paddingInlineStart: 0 },
  '& [data-bar]': { width: '36%' },
  '& thead th': { color: 'var(--soft)', fontSize: '0.8125rem' },
  '& tbody tr': { borderTop: '1px solid var(--hair)' },
});
