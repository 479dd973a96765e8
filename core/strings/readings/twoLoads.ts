/** EMF and resistance behind two loads, with their uncertainty. */
import type { WithUncertainty } from '../answer.ts';
import { type MeterError, standardOf, type Term } from './meter.ts';

export interface Measured {
  readonly value: number;
  readonly error: MeterError;
}

/** Volts and amps of one moment; discharge positive. */
export interface LoadReading {
  readonly volts: Measured;
  readonly amps: Measured;
}

export interface TwoLoads {
  readonly emfV: WithUncertainty;
  readonly resistanceOhm: WithUncertainty;
  /** Change of current over its standard uncertainty. */
  readonly significance: number;
}

/**
 *   R = (U_a - U_b)/(I_b - I_a),  E = U_a + R I_a = (U_a I_b - U_b I_a)/(I_b - I_a)
 *
 * with the uncertainties of all four readings carried through by the derivatives of both forms (U_a stands in both terms of E,
 * so they are not added up one by one). With D = I_b - I_a:
 *
 *   dR/dU_a = 1/D    dR/dU_b = -1/D    dR/dI_a = R/D      dR/dI_b = -R/D
 *   dE/dU_a = I_b/D  dE/dU_b = -I_a/D  dE/dI_a = R I_b/D  dE/dI_b = -R I_a/D
 *
 * The currents must differ; whoever calls has made sure.
 */
export function twoLoads(a: LoadReading, b: LoadReading): TwoLoads {
  const changeA = b.amps.value - a.amps.value;
  const ohm = (a.volts.value - b.volts.value) / changeA;
  const emfV = a.volts.value + ohm * a.amps.value;
  const terms = (slopes: readonly [number, number, number, number]): readonly Term[] =>
    [a.volts, b.volts, a.amps, b.amps].map((one, index) => ({ ...one, slope: slopes[index]! }));
  const ofOhm = standardOf(terms([1 / changeA, -1 / changeA, ohm / changeA, -ohm / changeA]));
  const [shareA, shareB] = [a.amps.value / changeA, b.amps.value / changeA];
  const ofEmf = standardOf(terms([shareB, -shareA, ohm * shareB, -ohm * shareA]));
  return {
    emfV: { value: emfV, standard: ofEmf },
    resistanceOhm: { value: ohm, standard: ofOhm },
    significance: Math.abs(changeA) / standardOf(terms([0, 0, -1, 1])),
  };
}
