/** Ctrl K: finds parts, junctions, findings, stages and actions; Enter goes there. */
import Box from '@mui/material/Box';
import Dialog from '@mui/material/Dialog';
import { type KeyboardEvent, type ReactElement, useMemo, useState } from 'react';
import { useFind } from './find.ts';
import { type Hit, searchEverything } from './searchEverything.ts';

export function FindBox(): ReactElement {
  const open = useFind((find) => find.open);
  const close = (): void => useFind.setState({ open: false });
  return (
    <Dialog
      open={open}
      onClose={close}
      aria-label="Find anything"
      fullWidth
      maxWidth="sm"
      slotProps={{ paper: { sx: { alignSelf: 'start', mt: '8vh' } } }}
    >
      {open && <Search onDone={close} />}
    </Dialog>
  );
}

/** The person has just asked for this very field. */
function toField(field: HTMLInputElement | null): void {
  field?.focus();
}

function Search({ onDone }: { readonly onDone: () => void }): ReactElement {
  const [text, setText] = useState('');
  const [at, setAt] = useState(0);
  const hits = useMemo(() => searchEverything(text), [text]);
  const choose = (hit: Hit | undefined): void => {
    if (hit === undefined) return;
    onDone();
    void hit.go();
  };
  const onKeyDown = (event: KeyboardEvent): void => {
    if (event.key === 'ArrowDown') setAt(Math.min(at + 1, hits.length - 1));
    else if (event.key === 'ArrowUp') setAt(Math.max(at - 1, 0));
    else if (event.key === 'Enter') choose(hits[at]);
    else return;
    event.preventDefault();
  };
  return (
    <Box sx={{ p: 1.5 }}>
      <Box
        component="input"
        role="combobox"
        aria-label="Find parts, junctions, findings, actions"
        aria-expanded={hits.length > 0}
        aria-controls="find-hits"
        aria-activedescendant={hits[at] === undefined ? undefined : `find-hit-${String(at)}`}
        placeholder="Part, junction, finding, action …"
        ref={toField}
        value={text}
        onChange={(event) => {
          setText(event.target.value);
          setAt(0);
        }}
        onKeyDown={onKeyDown}
        sx={{
          width: '100%',
          font: 'inherit',
          fontSize: '1.125rem',
          p: 1,
          color: 'var(--ink)',
          bgcolor: 'var(--ground)',
          border: '1px solid var(--edge)',
          borderRadius: '3px',
        }}
      />
      <Box
        component="ul"
        id="find-hits"
        role="listbox"
        aria-label="Found"
        sx={{ listStyle: 'none', m: 0, p: 0, pt: 1 }}
      >
        {hits.map((hit, index) => (
          <Box
            component="li"
            key={`${hit.kind} ${hit.name}`}
            id={`find-hit-${String(index)}`}
            role="option"
            aria-selected={index === at}
            onClick={() => choose(hit)}
            onMouseMove={() => setAt(index)}
            sx={{
              display: 'flex',
              gap: 1,
              px: 1,
              py: 0.75,
              cursor: 'pointer',
              borderTop: '1px solid var(--hair)',
              bgcolor: index === at ? 'var(--lit)' : 'transparent',
              '@media (pointer: coarse)': { minHeight: 44 },
            }}
          >
            <Box component="span" sx={{ flex: 1, overflowWrap: 'anywhere' }}>
              {hit.name}
            </Box>
            <Box component="span" sx={{ color: 'var(--soft)', fontSize: '0.875rem' }}>
              {hit.kind}
            </Box>
          </Box>
        ))}
      </Box>
      {hits.length === 0 && <Box sx={{ p: 1, color: 'var(--soft)' }}>Nothing of that name.</Box>}
    </Box>
  );
}
