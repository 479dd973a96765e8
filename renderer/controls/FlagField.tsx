/** Yes or no; or nothing said, where the job's own default holds. */
import type { ReactElement } from 'react';
import { ChoiceField } from './ChoiceField.tsx';
import type { FieldProps } from './TypedField.tsx';
import type { Taken } from './taken.ts';

export interface FlagFieldProps extends FieldProps {
  readonly value: boolean | undefined;
  readonly yes?: string;
  readonly no?: string;
  readonly onCommit: (value: boolean | undefined) => Taken;
}

export function FlagField({ value, yes = 'Yes', no = 'No', onCommit, ...field }: FlagFieldProps): ReactElement {
  return (
    <ChoiceField
      {...field}
      value={value === undefined ? undefined : value ? 'yes' : 'no'}
      of={['yes', 'no']}
      words={(choice) => (choice === 'yes' ? yes : no)}
      onCommit={(choice) => onCommit(choice === undefined ? undefined : choice === 'yes')}
    />
  );
}
