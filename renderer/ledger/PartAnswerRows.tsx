/** What a part does in the chosen case, with directions in words. */
import type { ReactElement, ReactNode } from 'react';
import { fahrenheitText, figureText, type Part, type PartAnswer } from '../../core/api.ts';
import { Figure } from '../controls/Figure.tsx';
import { stateWord } from '../controls/words.ts';
import type { ChosenCase } from './chosenCase.ts';
import { answerIds, JunctionLink, type Row, RowList, Section, SectionTitle } from './parts.tsx';

export function PartAnswerRows({ part, chosen }: { readonly part: Part; readonly chosen: ChosenCase }): ReactElement {
  const answers = answerIds(part).flatMap((id) => chosen.point?.parts.get(id) ?? []);
  return (
    <Section aria-label="Answer" aria-busy={chosen.isOld} style={chosen.isOld ? { color: 'var(--soft)' } : {}}>
      <SectionTitle>{`In “${chosen.words}”`}</SectionTitle>
      {answers.length === 0 && <p style={{ margin: 0, color: 'var(--soft)' }}>{noAnswer(chosen)}</p>}
      {answers.map((answer) => (
        <div key={answer.id}>
          {answers.length > 1 && (
            <div style={{ color: 'var(--soft)' }}>{answer.id.endsWith('.plus') ? 'Out, plus' : 'Back, minus'}</div>
          )}
          <RowList rows={rowsOf(part, answer)} />
          {answer.undetermined !== undefined && (
            <p style={{ margin: 0, color: 'var(--soft)' }}>{answer.undetermined}</p>
          )}
        </div>
      ))}
    </Section>
  );
}

function noAnswer({ point }: ChosenCase): string {
  if (point === undefined) return 'Solving …';
  if (point.outcome === 'collapse')
    return point.collapse?.message ?? 'This case has no answer: a load asks for more than can be delivered.';
  return 'It carries nothing in this case.';
}

function rowsOf(part: Part, answer: PartAnswer): readonly Row[] {
  const rows: Row[] = [];
  const add = (name: string, value: ReactNode): void => {
    rows.push({ name, value });
  };
  if (answer.state !== undefined) add('State', stateWord(answer.state));
  if (answer.outputA !== undefined) {
    add('Takes in', pairOf(answer.inputV, answer.inputA));
    add('Gives out', pairOf(answer.outputV, answer.outputA));
  } else {
    add(part.kind === 'busbar' ? 'Most in it' : 'Current', <CurrentWords part={part} answer={answer} />);
    if (isTwoEnded(part)) add('Drop', <Figure value={answer.dropV} unit="V" tone="volt" />);
    else if (part.kind !== 'busbar') add('Volts', <Figure value={answer.voltageV} unit="V" tone="volt" />);
  }
  add(powerName(part, answer), <Figure value={answer.powerW === null ? null : Math.abs(answer.powerW)} unit="W" />);
  if (answer.conductorDegC !== undefined) {
    add(
      'Warms to',
      <>
        <Figure value={answer.conductorDegC} unit="degC" />
        <span style={{ color: 'var(--soft)' }}>{` ${fahrenheitText({ temperatureDegC: answer.conductorDegC })}`}</span>
      </>,
    );
  }
  if (answer.segmentsA !== undefined && part.kind === 'busbar') {
    for (const [index, currentA] of answer.segmentsA.entries()) {
      add(
        `Piece ${String(index + 1)}`,
        <SegmentWords currentA={currentA} from={part.junctions[index]} to={part.junctions[index + 1]} />,
      );
    }
  }
  return rows;
}

function pairOf(volts: number | null | undefined, amps: number | null | undefined): ReactElement {
  return (
    <>
      <Figure value={volts} unit="V" tone="volt" /> <Figure value={amps} unit="A" tone="copper" />
    </>
  );
}

function isTwoEnded(part: Part): part is Extract<Part, { readonly to: unknown }> {
  return 'to' in part;
}

function CurrentWords({ part, answer }: { readonly part: Part; readonly answer: PartAnswer }): ReactElement {
  const { currentA } = answer;
  const figure = <Figure value={currentA === null ? null : Math.abs(currentA)} unit="A" tone="copper" />;
  if (isNothing(currentA)) return figure;
  if (part.kind === 'pair') {
    const plus = answer.id.endsWith('.plus');
    const [from, to] = plus ? [part.from.plus, part.to.plus] : [part.to.minus, part.from.minus];
    return <Along figure={figure} from={currentA > 0 ? from : to} to={currentA > 0 ? to : from} />;
  }
  if ('to' in part && 'from' in part && typeof part.from === 'string' && typeof part.to === 'string') {
    return <Along figure={figure} from={currentA > 0 ? part.from : part.to} to={currentA > 0 ? part.to : part.from} />;
  }
  return (
    <>
      {figure} {poleWords(part, currentA)}
    </>
  );
}

/** Nothing flows, or nothing that has a direction worth telling. */
function isNothing(currentA: number | null): currentA is null {
  return currentA === null || figureText({ value: currentA, unit: 'A' }).number === '0';
}

function poleWords(part: Part, currentA: number): string {
  switch (part.kind) {
    case 'string':
      return currentA > 0 ? 'given: it discharges' : 'taken in: it is being charged';
    case 'array':
    case 'charger':
      return currentA > 0 ? 'given' : 'taken in, against its nature';
    case 'load':
    case 'inverter':
      return currentA > 0 ? 'taken' : 'given back';
    default:
      return '';
  }
}

function Along({
  figure,
  from,
  to,
}: {
  readonly figure: ReactElement;
  readonly from: Parameters<typeof JunctionLink>[0]['id'];
  readonly to: Parameters<typeof JunctionLink>[0]['id'];
}): ReactElement {
  return (
    <>
      {figure} from <JunctionLink id={from} /> to <JunctionLink id={to} />
    </>
  );
}

function SegmentWords({
  currentA,
  from,
  to,
}: {
  readonly currentA: number | null;
  readonly from: Parameters<typeof JunctionLink>[0]['id'] | undefined;
  readonly to: Parameters<typeof JunctionLink>[0]['id'] | undefined;
}): ReactElement {
  const figure = <Figure value={currentA === null ? null : Math.abs(currentA)} unit="A" tone="copper" />;
  if (isNothing(currentA) || from === undefined || to === undefined) return figure;
  return <Along figure={figure} from={currentA < 0 ? to : from} to={currentA < 0 ? from : to} />;
}

function powerName(part: Part, { powerW }: PartAnswer): string {
  switch (part.kind) {
    case 'string':
    case 'array':
    case 'charger':
      return powerW !== null && powerW < 0 ? 'Takes' : 'Gives';
    case 'load':
    case 'inverter':
      return 'Takes';
    case 'controller':
    case 'converter':
      return 'Lost in it';
    default:
      return 'Heat';
  }
}
