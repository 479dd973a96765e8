/**
 * How much room the page has, measured in the person's own text size: large text on a wide screen is as narrow as a small screen.
 * `wide`: spine, stage and ledger side by side; `narrow`: the same with less said; `tight`: the spine lies above, the ledger is
 * called up.
 */
import { useSyncExternalStore } from 'react';
import { usePreferences } from '../state/preferences.ts';

export type Room = 'wide' | 'narrow' | 'tight';

const WIDE_REM = 72;
const NARROW_REM = 52;
/** Of browsers, before any preference. */
const USUAL_TEXT_PX = 16;

export function useRoom(): Room {
  const textPercent = usePreferences((preferences) => preferences.textPercent);
  const widthPx = useSyncExternalStore(listen, () => window.innerWidth);
  const widthRem = widthPx / ((USUAL_TEXT_PX * textPercent) / 100);
  if (widthRem >= WIDE_REM) return 'wide';
  return widthRem >= NARROW_REM ? 'narrow' : 'tight';
}

function listen(onChange: () => void): () => void {
  window.addEventListener('resize', onChange);
  return () => window.removeEventListener('resize', onChange);
}
