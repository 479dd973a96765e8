/** The cases side by side, each with what it comes to; and whether the battery is taken over minutes or in its first second. */
import type { ReactElement } from 'react';
import type { BatteryModel } from '../../../core/api.ts';
import { Chip, ChipRow } from '../../controls/Chips.tsx';
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
    <ChipRow aria-label="Operating case" style={{ marginBlock: '0.5rem' }}>
      {[...now.cases].map(([id, one]) => (
        <Chip key={id}>
          <input type="radio" name="strings-case" checked={id === caseId} onChange={() => choose(id)} />
          <span data-words title={words(id)}>
            {words(id)}
          </span>
          <em>{sharingInShort(one[model], one.banks, tags)}</em>
        </Chip>
      ))}
    </ChipRow>
  );
}

/** Which resistance of the battery counts. */
export function ModelRow({ model }: { readonly model: BatteryModel }): ReactElement {
  return (
    <ChipRow aria-label="Battery resistance">
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
    </ChipRow>
  );
}

const MODELS: readonly (readonly [model: BatteryModel, words: string, hint: string])[] = [
  ['slow', 'Over minutes', 'The resistance that the battery shows after some minutes: what counts for sharing.'],
  ['fast', 'First second', 'The resistance of the first second: what counts for starts and for joining.'],
];
