/** A figure with its unit, typed as people write it; what was typed stays, the other unit stands in grey. */
import type { ReactElement } from 'react';
import { type FieldUnit, fieldUnit, readField, shownField, type UnitName } from '../../core/api.ts';
import { usePreferences } from '../state/preferences.ts';
import { type FieldProps, TypedField } from './TypedField.tsx';
import type { Taken } from './taken.ts';

export interface QuantityFieldProps extends FieldProps {
  /** The unit that the job file keeps it in. */
  readonly unit: UnitName;
  /** What a number without a unit means here, where it is not the usual unit of the kind. */
  readonly bare?: FieldUnit;
  /** As the job file holds it: a number, or the text that was typed. */
  readonly given: number | string | undefined;
  /** What the job file shall hold, and its value in `unit`; both undefined where the field was emptied. */
  readonly onCommit: (store: number | string | undefined, value: number | undefined) => Taken;
}

export function QuantityField({ unit, bare, given, onCommit, ...field }: QuantityFieldProps): ReactElement {
  const first = usePreferences((preferences) => preferences.units);
  const beside = bare ?? fieldUnit(unit, first);
  const kind = { unit, first, ...(beside === undefined ? {} : { bare: beside }) };
  return (
    <TypedField
      {...field}
      shown={shownField({ ...kind, given })}
      sign={beside?.sign ?? ''}
      read={(text) => readField({ ...kind, text })}
      onCommit={(reading) => onCommit(reading?.store, reading?.value)}
    />
  );
}
