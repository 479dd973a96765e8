/** Thresholds without a published source, folded: each with its default and where it comes from. */
import Box from '@mui/material/Box';
import type { ReactElement } from 'react';
import { formatQuantity, numberText, STATUS_WORDS } from '../../../core/api.ts';
import { tables } from '../../../data/index.ts';
import { useOpenJob } from '../../state/openJob.ts';
import { JobField } from './JobField.tsx';
import { type JobFigure, thresholds } from './jobFigures.ts';

export function Thresholds(): ReactElement {
  return (
    <Box component="ul" sx={{ m: 0, p: 0, listStyle: 'none', maxWidth: '36rem' }}>
      {thresholds.map((figure) => (
        <Threshold key={figure.path} figure={figure} />
      ))}
    </Box>
  );
}

function Threshold({ figure }: { readonly figure: JobFigure }): ReactElement {
  const { assumed, status } = useStanding(figure);
  return (
    <Box component="li" sx={{ borderTop: '1px solid var(--hair)', padding: '0.375rem 0' }}>
      <JobField path={figure.path} assumed={assumed} below={`${figure.use} ${status}`} />
    </Box>
  );
}

/** What holds while the field is empty, and how far that may be trusted. */
function useStanding({ path, standard, unit }: JobFigure): { readonly assumed: string; readonly status: string } {
  const practice = useOpenJob(({ job }) => (job.practiceAssumed === true ? null : tables.practices[job.practice]));
  if (path === 'settings.dropCritical' || path === 'settings.dropOrdinary') {
    const figure = path === 'settings.dropCritical' ? practice?.dropCritical : practice?.dropOrdinary;
    if (practice === null || figure === undefined) return { assumed: 'no rule book', status: '' };
    const { value, basis } = figure;
    return {
      assumed: formatQuantity({ value, unit: '1', digits: 3 }),
      status: `Default: ${practice.name}, ${STATUS_WORDS[basis.status]}.`,
    };
  }
  if (standard === undefined) return { assumed: 'from the strings', status: '' };
  const isPlain = unit === 'count' || (unit === '1' && standard > 1);
  const assumed = isPlain ? numberText({ value: standard }) : formatQuantity({ value: standard, unit, digits: 3 });
  return { assumed, status: `Default: ${STATUS_WORDS['common-practice']}.` };
}
