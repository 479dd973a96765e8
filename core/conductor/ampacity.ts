/** The current that a conductor may carry all day, by the practice in force, with every factor listed. */

import type { ConductorSize } from '../job/part.ts';
import { Memory } from '../tables/memory.ts';
import type { Basis, Status } from '../tables/status.ts';
import { weakest } from '../tables/status.ts';
import { boatRating } from './boatRating.ts';
import { iecRating } from './iecRating.ts';
import type { AmpacityContext, AmpacityFactor, RatedConductor, Rating } from './rating.ts';
import type { Missing } from './size.ts';
import { usLandRating } from './usLandRating.ts';

export interface Ampacity {
  /** One conductor, as the table prints it. */
  readonly baseA: number;
  /** In the order applied; `finalA` is `baseA` times all of them times the conductors in parallel. */
  readonly factors: readonly AmpacityFactor[];
  /** All parallel conductors together; 0 where the book allows none (a factor of 0 says why). */
  readonly finalA: number;
  readonly ratedDegC: number;
  readonly tableAmbientDegC: number;
  readonly basis: Basis;
  /** The weakest of all figures that went in. */
  readonly status: Status;
  readonly assumed: readonly string[];
  /** To be said beside the figure: what else the trade would apply, which tables are not held. */
  readonly remarks: readonly string[];
}

/**
 * Ampacity of a conductor. US land: building code table 310.16 by insulation column, ambient, bundling, terminals. US boats:
 * 33 CFR 183.425 table 5. Small craft: ISO 13297 (ISO 10133). Land elsewhere: IEC 60364-5-52. A size foreign to the book is
 * rated as the next smaller area in it. Missing where the book has no row, column or method. Range: ambient from −40 °C; factors
 * below the first row of a factor table are its first row's.
 */
export function ampacity(cable: RatedConductor, context: AmpacityContext): Ampacity | Missing {
  return foundAmpacity.of(context.tables, cable, detailOf(context), () => findAmpacity(cable, context));
}

const foundAmpacity = new Memory<RatedConductor, Ampacity | Missing>();

/** Everything but the cable and the tables that a rating depends on. */
function detailOf({ practice, ambientDegC, systemV, terminalDegC }: AmpacityContext): string {
  return `${practice} ${ambientDegC} ${systemV} ${terminalDegC}`;
}

function findAmpacity(cable: RatedConductor, context: AmpacityContext): Ampacity | Missing {
  const rating = ratingOf(cable, context);
  if ('missing' in rating) return rating;
  const { base, factors } = rating;
  const product = factors.reduce((soFar, factor) => soFar * factor.factor, 1);
  return {
    baseA: base.value,
    factors,
    finalA: base.value * product * cable.inParallel,
    ratedDegC: rating.ratedDegC,
    tableAmbientDegC: rating.tableAmbientDegC,
    basis: base.basis,
    status: weakest(base.basis.status, ...factors.map((factor) => factor.basis.status)),
    assumed: [...(cable.metal === undefined ? ['metal copper'] : []), ...rating.assumed],
    remarks: rating.remarks,
  };
}

/** The practice's rating of one conductor, before it is multiplied out. */
export function ratingOf(cable: RatedConductor, context: AmpacityContext): Rating | Missing {
  return foundRating.of(context.tables, cable, detailOf(context), () => findRating(cable, context));
}

const foundRating = new Memory<RatedConductor, Rating | Missing>();

function findRating(cable: RatedConductor, context: AmpacityContext): Rating | Missing {
  const { size } = cable;
  if (size === undefined) return { missing: 'size of the conductor' };
  const sized: RatedConductor & { readonly size: ConductorSize } = { ...cable, size };
  switch (context.practice) {
    case 'us-land':
      return usLandRating(sized, context);
    case 'us-marine':
      return boatRating(sized, context, context.tables.usMarine);
    case 'iso-marine':
      return boatRating(sized, context, context.tables.isoMarine);
    case 'iec-land':
      return iecRating(sized, context);
  }
}
