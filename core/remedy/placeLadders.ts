/** Fuses put in where one is wanted, pieces sheathed, switches that isolate, legs made alike. */
import { areaOf } from '../conductor/size.ts';
import { insertInto } from '../draft/connect.ts';
import { together } from '../draft/edit.ts';
import { setField } from '../draft/fields.ts';
import type { CablePart, JunctionId, PartId } from '../job/part.ts';
import { nameOf } from '../job/part.ts';
import { isWiring, joined, meetings, polesOf, withoutPairs } from '../network/wiring.ts';
import { sizeText } from '../units/conductorSize.ts';
import { formatQuantity } from '../units/formatQuantity.ts';
import { type Bench, type Candidate, type Ladder, relabelled, stepped } from './candidate.ts';
import { fuseAtString } from './deviceLadders.ts';

/** The unfused piece sheathed throughout: the cables of the finding, or the device that says how far it sits. */
export function sheathedPiece(bench: Bench, ids: readonly [device: PartId, ...others: PartId[]]): readonly Ladder[] {
  const device = bench.drawn(ids[0]);
  const cables = ids.slice(1).filter((id) => cableOf(bench, id) !== undefined);
  const isEntered = device !== undefined && 'distanceFromSourceM' in device && device.distanceFromSourceM !== undefined;
  const sheathed = isEntered ? [ids[0]] : cables;
  if (sheathed.length === 0) return [];
  // A conductor of an out-and-back run goes with the whole run.
  const whole = [...new Set(sheathed.map((id) => wholeOf(bench, id)))];
  const label = `${whole.join(', ')}: the unfused piece sheathed throughout`;
  const edit = together(
    label,
    whole.map((part) => setField({ part, field: 'sheathed', value: true })),
  );
  return [stepped([{ edit, cost: 'a sheath', effort: 'joint', amount: 1, sameAnswers: true }])];
}

/** A fuse for each string that has a cable right at its post. */
export function fuseEachString(bench: Bench, ids: readonly PartId[]): readonly Ladder[] {
  const rungs = ids.flatMap((id) => fuseAtString(bench, id).flatMap((ladder) => ladder.rungs.slice(0, 1)));
  if (rungs.length === 0) return [];
  const label = rungs.map(({ edit }) => edit.label).join('; ');
  const edit = together(
    label,
    rungs.map((rung) => rung.edit),
  );
  const cost = `${rungs.length === 1 ? 'one fuse' : `${rungs.length} fuses`} with ${rungs.length === 1 ? 'its holder' : 'holders'}`;
  return [stepped([{ edit, cost, effort: 'part-in', amount: rungs.reduce((sum, { amount }) => sum + amount, 0) }])];
}

/** A fuse where a thinner cable begins: at either end of it, of the largest standard rating within the limit. */
export function fuseInto(bench: Bench, cable: PartId, mostA: number): readonly Ladder[] {
  const ratingA = standardRatings(bench)
    .filter((rating) => rating <= mostA * (1 + ROUNDING))
    .at(-1);
  if (ratingA === undefined || cableOf(bench, cable) === undefined) return [];
  const rungs = (['from', 'to'] as const).map((end): Candidate => {
    const label = `A ${amps(ratingA)} fuse where ${cable} begins`;
    const edit = relabelled(insertInto({ cable, end, part: { kind: 'fuse', ratingA } }), label);
    return { edit, cost: `one ${amps(ratingA)} fuse with its holder`, effort: 'part-in', amount: ratingA };
  });
  return [stepped(rungs)];
}
const ROUNDING = 1e-9;

/** A device or switch put into the first cable behind the plus post of a source. */
export function atSource(bench: Bench, id: PartId, kind: 'fuse' | 'switch'): readonly Ladder[] {
  const drawn = withoutPairs(bench.job.parts);
  const part = drawn.find((one) => one.id === id);
  const poles = part === undefined ? undefined : polesOf(part).find(({ role }) => role === 'source');
  const lead = poles === undefined ? undefined : firstCable(bench, poles.plus, id);
  if (part === undefined || lead === undefined) return [];
  const carriedA = 'outputA' in part ? part.outputA : Math.abs(bench.point.parts.get(id)?.currentA ?? 0);
  const ratingA = standardRatings(bench).find((rating) => rating >= carriedA * bench.job.settings.continuousFactor);
  if (ratingA === undefined) return [];
  const fields = kind === 'fuse' ? ({ kind, ratingA } as const) : ({ kind, ratingA, loadBreak: true } as const);
  const words = kind === 'fuse' ? `${amps(ratingA)} fuse` : `${amps(ratingA)} switch that breaks its direct current`;
  const edit = relabelled(insertInto({ ...lead, part: fields }), `A ${words} in the plus lead at ${nameOf(part)}`);
  return [stepped([{ edit, cost: `one ${words}`, effort: 'part-in', amount: ratingA }])];
}

/** The first cable that carries the current of a post alone, and its end on that side. */
function firstCable(bench: Bench, post: JunctionId, behind: PartId) {
  const ends = meetings(withoutPairs(bench.job.parts));
  let [junction, last] = [post, behind];
  for (let step = 0; step < MOST_STEPS; step++) {
    const here = ends.get(junction) ?? [];
    const next = here.find(({ part }) => part.id !== last)?.part;
    if (here.length !== 2 || next === undefined || !isWiring(next) || joined(next).length !== 2) return undefined;
    if (next.kind === 'cable') return { cable: next.id, end: next.from === junction ? 'from' : 'to' } as const;
    junction = joined(next).find((end) => end !== junction)!;
    last = next.id;
  }
  return undefined;
}
const MOST_STEPS = 6;

/** One flag of a part set: a device of another make. */
export function flagged(
  bench: Bench,
  id: PartId,
  change: { readonly field: string; readonly words: string },
): readonly Ladder[] {
  const part = bench.drawn(id);
  if (part === undefined) return [];
  const edit = relabelled(setField({ part: id, field: change.field, value: true }), `${nameOf(part)}: ${change.words}`);
  return [stepped([{ edit, cost: `one ${part.kind}`, effort: 'device', amount: 1, sameAnswers: true }])];
}

/** Cables drawn side by side all made like the thickest of them, as long as the longest. */
export function madeAlike(bench: Bench, ids: readonly PartId[]): readonly Ladder[] {
  const legs = ids.flatMap((id) => {
    const part = bench.drawn(id);
    return part?.kind === 'cable' ? [part] : [];
  });
  if (legs.length < 2 || legs.length < ids.length) return [];
  const model = legs.reduce((most, leg) => (areaMm2(bench, leg) > areaMm2(bench, most) ? leg : most));
  if (model.size === undefined) return [];
  const lengthM = Math.max(...legs.map((leg) => leg.lengthM));
  const size = sizeText(model.size);
  const edits = legs.flatMap(({ id: part, resistanceOhm }) => [
    setField({ part, field: 'lengthM', value: lengthM }),
    setField({ part, field: 'size', value: size }),
    ...ALIKE.map((field) => setField({ part, field, value: model[field] })),
    ...(resistanceOhm === undefined ? [] : [setField({ part, field: 'resistanceOhm', value: undefined })]),
  ]);
  const metres = formatQuantity({ value: lengthM, unit: 'm', digits: 3 });
  const label = `${ids.join(', ')}: all ${metres} of ${size}, alike`;
  const amount = legs.length * lengthM * areaMm2(bench, model);
  return [
    stepped([
      { edit: together(label, edits), cost: `${legs.length} times ${metres} of ${size}`, effort: 'cable', amount },
    ]),
  ];
}
const ALIKE = ['metal', 'stranding', 'insulationDegC'] as const;

function areaMm2(bench: Bench, { size }: CablePart): number {
  const area = size === undefined ? undefined : areaOf(size, bench.tables.conductors);
  return area === undefined || 'missing' in area ? 0 : area.value;
}

function cableOf(bench: Bench, id: PartId): CablePart | undefined {
  return withoutPairs(bench.job.parts).find((part): part is CablePart => part.id === id && part.kind === 'cable');
}

function wholeOf(bench: Bench, id: PartId): PartId {
  return bench.drawn(id) === undefined ? (id.replace(/\.(plus|minus)$/, '') as PartId) : id;
}

function standardRatings({ job, tables }: Bench): readonly number[] {
  return tables.devices.ratings.get(tables.practices[job.practice].standardRatings)?.ratingsA ?? [];
}

function amps(value: number): string {
  return formatQuantity({ value, unit: 'A' });
}
