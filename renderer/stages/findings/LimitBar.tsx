/** Measured against limit: one bar from nought, the limit as a line across it, both figures in words beside. */
import Box from '@mui/material/Box';
import type { ReactElement } from 'react';
import type { Finding } from '../../../core/api.ts';
import { formatQuantity } from '../../../core/api.ts';

/** Units that begin at nought; of a temperature a bar would say nothing. */
const FROM_NOUGHT: ReadonlySet<string> = new Set([
  'A',
  'V',
  'W',
  'ohm',
  '1',
  'm',
  'Ah',
  'Wh',
  's',
  'A2s',
  'mm2',
  'cm2',
  'm3/h',
  'h',
]);
/** The longer of the two takes this part of the width, so that one sees that nothing is cut off. */
const LONGEST = 0.92;

export interface BarShares {
  readonly measured: number;
  readonly limit: number;
}

/** Lengths of bar and limit as shares of the width; null where a bar from nought would not be honest. */
export function barShares({ measured, limit }: Pick<Finding, 'measured' | 'limit'>): BarShares | null {
  if (measured.unit !== limit.unit || !FROM_NOUGHT.has(limit.unit)) return null;
  const [value, most] = [measured.value, limit.value];
  const longest = Math.max(value, most);
  if (!Number.isFinite(longest) || value < 0 || most < 0 || longest === 0) return null;
  return { measured: (value / longest) * LONGEST, limit: (most / longest) * LONGEST };
}

export function LimitBar({ finding }: { readonly finding: Finding }): ReactElement {
  const shares = barShares(finding);
  const { severity } = finding;
  return (
    <Box sx={{ display: 'grid', gap: '0.125rem' }}>
      <Box sx={{ fontVariantNumeric: 'tabular-nums' }}>
        Measured <strong>{formatQuantity(finding.measured)}</strong> · limit{' '}
        <strong>{formatQuantity(finding.limit)}</strong>
      </Box>
      {shares !== null && <MeasuredBar {...shares} fill={`var(--${severity})`} />}
    </Box>
  );
}

/** A bar from nought with its limit as a line across it, both as shares of the width. */
export function MeasuredBar({ measured, limit, fill }: BarShares & { readonly fill: string }): ReactElement {
  return (
    <svg width="100%" height="14" aria-hidden="true" focusable="false">
      <line x1="0" y1="7" x2="100%" y2="7" stroke="var(--hair)" strokeWidth="1" />
      <rect x="0" y="3" width={percent(measured)} height="8" fill={fill} />
      <line x1={percent(limit)} y1="0" x2={percent(limit)} y2="14" stroke="var(--ground)" strokeWidth="6" />
      <line x1={percent(limit)} y1="0" x2={percent(limit)} y2="14" stroke="var(--ink)" strokeWidth="2" />
    </svg>
  );
}

function percent(share: number): string {
  return `${(share * 100).toFixed(2)}%`;
}
