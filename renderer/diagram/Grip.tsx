/**
 * What the keyboard stops at and a hand takes hold of: as large as its part, but never smaller on the screen than a hand can hit, however
 * small the drawing stands.
 */
import type { ReactElement } from 'react';
import type { PartId } from '../../core/api.ts';
import { useGripShifts } from './gripPlaces.ts';
import { useLive } from './live.ts';

export function Grip({ part, selected }: { readonly part: PartId; readonly selected: boolean }): ReactElement {
  const spoken = useLive((now) => now.parts.get(part)?.spoken ?? part);
  const shift = useGripShifts(({ shifts }) => shifts.get(part));
  return (
    // biome-ignore lint/a11y/useSemanticElements: the canvas takes hold of it to drag, which a button of HTML does not allow everywhere
    <div
      role="button"
      tabIndex={0}
      className="grip"
      aria-label={spoken}
      aria-pressed={selected}
      style={shift === undefined ? {} : { translate: `${String(shift.x)}px ${String(shift.y)}px` }}
    />
  );
}

/** Gives the keyboard to the grip of a node of the canvas. */
export function focusGrip(node: Element | null | undefined): void {
  const grip = node?.querySelector<HTMLElement>('.grip') ?? node;
  if (grip instanceof HTMLElement) grip.focus({ preventScroll: true });
}
