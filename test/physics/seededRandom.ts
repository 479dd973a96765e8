/** A small seeded source of randomness: the same seed gives the same networks on every machine. */

export interface SeededRandom {
  /** Uniform in [0, 1). */
  readonly next: () => number;
  readonly between: (range: readonly [low: number, high: number]) => number;
  /** Uniform in the logarithm: as many values from 1 to 10 as from 10 to 100. */
  readonly logBetween: (range: readonly [low: number, high: number]) => number;
  /** Whole number, both ends included. */
  readonly whole: (range: readonly [low: number, high: number]) => number;
  readonly chance: (probability: number) => boolean;
  readonly pick: <T>(list: readonly T[]) => T;
  readonly shuffled: <T>(list: readonly T[]) => T[];
}

/** A counter stepped by a Weyl constant, mixed by multiplications and shifts: plenty for drawing networks. */
export function seededRandom(seed: number): SeededRandom {
  let state = (seed ^ 0x9e3779b9) >>> 0;
  const next = (): number => {
    state = (state + 0x6d2b79f5) >>> 0;
    let mixed = Math.imul(state ^ (state >>> 15), state | 1);
    mixed ^= mixed + Math.imul(mixed ^ (mixed >>> 7), mixed | 61);
    return ((mixed ^ (mixed >>> 14)) >>> 0) / 0x1_0000_0000;
  };
  const between = ([low, high]: readonly [number, number]): number => low + (high - low) * next();
  const whole = ([low, high]: readonly [number, number]): number => low + Math.floor((high - low + 1) * next());
  return {
    next,
    between,
    logBetween: ([low, high]) => Math.exp(between([Math.log(low), Math.log(high)])),
    whole,
    chance: (probability) => next() < probability,
    pick: <T>(list: readonly T[]): T => {
      if (list.length === 0) throw new Error('cannot pick from an empty list');
      return list[Math.floor(list.length * next())] as T;
    },
    shuffled: <T>(list: readonly T[]): T[] => {
      const copy = [...list];
      for (let last = copy.length - 1; last > 0; last--) {
        const other = Math.floor((last + 1) * next());
        [copy[last], copy[other]] = [copy[other]!, copy[last]!];
      }
      return copy;
    },
  };
}
