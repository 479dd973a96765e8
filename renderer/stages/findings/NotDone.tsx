/** Checks not done, each missing figure with its field to fill in place. */
import Box from '@mui/material/Box';
import Button from '@mui/material/Button';
import { type ReactElement, type RefObject, useEffect, useLayoutEffect, useMemo, useRef, useState } from 'react';
import type { CheckedJob, MissingField, NotChecked } from '../../../core/api.ts';
import { partName, plainFields } from '../../../core/api.ts';
import { PartField } from '../../controls/PartField.tsx';
import { useOpenJob } from '../../state/openJob.ts';
import { JobField } from '../site/JobField.tsx';
import { drawnPart, ruleTitle } from './findingList.ts';
import { type MissingFigure, missingFigures, waitsForPractice } from './notDone.ts';

/** Figures asked for at first; a large job can lack hundreds. */
const FIRST_SHOWN = 12;

export function NotDone({ rows }: { readonly rows: readonly NotChecked[] }): ReactElement {
  const job = useOpenJob(({ job }) => job);
  const missing = useMemo(() => missingFigures(rows, job), [rows, job]);
  const figures = useMemo(() => missing.filter((figure) => !waitsForPractice(figure)), [missing]);
  const forPractice = missing.filter(waitsForPractice).reduce((sum, { checks }) => sum + checks.length, 0);
  const [all, setAll] = useState(false);
  const list = useFocusInPlace();
  const shown = all ? figures : figures.slice(0, FIRST_SHOWN);
  if (rows.length === 0) {
    return <Box sx={{ color: 'var(--soft)' }}>None: every check had the figures that it needs.</Box>;
  }
  return (
    <Box>
      <Box sx={{ color: 'var(--soft)', mb: '0.5rem' }}>
        They count neither as passed nor as failed. Fill in what is known; the list follows.
        {forPractice > 0 && ` ${String(forPractice)} of them wait for the choice of a rule book, above.`}
      </Box>
      <Box component="ul" ref={list} sx={{ m: 0, p: 0, listStyle: 'none' }}>
        {shown.map((figure) => (
          <Figure key={figure.key} figure={figure} job={job} />
        ))}
      </Box>
      {shown.length < figures.length && (
        <Button onClick={() => setAll(true)}>Show {figures.length - shown.length} more missing figures</Button>
      )}
    </Box>
  );
}

/** A figure that was filled in leaves the list, and its field with it: whoever was in it goes on in the one that took its place. */
function useFocusInPlace(): RefObject<HTMLUListElement | null> {
  const list = useRef<HTMLUListElement>(null);
  const at = useRef(-1);
  useEffect(() => {
    const note = (): void => {
      const row = document.activeElement?.closest('li') ?? null;
      at.current = row?.parentElement === list.current && row !== null ? siblingsBefore(row) : -1;
    };
    const forget = (): void => {
      at.current = -1;
    };
    document.addEventListener('focusin', note);
    // A click beside the fields leaves them for good.
    document.addEventListener('pointerdown', forget);
    return () => {
      document.removeEventListener('focusin', note);
      document.removeEventListener('pointerdown', forget);
    };
  }, []);
  // After every drawing, since only then is it known whether the field is still there.
  useLayoutEffect(() => {
    const rows = list.current?.children ?? [];
    if (at.current < 0 || rows.length === 0 || document.activeElement !== document.body) return;
    const row = rows[Math.min(at.current, rows.length - 1)];
    row?.querySelector<HTMLElement>('input, select, textarea')?.focus();
  });
  return list;
}

function Figure({ figure, job }: { readonly figure: MissingFigure; readonly job: CheckedJob }): ReactElement {
  const { checks, fields, missing } = figure;
  return (
    <Box
      component="li"
      sx={{
        display: 'grid',
        gridTemplateColumns: 'repeat(auto-fit, minmax(min(100%, 20rem), 1fr))',
        gap: '0.25rem 1rem',
        alignItems: 'center',
        borderTop: '1px solid var(--hair)',
        padding: '0.5rem 0.75rem',
      }}
    >
      <Box>
        <Box sx={{ fontWeight: 600 }}>{capital(plainFields(missing))}</Box>
        <Box sx={{ color: 'var(--soft)' }}>
          {checks.length === 1 ? '1 check waits for it' : `${String(checks.length)} checks wait for it`}:{' '}
          {waiting(checks)}
          {whose(figure, job)}
        </Box>
      </Box>
      <Box sx={{ display: 'grid', gap: '0.5rem' }}>
        {fields.map((field) => (
          <FieldInPlace key={`${field.part ?? ''} ${field.field}`} field={field} />
        ))}
      </Box>
    </Box>
  );
}

function FieldInPlace({ field: { part, field } }: { readonly field: MissingField }): ReactElement {
  const job = useOpenJob(({ job }) => job);
  if (part === null) return <JobField path={field} />;
  return (
    <Box sx={{ containerType: 'inline-size' }}>
      <PartField partId={drawnPart(job, part)} field={field} />
    </Box>
  );
}

function waiting(checks: readonly NotChecked[]): string {
  return [...new Set(checks.map(({ rule }) => ruleTitle(rule).toLowerCase()))].join('; ');
}

/** Which part, by its label, where the words of the check give only its id. */
function whose({ fields, checks }: MissingFigure, job: CheckedJob): string {
  const part = fields[0]?.part ?? checks[0]?.parts[0];
  if (part === undefined || part === null) return '';
  const name = partName(job, part);
  return name === part ? '' : ` · ${name}`;
}

function capital(text: string): string {
  return text.charAt(0).toUpperCase() + text.slice(1);
}

function siblingsBefore(element: Element): number {
  return [...(element.parentElement?.children ?? [])].indexOf(element);
}
