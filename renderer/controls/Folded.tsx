/** Something more that opens on demand, with its title always in sight. */
import { styled } from '@mui/material/styles';
import type { ReactElement, ReactNode } from 'react';

const Details = styled('details')({
  borderTop: '1px solid var(--hair)',
  '& > summary': {
    display: 'flex',
    alignItems: 'baseline',
    gap: '0.5rem',
    boxSizing: 'border-box',
    minHeight: '2rem',
    paddingBlock: '0.25rem',
    cursor: 'pointer',
    fontWeight: 600,
    fontSize: '0.9375rem',
    listStyle: 'none',
  },
  '& > summary::-webkit-details-marker': { display: 'none' },
  '& > summary::before': { content: '"+"', width: '0.75rem', color: 'var(--soft)', fontWeight: 400 },
  '&[open] > summary::before': { content: '"−"' },
  '@media (pointer: coarse)': { '& > summary': { minHeight: 44, alignItems: 'center' } },
});

export interface FoldedProps {
  readonly title: string;
  /** How much is in it, in grey beside the title. */
  readonly aside?: ReactNode;
  readonly open?: boolean;
  /** Told when it is opened or folded, by whoever it was. */
  readonly onTurn?: (open: boolean) => void;
  readonly children: ReactNode;
}

export function Folded({ title, aside, open = false, onTurn, children }: FoldedProps): ReactElement {
  return (
    <Details open={open} onToggle={({ currentTarget }) => onTurn?.(currentTarget.open)}>
      <summary>
        <span>{title}</span>
        {aside !== undefined && (
          <span style={{ color: 'var(--soft)', fontWeight: 400, fontSize: '0.8125rem' }}>{aside}</span>
        )}
      </summary>
      <div style={{ paddingBottom: '0.5rem' }}>{children}</div>
    </Details>
  );
}
