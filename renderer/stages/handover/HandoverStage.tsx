/** The paper and the files that the job is handed over with. */
import Box from '@mui/material/Box';
import Typography from '@mui/material/Typography';
import { type ReactElement, type ReactNode, useId, useState } from 'react';
import { CautionStrip } from '../../controls/CautionStrip.tsx';
import { ChoiceField } from '../../controls/ChoiceField.tsx';
import { FieldBox, FieldRow } from '../../controls/FieldRow.tsx';
import { useOpenJob } from '../../state/openJob.ts';
import { changePreferences, usePreferences } from '../../state/preferences.ts';
import { useChannel, useSession } from '../../state/session.ts';
import { JobText } from '../site/JobText.tsx';
import { JobFile, Lists } from './JobFile.tsx';
import { OpenMatters } from './OpenMatters.tsx';
import { PaperPreview } from './PaperPreview.tsx';
import { PdfDesk } from './PdfDesk.tsx';
import { usePaper } from './usePaper.ts';
import { usePdf } from './usePdf.ts';

const CAUTIONS: readonly string[] = [
  'This paper is arithmetic on the figures that were entered. Local code governs; hand it to the licensed person who signs for the work before anything is energised.',
  'What is marked as assumed, from memory or not done has to be confirmed by that person.',
  'Whoever works by it proves dead at the place of work first: batteries and arrays stay live with every switch open.',
];

export function HandoverStage(): ReactElement {
  const programVersion = useSession((session) => session.about?.version ?? '');
  const paper = usePreferences((preferences) => preferences.paper);
  const [preparedOn, setPreparedOn] = useState(today);
  const preview = usePaper({ paper, preparedOn, programVersion });
  const pdf = usePdf({ paper, preparedOn });
  const generation = useOpenJob((open) => open.generation);
  const isCurrent =
    pdf.made?.generation === generation && pdf.made.paper === paper && pdf.made.preparedOn === preparedOn;
  return (
    <Box sx={{ height: '100%', minHeight: 0, overflow: 'auto', padding: '1rem 1.5rem 2rem' }}>
      <Typography component="h1" variant="h1" sx={{ mb: '0.5rem' }}>
        Handover
      </Typography>
      <CautionStrip title="Before it is handed on" texts={CAUTIONS} />
      <Box sx={{ display: 'flex', flexWrap: 'wrap', gap: '1rem 2rem', alignItems: 'flex-start', mt: '0.75rem' }}>
        <Box sx={{ flex: '1 1 18rem', minWidth: 0, maxWidth: '26rem', display: 'grid', gap: '1rem' }}>
          <Part title="Still open">
            <OpenMatters />
          </Part>
          <Part title="The paper">
            <Box sx={{ display: 'grid', gap: '0.375rem', containerType: 'inline-size' }}>
              <PaperSize />
              <PreparedOn value={preparedOn} onChange={setPreparedOn} />
              <JobText path="preparedFor" label="Prepared for" />
              <JobText path="preparedBy" label="Prepared by" />
              <JobText path="practiceEdition" label="Edition in force, as printed" />
              <PdfDesk pdf={pdf} paper={paper} preparedOn={preparedOn} />
            </Box>
          </Part>
          <Part title="The job file">
            <JobFile />
          </Part>
          <Part title="Lists as tables (CSV)">
            <Lists />
          </Part>
        </Box>
        <Box sx={{ flex: '999 1 30rem', minWidth: 0 }}>
          <PaperPreview paper={preview} made={isCurrent ? pdf.made : null} />
        </Box>
      </Box>
    </Box>
  );
}

function PaperSize(): ReactElement {
  const channel = useChannel();
  const paper = usePreferences((preferences) => preferences.paper);
  return (
    <ChoiceField
      label="Paper"
      value={paper}
      of={['A4', 'Letter']}
      required
      onCommit={(chosen) => {
        changePreferences(channel, { paper: chosen === 'Letter' ? 'Letter' : 'A4' });
        return null;
      }}
    />
  );
}

function PreparedOn({
  value,
  onChange,
}: {
  readonly value: string;
  readonly onChange: (day: string) => void;
}): ReactElement {
  const id = useId();
  return (
    <FieldRow
      label="Date printed"
      htmlFor={id}
      control={
        <FieldBox>
          <input
            id={id}
            type="date"
            value={value}
            onChange={({ target }) => onChange(target.value === '' ? today() : target.value)}
          />
        </FieldBox>
      }
    />
  );
}

/** The person's own day, as `2025-03-31`. */
function today(): string {
  const now = new Date();
  const two = (number: number): string => String(number).padStart(2, '0');
  return `${String(now.getFullYear())}-${two(now.getMonth() + 1)}-${two(now.getDate())}`;
}

function Part({ title, children }: { readonly title: string; readonly children: ReactNode }): ReactElement {
  const heading = useId();
  return (
    <Box component="section" aria-labelledby={heading} sx={{ borderTop: '1px solid var(--hair)', pt: '0.5rem' }}>
      <Typography component="h2" variant="h2" id={heading} sx={{ mb: '0.5rem' }}>
        {title}
      </Typography>
      {children}
    </Box>
  );
}
