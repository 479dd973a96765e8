/** Operating cases, and what each sets on parts. */
import { changed, type Draft, type OpenCase, type OpenDraft } from './draft.ts';
import type { Edit } from './edit.ts';
import { freeName, keep } from './naming.ts';
import { structuredCopy } from './parts.ts';
import { fieldWords, valueWords } from './words.ts';

/** Fields of a case that are set whole. */
export type CaseField =
  | 'label'
  | 'stateOfCharge'
  | 'stateOfChargeByString'
  | 'ambientDegC'
  | 'irradianceWPerM2'
  | 'surge';

const asDrawn = 'as-drawn';

/** The cases of the open draft. A job without a list has the one case `as-drawn`, which a list must then name. */
function casesOf(open: OpenDraft): OpenCase[] {
  if (open.cases === undefined || open.cases.length === 0) open.cases = [{ id: asDrawn, label: 'As drawn' }];
  return open.cases;
}

function hasCase(draft: Draft, id: string): boolean {
  const cases = (draft['cases'] ?? []) as readonly { readonly id: string }[];
  return cases.length === 0 ? id === asDrawn : cases.some((one) => one.id === id);
}

/** Adds a case; with `like`, a copy of that one under the new id. Without an id, the next free `case 2`. */
export function addCase(added: {
  readonly id?: string;
  readonly label?: string;
  readonly like?: string;
  readonly fields?: Readonly<Record<string, unknown>>;
}): Edit {
  return {
    label: `Added case ${added.label ?? added.id ?? ''}`.trimEnd(),
    apply: (draft) =>
      changed(draft, (open) => {
        const cases = casesOf(open);
        const model = cases.find(({ id }) => id === added.like);
        const id = added.id ?? freeName('case', new Set(cases.map((one) => one.id)));
        const { id: _id, label: _label, ...rest } = model ?? { id: '' };
        const label = added.label === undefined ? {} : { label: added.label };
        cases.push({ id, ...label, ...structuredCopy(rest), ...structuredCopy(added.fields ?? {}) });
      }),
  };
}

/** Takes a case away, and the readings that were taken in it: nothing says any more what they should show. */
export function removeCase(id: string): Edit {
  return {
    label: `Removed case ${id}`,
    apply: (draft) =>
      changed(draft, (open) => {
        if (open.cases === undefined || !open.cases.some((one) => one.id === id)) return;
        open.cases = open.cases.filter((one) => one.id !== id);
        if (open.cases.length === 0) delete open.cases;
        const stays = id === 'at-rest' || (id === asDrawn && open.cases === undefined);
        if (!stays && open.readings !== undefined)
          open.readings = open.readings.filter((reading) => reading.case !== id);
      }),
  };
}

/** Gives a case another id, in readings too. */
export function renameCase(id: string, newId: string): Edit {
  return {
    label: `Renamed case ${id} to ${newId}`,
    apply: (draft) =>
      !hasCase(draft, id) || id === newId
        ? draft
        : changed(draft, (open) => {
            const cases = casesOf(open);
            const isTaken = cases.some((one) => one.id === newId);
            for (const one of cases) if (one.id === id) one.id = newId;
            if (isTaken) return; // for the check to name
            for (const reading of open.readings ?? []) if (reading.case === id) reading.case = newId;
          }),
  };
}

/** Sets a field of a case, or takes it away. */
export function setCase({
  case: id,
  field,
  value,
}: {
  readonly case: string;
  readonly field: CaseField;
  readonly value: unknown;
}): Edit {
  return {
    label: `Case ${id}: ${fieldWords(field)} ${value === undefined ? 'not set' : valueWords(field, value)}`,
    apply: (draft) =>
      withCase(draft, id, (one) => {
        if (value === undefined) delete one[field];
        else one[field] = structuredCopy(value) as never;
      }),
  };
}

/** Sets a field of a part for one case, or leaves it as drawn. */
export function setInCase(change: {
  readonly case: string;
  readonly part: string;
  readonly field: string;
  readonly value: unknown;
}): Edit {
  const { case: id, part, field, value } = change;
  const said = value === undefined ? 'as drawn' : valueWords(field, value);
  return {
    label: `Case ${id}, ${part}: ${fieldWords(field)} ${said}`,
    apply: (draft) =>
      withCase(draft, id, (one) => {
        const set = { ...one.set };
        const fields = { ...set[part] };
        if (value === undefined) delete fields[field];
        else keep(fields, field, structuredCopy(value));
        if (Object.keys(fields).length === 0) delete set[part];
        else keep(set, part, fields);
        if (Object.keys(set).length === 0) delete one.set;
        else one.set = set;
      }),
  };
}

function withCase(draft: Draft, id: string, recipe: (one: OpenCase) => void): Draft {
  if (!hasCase(draft, id)) return draft;
  return changed(draft, (open) => {
    const one = casesOf(open).find((candidate) => candidate.id === id);
    if (one !== undefined) recipe(one);
  });
}
