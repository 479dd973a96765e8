/** A row for each fuse and breaker; arrow keys walk through them, Enter opens the time–current picture. */
import Box from '@mui/material/Box';
import Button from '@mui/material/Button';
import { type KeyboardEvent, type ReactElement, useMemo, useRef, useState } from 'react';
import type { DeviceStudy, Finding } from '../../../core/api.ts';
import { DeviceRow } from './DeviceRow.tsx';
import { changeView, useFindingsView } from './findingsView.ts';
import { worstFirst } from './protectionWords.ts';
import { stepIn } from './walkRows.ts';

/** How many rows stand in the list until more are asked for. */
const AT_A_TIME = 60;

export interface DeviceListProps {
  readonly devices: readonly DeviceStudy[];
  readonly findings: readonly Finding[];
}

export function DeviceList({ devices, findings }: DeviceListProps): ReactElement | null {
  const { openDevice } = useFindingsView();
  const list = useRef<HTMLOListElement>(null);
  const [most, setMost] = useState(AT_A_TIME);
  const rows = useMemo(() => worstFirst(devices, findings), [devices, findings]);
  if (rows.length === 0) return null;
  const openAt = rows.findIndex(({ device }) => device.id === openDevice);
  const shown = rows.slice(0, Math.max(most, openAt + 1));
  const walk = (event: KeyboardEvent): void => stepIn(event, list.current, '[data-device]');
  return (
    <>
      <Box
        component="ol"
        ref={list}
        aria-label="Fuses and breakers, worst first"
        onKeyDown={walk}
        sx={{ m: 0, p: 0, listStyle: 'none', containerType: 'inline-size', borderBottom: '1px solid var(--hair)' }}
      >
        {shown.map((row) => (
          <DeviceRow
            key={row.device.id}
            {...row}
            isOpen={row.device.id === openDevice}
            onToggle={() => changeView({ openDevice: row.device.id === openDevice ? null : row.device.id })}
          />
        ))}
      </Box>
      {shown.length < rows.length && (
        <Button onClick={() => setMost(most + AT_A_TIME)}>Show more: {rows.length - shown.length} are not shown</Button>
      )}
    </>
  );
}
