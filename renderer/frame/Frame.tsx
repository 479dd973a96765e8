/** The frame round every stage: spine at the left, stage, ledger where it helps, top bar, balance line at the foot. */
import Box from '@mui/material/Box';
import Button from '@mui/material/Button';
import { lazy, type ReactElement, Suspense, useRef } from 'react';
import { useFocusField } from '../controls/useFocusField.ts';
import { Ledger } from '../ledger/Ledger.tsx';
import { WiringStage } from '../stages/wiring/WiringStage.tsx';
import { type Stage, useSession } from '../state/session.ts';
import { BalanceLine } from './BalanceLine.tsx';
import { ConflictDialog } from './ConflictDialog.tsx';
import { DefectBoundary } from './DefectBoundary.tsx';
import { FindBox } from './FindBox.tsx';
import { Said } from './Said.tsx';
import { Spine } from './Spine.tsx';
import { TopBar } from './TopBar.tsx';
import { type Room, useRoom } from './useRoom.ts';

const SiteStage = lazy(async () => ({ default: (await import('../stages/site/SiteStage.tsx')).SiteStage }));
const FindingsStage = lazy(async () => ({
  default: (await import('../stages/findings/FindingsStage.tsx')).FindingsStage,
}));
const HandoverStage = lazy(async () => ({
  default: (await import('../stages/handover/HandoverStage.tsx')).HandoverStage,
}));
const StringsStage = lazy(async () => ({ default: (await import('../stages/strings/StringsStage.tsx')).StringsStage }));

export function Frame(): ReactElement {
  const stage = useSession((session) => session.stage);
  const room = useRoom();
  const called = useSession((session) => session.isLedgerCalled);
  const callLedger = useSession((session) => session.callLedger);
  const hasLedger = stage === 'wiring' && (room !== 'tight' || called);
  return (
    <Box sx={{ display: 'grid', height: '100%', ...places(room, hasLedger) }}>
      <TopBar room={room} />
      <Spine room={room}>
        {room === 'tight' && stage === 'wiring' && (
          <Button aria-expanded={called} onClick={() => callLedger(!called)} sx={{ ml: 'auto' }}>
            Ledger
          </Button>
        )}
      </Spine>
      <Box component="main" sx={{ gridArea: 'stage', minHeight: 0, minWidth: 0, overflow: 'hidden' }}>
        <DefectBoundary name={stage}>
          <Suspense fallback={null}>{stageFor(stage)}</Suspense>
        </DefectBoundary>
      </Box>
      {hasLedger && <LedgerPlace />}
      <BalanceLine />
      <FindBox />
      <ConflictDialog />
      <Said />
    </Box>
  );
}

/** Where everything stands on the board. */
function places(room: Room, hasLedger: boolean): Readonly<Record<string, string>> {
  if (room === 'tight') {
    return {
      gridTemplateColumns: hasLedger ? 'minmax(0, 1fr) minmax(0, 1fr)' : 'minmax(0, 1fr)',
      gridTemplateRows: 'auto auto minmax(0, 1fr) auto',
      gridTemplateAreas: hasLedger
        ? '"top top" "spine spine" "stage ledger" "foot foot"'
        : '"top" "spine" "stage" "foot"',
    };
  }
  const ledger = room === 'wide' ? '21.5rem' : 'minmax(16rem, 30vw)';
  return {
    gridTemplateColumns: hasLedger ? `auto minmax(0, 1fr) ${ledger}` : 'auto minmax(0, 1fr)',
    gridTemplateRows: 'auto minmax(0, 1fr) auto',
    gridTemplateAreas: hasLedger
      ? '"top top top" "spine stage ledger" "foot foot foot"'
      : '"top top" "spine stage" "foot foot"',
  };
}

function LedgerPlace(): ReactElement {
  const place = useRef<HTMLElement>(null);
  useFocusField('ledger', place);
  return (
    <Box
      component="aside"
      ref={place}
      tabIndex={-1}
      aria-label="Ledger of what is selected"
      sx={{ gridArea: 'ledger', minHeight: 0, overflow: 'auto', borderLeft: '1px solid var(--hair)' }}
    >
      <DefectBoundary name="ledger">
        <Ledger />
      </DefectBoundary>
    </Box>
  );
}

function stageFor(stage: Stage): ReactElement {
  switch (stage) {
    case 'site':
      return <SiteStage />;
    case 'wiring':
      return <WiringStage />;
    case 'strings':
      return <StringsStage />;
    case 'findings':
      return <FindingsStage />;
    case 'handover':
      return <HandoverStage />;
  }
}
