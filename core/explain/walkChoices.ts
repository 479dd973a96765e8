/** What a volt walk can be made for. */

import type { CheckedJob, OperatingCase } from '../job/job.ts';
import { caseById, partsInCase } from '../job/job.ts';
import type { OperatingPoint } from '../network/answer.ts';
import { withoutPairs } from '../network/wiring.ts';
import { routesTo } from './route.ts';
import type { WalkChoice } from './walk.ts';
import { loadPort } from './walkPorts.ts';
import { Wires } from './wires.ts';

export interface WalkChoicesRequest {
  readonly job: CheckedJob;
  readonly point: OperatingPoint;
  /** Else the case of the job that the point names. */
  readonly operatingCase?: OperatingCase;
}

/** Less than this is what rounding leaves of no current. */
const ROUNDING_A = 1e-9;

/**
 * Everything that takes current, in job order: loads, inverters, strings under charge, the inputs of controllers and converters;
 * with the source that feeds each most: of the sources that give, the one whose way to it carries most where it carries least.
 */
export function walkChoices({ job, point, operatingCase }: WalkChoicesRequest): readonly WalkChoice[] {
  const stands = operatingCase ?? caseById(job, point.case);
  if (stands === undefined || point.outcome !== 'solved') return [];
  const parts = withoutPairs(partsInCase(job, stands));
  const wires = new Wires(parts, point);
  return parts.flatMap((part): readonly WalkChoice[] => {
    const port = loadPort(part, point);
    if (port === undefined || port.currentA === null || port.currentA <= ROUNDING_A) return [];
    const routes = routesTo(port, { parts, wires, point });
    // Where every way has a stretch that flows against it (a string in series that is being charged), what gives still counts.
    const feeding = routes.filter(({ leastA }) => leastA > 0);
    const giving = routes.filter(({ source }) => (source.currentA ?? 0) > ROUNDING_A);
    const sources = (feeding.length > 0 ? feeding : giving).map(({ source }) => source.part);
    return [{ load: part.id, currentA: port.currentA, source: sources[0] ?? null, sources }];
  });
}
