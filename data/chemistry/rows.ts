/** Rows of a published table: read once, strictly. A malformed row is a broken promise of this program, not of its user. */
import Papa from 'papaparse';
import type { Basis, Chemistry, Status } from '../../core/api.ts';
import { Defect } from '../../core/api.ts';

const CHEMISTRIES: readonly Chemistry[] = ['flooded', 'agm', 'gel', 'lfp', 'nmc', 'nicd'];
const STATUSES: readonly Status[] = ['published', 'common-practice', 'from-memory'];

/** One row, read by column name; every reader throws a `Defect` that names the table and the line. */
export class Row {
  readonly #cells: Readonly<Record<string, string>>;
  readonly #where: string;

  constructor(cells: Readonly<Record<string, string>>, where: string) {
    this.#cells = cells;
    this.#where = where;
  }

  text(column: string): string {
    const text = this.#cells[column];
    if (text === undefined) throw this.#malformed(column, 'is missing');
    return text;
  }

  number(column: string): number {
    const value = this.optionalNumber(column);
    if (value === undefined) throw this.#malformed(column, 'is empty');
    return value;
  }

  /** `undefined` for an empty cell. */
  optionalNumber(column: string): number | undefined {
    const text = this.text(column).trim();
    if (text === '') return undefined;
    const value = Number(text);
    if (!Number.isFinite(value)) throw this.#malformed(column, `holds "${text}", no number`);
    return value;
  }

  oneOf<T extends string>(column: string, choices: readonly T[]): T {
    const text = this.text(column);
    const found = choices.find((choice) => choice === text);
    if (found === undefined) throw this.#malformed(column, `holds "${text}", not one of ${choices.join(', ')}`);
    return found;
  }

  chemistry(): Chemistry {
    return this.oneOf('chemistry', CHEMISTRIES);
  }

  /** The row's source and status, with the source's printed text. */
  basis(sources: ReadonlyMap<string, string>): Basis {
    const source = this.text('source');
    const text = sources.get(source);
    if (text === undefined) throw this.#malformed('source', `names ${source}, which sources.csv does not have`);
    return { source, text, status: this.oneOf('status', STATUSES) };
  }

  #malformed(column: string, what: string): Defect {
    return new Defect(`${this.#where}: column ${column} ${what}`);
  }
}

/** Every row of a CSV text with a header line. */
export function readRows(name: string, csv: string): readonly Row[] {
  const parsed = Papa.parse<Record<string, string>>(csv, { header: true, skipEmptyLines: true });
  const [error] = parsed.errors;
  if (error !== undefined) throw new Defect(`${name}: row ${(error.row ?? 0) + 2} cannot be read: ${error.message}`);
  return parsed.data.map((cells, index) => new Row(cells, `${name} line ${index + 2}`));
}

/** A value for every chemistry, made by `make` from the rows of that chemistry. */
export function byChemistry<T>(
  rows: readonly Row[],
  make: (rows: readonly Row[], chemistry: Chemistry) => T,
): Readonly<Record<Chemistry, T>> {
  const of = (chemistry: Chemistry) =>
    make(
      rows.filter((row) => row.chemistry() === chemistry),
      chemistry,
    );
  return { flooded: of('flooded'), agm: of('agm'), gel: of('gel'), lfp: of('lfp'), nmc: of('nmc'), nicd: of('nicd') };
}
