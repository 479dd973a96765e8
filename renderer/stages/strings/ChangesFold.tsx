/** What could be changed in the bank, by what it does to the string that is furthest off; each can be made at once. */
import { styled } from '@mui/material/styles';
import type { ReactElement } from 'react';
import { EFFORTS, plainFields, wholeFigureText } from '../../../core/api.ts';
import { FigureTable, Sideways } from '../../controls/FigureTable.tsx';
import { More, Quiet } from '../../controls/Prose.tsx';
import { StudyPlace } from '../../controls/StudyPlace.tsx';
import type { Study } from '../../state/studies.ts';
import type { TriedChange } from '../../workers/stringsMessages.ts';
import { Fold } from './Fold.tsx';
import { MakeChange } from './MakeChange.tsx';
import { changeStringsView } from './stringsView.ts';
import { type Tags, tagOf } from './tags.ts';
import { amps, changeEffect } from './words.ts';

export interface ChangesFoldProps {
  readonly study: Study<readonly TriedChange[]>;
  readonly proposed: TriedChange | null;
  readonly tags: Tags;
}

export function ChangesFold({ study, proposed, tags }: ChangesFoldProps): ReactElement {
  return (
    <Fold
      name="changes"
      title="Changes, best first"
      answer={study.answer === null ? 'nothing has to change here; open to try' : inShort(study.answer)}
    >
      <StudyPlace study={study} doing="Trying each change on a copy of the job" begin="Try the changes">
        {(changes) =>
          changes.length === 0 ? (
            <Quiet>There is nothing here that this program could change by itself and that would move a string.</Quiet>
          ) : (
            <ChangeTable changes={changes} proposed={proposed} tags={tags} />
          )
        }
      </StudyPlace>
    </Fold>
  );
}

/** A change that leaves the worst string where it was does not help. */
export function helps({ before, after }: TriedChange): boolean {
  return after.spread < before.spread;
}

/** The least effort that brings every string within the limit, else what comes nearest to it. */
export function proposalOf(changes: readonly TriedChange[], limit: number): TriedChange | null {
  const helping = changes.filter(helps);
  const enough = helping.filter(({ after }) => after.spread <= limit);
  const least = EFFORTS.flatMap((effort) => enough.find((change) => change.effort === effort) ?? []);
  return least[0] ?? helping[0] ?? null;
}

function inShort(changes: readonly TriedChange[]): string {
  const [best] = changes;
  if (best === undefined || !helps(best)) return 'none of those tried makes it more even';
  return `${plainFields(best.label)}: ${changeEffect(best.before, best.after)}`;
}

interface ChangeTableProps {
  readonly changes: readonly TriedChange[];
  readonly proposed: TriedChange | null;
  readonly tags: Tags;
}

function ChangeTable({ changes, ...rest }: ChangeTableProps): ReactElement {
  const helping = changes.filter(helps);
  const others = changes.filter((change) => !helps(change));
  return (
    <>
      {helping.length > 0 && <Rows label="Changes, best first" changes={helping} {...rest} />}
      {others.length > 0 && (
        <More>
          <summary>{others.length} tried that do not help</summary>
          <Rows label="Changes that do not help" changes={others} {...rest} />
        </More>
      )}
    </>
  );
}

function Rows({ label, changes, proposed, tags }: ChangeTableProps & { readonly label: string }): ReactElement {
  return (
    <Sideways label={label}>
      <FigureTable>
        <thead>
          <tr>
            <th scope="col" data-text>
              Change
            </th>
            <th scope="col">Worst string off</th>
            <th scope="col">Its current</th>
            <th scope="col">Lost</th>
            <th scope="col" data-text>
              Takes
            </th>
            <th scope="col" data-text>
              <span className="only-read">Make it</span>
            </th>
          </tr>
        </thead>
        <tbody>
          {changes.map((change) => (
            <tr key={change.label}>
              <th scope="row" data-text>
                <PickChange change={change} isShown={change.label === proposed?.label} />
              </th>
              <td style={{ whiteSpace: 'nowrap' }}>{changeEffect(change.before, change.after)}</td>
              <td style={{ whiteSpace: 'nowrap' }}>
                {tagOf(tags, change.after.worst)} {amps(change.after.worstA, 3)}
              </td>
              <td style={{ whiteSpace: 'nowrap' }}>
                {wholeFigureText({ value: change.after.lostW, unit: 'W', digits: 3 })}
              </td>
              <td data-text>{change.cost}</td>
              <td data-text>
                <MakeChange change={change} short />
              </td>
            </tr>
          ))}
        </tbody>
      </FigureTable>
    </Sideways>
  );
}

function PickChange({ change, isShown }: { readonly change: TriedChange; readonly isShown: boolean }): ReactElement {
  return (
    <Pick>
      <input
        type="radio"
        name="proposed"
        checked={isShown}
        onChange={() => changeStringsView({ picked: change.label })}
      />
      <span>
        {plainFields(change.label)}
        <span className="only-read">: show as proposed</span>
      </span>
    </Pick>
  );
}

const Pick = styled('label')({
  display: 'flex',
  alignItems: 'baseline',
  gap: '0.5rem',
  minHeight: '1.5rem',
  cursor: 'pointer',
  '& input': {
    accentColor: 'var(--copper)',
    width: '0.875rem',
    height: '0.875rem',
    margin: 0,
    flex: 'none',
    alignSelf: 'center',
  },
  '@media (pointer: coarse)': { minHeight: 44, alignItems: 'center' },
});
