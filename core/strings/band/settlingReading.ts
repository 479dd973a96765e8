/** The reading that would narrow an answer most. */
import type { PartId } from '../../job/part.ts';
import { formatQuantity } from '../../units/formatQuantity.ts';
import type { SettlingReading } from '../answer.ts';
import type { AssumedFigure } from './assumedFigures.ts';
import type { Drawn } from './bandDraws.ts';
import { percentiles } from './percentiles.ts';

/** A clamp on one string, a voltmeter at rest, two loads: standard uncertainty of each; common practice, no source. */
const CLAMP = { share: 0.02, plainA: 0.1 };
const REST_VOLTS_SHARE = 0.001;
const TWO_LOAD_SHARE = 0.1;

/** The reading that narrows the judged string's current most, by the linear regression on what was drawn. */
export function readingOf(
  drawn: Drawn,
  figures: readonly AssumedFigure[],
  { judged, at, caseId }: { readonly judged: PartId; readonly at: number; readonly caseId: string },
): SettlingReading | null {
  const wanted = drawn.currentsA[at]!;
  const { p05, p50, p95 } = percentiles(wanted, 0);
  const nowA = p95 - p05;
  const clampA = CLAMP.share * Math.abs(p50) + CLAMP.plainA;
  if (drawn.solved < 2 || !(nowA > clampA)) return null;
  const amps = (value: number) => formatQuantity({ value, unit: 'A', digits: 2 });
  const leaves = (row: Float64Array, standard: number) => nowA * Math.sqrt(1 - explained(wanted, row, standard));
  const current = leaves(wanted, clampA);
  let best: SettlingReading = {
    kind: 'string-current',
    part: judged,
    nowA,
    leavesA: current,
    text: `Clamp string ${judged} in the case ${caseId}: that narrows its current from ${amps(nowA)} between its 5th and 95th percentile to ${amps(current)}.`,
  };
  figures.forEach(({ reading, part, value, label }, f) => {
    if (reading === null) return;
    const standard = (reading === 'rest-volts' ? REST_VOLTS_SHARE : TWO_LOAD_SHARE) * Math.abs(value);
    const leavesA = leaves(drawn.figures[f]!, standard);
    if (leavesA >= best.leavesA) return;
    const how =
      reading === 'rest-volts'
        ? `Measure string ${part} at rest, alone, after a night`
        : `Measure string ${part} at two loads`;
    const text = `${how} (${label}): that narrows the current of ${judged} from ${amps(nowA)} between its 5th and 95th percentile to ${amps(leavesA)}.`;
    best = { kind: reading, part, nowA, leavesA, text };
  });
  return best;
}

/** Part of the variance of `wanted` that a reading of `row` with that standard uncertainty explains. */
function explained(wanted: Float64Array, row: Float64Array, standard: number): number {
  const n = wanted.length;
  const mean = (values: Float64Array) => values.reduce((sum, value) => sum + value, 0) / n;
  const [meanWanted, meanRow] = [mean(wanted), mean(row)];
  let [covariance, varianceWanted, varianceRow] = [0, 0, 0];
  for (let k = 0; k < n; k++) {
    const [w, r] = [wanted[k]! - meanWanted, row[k]! - meanRow];
    covariance += w * r;
    varianceWanted += w * w;
    varianceRow += r * r;
  }
  const total = varianceWanted * (varianceRow + n * standard * standard);
  return total === 0 ? 0 : Math.min(1, (covariance * covariance) / total);
}
