/** A fault put in on purpose, in a case of its own, so that a person sees what a bad lug looks like. */
import { changed, type Draft, type OpenCase, type RawPart, rawParts } from './draft.ts';
import type { Edit } from './edit.ts';
import { figureOf } from './guesses.ts';
import { freeName } from './naming.ts';
import { structuredCopy } from './parts.ts';

/** Resistance of a corroded or loose termination, for a lesson. Common practice, no source: a good crimp is well below 1 mOhm. */
const badLugOhm = 0.015;

/**
 * Adds a case that is like the job's first one but for one bad lug: on the conductor named, else on the first run of the
 * drawing. The job as drawn and its other cases are left alone, and to remove the case is to put the lug right. A draft without a
 * conductor is not changed.
 */
export function seedBadLug(cable?: string): Edit {
  return {
    label: 'Added a case that shows what a bad lug looks like',
    apply: (draft) => {
      const part = conductorFor(draft, cable);
      if (part === undefined) return draft;
      return changed(draft, (open) => {
        const cases: OpenCase[] =
          open.cases === undefined || open.cases.length === 0 ? [{ id: 'as-drawn', label: 'As drawn' }] : open.cases;
        open.cases = cases;
        const like = structuredCopy(cases[0] ?? { id: '' });
        const set = structuredCopy(like.set ?? {});
        const endOhm = (figureOf(part['endOhm'], 'ohm') ?? 0) + badLugOhm;
        set[part.id] = { ...set[part.id], endOhm: Number(endOhm.toPrecision(4)) };
        const id = freeName('bad-lug', new Set(cases.map((one) => one.id)));
        open.cases.push({ ...like, id, label: `What a bad lug looks like, on ${part.id}`, set });
      });
    },
  };
}

function conductorFor(draft: Draft, wanted: string | undefined): RawPart | undefined {
  const conductors = rawParts(draft).filter(({ kind }) => kind === 'cable' || kind === 'pair');
  if (wanted !== undefined) return conductors.find(({ id }) => id === wanted);
  // Parts are drawn from the battery outwards: the first run after it carries the most.
  return conductors.find(({ kind }) => kind === 'pair') ?? conductors[0];
}
