/** A figure of an answer: the number in even digits, its unit lighter. */
import type { ReactElement } from 'react';
import { figureText } from '../../core/api.ts';

export interface FigureProps {
  readonly value: number | null | undefined;
  /** As `formatQuantity` knows it: `V`, `A`, `W`, `ohm`, `degC`, `1` … */
  readonly unit: string;
  /** Most significant digits; 4 unless said otherwise. */
  readonly digits?: number;
  /** False keeps the unit as it is. */
  readonly prefix?: boolean;
  readonly tone?: 'volt' | 'copper';
  /** Stands where there is no value. */
  readonly absent?: string;
}

export function Figure({
  value,
  unit,
  digits = 4,
  prefix = true,
  tone,
  absent = 'not determined',
}: FigureProps): ReactElement {
  if (value === null || value === undefined) return <span style={{ color: 'var(--soft)' }}>{absent}</span>;
  const { number, sign } = figureText({ value, unit, digits, prefix });
  return (
    <span
      style={{
        fontVariantNumeric: 'tabular-nums',
        whiteSpace: 'nowrap',
        color: tone === undefined ? 'inherit' : `var(--${tone})`,
      }}
    >
      <span style={{ fontWeight: 600 }}>{number}</span>
      <span style={{ fontWeight: 300 }}>{sign}</span>
    </span>
  );
}
