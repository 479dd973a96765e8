/** What the ampacity of every practice is made of: a table's figure, the factors on it, and what was filled in. */
import type { Practice } from '../job/job.ts';
import type { ConductorFields, ConductorSize } from '../job/part.ts';
import type { AmpacityRow, AmpacityTable, ConductorTables, FactorBand } from '../tables/conductorTables.ts';
import type { Figure } from '../tables/practiceTable.ts';
import type { Basis } from '../tables/status.ts';
import { sizeText } from '../units/conductorSize.ts';
import { areaMm2, areaOf, type Missing, SAME_AREA, sameSize } from './size.ts';

/** Why a factor stands: what surrounds the cable, the heat of its neighbours, or the terminals it ends on. */
export type FactorKind = 'ambient' | 'engine-space' | 'bundle' | 'terminal';

export interface AmpacityFactor {
  readonly kind: FactorKind;
  /** Printed, with the figures in it: `ambient 45 °C`, `6 loaded conductors`, `60 °C terminals: 40 A at most`. */
  readonly name: string;
  readonly factor: number;
  readonly basis: Basis;
}

export interface AmpacityContext {
  readonly practice: Practice;
  /** Of the case or site; the cable's own `ambientDegC` goes before it. */
  readonly ambientDegC: number;
  readonly tables: ConductorTables;
  /** System volts; some bundling rules begin at 50 V. */
  readonly systemV?: number | undefined;
  /** Lowest temperature rating of the terminals at the cable's ends, where marked. */
  readonly terminalDegC?: number | undefined;
}

/** The parts of a cable that its ampacity depends on; a `CablePart` is one. */
export type RatedConductor = Pick<
  ConductorFields,
  'inParallel' | 'metal' | 'insulationDegC' | 'run' | 'loadedConductors' | 'ambientDegC'
> & { readonly size: ConductorSize | undefined };

/** A practice's answer for one conductor, before it is multiplied out. */
export interface Rating {
  readonly base: Figure;
  /** Temperature of the conductor at `base` amperes in the table's ambient. */
  readonly ratedDegC: number;
  readonly tableAmbientDegC: number;
  readonly factors: readonly AmpacityFactor[];
  /** Where the cable lies, for its own temperature. */
  readonly surroundDegC: number;
  /** Heat of loaded neighbours, for its own temperature: the book's factor whether or not the book makes it binding. */
  readonly neighbours: number;
  readonly assumed: readonly string[];
  readonly remarks: readonly string[];
}

/** What a square-root law of heating rests on where a book gives no factor of its own. */
export const SQUARE_ROOT_LAW: Basis = {
  source: 'SRC-SQUARE-ROOT-LAW',
  text: 'heating law sqrt((T − ambient)/(T − table ambient)), common practice, no source',
  status: 'common-practice',
};

/** sqrt((rated − ambient)/(rated − table ambient)): ampacity left when the surroundings are warmer; 0 at the rated temperature. */
export function squareRootFactor(degC: {
  readonly ratedDegC: number;
  readonly ambientDegC: number;
  readonly tableAmbientDegC: number;
}): number {
  return Math.sqrt(Math.max(0, degC.ratedDegC - degC.ambientDegC) / (degC.ratedDegC - degC.tableAmbientDegC));
}

/** The first band that reaches a value; between two whole degrees the warmer band holds. */
export function bandFor(bands: readonly FactorBand[], value: number): FactorBand | undefined {
  return bands.find((band) => band.to === undefined || value <= band.to);
}

export interface RatedRow {
  readonly row: AmpacityRow;
  readonly base: Figure;
  readonly assumed: readonly string[];
}

/**
 * The row of a table for a size. A size that the table does not hold, of whatever system, takes the next smaller area that it
 * does hold, and says so; it never takes a larger one.
 */
export function ratedRow(
  request: { readonly size: ConductorSize; readonly table: AmpacityTable; readonly column: string },
  tables: ConductorTables,
): RatedRow | Missing {
  const { size, table, column } = request;
  const own = table.rows.find((row) => sameSize(row.size, size));
  if (own !== undefined) {
    const base = own.amperesA.get(column);
    if (base !== undefined) return { row: own, base, assumed: [] };
    return { missing: `ampacity of ${sizeText(size)}: ${table.name} has no figure in column ${column}` };
  }
  const area = areaOf(size, tables);
  if ('missing' in area) return area;
  const smaller = table.rows.filter(
    (row) => row.amperesA.has(column) && areaMm2(row.size, tables) <= area.value * (1 + SAME_AREA),
  );
  const row = smaller.at(-1);
  const base = row?.amperesA.get(column);
  if (row === undefined || base === undefined) {
    return { missing: `ampacity of ${sizeText(size)}: smaller than anything in ${table.name}, column ${column}` };
  }
  return {
    row,
    base,
    assumed: [`${sizeText(size)} rated as ${sizeText(row.size)}, the next smaller size in ${table.name}`],
  };
}

export interface LoadedCount {
  /** `undefined`: alone with its return, as far as anyone said. */
  readonly count: number | undefined;
  readonly assumed: readonly string[];
}

/** Loaded conductors lying together. A conduit with no count holds this run and its return; a bundle at least two such runs. */
export function loadedTogether(cable: RatedConductor): LoadedCount {
  if (cable.loadedConductors !== undefined) return { count: cable.loadedConductors, assumed: [] };
  const ownPair = 2 * cable.inParallel;
  if (cable.run === 'bundle') {
    const count = 2 * ownPair;
    return { count, assumed: [`${count} loaded conductors in the bundle (two circuits)`] };
  }
  if (cable.run === 'conduit') return { count: ownPair, assumed: [`${ownPair} loaded conductors in the conduit`] };
  return { count: undefined, assumed: [] };
}

/** Where the cable lies: its own ambient; else a book's figure for engine spaces if warmer; else the case's ambient. */
export function surroundings(
  cable: RatedConductor,
  context: AmpacityContext,
  engineSpace: Figure,
): { readonly degC: number; readonly assumed: readonly string[] } {
  if (cable.ambientDegC !== undefined) return { degC: cable.ambientDegC, assumed: [] };
  if (cable.run !== 'engine-space' || context.ambientDegC >= engineSpace.value) {
    return { degC: context.ambientDegC, assumed: [] };
  }
  return { degC: engineSpace.value, assumed: [`engine space at ${engineSpace.value} °C`] };
}

/** Insulation temperature as given, or the practice's cautious one. */
export function insulationOf(
  cable: RatedConductor,
  context: AmpacityContext,
): { readonly degC: number; readonly assumed: readonly string[] } {
  if (cable.insulationDegC !== undefined) return { degC: cable.insulationDegC, assumed: [] };
  const degC = context.tables.defaultInsulationDegC[context.practice].value;
  return { degC, assumed: [`insulation ${degC} °C`] };
}

/** The hottest column that an insulation may use; `undefined` when it is cooler than them all. Columns named by degrees. */
export function columnUpTo(columns: readonly number[], insulationDegC: number): number | undefined {
  const usable = columns.filter((column) => column <= insulationDegC);
  return usable.length === 0 ? undefined : Math.max(...usable);
}
