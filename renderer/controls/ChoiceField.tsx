/** One of a few choices, each in plain words. */
import { type ReactElement, useId, useRef, useState } from 'react';
import { FieldBox, FieldRow } from './FieldRow.tsx';
import type { FieldProps } from './TypedField.tsx';
import type { Taken } from './taken.ts';
import { useFocusField } from './useFocusField.ts';

export interface ChoiceFieldProps extends FieldProps {
  readonly value: string | undefined;
  readonly of: readonly string[];
  readonly words?: (choice: string) => string;
  readonly onCommit: (value: string | undefined) => Taken;
}

export function ChoiceField(props: ChoiceFieldProps): ReactElement {
  const { value, of, words = (choice) => choice, onCommit, assumed, required = false, below } = props;
  const id = useId();
  const select = useRef<HTMLSelectElement>(null);
  useFocusField(props.focusKey, select);
  const [message, setMessage] = useState('');
  return (
    <FieldRow
      label={props.label}
      htmlFor={id}
      {...(props.hideLabel === undefined ? {} : { hideLabel: props.hideLabel })}
      {...(props.hint === undefined ? {} : { hint: props.hint })}
      mark={props.mark}
      control={
        <FieldBox>
          <select
            id={id}
            ref={select}
            value={value ?? ''}
            data-assumed={value === undefined ? '' : undefined}
            aria-describedby={message === '' ? undefined : `${id}-below`}
            onChange={(event) => {
              const chosen = event.target.value;
              setMessage(onCommit(chosen === '' ? undefined : chosen) ?? '');
            }}
          >
            {(!required || value === undefined) && <option value="">{assumed ?? 'Not given'}</option>}
            {of.map((choice) => (
              <option key={choice} value={choice}>
                {words(choice)}
              </option>
            ))}
          </select>
        </FieldBox>
      }
      below={
        (message !== '' || below !== undefined) && (
          <>
            {message !== '' && (
              <span id={`${id}-below`} role="alert" style={{ color: 'var(--stop)', fontWeight: 600 }}>
                {message}
              </span>
            )}
            {below}
          </>
        )
      }
    />
  );
}
