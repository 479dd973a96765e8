/**
 * A field that a person types into. What was typed is kept whatever becomes of it: it is committed by Enter or by leaving the field,
 * asked about where it means two things, or answered with a sentence where it cannot be. Escape brings back what stood there.
 */
import { type KeyboardEvent, type ReactElement, type ReactNode, useEffect, useId, useRef, useState } from 'react';
import { type FieldReading, isBareNumber, type ShownField, type Way } from '../../core/api.ts';
import { AskRow } from './AskRow.tsx';
import { FieldBox, FieldRow, Sign } from './FieldRow.tsx';
import type { Taken } from './taken.ts';
import { useFocusField } from './useFocusField.ts';

/** What every field that is typed into is given. */
export interface FieldProps {
  readonly label: string;
  /** The name is only read out, as in a table whose head says it. */
  readonly hideLabel?: boolean;
  readonly hint?: string;
  /** Stands in grey where nothing is given: the figure that is assumed. */
  readonly assumed?: string;
  /** Cannot be left empty. */
  readonly required?: boolean;
  /** As another screen names it: `F3.ratingV`, `site.ambientMinDegC`. */
  readonly focusKey?: string;
  /** Where the figure comes from. */
  readonly mark?: ReactNode;
  /** Said under the field, such as what a case sets. */
  readonly below?: ReactNode;
}

export interface TypedFieldProps<Value> extends FieldProps {
  readonly shown: ShownField;
  /** Stands beside a number without a unit while it is typed. */
  readonly sign?: string;
  readonly read: (text: string, way?: Way) => FieldReading<Value>;
  /** Without a reading where the field was emptied. */
  readonly onCommit: (reading: Extract<FieldReading<Value>, { reading: 'value' }> | undefined) => Taken;
  /** A button at the end of the field. */
  readonly after?: ReactNode;
  readonly rows?: number;
  readonly onPaste?: (text: string) => boolean;
}

type Question = Extract<FieldReading<never>, { reading: 'ask' }>;

export function TypedField<Value>(props: TypedFieldProps<Value>): ReactElement {
  const { shown, sign = '', label, after, below, rows } = props;
  const id = useId();
  const wrap = useRef<HTMLDivElement>(null);
  const input = useRef<HTMLInputElement & HTMLTextAreaElement>(null);
  useFocusField(props.focusKey, input);
  const typing = useTyping(props, input);
  const { text, message, question, note } = typing;
  useLeaving(wrap, typing.commit);
  const standing = text ?? shown.text;
  const beside = text === null ? shown.sign : isBareNumber(standing) ? sign : '';
  const echo = text === null ? shown.echo : '';
  const line = [echo, note].filter((words) => words !== '').join(' · ');
  const common = {
    id,
    ref: input,
    value: standing,
    placeholder: props.assumed ?? '',
    autoComplete: 'off',
    spellCheck: false,
    'aria-invalid': message !== '',
    'aria-describedby': message === '' && line === '' ? undefined : `${id}-below`,
    'aria-required': props.required === true ? true : undefined,
    onChange: (event: { readonly target: { readonly value: string } }) => typing.type(event.target.value),
    onKeyDown: typing.key,
    onFocus: () => input.current?.select(),
  };
  return (
    <div ref={wrap}>
      <FieldRow
        label={label}
        htmlFor={id}
        {...(props.hideLabel === undefined ? {} : { hideLabel: props.hideLabel })}
        {...(props.hint === undefined ? {} : { hint: props.hint })}
        mark={props.mark}
        control={
          <FieldBox data-wrong={message === '' ? undefined : ''}>
            {rows === undefined ? (
              <input
                {...common}
                type="text"
                onPaste={(event) => {
                  if (props.onPaste?.(event.clipboardData.getData('text')) === true) event.preventDefault();
                }}
              />
            ) : (
              <textarea {...common} rows={rows} />
            )}
            {beside !== '' && <Sign>{beside}</Sign>}
            {after}
          </FieldBox>
        }
        below={
          (line !== '' || message !== '' || question !== null || below !== undefined) && (
            <>
              <div id={`${id}-below`}>
                {line !== '' && <span>{line}</span>}
                {message !== '' && (
                  <span role="alert" style={{ display: 'block', color: 'var(--stop)', fontWeight: 600 }}>
                    {message}
                  </span>
                )}
              </div>
              {question !== null && (
                <AskRow
                  key={question.question}
                  question={question}
                  field={input}
                  onChoose={(choice) => {
                    input.current?.focus();
                    typing.settle(props.read(choice.text, choice.way));
                  }}
                  onEscape={typing.restore}
                />
              )}
              {below}
            </>
          )
        }
      />
    </div>
  );
}

/** Calls back when the focus leaves the field with all that belongs to it, its buttons too. */
function useLeaving(wrap: { readonly current: HTMLElement | null }, leave: () => void): void {
  const latest = useRef(leave);
  useEffect(() => {
    latest.current = leave;
  });
  useEffect(() => {
    const { current } = wrap;
    const out = (event: FocusEvent): void => {
      const to = event.relatedTarget;
      if (!(to instanceof Node && current?.contains(to) === true)) latest.current();
    };
    current?.addEventListener('focusout', out);
    return () => current?.removeEventListener('focusout', out);
  }, [wrap]);
}

/** What is being typed: `text` is null where the field shows what the job holds. */
function useTyping<Value>(
  props: TypedFieldProps<Value>,
  input: { readonly current: (HTMLInputElement & HTMLTextAreaElement) | null },
) {
  const { text: stands } = props.shown;
  const [typed, setTyped] = useState<{ readonly text: string; readonly over: string } | null>(null);
  const [trouble, setTrouble] = useState('');
  const [asked, setAsked] = useState<Question | null>(null);
  const [note, setNote] = useState('');

  // Picked from a list, undone, shown in other units: what was being typed over the old figure is overtaken.
  const text = typed?.over === stands ? typed.text : null;
  const message = text === null ? '' : trouble;
  const question = text === null ? null : asked;

  const clear = (): void => {
    setTyped(null);
    setTrouble('');
    setAsked(null);
  };
  const restore = (): void => {
    clear();
    input.current?.focus();
  };
  const settle = (reading: FieldReading<Value>): void => {
    setAsked(null);
    if (reading.reading === 'ask') {
      setAsked(reading);
      return;
    }
    const why = troubleOf(reading, props);
    setTrouble(why ?? '');
    if (why !== null) return;
    setNote(reading.reading === 'value' ? (reading.note ?? '') : '');
    clear();
  };
  const commit = (): void => {
    if (text === null || question !== null || message !== '') return;
    if (text.trim() === props.shown.text.trim()) clear();
    else settle(props.read(text));
  };
  const type = (text: string): void => {
    setTyped({ text, over: stands });
    setTrouble('');
    setAsked(null);
    setNote('');
  };
  const key = (event: KeyboardEvent): void => {
    if (event.key === 'Enter' && (props.rows === undefined || event.ctrlKey)) {
      event.preventDefault();
      commit();
    } else if (event.key === 'Escape' && text !== null) {
      event.stopPropagation();
      restore();
    }
  };
  return { text, message, question, note, type, key, commit, settle, restore };
}

function troubleOf<Value>(
  reading: Exclude<FieldReading<Value>, { reading: 'ask' }>,
  props: TypedFieldProps<Value>,
): Taken {
  if (reading.reading === 'trouble') return reading.message;
  if (reading.reading === 'value') return props.onCommit(reading);
  return props.required === true ? 'This cannot be left empty.' : props.onCommit(undefined);
}
