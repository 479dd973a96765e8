/** One part: what it is, what it does in the chosen case, its figures, its working, what is found about it, where it touches. */
import { type ReactElement, useState } from 'react';
import { cautionsForPart, type Part, type PartId, renamePart } from '../../core/api.ts';
import { Group, SmallButton } from '../controls/AskRow.tsx';
import { CautionStrip } from '../controls/CautionStrip.tsx';
import { PartField } from '../controls/PartField.tsx';
import { TextField } from '../controls/TextField.tsx';
import { type Taken, takeEdit } from '../controls/taken.ts';
import { kindWord } from '../controls/words.ts';
import { useOpenJob } from '../state/openJob.ts';
import { useChosenCase } from './chosenCase.ts';
import { FiguresOfPart } from './FiguresOfPart.tsx';
import { FindingsHere } from './FindingsHere.tsx';
import { KindChoice, PartActions } from './PartActions.tsx';
import { PartAnswerRows } from './PartAnswerRows.tsx';
import { PartJunctions } from './PartJunctions.tsx';
import { PartWorking } from './PartWorking.tsx';
import { Buttons, Section, SectionTitle, Title, Under } from './parts.tsx';

export function PartLedger({ part }: { readonly part: Part }): ReactElement {
  const job = useOpenJob((open) => open.job);
  const chosen = useChosenCase();
  const [onlyHere, setOnlyHere] = useState(false);
  const inCase = onlyHere && chosen.isListed ? chosen.caseId : undefined;
  const kind = kindWord(part.kind);
  return (
    <article aria-label={`${part.id}, ${kind}`}>
      <Title>{part.label ?? part.id}</Title>
      <Under>{part.label === undefined ? kind : `${part.id}, ${kind}`}</Under>
      <CautionStrip title="Before a hand goes in" texts={cautionsForPart(part, job).map(({ text }) => text)} />
      <PartActions part={part} inCase={inCase} />
      <PartAnswerRows part={part} chosen={chosen} />
      <Section aria-label="Figures">
        <SectionTitle>Figures</SectionTitle>
        {chosen.isListed && <WhereToggle caseWords={chosen.words} onlyHere={onlyHere} onChange={setOnlyHere} />}
        <FiguresOfPart part={part} inCase={inCase} />
      </Section>
      <FindingsHere part={part} />
      <PartWorking part={part} chosen={chosen} />
      <PartJunctions part={part} chosen={chosen} />
      <Section aria-label="Name and note">
        <SectionTitle>Name and note</SectionTitle>
        <TextField label="Short name" value={part.id} required onCommit={(name) => rename(part.id, name)} />
        <PartField partId={part.id} field="label" label="Label" />
        <KindChoice part={part} />
        <PartField partId={part.id} field="locationTag" />
        <PartField partId={part.id} field="enclosure" />
        <PartField partId={part.id} field="note" label="Note" />
      </Section>
    </article>
  );
}

function rename(id: PartId, name: string | undefined): Taken {
  if (name === undefined) return null;
  const trouble = takeEdit(renamePart(id, name));
  if (trouble === null) useOpenJob.getState().select({ parts: [name as PartId] });
  return trouble;
}

/** A change goes into the drawing, and so into every case, unless the person wants it in the chosen case alone. */
function WhereToggle({
  caseWords,
  onlyHere,
  onChange,
}: {
  readonly caseWords: string;
  readonly onlyHere: boolean;
  readonly onChange: (onlyHere: boolean) => void;
}): ReactElement {
  return (
    <Group aria-label="Where a change goes">
      <Buttons>
        <SmallButton type="button" aria-pressed={!onlyHere} onClick={() => onChange(false)}>
          In every case
        </SmallButton>
        <SmallButton type="button" aria-pressed={onlyHere} onClick={() => onChange(true)}>
          {`Only in “${caseWords}”`}
        </SmallButton>
      </Buttons>
    </Group>
  );
}
