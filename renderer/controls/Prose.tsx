/** Sentences of a stage: what is said first, what stands back, and what is folded under it. */
import { styled } from '@mui/material/styles';
import type { ReactElement } from 'react';

export const Said = styled('p')({ margin: '0 0 0.375rem', fontSize: '0.9375rem', lineHeight: 1.4, maxWidth: '60rem' });
export const Quiet = styled('p')({
  margin: '0.25rem 0',
  color: 'var(--soft)',
  fontSize: '0.8125rem',
  lineHeight: 1.4,
  maxWidth: '60rem',
});

/** What was assumed, folded away but counted. */
export function Assumed({ texts }: { readonly texts: readonly string[] }): ReactElement | null {
  if (texts.length === 0) return null;
  return (
    <More>
      <summary>{texts.length === 1 ? 'One thing was assumed' : `${String(texts.length)} things were assumed`}</summary>
      <ul>
        {texts.map((text) => (
          <li key={text}>{text}</li>
        ))}
      </ul>
    </More>
  );
}

/** What is there for who wants to know it all. */
export const More = styled('details')({
  fontSize: '0.8125rem',
  color: 'var(--soft)',
  marginBlock: '0.25rem',
  '& > summary': { cursor: 'pointer', minHeight: '1.75rem' },
  '& ul': { margin: 0, paddingInlineStart: '1.25rem', maxWidth: '60rem' },
  '@media (pointer: coarse)': { '& > summary': { minHeight: 44, lineHeight: '44px' } },
});
