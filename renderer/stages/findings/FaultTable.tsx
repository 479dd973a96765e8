/** The highest and lowest prospective current at every junction; a click shows the junction in the wiring. */
import Button from '@mui/material/Button';
import { type ReactElement, useMemo, useState } from 'react';
import { formatQuantity, type JunctionFaultRow, type JunctionId, type ProtectionStudy } from '../../../core/api.ts';
import { FigureTable, Sideways } from '../../controls/FigureTable.tsx';
import { Quiet } from '../../controls/Prose.tsx';
import { useOpenJob } from '../../state/openJob.ts';
import { useSession } from '../../state/session.ts';
import { amps, METHODS } from './protectionWords.ts';

export function FaultTable({ study }: { readonly study: ProtectionStudy }): ReactElement {
  const { poles, earth, method } = study;
  if (poles.length === 0) return <Quiet>No source of the job reaches any junction.</Quiet>;
  const words = METHODS.find(([one]) => one === method);
  return (
    <>
      <Quiet>{`${words?.[1] ?? method}: ${words?.[2] ?? ''}`}</Quiet>
      <Rows rows={poles} caption="Fault between poles, strongest first" isIec={method === 'iec-61660'} />
      {earth.length > 0 && (
        <Rows rows={earth} caption="Fault to earth, strongest first" isIec={method === 'iec-61660'} />
      )}
    </>
  );
}

/** How many rows stand until more are asked for. */
const AT_A_TIME = 60;

interface RowsProps {
  readonly rows: readonly JunctionFaultRow[];
  readonly caption: string;
  readonly isIec: boolean;
}

function Rows({ rows, caption, isIec }: RowsProps): ReactElement {
  const [most, setMost] = useState(AT_A_TIME);
  const sorted = useMemo(() => rows.toSorted((a, b) => highestOf(b) - highestOf(a)), [rows]);
  return (
    <>
      <Sideways label={caption}>
        <FigureTable>
          <caption>{caption}</caption>
          <thead>
            <tr>
              <th scope="col" data-text>
                Junction
              </th>
              <th scope="col" data-text>
                to
              </th>
              <th scope="col">{isIec ? 'Highest, at first' : 'Highest'}</th>
              {isIec && <th scope="col">settled</th>}
              <th scope="col">Lowest</th>
              <th scope="col">Source</th>
            </tr>
          </thead>
          <tbody>
            {sorted.slice(0, most).map(({ junction, to, highest, lowest }) => (
              <tr key={`${junction} ${to}`}>
                <th scope="row" data-text>
                  <Button onClick={() => show(junction)} sx={LINK}>
                    {junction}
                    <span className="only-read">: show in the wiring</span>
                  </Button>
                </th>
                <td data-text>{to}</td>
                <td>{highest === null ? '—' : amps(highest.current.firstA)}</td>
                {isIec && <td>{highest === null ? '—' : amps(highest.current.settledA)}</td>}
                <td>{lowest === null ? '—' : amps(lowest.current.settledA)}</td>
                <td>
                  {highest === null
                    ? '—'
                    : formatQuantity({ value: highest.current.sourceOhm, unit: 'ohm', digits: 3 })}
                </td>
              </tr>
            ))}
          </tbody>
        </FigureTable>
      </Sideways>
      {most < rows.length && (
        <Button onClick={() => setMost(most + AT_A_TIME)}>Show more: {rows.length - most} are not shown</Button>
      )}
    </>
  );
}

function highestOf({ highest }: JunctionFaultRow): number {
  return highest?.current.firstA ?? 0;
}

const LINK = {
  padding: 0,
  lineHeight: 1.2,
  minHeight: '1.5rem',
  minWidth: 0,
  fontSize: '0.875rem',
  textDecoration: 'underline',
  '@media (pointer: coarse)': { minHeight: 44 },
} as const;

function show(junction: JunctionId): void {
  useOpenJob.getState().select({ junctions: [junction] });
  useSession.getState().goStage('wiring');
}
