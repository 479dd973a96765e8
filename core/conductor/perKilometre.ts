/** Resistance of one conductor per unit of its own length: what the tables give before a length is known. */
import type { Basis } from '../tables/status.ts';

export interface PerKilometre {
  /** At 20 °C; a milliohm per metre is the same number. */
  readonly ohmPerKm: number;
  readonly basis: Basis;
  readonly working: readonly string[];
  readonly assumed: readonly string[];
}
