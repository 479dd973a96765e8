/** The findings, worst first; arrow keys walk through them, Enter opens. */
import Box from '@mui/material/Box';
import Button from '@mui/material/Button';
import { type KeyboardEvent, type ReactElement, useEffect, useRef, useState } from 'react';
import { useOpenJob } from '../../state/openJob.ts';
import { FindingItem } from './FindingItem.tsx';
import { drawnParts, type ListedFinding } from './findingList.ts';
import { stepIn } from './walkRows.ts';

/** How many are told in full on the first screen. */
const IN_FULL = 5;
/** How many stand in the list until more are asked for: a large job can have thousands. */
const AT_A_TIME = 150;

export interface FindingListProps {
  readonly shown: readonly ListedFinding[];
  readonly openKey: string | null;
  readonly onOpen: (key: string | null) => void;
  readonly onMade: () => void;
}

export function FindingList({ shown, openKey, onOpen, onMade }: FindingListProps): ReactElement {
  const list = useRef<HTMLOListElement>(null);
  const [most, setMost] = useState(AT_A_TIME);
  const openAt = shown.findIndex(({ key }) => key === openKey);
  const part = shown.slice(0, Math.max(most, openAt + 1));

  // Whoever comes back to the stage finds what was open; what is opened here is in sight already.
  useEffect(() => {
    list.current?.querySelector('[data-finding][aria-expanded="true"]')?.scrollIntoView({ block: 'nearest' });
  }, []);

  const walk = (event: KeyboardEvent): void => stepIn(event, list.current, '[data-finding]');

  const toggle = ({ key, finding }: ListedFinding): void => {
    const { job, light } = useOpenJob.getState();
    const opens = openKey !== key;
    light(opens ? drawnParts(job, finding.parts) : []);
    onOpen(opens ? key : null);
  };

  return (
    <>
      <Box
        component="ol"
        ref={list}
        aria-label="Findings, worst first"
        onKeyDown={walk}
        sx={{ m: 0, p: 0, listStyle: 'none', containerType: 'inline-size', borderBottom: '1px solid var(--hair)' }}
      >
        {part.map((one, index) => (
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
      {part.length < shown.length && (
        <Button onClick={() => setMost(most + AT_A_TIME)}>Show more: {shown.length - part.length} are not shown</Button>
      )}
    </>
  );
}
