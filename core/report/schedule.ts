/** What the schedules of parts share: which parts, how a cell is filled, how a gap is told. */
import type { CheckedJob } from '../job/job.ts';
import type { Part } from '../job/part.ts';
import type { Cell, Column, TableBlock } from './document.ts';
import { NOT_GIVEN, plain } from './figures.ts';

export type KindOf<K extends Part['kind']> = Extract<Part, { kind: K }>;

export function partsOf<K extends Part['kind']>(job: CheckedJob, ...kinds: readonly K[]): readonly KindOf<K>[] {
  return job.parts.filter((part): part is KindOf<K> => (kinds as readonly string[]).includes(part.kind));
}

export const id = (head: string): Column => ({ head, kind: 'id', align: 'left' });
export const text = (head: string): Column => ({ head, kind: 'text', align: 'left' });
export const number = (head: string, unit: string): Column => ({ head, unit, kind: 'number', align: 'decimal' });

/** A figure as given, or the mark that it was not. */
export function given(value: number | undefined): string {
  return value === undefined ? NOT_GIVEN : plain(value);
}
export function yesNo(value: boolean | undefined): string {
  return value === undefined ? NOT_GIVEN : value ? 'yes' : 'no';
}
export function named(part: Part): Cell {
  const under = [part.label, part.locationTag].filter((words) => words !== undefined && words !== '').join(' · ');
  return { text: part.id, under };
}
/** A table with the remark on empty figures where it has any; nothing where it has no rows. */
export function schedule(
  caption: string,
  columns: readonly Column[],
  rows: readonly (readonly Cell[])[],
  notes: readonly string[] = [],
): readonly TableBlock[] {
  if (rows.length === 0) return [];
  const hasGap = rows.some((row) => row.some((cell) => (typeof cell === 'string' ? cell : cell.text) === NOT_GIVEN));
  return [
    { kind: 'table', caption, columns, rows, notes: hasGap ? [...notes, `${NOT_GIVEN} not given in the job.`] : notes },
  ];
}
