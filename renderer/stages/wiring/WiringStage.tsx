/** The Wiring stage: palette, drawing, and the volt walk at its foot. The ledger beside it is placed by the frame. */
import { styled } from '@mui/material/styles';
import useMediaQuery from '@mui/material/useMediaQuery';
import { ReactFlowProvider } from '@xyflow/react';
import { type ReactElement, useEffect } from 'react';
import { VoltWalk } from '../../charts/VoltWalk.tsx';
import { Canvas } from '../../diagram/Canvas.tsx';
import { MIDDLE } from '../../diagram/flowNodes.ts';
import { DrawingMenus } from '../../diagram/Menus.tsx';
import { Palette } from '../../diagram/Palette.tsx';
import { Toolbar } from '../../diagram/Toolbar.tsx';
import { useView } from '../../diagram/view.ts';
import { useRoom } from '../../frame/useRoom.ts';
import { useOpenJob } from '../../state/openJob.ts';

const Stage = styled('div')({
  display: 'grid',
  height: '100%',
  gridTemplateRows: 'auto minmax(0, 1fr) auto',
  gridTemplateColumns: 'auto minmax(0, 1fr)',
  gridTemplateAreas: '"tools tools" "palette drawing" "walk walk"',
  position: 'relative',
  '& > .tools': { gridArea: 'tools' },
  '& > .palette-place': { gridArea: 'palette', position: 'relative', display: 'flex', minHeight: 0 },
  '& > .drawing-place': { gridArea: 'drawing', position: 'relative', minHeight: 0, minWidth: 0 },
  '& > .walk-place': { gridArea: 'walk', borderTop: '1px solid var(--hair)' },
});
const Note = styled('div')({
  position: 'absolute',
  zIndex: 5,
  left: '50%',
  transform: 'translateX(-50%)',
  background: 'var(--sheet)',
  border: '1px solid var(--edge)',
  borderRadius: 3,
  padding: '0.75rem 1rem',
  maxWidth: '26rem',
  '& button': {
    font: 'inherit',
    color: 'var(--ink)',
    background: 'transparent',
    border: '1px solid var(--edge)',
    borderRadius: 3,
    padding: '0.15rem 0.5rem',
    cursor: 'pointer',
  },
});

export function WiringStage(): ReactElement {
  const showsWalk = useView((view) => view.walk);
  useFolding();
  return (
    <ReactFlowProvider nodeOrigin={MIDDLE}>
      <h1 className="only-read">Wiring</h1>
      <Stage>
        <div className="tools">
          <Toolbar />
        </div>
        <div className="palette-place">
          <Palette />
        </div>
        <div className="drawing-place">
          <Canvas />
          <Empty />
          <Refusal />
        </div>
        {showsWalk && (
          <div className="walk-place">
            <VoltWalk />
          </div>
        )}
      </Stage>
      <DrawingMenus />
    </ReactFlowProvider>
  );
}

/** Where room is short, palette and volt walk begin folded, so that the drawing has it. */
function useFolding(): void {
  const isNarrow = useMediaQuery('(max-width: 1100px)', { noSsr: true });
  const isTight = useRoom() === 'tight';
  useEffect(() => {
    const foldedFor = `${isNarrow ? 'narrow' : 'wide'}${isTight ? ', tight' : ''}`;
    if (useView.getState().foldedFor === foldedFor) return;
    useView.setState({ foldedFor, palette: !isNarrow && !isTight, walk: !isTight });
  }, [isNarrow, isTight]);
}

function Empty(): ReactElement | null {
  const isEmpty = useOpenJob((open) => open.job.parts.length === 0);
  if (!isEmpty) return null;
  return (
    <Note style={{ top: '20%' }}>
      <h2 style={{ margin: '0 0 0.5rem', fontSize: '1rem' }}>Start small</h2>
      <p style={{ margin: '0 0 0.5rem' }}>
        Put a battery string on the drawing from the palette, then a fuse, then what it feeds. Figures that you leave
        out are guessed and marked so.
      </p>
      <p style={{ margin: 0 }}>Draw from one dot to another to run a cable. Every volt and amp appears as you go.</p>
    </Note>
  );
}

/** Why the last change could not be made. */
function Refusal(): ReactElement | null {
  const refusal = useView((view) => view.refusal);
  if (refusal === null) return null;
  return (
    <Note role="alert" style={{ bottom: '0.75rem' }}>
      {refusal}{' '}
      <button type="button" onClick={() => useView.setState({ refusal: null })}>
        Close
      </button>
    </Note>
  );
}
