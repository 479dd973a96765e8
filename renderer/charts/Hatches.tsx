/** Hatches that tell strings apart in grey as well as in colour; drawn once a page, used by number in every picture. */
import type { ReactElement } from 'react';

export type HatchNumber = 0 | 1 | 2 | 3 | 4 | 5 | 6 | 7;

/** Each in a square of eight: strokes from edge to edge, so that they join. */
const STROKES: Readonly<Record<HatchNumber, string>> = {
  0: 'M-2 2L2 -2M0 8L8 0M6 10L10 6',
  1: 'M4 0V8',
  2: 'M0 2H8M0 6H8',
  3: 'M0 0L8 8M0 8L8 0',
  4: 'M-2 6L2 10M0 0L8 8M6 -2L10 2',
  5: 'M0 4H8M4 0V8',
  6: 'M2 2h0.01M6 6h0.01',
  7: 'M0 2H4V6H8',
};

export function Hatches(): ReactElement {
  return (
    <svg width="0" height="0" aria-hidden style={{ position: 'absolute' }}>
      <defs>
        {Object.entries(STROKES).map(([number, path]) => (
          <pattern key={number} id={`hatch-${number}`} width="8" height="8" patternUnits="userSpaceOnUse">
            <rect width="8" height="8" fill="var(--sheet)" />
            <path
              d={path}
              fill="none"
              stroke="var(--ink)"
              strokeWidth={number === '6' ? 2.4 : 1.1}
              strokeLinecap={number === '6' ? 'round' : 'butt'}
            />
          </pattern>
        ))}
      </defs>
    </svg>
  );
}

export function hatchFill(hatch: HatchNumber): string {
  return `url(#hatch-${String(hatch)})`;
}

/** Dashes of lines by the same number, for charts over time. */
const DASHES: Readonly<Record<HatchNumber, string>> = {
  0: '',
  1: '7 3',
  2: '2 3',
  3: '9 3 2 3',
  4: '4 2',
  5: '12 4',
  6: '1 4',
  7: '9 2 2 2 2 2',
};

export function dashOf(hatch: HatchNumber): string {
  return DASHES[hatch];
}

/** A small square of the hatch with the tag beside it: the key of every picture. */
export function StringKey({ tag, hatch }: { readonly tag: string; readonly hatch: HatchNumber }): ReactElement {
  return (
    <span
      style={{ display: 'inline-flex', alignItems: 'baseline', gap: '0.375rem', whiteSpace: 'nowrap', fontWeight: 600 }}
    >
      <svg viewBox="0 0 16 16" aria-hidden style={{ width: '1em', height: '1em', flex: 'none', alignSelf: 'center' }}>
        <rect x="0.5" y="0.5" width="15" height="15" fill={hatchFill(hatch)} stroke="var(--ink)" />
      </svg>
      {tag}
    </span>
  );
}
