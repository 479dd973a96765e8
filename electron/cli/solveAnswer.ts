/** What `solve --json` prints, key by key as the contract of the command line states it. */
import type { BatteryModel, CheckedJob, OperatingPoint } from '../../core/api.ts';
import { plainObject } from './jsonText.ts';

export function solveAnswer(job: CheckedJob, model: BatteryModel, points: readonly OperatingPoint[]): unknown {
  return {
    practice: job.practice,
    practiceAssumed: job.practiceAssumed === true,
    model,
    cases: points.map(caseAnswer),
  };
}

function caseAnswer(point: OperatingPoint): unknown {
  const parts = new Map<string, unknown>();
  for (const [id, { id: _id, ...answer }] of point.parts) parts.set(id, answer);
  return {
    case: point.case,
    outcome: point.outcome,
    junctions: plainObject(point.junctions),
    parts: plainObject(parts),
    proof: point.proof,
    ...(point.collapse === undefined ? {} : { collapse: point.collapse }),
    remarks: point.remarks,
    assumptions: point.assumptions,
  };
}
