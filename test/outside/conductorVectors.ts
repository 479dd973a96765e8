/** Readers for the published vectors beside this file, and short ways to write a size and a cable in a test. */
import Papa from 'papaparse';
import type { ConductorSize, Metal, Run, Stranding } from '../../core/api.ts';
import { parseSize } from '../../core/api.ts';

export type VectorRow = Readonly<Record<string, string>>;

/** Rows of a vector file; throws where a row is broken, so that a test cannot pass on an empty file. */
export function vectorRows(csv: string, expectedRows: number): readonly VectorRow[] {
  const { data, errors } = Papa.parse<Record<string, string>>(csv, { header: true, skipEmptyLines: true });
  if (errors.length > 0 || data.length !== expectedRows) {
    throw new Error(`expected ${expectedRows} whole rows, got ${data.length} and ${errors.length} errors`);
  }
  return data;
}

/** A number of a vector row; throws where it is absent. */
export function numberOf(row: VectorRow, column: string): number {
  const value = Number(row[column] || 'absent');
  if (!Number.isFinite(value)) throw new Error(`no number in column ${column}`);
  return value;
}

export function size(text: string): ConductorSize {
  const parsed = parseSize(text);
  if (!parsed.ok) throw new Error(parsed.message);
  return parsed.value;
}

export interface TestCable {
  readonly lengthM: number;
  readonly size: ConductorSize;
  readonly inParallel: number;
  readonly metal: Metal | undefined;
  readonly stranding: Stranding | undefined;
  readonly insulationDegC: number | undefined;
  readonly run: Run | undefined;
  readonly loadedConductors: number | undefined;
  readonly ambientDegC: number | undefined;
}

/** A metre of one copper conductor of a size, alone, with the given fields over it. */
export function cable(sizeText: string, fields: Partial<TestCable> = {}): TestCable {
  return {
    lengthM: 1,
    size: size(sizeText),
    inParallel: 1,
    metal: 'copper',
    stranding: undefined,
    insulationDegC: undefined,
    run: undefined,
    loadedConductors: undefined,
    ambientDegC: undefined,
    ...fields,
  };
}

/** The answer, where a test knows that there must be one. */
export function found<T extends object>(answer: T | { readonly missing: string }): T {
  if ('missing' in answer) throw new Error(`missing: ${answer.missing}`);
  return answer;
}

export const M_PER_FT = 0.3048;
