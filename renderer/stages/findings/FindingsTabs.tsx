/** The three looks at the findings, one at a time; arrow keys go from tab to tab. */
import Box from '@mui/material/Box';
import { styled } from '@mui/material/styles';
import { type KeyboardEvent, type ReactElement, type ReactNode, useRef } from 'react';
import { changeView, type FindingsTab, findingsTabs, useFindingsView } from './findingsView.ts';

const NAMES: Readonly<Record<FindingsTab, string>> = {
  verdicts: 'Verdicts',
  protection: 'Protection',
  practices: 'Two rule books',
};

export function FindingsTabs(panels: Readonly<Record<FindingsTab, ReactNode>>): ReactElement {
  const { tab } = useFindingsView();
  const list = useRef<HTMLDivElement>(null);
  const walk = (event: KeyboardEvent): void => {
    const step = STEPS[event.key];
    if (step === undefined) return;
    event.preventDefault();
    const last = findingsTabs.length - 1;
    const to = Number.isFinite(step) ? (findingsTabs.indexOf(tab) + step + last + 1) % (last + 1) : step > 0 ? last : 0;
    const next = findingsTabs[to];
    if (next === undefined) return;
    changeView({ tab: next });
    list.current?.querySelectorAll<HTMLElement>('[role="tab"]')[to]?.focus();
  };
  return (
    <>
      <TabRow ref={list} role="tablist" aria-label="Looks at the findings" onKeyDown={walk}>
        {findingsTabs.map((one) => (
          <Tab
            key={one}
            type="button"
            role="tab"
            id={`findings-tab-${one}`}
            aria-selected={one === tab}
            aria-controls={one === tab ? `findings-panel-${one}` : undefined}
            tabIndex={one === tab ? 0 : -1}
            onClick={() => changeView({ tab: one })}
          >
            {NAMES[one]}
          </Tab>
        ))}
      </TabRow>
      <Box role="tabpanel" id={`findings-panel-${tab}`} aria-labelledby={`findings-tab-${tab}`}>
        {panels[tab]}
      </Box>
    </>
  );
}

const STEPS: Readonly<Record<string, number>> = {
  ArrowRight: 1,
  ArrowLeft: -1,
  Home: Number.NEGATIVE_INFINITY,
  End: Number.POSITIVE_INFINITY,
};

const TabRow = styled('div')({
  display: 'flex',
  flexWrap: 'wrap',
  gap: '0.25rem',
  borderBottom: '1px solid var(--hair)',
  marginBottom: '0.625rem',
});

const Tab = styled('button')({
  font: 'inherit',
  fontSize: '0.9375rem',
  color: 'var(--soft)',
  background: 'none',
  border: 0,
  borderRadius: 0,
  padding: '0.25rem 0.75rem',
  minHeight: '2rem',
  cursor: 'pointer',
  '&:hover': { color: 'var(--ink)' },
  '&[aria-selected="true"]': { color: 'var(--ink)', fontWeight: 600, boxShadow: 'inset 0 -3px 0 var(--copper)' },
  '&:focus-visible': { outline: '2px solid var(--volt)', outlineOffset: -2 },
  '@media (pointer: coarse)': { minHeight: 44 },
});
