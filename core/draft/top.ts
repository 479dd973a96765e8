/** What a job says beside its parts and cases: its title, practice, site, targets, settings, demand. */
import { changed, type OpenDraft } from './draft.ts';
import type { Edit } from './edit.ts';
import { keep } from './naming.ts';
import { structuredCopy } from './parts.ts';
import { fieldWords, valueWords } from './words.ts';

const texts: readonly string[] = ['title', 'notes', 'preparedFor', 'preparedBy', 'practice', 'practiceEdition'];
const groups: readonly string[] = ['site', 'targets', 'settings'];

/**
 * Sets a field at the head of a job (`title`, `practice`) or of its `site`, `targets` or `settings` (`site.latitudeDeg`);
 * `undefined` takes it away. Other paths change nothing.
 */
export function setTop({ path, value }: { readonly path: string; readonly value: unknown }): Edit {
  return {
    label: `${capital(fieldWords(path))}: ${value === undefined ? 'not given' : valueWords(path, value)}`,
    apply: (draft) =>
      changed(draft, (open) => {
        const [group = '', field, more] = path.split('.');
        if (field === undefined && texts.includes(group)) put(open, group, value);
        if (field === undefined || more !== undefined || !groups.includes(group)) return;
        const holder = { ...(open[group] as Record<string, unknown> | undefined) };
        put(holder, field, value);
        put(open, group, Object.keys(holder).length === 0 ? undefined : holder);
      }),
  };
}

function put(holder: Record<string, unknown>, field: string, value: unknown): void {
  if (value === undefined) delete holder[field];
  else keep(holder, field, structuredCopy(value));
}

function capital(text: string): string {
  return text.charAt(0).toUpperCase() + text.slice(1);
}

/** Fields of a row of the load schedule, as the job file has them. */
export interface DemandFields {
  readonly label?: string;
  readonly powerW?: number | string;
  readonly hoursPerDay?: number | string | readonly number[];
  readonly [field: string]: unknown;
}

function rowsOf(open: OpenDraft): Record<string, unknown>[] {
  const rows = (open['demand'] ?? []) as Record<string, unknown>[];
  open['demand'] = rows;
  return open['demand'] as Record<string, unknown>[];
}

/** Adds a row to the load schedule; power and hours that are not given are 0, which is none. */
export function addDemand(row: DemandFields): Edit {
  return {
    label: `Added demand ${row.label ?? ''}`.trimEnd(),
    apply: (draft) =>
      changed(draft, (open) => {
        rowsOf(open).push({
          ...structuredCopy(row),
          powerW: row.powerW ?? 0,
          hoursPerDay: structuredCopy(row.hoursPerDay ?? 0),
        });
      }),
  };
}

/** Sets a field of a row of the load schedule, rows counted from 0; `undefined` takes it away, power and hours becoming 0. */
export function setDemand({
  row,
  field,
  value,
}: {
  readonly row: number;
  readonly field: string;
  readonly value: unknown;
}): Edit {
  const isNeeded = field === 'powerW' || field === 'hoursPerDay';
  return {
    label: `Demand row ${String(row + 1)}: ${fieldWords(field)} ${value === undefined ? 'not given' : valueWords(field, value)}`,
    apply: (draft) =>
      changed(draft, (open) => {
        const found = (open['demand'] as Record<string, unknown>[] | undefined)?.[row];
        if (found !== undefined) put(found, field, value === undefined && isNeeded ? 0 : value);
      }),
  };
}

/** Takes a row out of the load schedule, rows counted from 0. */
export function removeDemand(row: number): Edit {
  return {
    label: `Removed demand row ${String(row + 1)}`,
    apply: (draft) =>
      changed(draft, (open) => {
        const rows = open['demand'] as unknown[] | undefined;
        if (rows === undefined || !Number.isInteger(row) || row < 0 || row >= rows.length) return;
        rows.splice(row, 1);
        if (rows.length === 0) delete open['demand'];
      }),
  };
}
