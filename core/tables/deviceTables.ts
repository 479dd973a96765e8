/** Standard ratings of protective devices, and what common types can interrupt. */
import type { Figure } from './practiceTable.ts';
import type { Basis } from './status.ts';

export interface RatingSeries {
  /** Rising. */
  readonly ratingsA: readonly number[];
  /** The basis of the series as a whole: its weakest rating decides the status. */
  readonly basis: Basis;
  /** Ratings of the series that are remembered only; empty where the whole series was seen. */
  readonly fromMemoryA: readonly number[];
}

/** Typical interrupt rating of a generic type of device at direct current: a default for a warning, never a device's own figure. */
export interface TypicalInterrupt {
  readonly type: string;
  readonly upToV: Figure;
  readonly interruptA: Figure;
  readonly note: string;
}

/** Least interrupting capacity of boat circuit-breakers by the cranking amperes of the connected batteries. */
export interface BreakerInterruptRow {
  readonly fromV: number;
  readonly toV: number;
  readonly fromCrankingA: number;
  /** Inclusive; `undefined` is "and above". */
  readonly toCrankingA: number | undefined;
  /** First device in series with the battery. */
  readonly mainA: Figure;
  /** Every device after it. */
  readonly branchA: Figure;
}

/**
 * One row of the generic band of a type of fuse: at a current, the time that it surely holds and the time by which it surely has
 * opened. A test point or gate of a standard gives one of the two only.
 */
export interface BandRow {
  readonly type: string;
  /** Ratings for which the row holds, both inclusive. */
  readonly fromA: number;
  readonly toA: number;
  /** Whether `at` counts multiples of the rating or amperes. */
  readonly per: 'rating' | 'amperes';
  readonly at: number;
  /** `undefined`: the row says nothing of holding. */
  readonly holdsS: number | undefined;
  /** `undefined`: it may never open at this current, or the row says nothing of opening. */
  readonly opensS: number | undefined;
  readonly basis: Basis;
  readonly note: string;
}

/** How many pulses a fuse outlasts, each of at most so large a share of what melts it. */
export interface PulseShare {
  readonly pulses: number;
  readonly share: Figure;
}

/** Ratio of the ratings of two devices in series from which the nearer one is taken to open alone. */
export interface SelectivityRatios {
  /** Both gG: what the standard asks, and the step of the rating series that is taken for it. */
  readonly sameGg: Figure;
  readonly sameGgStep: Figure;
  readonly others: Figure;
}

export interface DeviceTables {
  /** Standard ampere ratings by series, rising, e.g. `nec_240_6A_fuse_and_breaker`. */
  readonly ratings: ReadonlyMap<string, RatingSeries>;
  readonly typicalInterrupt: readonly TypicalInterrupt[];
  readonly breakerInterrupt: readonly BreakerInterruptRow[];
  /** Generic bands of fuses by type in lower case. Of breakers nothing is held: their curves come from the maker. */
  readonly bands: ReadonlyMap<string, readonly BandRow[]>;
  /** Rising numbers of pulses. */
  readonly pulses: readonly PulseShare[];
  readonly selectivity: SelectivityRatios;
  /**
   * A bank of more than so many cranking amperes or ampere-hours asks of its main device the battery maker's short-circuit
   * current; where that is above `fromShortA`, `mainA` at `mainV` will do.
   */
  readonly largeBank: {
    readonly crankingA: Figure;
    readonly capacityAh: Figure;
    readonly mainA: Figure;
    readonly fromShortA: Figure;
    readonly mainV: Figure;
  };
}
