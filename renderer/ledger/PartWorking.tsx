/** How the answer of a part comes about, line by line, to be followed with a pocket calculator. */
import type { ReactElement } from 'react';
import { formatQuantity, type Part, partWorking, type WorkingLine } from '../../core/api.ts';
import { tables } from '../../data/index.ts';
import { BasisText } from '../controls/BasisText.tsx';
import { Figure } from '../controls/Figure.tsx';
import { Folded } from '../controls/Folded.tsx';
import { OriginMark } from '../controls/OriginMark.tsx';
import { fieldWord } from '../controls/words.ts';
import type { ChosenCase } from './chosenCase.ts';
import { answerIds } from './parts.tsx';

export function PartWorking({
  part,
  chosen,
}: {
  readonly part: Part;
  readonly chosen: ChosenCase;
}): ReactElement | null {
  const { job, operatingCase, point } = chosen;
  if (operatingCase === undefined || point === undefined || point.outcome !== 'solved') return null;
  if (!job.parts.some(({ id }) => id === part.id)) return null;
  const blocks = answerIds(part).map((id) => ({
    id,
    lines: partWorking({ job, part: id, operatingCase, point, tables }),
  }));
  const count = blocks.reduce((sum, { lines }) => sum + lines.length, 0);
  if (count === 0) return null;
  return (
    <Folded title="Working" aside={count === 1 ? '1 step' : `${String(count)} steps`}>
      {blocks.map(({ id, lines }) => (
        <div key={id}>
          {blocks.length > 1 && <div style={{ color: 'var(--soft)' }}>{id}</div>}
          <ol style={{ margin: 0, padding: 0, listStyle: 'none' }}>
            {lines.map((line) => (
              <Step key={`${line.name} ${line.formula}`} line={line} />
            ))}
          </ol>
        </div>
      ))}
    </Folded>
  );
}

function Step({ line }: { readonly line: WorkingLine }): ReactElement {
  const { name, formula, withValues, result, origins, basis, notDetermined } = line;
  return (
    <li style={{ paddingBlock: '0.375rem', fontSize: '0.875rem', lineHeight: 1.45 }}>
      <div style={{ display: 'flex', flexWrap: 'wrap', justifyContent: 'space-between', columnGap: '0.5rem' }}>
        <span>{name}</span>
        <Figure value={result.value} unit={result.unit} />
      </div>
      <div style={{ color: 'var(--soft)' }}>{formula}</div>
      {withValues !== '' && <div style={{ fontVariantNumeric: 'tabular-nums' }}>{withValues}</div>}
      {notDetermined !== undefined && <div>{notDetermined}</div>}
      {origins.length > 0 && (
        <div style={{ display: 'flex', flexWrap: 'wrap', columnGap: '0.75rem' }}>
          {origins.map(({ field, origin, range }) => (
            <span
              key={field}
              style={{
                display: 'inline-flex',
                gap: '0.25rem',
                alignItems: 'baseline',
                color: 'var(--soft)',
                fontSize: '0.8125rem',
              }}
            >
              {fieldWord(field)}
              <OriginMark origin={origin} range={range === undefined ? undefined : `(${rangeWords(range)})`} />
            </span>
          ))}
        </div>
      )}
      {basis !== undefined && <BasisText text={basis.text} status={basis.status} />}
    </li>
  );
}

function rangeWords(range: readonly [number, number]): string {
  return range.map((value) => formatQuantity({ value, unit: '', digits: 3 }).trim()).join(' to ');
}
