/** The findings, worst first; arrow keys walk through them, Enter opens. */
import Box from '@mui/material/Box';
import { type KeyboardEvent, type ReactElement, useRef } from 'react';
import { useOpenJob } from '../../state/openJob.ts';
import { FindingItem } from './FindingItem.tsx';
import { drawnParts, type ListedFinding } from './findingList.ts';

/** How many are told in full on the first screen. */
const IN_FULL = 5;

export interface FindingListProps {
  readonly shown: readonly ListedFinding[];
  readonly openKey: string | null;
  readonly onOpen: (key: string | null) => void;
  readonly onMade: () => void;
}

export function FindingList({ shown, openKey, onOpen, onMade }: FindingListProps): ReactElement {
  const list = useRef<HTMLOListElement>(null);

  const walk = (event: KeyboardEvent): void => {
    const step = STEPS[event.key];
    const headers = [...(list.current?.querySelectorAll<HTMLElement>('[data-finding]') ?? [])];
    const at = headers.indexOf(event.target as HTMLElement);
    if (step === undefined || at < 0) return;
    event.preventDefault();
    const to = Number.isFinite(step) ? at + step : step > 0 ? headers.length - 1 : 0;
    headers[Math.max(0, Math.min(headers.length - 1, to))]?.focus();
  };

  const toggle = ({ key, finding }: ListedFinding): void => {
    const { job, light } = useOpenJob.getState();
    const opens = openKey !== key;
    light(opens ? drawnParts(job, finding.parts) : []);
    onOpen(opens ? key : null);
  };

  return (
    <Box
      component="ol"
      ref={list}
      aria-label="Findings, worst first"
      onKeyDown={walk}
      sx={{ m: 0, p: 0, listStyle: 'none', containerType: 'inline-size', borderBottom: '1px solid var(--hair)' }}
    >
      {shown.map((one, index) => (
        <FindingItem
          key={one.key}
          listed={one}
          full={index < IN_FULL}
          open={one.key === openKey}
          onToggle={() => toggle(one)}
          onMade={onMade}
        />
      ))}
    </Box>
  );
}

const STEPS: Readonly<Record<string, number>> = {
  ArrowDown: 1,
  ArrowUp: -1,
  Home: Number.NEGATIVE_INFINITY,
  End: Number.POSITIVE_INFINITY,
};
