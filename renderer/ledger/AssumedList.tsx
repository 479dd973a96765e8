/** What the solve took for granted, each thing once, with the parts that it was taken for. */
import type { ReactElement } from 'react';
import { type Assumption, formatQuantity, plainFields } from '../../core/api.ts';
import { BasisText } from '../controls/BasisText.tsx';
import { Folded } from '../controls/Folded.tsx';
import { OriginMark } from '../controls/OriginMark.tsx';
import { choiceWord, fieldWord } from '../controls/words.ts';
import { PartLink } from './parts.tsx';

/** Parts named before the rest are only counted. */
const mostNamed = 8;

export function AssumedList({ assumptions }: { readonly assumptions: readonly Assumption[] }): ReactElement | null {
  if (assumptions.length === 0) return null;
  const groups = [...grouped(assumptions)];
  return (
    <Folded title="What was assumed" aside={String(assumptions.length)}>
      <ul style={{ margin: 0, padding: 0, listStyle: 'none' }}>
        {groups.map(([key, alike]) => (
          <Alike key={key} alike={alike} />
        ))}
      </ul>
    </Folded>
  );
}

function grouped(assumptions: readonly Assumption[]): ReadonlyMap<string, readonly Assumption[]> {
  const groups = new Map<string, Assumption[]>();
  for (const one of assumptions) {
    const key = JSON.stringify([one.field, one.value, one.unit, one.range, one.basis.text]);
    const alike = groups.get(key);
    if (alike === undefined) groups.set(key, [one]);
    else alike.push(one);
  }
  return groups;
}

function Alike({ alike }: { readonly alike: readonly Assumption[] }): ReactElement | null {
  const [first] = alike;
  if (first === undefined) return null;
  const { field, value, unit, range, origin, basis, text } = first;
  const named = alike.flatMap(({ part }) => (part === null ? [] : [part])).slice(0, mostNamed);
  const others = alike.length - named.length;
  return (
    <li style={{ paddingBlock: '0.375rem', fontSize: '0.875rem' }}>
      <div style={{ display: 'flex', flexWrap: 'wrap', justifyContent: 'space-between', columnGap: '0.5rem' }}>
        <span>
          <AssumedFigure field={field} value={value} unit={unit} />
          {range !== null && (
            <span
              style={{ color: 'var(--soft)' }}
            >{` (${formatQuantity({ value: range[0], unit, digits: 3 })} to ${formatQuantity({ value: range[1], unit, digits: 3 })})`}</span>
          )}
        </span>
        <OriginMark origin={origin} />
      </div>
      {named.length === 0 ? (
        <div>{plainFields(text)}</div>
      ) : (
        <div style={{ display: 'flex', flexWrap: 'wrap', columnGap: '0.5rem' }}>
          {named.map((part) => (
            <PartLink key={part} id={part} />
          ))}
          {others > 0 && <span style={{ color: 'var(--soft)' }}>{`and ${String(others)} more`}</span>}
        </div>
      )}
      <BasisText text={basis.text} status={basis.status} />
    </li>
  );
}

/** A figure with the name of its field; what the solve says in words speaks for itself. */
function AssumedFigure({ field, value, unit }: Pick<Assumption, 'field' | 'value' | 'unit'>): ReactElement {
  if (typeof value === 'string' && unit === '') {
    const words = plainFields(value);
    return <span>{`${words.charAt(0).toUpperCase()}${words.slice(1)}`}</span>;
  }
  return (
    <>
      {`${fieldWord(field)}: `}
      <strong style={{ fontWeight: 600 }}>
        {typeof value === 'number' ? formatQuantity({ value, unit }) : choiceWord(field, value)}
      </strong>
    </>
  );
}
