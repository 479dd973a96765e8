/** Proposals in the order in which they are read: what changes, cheapest first; then what nothing listed solves; apart, what stays. */
import { weightOf } from '../../../core/api.ts';
import type { ListedProposal } from '../../workers/protectionMessages.ts';

export interface SortedProposals {
  readonly open: readonly ListedProposal[];
  readonly kept: readonly ListedProposal[];
}

export function sortedProposals(runs: readonly ListedProposal[]): SortedProposals {
  const open = runs.filter(({ canTake, verdict }) => canTake || verdict === 'none-fits');
  const cost = ({ canTake, cost: of }: ListedProposal): number => (canTake ? weightOf(of) : Number.MAX_VALUE);
  return {
    open: open.toSorted((a, b) => cost(a) - cost(b)),
    kept: runs.filter((run) => !open.includes(run)),
  };
}
