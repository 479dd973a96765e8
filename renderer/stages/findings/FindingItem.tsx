/** One finding: a line that opens; in full it says what, where, how much, by which book, and what to do. */
import Box from '@mui/material/Box';
import Button from '@mui/material/Button';
import ButtonBase from '@mui/material/ButtonBase';
import type { ReactElement } from 'react';
import type { Finding } from '../../../core/api.ts';
import { partNames, plainFields } from '../../../core/api.ts';
import { BasisText } from '../../controls/BasisText.tsx';
import { SeverityMark } from '../../controls/SeverityMark.tsx';
import { useOpenJob } from '../../state/openJob.ts';
import { useSession } from '../../state/session.ts';
import { caseWords, drawnParts, type ListedFinding, ruleTitle } from './findingList.ts';
import { LimitBar } from './LimitBar.tsx';
import { RemedyPanel } from './RemedyPanel.tsx';

export interface FindingItemProps {
  readonly listed: ListedFinding;
  /** Told in full without being opened. */
  readonly full: boolean;
  readonly open: boolean;
  readonly onToggle: () => void;
  readonly onMade: () => void;
}

export function FindingItem({ listed, full, open, onToggle, onMade }: FindingItemProps): ReactElement {
  const job = useOpenJob(({ job }) => job);
  const { finding } = listed;
  const shown = full || open;
  const panel = `finding-${listed.key.replaceAll(/[^A-Za-z0-9]+/g, '-')}`;
  const where = partNames(job, finding.parts);
  return (
    <Box
      component="li"
      sx={{ borderTop: '1px solid var(--hair)', backgroundColor: open ? 'var(--sheet)' : 'transparent' }}
    >
      <Box component="h3" sx={{ m: 0, fontSize: '1rem', fontWeight: 400 }}>
        <ButtonBase
          data-finding={listed.key}
          aria-expanded={open}
          aria-controls={open ? panel : undefined}
          onClick={onToggle}
          sx={{
            display: 'grid',
            gridTemplateColumns: '5.5rem minmax(0, 1fr) 1.5rem',
            alignItems: 'baseline',
            gap: '0.5rem',
            width: '100%',
            textAlign: 'left',
            padding: '0.3125rem 0.75rem 0.125rem',
            font: 'inherit',
            fontSize: '0.9375rem',
            lineHeight: 1.3,
            '&:hover': { backgroundColor: 'var(--lit)' },
            '&.Mui-focusVisible': { outline: '2px solid var(--volt)', outlineOffset: -2 },
            '@media (pointer: coarse)': { minHeight: 44 },
          }}
        >
          <SeverityMark severity={finding.severity} />
          <Box component="span" sx={shown ? {} : ONE_LINE}>
            {shown ? (
              plainFields(finding.message)
            ) : (
              <>
                <strong>{where === '' ? 'System' : where}</strong> · {ruleTitle(finding.rule)}
              </>
            )}
          </Box>
          <Turned open={open} />
        </ButtonBase>
      </Box>
      {shown && <FindingBody finding={finding} where={where} />}
      {open && (
        <Box id={panel} sx={{ padding: '0.25rem 0.75rem 0.75rem 6.75rem', [NARROW]: { paddingLeft: '0.75rem' } }}>
          <RemedyPanel finding={finding} onMade={onMade} />
        </Box>
      )}
    </Box>
  );
}

const ONE_LINE = { overflow: 'hidden', textOverflow: 'ellipsis', whiteSpace: 'nowrap' } as const;

function Turned({ open }: { readonly open: boolean }): ReactElement {
  return (
    <svg width="12" height="12" viewBox="0 0 12 12" aria-hidden="true" focusable="false">
      <polyline points={open ? '1,8 6,3 11,8' : '1,4 6,9 11,4'} fill="none" stroke="currentColor" strokeWidth="1.5" />
    </svg>
  );
}

function FindingBody({ finding, where }: { readonly finding: Finding; readonly where: string }): ReactElement {
  const job = useOpenJob(({ job }) => job);
  return (
    <Box sx={BODY}>
      <Box component="dl" sx={FACTS}>
        <dt>Where</dt>
        <dd>
          {where === '' ? 'the system as a whole' : where}
          {finding.case !== '' && (
            <Box component="span" sx={{ color: 'var(--soft)' }}>
              {' '}
              · {caseWords(job, finding.case)}
            </Box>
          )}
        </dd>
        <dt>Remedy</dt>
        <dd>{plainFields(finding.remedy)}</dd>
        <dt>Basis</dt>
        <dd>
          <BasisText text={plainFields(finding.basis)} status={finding.basisStatus} />
        </dd>
      </Box>
      <Box sx={{ flex: '0 1 14rem' }}>
        <LimitBar finding={finding} />
        {finding.parts.length > 0 && <ShowInWiring finding={finding} />}
      </Box>
    </Box>
  );
}

/** By the list's own width in letters, so that large text counts as narrow too. */
const NARROW = '@container (max-width: 40rem)';

const BODY = {
  display: 'flex',
  flexWrap: 'wrap',
  gap: '0.125rem 1.5rem',
  padding: '0 0.75rem 0.25rem 6.75rem',
  [NARROW]: { paddingLeft: '0.75rem' },
  fontSize: '0.8125rem',
  lineHeight: 1.35,
} as const;

const FACTS = {
  m: 0,
  flex: '1 1 22rem',
  minWidth: 0,
  display: 'grid',
  gridTemplateColumns: '4rem minmax(0, 1fr)',
  alignContent: 'start',
  columnGap: '0.5rem',
  '& dt': { color: 'var(--soft)' },
  '& dd': { m: 0, minWidth: 0, overflowWrap: 'anywhere' },
} as const;

const SHOW = {
  paddingInline: 0,
  minHeight: '1.5rem',
  fontSize: '0.8125rem',
  textDecoration: 'underline',
  '@media (pointer: coarse)': { minHeight: 44 },
} as const;

function ShowInWiring({ finding }: { readonly finding: Finding }): ReactElement {
  const show = (): void => {
    const { job, light, select, chooseCase } = useOpenJob.getState();
    const parts = drawnParts(job, finding.parts);
    if (finding.case !== '') chooseCase(finding.case);
    light(parts);
    select({ parts: parts.slice(0, 1) });
    useSession.getState().goStage('wiring');
  };
  return (
    <Button onClick={show} sx={SHOW}>
      Show in the wiring
      <span className="only-read"> {finding.parts.join(', ')}</span>
    </Button>
  );
}
