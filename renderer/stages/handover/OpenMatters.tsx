/** What is still open, told before printing; it stands in the paper and stops no one from printing. */
import Box from '@mui/material/Box';
import Button from '@mui/material/Button';
import type { ReactElement } from 'react';
import { SEVERITY_WORDS } from '../../../core/api.ts';
import { NotDoneMark, SeverityMark } from '../../controls/SeverityMark.tsx';
import { useOpenJob } from '../../state/openJob.ts';
import { useSession } from '../../state/session.ts';

export function OpenMatters(): ReactElement {
  const answers = useOpenJob(({ answers }) => answers);
  const goStage = useSession((session) => session.goStage);
  if (answers === null) return <Box sx={{ color: 'var(--soft)' }}>The job is being solved …</Box>;
  const { findings, notChecked } = answers.report;
  const open = (['stop', 'fix'] as const).map((severity) => ({
    severity,
    count: findings.filter((finding) => finding.severity === severity).length,
  }));
  const isClear = notChecked.length === 0 && open.every(({ count }) => count === 0);
  if (isClear) return <Box>No finding to stop for or to fix, and every check had its figures.</Box>;
  return (
    <Box>
      <Box component="ul" sx={{ m: 0, p: 0, listStyle: 'none' }}>
        {open
          .filter(({ count }) => count > 0)
          .map(({ severity, count }) => (
            <Box component="li" key={severity} sx={LINE}>
              <SeverityMark severity={severity} />
              <span>
                {count} open: {SEVERITY_WORDS[severity].meaning}
              </span>
            </Box>
          ))}
        {notChecked.length > 0 && (
          <Box component="li" sx={LINE}>
            <NotDoneMark />
            <span>
              {notChecked.length === 1 ? '1 check was' : `${String(notChecked.length)} checks were`} not done for want
              of a figure
            </span>
          </Box>
        )}
      </Box>
      <Box sx={{ color: 'var(--soft)', mt: '0.25rem' }}>All of it stands in the paper.</Box>
      <Button variant="outlined" sx={{ mt: '0.375rem' }} onClick={() => goStage('findings')}>
        Go to the findings
      </Button>
    </Box>
  );
}

const LINE = {
  display: 'grid',
  gridTemplateColumns: '5rem minmax(0, 1fr)',
  gap: '0.5rem',
  padding: '0.125rem 0',
} as const;
