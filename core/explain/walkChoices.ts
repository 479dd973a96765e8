/** What a volt walk can be made for. */
import { withoutPairs } from '../checks/wiring.ts';
import type { CheckedJob, OperatingCase } from '../job/job.ts';
import { caseById, partsInCase } from '../job/job.ts';
import type { OperatingPoint } from '../network/answer.ts';
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
    if (port === undefined || port.currentA === null || port.currentA <= 0) return [];
    const routes = routesTo(port, { parts, wires, point });
    const sources = routes.filter(({ leastA }) => leastA > 0).map(({ source }) => source.part);
    return [{ load: part.id, currentA: port.currentA, source: sources[0] ?? null, sources }];
  });
}
