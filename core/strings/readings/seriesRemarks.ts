/** What is to be said about the volts along a string. */
import { stringSource } from '../../battery/stringSource.ts';
import type { CheckedJob } from '../../job/job.ts';
import { caseById, partsInCase } from '../../job/job.ts';
import type { StringPart } from '../../job/part.ts';
import type { OperatingPoint } from '../../network/answer.ts';
import { ambientOf } from '../../network/circuit.ts';
import type { Tables } from '../../tables/tables.ts';
import { fixedText } from '../../units/numberText.ts';
import type { SeriesImbalance } from '../answer.ts';
import { amps, listed } from '../words/sentence.ts';
import type { Chain, Stretch } from './chain.ts';
import type { ReadVolts } from './readVolts.ts';

/**
 * Spread between rested 12 V lead-acid blocks that is a warning: 0.30 V an hour after charge or load (0.15 V for 6 V blocks), a
 * published trade figure, host withheld. It is scaled by nominal volts; on charge and on load blocks differ more.
 */
const spreadPer12V = 0.3;
/** From this many blocks on a midpoint proves little. */
const blocksThatHide = 4;
/** A reading over that misses the others by more than two hand meters may (each 0.5 %) is worth a word. */
const disagree = 0.01;

export interface SeriesRemarksRequest {
  readonly imbalance: SeriesImbalance;
  /** Nominal volts of each block, in the order of `imbalance.blocks`. */
  readonly nominalV: readonly number[];
  readonly blocksInChain: number;
  /** As a fraction of the total. */
  readonly midpointWatch: number;
  readonly unread: readonly string[];
  readonly spare: ReadVolts['spare'];
}

export function seriesRemarks(request: SeriesRemarksRequest): readonly string[] {
  const { imbalance, unread } = request;
  return [
    ...midpointRemarks(imbalance),
    ...blockRemarks(request),
    ...(unread.length > 0
      ? [`Not read: ${listed(unread)}. The total and the mean are of what was read; read the volts of every block.`]
      : []),
    ...spareRemarks(request),
  ];
}

/** Two ways of counting are in print, a factor of two apart: the base is always said. */
function midpointRemarks({ midpoint, totalV }: SeriesImbalance): readonly string[] {
  if (midpoint === null) return [];
  const { differenceV, onTotal, onMeanHalf } = midpoint;
  if (Math.abs(differenceV) < 5e-4) return ['Both halves hold the same volts.'];
  const way = differenceV > 0 ? 'more' : 'less';
  return [
    `The upper half holds ${millivolts(differenceV)} ${way} than the lower: ${percent(onTotal)} of the total of ${volts(totalV)}, or ${percent(onMeanHalf)} of the mean half. Both bases are in use, so a percentage without its base can be out by a factor of two: go by the millivolts.`,
  ];
}

function blockRemarks({ imbalance, nominalV, blocksInChain, midpointWatch }: SeriesRemarksRequest): readonly string[] {
  const { blocks, midpoint } = imbalance;
  const remarks: string[] = [];
  const farOut = outliers(imbalance, nominalV);
  // Off centre by half of what the halves differ by, as the setting and the rule count it.
  const good = midpoint !== null && Math.abs(midpoint.onTotal) / 2 < midpointWatch;
  if (farOut.length > 0 && good && blocksInChain >= blocksThatHide) {
    remarks.push(
      `The midpoint looks right (${percent(midpoint.onTotal)} of the total) while ${listed(farOut)}: what is wrong in one half makes up for itself there. Take the reading of every block, not of the midpoint alone.`,
    );
  } else if (farOut.length > 0 && blocks.length > 2) {
    remarks.push(`Of the mean, ${listed(farOut)}.`);
  }
  if (farOut.length > 0) {
    remarks.push(
      'Taken as far apart: more than 0.30 V between 12 V blocks (0.15 V between 6 V blocks). That is a published trade figure for lead-acid blocks rested an hour; on charge or on load they differ more, so read them again at rest.',
    );
  }
  if (imbalance.from === 'readings' && blocksInChain >= blocksThatHide && blocks.length < blocksInChain) {
    remarks.push(
      `Only ${String(blocks.length)} stretches of a string of ${String(blocksInChain)} blocks were read. A good midpoint can hide bad blocks that make up for each other: read the volts of every block.`,
    );
  }
  return remarks;
}

/** Blocks further from the mean than half the spread that is a warning, where the spread is beyond it; furthest first. */
function outliers({ blocks }: SeriesImbalance, nominalV: readonly number[]): readonly string[] {
  const per12V = blocks.map(({ fromMeanV }, index) => (fromMeanV * 12) / nominalV[index]!);
  if (Math.max(...per12V) - Math.min(...per12V) <= spreadPer12V) return [];
  const far = blocks
    .map(({ name, fromMeanV }, index) => ({ name, fromMeanV, size: Math.abs(per12V[index]!) }))
    .filter(({ size }) => size > spreadPer12V / 2);
  far.sort((a, b) => b.size - a.size);
  return far.map(
    ({ name, fromMeanV }) => `${name} is ${millivolts(fromMeanV)} ${fromMeanV < 0 ? 'below' : 'above'} the mean`,
  );
}

function spareRemarks({ spare }: SeriesRemarksRequest): readonly string[] {
  return spare
    .filter(({ valueV, excessV }) => Math.abs(excessV) > disagree * Math.abs(valueV))
    .map(
      ({ reading, valueV, excessV }) =>
        `Reading ${reading.id} (${volts(valueV)}) is ${millivolts(excessV)} ${excessV > 0 ? 'more' : 'less'} than the other readings add up to over the same stretch: links or leads in between, readings of different moments, or a slip.`,
    );
}

export interface TapRequest {
  readonly chain: Chain;
  readonly point: OperatingPoint;
  readonly job: CheckedJob;
  readonly tables: Tables;
}

/** Less than this part of the larger current is rounding. */
const sameCurrent = 1e-6;

/** Where more flows in one stretch than in the next, something hangs between them. */
export function tapRemarks(request: TapRequest): readonly string[] {
  const { stretches } = request.chain;
  const currents = stretches.map((stretch) => stretchA(stretch, request));
  return stretches.slice(1).flatMap((upper, index) => {
    const [below, above] = [currents[index], currents[index + 1]];
    if (typeof below !== 'number' || typeof above !== 'number') return [];
    const tapA = below - above;
    if (Math.abs(tapA) <= Math.max(1e-6, sameCurrent * Math.max(Math.abs(below), Math.abs(above)))) return [];
    const lower = stretches[index]!.name;
    const way = tapA > 0 ? 'takes' : 'brings in';
    return [
      `${lower} gives ${signedAmps(below)} and ${upper.name} ${signedAmps(above)}: what is connected between them ${way} ${amps(tapA)} there, so the two are not used alike and drift apart in charge.`,
    ];
  });
}

/** Current of a stretch, discharge positive; of a lower half by its own law, as its string answers for the upper one. */
function stretchA({ string, plus, minus }: Stretch, { point, job, tables }: TapRequest): number | null {
  if (string.midpoint === undefined || plus === string.plus) return point.parts.get(string.id)?.currentA ?? null;
  const operatingCase = caseById(job, point.case);
  const [high, low] = [point.junctions.get(plus), point.junctions.get(minus)];
  if (operatingCase === undefined || typeof high !== 'number' || typeof low !== 'number') return null;
  const now = partsInCase(job, operatingCase).find(({ id }) => id === string.id) as StringPart;
  const context = { model: point.model, ambientDegC: ambientOf(job, operatingCase), tables: tables.chemistry };
  const { emfV, resistanceOhm } = stringSource(now, context);
  return (emfV.value / 2 - (high - low)) / ((resistanceOhm.value + string.linkOhm) / 2);
}

const signedAmps = (value: number): string => `${value < 0 ? '−' : ''}${amps(value)}`;
const volts = (value: number): string => `${fixedText({ value, decimals: 2, keepZeros: true })} V`;
const millivolts = (value: number): string => `${fixedText({ value: Math.abs(value) * 1000, decimals: 0 })} mV`;

/** `2.2 %`, `0.10 %`. */
function percent(fraction: number): string {
  const value = Math.abs(fraction) * 100;
  return `${fixedText({ value, decimals: value < 0.995 ? 2 : 1, keepZeros: true })} %`;
}
