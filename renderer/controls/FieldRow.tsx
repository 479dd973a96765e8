/** One line of a form: name, control, mark of origin; under it in small type what goes with the figure. */
import { styled } from '@mui/material/styles';
import type { ReactElement, ReactNode } from 'react';

export interface FieldRowProps {
  readonly label: string;
  readonly htmlFor: string;
  readonly hideLabel?: boolean;
  readonly hint?: string;
  readonly control: ReactNode;
  /** Where the figure comes from. */
  readonly mark?: ReactNode;
  readonly below?: ReactNode;
}

/** Narrow places put the name above the field; the width that counts is the container's, so that large text does so too. */
const Row = styled('div')({
  display: 'grid',
  gridTemplateColumns: 'minmax(5.5rem, 7.25rem) minmax(6.5rem, 1fr) auto',
  columnGap: '0.5rem',
  alignItems: 'start',
  paddingBlock: '0.125rem',
  '&[data-bare]': { gridTemplateColumns: 'minmax(0, 1fr) auto' },
  '@container (max-width: 18rem)': { gridTemplateColumns: 'minmax(0, 1fr) auto' },
});

const Name = styled('label')({
  gridRow: '1 / span 2',
  paddingTop: '0.3rem',
  fontSize: '0.875rem',
  lineHeight: 1.3,
  color: 'var(--soft)',
  overflowWrap: 'anywhere',
  '@container (max-width: 18rem)': { gridRow: 'auto', gridColumn: '1 / -1', paddingBottom: '0.125rem' },
});

const Below = styled('div')({
  gridColumn: '2 / -1',
  minWidth: 0,
  fontSize: '0.8125rem',
  lineHeight: 1.35,
  color: 'var(--soft)',
  overflowWrap: 'anywhere',
  '[data-bare] > &': { gridColumn: '1 / -1' },
  '@container (max-width: 18rem)': { gridColumn: '1 / -1' },
});

export function FieldRow(props: FieldRowProps): ReactElement {
  const { label, htmlFor, hideLabel = false, hint, control, mark, below } = props;
  return (
    <Row data-bare={hideLabel ? '' : undefined}>
      <Name htmlFor={htmlFor} title={hint} className={hideLabel ? 'only-read' : undefined}>
        {label}
      </Name>
      <div style={{ minWidth: 0 }}>{control}</div>
      <div style={{ paddingTop: '0.25rem' }}>{mark}</div>
      {below !== undefined && below !== null && below !== false && <Below>{below}</Below>}
    </Row>
  );
}

/** The box that a text, a figure or a choice stands in. */
export const FieldBox = styled('div')({
  display: 'flex',
  alignItems: 'center',
  minHeight: '1.75rem',
  border: '1px solid var(--edge)',
  borderRadius: 3,
  backgroundColor: 'var(--sheet)',
  '&:focus-within': { outline: '2px solid var(--volt)', outlineOffset: 1 },
  '&[data-wrong]': { borderColor: 'var(--stop)', borderWidth: 2 },
  '& > input, & > textarea, & > select': {
    flex: '1 1 auto',
    minWidth: 0,
    width: '100%',
    minHeight: '1.6rem',
    padding: '0.125rem 0.4rem',
    border: 0,
    outline: 0,
    background: 'transparent',
    color: 'var(--ink)',
    font: 'inherit',
    fontSize: '0.9375rem',
    fontVariantNumeric: 'tabular-nums',
    textOverflow: 'ellipsis',
  },
  '& > textarea': { resize: 'vertical' },
  '& option': { backgroundColor: 'var(--sheet)', color: 'var(--ink)' },
  '& > select': { fontSize: '0.875rem', paddingInline: '0.2rem' },
  '& > select[data-assumed]': { color: 'var(--soft)' },
  '& > input::placeholder, & > textarea::placeholder': { color: 'var(--soft)', opacity: 1 },
  '@media (pointer: coarse)': { minHeight: 44 },
});

/** The unit in a field, lighter than its figure. */
export const Sign = styled('span')({
  flex: 'none',
  paddingRight: '0.4rem',
  color: 'var(--soft)',
  fontWeight: 300,
  fontSize: '0.875rem',
  whiteSpace: 'nowrap',
});
