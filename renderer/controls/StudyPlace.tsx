/** A study on its way: how far it is, and the button that stops it; or why there is none. */
import Box from '@mui/material/Box';
import Button from '@mui/material/Button';
import LinearProgress from '@mui/material/LinearProgress';
import { type ReactElement, type ReactNode, useEffect, useState } from 'react';
import type { Study } from '../state/studies.ts';

/** A study shorter than this needs no bar. */
const WORTH_A_BAR_MS = 300;

export interface StudyPlaceProps<Answer> {
  readonly study: Study<Answer>;
  /** What is worked out, as `Trying every way to tap the bank`. */
  readonly doing: string;
  /** On the button that begins it, where it does not begin by itself. */
  readonly begin: string;
  readonly children: (answer: Answer) => ReactNode;
}

export function StudyPlace<Answer>({ study, doing, begin, children }: StudyPlaceProps<Answer>): ReactElement {
  const { state, answer, ask, stop } = study;
  if (answer !== null) return <>{children(answer)}</>;
  if (state?.status === 'waiting') {
    return <Waiting doing={doing} done={state.done} of={state.of} onStop={stop} />;
  }
  return (
    <Box sx={{ display: 'flex', flexWrap: 'wrap', alignItems: 'center', gap: '0.75rem', minHeight: '2.25rem' }}>
      {state?.status === 'failed' && <Box role="alert">There is no answer: {state.message}</Box>}
      {state?.status === 'stopped' && <span>Stopped.</span>}
      <Button variant="outlined" onClick={ask}>
        {begin}
      </Button>
    </Box>
  );
}

interface WaitingProps {
  readonly doing: string;
  readonly done: number;
  readonly of: number;
  readonly onStop: () => void;
}

function Waiting({ doing, done, of, onStop }: WaitingProps): ReactElement {
  const [long, setLong] = useState(false);
  useEffect(() => {
    const timer = setTimeout(() => setLong(true), WORTH_A_BAR_MS);
    return () => clearTimeout(timer);
  }, []);
  return (
    <Box sx={{ display: 'flex', flexWrap: 'wrap', alignItems: 'center', gap: '0.75rem', minHeight: '2.25rem' }}>
      <span>{doing} …</span>
      {long && (
        <>
          <LinearProgress
            aria-label={doing}
            {...(of === 0 ? {} : { variant: 'determinate', value: Math.min(100, (done / of) * 100) })}
            sx={{ flex: '1 1 6rem', maxWidth: '18rem' }}
          />
          <Button variant="outlined" onClick={onStop}>
            Stop
          </Button>
        </>
      )}
    </Box>
  );
}
