/** The findings that go with a change, or come by it. */
import Box from '@mui/material/Box';
import type { ReactElement } from 'react';
import type { Finding } from '../../../core/api.ts';
import { plainFields } from '../../../core/api.ts';
import { SeverityMark } from '../../controls/SeverityMark.tsx';
import { findingName } from './findingList.ts';

export interface FindingsMovedProps {
  readonly title: string;
  readonly findings: readonly Finding[];
  /** The finding whose remedy was tried: it is named so. */
  readonly itself?: Finding;
  /** Said where there are none. */
  readonly none: string;
}

export function FindingsMoved({ title, findings, itself, none }: FindingsMovedProps): ReactElement {
  if (findings.length === 0) return <Box sx={{ color: 'var(--soft)' }}>{none}</Box>;
  const own = itself === undefined ? null : findingName(itself);
  return (
    <Box>
      <Box component="span" sx={{ color: 'var(--soft)' }}>
        {title}:
      </Box>
      <Box component="ul" sx={{ m: 0, p: 0, listStyle: 'none' }}>
        {findings.map((finding) => (
          <Box
            component="li"
            key={`${findingName(finding)} ${finding.message}`}
            sx={{ display: 'flex', gap: '0.5rem', alignItems: 'baseline' }}
          >
            <SeverityMark severity={finding.severity} />
            <span>{findingName(finding) === own ? 'this finding' : plainFields(finding.message)}</span>
          </Box>
        ))}
      </Box>
    </Box>
  );
}
