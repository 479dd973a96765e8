/** One study of the stage: its name and its answer always in sight, the rest when it is opened. */
import Box from '@mui/material/Box';
import type { ReactElement, ReactNode } from 'react';
import { Folded } from '../../controls/Folded.tsx';
import { type FoldName, turnFold, useStringsView } from './stringsView.ts';

export interface FoldProps {
  readonly name: FoldName;
  readonly title: string;
  /** The answer, as short as it can be said. */
  readonly answer: ReactNode;
  readonly children: ReactNode;
}

export function Fold({ name, title, answer, children }: FoldProps): ReactElement {
  const { open } = useStringsView();
  const isOpen = open.has(name);
  return (
    <Box data-fold={name}>
      <Folded title={title} aside={answer} open={isOpen} onTurn={(now) => now !== isOpen && turnFold(name, now)}>
        {isOpen && (
          <Box sx={{ paddingInlineStart: { xs: 0, sm: '1.25rem' }, paddingBlock: '0.125rem 0.5rem' }}>{children}</Box>
        )}
      </Folded>
    </Box>
  );
}
