/** What joining the two would be: the first instant against its limits, the gap that is within them, a resistor, and how it settles. */
import Box from '@mui/material/Box';
import type { ReactElement } from 'react';
import { formatQuantity, type Joining, plainFields } from '../../../core/api.ts';
import { SettlingCurve } from '../../charts/SettlingCurve.tsx';
import { Figure } from '../../controls/Figure.tsx';
import { FigureTable } from '../../controls/FigureTable.tsx';
import { Assumed, Said } from '../../controls/Prose.tsx';
import { SeverityMark } from '../../controls/SeverityMark.tsx';
import { type Row, RowList } from '../../ledger/parts.tsx';
import { amps, joiningTitle, NOTICED_A, percent } from './words.ts';

export function JoiningAnswer({ joining }: { readonly joining: Joining }): ReactElement {
  return (
    <>
      <Said>
        {!joining.within && (
          <>
            <SeverityMark severity="stop" />{' '}
          </>
        )}
        <strong>{joiningTitle(joining)}.</strong>
      </Said>
      {joining.flat && <FlatSentence joining={joining} />}
      <Box sx={{ display: 'flex', flexWrap: 'wrap', gap: '0.25rem 1.5rem', alignItems: 'start' }}>
        <Box sx={{ flex: '1 1 16rem', maxWidth: '24rem' }}>
          <RowList rows={rowsOf(joining)} />
        </Box>
        {joining.inrushA >= NOTICED_A && <SettlingCurve joining={joining} title={curveTitle(joining)} />}
      </Box>
      <Limits joining={joining} />
      <Assumed texts={joining.assumed} />
    </>
  );
}

/** Equal volts do not prove equal charge where the curve is flat. */
function FlatSentence({ joining: { a, b, chargeBand } }: { readonly joining: Joining }): ReactElement {
  const range = ([low, high]: readonly [number, number]): string => `${percent(low)} and ${percent(high)}`;
  return (
    <Said>
      Volts prove little here: the curve is so flat that equal volts do not mean equal charge.
      {chargeBand !== null &&
        ` At these readings ${a} may hold anything between ${range(chargeBand.a)}, ${b} between ${range(chargeBand.b)}.`}{' '}
      Charge both full before they are joined.
    </Said>
  );
}

function rowsOf({
  giver,
  inrushA,
  gapV,
  safeGapV,
  loopOhm,
  leadOhm,
  resistor,
  settleS,
  movedAh,
  lostWh,
}: Joining): readonly Row[] {
  return [
    { name: 'Gap now', value: <Figure value={Math.abs(gapV)} unit="V" digits={3} /> },
    { name: 'Gap within limit', value: <Figure value={safeGapV} unit="V" digits={2} /> },
    {
      name: 'Loop',
      value: (
        <>
          <Figure value={loopOhm} unit="ohm" digits={3} />, of it the lead{' '}
          <Figure value={leadOhm} unit="ohm" digits={2} />
        </>
      ),
    },
    {
      name: 'Resistor',
      value:
        resistor === null ? (
          'none is needed'
        ) : (
          <>
            <Figure value={resistor.ohm} unit="ohm" digits={2} />, takes{' '}
            <Figure value={resistor.w} unit="W" digits={2} /> at first and{' '}
            <Figure value={resistor.wh} unit="Wh" digits={2} /> in all;{' '}
            {resistor.untilS === null
              ? 'one side is empty before the two may be joined directly'
              : `join directly after ${lasting(resistor.untilS)}`}
          </>
        ),
    },
    {
      name: 'Moves',
      value:
        inrushA < NOTICED_A ? (
          'nothing to speak of'
        ) : (
          <>
            <Figure value={movedAh} unit="Ah" digits={2} /> from {giver}, most of it in {lasting(settleS)};{' '}
            <Figure value={lostWh} unit="Wh" digits={2} /> to heat
          </>
        ),
    },
  ];
}

function curveTitle({ inrushA, settleS }: Joining): string {
  return `${amps(inrushA)} at first, nearly nothing after ${lasting(settleS)}`;
}

/** A time in the unit that people would say it in. */
function lasting(seconds: number): string {
  if (seconds < 90) return formatQuantity({ value: seconds, unit: 's', digits: 2 });
  if (seconds < 5400) return `${String(Math.round(seconds / 60))} min`;
  if (seconds < 172_800) return formatQuantity({ value: seconds / 3600, unit: 'h', digits: 2 });
  return `${String(Math.round(seconds / 86_400))} days`;
}

function Limits({ joining }: { readonly joining: Joining }): ReactElement | null {
  const { limits, inrushA } = joining;
  if (limits.length === 0) return null;
  return (
    <FigureTable>
      <thead>
        <tr>
          <th scope="col" data-text>
            What limits it
          </th>
          <th scope="col">Amps</th>
          <th scope="col" data-text>
            At {amps(inrushA)}
          </th>
          <th scope="col" data-text>
            By
          </th>
        </tr>
      </thead>
      <tbody>
        {limits.map(({ what, limitA, basis }) => (
          <tr key={what}>
            <th scope="row" data-text>
              {plainFields(what)}
            </th>
            <td>
              <Figure value={limitA} unit="A" digits={3} />
            </td>
            <td data-text>
              {inrushA > limitA ? (
                <>
                  <SeverityMark severity="stop" bare /> beyond
                </>
              ) : (
                'within'
              )}
            </td>
            <td data-text style={{ color: 'var(--soft)' }}>
              {plainFields(basis.text)}
            </td>
          </tr>
        ))}
      </tbody>
    </FigureTable>
  );
}
