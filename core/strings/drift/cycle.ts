/** A day of the bank, made from the cases of a job. */
import type { CheckedJob, OperatingCase } from '../../job/job.ts';
import { partsInCase } from '../../job/job.ts';
import { operatingPoint } from '../../network/operatingPoint.ts';
import { withoutPairs } from '../../network/wiring.ts';
import type { Tables } from '../../tables/tables.ts';
import type { CycleStep, DriftRequest } from '../answer.ts';
import { banksOf } from '../banks.ts';
import { bankCurrent } from '../sharing/bankCurrents.ts';

const DAY_H = 24;
const LONGEST_DISCHARGE_H = 14;
const LONGEST_CHARGE_H = 8;
/** Of the bank, to be used in a day; common practice, no source. */
const USED = 0.5;
const CYCLES = 7;
const STEP_S = 1800;

/** How fast a case empties the bank that it works hardest: current over capacity, 1/h; negative where all banks are charged. */
interface Pace {
  readonly id: string;
  readonly emptiesPerH: number;
}

/**
 * A day: the heaviest steady case that discharges, for as long as it takes to use half of the bank that it works hardest (at most
 * 14 h, in half hours), the case that charges most (at most 8 h), rest for what is left of 24 h; seven times, in steps of half
 * an hour at most. Null where no case discharges. Cases with a starting load are no steady cases.
 */
export function usualCycle({
  job,
  tables,
}: {
  readonly job: CheckedJob;
  readonly tables: Tables;
}): DriftRequest | null {
  const paces = job.cases.filter(({ surge }) => surge === undefined).flatMap((one) => paceOf(job, tables, one));
  const heaviest = paces.reduce<Pace | null>(
    (most, pace) => (pace.emptiesPerH > (most?.emptiesPerH ?? 0) ? pace : most),
    null,
  );
  if (heaviest === null) return null;
  const charging = paces.reduce<Pace | null>(
    (most, pace) => (pace.emptiesPerH < (most?.emptiesPerH ?? 0) ? pace : most),
    null,
  );
  const hours = Math.min(LONGEST_DISCHARGE_H, Math.max(0.5, Math.round((2 * USED) / heaviest.emptiesPerH) / 2));
  const cycle: CycleStep[] = [{ case: heaviest.id, hours }];
  if (charging !== null) cycle.push({ case: charging.id, hours: LONGEST_CHARGE_H });
  const rest = DAY_H - cycle.reduce((sum, stretch) => sum + stretch.hours, 0);
  if (rest > 0) cycle.push({ case: 'at-rest', hours: rest });
  return { cycle, cycles: CYCLES, stepS: STEP_S };
}

function paceOf(job: CheckedJob, tables: Tables, operatingCase: OperatingCase): readonly Pace[] {
  const point = operatingPoint({ job, operatingCase, tables, model: 'slow' });
  if (point.outcome !== 'solved') return [];
  const paces = banksOf(withoutPairs(partsInCase(job, operatingCase))).flatMap((bank) => {
    const currentA = bankCurrent(point, bank);
    return currentA === null ? [] : [currentA / bank.capacityAh];
  });
  return paces.length === 0 ? [] : [{ id: operatingCase.id, emptiesPerH: Math.max(...paces) }];
}
