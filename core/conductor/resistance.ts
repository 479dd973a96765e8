/** Direct-current resistance of a conductor, from the table of the practice in force, and at any temperature. */

import type { Practice } from '../job/job.ts';
import type { ConductorSize, Metal, Stranding } from '../job/part.ts';
import type { ConductorTables } from '../tables/conductorTables.ts';
import { Memory } from '../tables/memory.ts';
import type { Basis } from '../tables/status.ts';
import { sizeText } from '../units/conductorSize.ts';
import { numberText } from '../units/numberText.ts';
import { type ConductorMake, makeOf, metalConstants } from './metal.ts';
import { metricOhmPerKm } from './metricResistance.ts';
import type { PerKilometre } from './perKilometre.ts';
import type { Missing } from './size.ts';
import { areaOhmPerKm, usTableOhmPerKm } from './usResistance.ts';

/** What a resistance is asked of; a `CablePart` is one. */
export interface ConductorRun {
  /** Of this conductor alone: never out and back together. */
  readonly lengthM: number;
  readonly size: ConductorSize | undefined;
  readonly inParallel: number;
  readonly metal: Metal | undefined;
  readonly stranding: Stranding | undefined;
}

export interface ConductorResistance {
  /** The whole part at 20 °C, its parallel conductors together, terminations excluded. */
  readonly at20Ohm: number;
  /** Of the metal, at 20 °C. */
  readonly alphaPerK: number;
  readonly basis: Basis;
  /** The steps from the table's figure to `at20Ohm`, as printed. */
  readonly working: readonly string[];
  /** What was filled in, e.g. `metal copper`, `stranding flexible`. */
  readonly assumed: readonly string[];
}

export interface ResistanceContext {
  readonly practice: Practice;
  readonly tables: ConductorTables;
}

/**
 * Resistance of a conductor at 20 °C. Metric sizes by IEC 60228 (class 1 solid, 2 stranded, 5 flexible); AWG and kcmil on US land
 * by the 75 °C table of the building code, brought to 20 °C; every other size from its area, the metal's resistivity and the
 * lay of the strands. Range: any length from 0; missing where no size is given or a trade list does not hold it.
 * Sources SRC-IEC60228, SRC-NEC-CH9-T8, SRC-ASTM-B258, SRC-IACS.
 */
export function conductorResistance(run: ConductorRun, context: ResistanceContext): ConductorResistance | Missing {
  return found.of(context.tables, run, context.practice, () => findResistance(run, context));
}

const found = new Memory<ConductorRun, ConductorResistance | Missing>();

function findResistance(run: ConductorRun, context: ResistanceContext): ConductorResistance | Missing {
  if (run.size === undefined) return { missing: 'size of the conductor' };
  const make = makeOf(run, context.practice);
  const perKm = ohmPerKmAt20(run.size, make, context);
  if ('missing' in perKm) return perKm;
  const at20Ohm = (perKm.ohmPerKm * run.lengthM) / 1000 / run.inParallel;
  const parallel = run.inParallel === 1 ? '' : ` / ${run.inParallel} in parallel`;
  return {
    at20Ohm,
    alphaPerK: metalConstants(make.metal, context.tables).alphaPerK.value,
    basis: perKm.basis,
    working: [
      ...perKm.working,
      `${numberText({ value: perKm.ohmPerKm })} mΩ/m × ${numberText({ value: run.lengthM })} m${parallel} = ${numberText({ value: at20Ohm * 1000 })} mΩ at 20 °C`,
    ],
    assumed: [...make.assumed, ...perKm.assumed],
  };
}

/** Ohm per kilometre of one conductor at 20 °C, with nothing left open about its make. */
export function ohmPerKmAt20(
  size: ConductorSize,
  make: Pick<ConductorMake, 'metal' | 'stranding'>,
  context: ResistanceContext,
): PerKilometre | Missing {
  const { tables } = context;
  if (size.system === 'mm2') return metricOhmPerKm(size.areaMm2, make, tables);
  const tabulated =
    context.practice === 'us-land' && (size.system === 'awg' || size.system === 'kcmil')
      ? usTableOhmPerKm(size, make, tables)
      : undefined;
  if (tabulated !== undefined) return tabulated;
  const byArea = areaOhmPerKm(size, make, tables);
  if ('missing' in byArea || context.practice !== 'us-land' || size.system === 'sae' || size.system === 'auto')
    return byArea;
  return {
    ...byArea,
    assumed: [
      ...byArea.assumed,
      `${sizeText(size)} ${make.stranding} is not in the 75 °C table: resistance from its area`,
    ],
  };
}

/**
 * Resistance of a conductor at a temperature: R = R20 (1 + α20 (T − 20)), the metal's own law. Sources SRC-IACS, SRC-METAL-HANDBOOK.
 * Good from about −50 to 200 °C.
 */
export function resistanceAt(
  resistance: { readonly at20Ohm: number; readonly alphaPerK: number },
  conductorDegC: number,
): number {
  return resistance.at20Ohm * temperatureRatio(conductorDegC, resistance.alphaPerK);
}

/** A measured resistance brought to 20 °C by the metal's own law. */
export function resistanceTo20(measured: {
  readonly resistanceOhm: number;
  readonly conductorDegC: number;
  readonly alphaPerK: number;
}): number {
  return measured.resistanceOhm / temperatureRatio(measured.conductorDegC, measured.alphaPerK);
}

/** R(T)/R(20 °C) of a metal. */
export function temperatureRatio(conductorDegC: number, alphaPerK: number): number {
  return 1 + alphaPerK * (conductorDegC - 20);
}
