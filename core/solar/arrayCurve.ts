/** Current against voltage of a solar array, from its label, at an irradiance and an air temperature. */
import type { ArrayPart } from '../job/part.ts';
import type { CurrentAt, DiodeCurve, DiodeFit, PowerPoint } from './diode.ts';
import { diodeCurrent, diodeCurve, diodePeak, fitDiode } from './diode.ts';

export interface ArrayConditions {
  /** On the plane of the modules, 0 or more. */
  readonly irradianceWPerM2: number;
  /** Air around the modules. */
  readonly ambientDegC: number;
}

export interface ArrayCurve {
  /** One module at the conditions; `undefined` in the dark. */
  readonly module: DiodeCurve | undefined;
  readonly modulesInSeries: number;
  readonly stringsInParallel: number;
  readonly cellDegC: number;
  /** What was assumed, one plain sentence each, beginning with the field that would settle it. */
  readonly assumed: readonly string[];
}

/** Crystalline silicon, fractions per kelvin, and nominal operating cell temperature: typical labels, from memory. */
const DEFAULT_VOC_PER_DEG_C = -0.003;
const DEFAULT_ISC_PER_DEG_C = 0.0005;
const DEFAULT_NOMINAL_CELL_DEG_C = 45;

/** Conditions of the label. */
const LABEL_W_PER_M2 = 1000;
const LABEL_CELL_DEG_C = 25;
const KELVIN = 273.15;
/** Conditions of the nominal operating cell temperature. */
const NOMINAL_W_PER_M2 = 800;
const NOMINAL_AMBIENT_DEG_C = 20;
/** Open-circuit volts never fall below this part of the label's, however hot. */
const LEAST_VOC_PART = 0.01;

/**
 * Curve of an array: a single diode per module fitted to the label, moved to the conditions by
 *
 *   Tc = Ta + (NOCT - 20)/800 G,   Isc = Isc0 (1 + alpha dT) G/1000,   Voc = Voc0 (1 + beta dT) in full sun,   a = a0 T/T0
 *
 * dT = Tc - 25, T in kelvin, Rs fixed; modules in series share the volts, strings in parallel add the amperes. Where the
 * label gives the power coefficient, `a` is chosen instead so that the full-sun power follows it.
 * Sources: SRC-SOLAR-FOUR-PARAMETER (fit, from memory), SRC-SOLAR-DESOTO (a, Rs with temperature), SRC-SOLAR-NOCT.
 */
export function arrayCurve(array: ArrayPart, { irradianceWPerM2, ambientDegC }: ArrayConditions): ArrayCurve {
  const nominalCellDegC = array.nominalCellDegC ?? DEFAULT_NOMINAL_CELL_DEG_C;
  const cellDegC = ambientDegC + ((nominalCellDegC - NOMINAL_AMBIENT_DEG_C) / NOMINAL_W_PER_M2) * irradianceWPerM2;
  const fit = fitDiode(array);
  const module = irradianceWPerM2 > 0 ? moduleAt(array, fit, { irradianceWPerM2, cellDegC }) : undefined;
  const { modulesInSeries, stringsInParallel } = array;
  return { module, modulesInSeries, stringsInParallel, cellDegC, assumed: assumptions(array, fit) };
}

function moduleAt(
  array: ArrayPart,
  fit: DiodeFit,
  { irradianceWPerM2, cellDegC }: { irradianceWPerM2: number; cellDegC: number },
): DiodeCurve {
  const warmer = cellDegC - LABEL_CELL_DEG_C;
  const fullSunA = array.iscA * (1 + (array.iscPerDegC ?? DEFAULT_ISC_PER_DEG_C) * warmer);
  const vocPart = 1 + (array.vocPerDegC ?? DEFAULT_VOC_PER_DEG_C) * warmer;
  const fullSunOpenV = array.vocV * Math.max(LEAST_VOC_PART, vocPart);
  const natural = (fit.bendV * (cellDegC + KELVIN)) / (LABEL_CELL_DEG_C + KELVIN);
  const fullSun = (bendV: number) =>
    diodeCurve({ bendV, seriesOhm: fit.seriesOhm }, { fullSunA, fullSunOpenV, sun: 1 });
  const wantedW =
    array.pmpPerDegC === undefined ? undefined : array.vmpV * array.impA * (1 + array.pmpPerDegC * warmer);
  const bendV = wantedW === undefined ? natural : bendForPower(fullSun, natural, wantedW);
  const sun = irradianceWPerM2 / LABEL_W_PER_M2;
  return diodeCurve({ bendV, seriesOhm: fit.seriesOhm }, { fullSunA, fullSunOpenV, sun });
}

/** The bend is sought within this factor of the natural one. */
const BEND_SEARCH = 3;
const BEND_STEPS = 40;

/** Bisection: a rounder knee gives less power. Where no bend in reach gives the power, the nearer end is taken. */
function bendForPower(fullSun: (bendV: number) => DiodeCurve, natural: number, wantedW: number): number {
  let sharp = natural / BEND_SEARCH;
  let round = natural * BEND_SEARCH;
  for (let step = 0; step < BEND_STEPS; step += 1) {
    const middle = (sharp + round) / 2;
    if (diodePeak(fullSun(middle)).powerW > wantedW) sharp = middle;
    else round = middle;
  }
  return (sharp + round) / 2;
}

function assumptions(array: ArrayPart, fit: DiodeFit): readonly string[] {
  const assumed: string[] = [];
  const say = (field: string, text: string) =>
    assumed.push(`${field}: ${text} for the array "${array.id}" (from memory)`);
  if (array.vocPerDegC === undefined) say('vocPerDegC', `${DEFAULT_VOC_PER_DEG_C} taken`);
  if (array.iscPerDegC === undefined) say('iscPerDegC', `${DEFAULT_ISC_PER_DEG_C} taken`);
  if (array.nominalCellDegC === undefined) say('nominalCellDegC', `${DEFAULT_NOMINAL_CELL_DEG_C} taken`);
  if (fit.withoutSeries) {
    assumed.push(`vmpV: the label points of "${array.id}" give no series resistance; none was taken`);
  }
  return assumed;
}

/**
 * Current out of the array at its terminal volts, and dI/dV. Falls steadily everywhere; negative above open circuit, where a
 * lit array takes current (a blocking diode is a part of its own).
 */
export function currentAt(curve: ArrayCurve, voltageV: number): CurrentAt {
  if (curve.module === undefined) return { currentA: 0, slopeSiemens: 0 };
  const one = diodeCurrent(curve.module, voltageV / curve.modulesInSeries);
  return {
    currentA: one.currentA * curve.stringsInParallel,
    slopeSiemens: (one.slopeSiemens * curve.stringsInParallel) / curve.modulesInSeries,
  };
}

/** Volts at no current; 0 in the dark. */
export function openCircuitV(curve: ArrayCurve): number {
  return (curve.module?.openV ?? 0) * curve.modulesInSeries;
}

/** Current at no volts; 0 in the dark. */
export function shortCircuitA(curve: ArrayCurve): number {
  return currentAt(curve, 0).currentA;
}

/** Volts, current and power at the maximum power point; all 0 in the dark. */
export function maximumPower(curve: ArrayCurve): PowerPoint {
  if (curve.module === undefined) return { voltageV: 0, currentA: 0, powerW: 0 };
  const peak = diodePeak(curve.module);
  return {
    voltageV: peak.voltageV * curve.modulesInSeries,
    currentA: peak.currentA * curve.stringsInParallel,
    powerW: peak.powerW * curve.modulesInSeries * curve.stringsInParallel,
  };
}
