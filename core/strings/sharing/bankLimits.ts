/** The largest current of a bank at which none of its strings is beyond what it may give or take. */
import type { PartId } from '../../job/part.ts';
import type { OperatingPoint } from '../../network/answer.ts';
import type { ChemistryTables } from '../../tables/chemistryTables.ts';
import type { Bank } from '../banks.ts';
import { bankCurrent, branchCurrent, type CurrentLine, lineThrough, reaches } from './bankCurrents.ts';
import { isBeyond, type StringLimits, stringLimits } from './currentLimit.ts';

export function limitsOfBank(bank: Bank, tables: ChemistryTables): ReadonlyMap<PartId, StringLimits> {
  return new Map(bank.strings.map((string) => [string.id, stringLimits(string, tables)]));
}

/** Strings of a bank that are beyond their limits, each in the direction of its own current. */
export function beyondLimits(
  point: OperatingPoint,
  bank: Bank,
  limits: ReadonlyMap<PartId, StringLimits>,
): readonly PartId[] {
  return bank.branches.flatMap((branch) => {
    const currentA = branchCurrent(point, branch);
    return branch.strings.flatMap(({ id }) => (isBeyond(limits.get(id)!, currentA) ? [id] : []));
  });
}

/**
 * On the line between two solved points of a bank, one at rest, the current of the bank furthest in a direction (+1 discharge, -1
 * charge) at which every string is within -charge limit ≤ I_k ≤ discharge limit; exact for EMFs and resistances. 0 where some string is
 * beyond its limit all the way; null where no string's limit is known or the two points make no line. Signed as `direction`.
 */
export function largestBankA(
  bank: Bank,
  {
    rest,
    loaded,
    direction,
  }: { readonly rest: OperatingPoint; readonly loaded: OperatingPoint; readonly direction: 1 | -1 },
  limits: ReadonlyMap<PartId, StringLimits>,
): number | null {
  const restA = bankCurrent(rest, bank);
  const loadedA = bankCurrent(loaded, bank);
  if (restA === null || loadedA === null) return null;
  let [lowest, highest] = [Number.NEGATIVE_INFINITY, Number.POSITIVE_INFINITY];
  let isHeld = true;
  for (const branch of bank.branches) {
    const first = { bankA: restA, currentA: branchCurrent(rest, branch) ?? 0 };
    const line = lineThrough(first, { bankA: loadedA, currentA: branchCurrent(loaded, branch) ?? 0 });
    if (line === null) return null;
    for (const { id } of branch.strings) {
      const range = rangeWithin(line, limits.get(id)!);
      if (range === null) isHeld = false;
      else [lowest, highest] = [Math.max(lowest, range[0]), Math.min(highest, range[1])];
    }
  }
  const furthest = direction > 0 ? highest : lowest;
  if (!Number.isFinite(furthest) && isHeld) return null;
  return isHeld && lowest <= highest && furthest * direction > 0 ? furthest : 0;
}

/** Bank currents between which a string is within its limits; null where it never is. */
function rangeWithin(line: CurrentLine, { discharge, charge }: StringLimits): readonly [number, number] | null {
  const mostA = discharge?.limitA ?? Number.POSITIVE_INFINITY;
  const leastA = charge === null ? Number.NEGATIVE_INFINITY : -charge.limitA;
  const [atMost, atLeast] = [reaches(line, mostA), reaches(line, leastA)];
  if (atMost === null || atLeast === null) {
    const holds = line.currentA <= mostA && line.currentA >= leastA;
    return holds ? [Number.NEGATIVE_INFINITY, Number.POSITIVE_INFINITY] : null;
  }
  return atMost < atLeast ? [atMost, atLeast] : [atLeast, atMost];
}
