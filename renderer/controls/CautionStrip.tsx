/** What a hand has to know here, before it goes in. The first caution is always read; the others open under it. */
import { styled } from '@mui/material/styles';
import type { ReactElement, ReactNode } from 'react';

const Strip = styled('div')({
  borderInlineStart: '4px solid var(--fix)',
  paddingInlineStart: '0.5rem',
  marginBlock: '0.5rem',
  fontSize: '0.875rem',
  lineHeight: 1.4,
  '& summary': { cursor: 'pointer', minHeight: '1.5rem', color: 'var(--soft)' },
  '@media (pointer: coarse)': { '& summary': { minHeight: 44, lineHeight: '44px' } },
  '& ul': { margin: 0, paddingInlineStart: '1rem' },
  '& li': { paddingBlock: '0.125rem' },
});

export interface CautionStripProps {
  /** Sentences, the nearest first. */
  readonly texts?: readonly string[];
  /** Or one text of the place's own. */
  readonly children?: ReactNode;
  readonly title?: string;
}

export function CautionStrip({ texts = [], children, title }: CautionStripProps): ReactElement | null {
  const [first, ...others] = texts;
  if (first === undefined && children === undefined) return null;
  return (
    <Strip role="note" aria-label={title ?? 'Caution'}>
      <strong style={{ color: 'var(--fix)' }}>{`${title ?? 'Caution'}. `}</strong>
      {children ?? first}
      {others.length > 0 && (
        <details>
          <summary>{`${String(others.length)} more`}</summary>
          <ul>
            {others.map((text) => (
              <li key={text}>{text}</li>
            ))}
          </ul>
        </details>
      )}
    </Strip>
  );
}
