/** Words: a label, a note, a name. */
import type { ReactElement } from 'react';
import { type FieldProps, TypedField } from './TypedField.tsx';
import type { Taken } from './taken.ts';

export interface TextFieldProps extends FieldProps {
  readonly value: string | undefined;
  /** More than one line. */
  readonly rows?: number;
  readonly onCommit: (value: string | undefined) => Taken;
}

export function TextField({ value, onCommit, ...field }: TextFieldProps): ReactElement {
  return (
    <TypedField<string>
      {...field}
      shown={{ text: value ?? '', sign: '', echo: '' }}
      read={(text) =>
        text.trim() === ''
          ? { reading: 'empty' }
          : { reading: 'value', value: text.trim(), store: text.trim(), echo: '' }
      }
      onCommit={(reading) => onCommit(reading?.value)}
    />
  );
}
