/** The cases side by side, each with what it comes to; and whether the battery is taken over minutes or in its first second. */
import { styled } from '@mui/material/styles';
import type { ReactElement } from 'react';
import type { BatteryModel } from '../../../core/api.ts';
import { caseWords } from '../../ledger/chosenCase.ts';
import { useOpenJob } from '../../state/openJob.ts';
import type { BankNow } from '../../workers/stringsMessages.ts';
import { changeStringsView } from './stringsView.ts';
import type { Tags } from './tags.ts';
import { sharingInShort } from './words.ts';

export interface CaseRowProps {
  readonly now: BankNow;
  readonly caseId: string;
  readonly model: BatteryModel;
  readonly tags: Tags;
}

export function CaseRow({ now, caseId, model, tags }: CaseRowProps): ReactElement {
  const job = useOpenJob((open) => open.job);
  const choose = useOpenJob((open) => open.chooseCase);
  const words = (id: string): string => {
    const one = job.cases.find((operatingCase) => operatingCase.id === id);
    return one === undefined ? 'At rest, all off' : caseWords(one);
  };
  return (
    <Row aria-label="Operating case" style={{ marginBlock: '0.5rem' }}>
      {[...now.cases].map(([id, one]) => (
        <Chip key={id}>
          <input type="radio" name="strings-case" checked={id === caseId} onChange={() => choose(id)} />
          <span data-words title={words(id)}>
            {words(id)}
          </span>
          <em>{sharingInShort(one[model], one.banks, tags)}</em>
        </Chip>
      ))}
    </Row>
  );
}

/** Which resistance of the battery counts. */
export function ModelRow({ model }: { readonly model: BatteryModel }): ReactElement {
  return (
    <Row aria-label="Battery resistance">
      {MODELS.map(([one, said, hint]) => (
        <Chip key={one} title={hint}>
          <input
            type="radio"
            name="strings-model"
            checked={one === model}
            onChange={() => changeStringsView({ model: one })}
          />
          <span>{said}</span>
        </Chip>
      ))}
    </Row>
  );
}

const MODELS: readonly (readonly [model: BatteryModel, words: string, hint: string])[] = [
  ['slow', 'Over minutes', 'The resistance that the battery shows after some minutes: what counts for sharing.'],
  ['fast', 'First second', 'The resistance of the first second: what counts for starts and for joining.'],
];

const Row = styled('fieldset')({
  display: 'flex',
  flexWrap: 'wrap',
  gap: '0.25rem',
  border: 0,
  margin: 0,
  padding: 0,
  minWidth: 0,
});

/** A choice of a row: the mark is the browser's own, the case chosen has a copper foot too. */
const Chip = styled('label')({
  display: 'inline-flex',
  alignItems: 'center',
  gap: '0.375rem',
  minHeight: '1.75rem',
  padding: '0.0625rem 0.5rem',
  border: '1px solid var(--hair)',
  borderRadius: 3,
  fontSize: '0.875rem',
  lineHeight: 1.25,
  cursor: 'pointer',
  '& input': { accentColor: 'var(--copper)', width: '0.875rem', height: '0.875rem', margin: 0, flex: 'none' },
  '& [data-words]': { maxWidth: '11.5rem', overflow: 'hidden', textOverflow: 'ellipsis', whiteSpace: 'nowrap' },
  '& em': { fontStyle: 'normal', color: 'var(--soft)', fontVariantNumeric: 'tabular-nums', whiteSpace: 'nowrap' },
  '&:hover': { borderColor: 'var(--edge)' },
  '&:has(:checked)': {
    backgroundColor: 'var(--lit)',
    borderColor: 'var(--copper)',
    boxShadow: 'inset 0 -2px 0 var(--copper)',
  },
  '&:has(:checked) em': { color: 'var(--ink)' },
  '&:has(:focus-visible)': { outline: '2px solid var(--volt)', outlineOffset: 1 },
  '& input:focus-visible': { outline: 'none' },
  '@media (pointer: coarse)': { minHeight: 44 },
});
