/** Tables of figures, and the place in which a wide one moves sideways. */
import Box from '@mui/material/Box';
import { styled } from '@mui/material/styles';
import { type ReactElement, type ReactNode, useEffect, useRef, useState } from 'react';

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
