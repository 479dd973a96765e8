/** Joints and cables of a bank: made anew, made equal, made of more copper. */
import { areaOf, nextSizeUp } from '../conductor/size.ts';
import { type Draft, rawPart } from '../draft/draft.ts';
import { type Edit, together } from '../draft/edit.ts';
import { setField } from '../draft/fields.ts';
import type { CablePart, ConductorSize, JointPart, PartId } from '../job/part.ts';
import { nameOf } from '../job/part.ts';
import type { SolvedBank } from '../strings/layouts/measure.ts';
import { POLES, type Row } from '../strings/layouts/row.ts';
import { sizeText } from '../units/conductorSize.ts';
import { formatQuantity } from '../units/formatQuantity.ts';
import type { Candidate } from './candidate.ts';

/** Crimped lug with its bolt, planning value; common practice, no source. */
const GOOD_JOINT_OHM = 0.00005;
/** Joints and ends that are tried one by one, at most. */
const MOST_JOINTS = 12;

/** Each joint and each cable's terminations that are worse than good work, made anew; then all at once. */
export function jointsAnew(solved: SolvedBank, draft: Draft): readonly Candidate[] {
  const joints = solved.row.wiring.filter((part) => part.kind === 'joint').flatMap(jointAnew);
  const ends = conductorsIn(solved.row.wiring.filter((part) => part.kind === 'cable')).flatMap((cable) =>
    endsAnew(cable, draft),
  );
  const each = [...joints, ...ends];
  if (each.length < 2) return each;
  const edit = together(
    `All joints of the bank made anew (${String(each.length)})`,
    each.map((one) => one.edit),
  );
  const all: Candidate = {
    edit,
    cost: `${String(each.length)} joints made anew`,
    effort: 'joint',
    amount: each.length,
  };
  const most = [...each];
  most.sort((a, b) => b.excessOhm - a.excessOhm);
  return [...most.slice(0, MOST_JOINTS), all];
}

type JointCandidate = Candidate & { readonly excessOhm: number };

function jointAnew(joint: JointPart): readonly JointCandidate[] {
  if (joint.resistanceOhm <= GOOD_JOINT_OHM) return [];
  const label = `Joint ${nameOf(joint)}: made anew, ${ohms(GOOD_JOINT_OHM)} instead of ${ohms(joint.resistanceOhm)}`;
  const edit = setField({ part: joint.id, field: 'resistanceOhm', value: GOOD_JOINT_OHM, origin: 'guess' });
  return [made(together(label, [edit]), 'a joint made anew', joint.resistanceOhm - GOOD_JOINT_OHM)];
}

function endsAnew(cable: CablePart, draft: Draft): readonly JointCandidate[] {
  const good = 2 * GOOD_JOINT_OHM;
  // Written figures keep their last digit: 2 x 0.05 mOhm is as good as good gets.
  if (cable.endOhm <= good * (1 + 1e-9)) return [];
  const label = `Cable ${nameOf(cable)}: both terminations made anew, ${ohms(good)} instead of ${ohms(cable.endOhm)}`;
  const edit = setField({ part: homeOf(cable.id, draft).part, field: 'endOhm', value: good, origin: 'guess' });
  return [made(together(label, [edit]), 'two terminations made anew', cable.endOhm - good)];
}

function made(edit: Edit, cost: string, excessOhm: number): JointCandidate {
  return { edit, cost, effort: 'joint', amount: 1, excessOhm };
}

/** The next size up for the leads of one branch, each in turn. */
export function thickerLeads(solved: SolvedBank, draft: Draft): readonly Candidate[] {
  return solved.row.branches.flatMap(({ branch, own }) => {
    const cables = conductorsIn([...own.plus.parts, ...own.minus.parts].filter((part) => part.kind === 'cable'));
    return thicker(solved, draft, { cables, what: `Leads of ${nameOf(branch.strings[0]!)}` });
  });
}

/** All links of a ladder of the next size up, or doubled. */
export function moreCopperOnLinks(solved: SolvedBank, draft: Draft): readonly Candidate[] {
  const cables = conductorsIn(solved.row.links.flatMap(({ parts }) => parts).filter((part) => part.kind === 'cable'));
  if (cables.length === 0) return [];
  const what = 'All links between the strings';
  return [...thicker(solved, draft, { cables, what }), doubled(solved, draft, { cables, what })];
}

interface Cables {
  readonly cables: readonly CablePart[];
  readonly what: string;
}

function thicker(solved: SolvedBank, draft: Draft, { cables, what }: Cables): readonly Candidate[] {
  const { conductors } = solved.tables;
  const changes = cables.flatMap((cable) => {
    const to = cable.size === undefined ? undefined : nextSizeUp(cable.size, conductors);
    return to === undefined ? [] : [{ cable, to }];
  });
  if (changes.length === 0) return [];
  const sizes = [...new Set(changes.map(({ cable, to }) => `${sizeText(to)} instead of ${sizeText(cable.size!)}`))];
  const edits = changes.flatMap(({ cable, to }) => {
    const { part, isReturn } = homeOf(cable.id, draft);
    const field = isReturn ? 'minusSize' : 'size';
    return [setField({ part, field, value: sizeText(to) }), ...ownResistance(cable, part)];
  });
  const amount = changes.reduce((sum, { cable, to }) => sum + cable.lengthM * cable.inParallel * area(solved, to), 0);
  const cost = lengths(changes.map(({ cable, to }) => ({ ...cable, size: to })));
  return [{ edit: together(`${what}: ${sizes.join(', ')}`, edits), cost, effort: 'cable', amount }];
}

function doubled(solved: SolvedBank, draft: Draft, { cables, what }: Cables): Candidate {
  const edits = cables.flatMap((cable) => {
    const { part } = homeOf(cable.id, draft);
    return [setField({ part, field: 'inParallel', value: 2 * cable.inParallel }), ...ownResistance(cable, part)];
  });
  const amount = cables.reduce((sum, { lengthM, inParallel, size }) => {
    return sum + lengthM * inParallel * (size === undefined ? 1 : area(solved, size));
  }, 0);
  return { edit: together(`${what}: doubled`, edits), cost: lengths(cables), effort: 'cable', amount };
}

/** A new cable has its own resistance, not the one that was measured on the old. */
function ownResistance({ resistanceOhm, size }: CablePart, part: PartId): readonly Edit[] {
  return resistanceOhm === undefined || size === undefined
    ? []
    : [setField({ part, field: 'resistanceOhm', value: undefined })];
}

/** Every lead as long as the longest of its pole, where every branch has one on that pole. */
export function equalLeads(solved: SolvedBank, draft: Draft): readonly Candidate[] {
  const changes = leadsToEqual(solved.row);
  if (changes.length === 0) return [];
  const edits = changes.flatMap(({ cable, scale }) => {
    const { part, isReturn } = homeOf(cable.id, draft);
    const field = isReturn ? 'minusLengthM' : 'lengthM';
    const lengthM = cable.lengthM * scale;
    const { resistanceOhm } = cable;
    // A measured resistance goes with the length, but is no longer measured.
    const measured =
      resistanceOhm === undefined
        ? []
        : [setField({ part, field: 'resistanceOhm', value: resistanceOhm * scale, origin: 'guess' })];
    // A run whose file states one length for both conductors: the return keeps its own.
    const back = solved.parts.find(({ id }) => part !== cable.id && !isReturn && id === `${part}.minus`);
    const returns = back?.kind === 'cable' ? [setField({ part, field: 'minusLengthM', value: back.lengthM })] : [];
    return [...returns, setField({ part, field, value: lengthM }), ...measured];
  });
  const text = changes.map(
    ({ cable, scale }) => `${cable.id} ${metres(cable.lengthM * scale)} instead of ${metres(cable.lengthM)}`,
  );
  const longer = changes.map(({ cable, scale }) => ({ ...cable, lengthM: cable.lengthM * scale }));
  return [
    {
      edit: together(`All leads of the strings alike: ${text.join(', ')}`, edits),
      cost: lengths(longer),
      effort: 'cable',
      amount: longer.reduce((sum, { lengthM }) => sum + lengthM, 0),
    },
  ];
}

function leadsToEqual({ branches, isLadder }: Row) {
  if (isLadder) return [];
  return POLES.flatMap((pole) => {
    const leads = branches.map(({ own }) => own[pole].parts.filter((part) => part.kind === 'cable'));
    const lengthsM = leads.map((cables) => cables.reduce((sum, { lengthM }) => sum + lengthM, 0));
    const longestM = Math.max(...lengthsM);
    if (lengthsM.some((lengthM) => lengthM === 0)) return [];
    return leads.flatMap((cables, k) =>
      lengthsM[k] === longestM ? [] : cables.map((cable) => ({ cable, scale: longestM / lengthsM[k]! })),
    );
  });
}

/** Conductors named once. */
function conductorsIn(cables: readonly CablePart[]): readonly CablePart[] {
  return [...new Map(cables.map((cable) => [cable.id, cable])).values()];
}

/** The part of the file that a conductor belongs to: itself, or the out-and-back run of which it is one. */
function homeOf(id: PartId, draft: Draft): { readonly part: PartId; readonly isReturn: boolean } {
  // A cable may be called `W.minus` itself.
  const [, pair, pole] = rawPart(draft, id) === undefined ? (/^(.*)\.(plus|minus)$/.exec(id) ?? []) : [];
  return pair === undefined ? { part: id, isReturn: false } : { part: pair as PartId, isReturn: pole === 'minus' };
}

function area({ tables }: SolvedBank, size: ConductorSize): number {
  const found = areaOf(size, tables.conductors);
  return 'missing' in found ? 1 : found.value;
}

/** `2.4 m of 35 mm²` for each size. */
function lengths(cables: readonly Pick<CablePart, 'lengthM' | 'inParallel' | 'size'>[]): string {
  const bySize = new Map<string, number>();
  for (const { lengthM, inParallel, size } of cables) {
    const text = size === undefined ? 'cable' : sizeText(size);
    bySize.set(text, (bySize.get(text) ?? 0) + lengthM * inParallel);
  }
  return [...bySize].map(([text, lengthM]) => `${metres(lengthM)} of ${text}`).join(' and ');
}
function ohms(value: number): string {
  return formatQuantity({ value, unit: 'ohm', digits: 3 });
}
function metres(value: number): string {
  return formatQuantity({ value, unit: 'm', digits: 3 });
}
