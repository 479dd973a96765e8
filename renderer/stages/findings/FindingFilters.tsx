/** Which findings to show: by severity, part, case, family of rules, and words. */
import Box from '@mui/material/Box';
import Button from '@mui/material/Button';
import TextField from '@mui/material/TextField';
import ToggleButton from '@mui/material/ToggleButton';
import type { ReactElement } from 'react';
import type { Severity } from '../../../core/api.ts';
import { partName, SEVERITIES, SEVERITY_WORDS } from '../../../core/api.ts';
import { SeverityMark } from '../../controls/SeverityMark.tsx';
import { useOpenJob } from '../../state/openJob.ts';
import {
  caseWords,
  choices,
  FAMILY_WORDS,
  type FindingFilter,
  isFiltered,
  type ListedFinding,
  NO_FILTER,
} from './findingList.ts';

export interface FindingFiltersProps {
  readonly all: readonly ListedFinding[];
  /** How many are left by the filter. */
  readonly shown: number;
  readonly filter: FindingFilter;
  readonly onChange: (filter: FindingFilter) => void;
}

export function FindingFilters({ all, shown, filter, onChange }: FindingFiltersProps): ReactElement {
  const job = useOpenJob(({ job }) => job);
  const { parts, cases, families } = choices(all, job);
  return (
    <Box
      component="search"
      aria-label="Findings to show"
      sx={{ display: 'flex', flexWrap: 'wrap', gap: '0.5rem', alignItems: 'center', mb: '0.5rem' }}
    >
      <SeverityButtons all={all} filter={filter} onChange={onChange} />
      <Choice
        label="Part"
        value={filter.part}
        options={parts.map((id) => [id, partName(job, id)])}
        onChange={(part) => onChange({ ...filter, part })}
      />
      <Choice
        label="Case"
        value={filter.case}
        options={cases.map((id) => [id, caseWords(job, id)])}
        onChange={(chosen) => onChange({ ...filter, case: chosen })}
      />
      <Choice
        label="About"
        value={filter.family}
        options={families.map((family) => [family, FAMILY_WORDS[family]])}
        onChange={(family) => onChange({ ...filter, family })}
      />
      <TextField
        label="Words"
        value={filter.text}
        onChange={({ target }) => onChange({ ...filter, text: target.value })}
        sx={{ width: '11rem', ...COARSE }}
        slotProps={{ htmlInput: { maxLength: 200, type: 'search' } }}
      />
      {isFiltered(filter) && (
        <Button variant="outlined" onClick={() => onChange(NO_FILTER)}>
          {shown} of {all.length} shown: show all
        </Button>
      )}
    </Box>
  );
}

function SeverityButtons({ all, filter, onChange }: Omit<FindingFiltersProps, 'shown'>): ReactElement {
  const toggle = (severity: Severity): void => {
    const severities = new Set(filter.severities);
    if (!severities.delete(severity)) severities.add(severity);
    onChange({ ...filter, severities });
  };
  return (
    <Box component="fieldset" aria-label="Severity" sx={SEVERITIES_IN_A_ROW}>
      {SEVERITIES.map((severity) => {
        const count = all.filter(({ finding }) => finding.severity === severity).length;
        return (
          <ToggleButton
            key={severity}
            value={severity}
            size="small"
            selected={filter.severities.has(severity)}
            disabled={count === 0}
            onChange={() => toggle(severity)}
            title={SEVERITY_WORDS[severity].meaning}
            sx={SEVERITY_BUTTON}
          >
            <SeverityMark severity={severity} count={count} />
          </ToggleButton>
        );
      })}
    </Box>
  );
}

const COARSE = { '@media (pointer: coarse)': { '& .MuiInputBase-root': { minHeight: 44 } } } as const;

const SEVERITIES_IN_A_ROW = { display: 'flex', gap: '0.25rem', flexWrap: 'wrap', border: 0, m: 0, p: 0 } as const;

const SEVERITY_BUTTON = {
  gap: '0.375rem',
  minHeight: '2.25rem',
  paddingBlock: '0.125rem',
  paddingInline: '0.625rem',
  color: 'var(--ink)',
  borderColor: 'var(--edge)',
  fontSize: '0.875rem',
  '&.Mui-selected, &.Mui-selected:hover': {
    backgroundColor: 'var(--lit)',
    color: 'var(--ink)',
    boxShadow: 'inset 0 -3px 0 var(--copper)',
  },
  '&.Mui-disabled': { color: 'var(--soft)', borderColor: 'var(--hair)' },
  '&.Mui-focusVisible': { outline: '2px solid var(--volt)', outlineOffset: 2 },
  '@media (pointer: coarse)': { minHeight: 44 },
} as const;

interface ChoiceProps {
  readonly label: string;
  readonly value: string;
  readonly options: readonly (readonly [string, string])[];
  readonly onChange: (value: string) => void;
}

/** The browser's own list: it takes keys, touch and a screen reader as the person knows them. */
function Choice({ label, value, options, onChange }: ChoiceProps): ReactElement {
  return (
    <TextField
      select
      label={label}
      value={value}
      disabled={options.length < 2 && value === ''}
      onChange={({ target }) => onChange(target.value)}
      slotProps={{ select: { native: true }, inputLabel: { shrink: true } }}
      sx={{ width: '10rem', ...COARSE }}
    >
      <option value="">all</option>
      {options.map(([id, words]) => (
        <option key={id} value={id}>
          {words}
        </option>
      ))}
    </TextField>
  );
}
