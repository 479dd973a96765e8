/** How far a reading may be off, and how errors of several readings meet in one figure. */
import type { Reading } from '../../job/job.ts';
import type { PartId } from '../../job/part.ts';

export interface MeterError {
  /** Standard uncertainty of this reading alone, in its own unit. */
  readonly own: number;
  /** Error of scale that all readings of one meter share, as a fraction; null where a reading states its own uncertainty. */
  readonly gain: { readonly meter: string; readonly relative: number } | null;
}

/** A reading as it enters a sum: value, error, and what the sum gains per unit of it. */
export interface Term {
  readonly value: number;
  readonly error: MeterError;
  readonly slope: number;
}

/**
 * Limits of error where a reading states none: of the scale, and of a count or two of the display.
 *  - hand meter, volts: 0.5 % + one count of its range, 10 mV from 6 V up (published form for 3½ digits; counts from memory), but
 *    no less than the 0.5 mV by which a millivolt range wanders;
 *  - clamp on direct current: 2 % + 5 counts of 0.1 A (published form);
 *  - shunt monitor: 0.5 % + 0.1 A (from memory).
 */
const limits = {
  /** Its own part goes by range, see `countV`. */
  voltage: { gain: 0.005, own: 0 },
  clamp: { gain: 0.02, own: 0.5 },
  shunt: { gain: 0.005, own: 0.1 },
};
/** A limit with nothing else known is a rectangle: standard uncertainty a / sqrt 3 (JCGM 100, 4.3.7). */
const ofLimit = 1 / Math.sqrt(3);

/** Readings of one quantity without a named meter are taken to be of one meter. */
export function meterError(reading: Reading, shunts: ReadonlySet<PartId>): MeterError {
  if (reading.standardUncertainty !== undefined) return { own: reading.standardUncertainty, gain: null };
  const kind = kindOf(reading, shunts);
  const limit = limits[kind];
  return {
    own: (reading.quantity === 'voltage' ? countV(reading.valueV) : limit.own) * ofLimit,
    gain: { meter: `${kind} ${reading.meter ?? ''}`, relative: limit.gain * ofLimit },
  };
}

function countV(valueV: number): number {
  const size = Math.abs(valueV);
  if (size < 0.6) return 0.0005;
  if (size < 6) return 0.001;
  return size < 60 ? 0.01 : 0.1;
}

function kindOf(reading: Reading, shunts: ReadonlySet<PartId>): keyof typeof limits {
  if (reading.quantity !== 'current') return 'voltage';
  return reading.meter === undefined && shunts.has(reading.part) ? 'shunt' : 'clamp';
}

/**
 * Standard uncertainty of a sum, to first order (JCGM 100, 5.2): u² = Σ (slope own)² + Σ over meters (Σ slope value gain)².
 * What one meter's scale does to all its readings is added with its sign, so that it drops out of a difference of equals.
 */
export function standardOf(terms: readonly Term[]): number {
  let square = 0;
  const byMeter = new Map<string, number>();
  for (const { value, error, slope } of terms) {
    square += (slope * error.own) ** 2;
    if (error.gain === null) continue;
    const { meter, relative } = error.gain;
    byMeter.set(meter, (byMeter.get(meter) ?? 0) + slope * value * relative);
  }
  for (const shared of byMeter.values()) square += shared ** 2;
  return Math.sqrt(square);
}
