/** Figures out of rows: a value with the source and status that stand in its row. */
import type { Basis, ConductorSize, Figure } from '../../core/api.ts';
import { Defect, parseSize } from '../../core/api.ts';
import type { Row } from '../chemistry/rows.ts';
import { readRows } from '../chemistry/rows.ts';
import sourcesCsv from './sources.csv?raw';

/** Printed phrase of every source of conductors, devices and practices, by id. */
export const sources: ReadonlyMap<string, string> = new Map(
  readRows('conductors/sources.csv', sourcesCsv).map((row) => [row.text('id'), row.text('text')]),
);

/** What a row rests on; a `clause` is printed after the source's phrase. */
export function basisOf(row: Row, clause = ''): Basis {
  const basis = row.basis(sources);
  return clause === '' ? basis : { ...basis, text: `${basis.text}, ${clause}` };
}

/** A figure that must be there. */
export function figureOf(row: Row, column: string): Figure {
  return { value: row.number(column), basis: basisOf(row) };
}

/** A figure that the table may leave empty. */
export function optionalFigure(row: Row, column: string): Figure | undefined {
  const value = row.optionalNumber(column);
  return value === undefined ? undefined : { value, basis: basisOf(row) };
}

/** A figure of a table whose rows carry a `clause`. */
export function clauseFigure(row: Row, column: string): Figure {
  return { value: row.number(column), basis: basisOf(row, row.text('clause')) };
}

/** The filled cells of a row, by column name; `mixed` tables name in `fromMemory` the cells that are remembered only. */
export function cellsOf(
  row: Row,
  columns: readonly string[],
  statuses: 'alike' | 'mixed' = 'alike',
): ReadonlyMap<string, Figure> {
  const remembered = statuses === 'mixed' ? row.text('fromMemory').split(';') : [];
  const cells = new Map<string, Figure>();
  for (const column of columns) {
    const figure = optionalFigure(row, column);
    if (figure === undefined) continue;
    cells.set(column, remembered.includes(column) ? rememberedOnly(figure) : figure);
  }
  return cells;
}

/** The size in a row's `size` column, with its system. */
export function sizeOf(row: Row): ConductorSize {
  const size = parseSize(row.text('size'));
  if (!size.ok) throw new Defect(`a size in a table can be read: ${size.message}`);
  return size.value;
}

function rememberedOnly(figure: Figure): Figure {
  return { ...figure, basis: { ...figure.basis, status: 'from-memory' } };
}
