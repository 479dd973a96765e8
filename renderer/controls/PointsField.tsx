/** An efficiency: one figure, or points of output and efficiency. */
import type { ReactElement } from 'react';
import { type Efficiency, pointsText, readPoints } from '../../core/api.ts';
import { type FieldProps, TypedField } from './TypedField.tsx';
import type { Taken } from './taken.ts';

export interface PointsFieldProps extends FieldProps {
  /** As the job file holds it. */
  readonly given: unknown;
  readonly onCommit: (value: Efficiency | undefined) => Taken;
}

export function PointsField({ given, onCommit, ...field }: PointsFieldProps): ReactElement {
  return (
    <TypedField
      hint="One figure, or points of output and efficiency such as 10 %: 85 %; 50 %: 94 %"
      {...field}
      shown={{ text: pointsText(given), sign: '', echo: '' }}
      sign="%"
      {...(Array.isArray(given) ? { rows: 3 } : {})}
      read={readPoints}
      onCommit={(reading) => onCommit(reading?.value)}
    />
  );
}
