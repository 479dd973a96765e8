/** Twelve figures, January first. They go into the job together, once all are there; a row of twelve may be pasted into any of them. */
import { styled } from '@mui/material/styles';
import { type ReactElement, useState } from 'react';
import { readField, shownField, type UnitName } from '../../core/api.ts';
import { usePreferences } from '../state/preferences.ts';
import { TypedField } from './TypedField.tsx';
import type { Taken } from './taken.ts';

export const MONTHS = [
  'January',
  'February',
  'March',
  'April',
  'May',
  'June',
  'July',
  'August',
  'September',
  'October',
  'November',
  'December',
] as const;

type Kept = number | string;

export interface MonthsFieldProps {
  readonly label: string;
  readonly unit: UnitName;
  readonly given: readonly Kept[] | undefined;
  /** As another screen names the whole: `site.irradiationKWhPerM2Day`. */
  readonly focusKey?: string;
  readonly onCommit: (numbers: readonly Kept[] | undefined) => Taken;
}

const Grid = styled('div')({
  display: 'grid',
  gridTemplateColumns: 'repeat(auto-fill, minmax(5.5rem, 1fr))',
  columnGap: '0.5rem',
  rowGap: '0.25rem',
});

export function MonthsField({ label, unit, given, focusKey, onCommit }: MonthsFieldProps): ReactElement {
  const first = usePreferences((preferences) => preferences.units);
  const [begun, setBegun] = useState<readonly (Kept | undefined)[] | null>(null);
  const figures = begun ?? given ?? [];

  const keep = (next: readonly (Kept | undefined)[]): Taken => {
    const all = next.filter((figure) => figure !== undefined);
    if (all.length > 0 && all.length < MONTHS.length) {
      setBegun(next);
      return null;
    }
    const trouble = onCommit(all.length === 0 ? undefined : all);
    if (trouble === null) setBegun(null);
    return trouble;
  };
  const change = (month: number, figure: Kept | undefined): Taken =>
    keep(MONTHS.map((_, index) => (index === month ? figure : figures[index])));
  const paste = (text: string): boolean => {
    const pieces = text.trim().split(/[\s;]+/);
    const numbers = pieces.map(Number);
    return pieces.length === MONTHS.length && numbers.every(Number.isFinite) && keep(numbers) === null;
  };
  const missing = begun === null ? 0 : MONTHS.length - begun.filter((figure) => figure !== undefined).length;
  return (
    <fieldset style={{ border: 0, margin: 0, padding: 0, minWidth: 0 }}>
      <legend style={{ padding: 0, color: 'var(--soft)', fontSize: '0.875rem' }}>{label}</legend>
      <Grid>
        {MONTHS.map((month, index) => (
          <div key={month}>
            <span aria-hidden style={{ color: 'var(--soft)', fontSize: '0.8125rem' }}>
              {month.slice(0, 3)}
            </span>
            <TypedField
              label={`${month}, ${label}`}
              hideLabel
              {...(index === 0 && focusKey !== undefined ? { focusKey } : {})}
              shown={{ ...shownField({ given: figures[index], unit, first }), sign: '' }}
              read={(text) => readField({ text, unit, first })}
              onPaste={paste}
              onCommit={(reading) => change(index, reading?.store)}
            />
          </div>
        ))}
      </Grid>
      {missing > 0 && (
        <output style={{ display: 'block', margin: '0.25rem 0 0', color: 'var(--soft)', fontSize: '0.8125rem' }}>
          {`${String(missing)} ${missing === 1 ? 'month is' : 'months are'} still to come; the twelve go into the job together.`}
        </output>
      )}
    </fieldset>
  );
}
