/** Nothing selected: the balance of the chosen case, the list of cases, and what was taken for granted. */
import type { ReactElement } from 'react';
import { answerLine, balanceLine, plainFields } from '../../core/api.ts';
import { Figure } from '../controls/Figure.tsx';
import { AssumedList } from './AssumedList.tsx';
import { CaseList } from './CaseList.tsx';
import { type ChosenCase, useChosenCase } from './chosenCase.ts';
import { RowList, Section, SectionTitle, Title, Under } from './parts.tsx';

export function JobLedger(): ReactElement {
  const chosen = useChosenCase();
  return (
    <article aria-label="The whole system">
      <Title>The whole system</Title>
      <Under>Select a part or a junction to see its figures.</Under>
      <Section aria-label="Balance" aria-busy={chosen.isOld} style={chosen.isOld ? { color: 'var(--soft)' } : {}}>
        <SectionTitle>{`In “${chosen.words}”`}</SectionTitle>
        <Totals chosen={chosen} />
      </Section>
      <CaseList />
      {chosen.point !== undefined && <AssumedList assumptions={chosen.point.assumptions} />}
    </article>
  );
}

function Totals({ chosen: { job, point } }: { readonly chosen: ChosenCase }): ReactElement {
  if (point === undefined) return <Under>Solving …</Under>;
  const { outcome, inW, outW, heatW } = balanceLine(point);
  const told = (
    <p style={{ margin: 0, fontSize: '0.875rem' }}>{plainFields(point.collapse?.message ?? answerLine(job, point))}</p>
  );
  if (outcome !== 'solved') return told;
  return (
    <>
      <RowList
        rows={[
          { name: 'Goes in', value: <Figure value={inW} unit="W" digits={5} prefix={false} /> },
          { name: 'Comes out', value: <Figure value={outW} unit="W" digits={5} prefix={false} /> },
          { name: 'Turns to heat', value: <Figure value={heatW} unit="W" digits={5} prefix={false} /> },
        ]}
      />
      {told}
    </>
  );
}
