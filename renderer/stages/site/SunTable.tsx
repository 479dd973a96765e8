/** Twelve months of sun, and the chart of them. */
import Box from '@mui/material/Box';
import type { ReactElement } from 'react';
import { type Draft, setTop } from '../../../core/api.ts';
import { SunChart } from '../../charts/SunChart.tsx';
import { MonthsField } from '../../controls/MonthsField.tsx';
import { takeEdit } from '../../controls/taken.ts';
import { useOpenJob } from '../../state/openJob.ts';

const PATH = 'site.irradiationKWhPerM2Day';

export function SunTable(): ReactElement {
  const months = useOpenJob(({ job }) => job.site.irradiationKWhPerM2Day);
  const given = useOpenJob(({ draft }) => givenMonths(draft));
  const key = useOpenJob((open) => open.key);
  return (
    <Box
      sx={{ display: 'grid', gridTemplateColumns: 'repeat(auto-fit, minmax(min(100%, 20rem), 1fr))', gap: '1rem 2rem' }}
    >
      <Box>
        <MonthsField
          key={key}
          label="Daily sun on level ground, mean of each month, kWh/m² a day"
          unit="kWh/m2/day"
          given={given}
          focusKey={PATH}
          onCommit={(numbers) => takeEdit(setTop({ path: PATH, value: numbers }))}
        />
        <Box sx={{ color: 'var(--soft)', fontSize: '0.875rem', mt: '0.5rem' }}>
          For what the array gives through the year. Twelve figures copied from a sheet can be pasted into any of the
          fields; none is ever taken as nought because it is empty.
        </Box>
      </Box>
      <SunChart months={months ?? NO_MONTHS} />
    </Box>
  );
}

const NO_MONTHS: readonly null[] = Array.from({ length: 12 }, () => null);

function givenMonths(draft: Draft): readonly (number | string)[] | undefined {
  const site = draft['site'] as { readonly irradiationKWhPerM2Day?: readonly (number | string)[] } | undefined;
  return site?.irradiationKWhPerM2Day;
}
