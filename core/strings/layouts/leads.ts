/** How equal the leads of one string must be to the others' for a chosen deviation. */
import type { CheckedJob, OperatingCase } from '../../job/job.ts';
import type { CablePart } from '../../job/part.ts';
import type { BatteryModel } from '../../network/answer.ts';
import type { Tables } from '../../tables/tables.ts';
import type { LeadStudy, LeadTolerance } from '../answer.ts';
import { solveBank } from './layouts.ts';
import { withLeads } from './leadLengths.ts';
import { branchCurrents, deviationsOf, isIdle, type SolvedBank, sum } from './measure.ts';
import type { RowBranch } from './row.ts';

export interface LeadsRequest {
  readonly job: CheckedJob;
  readonly tables: Tables;
  readonly operatingCase: OperatingCase;
  readonly model: BatteryModel;
  /** Largest |deviation| allowed, 0 to 1. */
  readonly limit: number;
}

/** Longest mean lead that is tried, m. */
const LONGEST_M = 200;
/** To which a length is found, as a fraction of it. */
const PRECISION = 1e-9;
/** A deviation this near to its limit is at it. */
const EXACT = 1e-12;
const MOST_STEPS = 60;

/**
 * For each branch of the largest bank with cables of its own, named by its first string: between which mean lengths of these every
 * branch's deviation stays within the limit, all of them scaled together, the other branches as drawn. A branch that gives shares
 * less the longer its leads, and every other one more, so that the lengths are one stretch.
 * Empty where the case has no answer or the bank carries less than C/50.
 */
export function leadToleranceOf(request: LeadsRequest): LeadStudy {
  const { operatingCase, limit } = request;
  const solved = solveBank(request);
  const currents = solved === null ? undefined : branchCurrents(solved);
  const isStill = solved === null || currents === undefined || isIdle(solved.row, sum(currents));
  const leads = isStill
    ? []
    : solved.row.branches.flatMap((branch, k) => {
        const cables = leadsOf(branch, solved);
        return cables.length === 0 ? [] : [toleranceOf(request, { solved, place: k, cables })];
      });
  return { case: operatingCase.id, limit, leads };
}

/** With two branches the way from one to the posts of the other is its lead, however it is drawn. */
function leadsOf({ own, alone }: RowBranch, { row }: SolvedBank): readonly CablePart[] {
  const ways = row.branches.length === 2 ? alone : own;
  return [...ways.plus.parts, ...ways.minus.parts].filter((part) => part.kind === 'cable');
}

interface Lead {
  readonly solved: SolvedBank;
  /** Of the branch in the row. */
  readonly place: number;
  readonly cables: readonly CablePart[];
}

function toleranceOf(request: LeadsRequest, lead: Lead): LeadTolerance {
  const { cables, solved, place } = lead;
  const lengthM = sum(cables.map((cable) => cable.lengthM)) / cables.length;
  const string = solved.row.branches[place]!.branch.strings[0]!.id;
  const none = { string, lengthM, shortestM: null, longestM: null };
  const at = remembered((meanM) => excessAt(request, lead, meanM / lengthM));
  if (at(lengthM).opposes) return none;
  const shortestM = edgeOf((meanM) => -at(meanM).tooShort, lengthM);
  const longestM = edgeOf((meanM) => at(meanM).tooLong, lengthM);
  if (shortestM > longestM) return none;
  const middle = at((shortestM + longestM) / 2);
  return middle.tooShort > 0 || middle.tooLong > 0 ? none : { ...none, shortestM, longestM };
}

function remembered<Answer>(find: (value: number) => Answer): (value: number) => Answer {
  const known = new Map<number, Answer>();
  return (value) => {
    const answer = known.get(value) ?? find(value);
    known.set(value, answer);
    return answer;
  };
}

/**
 * The length from which a rising excess is above 0: 0 where it always is, the longest that is tried where it never is. Bracketed from the
 * length as drawn, then by false position, the end that stays put given half its weight (the Illinois rule), which keeps the bracket.
 */
function edgeOf(excess: (meanM: number) => number, drawnM: number): number {
  let [low, high] = [0, drawnM];
  let [atLow, atHigh] = [excess(0), excess(drawnM)];
  if (atLow > 0) return 0;
  while (atHigh <= 0) {
    if (high >= LONGEST_M) return LONGEST_M;
    [low, atLow] = [high, atHigh];
    high = Math.min(LONGEST_M, 4 * high);
    atHigh = excess(high);
  }
  let stayed = 0;
  for (let step = 0; step < MOST_STEPS && high - low > PRECISION * high; step++) {
    const guess = (low * atHigh - high * atLow) / (atHigh - atLow);
    const at = guess > low && guess < high ? guess : (low + high) / 2;
    const found = excess(at);
    if (Math.abs(found) < EXACT) return at;
    if (found > 0) {
      [high, atHigh] = [at, found];
      if (stayed < 0) atLow /= 2;
      stayed = -1;
    } else {
      [low, atLow] = [at, found];
      if (stayed > 0) atHigh /= 2;
      stayed = 1;
    }
  }
  return (low + high) / 2;
}

interface Excess {
  /** How far beyond the limit because too much passes through this branch: above 0, its leads are too short. */
  readonly tooShort: number;
  /** Because too little does: its leads are too long. */
  readonly tooLong: number;
  /** It works against its bank, which no lead changes. */
  readonly opposes: boolean;
}

function excessAt({ job, tables, model, limit, operatingCase }: LeadsRequest, lead: Lead, scale: number): Excess {
  const scales = new Map(lead.cables.map(({ id }) => [id, scale]));
  const solved = solveBank({ job, tables, model, operatingCase: withLeads(job, operatingCase, scales) });
  const currents = solved === null ? undefined : branchCurrents(solved);
  if (solved === null || currents === undefined) return { tooShort: -1, tooLong: 1, opposes: false };
  const deviations = deviationsOf(solved.row, currents);
  const own = deviations[lead.place]!;
  const others = deviations.filter((_, k) => k !== lead.place);
  return {
    tooShort: Math.max(own - limit, -limit - Math.min(...others)),
    tooLong: Math.max(-limit - own, Math.max(...others) - limit),
    opposes: own <= -1,
  };
}
