/** The currents of a bank's branches, read off a solved case. */
import type { OperatingPoint } from '../../network/answer.ts';
import type { Bank, Branch } from '../banks.ts';

/**
 * Below this, as amps per amp-hour of the bank (C/50), a bank is taken to rest and sharing is not judged: small differences of
 * rest volts then outweigh everything, and a clamp meter cannot tell. Common practice, no source.
 */
export const LEAST_RATE_PER_H = 0.02;

/** Out of the plus of the branch; null where the case has no answer. */
export function branchCurrent(point: OperatingPoint, branch: Branch): number | null {
  if (point.outcome !== 'solved') return null;
  const currentA = point.parts.get(branch.strings.at(-1)!.id)?.currentA ?? null;
  return currentA !== null && Math.abs(currentA) <= PROVED_A ? 0 : currentA;
}
/** A proof holds to this (`JUNCTION_BOUND` of an ampere): what is less is what solving leaves of no current. */
const PROVED_A = 1e-9;

/** Sum over the branches, discharge positive. */
export function bankCurrent(point: OperatingPoint, bank: Bank): number | null {
  let sumA = 0;
  for (const branch of bank.branches) {
    const currentA = branchCurrent(point, branch);
    if (currentA === null) return null;
    sumA += currentA;
  }
  return sumA;
}

/** The straight line of one current against that of its bank, through two solved points. */
export interface CurrentLine {
  /** Bank current and own current of the first point. */
  readonly bankA: number;
  readonly currentA: number;
  readonly slope: number;
}

/** Null where the bank carries the same in both points: they then make no line. */
export function lineThrough(
  first: { readonly bankA: number; readonly currentA: number },
  second: { readonly bankA: number; readonly currentA: number },
): CurrentLine | null {
  const step = second.bankA - first.bankA;
  if (Math.abs(step) <= NOTHING_A) return null;
  return { ...first, slope: (second.currentA - first.currentA) / step };
}
/** Currents no larger than this are what rounding leaves. */
export const NOTHING_A = 1e-6;

/** Bank current at which the line reaches a current; null where it never does. */
export function reaches(line: CurrentLine, currentA: number): number | null {
  return Math.abs(line.slope) <= FLAT ? null : line.bankA + (currentA - line.currentA) / line.slope;
}
/** A string that takes less than this part of any change of its bank takes none of it. */
const FLAT = 1e-9;
