/** Laws that stand on published tables, through the engine's own door: cables by size, and the sun on an array. */
import {
  arrayCurve,
  type CheckedJob,
  conductorResistance,
  currentAt,
  heatingLaw,
  openCircuitV,
  resistanceAt,
} from '../../core/api.ts';
import { tables } from '../../data/index.ts';
import type { OutsideLaws } from './densePlan.ts';

/**
 * Next to open circuit, over this part of its volts, an array's curve runs out flat, and beyond it the array gives nothing at
 * any volts. The reference goes straight through open circuit instead: microamps away from the curve, and a root is a root.
 */
const STRAIGHT_PART = 1e-5;

export function outsideLaws(job: CheckedJob): OutsideLaws {
  const { practice } = job;
  return {
    conductor: (cable, operatingCase) => {
      const resistance = conductorResistance(cable, { practice, tables: tables.conductors });
      if ('missing' in resistance) throw new Error(`${cable.id}: ${resistance.missing}`);
      if (cable.conductorDegC !== undefined) return { ohm: resistanceAt(resistance, cable.conductorDegC), ohmPerA2: 0 };
      const ambientDegC = operatingCase.ambientDegC ?? 25;
      const warm = heatingLaw(cable, { practice, ambientDegC, tables: tables.conductors });
      if ('missing' in warm) throw new Error(`${cable.id}: ${warm.missing}`);
      const { at20Ohm, alphaPerK } = resistance;
      return {
        ohm: at20Ohm * (1 + alphaPerK * (warm.ambientDegC - 20)),
        ohmPerA2: (at20Ohm * alphaPerK * warm.riseAtRatedK) / warm.ampacityA ** 2,
      };
    },
    panel: (array, { irradianceWPerM2, ambientDegC }) => {
      if (irradianceWPerM2 === undefined || ambientDegC === undefined) throw new Error('an array wants its weather');
      const curve = arrayCurve(array, { irradianceWPerM2, ambientDegC });
      const openV = openCircuitV(curve);
      const straightFrom = openV * (1 - STRAIGHT_PART);
      const straightS = currentAt(curve, straightFrom).currentA / (openV - straightFrom);
      return {
        currentA: (volts) => (volts < straightFrom ? currentAt(curve, volts).currentA : straightS * (openV - volts)),
        slope: (volts) => (volts < straightFrom ? currentAt(curve, volts).slopeSiemens : -straightS),
        openCircuitV: openV,
      };
    },
  };
}
