/** Starter patterns: invented jobs to change into one's own. */
import Box from '@mui/material/Box';
import ButtonBase from '@mui/material/ButtonBase';
import Typography from '@mui/material/Typography';
import type { ReactElement } from 'react';
import { examples } from '../../data/examples/index.ts';
import { startJob } from '../frame/openings.ts';
import { useChannel } from '../state/session.ts';

export function Patterns(): ReactElement {
  const channel = useChannel();
  return (
    <Box component="section" aria-labelledby="patterns-head">
      <Typography variant="h2" id="patterns-head" sx={{ mb: 0.5 }}>
        Start from a pattern
      </Typography>
      <Typography variant="body2" sx={{ color: 'var(--soft)', mb: 0.5 }}>
        Whole invented systems. Each opens as a copy of your own.
      </Typography>
      <Box component="ul" sx={{ listStyle: 'none', m: 0, p: 0 }}>
        {examples.map(({ name, title, oneLine, text }) => (
          <Box component="li" key={name} sx={{ borderTop: '1px solid var(--hair)' }}>
            <ButtonBase
              onClick={() => void startJob(channel, text, `Started from the pattern “${title}”`)}
              sx={{
                display: 'block',
                width: '100%',
                textAlign: 'left',
                px: 0.5,
                py: 0.75,
                '&:hover': { bgcolor: 'var(--lit)' },
              }}
            >
              <Box component="span" sx={{ display: 'block', fontWeight: 600 }}>
                {title}
              </Box>
              <Box component="span" sx={{ color: 'var(--soft)', fontSize: '0.875rem' }}>
                {oneLine}
              </Box>
            </ButtonBase>
          </Box>
        ))}
      </Box>
    </Box>
  );
}
