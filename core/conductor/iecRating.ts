/** Ampacity on land by IEC 60364-5-52: two loaded conductors, by reference method, ambient and grouping by circuits. */
import type { ConductorSize, Run } from '../job/part.ts';
import type { AmpacityTable, IecAmpacity } from '../tables/conductorTables.ts';
import { bareMetal } from './metal.ts';
import {
  type AmpacityContext,
  type AmpacityFactor,
  bandFor,
  insulationOf,
  loadedTogether,
  type RatedConductor,
  type RatedRow,
  type Rating,
  ratedRow,
  SQUARE_ROOT_LAW,
  squareRootFactor,
  surroundings,
} from './rating.ts';
import type { Missing } from './size.ts';

interface Column {
  readonly table: AmpacityTable;
  readonly column: string;
  readonly ratedDegC: number;
  /** Column of the ambient factors; `undefined`: the square-root law. */
  readonly ambient: string | undefined;
  readonly grouping: 'bunched' | 'single-layer';
  readonly assumed: readonly string[];
}

/** Sources SRC-IEC60364-PVC, SRC-IEC60364-XLPE, SRC-BS7671-FLEX60, SRC-IEC60364-AMBIENT, SRC-IEC60364-GROUPING. */
export function iecRating(
  cable: RatedConductor & { readonly size: ConductorSize },
  context: AmpacityContext,
): Rating | Missing {
  const book = context.tables.iecLand;
  if (bareMetal(cable.metal ?? 'copper') === 'aluminium')
    return { missing: 'ampacity of aluminium: the tables held are for copper' };
  const insulation = insulationOf(cable, context);
  const column = columnFor(insulation.degC, cable.run, book);
  if ('missing' in column) return column;
  const rated = ratedRow({ size: cable.size, table: column.table, column: column.column }, context.tables);
  if ('missing' in rated) return rated;
  const around = surroundings(cable, context, context.tables.engineSpaceDegC);
  const together = loadedTogether(cable);
  const grouping = groupingFactor(together.count, column, book);
  if (grouping !== undefined && 'missing' in grouping) return grouping;
  return {
    base: rated.base,
    ratedDegC: column.ratedDegC,
    tableAmbientDegC: column.table.tableAmbientDegC,
    factors: [ambientFactor(around.degC, column, { rated, book }), grouping].filter((factor) => factor !== undefined),
    surroundDegC: around.degC,
    neighbours: grouping?.factor ?? 1,
    assumed: [...insulation.assumed, ...column.assumed, ...rated.assumed, ...around.assumed, ...together.assumed],
    remarks: [],
  };
}

/** Reference method by the run; enclosed (B2) where nothing is said, the lower of the two that may apply. */
function columnFor(insulationDegC: number, run: Run | undefined, book: IecAmpacity): Column | Missing {
  if (run === 'buried')
    return { missing: 'ampacity of a buried cable: depth and soil are not described, the method is not held' };
  const method = run === 'free-air' ? 'C' : 'B2';
  const grouping = run === 'free-air' ? 'single-layer' : 'bunched';
  const assumed = run === undefined || run === 'engine-space' ? ['enclosed, reference method B2'] : [];
  if (insulationDegC >= 90)
    return { table: book.xlpe90, column: method, ratedDegC: 90, ambient: 'xlpe90', grouping, assumed };
  if (insulationDegC >= 70)
    return { table: book.pvc70, column: method, ratedDegC: 70, ambient: 'pvc70', grouping, assumed };
  if (insulationDegC < 60) return { missing: `ampacity of ${insulationDegC} °C insulation: no table` };
  if (run === 'conduit')
    return { missing: 'ampacity of 60 °C flexible cable in conduit: the table is for cable in air' };
  return { table: book.flexible60, column: 'pair', ratedDegC: 60, ambient: undefined, grouping, assumed: [] };
}

function ambientFactor(
  ambientDegC: number,
  column: Column,
  from: { readonly rated: RatedRow; readonly book: IecAmpacity },
): AmpacityFactor {
  const { tableAmbientDegC } = column.table;
  const name = `ambient ${ambientDegC} °C`;
  if (ambientDegC === tableAmbientDegC) return { kind: 'ambient', name, factor: 1, basis: from.rated.base.basis };
  if (column.ambient === undefined) {
    const factor = squareRootFactor({ ratedDegC: column.ratedDegC, ambientDegC, tableAmbientDegC });
    return { kind: 'ambient', name, factor, basis: SQUARE_ROOT_LAW };
  }
  const figure = bandFor(from.book.ambient, ambientDegC)?.factors.get(column.ambient);
  if (figure !== undefined) return { kind: 'ambient', name, factor: figure.value, basis: figure.basis };
  const basis = from.book.ambient[0]?.factors.get(column.ambient)?.basis ?? from.rated.base.basis;
  return {
    kind: 'ambient',
    name: `${name}: no current allowed on ${column.ratedDegC} °C insulation`,
    factor: 0,
    basis,
  };
}

/** Two loaded conductors make a direct-current circuit; a count between two rows takes the row of more circuits. */
function groupingFactor(
  count: number | undefined,
  column: Column,
  book: IecAmpacity,
): AmpacityFactor | Missing | undefined {
  const circuits = Math.ceil((count ?? 2) / 2);
  if (circuits <= 1) return undefined;
  const figure = bandFor(book.grouping, circuits)?.factors.get(column.grouping);
  if (figure === undefined) return { missing: `grouping factor for ${circuits} circuits: beyond the table` };
  return { kind: 'bundle', name: `${circuits} circuits grouped`, factor: figure.value, basis: figure.basis };
}
