/** Cases without an operating point, told before all else: which load asks for too much, and the most that it could get. */
import Box from '@mui/material/Box';
import Button from '@mui/material/Button';
import type { ReactElement } from 'react';
import type { OperatingPoint, PartId } from '../../../core/api.ts';
import { answerLine, plainFields } from '../../../core/api.ts';
import { SeverityMark } from '../../controls/SeverityMark.tsx';
import { useOpenJob } from '../../state/openJob.ts';
import { useSession } from '../../state/session.ts';
import { caseWords, drawnParts } from './findingList.ts';

export function CaseTrouble({ points }: { readonly points: readonly OperatingPoint[] }): ReactElement | null {
  const job = useOpenJob(({ job }) => job);
  const unsolved = points.filter(
    (point) => point.case !== 'at-rest' && (point.outcome !== 'solved' || !point.proof.holds),
  );
  if (unsolved.length === 0) return null;
  return (
    <Box component="section" aria-label="Cases without an operating point" sx={{ mb: '1rem' }}>
      <Box component="h2" sx={{ m: 0, mb: '0.25rem', fontSize: '1.1875rem', fontWeight: 600 }}>
        {unsolved.length === 1 ? 'One case cannot be solved' : `${String(unsolved.length)} cases cannot be solved`}
      </Box>
      {unsolved.map((point) => (
        <Box
          key={point.case}
          sx={{ display: 'flex', gap: '0.5rem', borderTop: '1px solid var(--hair)', padding: '0.5rem 0.75rem' }}
        >
          <Box sx={{ flex: '0 0 5.5rem' }}>
            <SeverityMark severity="stop" />
          </Box>
          <Box>
            <strong>{caseWords(job, point.case)}.</strong>{' '}
            {plainFields(point.collapse?.message ?? answerLine(job, point))}
            <ShowCase point={point} />
          </Box>
        </Box>
      ))}
    </Box>
  );
}

function ShowCase({ point }: { readonly point: OperatingPoint }): ReactElement {
  const concerned: readonly PartId[] =
    point.collapse === undefined ? point.remarks.flatMap(({ parts }) => parts) : [point.collapse.load];
  const show = (): void => {
    const { job, light, select, chooseCase } = useOpenJob.getState();
    chooseCase(point.case);
    light(drawnParts(job, concerned));
    select({ parts: drawnParts(job, concerned).slice(0, 1) });
    useSession.getState().goStage('wiring');
  };
  return (
    <Button onClick={show} sx={{ marginLeft: '0.5rem', textDecoration: 'underline' }}>
      Show in the wiring<span className="only-read"> case {point.case}</span>
    </Button>
  );
}
