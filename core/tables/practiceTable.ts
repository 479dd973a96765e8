/** What a rule book asks for: the parameters that differ between practices, as data. Figures come with their basis. */
import type { Basis } from './status.ts';

export interface Figure {
  readonly value: number;
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
    | { readonly upToA: number | undefined; readonly maxFactor: number | undefined; readonly belowV: number | undefined; readonly fromV: number | undefined; readonly basis: Basis }
    | undefined;
  readonly standardRatings: string;
  /** Largest device on small copper wires, by AWG gauge. */
  readonly smallWireCaps: { readonly capsA: ReadonlyMap<number, number>; readonly basis: Basis } | undefined;
  /** Drop limits as fractions of nominal volts. */
  readonly dropCritical: Figure;
  readonly dropOrdinary: Figure;
  readonly continuousFactor: Figure;
}
