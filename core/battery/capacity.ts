/** How much of its capacity a battery gives: by rate (two-well model, Peukert) and by temperature. */
import type { Chemistry } from '../job/part.ts';
import type { ChemistryTables } from '../tables/chemistryTables.ts';
import type { Basis } from '../tables/status.ts';
import { weakest } from '../tables/status.ts';
import { along, placeIn } from './curve.ts';

/**
 * Two-well (kinetic) battery model, SRC-BAT-KIBAM. `ratePerH` is Manwell's k' (per hour); another convention in use has
 * k = k' c (1 - c): convert with `ratePerHFromReduced`. For capacity and recovery, never for volts.
 */
export interface TwoWells {
  readonly ratePerH: number;
  /** c: part of the charge in the available well, 0 to 1. */
  readonly availableShare: number;
  readonly capacityAh: number;
}

/** Ampere-hours in each well. */
export interface WellCharge {
  readonly availableAh: number;
  readonly boundAh: number;
}

/** k' = k / [c (1 - c)], in the unit of k. */
export function ratePerHFromReduced(reducedPerH: number, availableShare: number): number {
  return reducedPerH / (availableShare * (1 - availableShare));
}

/** Both wells of a full battery. */
export function fullWells({ availableShare, capacityAh }: TwoWells): WellCharge {
  return { availableAh: availableShare * capacityAh, boundAh: (1 - availableShare) * capacityAh };
}

/**
 * Wells after `hours` at a steady current (discharge positive), with r = exp(-k' t):
 *
 *   q1' = q1 r + (q0 k' c - I)(1 - r)/k' - I c (k' t - 1 + r)/k'
 *   q2' = q2 r + q0 (1 - c)(1 - r) - I (1 - c)(k' t - 1 + r)/k'
 *
 * A negative available well means that the current could not be held so long: see `largestDischarge`.
 */
export function advanceWells(
  wells: TwoWells,
  { availableAh, boundAh }: WellCharge,
  { currentA, hours }: { currentA: number; hours: number },
): WellCharge {
  const { ratePerH: k, availableShare: c } = wells;
  const total = availableAh + boundAh;
  const gone = -Math.expm1(-k * hours);
  const kept = 1 - gone;
  const spread = k * hours - gone;
  return {
    availableAh: availableAh * kept + ((total * k * c - currentA) * gone) / k - (currentA * c * spread) / k,
    boundAh: boundAh * kept + total * (1 - c) * gone - (currentA * (1 - c) * spread) / k,
  };
}

/** Largest steady discharge current that the wells can hold for `hours` (> 0), amperes. */
export function largestDischarge(wells: TwoWells, { availableAh, boundAh }: WellCharge, hours: number): number {
  const { ratePerH: k, availableShare: c } = wells;
  const gone = -Math.expm1(-k * hours);
  const total = availableAh + boundAh;
  return (k * availableAh * (1 - gone) + total * k * c * gone) / (gone + c * (k * hours - gone));
}

/** Ampere-hours from full when discharged steadily in `hours`: q_max k' c T / [1 - r + c (k' T - 1 + r)]. */
export function capacityAtRate(wells: TwoWells, hours: number): number {
  return largestDischarge(wells, fullWells(wells), hours) * hours;
}

/** A printed capacity: ampere-hours when emptied steadily in `hours`. */
export interface RatedCapacity {
  readonly hours: number;
  readonly capacityAh: number;
}

export interface PeukertExponent {
  readonly exponent: number;
  /** The exponent holds between these two currents only. */
  readonly fromA: number;
  readonly toA: number;
}

/**
 * Peukert exponent between two printed capacities: n = ln(t1/t2) / ln(I2/I1), with I = C/t. It holds between the two
 * rates only, and says nothing about charge left after a rest. Source: SRC-BAT-PEUKERT.
 */
export function peukertExponent(slow: RatedCapacity, quick: RatedCapacity): PeukertExponent {
  const fromA = slow.capacityAh / slow.hours;
  const toA = quick.capacityAh / quick.hours;
  return { exponent: Math.log(slow.hours / quick.hours) / Math.log(toA / fromA), fromA, toA };
}

/** Hours to empty at `currentA` (> 0): t = H (C/(I H))^n. */
export function peukertHours(rated: RatedCapacity, exponent: number, currentA: number): number {
  return rated.hours * (rated.capacityAh / (currentA * rated.hours)) ** exponent;
}

export interface CapacityFraction {
  readonly fraction: number;
  readonly basis: Basis;
}

/** Capacity at a cell temperature as a fraction of that at 25 degC; the ends of the chemistry's table are not passed. */
export function capacityAtTemperature(
  { chemistry, temperatureDegC }: { chemistry: Chemistry; temperatureDegC: number },
  tables: ChemistryTables,
): CapacityFraction {
  const place = placeIn(tables.capacityByTemperature[chemistry], (point) => point.temperatureDegC, temperatureDegC);
  const status = weakest(place.from.basis.status, place.to.basis.status);
  return { fraction: along(place, (point) => point.fraction), basis: { ...place.from.basis, status } };
}
