/** One assumed figure at a time, at its low and at its high. */
import type { PartId } from '../../job/part.ts';
import type { SolvedCircuit } from '../../network/operatingPoint.ts';
import { type Sensitivity, sensitivities } from '../../network/sensitivity.ts';
import type { Sweep } from '../../network/sweep.ts';
import type { TornadoBar } from '../answer.ts';
import type { AssumedFigure, Move } from './assumedFigures.ts';
import type { FigureChanges } from './figureChanges.ts';

interface Judged {
  readonly sweep: Sweep;
  readonly figureChanges: FigureChanges;
  readonly judged: PartId;
  /** Place among the watched strings. */
  readonly at: number;
}

/** Each figure at its low and at its high with the others at their values, widest bar first. */
export function tornadoOf(
  solved: SolvedCircuit,
  figures: readonly AssumedFigure[],
  { sweep, figureChanges, judged, at }: Judged,
): readonly TornadoBar[] {
  const slopes = sensitivities(solved, { kind: 'current', part: judged }) ?? [];
  const ends = new Float64Array(2 * figures.length);
  sweep.run({
    count: ends.length,
    draw: (index, changes) => {
      figureChanges.write(changes, (f) => (f === Math.floor(index / 2) ? index % 2 : 0.5));
    },
    take: (index, currents) => {
      ends[index] = currents?.[at] ?? Number.NaN;
    },
  });
  const nominalA = solved.point.parts.get(judged)?.currentA ?? 0;
  const known = (endA: number) => (Number.isNaN(endA) ? nominalA : endA);
  const bars = figures.map(({ label, part, quantity, origin, low, value, high, moves }, f) => ({
    part,
    label,
    quantity,
    origin,
    low,
    value,
    high,
    lowA: known(ends[2 * f]!),
    highA: known(ends[2 * f + 1]!),
    perUnit: moves.reduce((sum, move) => sum + slopeOf(slopes, move) * (move.toHigh - move.toLow), 0) / (high - low),
  }));
  const width = ({ lowA, highA }: TornadoBar) => Math.abs(highA - lowA);
  bars.sort((p, q) => width(q) - width(p));
  return bars;
}

/** d(answer)/d(quantity of the part), its pieces sharing the change as `shiftTargets` has it. */
function slopeOf(slopes: readonly Sensitivity[], { shift }: Move): number {
  const pieces = slopes.filter(({ part, quantity }) => part === shift.part && quantity === shift.quantity);
  const sum = pieces.reduce((total, { perUnit }) => total + perUnit, 0);
  const isBar = pieces.some(({ role }) => role.startsWith('segment'));
  return isBar || pieces.length === 0 ? sum : sum / pieces.length;
}
