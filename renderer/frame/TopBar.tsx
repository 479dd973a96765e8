/** Top bar: which job, which operating case, which rule book, which units; undo and redo; the box that finds anything. */
import Box from '@mui/material/Box';
import Button from '@mui/material/Button';
import MenuItem from '@mui/material/MenuItem';
import TextField from '@mui/material/TextField';
import Tooltip from '@mui/material/Tooltip';
import { type ReactElement, type ReactNode, useState } from 'react';
import { type Practice, setTop } from '../../core/api.ts';
import { choiceWord } from '../controls/words.ts';
import { useOpenJob } from '../state/openJob.ts';
import { changePreferences, usePreferences } from '../state/preferences.ts';
import { useChannel, useSession } from '../state/session.ts';
import { useFind } from './find.ts';
import { HistoryDrawer } from './HistoryDrawer.tsx';
import { FindIcon, HistoryIcon, JobsIcon, RedoIcon, SaveIcon, SettingsIcon, UndoIcon } from './icons.tsx';
import { KeptMark } from './KeptMark.tsx';
import { leaveJob } from './openings.ts';
import { PreferencesDialog } from './PreferencesDialog.tsx';
import { downloadJob, saveJob } from './saving.ts';
import type { Room } from './useRoom.ts';

const PRACTICES: readonly Practice[] = ['iec-land', 'us-land', 'iso-marine', 'us-marine'];

export function TopBar({ room }: { readonly room: Room }): ReactElement {
  const isWide = room === 'wide';
  const [open, setOpen] = useState<'history' | 'preferences' | null>(null);
  return (
    <Box
      component="header"
      sx={{
        gridArea: 'top',
        display: 'flex',
        flexWrap: room === 'tight' ? 'wrap' : 'nowrap',
        alignItems: 'center',
        columnGap: isWide ? 1 : 0.5,
        rowGap: 0.5,
        px: 1.5,
        py: 0.75,
        borderBottom: '1px solid var(--hair)',
      }}
    >
      <Act word="Jobs" icon={<JobsIcon />} hint="Back to the list of jobs" onClick={leaveJob} />
      <Title />
      <KeptMark />
      <Box sx={{ flex: '1 1 0' }} />
      <CaseChoice width={isWide ? '12rem' : '10rem'} />
      <PracticeChoice width={isWide ? '12.5rem' : '8rem'} />
      {isWide && <UnitChoice />}
      <UndoRedo />
      <Act
        word="Find"
        icon={<FindIcon />}
        hint="Parts, junctions, findings, actions (Ctrl K)"
        onClick={() => useFind.setState({ open: true })}
      />
      <Act word="History" icon={<HistoryIcon />} hint="Every change; snapshots" onClick={() => setOpen('history')} />
      <SaveAct />
      <Act
        word="Looks"
        icon={<SettingsIcon />}
        hint="Light or dark, paper, text size, motion"
        onClick={() => setOpen('preferences')}
      />
      <HistoryDrawer open={open === 'history'} onClose={() => setOpen(null)} />
      <PreferencesDialog open={open === 'preferences'} onClose={() => setOpen(null)} />
    </Box>
  );
}

/** A button with its icon; the word beside it gives way on narrow screens but stays its name. */
function Act({
  word,
  icon,
  hint,
  onClick,
  disabled = false,
}: {
  readonly word: string;
  readonly icon: ReactNode;
  readonly hint: string;
  readonly onClick: () => void;
  readonly disabled?: boolean;
}): ReactElement {
  return (
    <Tooltip title={hint}>
      <span>
        <Button onClick={onClick} disabled={disabled} aria-label={word} sx={{ minWidth: '2.25rem', px: 0.75 }}>
          {icon}
          <Box component="span" sx={{ display: { xs: 'none', xl: 'inline' }, ml: 0.5 }}>
            {word}
          </Box>
        </Button>
      </span>
    </Tooltip>
  );
}

function Title(): ReactElement {
  const title = useOpenJob((job) => job.job.title);
  const [typed, setTyped] = useState<string | null>(null);
  const commit = (): void => {
    const wanted = typed?.trim() ?? '';
    if (wanted !== '' && wanted !== title) useOpenJob.getState().edit(setTop({ path: 'title', value: wanted }));
    setTyped(null);
  };
  return (
    <Box
      component="input"
      aria-label="Title of the job"
      value={typed ?? title}
      maxLength={200}
      title={title}
      onChange={(event) => setTyped(event.target.value)}
      onBlur={commit}
      onKeyDown={(event) => {
        if (event.key === 'Enter') event.currentTarget.blur();
        if (event.key === 'Escape') setTyped(null);
      }}
      sx={{
        font: 'inherit',
        fontSize: '1.0625rem',
        fontWeight: 600,
        color: 'var(--ink)',
        bgcolor: 'transparent',
        border: '1px solid transparent',
        borderRadius: '3px',
        px: 0.5,
        py: 0.25,
        width: '16rem',
        minWidth: '6rem',
        flex: '0 10 20rem',
        textOverflow: 'ellipsis',
        '&:hover': { borderColor: 'var(--edge)' },
      }}
    />
  );
}

function CaseChoice({ width }: { readonly width: string }): ReactElement {
  const cases = useOpenJob((job) => job.job.cases);
  const caseId = useOpenJob((job) => job.caseId);
  const chooseCase = useOpenJob((job) => job.chooseCase);
  const options = cases.some(({ id }) => id === 'at-rest')
    ? cases
    : [...cases, { id: 'at-rest', label: 'At rest, all off' }];
  return (
    <Choice label="Operating case" width={width} value={caseId} onChange={chooseCase}>
      {options.map(({ id, label }) => (
        <MenuItem key={id} value={id}>
          {label ?? (id === 'as-drawn' ? 'As drawn' : id)}
        </MenuItem>
      ))}
    </Choice>
  );
}

function PracticeChoice({ width }: { readonly width: string }): ReactElement {
  const practice = useOpenJob((job) => (job.job.practiceAssumed === true ? '' : job.job.practice));
  return (
    <Choice
      label="Rule book"
      width={width}
      value={practice}
      onChange={(value) =>
        void useOpenJob.getState().edit(setTop({ path: 'practice', value: value === '' ? undefined : value }))
      }
    >
      <MenuItem value="">none chosen</MenuItem>
      {PRACTICES.map((id) => (
        <MenuItem key={id} value={id}>
          {choiceWord('practice', id)}
        </MenuItem>
      ))}
    </Choice>
  );
}

function UnitChoice(): ReactElement {
  const units = usePreferences((preferences) => preferences.units);
  const channel = useChannel();
  return (
    <Choice
      label="Units first"
      width="7rem"
      value={units}
      onChange={(value) => changePreferences(channel, { units: value === 'us' ? 'us' : 'metric' })}
    >
      <MenuItem value="metric">m, mm², °C</MenuItem>
      <MenuItem value="us">ft, AWG, °F</MenuItem>
    </Choice>
  );
}

function Choice({
  label,
  width,
  value,
  onChange,
  children,
}: {
  readonly label: string;
  readonly width: string;
  readonly value: string;
  readonly onChange: (value: string) => void;
  readonly children: ReactNode;
}): ReactElement {
  return (
    <TextField
      select
      size="small"
      label={label}
      value={value}
      onChange={(event) => onChange(event.target.value)}
      slotProps={{ select: { displayEmpty: true }, inputLabel: { shrink: true } }}
      sx={{ width, '& .MuiSelect-select': { py: 0.5 } }}
    >
      {children}
    </TextField>
  );
}

function UndoRedo(): ReactElement {
  const undoes = useOpenJob(({ line }) => (line.at > 0 ? (line.states[line.at]?.label ?? null) : null));
  const redoes = useOpenJob(({ line }) => line.states[line.at + 1]?.label ?? null);
  const undo = useOpenJob((job) => job.undo);
  const redo = useOpenJob((job) => job.redo);
  return (
    <Box sx={{ display: 'flex' }}>
      <Act
        word="Undo"
        icon={<UndoIcon />}
        hint={undoes === null ? 'Nothing to undo' : `Undo (Ctrl Z): ${undoes}`}
        disabled={undoes === null}
        onClick={() => void undo()}
      />
      <Act
        word="Redo"
        icon={<RedoIcon />}
        hint={redoes === null ? 'Nothing to do again' : `Do again (Ctrl Shift Z): ${redoes}`}
        disabled={redoes === null}
        onClick={() => void redo()}
      />
    </Box>
  );
}

function SaveAct(): ReactElement {
  const channel = useChannel();
  const asks = useSession((session) => session.about?.can.askWhereToSave === true);
  return (
    <Act
      word="Save file"
      icon={<SaveIcon />}
      hint="Write the job file to take along (Ctrl S)"
      onClick={() => (asks ? void saveJob(channel, 'known') : downloadJob())}
    />
  );
}
