/** Choices side by side, each with what it comes to. */
import { styled } from '@mui/material/styles';

/** A row of choices, one of them chosen. */
export const ChipRow = styled('fieldset')({
  display: 'flex',
  flexWrap: 'wrap',
  gap: '0.25rem',
  border: 0,
  margin: 0,
  padding: 0,
  minWidth: 0,
});

/** A choice of a row: the mark is the browser's own, the one chosen has a copper foot too. */
export const Chip = styled('label')({
  display: 'inline-flex',
  alignItems: 'center',
  gap: '0.375rem',
  minHeight: '1.75rem',
  padding: '0.0625rem 0.5rem',
  border: '1px solid var(--hair)',
  borderRadius: 3,
  fontSize: '0.875rem',
  lineHeight: 1.25,
  cursor: 'pointer',
  '& input': { accentColor: 'var(--copper)', width: '0.875rem', height: '0.875rem', margin: 0, flex: 'none' },
  '& [data-words]': { maxWidth: '11.5rem', overflow: 'hidden', textOverflow: 'ellipsis', whiteSpace: 'nowrap' },
  '& em': { fontStyle: 'normal', color: 'var(--soft)', fontVariantNumeric: 'tabular-nums', whiteSpace: 'nowrap' },
  '&:hover': { borderColor: 'var(--edge)' },
  '&:has(:checked)': {
    backgroundColor: 'var(--lit)',
    borderColor: 'var(--copper)',
    boxShadow: 'inset 0 -2px 0 var(--copper)',
  },
  '&:has(:checked) em': { color: 'var(--ink)' },
  '&:has(:focus-visible)': { outline: '2px solid var(--volt)', outlineOffset: 1 },
  '& input:focus-visible': { outline: 'none' },
  '@media (pointer: coarse)': { minHeight: 44 },
});
