/** A case with everything switched off that gives or takes by a switch of its own. */
import type { CheckedJob, OperatingCase } from '../../job/job.ts';
import { atRestChanges, partsInCase } from '../../job/job.ts';

/**
 * The case with its loads, inverters, chargers, converters and arrays off; fuses, switches, charges and temperatures stay as the
 * case has them. Unlike the case `at-rest`, which takes them from the drawing.
 */
export function restCaseOf(job: CheckedJob, operatingCase: OperatingCase): OperatingCase {
  const off = atRestChanges(partsInCase(job, operatingCase));
  return {
    ...operatingCase,
    irradianceWPerM2: 0,
    surge: undefined,
    changed: new Map([...operatingCase.changed, ...off]),
  };
}
