/** The currents that meet at a junction, and that what flows in flows out. */
import { styled } from '@mui/material/styles';
import type { ReactElement } from 'react';
import { figureText, type JunctionBalance, type JunctionId, junctionBalance } from '../../core/api.ts';
import { Figure } from '../controls/Figure.tsx';
import type { ChosenCase } from './chosenCase.ts';
import { PartLink } from './parts.tsx';

const Table = styled('table')({
  width: '100%',
  borderCollapse: 'collapse',
  fontSize: '0.875rem',
  '& td, & th': {
    padding: '0.125rem 0.25rem 0.125rem 0',
    textAlign: 'start',
    fontWeight: 400,
    verticalAlign: 'baseline',
  },
  '& thead th': { color: 'var(--soft)', fontSize: '0.8125rem' },
  '& td:last-child, & th:last-child': { textAlign: 'end', paddingInlineEnd: 0, whiteSpace: 'nowrap' },
  '& tfoot td, & tfoot th': { borderTop: '1px solid var(--edge)', fontWeight: 600 },
});

/** Undefined while there is no answer to balance. */
export function balanceAt(
  junction: JunctionId,
  { job, operatingCase, point }: ChosenCase,
): JunctionBalance | undefined {
  if (operatingCase === undefined || point === undefined || point.outcome !== 'solved') return undefined;
  if (!point.junctions.has(junction)) return undefined;
  return junctionBalance({ job, operatingCase, point, junction });
}

export function BalanceTable({ balance }: { readonly balance: JunctionBalance }): ReactElement {
  const { currents, sumA, group, undetermined, junction } = balance;
  const shared = group.filter((other) => other !== junction);
  return (
    <>
      <Table>
        <thead>
          <tr>
            <th scope="col">Part</th>
            <th scope="col">Flows</th>
            <th scope="col">Amps</th>
          </tr>
        </thead>
        <tbody>
          {currents.map(({ part, segment, junction: at, currentA }) => (
            <tr key={`${part} ${String(segment)} ${at} ${String(currentA >= 0)}`}>
              <th scope="row">
                <PartLink id={part} />
                {segment === undefined ? '' : ` piece ${String(segment + 1)}`}
              </th>
              <td>{flowWord(currentA)}</td>
              <td>
                <Figure value={currentA} unit="A" prefix={false} tone="copper" />
              </td>
            </tr>
          ))}
        </tbody>
        <tfoot>
          <tr>
            <th scope="row" colSpan={2}>
              Sum
            </th>
            <td>{`${sumText(sumA)} A`}</td>
          </tr>
        </tfoot>
      </Table>
      {shared.length > 0 && (
        <Small>{`Taken together with ${shared.join(', ')}: parts without resistance make one junction of them.`}</Small>
      )}
      {undetermined.length > 0 && (
        <Small>{`The network does not say how the current divides between ${undetermined.join(', ')}.`}</Small>
      )}
    </>
  );
}

const Small = styled('p')({ margin: '0.125rem 0', color: 'var(--soft)', fontSize: '0.8125rem' });

function flowWord(currentA: number): string {
  if (figureText({ value: currentA, unit: 'A' }).number === '0') return '';
  return currentA > 0 ? 'in' : 'out';
}

/** Three decimals, as in the balance line; never a minus nought. */
function sumText(sumA: number): string {
  const text = sumA.toFixed(3);
  return text === '-0.000' ? '0.000' : text.replace('-', '−');
}
