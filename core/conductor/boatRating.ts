/** Ampacity on boats: the US boat law's table and the international small-craft table, which are built alike. */
import type { ConductorSize } from '../job/part.ts';
import type { BoatAmpacity } from '../tables/conductorTables.ts';
import type { Figure } from '../tables/practiceTable.ts';
import { bareMetal } from './metal.ts';
import {
  type AmpacityContext,
  type AmpacityFactor,
  bandFor,
  columnUpTo,
  insulationOf,
  loadedTogether,
  type RatedConductor,
  type Rating,
  ratedRow,
  SQUARE_ROOT_LAW,
  squareRootFactor,
  surroundings,
} from './rating.ts';
import type { Missing } from './size.ts';

/**
 * The book's table, its engine-space factor, its bundling factor where it binds, and the square-root law for surroundings
 * warmer than the table (or than the engine space) assumes: boat books give no factor for those.
 * Sources SRC-CFR33-183-425-T5, SRC-ISO-13297-A.
 */
export function boatRating(
  cable: RatedConductor & { readonly size: ConductorSize },
  context: AmpacityContext,
  book: BoatAmpacity,
): Rating | Missing {
  const { table } = book;
  if (bareMetal(cable.metal ?? 'copper') === 'aluminium')
    return { missing: `${table.name} has no aluminium: use copper` };
  const insulation = insulationOf(cable, context);
  const ratedDegC = columnUpTo(columnsOf(book), insulation.degC);
  if (ratedDegC === undefined) return { missing: `a column of ${table.name} for ${insulation.degC} °C insulation` };
  const rated = ratedRow({ size: cable.size, table, column: String(ratedDegC) }, context.tables);
  if ('missing' in rated) return rated;
  const around = surroundings(cable, context, book.engineSpaceDegC);
  const together = loadedTogether(cable);
  const bundling = bundleOf(together.count, context, book);
  const engine = cable.run === 'engine-space' ? engineFactor(ratedDegC, book) : undefined;
  const warm = warmFactor(
    { ratedDegC, ambientDegC: around.degC },
    { engine: engine !== undefined, base: rated.base, book },
  );
  return {
    base: rated.base,
    ratedDegC,
    tableAmbientDegC: table.tableAmbientDegC,
    factors: [engine, warm, bundling.factor].filter((factor) => factor !== undefined),
    surroundDegC: around.degC,
    neighbours: bundling.neighbours,
    assumed: [...insulation.assumed, ...rated.assumed, ...around.assumed, ...together.assumed],
    remarks: bundling.remarks,
  };
}

function columnsOf(book: BoatAmpacity): readonly number[] {
  return [...new Set(book.table.rows.flatMap((row) => [...row.amperesA.keys()]))].map(Number);
}

function engineFactor(ratedDegC: number, book: BoatAmpacity): AmpacityFactor {
  const figure = book.engineSpace.get(String(ratedDegC));
  if (figure !== undefined)
    return { kind: 'engine-space', name: 'engine space', factor: figure.value, basis: figure.basis };
  return {
    kind: 'engine-space',
    name: `engine space: ${ratedDegC} °C insulation is not allowed there`,
    factor: 0,
    basis: book.engineSpaceDegC.basis,
  };
}

function warmFactor(
  degC: { readonly ratedDegC: number; readonly ambientDegC: number },
  place: { readonly engine: boolean; readonly base: Figure; readonly book: BoatAmpacity },
): AmpacityFactor | undefined {
  const baseDegC = place.engine ? place.book.engineSpaceDegC.value : place.book.table.tableAmbientDegC;
  const name = `ambient ${degC.ambientDegC} °C`;
  if (degC.ambientDegC > baseDegC) {
    const factor = degC.ratedDegC > baseDegC ? squareRootFactor({ ...degC, tableAmbientDegC: baseDegC }) : 0;
    return { kind: 'ambient', name, factor, basis: SQUARE_ROOT_LAW };
  }
  if (place.engine) return undefined;
  return { kind: 'ambient', name: `${name}, table ${baseDegC} °C`, factor: 1, basis: place.base.basis };
}

interface Bundling {
  readonly factor: AmpacityFactor | undefined;
  /** The factor that the heat of the neighbours calls for, binding or not. */
  readonly neighbours: number;
  readonly remarks: readonly string[];
}

function bundleOf(count: number | undefined, context: AmpacityContext, book: BoatAmpacity): Bundling {
  const figure = count === undefined ? undefined : bandFor(book.bundling, count)?.factors.get('all');
  if (figure === undefined) return { factor: undefined, neighbours: 1, remarks: [] };
  const name = `${count} loaded conductors`;
  const fromV = book.bundlingFromV;
  if (fromV === undefined || (context.systemV !== undefined && context.systemV >= fromV.value)) {
    return {
      factor: { kind: 'bundle', name, factor: figure.value, basis: figure.basis },
      neighbours: figure.value,
      remarks: [],
    };
  }
  if (figure.value === 1) return { factor: undefined, neighbours: 1, remarks: [] };
  const volts = context.systemV === undefined ? ` (system volts not given, taken as below ${fromV.value} V)` : '';
  return {
    factor: {
      kind: 'bundle',
      name: `${name}: binding from ${fromV.value} V only${volts}`,
      factor: 1,
      basis: fromV.basis,
    },
    neighbours: figure.value,
    remarks: [`industry boat practice bundles below ${fromV.value} V too: times ${figure.value} for ${name}`],
  };
}
