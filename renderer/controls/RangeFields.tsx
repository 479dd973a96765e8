/** Between which two figures a figure lies. */
import { type ReactElement, useState } from 'react';
import { type FieldUnit, type PartId, setRange, type UnitName } from '../../core/api.ts';
import { SmallButton } from './AskRow.tsx';
import { QuantityField } from './QuantityField.tsx';
import { type Taken, takeEdit } from './taken.ts';

export interface RangeFieldsProps {
  readonly part: PartId;
  readonly field: string;
  readonly unit: UnitName;
  readonly bare: FieldUnit | undefined;
  readonly range: readonly [number, number] | undefined;
}

export function RangeFields({ part, field, unit, bare, range }: RangeFieldsProps): ReactElement {
  const [low, setLow] = useState(range?.[0]);
  const [high, setHigh] = useState(range?.[1]);
  const put = (from: number | undefined, to: number | undefined): Taken => {
    if (from !== undefined && to !== undefined) {
      const trouble = takeEdit(setRange({ part, field, range: [from, to] }));
      if (trouble !== null) return trouble;
    }
    setLow(from);
    setHigh(to);
    return null;
  };
  const kind = { unit, ...(bare === undefined ? {} : { bare }) };
  return (
    <div style={{ borderTop: '1px solid var(--hair)', marginTop: '0.5rem', paddingTop: '0.5rem' }}>
      <QuantityField {...kind} label="Surely not below" given={low} onCommit={(_, value) => put(value, high)} />
      <QuantityField {...kind} label="Surely not above" given={high} onCommit={(_, value) => put(low, value)} />
      {range !== undefined && (
        <SmallButton
          type="button"
          onClick={() => {
            if (takeEdit(setRange({ part, field, range: undefined })) !== null) return;
            setLow(undefined);
            setHigh(undefined);
          }}
        >
          No range
        </SmallButton>
      )}
    </div>
  );
}
