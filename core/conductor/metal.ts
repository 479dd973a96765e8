/** The metal in a conductor: what is assumed where nothing is said, and what tin costs. */
import { Defect } from '../job/issue.ts';
import type { Practice } from '../job/job.ts';
import type { Metal, Stranding } from '../job/part.ts';
import type { BareMetal, ConductorTables, MetalConstants } from '../tables/conductorTables.ts';
import type { Figure } from '../tables/practiceTable.ts';

/** A conductor's make with nothing left open; what was filled in stands in `assumed`. */
export interface ConductorMake {
  readonly metal: Metal;
  readonly stranding: Stranding;
  readonly assumed: readonly string[];
}

/** Fills in copper, and the stranding that the practice's cables usually have: stranded in the US, flexible elsewhere. */
export function makeOf(
  conductor: { readonly metal: Metal | undefined; readonly stranding: Stranding | undefined },
  practice: Practice,
): ConductorMake {
  const assumed: string[] = [];
  let { metal, stranding } = conductor;
  if (metal === undefined) {
    metal = 'copper';
    assumed.push('metal copper');
  }
  if (stranding === undefined) {
    stranding = practice === 'us-land' || practice === 'us-marine' ? 'stranded' : 'flexible';
    assumed.push(`stranding ${stranding}`);
  }
  return { metal, stranding, assumed };
}

export function bareMetal(metal: Metal): BareMetal {
  return metal === 'aluminium' ? 'aluminium' : 'copper';
}

export function metalConstants(metal: Metal, tables: ConductorTables): MetalConstants {
  return tables.metals[bareMetal(metal)];
}

/**
 * Conductivity of a tinned conductor as a fraction of plain copper, by the diameter of one of its wires: the conductor itself
 * if solid; 7, 19 or 37 equal wires if stranded, as in the US table; fine wires if flexible. Source SRC-TINNED-CONDUCTIVITY.
 */
export function tinnedConductivity(
  conductor: { readonly areaMm2: number; readonly stranding: Stranding },
  tables: ConductorTables,
): Figure {
  const wireMm =
    conductor.stranding === 'flexible'
      ? tables.flexibleWireMm.value
      : 2 * Math.sqrt(conductor.areaMm2 / wireCount(conductor) / Math.PI);
  const row = tables.tinned.find(({ fromMm, toMm }) => wireMm >= fromMm && wireMm < toMm) ?? tables.tinned.at(-1);
  if (row === undefined) throw new Defect('the table of tinned wire has rows');
  return row.conductivity;
}

/** Largest areas, mm², of conductors of 7 and of 19 wires in the US 75 °C table (2 AWG, 4/0 AWG). */
const SEVEN_WIRES_UP_TO_MM2 = 34;
const NINETEEN_WIRES_UP_TO_MM2 = 108;

function wireCount(conductor: { readonly areaMm2: number; readonly stranding: Stranding }): number {
  if (conductor.stranding === 'solid') return 1;
  if (conductor.areaMm2 <= SEVEN_WIRES_UP_TO_MM2) return 7;
  return conductor.areaMm2 <= NINETEEN_WIRES_UP_TO_MM2 ? 19 : 37;
}
