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
  /** The book asks for it below these nominal volts only; `undefined`: everywhere. */
  readonly belowV: number | undefined;
  readonly basis: Basis;
}

/** Factor on open-circuit volts for the coldest air, where a module's own coefficient is not known (crystalline silicon). */
export interface ColdVoltsFactor {
  /** The factor holds down to this temperature and above the next warmer row's. */
  readonly downToDegC: number;
  readonly factor: Figure;
}

/** What a book asks of array circuits. Factors are on the short-circuit current of the label. */
export interface SolarPractice {
  /** Bright days and cold modules: what a string gives at most. */
  readonly currentFactor: Figure;
  /** Ampacity of array cables before correction; `undefined`: the book has no such figure. */
  readonly cableFactor: Figure | undefined;
  /** Reverse current that a module stands without a fuse of its own, as a multiple of its largest fuse. */
  readonly moduleFuseFactor: Figure;
  /** Fuses are asked for from this many strings side by side; `undefined`: the reverse current alone decides. */
  readonly fuseFromStrings: Figure | undefined;
  /** A string fuse is rated at least and at most so many times; `undefined`: the module's largest fuse alone. */
  readonly fuseLowFactor: Figure;
  readonly fuseHighFactor: Figure | undefined;
  /** Falling temperatures. */
  readonly coldFactors: readonly ColdVoltsFactor[];
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
  /** From a charger, alternator, controller or converter to a device at its own end. */
  readonly chargingSource: UnfusedLength;
  /** Up to which nominal volts the cable of a starter motor alone may go unfused; `undefined`: the book names no such volts. */
  readonly crankingUnfusedUpToV: Figure | undefined;
  /** Most ring terminals on one stud. */
  readonly ringTerminals: Figure;
  /** Most volts lost from the battery to an AC outlet, as a fraction, the inverter between left out. */
  readonly dropWithAc: Figure;
  /** How far from its source a switch may stand; `undefined`: the book gives words, no distance. */
  readonly isolatorWithinM: Figure | undefined;
  /** Largest device over a generator as a multiple of its rated output; `undefined` where the book does not say. */
  readonly generatorFuseFactor: Figure | undefined;
  /** Smallest conductor laid on its own, and inside a sheath. */
  readonly smallestSingle: SmallestConductor | undefined;
  readonly smallestSheathed: SmallestConductor | undefined;
  /** Smallest conductor that may be paralleled with others of its pole. */
  readonly smallestParalleled: SmallestConductor | undefined;
  /** Clauses that give words rather than figures, by the id of the rule that rests on them. */
  readonly clauses: ReadonlyMap<string, Basis>;
  /** The book asks for stranded copper. */
  readonly strandedCopperOnly: Basis | undefined;
  /** Smallest bond, and (where the book says so) one no smaller than the lead of the battery whose pole it bonds. */
  readonly smallestBond: SmallestConductor | undefined;
  readonly bondAtLeastLead: Basis | undefined;
  readonly solar: SolarPractice;
}
