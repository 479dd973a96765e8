/** Which sides of a job are worth a join-now check without being asked. */
import type { CheckedJob } from '../../job/job.ts';
import type { PartId } from '../../job/part.ts';
import { netsOf, type SinglePart, withoutPairs } from '../../network/wiring.ts';
import { type Bank, banksOf } from '../banks.ts';

export type JoinPair = readonly [readonly PartId[], readonly PartId[]];

/** More answers than these are not read. */
const MOST_PAIRS = 10;

/** Banks whose label volts differ by more than this part of the lower are never joined (common practice, no source). */
const ALIKE = 0.25;

/**
 * The pairs worth telling by default, at most ten: branches of each bank, neighbours first; then whole banks that only an open
 * switch, breaker or fuse keeps apart; where there is neither, whole banks of like volts two by two, but for halves of one string.
 */
export function joinPairs(job: CheckedJob): readonly JoinPair[] {
  const parts = withoutPairs(job.parts);
  const banks = banksOf(parts);
  const likely = [...banks.flatMap(branchPairs), ...bankPairs(banks, heldApart(parts))];
  return (likely.length > 0 ? likely : bankPairs(banks, standApart(parts))).slice(0, MOST_PAIRS);
}

function branchPairs({ branches }: Bank): readonly JoinPair[] {
  const ids = branches.map(({ strings }) => strings.map(({ id }) => id));
  const pairs: JoinPair[] = [];
  for (let apart = 1; apart < ids.length; apart++) {
    for (let first = 0; first + apart < ids.length; first++) pairs.push([ids[first]!, ids[first + apart]!]);
  }
  return pairs;
}

function bankPairs(banks: readonly Bank[], belong: (a: Bank, b: Bank) => boolean): readonly JoinPair[] {
  const ids = ({ strings }: Bank) => strings.map(({ id }) => id);
  return banks.flatMap((a, place) =>
    banks
      .slice(place + 1)
      .filter((b) => areAlike(a, b) && belong(a, b))
      .map((b): JoinPair => [ids(a), ids(b)]),
  );
}

function areAlike(a: Bank, b: Bank): boolean {
  const labelV = ({ branches }: Bank) =>
    branches[0]!.strings.reduce((sum, { blocksInSeries, blockNominalV }) => sum + blocksInSeries * blockNominalV, 0);
  const [low, high] = [Math.min(labelV(a), labelV(b)), Math.max(labelV(a), labelV(b))];
  return high <= (1 + ALIKE) * low;
}

/** Whether two banks would have the same poles once everything that can close is closed. */
function heldApart(parts: readonly SinglePart[]): (a: Bank, b: Bank) => boolean {
  const nets = netsOf(parts, (part) => part.kind !== 'diode');
  return (a, b) => {
    const [one] = a.branches;
    const [other] = b.branches;
    return nets.same(one!.plus, other!.plus) && nets.same(one!.minus, other!.minus);
  };
}

/** Whether neither of two banks stands on the other. */
function standApart(parts: readonly SinglePart[]): (a: Bank, b: Bank) => boolean {
  const nets = netsOf(parts, (part) => part.kind !== 'diode');
  return (a, b) => {
    const [one] = a.branches;
    const [other] = b.branches;
    return !nets.same(one!.plus, other!.minus) && !nets.same(one!.minus, other!.plus);
  };
}
