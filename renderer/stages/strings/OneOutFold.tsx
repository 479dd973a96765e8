/** Each string and each device of a string gone in turn: what the rest then carry, and whether they hold. */
import { styled } from '@mui/material/styles';
import type { ReactElement } from 'react';
import type { OneLoss, OneOutStudy, PartId } from '../../../core/api.ts';
import { Figure } from '../../controls/Figure.tsx';
import { FigureTable, Sideways } from '../../controls/FigureTable.tsx';
import { Quiet, Said } from '../../controls/Prose.tsx';
import { SeverityMark } from '../../controls/SeverityMark.tsx';
import { StudyPlace } from '../../controls/StudyPlace.tsx';
import type { Study } from '../../state/studies.ts';
import { Fold } from './Fold.tsx';
import { KeyOf } from './KeyOf.tsx';
import { type Tags, tagOf } from './tags.ts';
import { amps, cascadeWords, NOTICED_A } from './words.ts';

export function OneOutFold({
  study,
  tags,
}: {
  readonly study: Study<readonly OneOutStudy[]>;
  readonly tags: Tags;
}): ReactElement {
  return (
    <Fold name="one-out" title="One out" answer={study.answer === null ? '' : inShort(study.answer)}>
      <StudyPlace study={study} doing="Taking each string out in turn" begin="Take each out in turn">
        {(banks) => (
          <>
            {banks.map((bank) => (
              <BankLosses key={bank.bank} study={bank} tags={tags} />
            ))}
            {banks.length === 0 && <Quiet>No bank has two strings side by side, so none is left when one goes.</Quiet>}
          </>
        )}
      </StudyPlace>
    </Fold>
  );
}

function inShort(banks: readonly OneOutStudy[]): string {
  const [first] = banks;
  if (first === undefined) return 'no bank of two or more';
  return banks.length === 1 ? lossTitle(first) : banks.map(lossTitle).join('; ');
}

function lossTitle({ bankA, largestA, survivesA, losses }: OneOutStudy): string {
  if (Math.abs(bankA) < NOTICED_A) return 'the bank rests in this case: choose one with load or charge';
  if (survivesA === null) return 'no limit is known for these strings';
  if (largestA !== null && Math.abs(bankA) > Math.abs(largestA)) {
    return `over a limit even with all in: ${amps(bankA)} against ${amps(largestA)}`;
  }
  if (Math.abs(bankA) <= Math.abs(survivesA))
    return `any one may go: ${amps(survivesA)} survives, ${amps(bankA)} flows`;
  const falls = losses.some(({ cascade }) => cascade.length > 0);
  const then = falls ? 'fine until one drops out, then the rest follow' : 'fine until one drops out';
  return `${then}: ${amps(survivesA)} would survive, ${amps(bankA)} flows`;
}

function BankLosses({ study, tags }: { readonly study: OneOutStudy; readonly tags: Tags }): ReactElement {
  const { losses, largestA, survivesA, bankA } = study;
  const carrying = new Set<string>(losses.flatMap((loss) => loss.strings.map(({ id }) => id)));
  const strings = [...tags.values()].map(({ id }) => id).filter((id) => carrying.has(id));
  const rows = gathered(losses);
  return (
    <>
      <Said>
        The bank carries <Figure value={bankA} unit="A" digits={3} /> in this case. With all strings in it could carry{' '}
        <Figure value={largestA} unit="A" digits={3} absent="as much as no known limit forbids" />; what survives any
        one loss is <Figure value={survivesA} unit="A" digits={3} absent="not known, for want of a limit" />.
      </Said>
      <Sideways label="What the others carry when one is out">
        <FigureTable>
          <thead>
            <tr>
              <th scope="col" data-text>
                Gone
              </th>
              {strings.map((id) => (
                <th scope="col" key={id}>
                  <KeyOf tags={tags} id={id} />
                </th>
              ))}
              <th scope="col">Bank could carry</th>
              <th scope="col" data-text>
                Then
              </th>
            </tr>
          </thead>
          <tbody>
            {rows.map(({ loss, names }) => (
              <LossRow key={loss.lost} loss={loss} names={names} strings={strings} tags={tags} />
            ))}
          </tbody>
        </FigureTable>
      </Sideways>
    </>
  );
}

interface LossRowProps {
  readonly loss: OneLoss;
  readonly names: readonly string[];
  readonly strings: readonly PartId[];
  readonly tags: Tags;
}

function LossRow({ loss, names, strings, tags }: LossRowProps): ReactElement {
  return (
    <tr>
      <th scope="row" data-text>
        {loss.kind === 'string' && tags.has(loss.lost) ? `string ${tagOf(tags, loss.lost)}` : loss.lost}
        {names.length > 1 && <Other>{` or ${names.slice(1).join(', ')}`}</Other>}
      </th>
      {strings.map((id) => {
        const one = loss.strings.find((string) => string.id === id);
        if (one === undefined || loss.without.includes(id)) {
          return (
            <td key={id}>
              <Other>out</Other>
            </td>
          );
        }
        return (
          <td
            key={id}
            title={
              one.limit === null ? 'no limit known' : `limit ${amps(one.limit.limitA, 3)}: ${one.limit.basis.text}`
            }
          >
            {one.overLimit && (
              <>
                <SeverityMark severity="stop" bare /> over{' '}
              </>
            )}
            <Figure value={one.currentA} unit="A" digits={3} absent="–" />
          </td>
        );
      })}
      <td>
        <Figure value={loss.largestA} unit="A" digits={3} absent="–" />
      </td>
      <td data-text>
        {loss.outcome === 'solved' ? cascadeWords(loss, tags) || 'the rest hold' : 'no operating point is left'}
      </td>
    </tr>
  );
}

/** A device whose loss leaves the same strings as another's does to the bank what that does: told in one row. */
function gathered(
  losses: readonly OneLoss[],
): readonly { readonly loss: OneLoss; readonly names: readonly string[] }[] {
  const rows = new Map<string, { loss: OneLoss; names: string[] }>();
  for (const loss of losses) {
    const key = loss.without.toSorted().join(' ');
    const row = rows.get(key);
    if (row === undefined) rows.set(key, { loss, names: [loss.lost] });
    else row.names.push(loss.lost);
  }
  return [...rows.values()];
}

const Other = styled('span')({ color: 'var(--soft)' });
