/** What is asked of a small system, and the usual figures that stand in for what is not. */
import type { Practice } from '../job/job.ts';
import type { Chemistry } from '../job/part.ts';

/** What a person can say on the first evening. */
export interface SmallJob {
  readonly title: string;
  readonly practice: Practice;
  readonly systemV: 12 | 24 | 48;
  readonly chemistry: Chemistry;
  /** Nominal volts of one block. As many stand in series as make the system's volts. */
  readonly blockNominalV: number;
  /** Strings of blocks side by side. */
  readonly blocksInParallel: number;
  /** Of one block. */
  readonly capacityAh: number;
  readonly loadW: number;
  /** `ac`: the load is fed through an inverter. */
  readonly supply: 'dc' | 'ac';
  /** One way along the cable, from the bank to the main switch. */
  readonly bankToMainM: number;
  /** One way along the cable, from the main switch to the load or inverter. */
  readonly mainToLoadM: number;
}

/** Efficiency of an inverter of small systems, taken where none is known. Common practice, no source. */
export const usualInverterEfficiency = 0.9;
/** Usual ratings of inverters, W. Common practice, no source. */
const inverterRatingsW = [300, 500, 800, 1000, 1500, 2000, 3000, 4000, 5000, 8000, 10_000];
/** A new inverter is taken larger than its load by this. Common practice, no source. */
const inverterMargin = 1.25;
/** Least volts of a load or an inverter as a fraction of nominal: 10.5 V of 12 V. Common practice, no source. */
export const leastVoltsFraction = 0.875;

/** Rated watts of the inverter: the next usual rating above the load with its margin. */
export function inverterRatedW(loadW: number): number {
  const wanted = loadW * inverterMargin;
  return inverterRatingsW.find((rated) => rated >= wanted) ?? wanted;
}

/** The most that the load or the inverter at its full rating draws, at its least volts. */
export function designCurrentA({ loadW, supply, systemV }: SmallJob): number {
  const drawnW = supply === 'ac' ? inverterRatedW(loadW) / usualInverterEfficiency : loadW;
  return drawnW / (leastVoltsFraction * systemV);
}
