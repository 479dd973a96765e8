/** Making, saving, fetching and opening the PDF. */
import Box from '@mui/material/Box';
import Button from '@mui/material/Button';
import LinearProgress from '@mui/material/LinearProgress';
import { type ReactElement, useEffect, useState } from 'react';
import { download } from '../../frame/saving.ts';
import { useOpenJob } from '../../state/openJob.ts';
import { useSession } from '../../state/session.ts';
import { pdfPages } from './pdfPages.ts';
import type { MadePdf, Pdf } from './usePdf.ts';

export interface PdfDeskProps {
  readonly pdf: Pdf;
  readonly paper: MadePdf['paper'];
  readonly preparedOn: string;
}

export function PdfDesk({ pdf, paper, preparedOn }: PdfDeskProps): ReactElement {
  const about = useSession((session) => session.about);
  const { busy, made, written, trouble } = pdf;
  const generation = useOpenJob((open) => open.generation);
  const isCurrent =
    made !== null && made.generation === generation && made.paper === paper && made.preparedOn === preparedOn;
  return (
    <Box sx={{ display: 'grid', gap: '0.5rem' }}>
      <Box sx={{ display: 'flex', flexWrap: 'wrap', gap: '0.5rem' }}>
        <Button variant={isCurrent ? 'outlined' : 'contained'} disabled={busy !== null} onClick={() => void pdf.make()}>
          Make the PDF
        </Button>
        <Button variant={isCurrent ? 'contained' : 'outlined'} disabled={busy !== null} onClick={() => void pdf.save()}>
          Save the PDF
        </Button>
        {made !== null && isCurrent && about?.kind === 'browser' && (
          <Button variant="outlined" onClick={() => download(made.name, made.bytes, 'application/pdf')}>
            Download the PDF
          </Button>
        )}
        {written !== null && about?.can.showFile === true && (
          <Button variant="outlined" onClick={() => void pdf.show()}>
            Open it
          </Button>
        )}
      </Box>
      {busy !== null && <Working what={busy} onLeave={pdf.leaveOff} />}
      <Box component="output" aria-live="polite" sx={{ display: 'block', overflowWrap: 'anywhere' }}>
        {written !== null && <Box>Saved as {written.path}</Box>}
        {made !== null &&
          busy === null &&
          (isCurrent ? <MadeWords made={made} /> : 'The job or the paper has changed since the PDF was made.')}
      </Box>
      {trouble !== null && (
        <Box role="alert" sx={{ color: 'var(--stop)' }}>
          {trouble}
        </Box>
      )}
    </Box>
  );
}

function MadeWords({ made }: { readonly made: MadePdf }): ReactElement {
  const { total } = pdfPages(made.bytes, []);
  const size = `${String(Math.ceil(made.bytes.length / 1024))} kB`;
  return (
    <Box>
      Made: {made.name}, {total} {total === 1 ? 'page' : 'pages'}, {size}.
    </Box>
  );
}

/** Shorter work needs no bar. */
const WORTH_A_BAR_MS = 300;

function Working({
  what,
  onLeave,
}: {
  readonly what: 'making' | 'saving';
  readonly onLeave: () => void;
}): ReactElement | null {
  const [long, setLong] = useState(false);
  useEffect(() => {
    const timer = setTimeout(() => setLong(true), WORTH_A_BAR_MS);
    return () => clearTimeout(timer);
  }, []);
  if (!long) return null;
  return (
    <Box sx={{ display: 'flex', alignItems: 'center', gap: '0.75rem' }}>
      <LinearProgress aria-label={what === 'making' ? 'Making the PDF' : 'Saving the PDF'} sx={{ flex: 1 }} />
      {what === 'making' && (
        <Button variant="outlined" onClick={onLeave}>
          Stop waiting
        </Button>
      )}
    </Box>
  );
}
