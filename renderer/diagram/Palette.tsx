/**
 * The palette beside the drawing. A click puts a part in the middle of what is seen; a drag puts it where it is dropped. Where the
 * window is narrow it shows the kinds alone, and all else behind one button.
 */
import Popover from '@mui/material/Popover';
import { styled } from '@mui/material/styles';
import useMediaQuery from '@mui/material/useMediaQuery';
import { useReactFlow } from '@xyflow/react';
import { type ReactElement, useState } from 'react';
import { KIND_WORDS } from '../../core/api.ts';
import { useRoom } from '../frame/useRoom.ts';
import { putPart } from './edits.ts';
import { KindPicture, PaletteList, startDrag } from './PaletteList.tsx';
import { kindGroups, type PaletteEntry, SHORT_WORDS } from './paletteEntries.ts';
import { useView } from './view.ts';

const Side = styled('section')({
  borderRight: '1px solid var(--hair)',
  overflow: 'auto',
  minHeight: 0,
  padding: '0.5rem',
  width: '11.5rem',
  boxSizing: 'border-box',
  '&.narrow': { padding: '0.25rem', width: '7.5rem' },
  '& .grid': { display: 'grid', gridTemplateColumns: '1fr 1fr', gap: 1 },
  '&.over': { position: 'absolute', insetBlock: 0, left: 0, zIndex: 6, background: 'var(--sheet)' },
});
const Small = styled('button')({
  display: 'flex',
  flexDirection: 'column',
  alignItems: 'center',
  justifyContent: 'center',
  font: 'inherit',
  fontSize: '0.75rem',
  lineHeight: 1.1,
  color: 'var(--ink)',
  background: 'transparent',
  border: '1px solid transparent',
  borderRadius: 3,
  padding: '0.15rem 0',
  minHeight: '2.6rem',
  cursor: 'grab',
  '&:hover': { background: 'var(--lit)' },
  '&.more': {
    gridColumn: '1 / -1',
    border: '1px solid var(--edge)',
    minHeight: '2rem',
    cursor: 'pointer',
    marginTop: '0.25rem',
  },
  '@media (pointer: coarse)': { '&, &.more': { minHeight: 48 } },
});

export function Palette(): ReactElement | null {
  const isOpen = useView((view) => view.palette);
  const isNarrow = useMediaQuery('(max-width: 1500px)', { noSsr: true });
  const isSmall = useMediaQuery('(max-width: 1100px)', { noSsr: true });
  const isOver = useRoom() === 'tight' || isSmall;
  const { screenToFlowPosition } = useReactFlow();
  if (!isOpen) return null;
  const put = ({ part }: PaletteEntry): void => {
    const box = document.querySelector('.drawing')?.getBoundingClientRect();
    const at = { x: (box?.left ?? 0) + (box?.width ?? 0) / 2, y: (box?.top ?? 0) + (box?.height ?? 0) / 2 };
    putPart(part, screenToFlowPosition(at));
  };
  return (
    <Side
      aria-label="Palette: parts to put on the drawing"
      className={`${isNarrow ? 'narrow' : ''} ${isOver ? 'over' : ''}`}
    >
      {isNarrow ? <SmallPalette onPick={put} /> : <PaletteList onPick={put} />}
    </Side>
  );
}

function SmallPalette({ onPick }: { readonly onPick: (entry: PaletteEntry) => void }): ReactElement {
  const [anchor, setAnchor] = useState<HTMLElement | null>(null);
  return (
    <div className="grid">
      {kindGroups
        .flatMap(({ entries }) => entries)
        .map((entry) => (
          <Small
            key={entry.id}
            type="button"
            draggable
            title={entry.words}
            onClick={() => onPick(entry)}
            onDragStart={(event) => startDrag(event, entry)}
          >
            <KindPicture kind={entry.kind} />
            <span aria-hidden>{SHORT_WORDS[entry.kind]}</span>
            <span className="only-read">{KIND_WORDS[entry.kind]}</span>
          </Small>
        ))}
      <Small type="button" className="more" aria-haspopup="dialog" onClick={(event) => setAnchor(event.currentTarget)}>
        More parts …
      </Small>
      <Popover
        open={anchor !== null}
        anchorEl={anchor}
        onClose={() => setAnchor(null)}
        anchorOrigin={{ vertical: 'center', horizontal: 'right' }}
        transformOrigin={{ vertical: 'center', horizontal: 'left' }}
        slotProps={{
          paper: {
            role: 'dialog',
            'aria-label': 'All parts',
            sx: { width: '19rem', maxHeight: '32rem', padding: '0.5rem' },
          },
        }}
      >
        <PaletteList
          focusFirst
          onPick={(entry) => {
            setAnchor(null);
            onPick(entry);
          }}
        />
      </Popover>
    </div>
  );
}
