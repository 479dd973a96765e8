/** The few icons of the frame, drawn by us in one line width; always with a word beside or behind them. */
import SvgIcon from '@mui/material/SvgIcon';
import type { ReactElement } from 'react';

function Drawn({ path }: { readonly path: string }): ReactElement {
  return (
    <SvgIcon viewBox="0 0 20 20" fontSize="small" aria-hidden sx={{ fill: 'none' }}>
      <path d={path} stroke="currentColor" strokeWidth="1.6" strokeLinecap="round" strokeLinejoin="round" />
    </SvgIcon>
  );
}

/** A bow back to the left. */
export function UndoIcon(): ReactElement {
  return <Drawn path="M4 8h8.5a4 4 0 0 1 0 8H8M4 8l3.5-3.5M4 8l3.5 3.5" />;
}
/** A bow on to the right. */
export function RedoIcon(): ReactElement {
  return <Drawn path="M16 8H7.5a4 4 0 0 0 0 8H12M16 8l-3.5-3.5M16 8l-3.5 3.5" />;
}
/** A glass. */
export function FindIcon(): ReactElement {
  return <Drawn path="M13 13l4 4M3.5 8.5a5 5 0 1 0 10 0a5 5 0 1 0-10 0" />;
}
/** A clock face with a hand going back. */
export function HistoryIcon(): ReactElement {
  return <Drawn path="M3.5 10a6.5 6.5 0 1 0 2-4.7M3.5 3.5v3h3M10 6.5V10l2.5 1.5" />;
}
/** Two levels with a slide each. */
export function SettingsIcon(): ReactElement {
  return <Drawn path="M3 6.5h6M13 6.5h4M3 13.5h3M10 13.5h7M9 4.5v4M10 11.5v4M13 4.5v4M6 11.5v4" />;
}
/** A sheet going into a tray. */
export function SaveIcon(): ReactElement {
  return <Drawn path="M10 3v8M6.5 8l3.5 3.5L13.5 8M4 12.5v4h12v-4" />;
}
/** A sheet with a line back. */
export function JobsIcon(): ReactElement {
  return <Drawn path="M4 4.5h12M4 10h12M4 15.5h7" />;
}
