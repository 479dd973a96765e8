/** Single figures about conductors, by name. */
import type { Figure } from '../../core/api.ts';
import { Defect } from '../../core/api.ts';
import { readRows } from '../chemistry/rows.ts';
import constantsCsv from './constants.csv?raw';
import { clauseFigure } from './figures.ts';

const constants: ReadonlyMap<string, Figure> = new Map(
  readRows('constants.csv', constantsCsv).map((row) => [row.text('name'), clauseFigure(row, 'value')]),
);

export function constant(name: string): Figure {
  const figure = constants.get(name);
  if (figure === undefined) throw new Defect(`constants.csv has ${name}`);
  return figure;
}
