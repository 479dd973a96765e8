/** The stages of the job from top to bottom, in the order the work is done, each with a mark of what is open in it. */
import Box from '@mui/material/Box';
import ButtonBase from '@mui/material/ButtonBase';
import type { ReactElement, ReactNode } from 'react';
import type { Severity } from '../../core/api.ts';
import { SeverityMark } from '../controls/SeverityMark.tsx';
import { type Stage, stages, useSession } from '../state/session.ts';
import { useOpenCounts } from './openCounts.ts';
import type { Room } from './useRoom.ts';

export const stageWords: Readonly<Record<Stage, { readonly name: string; readonly purpose: string }>> = {
  site: { name: 'Site', purpose: 'where, how cold, which rule book' },
  wiring: { name: 'Wiring', purpose: 'draw it as it lies, see it live' },
  strings: { name: 'Strings', purpose: 'does the bank work as one?' },
  findings: { name: 'Findings', purpose: 'the verdicts, worst first' },
  handover: { name: 'Handover', purpose: 'print and pass on' },
};

export interface OpenCount {
  readonly severity: Severity;
  readonly count: number;
  /** `2 to stop, 1 to fix`. */
  readonly words: string;
}

export function Spine({ room, children }: { readonly room: Room; readonly children?: ReactNode }): ReactElement {
  const counts = useOpenCounts();
  const lies = room === 'tight';
  return (
    <Box
      component="nav"
      aria-label="Stages of the job"
      sx={{
        gridArea: 'spine',
        overflow: 'auto',
        ...(lies
          ? { display: 'flex', alignItems: 'center', borderBottom: '1px solid var(--hair)' }
          : { borderRight: '1px solid var(--hair)', width: room === 'wide' ? '10.5rem' : '7rem' }),
      }}
    >
      <Box component="ol" sx={{ listStyle: 'none', m: 0, p: 0, ...(lies ? { display: 'flex' } : { pt: 1 }) }}>
        {stages.map((stage) => (
          <li key={stage}>
            <StageButton stage={stage} open={counts[stage]} room={room} />
          </li>
        ))}
      </Box>
      {children}
    </Box>
  );
}

interface StageButtonProps {
  readonly stage: Stage;
  readonly open: OpenCount | null;
  readonly room: Room;
}

function StageButton({ stage, open, room }: StageButtonProps): ReactElement {
  const isHere = useSession((session) => session.stage === stage);
  const goStage = useSession((session) => session.goStage);
  const { name, purpose } = stageWords[stage];
  const edge = room === 'tight' ? 'borderBottom' : 'borderLeft';
  return (
    <ButtonBase
      onClick={() => goStage(stage)}
      aria-current={isHere ? 'step' : undefined}
      sx={{
        display: 'block',
        width: '100%',
        textAlign: 'left',
        px: 1.5,
        py: room === 'tight' ? 0.5 : 1,
        minHeight: 44,
        [edge]: isHere ? '4px solid var(--copper)' : '4px solid transparent',
        bgcolor: isHere ? 'var(--sheet)' : 'transparent',
        '&:hover': { bgcolor: 'var(--lit)' },
        '&.Mui-focusVisible': { outline: '2px solid var(--volt)', outlineOffset: -2 },
      }}
    >
      <Box component="span" sx={{ display: 'block', fontWeight: 600, fontSize: '1rem' }}>
        {name}
      </Box>
      {room === 'wide' && (
        <Box component="span" sx={{ display: 'block', color: 'var(--soft)', fontSize: '0.8125rem', lineHeight: 1.3 }}>
          {purpose}
        </Box>
      )}
      {open !== null && (
        <Box component="span" sx={{ display: 'flex', alignItems: 'center', gap: 0.5, mt: 0.25, fontSize: '0.8125rem' }}>
          <SeverityMark severity={open.severity} bare />
          {open.words}
        </Box>
      )}
    </ButtonBase>
  );
}
