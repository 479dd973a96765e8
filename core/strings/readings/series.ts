/** Volts along strings of blocks: how evenly the blocks of one string hold, from readings and from solves. */
import type { CheckedJob, Reading } from '../../job/job.ts';
import { caseById, partsInCase } from '../../job/job.ts';
import type { JunctionId } from '../../job/part.ts';
import type { OperatingPoint } from '../../network/answer.ts';
import { withoutPairs } from '../../network/wiring.ts';
import type { Tables } from '../../tables/tables.ts';
import type { SeriesBlock, SeriesImbalance } from '../answer.ts';
import { type Chain, chainsOf, type Stretch } from './chain.ts';
import { readVolts, type VoltReading } from './readVolts.ts';
import { seriesRemarks, tapRemarks } from './seriesRemarks.ts';

export interface SeriesRequest {
  readonly job: CheckedJob;
  readonly tables: Tables;
  readonly points: readonly OperatingPoint[];
}

/** Solved volts of equal blocks nearer than this are one figure: no meter on a string's terminals tells them apart. */
const apartV = 0.001;

/**
 * Of each chain of strings: total, each block, each block's distance from the mean, and the midpoint.
 *
 *   difference = upper half - lower half,  on total = difference / total,  on mean half = 2 difference / total
 *
 * First from readings, by case and `set`, wherever two stretches of a chain were read; then from those solves in which blocks
 * really differ (a tap, an equaliser, unlike blocks). Blocks of unlike nominal volts are compared in proportion to those.
 */
export function seriesOf({ job, tables, points }: SeriesRequest): readonly SeriesImbalance[] {
  const limit = job.settings.midpointWatch;
  const read = groupsOf(job.readings).flatMap(({ caseId, set, readings }) =>
    chainsOf(partsAt(job, caseId)).flatMap((chain) =>
      fromReadings(chain, readings, limit).map((one) => ({
        ...one,
        case: caseId ?? null,
        ...(set === undefined ? {} : { set }),
      })),
    ),
  );
  const solved = points
    .filter(({ outcome }) => outcome === 'solved')
    .flatMap((point) => chainsOf(partsAt(job, point.case)).flatMap((chain) => fromPoint(chain, point, job, tables)));
  return [...read, ...solved];
}

function partsAt(job: CheckedJob, caseId: string | undefined) {
  const operatingCase = caseId === undefined ? undefined : caseById(job, caseId);
  return withoutPairs(operatingCase === undefined ? job.parts : partsInCase(job, operatingCase));
}

interface ReadingGroup {
  readonly caseId: string | undefined;
  readonly set: Reading['set'];
  readonly readings: VoltReading[];
}

function groupsOf(readings: readonly Reading[]): readonly ReadingGroup[] {
  const groups = new Map<string, ReadingGroup>();
  for (const reading of readings) {
    if (reading.quantity !== 'voltage') continue;
    const key = JSON.stringify([reading.case, reading.set]);
    const group = groups.get(key);
    if (group === undefined) groups.set(key, { caseId: reading.case, set: reading.set, readings: [reading] });
    else group.readings.push(reading);
  }
  return [...groups.values()];
}

/** A stretch with its volts; of several stretches together where nothing between them was read. */
interface Held {
  readonly name: string;
  readonly nominalV: number;
  readonly voltageV: number;
}

function fromReadings(
  chain: Chain,
  readings: readonly VoltReading[],
  midpointWatch: number,
): readonly SeriesImbalance[] {
  const { group, volts, spare } = readVolts(chain, readings);
  const held: Held[] = [];
  const unread: string[] = [];
  const middle = middleOf(chain.stretches);
  let midV: number | null = null;
  const ends = group[0] === group.at(-1);
  if (ends && middle !== null && group[middle] === group[0]) midV = volts[middle]! - volts[0]!;
  for (let low = 0; low < chain.stretches.length; ) {
    const high = group.indexOf(group[low]!, low + 1);
    if (high < 0) {
      unread.push(chain.stretches[low]!.name);
      low++;
      continue;
    }
    const between = chain.stretches.slice(low, high);
    const nominalV = between.reduce((sum, one) => sum + one.nominalV, 0);
    held.push({ name: nameOfStretches(between), nominalV, voltageV: volts[high]! - volts[low]! });
    low = high;
  }
  if (held.length < 2) return [];
  const imbalance = imbalanceOf(chain, held, midV, 'readings');
  const blocksInChain = chain.strings.reduce((sum, { blocksInSeries }) => sum + blocksInSeries, 0);
  const remarks = seriesRemarks({
    imbalance,
    nominalV: held.map((one) => one.nominalV),
    blocksInChain,
    midpointWatch,
    unread,
    spare,
  });
  return [{ ...imbalance, remarks }];
}

/** `A`, `A lower half`, `A + B`; both halves of a string are the string. */
function nameOfStretches(stretches: readonly Stretch[]): string {
  const names: string[] = [];
  for (const [index, { name, string }] of stretches.entries()) {
    const whole = string.midpoint !== undefined && stretches[index + 1]?.string === string;
    const done = string.midpoint !== undefined && stretches[index - 1]?.string === string;
    if (!done) names.push(whole ? string.id : name);
  }
  return names.join(' + ');
}

/** The point with as many nominal volts below as above; null where there is none. */
function middleOf(stretches: readonly Stretch[]): number | null {
  const half = stretches.reduce((sum, { nominalV }) => sum + nominalV, 0) / 2;
  let below = 0;
  for (const [index, { nominalV }] of stretches.entries()) {
    if (Math.abs(below - half) < 1e-9 * half) return index;
    below += nominalV;
  }
  return null;
}

function imbalanceOf(
  chain: Chain,
  held: readonly Held[],
  lowerV: number | null,
  from: SeriesImbalance['from'],
): SeriesImbalance {
  const totalV = held.reduce((sum, { voltageV }) => sum + voltageV, 0);
  const nominalV = held.reduce((sum, one) => sum + one.nominalV, 0);
  const blocks = held.map((one): SeriesBlock => {
    const meanV = (totalV * one.nominalV) / nominalV;
    const fromMeanV = one.voltageV - meanV;
    return { name: one.name, voltageV: one.voltageV, fromMeanV, fromMean: meanV === 0 ? 0 : fromMeanV / meanV };
  });
  const strings = chain.strings.map(({ id }) => id);
  const midpoint = lowerV === null || totalV === 0 ? null : midpointOf(lowerV, totalV);
  return { strings, case: null, from, totalV, blocks, midpoint, remarks: [] };
}

function midpointOf(lowerV: number, totalV: number): NonNullable<SeriesImbalance['midpoint']> {
  const upperV = totalV - lowerV;
  const differenceV = upperV - lowerV;
  return { lowerV, upperV, differenceV, onTotal: differenceV / totalV, onMeanHalf: (2 * differenceV) / totalV };
}

function fromPoint(chain: Chain, point: OperatingPoint, job: CheckedJob, tables: Tables): readonly SeriesImbalance[] {
  if (chain.stretches.length < 2) return [];
  const held: Held[] = [];
  for (const { name, nominalV, minus, plus } of chain.stretches) {
    const voltageV = across(point, plus, minus);
    if (voltageV === null) return [];
    held.push({ name, nominalV, voltageV });
  }
  const middle = middleOf(chain.stretches);
  const lowerV = middle === null ? null : held.slice(0, middle).reduce((sum, { voltageV }) => sum + voltageV, 0);
  const imbalance = imbalanceOf(chain, held, lowerV, 'solved');
  if (imbalance.blocks.every(({ fromMeanV }) => Math.abs(fromMeanV) < apartV)) return [];
  const blocksInChain = chain.strings.reduce((sum, { blocksInSeries }) => sum + blocksInSeries, 0);
  const { midpointWatch } = job.settings;
  const nominalV = held.map((one) => one.nominalV);
  const remarks = [
    ...tapRemarks({ chain, point, job, tables }),
    ...seriesRemarks({ imbalance, nominalV, blocksInChain, midpointWatch, unread: [], spare: [] }),
  ];
  return [{ ...imbalance, case: point.case, remarks }];
}

function across({ junctions }: OperatingPoint, plus: JunctionId, minus: JunctionId): number | null {
  const [high, low] = [junctions.get(plus), junctions.get(minus)];
  return typeof high === 'number' && typeof low === 'number' ? high - low : null;
}
