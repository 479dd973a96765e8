/** One run's proposal: a tick, what it is and takes; why, and what was looked at instead, under it. */
import Box from '@mui/material/Box';
import { styled } from '@mui/material/styles';
import type { ReactElement } from 'react';
import { costWords, plainFields } from '../../../core/api.ts';
import { More, Quiet } from '../../controls/Prose.tsx';
import { SeverityMark } from '../../controls/SeverityMark.tsx';
import type { ListedProposal } from '../../workers/protectionMessages.ts';

export interface ProposalItemProps {
  readonly run: ListedProposal;
  readonly isTicked: boolean;
  readonly onTick: (isTicked: boolean) => void;
}

export function ProposalItem({ run, isTicked, onTick }: ProposalItemProps): ReactElement {
  const { title, words, cost, canTake, left, solves } = run;
  return (
    <Box
      component="li"
      data-proposal={run.id}
      sx={{ borderTop: '1px solid var(--hair)', padding: '0.375rem 0.25rem 0' }}
    >
      {canTake ? (
        <Tick>
          <input type="checkbox" checked={isTicked} onChange={({ target }) => onTick(target.checked)} />
          <span>
            <strong>{plainFields(title)}</strong>
            {`: ${words}`}
          </span>
        </Tick>
      ) : (
        <Box sx={{ fontSize: '0.9375rem' }}>
          <strong>{plainFields(title)}</strong>: nothing listed solves all of it
        </Box>
      )}
      <Box sx={{ paddingInlineStart: '1.375rem', fontSize: '0.8125rem' }}>
        {canTake && (
          <Box sx={{ color: 'var(--soft)' }}>
            Takes {costWords(cost)}
            {solves.length > 0 &&
              `; ${solves.length === 1 ? 'one finding goes' : `${String(solves.length)} findings go`}`}
          </Box>
        )}
        {left.map((finding) => (
          <Box key={finding.message} sx={{ display: 'flex', gap: '0.5rem', alignItems: 'baseline' }}>
            <SeverityMark severity={finding.severity} />
            <span>stays: {plainFields(finding.message)}</span>
          </Box>
        ))}
        <Why run={run} />
      </Box>
    </Box>
  );
}

function Why({ run: { reasons, alternatives, devices } }: { readonly run: ListedProposal }): ReactElement | null {
  const classes = devices.filter(({ type }) => type !== null);
  if (reasons.length + alternatives.length + classes.length === 0) return null;
  return (
    <More>
      <summary>Why, and what else was looked at</summary>
      <ul>
        {reasons.map((text) => (
          <li key={text}>{plainFields(text)}</li>
        ))}
        {alternatives.map(({ words, why }) => (
          <li key={`${words} ${why}`}>
            Not taken: {plainFields(words)}: {plainFields(why)}
          </li>
        ))}
      </ul>
    </More>
  );
}

/** Runs that stay as they are. */
export function KeptRuns({ runs }: { readonly runs: readonly ListedProposal[] }): ReactElement | null {
  if (runs.length === 0) return null;
  return (
    <More>
      <summary>{runs.length === 1 ? 'One run stays as it is' : `${String(runs.length)} runs stay as they are`}</summary>
      <ul>
        {runs.map(({ id, title, words, verdict, reasons }) => (
          <li key={id}>
            {plainFields(title)}: {words}
            {verdict === 'unknown' && reasons.length > 0 && ` (${plainFields(reasons.join(' '))})`}
          </li>
        ))}
      </ul>
      <Quiet>Looked at with all proposals taken together.</Quiet>
    </More>
  );
}

const Tick = styled('label')({
  display: 'flex',
  alignItems: 'baseline',
  gap: '0.5rem',
  minHeight: '1.5rem',
  fontSize: '0.9375rem',
  lineHeight: 1.35,
  cursor: 'pointer',
  '& input': {
    accentColor: 'var(--copper)',
    width: '0.875rem',
    height: '0.875rem',
    margin: 0,
    flex: 'none',
    alignSelf: 'center',
  },
  '&:has(:focus-visible)': { outline: '2px solid var(--volt)', outlineOffset: 1 },
  '@media (pointer: coarse)': { minHeight: 44, alignItems: 'center' },
});
