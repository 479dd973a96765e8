/** A question of a field, with its answers as buttons; the first is at hand for Enter. */
import { styled } from '@mui/material/styles';
import { type ReactElement, type RefObject, useEffect, useRef } from 'react';
import type { FieldChoice, FieldReading } from '../../core/api.ts';

const Answers = styled('div')({ display: 'flex', flexWrap: 'wrap', gap: '0.25rem', paddingBlock: '0.25rem' });

/** Controls that belong together, without a box round them. */
export const Group = styled('fieldset')({ border: 0, margin: 0, padding: 0, minWidth: 0 });

/** A small button of text and edge. */
export const SmallButton = styled('button')({
  minHeight: '1.75rem',
  padding: '0.125rem 0.5rem',
  border: '1px solid var(--edge)',
  borderRadius: 3,
  background: 'var(--sheet)',
  color: 'var(--ink)',
  font: 'inherit',
  fontSize: '0.875rem',
  textAlign: 'start',
  cursor: 'pointer',
  '&:hover': { borderColor: 'var(--ink)' },
  '&[aria-pressed=true]': { backgroundColor: 'var(--lit)', borderColor: 'var(--copper)' },
  '&:disabled': { color: 'var(--soft)', borderStyle: 'dashed', cursor: 'default' },
  '@media (pointer: coarse)': { minHeight: 44, minWidth: 44 },
});

/** Text that can be pressed, for names of parts and junctions. */
export const LinkButton = styled('button')({
  minHeight: '1.5rem',
  padding: 0,
  border: 0,
  background: 'none',
  color: 'var(--copper)',
  font: 'inherit',
  textAlign: 'start',
  textDecoration: 'underline',
  textUnderlineOffset: '0.15em',
  overflowWrap: 'anywhere',
  cursor: 'pointer',
  '@media (pointer: coarse)': { minHeight: 44, minWidth: 44 },
});

export function AskRow({
  question: { question, choices },
  field,
  onChoose,
  onEscape,
}: {
  readonly question: Extract<FieldReading<never>, { reading: 'ask' }>;
  /** The field that asks. */
  readonly field: RefObject<HTMLElement | null>;
  readonly onChoose: (choice: FieldChoice) => void;
  readonly onEscape: () => void;
}): ReactElement {
  const first = useRef<HTMLButtonElement>(null);
  useEffect(() => {
    // Whoever left the field has gone elsewhere: the focus is not taken back.
    const { activeElement } = document;
    if (activeElement === document.body || activeElement === field.current) first.current?.focus();
  }, [field]);
  return (
    <Group
      aria-label={question}
      onKeyDown={(event) => {
        if (event.key !== 'Escape') return;
        event.stopPropagation();
        onEscape();
      }}
    >
      <span role="alert" style={{ color: 'var(--ink)' }}>
        {question}
      </span>
      <Answers>
        {choices.map((choice, index) => (
          <SmallButton
            key={choice.label}
            type="button"
            ref={index === 0 ? first : null}
            onClick={() => onChoose(choice)}
          >
            {choice.label}
          </SmallButton>
        ))}
      </Answers>
    </Group>
  );
}
