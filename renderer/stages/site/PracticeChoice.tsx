/** Which rule book judges the job: four, each with what it is and who goes by it. */
import Box from '@mui/material/Box';
import Radio from '@mui/material/Radio';
import { type ReactElement, type Ref, useId, useRef, useState } from 'react';
import { setTop } from '../../../core/api.ts';
import { takeEdit } from '../../controls/taken.ts';
import { useFocusField } from '../../controls/useFocusField.ts';
import { useOpenJob } from '../../state/openJob.ts';
import { type PracticeWords, practiceWords } from './practiceWords.ts';

export function PracticeChoice(): ReactElement {
  const chosen = useOpenJob(({ job }) => (job.practiceAssumed === true ? null : job.practice));
  const [refused, setRefused] = useState<string | null>(null);
  const name = useId();
  const first = useRef<HTMLInputElement>(null);
  useFocusField('practice', first);
  const at = Math.max(
    0,
    practiceWords.findIndex(({ practice }) => practice === chosen),
  );
  return (
    <Box>
      <Box
        role="radiogroup"
        aria-label="Rule book that judges this job"
        sx={{
          display: 'grid',
          gridTemplateColumns: 'repeat(auto-fit, minmax(min(100%, 22rem), 1fr))',
          columnGap: '1.5rem',
        }}
      >
        {practiceWords.map((words, index) => (
          <Offer
            key={words.practice}
            words={words}
            group={name}
            checked={chosen === words.practice}
            inputRef={index === at ? first : null}
            onChoose={() => setRefused(takeEdit(setTop({ path: 'practice', value: words.practice })))}
          />
        ))}
      </Box>
      <Box component="p" sx={{ color: 'var(--soft)', mt: '0.5rem', mb: 0 }}>
        The edition adopted where the system stands governs, with its local amendments. Who signs for the work confirms
        the figures against that text.
      </Box>
      {refused !== null && (
        <Box role="alert" sx={{ color: 'var(--stop)' }}>
          {refused}
        </Box>
      )}
    </Box>
  );
}

interface OfferProps {
  readonly words: PracticeWords;
  readonly group: string;
  readonly checked: boolean;
  readonly inputRef: Ref<HTMLInputElement>;
  readonly onChoose: () => void;
}

function Offer({ words, group, checked, inputRef, onChoose }: OfferProps): ReactElement {
  return (
    <Box
      component="label"
      sx={{
        display: 'grid',
        gridTemplateColumns: 'auto minmax(0, 1fr)',
        gap: '0.25rem',
        alignItems: 'start',
        cursor: 'pointer',
        borderTop: '1px solid var(--hair)',
        padding: '0.375rem 0.5rem',
        backgroundColor: checked ? 'var(--lit)' : 'transparent',
        '&:focus-within': { outline: '2px solid var(--volt)', outlineOffset: -2 },
      }}
    >
      <Radio
        size="small"
        name={group}
        value={words.practice}
        checked={checked}
        onChange={onChoose}
        sx={{ padding: '0.25rem', '@media (pointer: coarse)': { minWidth: 44, minHeight: 44 } }}
        slotProps={{ input: { ref: inputRef } }}
      />
      <span>
        <strong>{words.name}</strong>
        <Box component="span" sx={{ display: 'block' }}>
          {words.books}
        </Box>
        <Box component="span" sx={{ display: 'block', color: 'var(--soft)' }}>
          {words.who}
        </Box>
      </span>
    </Box>
  );
}
