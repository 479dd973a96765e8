/** What a rule book asks for: the parameters that differ between practices, as data. Figures come with their basis. */
import type { ConductorSize } from '../job/part.ts';
import type { Basis } from './status.ts';

export interface Figure {
  readonly value: number;
  readonly basis: Basis;
}

/** How far from a source a conductor may run without its own device, along the conductor, in metres. */
export interface UnfusedLength {
  /** `undefined`: the book gives words, not a figure. */
  readonly openM: Figure | undefined;
  /** Inside a sheath or enclosure throughout. */
  readonly sheathedM: Figure | undefined;
  /** The rule in words, printed where no figure stands. */
  readonly words: string;
}

export interface SmallestConductor {
  readonly size: ConductorSize;
  readonly basis: Basis;
}

export interface PracticeTable {
  readonly name: string;
  /** Which rule books, printed on the cover. */
  readonly books: string;
  /** Fuse over cable: largest rating as a multiple of ampacity, below and from 50 V. */
  readonly fuseOverCableBelow50V: Figure;
  readonly fuseOverCableFrom50V: Figure;
  /** May the next standard size above the ampacity be used, and up to which multiple of it (undefined: no multiple). */
  readonly nextSizeUp:
    | {
        readonly upToA: number | undefined;
        readonly maxFactor: number | undefined;
        readonly belowV: number | undefined;
        readonly fromV: number | undefined;
        readonly basis: Basis;
      }
    | undefined;
  /** Key of the series in `DeviceTables.ratings` that "standard size" means here. */
  readonly standardRatings: string;
  /** Largest device on small copper wires, by AWG gauge. */
  readonly smallWireCaps: { readonly capsA: ReadonlyMap<number, number>; readonly basis: Basis } | undefined;
  /** Largest device on small aluminium wires, by AWG gauge. */
  readonly smallAluminiumCaps: { readonly capsA: ReadonlyMap<number, number>; readonly basis: Basis } | undefined;
  /** Drop limits as fractions of nominal volts. */
  readonly dropCritical: Figure;
  readonly dropOrdinary: Figure;
  readonly continuousFactor: Figure;
  /** From a battery, and from any other source. */
  readonly unfusedFromBattery: UnfusedLength;
  readonly unfusedElsewhere: UnfusedLength;
  /** Smallest conductor laid on its own, and inside a sheath. */
  readonly smallestSingle: SmallestConductor | undefined;
  readonly smallestSheathed: SmallestConductor | undefined;
  /** Smallest conductor that may be paralleled with others of its pole. */
  readonly smallestParalleled: SmallestConductor | undefined;
  /** The book asks for stranded copper. */
  readonly strandedCopperOnly: Basis | undefined;
}
