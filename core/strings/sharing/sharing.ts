/** How the strings of each bank share its current in a case. */
import type { CheckedJob, OperatingCase } from '../../job/job.ts';
import { partsInCase } from '../../job/job.ts';
import type { StringPart } from '../../job/part.ts';
import type { BatteryModel, OperatingPoint } from '../../network/answer.ts';
import { operatingPoint } from '../../network/operatingPoint.ts';
import { withoutPairs } from '../../network/wiring.ts';
import type { Tables } from '../../tables/tables.ts';
import type { SharedString, SharingCase } from '../answer.ts';
import { type Bank, type Branch, banksOf } from '../banks.ts';
import { bankCurrent, branchCurrent, LEAST_RATE_PER_H, lineThrough, NOTHING_A, reaches } from './bankCurrents.ts';
import { limitFor, stringLimits } from './currentLimit.ts';
import { restCaseOf } from './restCase.ts';

export interface SharingRequest {
  readonly job: CheckedJob;
  readonly tables: Tables;
  readonly operatingCase: OperatingCase;
  readonly model: BatteryModel;
  /** The case solved with the same model, where it is at hand. */
  readonly point?: OperatingPoint | undefined;
  /** The same for `restCaseOf` it. */
  readonly rest?: OperatingPoint | undefined;
}

/**
 * Every string of a case: I_k, its share I_k / ΣI of its bank, its fair share C_k / ΣC by capacity, the deviation share / fair - 1,
 * and the bank current at which its own changes sign. The latter lies on the line between the case and the case with all loads and
 * chargers off, on which I_k goes with ΣI in a network of EMFs and resistances (superposition): with a common bar,
 *
 *   I_k(ΣI) = (E_k - Ē)/R_k + ΣI (1/R_k)/Σ(1/R_j),   zero at ΣI = (Ē - E_k) Σ(1/R_j),   Ē = Σ(E_j/R_j)/Σ(1/R_j).
 *
 * Strings in series in one branch share its current. Figures are null where the case has no answer.
 */
export function sharingOf(request: SharingRequest): SharingCase {
  const { job, operatingCase, model } = request;
  const parts = withoutPairs(partsInCase(job, operatingCase));
  const banks = banksOf(parts);
  const point = request.point ?? operatingPoint(request);
  const rest = request.rest ?? operatingPoint({ ...request, operatingCase: restCaseOf(job, operatingCase) });
  const strings = new Map(
    banks.flatMap((bank, place) =>
      bank.branches.flatMap((branch) => {
        const shared = shareOf(bank, branch, { point, rest });
        return branch.strings.map(
          (string) => [string.id, ofString(string, { ...shared, bank: place }, request)] as const,
        );
      }),
    ),
  );
  const inOrder = parts.flatMap((part) => strings.get(part.id) ?? []);
  const deviations = inOrder.flatMap(({ deviation }) => (deviation === null ? [] : [Math.abs(deviation)]));
  return {
    case: operatingCase.id,
    model,
    outcome: point.outcome,
    strings: inOrder,
    banksA: banks.map((bank) => bankCurrent(point, bank)),
    spread: deviations.length === 0 ? null : Math.max(...deviations),
  };
}

/** What solving may take from a current that is exactly C/50, as a fraction of it. */
const ROUNDING = 1e-9;

type BranchShare = Omit<SharedString, 'id' | 'bank' | 'cRate' | 'limit'>;

function shareOf(
  bank: Bank,
  branch: Branch,
  { point, rest }: { readonly point: OperatingPoint; readonly rest: OperatingPoint },
): BranchShare {
  const bankA = bankCurrent(point, bank);
  const currentA = branchCurrent(point, branch);
  const fairShare = branch.capacityAh / bank.capacityAh;
  if (bankA === null || currentA === null) {
    return { currentA, share: null, fairShare, fairA: null, deviation: null, opposes: false, signChangeA: null };
  }
  const leastA = LEAST_RATE_PER_H * bank.capacityAh;
  const share = Math.abs(bankA) < leastA * (1 - ROUNDING) ? null : currentA / bankA;
  return {
    currentA,
    share,
    fairShare,
    fairA: share === null ? null : fairShare * bankA,
    deviation: share === null ? null : share / fairShare - 1,
    opposes: currentA * bankA < 0 && Math.min(Math.abs(currentA), Math.abs(bankA)) > NOTHING_A,
    signChangeA: signChangeOf(
      { bankA, currentA },
      { bankA: bankCurrent(rest, bank), currentA: branchCurrent(rest, branch) },
    ),
  };
}

function signChangeOf(
  loaded: { readonly bankA: number; readonly currentA: number },
  rest: { readonly bankA: number | null; readonly currentA: number | null },
): number | null {
  if (rest.bankA === null || rest.currentA === null || Math.abs(rest.currentA) <= NOTHING_A) return null;
  const line = lineThrough({ bankA: rest.bankA, currentA: rest.currentA }, loaded);
  const atA = line === null ? null : reaches(line, 0);
  return atA !== null && atA * loaded.bankA > 0 ? atA : null;
}

function ofString(
  string: StringPart,
  shared: BranchShare & { readonly bank: number },
  { tables }: SharingRequest,
): SharedString {
  const { currentA } = shared;
  return {
    ...shared,
    id: string.id,
    cRate: currentA === null ? null : Math.abs(currentA) / string.capacityAh,
    limit: limitFor(stringLimits(string, tables.chemistry), currentA),
  };
}
