/** Each string and each string device gone in turn: what the others then carry, and the most that survives. */
import type { CheckedJob, OperatingCase } from '../../job/job.ts';
import { partsInCase } from '../../job/job.ts';
import type { PartId } from '../../job/part.ts';
import type { BatteryModel, OperatingPoint } from '../../network/answer.ts';
import type { CircuitRequest } from '../../network/circuit.ts';
import { operatingPoint } from '../../network/operatingPoint.ts';
import { withoutPairs } from '../../network/wiring.ts';
import type { Tables } from '../../tables/tables.ts';
import type { OneLoss, OneOutStudy } from '../answer.ts';
import { type Bank, bankFrom, banksOf } from '../banks.ts';
import { bankCurrent, branchCurrent } from './bankCurrents.ts';
import { beyondLimits, largestBankA, limitsOfBank } from './bankLimits.ts';
import { limitFor, type StringLimits } from './currentLimit.ts';
import { deviceLosses, type Loss, stringLosses, withoutStrings } from './losses.ts';
import { restCaseOf } from './restCase.ts';
import { steadied } from './steadied.ts';

interface OneOutRequest {
  readonly job: CheckedJob;
  readonly tables: Tables;
  readonly operatingCase: OperatingCase;
  readonly model: BatteryModel;
}

/** One study a bank of two or more branches, in the order of the banks; none where the case itself has no answer. */
export function oneOutOf(request: OneOutRequest): readonly OneOutStudy[] {
  const { job, operatingCase } = request;
  const parts = withoutPairs(partsInCase(job, operatingCase));
  const whole = pointsOf(request);
  return banksOf(parts).flatMap((bank, place): readonly OneOutStudy[] => {
    const bankA = bankCurrent(whole.loaded, bank);
    if (bank.branches.length < 2 || bankA === null) return [];
    const limits = limitsOfBank(bank, request.tables.chemistry);
    const study: BankStudy = { bank, limits, direction: bankA < 0 ? -1 : 1, loaded: whole.loaded, request };
    const losses = [...stringLosses(bank, request), ...deviceLosses(bank, parts, request)].map((loss) =>
      afterLoss(loss, study),
    );
    const known = losses.flatMap(({ largestA }) => (largestA === null ? [] : [largestA]));
    return [
      {
        case: operatingCase.id,
        bank: place,
        bankA,
        largestA: largestBankA(bank, { ...whole, direction: study.direction }, limits),
        survivesA: known.length === 0 ? null : known.reduce((least, a) => (Math.abs(a) < Math.abs(least) ? a : least)),
        losses,
      },
    ];
  });
}

/** The steady case in which the strings together give most, among the solved points; `undefined` where none gives anything. */
export function heaviestCase({
  job,
  points,
}: {
  readonly job: CheckedJob;
  readonly tables: Tables;
  readonly points: readonly OperatingPoint[];
}): OperatingCase | undefined {
  let heaviest: OperatingCase | undefined;
  let mostA = 0;
  for (const operatingCase of job.cases) {
    const point = points.find((one) => one.case === operatingCase.id);
    if (point === undefined || operatingCase.surge !== undefined) continue;
    const banks = banksOf(withoutPairs(partsInCase(job, operatingCase)));
    const givenA = banks.reduce((sum, bank) => sum + (bankCurrent(point, bank) ?? 0), 0);
    if (givenA > mostA) [heaviest, mostA] = [operatingCase, givenA];
  }
  return heaviest;
}

interface BankStudy {
  readonly bank: Bank;
  readonly limits: ReadonlyMap<PartId, StringLimits>;
  readonly direction: 1 | -1;
  /** The case with all strings in. */
  readonly loaded: OperatingPoint;
  readonly request: OneOutRequest;
}

function pointsOf(request: CircuitRequest): { readonly loaded: OperatingPoint; readonly rest: OperatingPoint } {
  const rest = { ...request, operatingCase: restCaseOf(request.job, request.operatingCase) };
  return { loaded: operatingPoint(request), rest: operatingPoint(rest) };
}

function afterLoss(loss: Loss, study: BankStudy): OneLoss {
  const { limits, direction, request } = study;
  const { job, operatingCase } = loss;
  const then = { ...request, job, operatingCase };
  const remaining = without(study.bank, new Set(loss.without));
  const { loaded, rest } = pointsOf(then);
  const droppedOut = newlyDropped(study.loaded, loaded);
  // Where the loads can no longer be had whole, the line is that of the same amps as with all strings in.
  const isWhole = loaded.outcome === 'solved' && droppedOut.length === 0;
  const line = isWhole ? loaded : operatingPoint(steadied(then, study.loaded));
  const beyond = new Set(beyondLimits(loaded, remaining, limits));
  return {
    lost: loss.lost,
    kind: loss.kind,
    without: loss.without,
    outcome: loaded.outcome,
    droppedOut,
    strings: remaining.branches.flatMap((branch) => {
      const currentA = branchCurrent(loaded, branch);
      return branch.strings.map(({ id }) => ({
        id,
        currentA,
        limit: limitFor(limits.get(id)!, currentA),
        overLimit: beyond.has(id),
      }));
    }),
    largestA: largestBankA(remaining, { rest, loaded: line, direction }, limits),
    cascade: cascadeOf(remaining, loaded, { ...study, request: then }),
  };
}

function newlyDropped(before: OperatingPoint, after: OperatingPoint): readonly PartId[] {
  const isOut = (point: OperatingPoint, id: PartId) => point.parts.get(id)?.state === 'dropped-out';
  return [...after.parts.keys()].filter((id) => isOut(after, id) && !isOut(before, id));
}

/** Everything beyond its limit cuts out at once, and again, until all hold, nothing is left or nothing can be said. */
function cascadeOf(bank: Bank, loaded: OperatingPoint, { limits, request }: BankStudy): readonly (readonly PartId[])[] {
  const waves: (readonly PartId[])[] = [];
  const gone = new Set<PartId>();
  let remaining = bank;
  let point = loaded;
  while (remaining.branches.length > 0) {
    const beyond = new Set(beyondLimits(point, remaining, limits));
    const cut = remaining.branches.filter(({ strings }) => strings.some(({ id }) => beyond.has(id)));
    if (cut.length === 0) break;
    const wave = cut.flatMap(({ strings }) => strings.map(({ id }) => id));
    waves.push(wave);
    for (const id of wave) gone.add(id);
    remaining = without(bank, gone);
    point = operatingPoint({ ...request, job: withoutStrings(request.job, gone) });
  }
  return waves;
}

function without(bank: Bank, ids: ReadonlySet<PartId>): Bank {
  return bankFrom(bank.branches.filter(({ strings }) => strings.every(({ id }) => !ids.has(id))));
}
