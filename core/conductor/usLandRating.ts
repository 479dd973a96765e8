/** Ampacity on land in the United States: the building code's table, ambient and bundling factors, and the terminals' limit. */

import type { ConductorSize } from '../job/part.ts';
import type { BareMetal, UsLandAmpacity } from '../tables/conductorTables.ts';
import { bareMetal } from './metal.ts';
import {
  type AmpacityContext,
  type AmpacityFactor,
  bandFor,
  columnUpTo,
  insulationOf,
  loadedTogether,
  type RatedConductor,
  type RatedRow,
  type Rating,
  ratedRow,
  surroundings,
} from './rating.ts';
import { areaMm2, type Missing } from './size.ts';

const COLUMNS = [60, 75, 90];
/** Terminals of circuits up to 100 A, or marked for 14 to 1 AWG, count as the small ones. */
const LARGEST_SMALL_TERMINAL: ConductorSize = { system: 'awg', gauge: 1 };

/** Sources SRC-NEC-310-16, SRC-NEC-AMBIENT, SRC-NEC-BUNDLING, SRC-NEC-110-14C. */
export function usLandRating(
  cable: RatedConductor & { readonly size: ConductorSize },
  context: AmpacityContext,
): Rating | Missing {
  const book = context.tables.usLand;
  const insulation = insulationOf(cable, context);
  const ratedDegC = columnUpTo(COLUMNS, insulation.degC);
  if (ratedDegC === undefined)
    return { missing: `a column of ${book.current.name} for ${insulation.degC} °C insulation` };
  const metal = bareMetal(cable.metal ?? 'copper');
  const rated = ratedRow({ size: cable.size, table: book.current, column: `${metal}-${ratedDegC}` }, context.tables);
  if ('missing' in rated) return rated;
  const around = surroundings(cable, context, context.tables.engineSpaceDegC);
  const together = loadedTogether(cable);
  const ambient = ambientFactor({ ambientDegC: around.degC, ratedDegC }, rated, book);
  const bundle = bundleFactor(together.count, book);
  const corrected = rated.base.value * ambient.factor * (bundle?.factor ?? 1);
  const terminal = terminalFactor({ corrected, ratedDegC, metal }, rated, context);
  return {
    base: rated.base,
    ratedDegC,
    tableAmbientDegC: book.current.tableAmbientDegC,
    factors: [ambient, bundle, terminal.factor].filter((factor) => factor !== undefined),
    surroundDegC: around.degC,
    neighbours: bundle?.factor ?? 1,
    assumed: [...insulation.assumed, ...rated.assumed, ...around.assumed, ...together.assumed, ...terminal.assumed],
    remarks:
      cable.run === 'free-air' ? ['in free air the code has a table with higher figures; it is not held here'] : [],
  };
}

function ambientFactor(
  degC: { readonly ambientDegC: number; readonly ratedDegC: number },
  rated: RatedRow,
  book: UsLandAmpacity,
): AmpacityFactor {
  const name = `ambient ${degC.ambientDegC} °C`;
  if (degC.ambientDegC === book.current.tableAmbientDegC) {
    return { kind: 'ambient', name, factor: 1, basis: rated.base.basis };
  }
  const figure = bandFor(book.ambient, degC.ambientDegC)?.factors.get(String(degC.ratedDegC));
  if (figure !== undefined) return { kind: 'ambient', name, factor: figure.value, basis: figure.basis };
  const basis = book.ambient[0]?.factors.get(String(degC.ratedDegC))?.basis ?? rated.base.basis;
  return {
    kind: 'ambient',
    name: `${name}: no current allowed on ${degC.ratedDegC} °C insulation`,
    factor: 0,
    basis,
  };
}

function bundleFactor(count: number | undefined, book: UsLandAmpacity): AmpacityFactor | undefined {
  if (count === undefined) return undefined;
  const figure = bandFor(book.bundling, count)?.factors.get('all');
  if (figure === undefined) return undefined;
  return { kind: 'bundle', name: `${count} loaded conductors`, factor: figure.value, basis: figure.basis };
}

/** The corrected ampacity may not exceed the uncorrected figure in the column of the terminals' temperature. */
function terminalFactor(
  conductor: { readonly corrected: number; readonly ratedDegC: number; readonly metal: BareMetal },
  rated: RatedRow,
  context: AmpacityContext,
): { readonly factor: AmpacityFactor | undefined; readonly assumed: readonly string[] } {
  const { usLand } = context.tables;
  const small = areaMm2(rated.row.size, context.tables) <= areaMm2(LARGEST_SMALL_TERMINAL, context.tables);
  const usual = small ? usLand.smallTerminalDegC : usLand.largeTerminalDegC;
  const degC = context.terminalDegC ?? usual.value;
  const column = columnUpTo(COLUMNS, degC) ?? COLUMNS[0] ?? degC;
  const limit = rated.row.amperesA.get(`${conductor.metal}-${column}`);
  if (column >= conductor.ratedDegC || limit === undefined) return { factor: undefined, assumed: [] };
  const factor = conductor.corrected > limit.value ? limit.value / conductor.corrected : 1;
  return {
    factor: {
      kind: 'terminal',
      name: `${column} °C terminals: ${limit.value} A at most`,
      factor,
      basis: usual.basis,
    },
    assumed: context.terminalDegC === undefined ? [`terminals ${degC} °C`] : [],
  };
}
