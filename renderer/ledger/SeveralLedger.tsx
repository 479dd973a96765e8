/** Several things at once: what they are, what can be done with all of them, and the fields that all of them have. */
import type { ReactElement } from 'react';
import {
  duplicateParts,
  type JunctionId,
  joinJunctions,
  type Part,
  partFields,
  removeParts,
  setField,
  together,
} from '../../core/api.ts';
import { SmallButton } from '../controls/AskRow.tsx';
import { ChoiceField } from '../controls/ChoiceField.tsx';
import { takeEdit } from '../controls/taken.ts';
import { choiceWord, fieldWord, kindWord } from '../controls/words.ts';
import { useOpenJob } from '../state/openJob.ts';
import { editAndSelect } from './PartActions.tsx';
import { Buttons, JunctionLink, PartLink, Section, SectionTitle, Title, Under } from './parts.tsx';

export interface SeveralLedgerProps {
  readonly parts: readonly Part[];
  readonly junctions: readonly JunctionId[];
}

export function SeveralLedger({ parts, junctions }: SeveralLedgerProps): ReactElement {
  const ids = parts.map(({ id }) => id);
  const [first, second] = junctions;
  return (
    <article aria-label="Several selected">
      <Title>{countWords(parts.length, junctions.length)}</Title>
      <Under>selected together</Under>
      {parts.length > 0 && (
        <Buttons>
          <SmallButton type="button" onClick={() => editAndSelect(duplicateParts(ids))}>
            Duplicate
          </SmallButton>
          <SmallButton type="button" onClick={() => takeEdit(removeParts(ids))}>
            Delete
          </SmallButton>
        </Buttons>
      )}
      {parts.length === 0 && junctions.length === 2 && first !== undefined && second !== undefined && (
        <Buttons>
          <SmallButton type="button" onClick={() => joinBoth(first, second)}>
            {`Make one junction of ${first} and ${second}`}
          </SmallButton>
        </Buttons>
      )}
      <CommonFields parts={parts} />
      <Section aria-label="What is selected">
        <SectionTitle>What is selected</SectionTitle>
        <ul style={{ margin: 0, padding: 0, listStyle: 'none' }}>
          {parts.map((part) => (
            <li key={part.id}>
              <PartLink id={part.id} />
              <span
                style={{ color: 'var(--soft)' }}
              >{` ${kindWord(part.kind)}${part.label === undefined ? '' : `, ${part.label}`}`}</span>
            </li>
          ))}
          {junctions.map((junction) => (
            <li key={junction}>
              <JunctionLink id={junction} />
              <span style={{ color: 'var(--soft)' }}> junction</span>
            </li>
          ))}
        </ul>
      </Section>
    </article>
  );
}

function joinBoth(kept: JunctionId, joined: JunctionId): void {
  if (takeEdit(joinJunctions(kept, joined)) === null) useOpenJob.getState().select({ junctions: [kept] });
}

function countWords(parts: number, junctions: number): string {
  const told = [
    ...(parts === 0 ? [] : [parts === 1 ? '1 part' : `${String(parts)} parts`]),
    ...(junctions === 0 ? [] : [junctions === 1 ? '1 junction' : `${String(junctions)} junctions`]),
  ];
  return told.join(' and ');
}

/** Choices and switches that every selected part has; one edit sets them all. */
function CommonFields({ parts }: { readonly parts: readonly Part[] }): ReactElement | null {
  const [first, ...others] = parts;
  if (first === undefined || others.length === 0) return null;
  const shared = Object.entries(partFields.get(first.kind) ?? {}).flatMap(([field, { rule }]) => {
    const of = rule.holds === 'choice' ? rule.of : rule.holds === 'flag' ? ['yes', 'no'] : undefined;
    const isShared =
      of !== undefined && others.every(({ kind }) => partFields.get(kind)?.[field]?.rule.holds === rule.holds);
    return isShared ? [{ field, of, isFlag: rule.holds === 'flag' }] : [];
  });
  if (shared.length === 0) return null;
  return (
    <Section aria-label="For all of them">
      <SectionTitle>For all of them</SectionTitle>
      {shared.map(({ field, of, isFlag }) => (
        <ChoiceField
          key={field}
          label={fieldWord(field)}
          value={sameOf(parts, field)}
          assumed="Not the same"
          of={of}
          words={(choice) => (isFlag ? (choice === 'yes' ? 'Yes' : 'No') : choiceWord(field, choice))}
          onCommit={(choice) =>
            choice === undefined ? null : takeEdit(setAll(parts, field, isFlag ? choice === 'yes' : choice))
          }
        />
      ))}
    </Section>
  );
}

function sameOf(parts: readonly Part[], field: string): string | undefined {
  const values = new Set(parts.map((part) => (part as unknown as Record<string, unknown>)[field]));
  const [value] = values;
  if (values.size !== 1 || value === undefined) return undefined;
  if (typeof value === 'boolean') return value ? 'yes' : 'no';
  return typeof value === 'string' ? value : undefined;
}

function setAll(parts: readonly Part[], field: string, value: unknown) {
  const edits = parts.map(({ id }) => setField({ part: id, field, value }));
  return together(`${String(parts.length)} parts: ${fieldWord(field).toLowerCase()}`, edits);
}
