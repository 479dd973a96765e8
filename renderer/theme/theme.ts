/** The component library made ours: paper and ink, hairlines for edges, one typeface, no shadows. */
import { createTheme, type Theme } from '@mui/material/styles';
import type { Tokens } from './tokens.ts';

export function themeFrom(tokens: Tokens, mode: 'light' | 'dark', calm: boolean): Theme {
  const hairline = `1px solid ${tokens.hair}`;
  return createTheme({
    palette: {
      mode,
      primary: { main: tokens.copper, contrastText: tokens.onCopper },
      secondary: { main: tokens.volt },
      error: { main: tokens.stop },
      warning: { main: tokens.fix },
      info: { main: tokens.look },
      background: { default: tokens.ground, paper: tokens.sheet },
      text: { primary: tokens.ink, secondary: tokens.soft, disabled: tokens.soft },
      divider: tokens.hair,
    },
    shape: { borderRadius: 3 },
    shadows: Array.from({ length: 25 }, () => 'none') as Theme['shadows'],
    typography: {
      fontFamily: "'Source Sans 3', sans-serif",
      fontSize: 14,
      h1: { fontSize: '1.5rem', fontWeight: 600, lineHeight: 1.25 },
      h2: { fontSize: '1.1875rem', fontWeight: 600, lineHeight: 1.3 },
      h3: { fontSize: '1rem', fontWeight: 600, lineHeight: 1.4 },
      body1: { fontSize: '0.9375rem', lineHeight: 1.45 },
      body2: { fontSize: '0.875rem', lineHeight: 1.45 },
      caption: { fontSize: '0.8125rem', lineHeight: 1.4, color: tokens.soft },
      button: { textTransform: 'none', fontWeight: 600, fontSize: '0.9375rem' },
    },
    transitions: calm ? { create: () => 'none' } : {},
    components: {
      MuiButtonBase: {
        defaultProps: { disableRipple: true },
        styleOverrides: { root: { fontFamily: 'inherit', fontSize: 'inherit' } },
      },
      MuiButton: {
        defaultProps: { disableElevation: true, size: 'small' },
        styleOverrides: {
          root: {
            minHeight: '2rem',
            paddingInline: '0.75rem',
            '&.Mui-focusVisible': { outline: `2px solid ${tokens.volt}`, outlineOffset: 2 },
            '@media (pointer: coarse)': { minHeight: 44, minWidth: 44 },
          },
          outlined: { borderColor: tokens.edge, color: tokens.ink },
          text: { color: tokens.ink },
        },
      },
      MuiIconButton: {
        styleOverrides: {
          root: {
            borderRadius: 3,
            color: tokens.ink,
            '&.Mui-focusVisible': { outline: `2px solid ${tokens.volt}`, outlineOffset: 2 },
            '@media (pointer: coarse)': { minHeight: 44, minWidth: 44 },
          },
        },
      },
      MuiPaper: { styleOverrides: { root: { backgroundImage: 'none' } } },
      MuiMenu: { styleOverrides: { paper: { border: `1px solid ${tokens.edge}` } } },
      MuiMenuItem: {
        styleOverrides: {
          root: {
            fontSize: '0.9375rem',
            '&.Mui-focusVisible': { backgroundColor: tokens.lit },
            '@media (pointer: coarse)': { minHeight: 44 },
          },
        },
      },
      MuiPopover: { styleOverrides: { paper: { border: `1px solid ${tokens.edge}` } } },
      MuiDialog: { styleOverrides: { paper: { border: `1px solid ${tokens.edge}` } } },
      MuiOutlinedInput: {
        styleOverrides: {
          root: { backgroundColor: tokens.sheet },
          notchedOutline: { borderColor: tokens.edge },
          input: { paddingBlock: '0.4rem', paddingInline: '0.5rem' },
        },
      },
      MuiInputLabel: { styleOverrides: { root: { color: tokens.soft } } },
      MuiTextField: { defaultProps: { size: 'small' } },
      MuiSelect: { defaultProps: { size: 'small' } },
      MuiTooltip: {
        defaultProps: { describeChild: true, enterDelay: 500 },
        styleOverrides: {
          tooltip: { backgroundColor: tokens.ink, color: tokens.ground, fontSize: '0.8125rem' },
        },
      },
      MuiTableCell: { styleOverrides: { root: { borderBottom: hairline, paddingBlock: '0.25rem' } } },
      MuiAccordion: { defaultProps: { disableGutters: true, square: true } },
    },
  });
}
