/** The most that a device lets through over a range of fault currents. */
import type { DeviceBand } from './answer.ts';
import { clearingOf } from './clearing.ts';

export interface LetThrough {
  /** A²s. */
  readonly i2t: number;
  /** The current of the range at which it is. */
  readonly currentA: number;
  readonly beyond: boolean;
}

/**
 * Of all currents from `lowA` to `highA` (A) that the device opens within `withinS`, the one with the largest I²t. Between the points of
 * a band ln(I²t) runs straight over ln I, so that the ends of the range, the points within it and the least current that opens in time
 * are all there is to ask. Null where no current of the range opens it in time.
 */
export function worstLetThrough(
  band: DeviceBand,
  { lowA, highA }: { readonly lowA: number; readonly highA: number },
  withinS: number,
): LetThrough | null {
  const inside = band.points.map(({ currentA }) => currentA).filter((currentA) => currentA > lowA && currentA < highA);
  const slowest = leastInTime(band, { lowA, highA }, withinS);
  let worst: LetThrough | null = null;
  for (const currentA of [lowA, ...(slowest === null ? [] : [slowest]), ...inside, highA]) {
    const { clearS, letThroughI2t, beyond } = clearingOf({ band, currentA });
    if (clearS === null || letThroughI2t === null || clearS > withinS) continue;
    if (worst === null || letThroughI2t > worst.i2t) worst = { i2t: letThroughI2t, currentA, beyond };
  }
  return worst;
}

/** The least current of a range that surely opens within a time: more current never opens later. */
function leastInTime(
  band: DeviceBand,
  { lowA, highA }: { readonly lowA: number; readonly highA: number },
  withinS: number,
): number | null {
  const opens = (currentA: number) => {
    const { clearS } = clearingOf({ band, currentA });
    return clearS !== null && clearS <= withinS;
  };
  if (opens(lowA) || !opens(highA)) return null;
  let [low, high] = [lowA, highA];
  for (let step = 0; step < 50; step++) {
    const middle = Math.sqrt(low * high);
    if (opens(middle)) high = middle;
    else low = middle;
  }
  return high;
}
