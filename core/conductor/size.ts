/** What each size system means in metal, and the order in which its sizes are sold. Sizes never convert by themselves. */
import { Defect } from '../job/issue.ts';
import type { ConductorSize } from '../job/part.ts';
import type { ConductorTables } from '../tables/conductorTables.ts';
import type { Figure } from '../tables/practiceTable.ts';
import { sizeText } from '../units/conductorSize.ts';

/** A figure that is not there, in words a person can act on. */
export interface Missing {
  readonly missing: string;
}

/** Area of a circle one thousandth of an inch across, mm² (exact: the inch is 25.4 mm). */
export const MM2_PER_CMIL = (Math.PI / 4) * 0.0254 ** 2;

/** Diameter of 36 AWG, mm; ratio of 4/0 to 36 AWG; steps between them (ASTM B258, SRC-ASTM-B258). */
const AWG_36_MM = 0.127;
const AWG_RATIO = 92;
const AWG_STEPS = 39;

/**
 * Diameter of a solid AWG wire: d = 0.127 mm · 92^((36 − n)/39), `gauge` n being 10 for 10 AWG, 0 for 1/0, −3 for 4/0.
 * Printed tables differ by up to 0.1 % because the standard rounds diameters. Source SRC-ASTM-B258.
 */
export function awgDiameterMm(gauge: number): number {
  return AWG_36_MM * AWG_RATIO ** ((36 - gauge) / AWG_STEPS);
}

/** Area of metal in a conductor of a size, mm²; for a metric size its nominal area. Missing where a trade table has no such size. */
export function areaOf(size: ConductorSize, tables: ConductorTables): Figure | Missing {
  switch (size.system) {
    case 'mm2':
      return { value: size.areaMm2, basis: tables.metricNominal };
    case 'awg':
      return { value: (Math.PI / 4) * awgDiameterMm(size.gauge) ** 2, basis: tables.awgFormula };
    case 'kcmil':
      return { value: size.areaKcmil * 1000 * MM2_PER_CMIL, basis: tables.awgFormula };
    case 'sae': {
      const cmil = tables.saeAreaCmil.get(size.gauge);
      if (cmil === undefined) return { missing: `area of ${sizeText(size)}: not in the table of SAE gauges` };
      return { value: cmil.value * MM2_PER_CMIL, basis: cmil.basis };
    }
    case 'auto':
      return (
        tables.autoAreaMm2.get(size.outsideDiameterMm) ?? {
          missing: `copper in ${sizeText(size)}: the trade list has no cable of that outside diameter; give the size in mm2`,
        }
      );
  }
}

/** The same size of the same system; sizes of two systems are never the same, whatever their areas. */
export function sameSize(a: ConductorSize, b: ConductorSize): boolean {
  return sizeText(a) === sizeText(b);
}

/** The sizes of a system that the tables hold, in rising area. */
export function sizesOf(system: ConductorSize['system'], tables: ConductorTables): readonly ConductorSize[] {
  switch (system) {
    case 'mm2':
      return tables.metricResistance.map(({ areaMm2 }) => ({ system: 'mm2', areaMm2 }));
    case 'awg':
    case 'kcmil':
      return tables.usResistance
        .filter((row) => row.construction === 'stranded' && row.size.system === system)
        .map((row) => row.size);
    case 'sae':
      return [...tables.saeAreaCmil.keys()].map((gauge) => ({ system: 'sae', gauge }));
    case 'auto':
      return [...tables.autoAreaMm2.keys()].map((outsideDiameterMm) => ({ system: 'auto', outsideDiameterMm }));
  }
}

/**
 * The next larger size that is sold, in the same system; after 4/0 AWG the trade goes on in kcmil. `undefined` at the end of the
 * list.
 */
export function nextSizeUp(size: ConductorSize, tables: ConductorTables): ConductorSize | undefined {
  const order =
    size.system === 'awg' ? [...sizesOf('awg', tables), ...sizesOf('kcmil', tables)] : sizesOf(size.system, tables);
  const area = areaOf(size, tables);
  if ('missing' in area) return undefined;
  return order.find((candidate) => areaMm2(candidate, tables) > area.value * (1 + SAME_AREA));
}

/** The first size of a rising list that satisfies a demand; `undefined` when none does. */
export function smallestSize(
  sizes: readonly ConductorSize[],
  fits: (size: ConductorSize) => boolean,
): ConductorSize | undefined {
  return sizes.find(fits);
}

/** Rounding slack when two areas are compared, as a fraction. */
export const SAME_AREA = 1e-9;

/** Area of a size that comes from the tables themselves, mm². Throws a `Defect` for a size that the tables do not know. */
export function areaMm2(size: ConductorSize, tables: ConductorTables): number {
  const area = areaOf(size, tables);
  if ('missing' in area) throw new Defect(`a size taken from the tables has an area (${area.missing})`);
  return area.value;
}
