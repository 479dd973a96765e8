/** What can be done with a part: switch it, copy it, put something into it, take it away. */
import type { ReactElement } from 'react';
import {
  changeKind,
  duplicateParts,
  type Edit,
  insertInto,
  kindsAlike,
  type Part,
  type PartId,
  type PartKind,
  parallelString,
  partsAdded,
  removeParts,
  setField,
  setInCase,
} from '../../core/api.ts';
import { SmallButton } from '../controls/AskRow.tsx';
import { ChoiceField } from '../controls/ChoiceField.tsx';
import { Folded } from '../controls/Folded.tsx';
import { takeEdit } from '../controls/taken.ts';
import { kindWord } from '../controls/words.ts';
import { useOpenJob } from '../state/openJob.ts';
import { useChosenCase } from './chosenCase.ts';
import { Buttons } from './parts.tsx';

/** Makes the edit and selects what it has put in. */
export function editAndSelect(edit: Edit): void {
  const before = useOpenJob.getState().draft;
  if (takeEdit(edit) !== null) return;
  const added = partsAdded(before, useOpenJob.getState().draft);
  if (added.length > 0) useOpenJob.getState().select({ parts: added as readonly PartId[] });
}

export function PartActions({
  part,
  inCase,
}: {
  readonly part: Part;
  readonly inCase: string | undefined;
}): ReactElement {
  return (
    <>
      <Buttons>
        <SwitchButton part={part} inCase={inCase} />
        <SmallButton type="button" onClick={() => editAndSelect(duplicateParts([part.id]))}>
          Duplicate
        </SmallButton>
        {part.kind === 'string' && (
          <SmallButton type="button" onClick={() => editAndSelect(parallelString(part.id))}>
            Add a string beside it
          </SmallButton>
        )}
        <SmallButton type="button" onClick={() => takeEdit(removeParts([part.id]))}>
          Delete
        </SmallButton>
      </Buttons>
      {(part.kind === 'cable' || part.kind === 'pair') && <InsertButtons part={part} />}
    </>
  );
}

/** On and off, open and closed: of the part as it stands in the chosen case where changes go there, else of the drawing. */
function SwitchButton({
  part,
  inCase,
}: {
  readonly part: Part;
  readonly inCase: string | undefined;
}): ReactElement | null {
  const { operatingCase } = useChosenCase();
  const seen = inCase === undefined ? part : (operatingCase?.changed.get(part.id) ?? part);
  const change = (field: string, value: unknown): void => {
    takeEdit(
      inCase === undefined
        ? setField({ part: part.id, field, value })
        : setInCase({ case: inCase, part: part.id, field, value }),
    );
  };
  if ('on' in seen) {
    return (
      <SmallButton type="button" onClick={() => change('on', !seen.on)}>
        {seen.on ? 'Turn off' : 'Turn on'}
      </SmallButton>
    );
  }
  if ('state' in seen) {
    return (
      <SmallButton type="button" onClick={() => change('state', seen.state === 'open' ? 'closed' : 'open')}>
        {seen.state === 'open' ? 'Close' : 'Open'}
      </SmallButton>
    );
  }
  return null;
}

const insertable = ['fuse', 'switch'] as const;

function InsertButtons({ part }: { readonly part: Extract<Part, { kind: 'cable' | 'pair' }> }): ReactElement {
  const [from, to] = part.kind === 'pair' ? [part.from.plus, part.to.plus] : [part.from, part.to];
  const ends = [
    { end: 'from', junction: from },
    { end: 'to', junction: to },
  ] as const;
  return (
    <Folded title={part.kind === 'pair' ? 'Put into its plus wire' : 'Put into this cable'}>
      {insertable.map((kind) => (
        <Buttons key={kind}>
          {ends.map(({ end, junction }) => (
            <SmallButton
              key={end}
              type="button"
              onClick={() => editAndSelect(insertInto({ cable: part.id, end, part: { kind } }))}
            >
              {`A ${kindWord(kind)} at ${junction}`}
            </SmallButton>
          ))}
        </Buttons>
      ))}
    </Folded>
  );
}

/** The other kinds that touch as this one does. */
export function KindChoice({ part }: { readonly part: Part }): ReactElement | null {
  const kinds = kindsAlike(part.kind);
  if (kinds.length < 2) return null;
  return (
    <ChoiceField
      label="Kind"
      value={part.kind}
      of={kinds}
      words={(kind) => kindWord(kind as PartKind)}
      required
      onCommit={(kind) => (kind === undefined ? null : takeEdit(changeKind(part.id, kind as PartKind)))}
    />
  );
}
