/** Small pieces that the folds of the stage are made of. */
import Box from '@mui/material/Box';
import { styled } from '@mui/material/styles';
import { type ReactElement, type ReactNode, useEffect, useRef, useState } from 'react';
import { StringKey } from '../../charts/Hatches.tsx';
import type { Tags } from './tags.ts';

/** A table of figures: names at the start, figures at the end of their cells. */
export const FigureTable = styled('table')({
  borderCollapse: 'collapse',
  fontSize: '0.875rem',
  fontVariantNumeric: 'tabular-nums',
  '& caption': { textAlign: 'start', color: 'var(--soft)', paddingBottom: '0.125rem' },
  '& th, & td': { textAlign: 'end', verticalAlign: 'baseline', fontWeight: 400, padding: '0.1875rem 0.5rem' },
  '& th:first-child, & td[data-text], & th[data-text]': { textAlign: 'start' },
  '& tr > :first-child': { paddingInlineStart: 0 },
  '& thead th': { color: 'var(--soft)', fontSize: '0.8125rem' },
  '& tbody tr': { borderTop: '1px solid var(--hair)' },
});

/** Wide tables move in a place of their own, never the page; where one does not fit, it can be reached and moved by keys. */
export function Sideways({ label, children }: { readonly label: string; readonly children: ReactNode }): ReactElement {
  const place = useRef<HTMLElement>(null);
  const [isWide, setWide] = useState(false);
  useEffect(() => {
    const { current } = place;
    if (current === null) return undefined;
    const observer = new ResizeObserver(() => setWide(current.scrollWidth > current.clientWidth));
    observer.observe(current);
    for (const inner of current.children) observer.observe(inner);
    return () => observer.disconnect();
  }, []);
  return (
    <Box
      ref={place}
      {...(isWide ? { role: 'region', 'aria-label': label, tabIndex: 0 } : {})}
      sx={{ overflowX: 'auto', maxWidth: '100%' }}
    >
      {children}
    </Box>
  );
}

export const Said = styled('p')({ margin: '0 0 0.375rem', fontSize: '0.9375rem', lineHeight: 1.4, maxWidth: '60rem' });
export const Quiet = styled('p')({
  margin: '0.25rem 0',
  color: 'var(--soft)',
  fontSize: '0.8125rem',
  lineHeight: 1.4,
  maxWidth: '60rem',
});

export function KeyOf({ tags, id }: { readonly tags: Tags; readonly id: string }): ReactElement {
  const known = tags.get(id);
  return known === undefined ? <strong>{id}</strong> : <StringKey tag={known.tag} hatch={known.hatch} />;
}

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
