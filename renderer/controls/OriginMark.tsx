/** Where a figure comes from: measured, label, default or guess, each a small shape and a word; with a menu to say otherwise. */
import Popover from '@mui/material/Popover';
import { styled } from '@mui/material/styles';
import { type ReactElement, type ReactNode, useState } from 'react';
import type { Origin } from '../../core/api.ts';
import { Group } from './AskRow.tsx';
import { ORIGIN_MEANING } from './words.ts';

const SHAPES: Readonly<Record<Origin, string>> = {
  // A scale with its ticks.
  measured: 'M1 10.5h12M1 10.5v-6M4 10.5v-3M7 10.5v-6M10 10.5v-3M13 10.5v-6',
  // A tag with a hole.
  label: 'M1.5 3h6.5l4.5 4l-4.5 4h-6.5ZM9 7h.01',
  // An open ring.
  default: 'M7 2.5a4.5 4.5 0 1 0 .01 0Z',
  // A line that cannot make up its mind.
  guess: 'M1 8.5c2-5 4-5 6-1.5s4 3.500 6-1.500',
};

const ORIGINS: readonly Origin[] = ['measured', 'label', 'default', 'guess'];

const Mark = styled('span')({
  display: 'inline-flex',
  alignItems: 'center',
  gap: '0.25rem',
  fontSize: '0.8125rem',
  lineHeight: '1.5rem',
  color: 'var(--soft)',
  whiteSpace: 'nowrap',
  '&[data-measured]': { color: 'var(--ink)' },
});

const MarkButton = styled('button')({
  padding: '0 0.25rem',
  minHeight: '1.5rem',
  minWidth: '1.5rem',
  border: 0,
  borderRadius: 3,
  background: 'transparent',
  font: 'inherit',
  cursor: 'pointer',
  '&:hover': { background: 'var(--lit)' },
  '@media (pointer: coarse)': { minHeight: 44, minWidth: 44 },
});

export interface OriginMarkProps {
  readonly origin: Origin;
  /** Of which figure, for whoever cannot see it. */
  readonly of?: string;
  /** Low and high as text: `1.8 to 2.6 mΩ`. */
  readonly range?: string | undefined;
  /** Makes the mark a button that opens a menu. */
  readonly onChange?: (origin: Origin) => void;
  /** What else the menu holds, such as the fields of the range. */
  readonly more?: ReactNode;
}

export function OriginMark({ origin, of, range, onChange, more }: OriginMarkProps): ReactElement {
  const [anchor, setAnchor] = useState<HTMLElement | null>(null);
  const mark = <OriginShape origin={origin} range={range} />;
  if (onChange === undefined) return mark;
  const name = of === undefined ? 'the figure' : of;
  return (
    <>
      <MarkButton
        type="button"
        aria-haspopup="dialog"
        aria-label={`${ORIGIN_MEANING[origin].word}: where ${name} comes from`}
        onClick={(event) => setAnchor(event.currentTarget)}
      >
        {mark}
      </MarkButton>
      <Popover
        open={anchor !== null}
        anchorEl={anchor}
        onClose={() => setAnchor(null)}
        anchorOrigin={{ vertical: 'bottom', horizontal: 'right' }}
        transformOrigin={{ vertical: 'top', horizontal: 'right' }}
        slotProps={{
          paper: {
            role: 'dialog',
            'aria-label': `Where ${name} comes from`,
            sx: { p: 1.5, width: 'min(20rem, 90vw)' },
          },
        }}
      >
        <Group aria-label={`Where ${name} comes from`}>
          {ORIGINS.map((one) => (
            <label
              key={one}
              style={{
                display: 'flex',
                gap: '0.5rem',
                alignItems: 'baseline',
                paddingBlock: '0.25rem',
                fontSize: '0.875rem',
              }}
            >
              <input
                type="radio"
                name="origin"
                checked={one === origin}
                onChange={() => onChange(one)}
                style={{ accentColor: 'var(--copper)' }}
              />
              <span>
                <OriginShape origin={one} />
                <span style={{ color: 'var(--soft)' }}>{` ${ORIGIN_MEANING[one].meaning}`}</span>
              </span>
            </label>
          ))}
        </Group>
        {more}
      </Popover>
    </>
  );
}

function OriginShape({
  origin,
  range,
}: {
  readonly origin: Origin;
  readonly range?: string | undefined;
}): ReactElement {
  return (
    <Mark data-measured={origin === 'measured' ? '' : undefined}>
      <svg
        aria-hidden
        viewBox="0 0 14 14"
        style={{ width: '0.875rem', height: '0.875rem', flex: 'none', fill: 'none' }}
      >
        <path d={SHAPES[origin]} stroke="currentColor" strokeWidth="1.4" strokeLinecap="round" strokeLinejoin="round" />
      </svg>
      {ORIGIN_MEANING[origin].word}
      {range !== undefined && <span>{` ${range}`}</span>}
    </Mark>
  );
}
