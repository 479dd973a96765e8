/** The job file itself, and the lists for the bench and the shop. */
import Box from '@mui/material/Box';
import Button from '@mui/material/Button';
import { type ReactElement, useState } from 'react';
import { draftText } from '../../../core/api.ts';
import type { ListKind } from '../../../core/host.ts';
import { download, downloadJob, saveJob } from '../../frame/saving.ts';
import { useOpenJob } from '../../state/openJob.ts';
import { useChannel, useSession } from '../../state/session.ts';

const ROW = { display: 'flex', flexWrap: 'wrap', gap: '0.5rem' } as const;

export function JobFile(): ReactElement {
  const channel = useChannel();
  const file = useOpenJob((open) => open.file);
  const about = useSession((session) => session.about);
  const asks = about?.can.askWhereToSave === true;
  return (
    <Box sx={{ display: 'grid', gap: '0.5rem' }}>
      <Box sx={{ overflowWrap: 'anywhere', color: 'var(--soft)' }}>
        {file === null ? 'Kept in the store of this program; not yet written to a file.' : `File: ${file}`}
      </Box>
      <Box sx={ROW}>
        <Button variant="outlined" onClick={() => void saveJob(channel, 'known')}>
          Save the job file
        </Button>
        {asks && (
          <Button variant="outlined" onClick={() => void saveJob(channel, 'ask')}>
            Save as …
          </Button>
        )}
        <Button variant="outlined" onClick={downloadJob}>
          Download the job file
        </Button>
      </Box>
    </Box>
  );
}

const LISTS: readonly (readonly [ListKind, string])[] = [
  ['cables', 'Cables, to cut'],
  ['fuses', 'Fuses and breakers'],
  ['parts', 'All parts'],
];

export function Lists(): ReactElement {
  const channel = useChannel();
  const [said, setSaid] = useState<{ readonly words: string; readonly isTrouble: boolean } | null>(null);
  const fetchList = async (list: ListKind): Promise<void> => {
    const answer = await channel.call('lists.csv', { text: draftText(useOpenJob.getState().draft), list });
    if (!answer.ok) return setSaid({ words: answer.trouble.message, isTrouble: true });
    download(answer.value.name, answer.value.csv, 'text/csv');
    setSaid({ words: `Downloaded ${answer.value.name}.`, isTrouble: false });
  };
  return (
    <Box sx={{ display: 'grid', gap: '0.5rem' }}>
      <Box sx={ROW}>
        {LISTS.map(([list, words]) => (
          <Button key={list} variant="outlined" onClick={() => void fetchList(list)}>
            {words}
          </Button>
        ))}
      </Box>
      {said !== null && (
        <Box role={said.isTrouble ? 'alert' : 'status'} sx={{ color: said.isTrouble ? 'var(--stop)' : 'var(--soft)' }}>
          {said.words}
        </Box>
      )}
    </Box>
  );
}
