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

export interface DeviceTables {
  /** Standard ampere ratings by series, rising, e.g. `nec_240_6A_fuse_and_breaker`. */
  readonly ratings: ReadonlyMap<string, RatingSeries>;
  readonly typicalInterrupt: readonly TypicalInterrupt[];
  readonly breakerInterrupt: readonly BreakerInterruptRow[];
  /** Banks from this many cranking amperes or ampere-hours ask for the interrupt rating of `mainA`, at 125 V. */
  readonly largeBank: { readonly crankingA: Figure; readonly capacityAh: Figure; readonly mainA: Figure };
}
