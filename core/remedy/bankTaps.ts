/** Loads and chargers connected at another string's post of a ladder. */
import { type Draft, rawPart } from '../draft/draft.ts';
import { together } from '../draft/edit.ts';
import { attach } from '../draft/junctions.ts';
import { terminalsOf as terminalsOfPart } from '../draft/terminals.ts';
import type { JunctionId } from '../job/part.ts';
import { nameOf } from '../job/part.ts';
import { type SolvedBank, terminalsOf } from '../strings/layouts/measure.ts';
import { POLES, type Pole } from '../strings/layouts/row.ts';
import type { Candidate } from './candidate.ts';

/** In a longer row only the ends and the middle are tried. */
const MOST_IN_FULL = 6;

/** Everything that is fed from the bank's tap of a pole, moved to each other post of that pole; each pole by itself. */
export function movedTaps(solved: SolvedBank, draft: Draft): readonly Candidate[] {
  const { row } = solved;
  if (!row.isLadder) return [];
  const terminals = terminalsOf(solved);
  return POLES.flatMap((pole) => {
    const from = terminals[pole];
    const now = row.branches.find(({ own }) => own[pole].end === from);
    const nowAt = now === undefined ? from : nameOf(now.branch.strings[0]!);
    return placesToTry(row.branches.length).flatMap((k) => {
      const { branch, own } = row.branches[k]!;
      const to = own[pole].end;
      if (to === from) return [];
      const label = `${pole === 'plus' ? 'Plus' : 'Minus'} feed taken from ${nameOf(branch.strings[0]!)} instead of ${nowAt}`;
      return moved(solved, draft, { pole, from, to, label });
    });
  });
}

function placesToTry(count: number): readonly number[] {
  const all = Array.from({ length: count }, (_, k) => k);
  const middle = (count - 1) / 2;
  return count <= MOST_IN_FULL ? all : all.filter((k) => k === 0 || k === count - 1 || Math.abs(k - middle) < 1);
}

interface Move {
  readonly pole: Pole;
  readonly from: JunctionId;
  readonly to: JunctionId;
  readonly label: string;
}

function moved({ row, job }: SolvedBank, draft: Draft, { from, to, label }: Move): readonly Candidate[] {
  const ours = new Set<string>([...row.wiring, ...row.bank.strings].map(({ id }) => id.replace(/\.(plus|minus)$/, '')));
  const terminals = job.parts.flatMap(({ id, kind }) => {
    // A bond carries no working current; where it is fixed does not matter here.
    const raw = kind === 'bond' || ours.has(id) ? undefined : rawPart(draft, id);
    return raw === undefined
      ? []
      : terminalsOfPart(raw)
          .filter(({ junction }) => junction === from)
          .map(({ path }) => ({ part: id, terminal: path, junction: to }));
  });
  if (terminals.length === 0) return [];
  const cost = terminals.length === 1 ? 'one lead moved' : `${String(terminals.length)} leads moved`;
  return [{ edit: together(label, terminals.map(attach)), cost, effort: 'joint', amount: terminals.length }];
}
