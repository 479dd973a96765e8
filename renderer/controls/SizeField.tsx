/** A conductor size, typed or picked from the sizes of the tables; what it is in the other system stands in grey. */
import Menu from '@mui/material/Menu';
import MenuItem from '@mui/material/MenuItem';
import { styled } from '@mui/material/styles';
import { type ReactElement, useState } from 'react';
import {
  type ConductorSize,
  type Metal,
  type Practice,
  parseSize,
  readSizeField,
  type SizeEcho,
  type Stranding,
  sizeEcho,
  sizeText,
  usualSizes,
} from '../../core/api.ts';
import { tables } from '../../data/index.ts';
import { usePreferences } from '../state/preferences.ts';
import { type FieldProps, TypedField } from './TypedField.tsx';
import type { Taken } from './taken.ts';

export interface SizeFieldProps extends FieldProps {
  /** As the job file holds it. */
  readonly given: string | undefined;
  /** How the conductor is made, as far as the job says. */
  readonly make: { readonly metal: Metal | undefined; readonly stranding: Stranding | undefined };
  readonly practice: Practice;
  readonly onCommit: (store: string | undefined) => Taken;
}

export function SizeField({ given, make, practice, onCommit, ...field }: SizeFieldProps): ReactElement {
  const context = { practice, tables: tables.conductors };
  const echoOfSize = (size: ConductorSize): SizeEcho => sizeEcho({ size, ...make }, context);
  const parsed = given === undefined ? undefined : parseSize(given);
  const echo = parsed?.ok === true ? echoOfSize(parsed.value) : { short: '', detail: '' };
  const words = [echo.short, echo.detail].filter((text) => text !== '').join('. ');
  return (
    <TypedField
      {...field}
      shown={{ text: given ?? '', sign: '', echo: words }}
      read={readSizeField}
      onCommit={(reading) => onCommit(reading === undefined ? undefined : String(reading.store))}
      after={
        <SizePicker
          name={field.label}
          echoOfSize={echoOfSize}
          practice={practice}
          onPick={(size) => onCommit(sizeText(size).replace('mm²', 'mm2'))}
        />
      }
    />
  );
}

const PickerButton = styled('button')({
  flex: 'none',
  alignSelf: 'stretch',
  minWidth: '1.75rem',
  border: 0,
  borderLeft: '1px solid var(--hair)',
  background: 'transparent',
  color: 'var(--ink)',
  cursor: 'pointer',
  '@media (pointer: coarse)': { minWidth: 44 },
});

function SizePicker({
  name,
  echoOfSize,
  practice,
  onPick,
}: {
  readonly name: string;
  readonly echoOfSize: (size: ConductorSize) => SizeEcho;
  readonly practice: Practice;
  readonly onPick: (size: ConductorSize) => void;
}): ReactElement {
  const first = usePreferences((preferences) => preferences.units);
  const [anchor, setAnchor] = useState<HTMLElement | null>(null);
  const sizes = anchor === null ? [] : usualSizes(first, { practice, tables: tables.conductors });
  return (
    <>
      <PickerButton
        type="button"
        aria-label={`${name}: pick from the usual sizes`}
        aria-haspopup="menu"
        onClick={(event) => setAnchor(event.currentTarget)}
      >
        <svg aria-hidden viewBox="0 0 12 12" style={{ width: '0.75rem', height: '0.75rem', fill: 'none' }}>
          <path d="M2 4.5l4 4l4-4" stroke="currentColor" strokeWidth="1.6" />
        </svg>
      </PickerButton>
      <Menu
        anchorEl={anchor}
        open={anchor !== null}
        onClose={() => setAnchor(null)}
        slotProps={{ paper: { sx: { maxHeight: '24rem' } } }}
      >
        {sizes.map((size) => (
          <MenuItem
            key={sizeText(size)}
            dense
            onClick={() => {
              setAnchor(null);
              onPick(size);
            }}
          >
            <span style={{ minWidth: '5.5rem' }}>{sizeText(size)}</span>
            <span style={{ color: 'var(--soft)', fontSize: '0.8125rem' }}>{echoOfSize(size).short}</span>
          </MenuItem>
        ))}
      </Menu>
    </>
  );
}
