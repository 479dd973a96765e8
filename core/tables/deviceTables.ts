/** Standard ratings of protective devices, and resistances of common devices. */
import type { Basis } from './status.ts';

export interface DeviceTables {
  /** Standard ampere ratings by series, rising, e.g. `nec_240_6A_fuse_and_breaker`. */
  readonly ratings: ReadonlyMap<string, { readonly ratingsA: readonly number[]; readonly basis: Basis }>;
}
