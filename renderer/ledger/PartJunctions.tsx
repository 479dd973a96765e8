/** Where a part touches: each junction with its volts and the currents that meet there. */
import type { ReactElement } from 'react';
import {
  addTap,
  detach,
  type JunctionId,
  type Part,
  rawPart,
  removeTap,
  type Terminal,
  terminalsOf,
  wholeFigureText,
} from '../../core/api.ts';
import { SmallButton } from '../controls/AskRow.tsx';
import { Folded } from '../controls/Folded.tsx';
import { takeEdit } from '../controls/taken.ts';
import { useOpenJob } from '../state/openJob.ts';
import { BalanceTable, balanceAt } from './BalanceTable.tsx';
import type { ChosenCase } from './chosenCase.ts';
import { Buttons, JunctionLink, Section, SectionTitle } from './parts.tsx';

export function PartJunctions({ part, chosen }: { readonly part: Part; readonly chosen: ChosenCase }): ReactElement {
  const raw = useOpenJob((open) => rawPart(open.draft, part.id));
  const terminals = raw === undefined ? [] : terminalsOf(raw);
  return (
    <Section aria-label="Junctions">
      <SectionTitle>Junctions</SectionTitle>
      {terminals.map((terminal) => (
        <AtTerminal key={terminal.path} part={part} terminal={terminal} chosen={chosen} />
      ))}
      {part.kind === 'busbar' && (
        <Buttons>
          <SmallButton type="button" onClick={() => takeEdit(addTap({ busbar: part.id }))}>
            Add a tap
          </SmallButton>
        </Buttons>
      )}
    </Section>
  );
}

const terminalWords: Readonly<Record<string, string>> = {
  plus: 'Plus',
  minus: 'Minus',
  from: 'From',
  to: 'To',
  midpoint: 'Midpoint',
  'from.plus': 'From, plus',
  'from.minus': 'From, minus',
  'to.plus': 'To, plus',
  'to.minus': 'To, minus',
};

function AtTerminal({
  part,
  terminal,
  chosen,
}: {
  readonly part: Part;
  readonly terminal: Terminal;
  readonly chosen: ChosenCase;
}): ReactElement {
  const { path } = terminal;
  const junction = terminal.junction as JunctionId;
  const balance = balanceAt(junction, chosen);
  const volts = chosen.point?.junctions.get(junction);
  const words = terminalWords[path] ?? `Tap ${String(Number(/\d+/.exec(path)?.[0] ?? 0) + 1)}`;
  const aside = typeof volts === 'number' ? `${junction} · ${wholeFigureText({ value: volts, unit: 'V' })}` : junction;
  const canLose = part.kind !== 'busbar' || part.junctions.length > 2;
  return (
    <Folded title={words} aside={aside}>
      {balance === undefined ? null : <BalanceTable balance={balance} />}
      <Buttons>
        <SmallButton type="button" onClick={() => takeEdit(detach({ part: part.id, terminal: path }))}>
          Take off
        </SmallButton>
        {part.kind === 'busbar' && canLose && (
          <SmallButton type="button" onClick={() => takeEdit(removeTap({ busbar: part.id, junction }))}>
            Remove this tap
          </SmallButton>
        )}
        <JunctionLink id={junction} />
      </Buttons>
    </Folded>
  );
}
