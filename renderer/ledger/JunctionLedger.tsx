/** One junction: its name, its volts, what meets there. */
import type { ReactElement } from 'react';
import { type JunctionId, labelJunction, renameJunction, setReference } from '../../core/api.ts';
import { SmallButton } from '../controls/AskRow.tsx';
import { Figure } from '../controls/Figure.tsx';
import { TextField } from '../controls/TextField.tsx';
import { takeEdit } from '../controls/taken.ts';
import { useOpenJob } from '../state/openJob.ts';
import { BalanceTable, balanceAt } from './BalanceTable.tsx';
import { useChosenCase } from './chosenCase.ts';
import { Buttons, RowList, Section, SectionTitle, Title, Under } from './parts.tsx';

export function JunctionLedger({ junction }: { readonly junction: JunctionId }): ReactElement {
  const note = useOpenJob((open) => open.job.junctions.get(junction));
  const chosen = useChosenCase();
  const balance = balanceAt(junction, chosen);
  const isReference = note?.reference === true;
  return (
    <article aria-label={`Junction ${junction}`}>
      <Title>{note?.label ?? junction}</Title>
      <Under>{note?.label === undefined ? 'junction' : `${junction}, junction`}</Under>
      <RowList
        rows={[
          {
            name: 'Volts',
            value: (
              <Figure
                value={chosen.point?.junctions.get(junction)}
                unit="V"
                digits={5}
                prefix={false}
                tone="volt"
                absent="not defined in this case"
              />
            ),
          },
        ]}
      />
      <Section aria-label="Currents" style={chosen.isOld ? { color: 'var(--soft)' } : {}}>
        <SectionTitle>{`What meets here in “${chosen.words}”`}</SectionTitle>
        {balance === undefined ? <Under>No answer in this case.</Under> : <BalanceTable balance={balance} />}
      </Section>
      <Section aria-label="Name">
        <SectionTitle>Name</SectionTitle>
        <TextField
          label="Name"
          value={junction}
          required
          onCommit={(name) => {
            if (name === undefined) return null;
            const trouble = takeEdit(renameJunction(junction, name));
            if (trouble === null) useOpenJob.getState().select({ junctions: [name as JunctionId] });
            return trouble;
          }}
        />
        <TextField label="Label" value={note?.label} onCommit={(label) => takeEdit(labelJunction(junction, label))} />
        <Buttons>
          <SmallButton
            type="button"
            aria-pressed={isReference}
            disabled={isReference}
            onClick={() => takeEdit(setReference(junction))}
          >
            {isReference ? 'This is 0 V' : 'Make this 0 V'}
          </SmallButton>
        </Buttons>
      </Section>
    </article>
  );
}
