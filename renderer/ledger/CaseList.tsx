/** The operating cases: which one is looked at, and what each sets. */
import type { ReactElement } from 'react';
import { addCase, type CaseField, removeCase, renameCase, setCase } from '../../core/api.ts';
import { Group, LinkButton, SmallButton } from '../controls/AskRow.tsx';
import { ChoiceField } from '../controls/ChoiceField.tsx';
import { Folded } from '../controls/Folded.tsx';
import { QuantityField } from '../controls/QuantityField.tsx';
import { TextField } from '../controls/TextField.tsx';
import { type Taken, takeEdit } from '../controls/taken.ts';
import { useOpenJob } from '../state/openJob.ts';
import { caseWords, type ListedCase, listedCases } from './chosenCase.ts';
import { Buttons, Section, SectionTitle, Under } from './parts.tsx';

export function CaseList(): ReactElement {
  const job = useOpenJob((open) => open.job);
  const draft = useOpenJob((open) => open.draft);
  const caseId = useOpenJob((open) => open.caseId);
  const choose = useOpenJob((open) => open.chooseCase);
  const cases = (job.cases ?? []).map(({ id, label }) => ({ id, words: caseWords({ id, label }) }));
  const all = cases.some(({ id }) => id === 'at-rest')
    ? cases
    : [...cases, { id: 'at-rest', words: 'At rest, everything off' }];
  const raw = listedCases(draft).find(({ id }) => id === caseId) ?? { id: caseId };
  const isEditable = cases.some(({ id }) => id === caseId);
  return (
    <Section aria-label="Operating cases">
      <SectionTitle>Operating cases</SectionTitle>
      <Group aria-label="Which case is looked at">
        {all.map(({ id, words }) => (
          <label key={id} style={{ display: 'flex', gap: '0.5rem', alignItems: 'center', minHeight: '1.75rem' }}>
            <input
              type="radio"
              name="looked-at"
              checked={id === caseId}
              onChange={() => choose(id)}
              style={{ accentColor: 'var(--copper)', flex: 'none' }}
            />
            {words}
          </label>
        ))}
      </Group>
      {isEditable ? (
        <CaseFields key={caseId} raw={raw} />
      ) : (
        <Under>Everything that can be switched off is off, for the currents between batteries.</Under>
      )}
      <Buttons>
        <SmallButton type="button" onClick={() => addLike(isEditable ? caseId : undefined)}>
          {isEditable ? 'Add a case like this one' : 'Add a case'}
        </SmallButton>
        {isEditable && listedCases(draft).length > 0 && (
          <SmallButton type="button" onClick={() => takeEdit(removeCase(caseId))}>
            Remove this case
          </SmallButton>
        )}
      </Buttons>
    </Section>
  );
}

/** Adds a case and looks at it. */
function addLike(like: string | undefined): void {
  const before = new Set(useOpenJob.getState().job.cases.map(({ id }) => id));
  if (takeEdit(addCase(like === undefined ? {} : { like })) !== null) return;
  const added = useOpenJob.getState().job.cases.find(({ id }) => !before.has(id));
  if (added !== undefined) useOpenJob.getState().chooseCase(added.id);
}

function CaseFields({ raw }: { readonly raw: ListedCase }): ReactElement {
  const { id } = raw;
  const parts = useOpenJob((open) => open.job.parts);
  const set = (field: CaseField) => (value: unknown) => takeEdit(setCase({ case: id, field, value }));
  const figure = (field: CaseField) => raw[field] as number | string | undefined;
  const starters = parts.filter((part) => part.kind === 'load' || part.kind === 'inverter');
  const words = new Map(
    starters.map((part) => [part.id as string, part.label === undefined ? part.id : `${part.id}, ${part.label}`]),
  );
  return (
    <>
      <TextField label="Label" value={raw.label} onCommit={set('label')} />
      <QuantityField
        label="Strings at"
        unit="1"
        given={figure('stateOfCharge')}
        assumed="as drawn"
        onCommit={set('stateOfCharge')}
      />
      <QuantityField
        label="Air"
        unit="degC"
        given={figure('ambientDegC')}
        assumed="as the site"
        onCommit={set('ambientDegC')}
      />
      <QuantityField
        label="Sun on the array"
        unit="W/m2"
        given={figure('irradianceWPerM2')}
        assumed="1000 W/m²"
        onCommit={set('irradianceWPerM2')}
      />
      <ChoiceField
        label="Starts up"
        value={raw['surge'] as string | undefined}
        assumed="Nothing"
        of={starters.map((part) => part.id)}
        words={(part) => words.get(part) ?? part}
        onCommit={set('surge')}
      />
      <EachString raw={raw} />
      <SetHere raw={raw} />
      <TextField label="Short name" value={id} required onCommit={(name) => rename(id, name)} />
    </>
  );
}

function rename(id: string, name: string | undefined): Taken {
  if (name === undefined) return null;
  const trouble = takeEdit(renameCase(id, name));
  if (trouble === null) useOpenJob.getState().chooseCase(name);
  return trouble;
}

/** The charge of single strings, where they are not all alike. */
function EachString({ raw }: { readonly raw: ListedCase }): ReactElement | null {
  const parts = useOpenJob((open) => open.job.parts);
  const strings = parts.filter((part) => part.kind === 'string');
  if (strings.length < 2) return null;
  const set = (raw['stateOfChargeByString'] ?? {}) as Readonly<Record<string, number | string>>;
  const count = Object.keys(set).length;
  const commit = (string: string, charge: number | string | undefined): Taken => {
    const { [string]: _, ...others } = set;
    const next = charge === undefined ? others : { ...others, [string]: charge };
    const value = Object.keys(next).length === 0 ? undefined : next;
    return takeEdit(setCase({ case: raw.id, field: 'stateOfChargeByString', value }));
  };
  return (
    <Folded title="Charge of each string" aside={count === 0 ? 'all alike' : `${String(count)} set`}>
      {strings.map(({ id }) => (
        <QuantityField
          key={id}
          label={id}
          unit="1"
          given={set[id]}
          assumed="as the others"
          onCommit={(charge) => commit(id, charge)}
        />
      ))}
    </Folded>
  );
}

/** The parts that this case sets apart from the drawing. */
function SetHere({ raw }: { readonly raw: ListedCase }): ReactElement | null {
  const set = (raw['set'] ?? {}) as Readonly<Record<string, Readonly<Record<string, unknown>>>>;
  const ids = Object.keys(set);
  if (ids.length === 0) return null;
  return (
    <Folded title="Set in this case" aside={`${String(ids.length)} ${ids.length === 1 ? 'part' : 'parts'}`}>
      {ids.map((id) => (
        <div key={id} style={{ fontSize: '0.875rem' }}>
          <LinkButton type="button" onClick={() => useOpenJob.getState().select({ parts: [id as never] })}>
            {id}
          </LinkButton>
        </div>
      ))}
    </Folded>
  );
}
