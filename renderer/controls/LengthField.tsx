/** A length of cable. Where it is that of an out-and-back run, the person says which way it was measured, in two pictures. */
import { type ReactElement, useState } from 'react';
import { readLength, shownField, type Way } from '../../core/api.ts';
import { usePreferences } from '../state/preferences.ts';
import { Group, SmallButton } from './AskRow.tsx';
import type { QuantityFieldProps } from './QuantityField.tsx';
import { TypedField } from './TypedField.tsx';

export interface LengthFieldProps extends Omit<QuantityFieldProps, 'unit' | 'bare'> {
  /** `one-way` where that is what stands in the field; `ask` for a new run, of which nobody has said. */
  readonly way?: 'one-way' | 'ask';
}

export function LengthField({ way, given, onCommit, below, ...field }: LengthFieldProps): ReactElement {
  const first = usePreferences((preferences) => preferences.units);
  const [said, setSaid] = useState<Way | undefined>(way === 'ask' ? undefined : 'one-way');
  return (
    <TypedField
      {...field}
      shown={shownField({ given, unit: 'm', first })}
      read={(text, chosen) =>
        readLength({ text, way: chosen ?? (way === undefined ? 'one-way' : (said ?? 'unasked')), first })
      }
      onCommit={(reading) => {
        const trouble = onCommit(reading?.store, reading?.value);
        // What stands in the field from now on is the length one way.
        if (trouble === null && way !== undefined) setSaid('one-way');
        return trouble;
      }}
      below={
        way === undefined ? (
          below
        ) : (
          <>
            <WayToggle way={said} onChange={setSaid} />
            {below}
          </>
        )
      }
    />
  );
}

function WayToggle({
  way,
  onChange,
}: {
  readonly way: Way | undefined;
  readonly onChange: (way: Way) => void;
}): ReactElement {
  return (
    <Group
      aria-label="Which way the length is measured"
      style={{ display: 'flex', flexWrap: 'wrap', gap: '0.25rem', paddingTop: '0.25rem' }}
    >
      <SmallButton type="button" aria-pressed={way === 'one-way'} onClick={() => onChange('one-way')}>
        <WayPicture path="M3 8h19M18.5 5l3.5 3l-3.5 3" /> One way
      </SmallButton>
      <SmallButton type="button" aria-pressed={way === 'there-and-back'} onClick={() => onChange('there-and-back')}>
        <WayPicture path="M3 5h16a3 3 0 0 1 0 6H4M7.5 8L4 11l3.5 3" /> There and back
      </SmallButton>
    </Group>
  );
}

function WayPicture({ path }: { readonly path: string }): ReactElement {
  return (
    <svg
      aria-hidden
      viewBox="0 0 25 16"
      style={{ width: '1.5em', height: '1em', verticalAlign: '-0.125em', fill: 'none' }}
    >
      <path d={path} stroke="currentColor" strokeWidth="1.6" strokeLinecap="round" strokeLinejoin="round" />
    </svg>
  );
}
