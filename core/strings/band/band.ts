/** What the ranges of assumed figures make of the sharing: draws, what matters most, whether the verdict holds, what would settle it. */

import { partsInCase } from '../../job/job.ts';
import type { PartId } from '../../job/part.ts';
import { solveCircuit } from '../../network/operatingPoint.ts';
import { Sweep } from '../../network/sweep.ts';
import { withoutPairs } from '../../network/wiring.ts';
import { formatQuantity } from '../../units/formatQuantity.ts';
import type { BandedString, BandStudy } from '../answer.ts';
import { banksOf } from '../banks.ts';
import { assumedFigures, type FiguresRequest } from './assumedFigures.ts';
import { type Drawn, drawAll } from './bandDraws.ts';
import { Deviations, judgedString } from './deviations.ts';
import { FigureChanges } from './figureChanges.ts';
import { percentiles } from './percentiles.ts';
import { readingOf } from './settlingReading.ts';
import { tornadoOf } from './tornado.ts';

export interface BandRequest extends FiguresRequest {
  /** At least 1. */
  readonly draws: number;
  /** A whole number; the same seed gives the same answer on every host. */
  readonly seed: number;
  readonly progress?: (done: number, of: number) => void;
}

/** A verdict that nineteen draws in twenty bear out holds. */
const NEARLY_ALL = 0.95;
/**
 * Draws every figure of `assumedFigures` on its own, half of the time evenly between its low and its value and half of the time evenly
 * between its value and its high, so that its value is its median; solves the case for each draw; and tells 5th, 50th and 95th
 * percentile of each string's current and deviation. Null where the case has no operating point or no string.
 */
export function bandOf(request: BandRequest): BandStudy | null {
  const { job, tables, operatingCase, model } = request;
  const solved = solveCircuit({ job, operatingCase, tables, model });
  const banks = banksOf(withoutPairs(partsInCase(job, operatingCase)));
  const ids = banks.flatMap(({ strings }) => strings.map(({ id }) => id));
  if (solved.point.outcome !== 'solved' || ids.length === 0) return null;
  const figures = assumedFigures(request);
  const figureChanges = new FigureChanges(figures);
  const sweep = new Sweep({ solved, tables, shifts: figureChanges.shifts, watched: ids });
  const nominal = ids.map((id) => solved.point.parts.get(id)?.currentA ?? 0);
  const sharing = new Deviations(banks, ids);
  const judged = judgedString(sharing, nominal, ids);
  const at = ids.indexOf(judged);
  const { draws, seed, progress } = request;
  const limit = job.settings.shareLimit;
  const drawn = drawAll({ draws, seed, limit, figures, figureChanges, sweep, sharing, strings: ids.length, progress });
  const allGiven = figures.every(({ quantity, origin, part }) => {
    const isOfString = quantity === 'emfV' || ids.includes(part);
    return !isOfString || origin === 'measured' || origin === 'label';
  });
  const verdict = verdictOf(request, { worst: sharing.worst(nominal), drawn, allGiven });
  return {
    case: operatingCase.id,
    model,
    draws,
    unsolved: drawn.unsolved,
    seed,
    strings: ids.map((id, k) => banded(id, nominal[k]!, drawn, k)),
    judged,
    verdict,
    tornado: tornadoOf(solved, figures, { sweep, figureChanges, judged, at }),
    reading: readingOf(drawn, figures, { judged, at, caseId: operatingCase.id }),
    allGiven,
  };
}

function banded(id: PartId, nominalA: number, drawn: Drawn, place: number): BandedString {
  const deviations = drawn.deviations[place]!.filter((deviation) => !Number.isNaN(deviation));
  return {
    id,
    nominalA,
    currentA: percentiles(drawn.currentsA[place]!, nominalA),
    deviation: deviations.length === 0 ? null : percentiles(deviations, 0),
  };
}

function verdictOf(
  { job, draws }: BandRequest,
  { worst, drawn, allGiven }: { readonly worst: number; readonly drawn: Drawn; readonly allGiven: boolean },
): BandStudy['verdict'] {
  const limit = job.settings.shareLimit;
  const percent = (value: number) => formatQuantity({ value, unit: '1', digits: 2 });
  if (Number.isNaN(worst)) {
    const text = 'No bank gives or takes enough in this case for its sharing to be judged.';
    return { limit, nominalWithin: true, within: 1, holds: true, text };
  }
  const nominalWithin = worst <= limit;
  const within = drawn.within / draws;
  const bearOut = nominalWithin ? within : 1 - within;
  const says = nominalWithin
    ? `every string is within ${percent(limit)} of its fair share`
    : `a string is more than ${percent(limit)} off its fair share`;
  const holds = bearOut >= NEARLY_ALL;
  const text = holds
    ? `The verdict holds over the ranges of the figures: ${says} in ${percent(bearOut)} of the draws.`
    : `The verdict hangs on ${allGiven ? 'how well the figures are known' : 'assumed figures'}: as they stand ${says}; over their ranges that is so in ${percent(bearOut)} of the draws.`;
  return { limit, nominalWithin, within, holds, text };
}
