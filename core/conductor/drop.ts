/**
 * Volts lost along conductors, and the published short forms of the same sum. A conductor's own length and the one-way length of
 * a run are different fields with different names, and no function takes both.
 */
import type { BareMetal, ConductorTables } from '../tables/conductorTables.ts';
import { temperatureRatio } from './resistance.ts';
import { MM2_PER_CMIL } from './size.ts';

const M_PER_FT = 0.3048;

/** Drop along one conductor: U = I · R. */
export function conductorDropV(run: { readonly currentA: number; readonly resistanceOhm: number }): number {
  return run.currentA * run.resistanceOhm;
}

/** Drop along an out-and-back run whose two conductors may differ in length and size: U = I · (R₊ + R₋). */
export function pairDropV(run: {
  readonly currentA: number;
  readonly plusOhm: number;
  readonly minusOhm: number;
}): number {
  return run.currentA * (run.plusOhm + run.minusOhm);
}

/**
 * K of the circular-mil form, ohm circular mils per foot, at a conductor temperature: ρ20 · lay · (1 + α20 (T − 20)).
 * 10.37 for copper at 20 °C without lay. Sources SRC-IACS, SRC-METAL-HANDBOOK.
 */
export function circularMilK(
  conductor: { readonly metal: BareMetal; readonly conductorDegC: number; readonly layFactor: number },
  tables: ConductorTables,
): number {
  const { resistivityOhmMm2PerM, alphaPerK } = tables.metals[conductor.metal];
  const perCmilFoot = (resistivityOhmMm2PerM.value * M_PER_FT) / MM2_PER_CMIL;
  return perCmilFoot * conductor.layFactor * temperatureRatio(conductor.conductorDegC, alphaPerK.value);
}

/**
 * Circular-mil form of the boat trade: CM = K · I · L / E, L being the whole conductor, out and back together.
 * K = 10.75 implies copper at about 24 to 29 °C. Source SRC-CIRCULAR-MIL.
 */
export function circularMilsNeeded(circuit: {
  readonly kOhmCmilPerFt: number;
  readonly currentA: number;
  readonly outAndBackM: number;
  readonly allowedDropV: number;
}): number {
  return (circuit.kOhmCmilPerFt * circuit.currentA * (circuit.outAndBackM / M_PER_FT)) / circuit.allowedDropV;
}

/**
 * Circular-mil form of the building trade: U = 2 · K · I · L / CM, L being one way. Source SRC-CIRCULAR-MIL-2K.
 */
export function circularMilDropV(circuit: {
  readonly kOhmCmilPerFt: number;
  readonly currentA: number;
  readonly oneWayM: number;
  readonly areaCmil: number;
}): number {
  return (2 * circuit.kOhmCmilPerFt * circuit.currentA * (circuit.oneWayM / M_PER_FT)) / circuit.areaCmil;
}

/** Millivolts per ampere and metre of run, return included: twice the conductor's milliohms per metre when warm. */
export function millivoltsPerAmpereMetre(conductor: {
  readonly ohmPerKmAt20: number;
  readonly alphaPerK: number;
  readonly conductorDegC: number;
}): number {
  return 2 * conductor.ohmPerKmAt20 * temperatureRatio(conductor.conductorDegC, conductor.alphaPerK);
}

/** Drop from a printed mV/A/m figure, which counts the return already: U = mV · I · one-way length / 1000. */
export function dropFromMillivoltsV(circuit: {
  readonly millivoltsPerAmpereMetre: number;
  readonly currentA: number;
  readonly oneWayM: number;
}): number {
  return (circuit.millivoltsPerAmpereMetre * circuit.currentA * circuit.oneWayM) / 1000;
}

/** Length that a warmer conductor may have for the drop that it was allowed at another temperature. */
export function lengthForSameDropM(run: {
  readonly lengthM: number;
  readonly allowedAtDegC: number;
  readonly conductorDegC: number;
  readonly alphaPerK: number;
}): number {
  return (
    (run.lengthM * temperatureRatio(run.allowedAtDegC, run.alphaPerK)) /
    temperatureRatio(run.conductorDegC, run.alphaPerK)
  );
}
