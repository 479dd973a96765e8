/** What the current of a joint must stay under. */
import { currentLimits } from '../../battery/limits.ts';
import { ampacity } from '../../conductor/ampacity.ts';
import type { CheckedJob } from '../../job/job.ts';
import type { PartId } from '../../job/part.ts';
import type { WiringPart } from '../../network/wiring.ts';
import type { Basis } from '../../tables/status.ts';
import type { Tables } from '../../tables/tables.ts';
import type { JoiningLimit } from '../answer.ts';
import { capacityOf, type Piece, stringsOfPiece } from './joinPiece.ts';
import type { JoinWay } from './joinWay.ts';

/** Of the smaller side's capacity in an hour. */
const USUAL_RATE = 0.2;
const USUAL: Basis = {
  source: 'SRC-PRACTICE',
  text: 'a fifth of the smaller capacity an hour, common practice, no source',
  status: 'common-practice',
};

export interface LimitRequest {
  readonly job: CheckedJob;
  readonly tables: Tables;
  readonly giver: Piece;
  readonly taker: Piece;
  /** Part of the current in each string. */
  readonly shares: ReadonlyMap<PartId, number>;
  readonly passed: JoinWay['passed'];
  readonly ambientDegC: number;
}

/** Every limit as a current of the whole joint, the least first. */
export function joinLimits(request: LimitRequest): readonly JoiningLimit[] {
  const smallerAh = Math.min(capacityOf(request.giver), capacityOf(request.taker));
  const usual: JoiningLimit = { what: 'C/5 of the smaller', limitA: USUAL_RATE * smallerAh, basis: USUAL };
  const limits = [...stringLimits(request), ...wiringLimits(request), usual];
  limits.sort((one, other) => one.limitA - other.limitA);
  return limits;
}

/** The limit that a person sets instead. */
export function ownLimit(limitA: number): JoiningLimit {
  return { what: 'limit chosen', limitA, basis: entered('limit chosen') };
}

function stringLimits({ giver, taker, shares, tables }: LimitRequest): readonly JoiningLimit[] {
  const limits: JoiningLimit[] = [];
  const add = (what: string, id: PartId, limitA: number, basis: Basis): void => {
    limits.push({ what: `${what} of ${id}`, limitA: limitA / (shares.get(id) ?? 1), basis });
  };
  for (const string of stringsOfPiece(taker)) {
    const { chargeMaxA } = currentLimits(string, tables.chemistry);
    if (string.maxChargeA !== undefined) add('charge limit', string.id, string.maxChargeA, entered('maxChargeA'));
    else if (chargeMaxA !== undefined) add('charge limit', string.id, chargeMaxA.value, chargeMaxA.basis);
  }
  for (const { id, maxDischargeA } of stringsOfPiece(giver)) {
    if (maxDischargeA !== undefined) add('discharge limit', id, maxDischargeA, entered('maxDischargeA'));
  }
  return limits;
}

/** Fuses, breakers and switches each; of the cables the one that is first at its ampacity. */
function wiringLimits({ passed, ...request }: LimitRequest): readonly JoiningLimit[] {
  const limits: JoiningLimit[] = [];
  let thinnest: JoiningLimit | undefined;
  for (const { part, share } of passed) {
    const limit = wiringLimit(part, share, request);
    if (limit === undefined) continue;
    if (part.kind !== 'cable') limits.push(limit);
    else if (thinnest === undefined || limit.limitA < thinnest.limitA) thinnest = limit;
  }
  return thinnest === undefined ? limits : [...limits, thinnest];
}

function wiringLimit(
  part: WiringPart,
  share: number,
  { job, tables, ambientDegC }: Omit<LimitRequest, 'passed'>,
): JoiningLimit | undefined {
  switch (part.kind) {
    case 'fuse':
    case 'breaker':
    case 'switch':
      if (part.ratingA === undefined) return undefined;
      return { what: `${part.kind} ${part.id}`, limitA: part.ratingA / share, basis: entered('ratingA') };
    case 'cable': {
      // Which book rates it is not known: enough to solve with, not to judge by.
      if (job.practiceAssumed === true) return undefined;
      const rating = ampacity(part, { practice: job.practice, ambientDegC, tables: tables.conductors });
      if ('missing' in rating) return undefined;
      return {
        what: `cable ${part.id}`,
        limitA: rating.finalA / share,
        basis: { ...rating.basis, status: rating.status },
      };
    }
    default:
      return undefined;
  }
}

function entered(what: string): Basis {
  return { source: 'SRC-JOB-ENTRY', text: `${what} as entered`, status: 'common-practice' };
}
