/** How many cells stand in one block. */
import type { Chemistry } from '../job/part.ts';
import type { ChemistryTables } from '../tables/chemistryTables.ts';
import type { Basis } from '../tables/status.ts';

export type CellCount =
  | { readonly known: true; readonly cells: number; readonly basis: Basis }
  /** `nearest` is the best whole number, at least 1; `missing` says what to enter. */
  | { readonly known: false; readonly nearest: number; readonly missing: string };

/** A label within this fraction of a whole number of nominal cells is taken as exact. */
const EXACT = 0.005;

/**
 * Cells in series in one block, from the chemistry and the block's nominal volts (> 0).
 *
 * Lead cells are 2 V, lithium iron phosphate 3.2 V, other lithium 3.6 or 3.7 V, nickel-cadmium 1.2 V. A label is accepted
 * when exactly one whole number of cells fits it (a "12 V" iron phosphate block is 4 cells); where none or several fit, the
 * answer says so instead of guessing. Source: SRC-BAT-CELL-VOLTS.
 */
export function cellsPerBlock(chemistry: Chemistry, blockNominalV: number, tables: ChemistryTables): CellCount {
  const { nominalV, lowestV, highestV, basis } = tables.cellVolts[chemistry];
  const nearest = Math.max(1, Math.round(blockNominalV / nominalV));
  if (Math.abs(blockNominalV / (nearest * nominalV) - 1) <= EXACT) return { known: true, cells: nearest, basis };
  const slack = 1e-9;
  const fewest = Math.max(1, Math.ceil(blockNominalV / highestV - slack));
  const most = Math.floor(blockNominalV / lowestV + slack);
  if (fewest === most) return { known: true, cells: fewest, basis };
  const missing =
    most > fewest
      ? `blockNominalV that fits one number of cells: ${blockNominalV} V may be ${fewest} to ${most} cells of ${chemistry}`
      : `blockNominalV that fits a whole number of cells: ${blockNominalV} V is no multiple of ${nominalV} V (${chemistry})`;
  return { known: false, nearest, missing };
}
