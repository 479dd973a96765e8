/** Resistance of AWG and kcmil sizes from the US 75 °C table, and of any size from its area of metal. */
import type { ConductorSize } from '../job/part.ts';
import type { ConductorTables } from '../tables/conductorTables.ts';
import type { Basis } from '../tables/status.ts';
import { weakest } from '../tables/status.ts';
import { sizeText } from '../units/conductorSize.ts';
import { numberText } from '../units/numberText.ts';
import { type ConductorMake, metalConstants, tinnedConductivity } from './metal.ts';
import type { PerKilometre } from './perKilometre.ts';
import { areaOf, type Missing, sameSize } from './size.ts';

type Make = Pick<ConductorMake, 'metal' | 'stranding'>;

/** The building code prints ohm per 1000 ft; a foot is 0.3048 m exactly. */
const KM_PER_1000_FT = 0.3048;
const TABLE_DEG_C = 75;

/**
 * Ohm per kilometre at 20 °C from the 75 °C table: R20 = R75 / (1 + α20 (75 − 20)). Flexible cable takes the stranded row.
 * `undefined` where the table has no such row. Source SRC-NEC-CH9-T8.
 */
export function usTableOhmPerKm(size: ConductorSize, make: Make, tables: ConductorTables): PerKilometre | undefined {
  const construction = make.stranding === 'solid' ? 'solid' : 'stranded';
  const row = tables.usResistance.find(
    (candidate) => candidate.construction === construction && sameSize(candidate.size, size),
  );
  if (row === undefined) return undefined;
  const column = make.metal === 'aluminium' ? 'aluminium' : make.metal === 'tinned-copper' ? 'coated' : 'plain';
  const cell = row[column];
  const { alphaPerK } = metalConstants(make.metal, tables);
  const at75 = cell.value / KM_PER_1000_FT;
  const ohmPerKm = at75 / (1 + alphaPerK.value * (TABLE_DEG_C - 20));
  return {
    ohmPerKm,
    basis: { ...cell.basis, status: weakest(cell.basis.status, alphaPerK.basis.status) },
    working: [
      `${cell.basis.text}, ${sizeText(size)} ${construction}, ${columnName(column)}: ${cell.value} Ω/1000 ft = ${numberText({ value: at75 })} mΩ/m at 75 °C`,
      `${numberText({ value: at75 })} / (1 + ${alphaPerK.value} × 55) = ${numberText({ value: ohmPerKm })} mΩ/m at 20 °C`,
    ],
    assumed: make.stranding === 'flexible' ? ['flexible cable taken as the stranded row of the table'] : [],
  };
}

/**
 * Ohm per kilometre at 20 °C from the area of metal: R = ρ20 · lay · L / (A · tin), lay 1 for a solid wire, tin 1 where plain.
 * Missing where a trade list does not hold the size. Sources SRC-IACS, SRC-METAL-HANDBOOK, SRC-NEC-CH9-T8 (lay), SRC-TINNED-CONDUCTIVITY.
 */
export function areaOhmPerKm(size: ConductorSize, make: Make, tables: ConductorTables): PerKilometre | Missing {
  const area = areaOf(size, tables);
  if ('missing' in area) return area;
  const { resistivityOhmMm2PerM: rho } = metalConstants(make.metal, tables);
  const lay = make.stranding === 'solid' ? undefined : tables.layFactor;
  const tin =
    make.metal === 'tinned-copper'
      ? tinnedConductivity({ areaMm2: area.value, stranding: make.stranding }, tables)
      : undefined;
  const ohmPerKm = (rho.value * 1000 * (lay?.value ?? 1)) / (area.value * (tin?.value ?? 1));
  const wire = tin !== undefined && make.stranding === 'flexible' ? tables.flexibleWireMm : undefined;
  const bases = [area.basis, rho.basis, lay?.basis, tin?.basis, wire?.basis].filter((basis) => basis !== undefined);
  const layText = lay === undefined ? '' : ` × ${lay.value} (lay)`;
  const tinText = tin === undefined ? '' : ` / ${tin.value} (tin)`;
  return {
    ohmPerKm,
    basis: combined(bases),
    working: [
      `${sizeText(size)}: ${numberText({ value: area.value })} mm² (${area.basis.text})`,
      `${rho.value} Ω mm²/m × 1000 / ${numberText({ value: area.value })} mm²${layText}${tinText} = ${numberText({ value: ohmPerKm })} mΩ/m at 20 °C`,
    ],
    assumed: wire === undefined ? [] : [`wires of ${wire.value} mm in tinned flexible cable`],
  };
}

function columnName(column: 'plain' | 'coated' | 'aluminium'): string {
  return column === 'aluminium' ? 'aluminium' : `${column === 'coated' ? 'coated (tinned)' : 'uncoated'} copper`;
}

function combined(bases: readonly Basis[]): Basis {
  return {
    source: bases[0]?.source ?? '',
    text: [...new Set(bases.map((basis) => basis.text))].join('; '),
    status: weakest(...bases.map((basis) => basis.status)),
  };
}
