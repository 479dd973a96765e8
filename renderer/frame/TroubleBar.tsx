/** What went wrong, in a sentence, until the person has read it; and what the host had to tell at its start. */
import Alert from '@mui/material/Alert';
import Box from '@mui/material/Box';
import Button from '@mui/material/Button';
import { type ReactElement, useState } from 'react';
import type { Issue } from '../../core/api.ts';
import { useSession } from '../state/session.ts';

/** Issues shown at once; a broken file can have hundreds. */
const MOST_SHOWN = 12;

export function TroubleBar(): ReactElement | null {
  const { trouble, about, tell } = useSession();
  const [read, setRead] = useState(false);
  const notices = read ? [] : (about?.notices ?? []);
  if (trouble === null && notices.length === 0) return null;
  return (
    <Box
      sx={{ position: 'fixed', top: 0, insetInline: 0, zIndex: 1500, display: 'grid', justifyContent: 'center', p: 1 }}
    >
      {notices.map(({ kind, message }) => (
        <Alert key={kind} severity="info" variant="outlined" sx={sheet} onClose={() => setRead(true)}>
          {message}
        </Alert>
      ))}
      {trouble !== null && (
        <Alert
          severity="error"
          variant="outlined"
          sx={sheet}
          role="alert"
          action={
            <Button size="small" onClick={() => tell(null)}>
              Close
            </Button>
          }
        >
          {trouble.message}
          {trouble.issues !== undefined && <Issues issues={trouble.issues} />}
        </Alert>
      )}
    </Box>
  );
}

const sheet = { bgcolor: 'var(--sheet)', color: 'var(--ink)', maxWidth: '48rem', maxHeight: '70vh', overflow: 'auto' };

function Issues({ issues }: { readonly issues: readonly Issue[] }): ReactElement {
  const rest = issues.length - MOST_SHOWN;
  return (
    <Box component="ul" sx={{ pl: 2, my: 1 }}>
      {issues.slice(0, MOST_SHOWN).map(({ path, message }) => (
        <li key={`${path} ${message}`}>
          {path !== '' && <strong>{path}: </strong>}
          {message}
        </li>
      ))}
      {rest > 0 && <li>and {rest} more</li>}
    </Box>
  );
}
