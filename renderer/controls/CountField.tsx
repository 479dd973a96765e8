/** A whole number. */
import type { ReactElement } from 'react';
import { readCount } from '../../core/api.ts';
import { type FieldProps, TypedField } from './TypedField.tsx';
import type { Taken } from './taken.ts';

export interface CountFieldProps extends FieldProps {
  readonly value: number | undefined;
  readonly onCommit: (value: number | undefined) => Taken;
}

export function CountField({ value, onCommit, ...field }: CountFieldProps): ReactElement {
  return (
    <TypedField
      {...field}
      shown={{ text: value === undefined ? '' : String(value), sign: '', echo: '' }}
      read={readCount}
      onCommit={(reading) => onCommit(reading?.value)}
    />
  );
}
