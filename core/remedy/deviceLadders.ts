/** Fuses, breakers, switches, bars, diodes and shunts of another rating. */
import { insertInto } from '../draft/connect.ts';
import type { Part, PartId } from '../job/part.ts';
import { nameOf } from '../job/part.ts';
import { formatQuantity } from '../units/formatQuantity.ts';
import { type Bench, type Candidate, type Ladder, relabelled, stepped } from './candidate.ts';

/** Ratings of shunts as they are sold; common practice, no source. */
const SHUNT_RATINGS_A: readonly number[] = [50, 100, 150, 200, 250, 300, 400, 500, 600, 800, 1000, 1200, 1500, 2000];
/** Standard ratings that are tried one after the other. */
const MOST_RATINGS = 6;

/** The standard ratings of the practice, rising. */
function standardRatings({ job, tables }: Bench): readonly number[] {
  return tables.devices.ratings.get(tables.practices[job.practice].standardRatings)?.ratingsA ?? [];
}

/** Smaller standard ratings, the largest that the limit admits first. */
export function smallerRating(bench: Bench, device: Part, limitA = bench.finding.limit.value): Ladder {
  const fitting = standardRatings(bench).filter((ratingA) => ratingA <= limitA * (1 + ROUNDING));
  const largestFirst = fitting.slice(-MOST_RATINGS);
  largestFirst.reverse();
  return ratings(bench, device, largestFirst);
}

/** Larger standard ratings, from the one that the measured current with its margin asks for. */
export function largerRating(bench: Bench, part: Part, leastA = bench.finding.measured.value): Ladder {
  const offered = part.kind === 'shunt' ? SHUNT_RATINGS_A : standardRatings(bench);
  const fitting = offered.filter((ratingA) => ratingA >= leastA * (1 - ROUNDING));
  return ratings(bench, part, fitting.slice(0, MOST_RATINGS));
}

const ROUNDING = 1e-9;

function ratings(bench: Bench, part: Part, ratingsA: readonly number[]): Ladder {
  const now = 'ratingA' in part ? part.ratingA : undefined;
  const rungs = ratingsA.map((ratingA): Candidate => {
    const instead = now === undefined ? '' : ` instead of ${amps(now)}`;
    const label = `${titleOf(part)}: ${amps(ratingA)}${instead}`;
    return {
      edit: bench.set(part, 'ratingA', ratingA, label),
      cost: `one ${amps(ratingA)} ${part.kind}`,
      effort: 'device',
      amount: Math.abs(ratingA - (now ?? 0)),
      // A shunt's resistance follows from its rating; no other device's does.
      ...(part.kind === 'shunt' ? {} : { sameAnswers: true as const }),
    };
  });
  return stepped(rungs);
}

/** A part made for more volts: the direct-current volts that generic devices are sold for. */
export function higherVolts(bench: Bench, part: Part): Ladder {
  const neededV = bench.finding.measured.value;
  const sold = [...new Set(bench.tables.devices.typicalInterrupt.map(({ upToV }) => upToV.value))];
  sold.sort((a, b) => a - b);
  const rungs = sold
    .filter((volts) => volts >= neededV)
    .slice(0, 2)
    .map((volts): Candidate => {
      const text = formatQuantity({ value: volts, unit: 'V' });
      const edit = bench.set(part, 'ratingV', volts, `${titleOf(part)}: one rated for ${text} direct current`);
      return {
        edit,
        cost: `one ${part.kind} rated ${text} direct current`,
        effort: 'device',
        amount: volts,
        sameAnswers: true,
      };
    });
  return stepped(rungs);
}

/** A fuse put into the lead right behind a string's plus post, of a rating between what it carries and what the cable stands. */
export function fuseAtString(bench: Bench, id: PartId): readonly Ladder[] {
  const string = bench.drawn(id);
  if (string?.kind !== 'string') return [];
  const leads = bench.job.parts.flatMap((part): readonly { cable: PartId; end: 'from' | 'to' }[] => {
    if (part.kind === 'cable' && part.from === string.plus) return [{ cable: part.id, end: 'from' }];
    if (part.kind === 'cable' && part.to === string.plus) return [{ cable: part.id, end: 'to' }];
    if (part.kind === 'pair' && part.from.plus === string.plus)
      return [{ cable: `${part.id}.plus` as PartId, end: 'from' }];
    if (part.kind === 'pair' && part.to.plus === string.plus)
      return [{ cable: `${part.id}.plus` as PartId, end: 'to' }];
    return [];
  });
  const [lead, ...others] = leads;
  if (lead === undefined || others.length > 0) return [];
  const carriedA = Math.abs(bench.point.parts.get(id)?.currentA ?? 0) * bench.job.settings.continuousFactor;
  const fitting = standardRatings(bench).filter((ratingA) => ratingA >= carriedA);
  const rungs = fitting.slice(0, 1).map((ratingA): Candidate => {
    const label = `A ${amps(ratingA)} fuse in the plus lead right at ${nameOf(string)}`;
    const edit = relabelled(insertInto({ ...lead, part: { kind: 'fuse', ratingA } }), label);
    return { edit, cost: `one ${amps(ratingA)} fuse with its holder`, effort: 'part-in', amount: ratingA };
  });
  return [stepped(rungs)];
}

function amps(value: number): string {
  return formatQuantity({ value, unit: 'A' });
}

function titleOf(part: Part): string {
  return `${part.kind.charAt(0).toUpperCase()}${part.kind.slice(1)} ${nameOf(part)}`;
}
