/** A job file dropped anywhere on the page opens. */
import Box from '@mui/material/Box';
import Typography from '@mui/material/Typography';
import { type DragEvent, type ReactElement, type ReactNode, useState } from 'react';
import { useSession } from '../state/session.ts';
import { openPicked } from './openings.ts';

export function DropFile({ children }: { readonly children: ReactNode }): ReactElement {
  const [over, setOver] = useState(false);
  const channel = useSession((session) => session.channel);
  const carriesFile = (event: DragEvent): boolean => event.dataTransfer.types.includes('Files');
  return (
    <Box
      sx={{ height: '100%' }}
      onDragOver={(event) => {
        if (!carriesFile(event)) return;
        event.preventDefault();
        setOver(true);
      }}
      onDragLeave={(event) => {
        if (event.currentTarget === event.target) setOver(false);
      }}
      onDrop={(event) => {
        setOver(false);
        const file = event.dataTransfer.files[0];
        if (file === undefined) return;
        event.preventDefault();
        if (channel !== null) void openPicked(channel, file);
      }}
    >
      {children}
      {over && <DropHint />}
    </Box>
  );
}

function DropHint(): ReactElement {
  return (
    <Box
      sx={{
        position: 'fixed',
        inset: '1rem',
        border: '2px dashed var(--copper)',
        bgcolor: 'var(--sheet)',
        opacity: 0.95,
        display: 'grid',
        placeItems: 'center',
        pointerEvents: 'none',
        zIndex: 2000,
      }}
    >
      <Typography variant="h1" component="p">
        Let go to open this job file
      </Typography>
    </Box>
  );
}
