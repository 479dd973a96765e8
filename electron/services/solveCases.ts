/** Every case of a job solved, by one rule for all hosts. */
import {
  type BatteryModel,
  type CheckedJob,
  type OperatingCase,
  type OperatingPoint,
  operatingPoint,
} from '../../core/api.ts';
import { tables } from '../../data/index.ts';

/** Each case by the battery model asked for; else a start by the first second and the rest over minutes. */
export function solveCases(
  job: CheckedJob,
  cases: readonly OperatingCase[],
  asked?: BatteryModel,
): readonly OperatingPoint[] {
  return cases.map((operatingCase) => {
    const model = asked ?? (operatingCase.surge === undefined ? 'slow' : 'fast');
    return operatingPoint({ job, operatingCase, tables, model });
  });
}
