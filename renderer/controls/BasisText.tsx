/** The source of a figure or a rule, and how far it may be trusted. */
import type { ReactElement } from 'react';
import { type Status, withoutStatus } from '../../core/api.ts';
import { STATUS_MEANING } from './words.ts';

export interface BasisTextProps {
  readonly text: string;
  readonly status: Status;
}

export function BasisText({ text, status }: BasisTextProps): ReactElement {
  const source = withoutStatus(text);
  const isBare = status === 'common-practice' && source.startsWith('common practice');
  return (
    <span style={{ color: 'var(--soft)', fontSize: '0.8125rem' }}>
      {isBare ? '' : `${source}, `}
      <em style={{ fontStyle: status === 'published' ? 'normal' : 'italic' }}>{STATUS_MEANING[status]}</em>
    </span>
  );
}
