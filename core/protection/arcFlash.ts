/** An estimate of the heat of an arc, for a caution: it names no clothing and judges nothing. */
import type { Basis } from '../tables/status.ts';

/** What the estimate rests on, and the usual threshold of a second-degree burn, cal/cm². */
export const ARC_BASIS: Basis = {
  source: 'SRC-ARC-ENERGY',
  text: 'NFPA 70E annex D, largest power of a direct-current arc',
  status: 'from-memory',
};
export const BURN_CAL_PER_CM2 = 1.2;

/** Taken where the clearing time is not known. */
export const ARC_TIME_S = 2;

/**
 * Incident energy of an arc that takes the largest power that the source gives, cal/cm²: E = 0.01 V I t/D², I half the short-circuit
 * current, D in centimetres. From memory. Range: an open arc; a box throws more heat to the front.
 */
export function arcEnergy({
  systemV,
  shortA,
  timeS = ARC_TIME_S,
  distanceCm,
}: {
  readonly systemV: number;
  readonly shortA: number;
  readonly timeS?: number;
  readonly distanceCm: number;
}): number {
  return (0.01 * systemV * (shortA / 2) * timeS) / distanceCm ** 2;
}
