/** Resistance of metric sizes by IEC 60228, whose limits lie above what the nominal area would give. */
import type { Stranding } from '../job/part.ts';
import type { ConductorTables, MetricResistanceRow } from '../tables/conductorTables.ts';
import type { Figure } from '../tables/practiceTable.ts';
import { weakest } from '../tables/status.ts';
import { numberText } from '../units/numberText.ts';
import { type ConductorMake, metalConstants } from './metal.ts';
import type { PerKilometre } from './perKilometre.ts';

type Make = Pick<ConductorMake, 'metal' | 'stranding'>;

const CLASS_OF: Readonly<Record<Stranding, 1 | 2 | 5>> = { solid: 1, stranded: 2, flexible: 5 };

/**
 * Ohm per kilometre at 20 °C of a metric conductor: the limit of IEC 60228 for its class and metal. A size that the standard
 * does not hold is taken by resistivity, times the ratio by which the standard's neighbouring sizes exceed their nominal area.
 * Source SRC-IEC60228.
 */
export function metricOhmPerKm(areaMm2: number, make: Make, tables: ConductorTables): PerKilometre {
  const row = tables.metricResistance.find((candidate) => candidate.areaMm2 === areaMm2);
  const limit = row === undefined ? undefined : limitOf(row, make);
  if (limit === undefined) return byNominalArea(areaMm2, make, tables);
  return {
    ohmPerKm: limit.figure.value,
    basis: limit.figure.basis,
    working: [
      `${limit.figure.basis.text}, ${areaMm2} mm² ${limit.column}: ${limit.figure.value} mΩ/m at 20 °C, at most`,
    ],
    assumed: limit.assumed,
  };
}

/**
 * How many times the resistance of a conductor exceeds resistivity × length / nominal area. About 1.04 to 1.12 for class 2 and
 * 1.10 to 1.16 for class 5. Nominal area over this is the area of pure metal that would show the limit.
 */
export function understatementRatio(limit: {
  readonly nominalMm2: number;
  readonly limitOhmPerKm: number;
  readonly resistivityOhmMm2PerM: number;
}): number {
  return (limit.limitOhmPerKm * limit.nominalMm2) / (limit.resistivityOhmMm2PerM * 1000);
}

interface Limit {
  readonly figure: Figure;
  readonly column: string;
  readonly assumed: readonly string[];
}

function limitOf(row: MetricResistanceRow, make: Make): Limit | undefined {
  if (make.metal === 'aluminium') return aluminiumLimit(row, make);
  const tinned = make.metal === 'tinned-copper';
  const conductorClass = CLASS_OF[make.stranding];
  const own = tinned ? row[`class${conductorClass}Tinned`] : row[`class${conductorClass}Plain`];
  const column = `class ${conductorClass} ${tinned ? 'tinned' : 'plain'} copper`;
  if (own !== undefined) return { figure: own, column, assumed: [] };
  return tinned ? tinnedInstead(row, column) : undefined;
}

/** The standard has no limit for thick solid tinned wire: the larger of its plain limit and the stranded tinned one. */
function tinnedInstead(row: MetricResistanceRow, column: string): Limit | undefined {
  const { class1Plain: plain, class2Tinned: tinned } = row;
  const larger = (plain?.value ?? 0) > (tinned?.value ?? 0) ? plain : tinned;
  if (larger === undefined) return undefined;
  const instead = larger === plain ? 'class 1 plain copper' : 'class 2 tinned copper';
  return { figure: larger, column: instead, assumed: [`no limit for ${column}: ${instead} taken`] };
}

function aluminiumLimit(row: MetricResistanceRow, make: Make): Limit | undefined {
  if (row.aluminium === undefined) return undefined;
  const assumed = make.stranding === 'flexible' ? ['no class 5 limit for aluminium: class 2 taken'] : [];
  return { figure: row.aluminium, column: 'class 1 and 2 aluminium', assumed };
}

/** Ratio taken from the tabulated sizes on either side, the larger of the two; beyond the table from its end. */
function byNominalArea(areaMm2: number, make: Make, tables: ConductorTables): PerKilometre {
  const { resistivityOhmMm2PerM } = metalConstants(make.metal, tables);
  const ratios = tables.metricResistance.flatMap((row) => {
    const limit = limitOf(row, make);
    if (limit === undefined) return [];
    const ratio = understatementRatio({
      nominalMm2: row.areaMm2,
      limitOhmPerKm: limit.figure.value,
      resistivityOhmMm2PerM: resistivityOhmMm2PerM.value,
    });
    return [{ areaMm2: row.areaMm2, ratio, status: limit.figure.basis.status, text: limit.figure.basis.text }];
  });
  const below = ratios.filter((row) => row.areaMm2 < areaMm2).at(-1);
  const above = ratios.find((row) => row.areaMm2 > areaMm2);
  const neighbours = [below, above].filter((row) => row !== undefined);
  const ratio = Math.max(...neighbours.map((row) => row.ratio));
  const ohmPerKm = ((resistivityOhmMm2PerM.value * 1000) / areaMm2) * ratio;
  const text = neighbours[0]?.text ?? 'IEC 60228';
  return {
    ohmPerKm,
    basis: {
      source: resistivityOhmMm2PerM.basis.source,
      text: `${resistivityOhmMm2PerM.basis.text}, raised by the ratio of the neighbouring sizes in ${text}`,
      status: weakest('common-practice', resistivityOhmMm2PerM.basis.status, ...neighbours.map((row) => row.status)),
    },
    working: [
      `${resistivityOhmMm2PerM.value} Ω mm²/m × 1000 / ${areaMm2} mm² × ${numberText({ value: ratio })} = ${numberText({ value: ohmPerKm })} mΩ/m at 20 °C`,
    ],
    assumed: [
      `${areaMm2} mm² is not in ${text} for this make: resistance ${numberText({ value: ratio })} times that of its nominal area`,
    ],
  };
}
