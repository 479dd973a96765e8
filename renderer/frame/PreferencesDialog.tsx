/** Light or dark, paper, text size, motion: how the person likes it. None of it changes a job. */
import Button from '@mui/material/Button';
import Dialog from '@mui/material/Dialog';
import DialogActions from '@mui/material/DialogActions';
import DialogContent from '@mui/material/DialogContent';
import DialogTitle from '@mui/material/DialogTitle';
import FormControl from '@mui/material/FormControl';
import FormControlLabel from '@mui/material/FormControlLabel';
import FormLabel from '@mui/material/FormLabel';
import Radio from '@mui/material/Radio';
import RadioGroup from '@mui/material/RadioGroup';
import Typography from '@mui/material/Typography';
import { type ReactElement, useId } from 'react';
import type { Preferences } from '../../core/host.ts';
import { changePreferences, usePreferences } from '../state/preferences.ts';
import { useChannel, useSession } from '../state/session.ts';

export function PreferencesDialog({
  open,
  onClose,
}: {
  readonly open: boolean;
  readonly onClose: () => void;
}): ReactElement {
  const about = useSession((session) => session.about);
  return (
    <Dialog open={open} onClose={onClose} aria-labelledby="looks-title">
      <DialogTitle id="looks-title">Looks</DialogTitle>
      <DialogContent>
        <One name="theme" legend="Ground" choices={{ system: 'as the system', light: 'paper', dark: 'night' }} />
        <One name="units" legend="Units shown first" choices={{ metric: 'm, mm², °C', us: 'ft, AWG, °F' }} />
        <One name="paper" legend="Paper" choices={{ A4: 'A4', Letter: 'Letter' }} />
        <One
          name="textPercent"
          legend="Text size"
          choices={{ 100: '100 %', 125: '125 %', 150: '150 %', 200: '200 %' }}
        />
        <One name="motion" legend="Motion" choices={{ system: 'as the system', reduced: 'none' }} />
        {about !== null && (
          <Typography variant="caption" component="p" sx={{ mt: 2, overflowWrap: 'anywhere' }}>
            Ohmwright {about.version}. Jobs are kept in {about.storeFolder}. Nothing leaves this computer.
          </Typography>
        )}
      </DialogContent>
      <DialogActions>
        <Button variant="contained" onClick={onClose}>
          Done
        </Button>
      </DialogActions>
    </Dialog>
  );
}

function One<K extends keyof Preferences>({
  name,
  legend,
  choices,
}: {
  readonly name: K;
  readonly legend: string;
  readonly choices: Readonly<Record<Preferences[K], string>>;
}): ReactElement {
  const id = useId();
  const channel = useChannel();
  const value = usePreferences((preferences) => preferences[name]);
  const take = (text: string): void => {
    const chosen = typeof value === 'number' ? Number(text) : text;
    changePreferences(channel, { [name]: chosen });
  };
  return (
    <FormControl sx={{ display: 'block', mb: 1 }}>
      <FormLabel id={id}>{legend}</FormLabel>
      <RadioGroup row aria-labelledby={id} value={String(value)} onChange={(_event, text) => take(text)}>
        {Object.entries<string>(choices).map(([key, word]) => (
          <FormControlLabel key={key} value={key} control={<Radio size="small" />} label={word} />
        ))}
      </RadioGroup>
    </FormControl>
  );
}
