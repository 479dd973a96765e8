/** What flows between the strings of a bank with nothing switched on: who feeds whom. */
import { Defect } from '../../job/issue.ts';
import type { CheckedJob } from '../../job/job.ts';
import { caseById, partsInCase } from '../../job/job.ts';
import type { BatteryModel } from '../../network/answer.ts';
import type { EmfTransfer } from '../../network/emfTransfer.ts';
import { emfTransfer } from '../../network/emfTransfer.ts';
import { solveCircuit } from '../../network/operatingPoint.ts';
import { withoutPairs } from '../../network/wiring.ts';
import type { Tables } from '../../tables/tables.ts';
import type { AtRest, CirculatingPair } from '../answer.ts';
import { type Branch, banksOf } from '../banks.ts';
import { branchCurrent } from './bankCurrents.ts';

interface AtRestRequest {
  readonly job: CheckedJob;
  readonly tables: Tables;
  readonly model?: BatteryModel | undefined;
}

/**
 * The case `at-rest`, and its currents attributed pairwise by superposition. With G_ij = -dI_i/dE_j,
 *
 *   I_i = Σ_j G_ij (E_i - E_j)   over the branches of a bank,
 *
 * since equal EMFs drive nothing round any loop; a reciprocal network has G_ij = G_ji, so what i gives j is what j takes from i:
 * exact and adding up, where a split in proportion would be a guess. In a star G_ij = (1/R_i)(1/R_j)/Σ(1/R). Warming cables count
 * with their resistance as it then is. A branch of several strings in series goes by its first string. Branches of different banks
 * have no pair; what one bank's currents do to another's on wiring that they share, and what bonds and held volts drive, is left in
 * `remainderA`. `model` is `slow` where it is not given: minutes, not the first second.
 */
export function atRestOf({ job, tables, model = 'slow' }: AtRestRequest): AtRest {
  const operatingCase = caseById(job, 'at-rest');
  if (operatingCase === undefined) throw new Defect('every job has a case at-rest');
  const solved = solveCircuit({ job, tables, operatingCase, model });
  const { outcome, proof } = solved.point;
  if (outcome !== 'solved') return nothing(outcome);
  const banks = banksOf(withoutPairs(partsInCase(job, operatingCase)));
  const branches = banks.flatMap((bank, place) =>
    bank.branches.map((branch) => ({ branch, bank: place, currentA: branchCurrent(solved.point, branch) ?? 0 })),
  );
  const strings = branches.map(({ branch }) => branch.strings.map(({ id }) => id));
  const transfer = emfTransfer(solved, strings);
  const { pairs, remainderA } = attributed(branches, transfer);
  const givenA = branches.reduce((sum, { currentA }) => sum + Math.max(0, currentA), 0);
  return {
    outcome,
    strings: branches.flatMap(({ branch, currentA }) => branch.strings.map(({ id }) => ({ id, currentA }))),
    pairs,
    remainderA,
    lostW: givenA === 0 ? 0 : proof.heatW,
    givenA,
    givenAhPerDay: HOURS_A_DAY * givenA,
  };
}
const HOURS_A_DAY = 24;

interface PlacedBranch {
  readonly branch: Branch;
  readonly bank: number;
  readonly currentA: number;
}

/** The pairs, the largest first, and the most that they leave of a branch's current. */
function attributed(branches: readonly PlacedBranch[], transfer: EmfTransfer | null) {
  const pairs: CirculatingPair[] = [];
  const left = branches.map(({ currentA }) => currentA);
  for (const [i, first] of branches.entries()) {
    for (const [j, second] of branches.entries()) {
      if (transfer === null || j <= i || first.bank !== second.bank) continue;
      const flowA = flowBetween(transfer, i, j);
      if (Math.abs(flowA) < LEAST_FLOW_A) continue;
      left[i]! -= flowA;
      left[j]! += flowA;
      const [giver, taker] = flowA > 0 ? [first, second] : [second, first];
      const [from, to] = [giver.branch.strings[0]!.id, taker.branch.strings[0]!.id];
      pairs.push({ from, to, currentA: Math.abs(flowA) });
    }
  }
  pairs.sort((p, q) => q.currentA - p.currentA);
  return { pairs, remainderA: Math.max(0, ...left.map((currentA) => Math.abs(currentA))) };
}
/** What is less is what solving leaves of no flow. */
const LEAST_FLOW_A = 1e-10;

/** G_ij (E_i - E_j): what i gives j; negative where it takes. Rounding may part G_ij from G_ji: their mean keeps the sums. */
function flowBetween({ siemens, sources }: EmfTransfer, i: number, j: number): number {
  const mutual = -(siemens[i]![j]! + siemens[j]![i]!) / 2;
  return mutual * (sources[i]!.emfV - sources[j]!.emfV);
}

function nothing(outcome: AtRest['outcome']): AtRest {
  return { outcome, strings: [], pairs: [], remainderA: 0, lostW: 0, givenA: 0, givenAhPerDay: 0 };
}
