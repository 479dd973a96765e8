/** A list of junctions to choose from by keyboard, narrowed by what is typed. */
import { styled } from '@mui/material/styles';
import { type ReactElement, useState } from 'react';
import { EARTH, type JunctionId, junctionsOf } from '../../core/api.ts';
import { useOpenJob } from '../state/openJob.ts';
import { useLive } from './live.ts';
import { useFocusAtFirst } from './useFocusAtFirst.ts';

const Row = styled('button')({
  display: 'flex',
  justifyContent: 'space-between',
  gap: '0.5rem',
  width: '100%',
  font: 'inherit',
  fontSize: '0.875rem',
  textAlign: 'left',
  color: 'var(--ink)',
  background: 'transparent',
  border: 0,
  borderRadius: 3,
  padding: '0.2rem 0.25rem',
  cursor: 'pointer',
  '&:hover': { background: 'var(--lit)' },
  '& .meets': { color: 'var(--soft)' },
  '@media (pointer: coarse)': { minHeight: 44 },
});
const MOST = 40;

export function JunctionChooser({
  from,
  onChoose,
}: {
  readonly from: JunctionId;
  readonly onChoose: (to: JunctionId) => void;
}): ReactElement {
  const job = useOpenJob((open) => open.job);
  const volts = useLive((now) => now.volts);
  const [asked, setAsked] = useState('');
  const field = useFocusAtFirst<HTMLInputElement>();
  const meets = new Map<JunctionId, string[]>();
  for (const part of job.parts)
    for (const each of new Set(junctionsOf(part))) meets.set(each, [...(meets.get(each) ?? []), part.id]);
  const wanted = asked.trim().toLowerCase();
  const found = [...meets].filter(
    ([id, parts]) => id !== from && id !== EARTH && `${id} ${parts.join(' ')}`.toLowerCase().includes(wanted),
  );
  return (
    <div>
      <input
        type="search"
        ref={field}
        value={asked}
        aria-label="Find a junction by its name or by a part"
        placeholder="Name or part"
        style={{
          width: '100%',
          boxSizing: 'border-box',
          font: 'inherit',
          padding: '0.3rem 0.5rem',
          background: 'var(--sheet)',
          color: 'var(--ink)',
          border: '1px solid var(--edge)',
          borderRadius: 3,
        }}
        onChange={(event) => setAsked(event.target.value)}
        onKeyDown={(event) => {
          const [first] = found;
          if (event.key === 'Enter' && first !== undefined) onChoose(first[0]);
        }}
      />
      <div style={{ maxHeight: '18rem', overflow: 'auto', marginTop: '0.25rem' }}>
        {found.slice(0, MOST).map(([id, parts]) => (
          <Row key={id} type="button" onClick={() => onChoose(id)}>
            <span>
              {id} <span className="meets">{parts.join(', ')}</span>
            </span>
            <span style={{ color: 'var(--volt)' }}>{volts.get(id) ?? ''}</span>
          </Row>
        ))}
        {found.length > MOST && (
          <p style={{ fontSize: '0.8125rem' }}>{`${String(found.length - MOST)} more: type to narrow.`}</p>
        )}
      </div>
    </div>
  );
}
