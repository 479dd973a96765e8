/** The button that makes a tried change in the job; undo takes it back. */
import Box from '@mui/material/Box';
import Button from '@mui/material/Button';
import { type ReactElement, useState } from 'react';
import { plainFields } from '../../../core/api.ts';
import { useOpenJob } from '../../state/openJob.ts';
import type { TriedChange } from '../../workers/stringsMessages.ts';
import { changeStringsView } from './stringsView.ts';

export interface MakeChangeProps {
  readonly change: TriedChange;
  /** In a row of a list, where the change is named already. */
  readonly short?: boolean;
}

export function MakeChange({ change, short = false }: MakeChangeProps): ReactElement {
  const edit = useOpenJob((open) => open.edit);
  const [refused, setRefused] = useState('');
  const make = (): void => {
    const made = edit({ label: change.label, apply: () => change.leaves });
    if (made.ok) changeStringsView({ picked: null });
    else setRefused(made.issues.map(({ message }) => message).join(' '));
  };
  return (
    <>
      {!short && (
        <Box sx={{ fontSize: '0.9375rem', mb: '0.25rem' }}>
          <strong>{plainFields(change.label)}</strong>
          {change.cost !== '' && <Box component="span" sx={{ color: 'var(--soft)' }}>{` · takes ${change.cost}`}</Box>}
        </Box>
      )}
      <Button variant={short ? 'outlined' : 'contained'} onClick={make} sx={{ whiteSpace: 'nowrap' }}>
        {short ? 'Make it' : 'Make this change'}
        {short && <span className="only-read">: {plainFields(change.label)}</span>}
      </Button>
      {!short && (
        <Box component="span" sx={{ marginInlineStart: '0.75rem', color: 'var(--soft)', fontSize: '0.8125rem' }}>
          On the drawing only; undo takes it back.
        </Box>
      )}
      {refused !== '' && (
        <Box role="alert" sx={{ color: 'var(--stop)' }}>
          {refused}
        </Box>
      )}
    </>
  );
}
