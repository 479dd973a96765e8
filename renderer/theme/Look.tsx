/** Puts the theme, the custom properties and the text size round everything below it. */

import CssBaseline from '@mui/material/CssBaseline';
import GlobalStyles from '@mui/material/GlobalStyles';
import { ThemeProvider } from '@mui/material/styles';
import useMediaQuery from '@mui/material/useMediaQuery';
import { type ReactElement, type ReactNode, useMemo } from 'react';
import { usePreferences } from '../state/preferences.ts';
import { themeFrom } from './theme.ts';
import { customProperties, day, night } from './tokens.ts';

export function Look({ children }: { readonly children: ReactNode }): ReactElement {
  const { theme: wanted, textPercent, motion } = usePreferences();
  const systemDark = useMediaQuery('(prefers-color-scheme: dark)', { noSsr: true });
  const systemCalm = useMediaQuery('(prefers-reduced-motion: reduce)', { noSsr: true });
  const mode = wanted === 'system' ? (systemDark ? 'dark' : 'light') : wanted;
  const calm = motion === 'reduced' || systemCalm;
  const tokens = mode === 'dark' ? night : day;
  const theme = useMemo(() => themeFrom(tokens, mode, calm), [tokens, mode, calm]);
  return (
    <ThemeProvider theme={theme}>
      <CssBaseline />
      <GlobalStyles
        styles={{
          ':root': { ...customProperties(tokens), colorScheme: mode, fontSize: `${String(textPercent)}%` },
          'html, body, #page': { height: '100%' },
          body: { overflow: 'hidden' },
          ':focus-visible': { outline: `2px solid ${tokens.volt}`, outlineOffset: 2 },
          '.only-read': {
            position: 'absolute',
            width: 1,
            height: 1,
            overflow: 'hidden',
            clipPath: 'inset(50%)',
            whiteSpace: 'nowrap',
          },
          ...(calm
            ? { '*, *::before, *::after': { animation: 'none !important', transition: 'none !important' } }
            : {}),
        }}
      />
      {children}
    </ThemeProvider>
  );
}
