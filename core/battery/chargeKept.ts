/** How much of a charge current stays in the cells. */
import { Defect } from '../job/issue.ts';
import type { Chemistry } from '../job/part.ts';
import type { ChemistryTables } from '../tables/chemistryTables.ts';
import { limitOf } from './limits.ts';

/**
 * States of charge and the part (0 to 1) of a charge current that is kept there, for straight lines between. Lead cells gas
 * the more the fuller they are (`data/chemistry/charge_kept.csv`); others keep the same part throughout (`chargeEfficiency` in
 * `data/chemistry/limits.csv`).
 */
export function chargeKeptAt(
  chemistry: Chemistry,
  tables: ChemistryTables,
): readonly [stateOfCharge: readonly number[], kept: readonly number[]] {
  const points = tables.chargeKept[chemistry];
  if (points.length > 0) return [points.map(({ at }) => at), points.map(({ value }) => value)];
  const same = limitOf(chemistry, 'chargeEfficiency', tables);
  if (same === undefined) throw new Defect(`every chemistry keeps some part of a charge (${chemistry})`);
  return [[0], [same.value]];
}
