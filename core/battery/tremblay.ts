/** Discharge curve of a battery from three points of its printed curve (generic model after Tremblay). */

/** Points read off a printed discharge curve at a current of `typicalA`. */
export interface DischargePoints {
  readonly fullV: number;
  readonly capacityAh: number;
  readonly nominalV: number;
  /** Ampere-hours taken at the end of the flat part. */
  readonly nominalAh: number;
  readonly exponentialV: number;
  readonly exponentialAh: number;
  readonly resistanceOhm: number;
  readonly typicalA: number;
}

export interface DischargeCurve {
  /** E0, volts. */
  readonly constantV: number;
  /** K, volts per ampere-hour. */
  readonly polarisation: number;
  /** A, volts, and B, per ampere-hour, of the early bend. */
  readonly bendV: number;
  readonly bendPerAh: number;
  readonly capacityAh: number;
  readonly resistanceOhm: number;
}

/** The bend is over after three of its own lengths. */
const BEND_LENGTHS = 3;

/**
 * Parameters from the three points:
 *
 *   A = V_full - V_exp,  B = 3/Q_exp,  E0 = V_full + R i - A,
 *   K = (E0 - V_nom - R i + A exp(-B Q_nom)) / [Q/(Q - Q_nom) (Q_nom + i)]
 *
 * R is a fitting figure here, no reading of resistance. Source: SRC-BAT-TREMBLAY.
 */
export function dischargeCurve(points: DischargePoints): DischargeCurve {
  const { capacityAh, nominalAh, resistanceOhm, typicalA } = points;
  const bendV = points.fullV - points.exponentialV;
  const bendPerAh = BEND_LENGTHS / points.exponentialAh;
  const ohmicV = resistanceOhm * typicalA;
  const constantV = points.fullV + ohmicV - bendV;
  const remaining = constantV - points.nominalV - ohmicV + bendV * Math.exp(-bendPerAh * nominalAh);
  const polarisation = remaining / ((capacityAh / (capacityAh - nominalAh)) * (nominalAh + typicalA));
  return { constantV, polarisation, bendV, bendPerAh, capacityAh, resistanceOhm };
}

/**
 * Terminal volts on discharge: U = E0 - R i - K Q/(Q - q) (q + i*) + A exp(-B q), q the ampere-hours taken
 * (0 <= q < Q), i the current and i* the same current low-passed, amperes. Source: SRC-BAT-TREMBLAY.
 */
export function dischargeVoltage(
  curve: DischargeCurve,
  { takenAh, currentA, filteredA }: { takenAh: number; currentA: number; filteredA: number },
): number {
  const { constantV, polarisation, bendV, bendPerAh, capacityAh, resistanceOhm } = curve;
  const slope = (polarisation * capacityAh) / (capacityAh - takenAh);
  return constantV - resistanceOhm * currentA - slope * (takenAh + filteredA) + bendV * Math.exp(-bendPerAh * takenAh);
}
