/** What could be done about how a bank shares, before any of it has been tried. */
import { parallelString } from '../draft/connect.ts';
import type { Draft } from '../draft/draft.ts';
import { type Edit, together } from '../draft/edit.ts';
import { setField } from '../draft/fields.ts';
import { nameOf, type StringPart } from '../job/part.ts';
import { measureBank, type SolvedBank } from '../strings/layouts/measure.ts';
import type { RowBranch } from '../strings/layouts/row.ts';
import { formatQuantity } from '../units/formatQuantity.ts';
import { movedTaps } from './bankTaps.ts';
import { equalLeads, jointsAnew, moreCopperOnLinks, thickerLeads } from './bankWiring.ts';
import { type Candidate, relabelled } from './candidate.ts';

/** Joints re-made, leads and links of more copper, leads made equal, taps moved, strings replaced, a string added. */
export function bankCandidates(solved: SolvedBank, draft: Draft): readonly Candidate[] {
  return [
    ...jointsAnew(solved, draft),
    ...thickerLeads(solved, draft),
    ...equalLeads(solved, draft),
    ...movedTaps(solved, draft),
    ...moreCopperOnLinks(solved, draft),
    ...replaced(solved),
    ...oneMore(solved),
  ];
}

/** Each string new, and all of them. */
function replaced({ row }: SolvedBank): readonly Candidate[] {
  const { branches } = row;
  const strings = row.bank.strings;
  const each = branches.map(({ branch }) => {
    const names = branch.strings.map(nameOf).join(' and ');
    return asNew(branch.strings, `${names}: replaced by new blocks of the same kind, at the same state of charge`);
  });
  return [...each, asNew(strings, 'All strings replaced at once by new blocks of the same kind')];
}

/** New blocks have no age, and neither the rest volts nor the resistance that were found on the old ones. */
function asNew(strings: readonly StringPart[], label: string): Candidate {
  const edits = strings.flatMap(({ id, emfV, resistanceOhm }): readonly Edit[] => [
    setField({ part: id, field: 'ageYears', value: 0 }),
    ...(emfV === undefined ? [] : [setField({ part: id, field: 'emfV', value: undefined })]),
    ...(resistanceOhm === undefined ? [] : [setField({ part: id, field: 'resistanceOhm', value: undefined })]),
  ]);
  const amount = strings.reduce((sum, { capacityAh }) => sum + capacityAh, 0);
  return { edit: together(label, edits), cost: blocksOf(strings), effort: 'string', amount };
}

/** One more like the branch that is nearest to its fair share, with leads like its own. */
function oneMore(solved: SolvedBank): readonly Candidate[] {
  const measure = measureBank(solved);
  const off = ({ branch }: RowBranch) =>
    Math.abs(measure?.strings.find(({ id }) => id === branch.strings[0]!.id)?.deviation ?? 0);
  const [best] = solved.row.branches
    .filter(({ branch }) => branch.strings.length === 1)
    .map((branch) => ({ branch, off: off(branch) }))
    .reduce<readonly { readonly branch: RowBranch; readonly off: number }[]>(
      (least, one) => (least[0] === undefined || one.off < least[0].off ? [one] : least),
      [],
    );
  if (best === undefined) return [];
  const { strings } = best.branch.branch;
  const string = strings[0]!;
  const label = `One more string like ${nameOf(string)}, with leads like its own`;
  const edit = relabelled(parallelString(string.id), label);
  return [{ edit, cost: blocksOf(strings), effort: 'string', amount: string.capacityAh }];
}

function blocksOf(strings: readonly StringPart[]): string {
  const counts = new Map<string, number>();
  for (const { blocksInSeries, blockNominalV, capacityAh } of strings) {
    const volts = formatQuantity({ value: blockNominalV, unit: 'V', digits: 3 });
    const kind = `of ${volts}, ${formatQuantity({ value: capacityAh, unit: 'Ah', digits: 3 })}`;
    counts.set(kind, (counts.get(kind) ?? 0) + blocksInSeries);
  }
  return [...counts]
    .map(([kind, count]) => `${String(count)} ${count === 1 ? 'block' : 'blocks'} ${kind}`)
    .join(' and ');
}
