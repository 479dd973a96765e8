/** A fault put in on purpose, in a case of its own, so that a person sees what a bad lug looks like. */
import { runChecks } from '../checks/runChecks.ts';
import type { CheckedJob } from '../job/job.ts';
import { checkJob } from '../job/parseJob.ts';
import type { PartId } from '../job/part.ts';
import { operatingPoint } from '../network/operatingPoint.ts';
import type { Tables } from '../tables/tables.ts';
import { changed, type Draft, type Edited, type OpenCase, type RawPart, rawPart, rawParts } from './draft.ts';
import type { Edit } from './edit.ts';
import { figureOf } from './guesses.ts';
import { freeName } from './naming.ts';
import { structuredCopy } from './parts.ts';

/** Bad terminations, from poor to burning; a good crimp is well below 1 mOhm. For a lesson only: common practice, no source. */
const badLugsOhm = [0.005, 0.01, 0.02, 0.05, 0.1, 0.2, 0.5];
/** How many conductors are tried, those of the most current first. */
const mostTried = 4;
const asDrawn: OpenCase = { id: 'as-drawn', label: 'As drawn' };

/** Where the lug is, in which case it is worst, and how bad. */
interface Seed {
  readonly part: string;
  readonly like: OpenCase;
  readonly ohm: number;
}

/**
 * Adds a case that is like one of the job's own but for one bad lug: on the conductor that carries the most, and just bad enough
 * that a check tells it. The job as drawn and its other cases are left alone; to remove the case is to put the lug right. A job in
 * which no conductor carries anything is not changed.
 */
export function seedBadLug({ draft, job }: Edited, tables: Tables): Edit {
  const seed = seedFor(draft, job, tables);
  return {
    label: 'Added a case that shows what a bad lug looks like',
    apply: (at) => (seed === undefined || rawPart(at, seed.part) === undefined ? at : withSeed(at, seed)),
  };
}

function withSeed(draft: Draft, seed: Seed): Draft {
  return changed(draft, (open) => {
    if (open.cases === undefined || open.cases.length === 0) open.cases = [structuredCopy(asDrawn)];
    const id = freeName('bad-lug', new Set(open.cases.map((one) => one.id)));
    open.cases.push({ ...badCase(draft, seed), id, label: `What a bad lug looks like, on ${seed.part}` });
  });
}

function badCase(draft: Draft, { part, like, ohm }: Seed): OpenCase {
  const one = structuredCopy(like);
  const set = one.set ?? {};
  const drawn = figureOf(set[part]?.['endOhm'] ?? rawPart(draft, part)?.['endOhm'], 'ohm') ?? 0;
  return { ...one, set: { ...set, [part]: { ...set[part], endOhm: Number((drawn + ohm).toPrecision(4)) } } };
}

function seedFor(draft: Draft, job: CheckedJob, tables: Tables): Seed | undefined {
  const places = placesOf(draft, job, tables).slice(0, mostTried);
  for (const place of places) {
    const honest = troubleIn(draft, place.like, tables);
    for (const ohm of badLugsOhm) {
      const seed = { part: place.part, like: place.like, ohm };
      if ([...troubleIn(draft, badCase(draft, seed), tables)].some((told) => !honest.has(told))) return seed;
    }
  }
  return places[0] === undefined ? undefined : { ...places[0], ohm: badLugsOhm.at(-1) ?? 0 };
}

/** Conductors with the case in which each carries the most, those of the most current first. A starting load is no steady case. */
function placesOf(draft: Draft, job: CheckedJob, tables: Tables): readonly Omit<Seed, 'ohm'>[] {
  const conductors = rawParts(draft).filter(({ kind }) => kind === 'cable' || kind === 'pair');
  const steady = job.cases.filter(({ surge }) => surge === undefined);
  const drawn = (draft['cases'] ?? []) as readonly OpenCase[];
  const carried = steady.flatMap((operatingCase) => {
    const { parts } = operatingPoint({ job, operatingCase, tables, model: 'slow' });
    const like = drawn.find(({ id }) => id === operatingCase.id) ?? asDrawn;
    return conductors.map((part) => ({ part: part.id, like, currentA: currentOf(part, parts) }));
  });
  carried.sort((one, other) => other.currentA - one.currentA);
  const first = new Map<string, (typeof carried)[number]>();
  for (const place of carried) if (place.currentA > 0 && !first.has(place.part)) first.set(place.part, place);
  return [...first.values()];
}

function currentOf({ id, kind }: RawPart, answers: ReturnType<typeof operatingPoint>['parts']): number {
  const name = kind === 'pair' ? `${id}.plus` : id;
  return Math.abs(answers.get(name as PartId)?.currentA ?? 0);
}

/** What the checks tell of the job in that one case. */
function troubleIn(draft: Draft, one: OpenCase, tables: Tables): ReadonlySet<string> {
  const checked = checkJob({ ...draft, cases: [one], readings: [] });
  if (!checked.ok) return new Set();
  const { findings } = runChecks({ job: checked.value, tables });
  const serious = findings.filter(({ severity }) => severity !== 'note');
  return new Set(serious.map(({ rule, parts }) => `${rule} ${parts.join(' ')}`));
}
