/** What was compared and held, folded. */
import Box from '@mui/material/Box';
import type { ReactElement } from 'react';
import type { Passed } from '../../../core/api.ts';
import { checkRules, plainFields, sentenceCase } from '../../../core/api.ts';

export function PassedList({ passed }: { readonly passed: readonly Passed[] }): ReactElement {
  if (passed.length === 0) return <Box sx={{ color: 'var(--soft)' }}>No comparison was made that held.</Box>;
  return (
    <Box
      component="table"
      sx={{ borderCollapse: 'collapse', '& td, & th': { padding: '0.25rem 0.75rem', textAlign: 'left' } }}
    >
      <thead>
        <tr>
          <Box component="th" scope="col" sx={{ fontWeight: 600 }}>
            Times
          </Box>
          <Box component="th" scope="col" sx={{ fontWeight: 600 }}>
            What was compared
          </Box>
        </tr>
      </thead>
      <tbody>
        {passed.map(({ rule, count }) => (
          <Box component="tr" key={rule} sx={{ borderTop: '1px solid var(--hair)' }}>
            <Box component="td" sx={{ fontVariantNumeric: 'tabular-nums' }}>
              {count}
            </Box>
            <td>{comparedBy(rule)}</td>
          </Box>
        ))}
      </tbody>
    </Box>
  );
}

function comparedBy(id: string): string {
  return sentenceCase(plainFields(checkRules.find((rule) => rule.id === id)?.compares ?? id));
}
