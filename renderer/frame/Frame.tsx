/** The frame round every stage: spine at the left, stage, ledger where it helps, top bar, balance line at the foot. */
import Box from '@mui/material/Box';
import { lazy, type ReactElement, Suspense } from 'react';
import { Ledger } from '../ledger/Ledger.tsx';
import { WiringStage } from '../stages/wiring/WiringStage.tsx';
import { type Stage, useSession } from '../state/session.ts';
import { BalanceLine } from './BalanceLine.tsx';
import { ConflictDialog } from './ConflictDialog.tsx';
import { FindBox } from './FindBox.tsx';
import { Said } from './Said.tsx';
import { Spine } from './Spine.tsx';
import { TopBar } from './TopBar.tsx';

const SiteStage = lazy(async () => ({ default: (await import('../stages/site/SiteStage.tsx')).SiteStage }));
const FindingsStage = lazy(async () => ({
  default: (await import('../stages/findings/FindingsStage.tsx')).FindingsStage,
}));
const HandoverStage = lazy(async () => ({
  default: (await import('../stages/handover/HandoverStage.tsx')).HandoverStage,
}));

export function Frame(): ReactElement {
  const stage = useSession((session) => session.stage);
  const hasLedger = stage === 'wiring';
  return (
    <Box
      sx={{
        display: 'grid',
        height: '100%',
        gridTemplateColumns: hasLedger
          ? { xs: 'auto minmax(0, 1fr) minmax(16rem, 30vw)', lg: 'auto minmax(0, 1fr) 21.5rem' }
          : 'auto minmax(0, 1fr)',
        gridTemplateRows: 'auto minmax(0, 1fr) auto',
        gridTemplateAreas: hasLedger
          ? '"top top top" "spine stage ledger" "foot foot foot"'
          : '"top top" "spine stage" "foot foot"',
      }}
    >
      <TopBar />
      <Spine />
      <Box component="main" sx={{ gridArea: 'stage', minHeight: 0, minWidth: 0, overflow: 'hidden' }}>
        <Suspense fallback={null}>{stageFor(stage)}</Suspense>
      </Box>
      {hasLedger && (
        <Box
          component="aside"
          aria-label="Ledger of what is selected"
          sx={{ gridArea: 'ledger', minHeight: 0, overflow: 'auto', borderLeft: '1px solid var(--hair)' }}
        >
          <Ledger />
        </Box>
      )}
      <BalanceLine />
      <FindBox />
      <ConflictDialog />
      <Said />
    </Box>
  );
}

function stageFor(stage: Stage): ReactElement {
  switch (stage) {
    case 'site':
      return <SiteStage />;
    case 'wiring':
      return <WiringStage />;
    case 'findings':
      return <FindingsStage />;
    case 'handover':
      return <HandoverStage />;
  }
}
