/** Short-circuit current of a battery: plain, by two readings, and by the battery branch of IEC 61660-1. */

/** Rest voltage and resistance of a source. */
export interface Thevenin {
  readonly emfV: number;
  readonly resistanceOhm: number;
}

/** I = E / (R_i + R_ext), amperes; resistances >= 0, their sum > 0. */
export function boltedCurrent({ emfV, resistanceOhm }: Thevenin, externalOhm: number): number {
  return emfV / (resistanceOhm + externalOhm);
}

/** Terminal volts under a load of so many amperes (discharge positive). */
export interface LoadPoint {
  readonly voltageV: number;
  readonly currentA: number;
}

export type TwoPointAnswer =
  | { readonly known: true; readonly source: Thevenin; readonly shortCircuitA: number }
  /** The two readings do not fall with rising current. */
  | { readonly known: false; readonly reason: string };

/**
 * Source behind two load readings, the straight line through both:
 *
 *   R_i = (U1 - U2)/(I2 - I1),  E = U1 + R_i I1,  I_sc = (U1 I2 - U2 I1)/(U1 - U2)
 *
 * IEC 60896-21 cl. 6.3 reads U1 after 20 s at 4 to 6 I10 and U2 after 5 s at 20 to 40 I10, accuracy about 10 %.
 * Source: SRC-BAT-IEC60896.
 */
export function twoPointSource(first: LoadPoint, second: LoadPoint): TwoPointAnswer {
  const rise = second.currentA - first.currentA;
  const fall = first.voltageV - second.voltageV;
  const resistanceOhm = fall / rise;
  if (rise === 0 || resistanceOhm <= 0) {
    return { known: false, reason: 'the volts must fall as the current rises from one reading to the other' };
  }
  const emfV = first.voltageV + resistanceOhm * first.currentA;
  return { known: true, source: { emfV, resistanceOhm }, shortCircuitA: emfV / resistanceOhm };
}

/** A battery branch up to the fault, after IEC 61660-1. */
export interface BatteryBranch {
  /** Nominal volts of the battery. */
  readonly nominalV: number;
  /** Open-circuit volts, fully charged; 1.05 U_n where not known. */
  readonly openCircuitV: number | undefined;
  /** Internal resistance R_B of the charged battery, > 0. */
  readonly batteryOhm: number;
  /** Connectors R_BL and conductors to the fault R_y together. */
  readonly conductorOhm: number;
  /** Battery and conductors L_BBr, henry; 0 where not known (the rise time is then 0). */
  readonly inductanceH: number;
}

export interface BatteryFault {
  readonly emfV: number;
  /** R_BBr = 0.9 R_B + R_BL + R_y. */
  readonly branchOhm: number;
  /** i_pB. */
  readonly peakA: number;
  /** I_kB. */
  readonly quasiSteadyA: number;
  /** 1/delta, seconds: the time constant of the rise. */
  readonly riseS: number;
  /** tau_2B, seconds: the time constant of the fall from peak to quasi-steady current. */
  readonly decayS: number;
}

/** Factors of IEC 61660-1:1997 for a battery branch (SRC-BAT-IEC61660). */
const OPEN_CIRCUIT_FACTOR = 1.05;
const PEAK_RESISTANCE_FACTOR = 0.9;
const QUASI_STEADY_VOLTAGE_FACTOR = 0.95;
const QUASI_STEADY_EXTRA_RESISTANCE = 0.1;
/** T_B and tau_2B of the standard, seconds (tau_2B from memory). */
const BATTERY_TIME_S = 0.03;
const DECAY_S = 0.1;

/**
 * Battery branch of a short circuit after IEC 61660-1:
 *
 *   E_B = 1.05 U_n (unless known),  R_BBr = 0.9 R_B + R_BL + R_y
 *   i_p = E_B / R_BBr,  I_k = 0.95 E_B / (R_BBr + 0.1 R_B),  1/delta = 2 / (R_BBr/L_BBr + 1/T_B)
 *
 * Source: SRC-BAT-IEC61660 (factors published at second hand; decay time from memory).
 */
export function batteryFault(branch: BatteryBranch): BatteryFault {
  const emfV = branch.openCircuitV ?? OPEN_CIRCUIT_FACTOR * branch.nominalV;
  const branchOhm = PEAK_RESISTANCE_FACTOR * branch.batteryOhm + branch.conductorOhm;
  const steadyOhm = branchOhm + QUASI_STEADY_EXTRA_RESISTANCE * branch.batteryOhm;
  const { inductanceH } = branch;
  return {
    emfV,
    branchOhm,
    peakA: emfV / branchOhm,
    quasiSteadyA: (QUASI_STEADY_VOLTAGE_FACTOR * emfV) / steadyOhm,
    riseS: inductanceH === 0 ? 0 : 2 / (branchOhm / inductanceH + 1 / BATTERY_TIME_S),
    decayS: DECAY_S,
  };
}
