/** Arrow keys, Home and End walk through the headers of a list. */
import type { KeyboardEvent } from 'react';

const STEPS: Readonly<Record<string, number>> = {
  ArrowDown: 1,
  ArrowUp: -1,
  Home: Number.NEGATIVE_INFINITY,
  End: Number.POSITIVE_INFINITY,
};

/** Moves the focus among the elements of a list that match; any other key, or a key elsewhere, is left alone. */
export function stepIn(event: KeyboardEvent, list: HTMLElement | null, headers: string): void {
  const step = STEPS[event.key];
  const all = [...(list?.querySelectorAll<HTMLElement>(headers) ?? [])];
  const at = all.indexOf(event.target as HTMLElement);
  if (step === undefined || at < 0) return;
  event.preventDefault();
  const to = Number.isFinite(step) ? at + step : step > 0 ? all.length - 1 : 0;
  all[Math.max(0, Math.min(all.length - 1, to))]?.focus();
}
