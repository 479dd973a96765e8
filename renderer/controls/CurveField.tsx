/** The curve of a fuse or breaker: points of current, melting time and clearing time. */
import type { ReactElement } from 'react';
import { type Curve, curveText, readCurve } from '../../core/api.ts';
import { type FieldProps, TypedField } from './TypedField.tsx';
import type { Taken } from './taken.ts';

export interface CurveFieldProps extends FieldProps {
  /** As the job file holds it. */
  readonly given: unknown;
  readonly onCommit: (value: Curve | undefined) => Taken;
}

export function CurveField({ given, onCommit, ...field }: CurveFieldProps): ReactElement {
  return (
    <TypedField
      {...field}
      shown={{ text: curveText(given), sign: '', echo: '' }}
      sign="A: s: s"
      {...(Array.isArray(given) ? { rows: 3 } : {})}
      read={readCurve}
      onCommit={(reading) => onCommit(reading?.value)}
    />
  );
}
