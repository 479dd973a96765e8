/** Air that a charging battery needs so that hydrogen stays thin. */

/** Gas-producing cells: `cells` in series (over all strings), each of `capacityAh`, at `milliampPerAh` of gassing current. */
export interface GassingCells {
  readonly cells: number;
  readonly capacityAh: number;
  readonly milliampPerAh: number;
}

export interface Ventilation {
  /** Fresh air, m3/h. */
  readonly airM3PerH: number;
  /** Free area of the inlet, and of the outlet, for natural draught, cm2. */
  readonly openingCm2: number;
}

/** v q s of the standard: 24 (dilution to 4 %) x 0.42e-3 m3/Ah of hydrogen x 5 (margin) = 0.0504, rounded there to this. */
const AIR_M3_PER_AH = 0.05;
/** Opening for 0.1 m/s of natural draught, cm2 per m3/h. */
const OPENING_CM2_PER_M3_PER_H = 28;
/** An older rule for a battery on float, cubic feet per minute of hydrogen for each ampere-hour and cell. */
const HYDROGEN_CFM_PER_AH = 0.000013;
/** IEEE 484: hydrogen of a fully charged cell, cubic feet per minute and ampere. */
const HYDROGEN_CFM_PER_A = 0.000269;

/**
 * Q = 0.05 n I_gas C_rt 1e-3 m3/h; A = 28 Q cm2 at inlet and at outlet. Holds to about 40 degC; the gas doubles for each
 * 10 K above (from memory). Source: SRC-BAT-VENTILATION.
 */
export function ventilation({ cells, capacityAh, milliampPerAh }: GassingCells): Ventilation {
  const airM3PerH = (AIR_M3_PER_AH * cells * capacityAh * milliampPerAh) / 1000;
  return { airM3PerH, openingCm2: OPENING_CM2_PER_M3_PER_H * airM3PerH };
}

/** Hydrogen of `cells` cells on a charge current, cubic feet per minute. Source: SRC-BAT-IEEE484. */
export function hydrogenCfm({ cells, currentA }: { cells: number; currentA: number }): number {
  return HYDROGEN_CFM_PER_A * currentA * cells;
}

/** The older rule, by capacity instead of current, cubic feet per minute. Source: SRC-BAT-HYDROGEN-RULE. */
export function hydrogenCfmByCapacity({ cells, capacityAh }: { cells: number; capacityAh: number }): number {
  return HYDROGEN_CFM_PER_AH * capacityAh * cells;
}

/** Factor of the distance rule, IEC 62485-2 Annex B, from memory. */
const SPARK_DISTANCE_MM = 28.8;

/** Distance from a vent within which no spark may be, mm: d = 28.8 cuberoot(I_gas) cuberoot(C_rt). From memory. */
export function sparkDistanceMm({ capacityAh, milliampPerAh }: Omit<GassingCells, 'cells'>): number {
  return SPARK_DISTANCE_MM * Math.cbrt(milliampPerAh) * Math.cbrt(capacityAh);
}
