/** Where the system stands, how cold, how hot, how much sun, and which rule book judges it. */
import Box from '@mui/material/Box';
import Typography from '@mui/material/Typography';
import { type ReactElement, type ReactNode, useId, useState } from 'react';
import { tables } from '../../../data/index.ts';
import { Folded } from '../../controls/Folded.tsx';
import { useOpenJob } from '../../state/openJob.ts';
import { useSession } from '../../state/session.ts';
import { JobField } from './JobField.tsx';
import { JobText } from './JobText.tsx';
import { airFigures, placeFlags, siteFigures, thresholds } from './jobFigures.ts';
import { PracticeChoice } from './PracticeChoice.tsx';
import { SunTable } from './SunTable.tsx';
import { Thresholds } from './Thresholds.tsx';

export function SiteStage(): ReactElement {
  const key = useOpenJob((open) => open.key);
  // A folded field cannot take the focus. Once opened it stays open.
  const wantsThreshold = useSession((session) => session.focusField?.startsWith('settings.') === true);
  const [unfolded, setUnfolded] = useState(wantsThreshold);
  if (wantsThreshold && !unfolded) setUnfolded(true);
  return (
    <Box
      key={key}
      sx={{ height: '100%', minHeight: 0, overflow: 'auto', padding: '1rem 1.5rem 2rem', '& p': { maxWidth: '60rem' } }}
    >
      <Typography component="h1" variant="h1" sx={{ mb: '0.5rem' }}>
        Site
      </Typography>
      <Part title="The job">
        <Box sx={{ mb: '0.5rem', maxWidth: '60rem' }}>
          <JobText path="title" label="Title" />
        </Box>
        <Box sx={GRID}>
          <JobText path="preparedFor" label="Prepared for" />
          <JobText path="preparedBy" label="Prepared by" />
        </Box>
        <Box sx={{ mt: '0.75rem', maxWidth: '60rem' }}>
          <JobText path="notes" label="Notes" rows={3} help="Printed on the cover." />
        </Box>
      </Part>
      <Part title="Rule book" id="rule-book">
        <PracticeChoice />
        <Box sx={{ mt: '0.75rem', maxWidth: '40rem' }}>
          <Edition />
        </Box>
      </Part>
      <Part title="Place and air">
        <Box sx={GRID}>
          {[...airFigures, ...siteFigures, ...placeFlags].map(({ path }) => (
            <JobField key={path} path={path} />
          ))}
        </Box>
      </Part>
      <Part title="Sun">
        <SunTable />
      </Part>
      <Box sx={{ mt: '1.25rem' }}>
        <Folded
          title="Thresholds without a published source"
          aside={`${String(thresholds.length)}, each with its default`}
          open={unfolded}
        >
          <Box component="p" sx={{ color: 'var(--soft)', mt: 0, mb: '0.25rem' }}>
            Where the books are silent these decide. What is given here counts instead of the default.
          </Box>
          <Thresholds />
        </Folded>
      </Box>
    </Box>
  );
}

const GRID = {
  display: 'grid',
  gridTemplateColumns: 'repeat(auto-fit, minmax(min(100%, 16rem), 1fr))',
  gap: '1rem',
  maxWidth: '60rem',
} as const;

function Edition(): ReactElement {
  const books = useOpenJob(({ job }) => (job.practiceAssumed === true ? null : tables.practices[job.practice].books));
  const help =
    books === null ? 'Printed with every verdict.' : `Printed with every verdict. The figures here are from: ${books}.`;
  return <JobText path="practiceEdition" label="Edition in force, as it shall be printed" help={help} />;
}

interface PartProps {
  readonly title: string;
  readonly id?: string;
  readonly children: ReactNode;
}

function Part({ title, id, children }: PartProps): ReactElement {
  const made = useId();
  const heading = id ?? made;
  return (
    <Box
      component="section"
      aria-labelledby={heading}
      sx={{ borderTop: '1px solid var(--hair)', pt: '0.75rem', mt: '1rem' }}
    >
      <Typography component="h2" variant="h2" id={heading} sx={{ mb: '0.75rem' }}>
        {title}
      </Typography>
      {children}
    </Box>
  );
}
