/** The list of what can be put on the drawing: kinds first, then the library and own parts, with a field to find one. */
import { styled } from '@mui/material/styles';
import { type DragEvent, type ReactElement, useEffect, useState } from 'react';
import { kindSymbol, type PartKind } from '../../core/api.ts';
import type { OwnPart } from '../../core/host.ts';
import { useSession } from '../state/session.ts';
import { DRAGGED_PART } from './draggedPart.ts';
import { found, kindGroups, libraryGroups, ownGroup, type PaletteEntry, type PaletteGroup } from './paletteEntries.ts';
import { Shapes } from './Shapes.tsx';
import { useFocusAtFirst } from './useFocusAtFirst.ts';

const Field = styled('input')({
  width: '100%',
  boxSizing: 'border-box',
  font: 'inherit',
  fontSize: '0.875rem',
  color: 'var(--ink)',
  background: 'var(--sheet)',
  border: '1px solid var(--edge)',
  borderRadius: 3,
  padding: '0.3rem 0.5rem',
  '@media (pointer: coarse)': { minHeight: 44 },
});
const Group = styled('details')({
  '& > summary': {
    cursor: 'pointer',
    padding: '0.35rem 0.25rem',
    fontSize: '0.8125rem',
    fontWeight: 600,
    color: 'var(--soft)',
    '@media (pointer: coarse)': { minHeight: 44, display: 'flex', alignItems: 'center' },
  },
});
const Entry = styled('button')({
  display: 'flex',
  alignItems: 'center',
  gap: '0.5rem',
  width: '100%',
  padding: '0.1rem 0.25rem',
  font: 'inherit',
  fontSize: '0.875rem',
  lineHeight: 1.2,
  textAlign: 'left',
  color: 'var(--ink)',
  background: 'transparent',
  border: '1px solid transparent',
  borderRadius: 3,
  cursor: 'grab',
  minHeight: '1.75rem',
  '&:hover': { background: 'var(--lit)' },
  '@media (pointer: coarse)': { minHeight: 44 },
});

export interface PaletteListProps {
  readonly onPick: (entry: PaletteEntry) => void;
  /** The keyboard goes to the field at once. */
  readonly focusFirst?: boolean;
}

export function PaletteList({ onPick, focusFirst = false }: PaletteListProps): ReactElement {
  const [asked, setAsked] = useState('');
  const own = useOwnParts();
  const field = useFocusAtFirst<HTMLInputElement>(focusFirst);
  const isAsking = asked.trim() !== '';
  const groups = isAsking
    ? found([...kindGroups, ...(own.length > 0 ? [ownGroup(own)] : []), ...libraryGroups], asked)
    : [...kindGroups, ...(own.length > 0 ? [ownGroup(own)] : [])];
  return (
    <div>
      <Field
        type="search"
        value={asked}
        placeholder="Find a part"
        aria-label="Find a part to put on the drawing"
        ref={field}
        onChange={(event) => setAsked(event.target.value)}
      />
      {groups.map((group) => (
        <Entries key={group.name} group={group} open onPick={onPick} />
      ))}
      {isAsking && groups.length === 0 && <p style={{ fontSize: '0.875rem' }}>Nothing is called that here.</p>}
      {!isAsking && (
        <>
          <p style={{ margin: '0.5rem 0.25rem 0', fontSize: '0.8125rem', fontWeight: 600 }}>Generic parts</p>
          {libraryGroups.map((group) => (
            <Entries key={group.name} group={group} open={false} onPick={onPick} />
          ))}
        </>
      )}
    </div>
  );
}

function Entries({
  group: { name, entries },
  open,
  onPick,
}: {
  readonly group: PaletteGroup;
  readonly open: boolean;
  readonly onPick: PaletteListProps['onPick'];
}): ReactElement {
  return (
    <Group open={open}>
      <summary>{name}</summary>
      {entries.map((entry) => (
        <Entry
          key={entry.id}
          type="button"
          draggable
          onClick={() => onPick(entry)}
          onDragStart={(event) => startDrag(event, entry)}
        >
          <KindPicture kind={entry.kind} />
          {entry.words}
        </Entry>
      ))}
    </Group>
  );
}

export function startDrag(event: DragEvent, { part }: PaletteEntry): void {
  event.dataTransfer.setData(DRAGGED_PART, JSON.stringify(part));
  event.dataTransfer.effectAllowed = 'copy';
}

export function KindPicture({ kind }: { readonly kind: PartKind }): ReactElement {
  return (
    <svg aria-hidden viewBox="-15 -12 30 24" width="30" height="24" style={{ flex: 'none' }}>
      <Shapes shapes={kindSymbol(kind)} />
    </svg>
  );
}

function useOwnParts(): readonly OwnPart[] {
  const channel = useSession((session) => session.channel);
  const [own, setOwn] = useState<readonly OwnPart[]>([]);
  useEffect(() => {
    let isGone = false;
    void channel?.call('library.list', {}).then((answer) => {
      if (answer.ok && !isGone) setOwn(answer.value);
    });
    return () => {
      isGone = true;
    };
  }, [channel]);
  return own;
}
