/** Small pieces that the pages of the ledger are made of. */
import { styled } from '@mui/material/styles';
import type { ReactElement, ReactNode } from 'react';
import type { JunctionId, PartId } from '../../core/api.ts';
import { LinkButton } from '../controls/AskRow.tsx';
import { useOpenJob } from '../state/openJob.ts';

export const Page = styled('div')({
  containerType: 'inline-size',
  padding: '0.75rem 0.75rem 2rem',
  fontSize: '0.9375rem',
  overflowWrap: 'anywhere',
});

export const Title = styled('h2')({ margin: 0, fontSize: '1.1875rem', fontWeight: 600, lineHeight: 1.25 });

export const Under = styled('p')({ margin: '0.125rem 0 0.5rem', color: 'var(--soft)', fontSize: '0.875rem' });

const Rows = styled('dl')({
  display: 'grid',
  gridTemplateColumns: 'minmax(5rem, 7.25rem) minmax(0, 1fr)',
  columnGap: '0.5rem',
  margin: 0,
  paddingBlock: '0.25rem',
  '& > dt': { color: 'var(--soft)', fontSize: '0.875rem', paddingBlock: '0.125rem' },
  '& > dd': { margin: 0, paddingBlock: '0.125rem' },
});

export interface Row {
  readonly name: string;
  readonly value: ReactNode;
}

export function RowList({ rows }: { readonly rows: readonly Row[] }): ReactElement {
  return (
    <Rows>
      {rows.flatMap(({ name, value }) => [<dt key={`${name} name`}>{name}</dt>, <dd key={name}>{value}</dd>])}
    </Rows>
  );
}

export const Section = styled('section')({ borderTop: '1px solid var(--hair)', paddingBlock: '0.375rem' });

export const SectionTitle = styled('h3')({ margin: '0 0 0.125rem', fontSize: '0.9375rem', fontWeight: 600 });

export const Buttons = styled('div')({ display: 'flex', flexWrap: 'wrap', gap: '0.25rem', paddingBlock: '0.375rem' });

/** Goes to a part; a cable of an out-and-back run goes to the run. */
export function PartLink({ id }: { readonly id: string }): ReactElement {
  const known = useOpenJob(
    (open) =>
      open.job.parts.find((part) => part.id === id || `${part.id}.plus` === id || `${part.id}.minus` === id)?.id,
  );
  if (known === undefined) return <span>{id}</span>;
  return (
    <LinkButton type="button" onClick={() => useOpenJob.getState().select({ parts: [known] })}>
      {id}
    </LinkButton>
  );
}

export function JunctionLink({ id }: { readonly id: JunctionId }): ReactElement {
  return (
    <LinkButton type="button" onClick={() => useOpenJob.getState().select({ junctions: [id] })}>
      {id}
    </LinkButton>
  );
}

/** The parts of an answer that stand for a part of the drawing: itself, or the two cables of an out-and-back run. */
export function answerIds(part: { readonly id: PartId; readonly kind: string }): readonly PartId[] {
  return part.kind === 'pair' ? [`${part.id}.plus` as PartId, `${part.id}.minus` as PartId] : [part.id];
}
