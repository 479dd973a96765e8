/** What a conductor withstands in a short circuit, all heat kept in its metal: ∫i²dt ≤ k²S², for shorts of up to five seconds. */
import { bareMetal } from '../conductor/metal.ts';
import { areaOf, type Missing } from '../conductor/size.ts';
import type { CablePart, Metal } from '../job/part.ts';
import type { ConductorTables } from '../tables/conductorTables.ts';
import type { Figure } from '../tables/practiceTable.ts';
import type { Basis } from '../tables/status.ts';
import { weakest } from '../tables/status.ts';
import type { Tables } from '../tables/tables.ts';

export interface WithstandRequest {
  readonly metal: Metal;
  /** What the insulation is rated for; where the conductor is taken to begin. */
  readonly insulationDegC: number;
  /** Metal of one conductor. */
  readonly areaMm2: number;
  /** Where the conductor really begins: cooler withstands more. */
  readonly initialDegC?: number | undefined;
  /** The hottest that the insulation stands in a short, from its maker. */
  readonly finalDegC?: number | undefined;
}

/**
 * The factor k, A √s/mm²: k = c √ln((θf + z)/(θi + z)), with c 226 and z 234.5 °C for copper, 148 and 228 °C for aluminium. With neither end
 * given, the printed figure for thermoplastic of that temperature, or the form with a final 160 °C (140 °C above 300 mm²), which
 * soldered ends stand too: never more than a better insulation would give. Missing where the conductor begins no cooler than it
 * may end. Sources SRC-K-TABLE, SRC-K-FORM, SRC-IEC60949.
 */
export function withstandFactorK(
  { metal, insulationDegC, areaMm2, initialDegC, finalDegC }: WithstandRequest,
  tables: Pick<Tables, 'conductors'>,
): Figure | Missing {
  const { withstand } = tables.conductors;
  const bare = bareMetal(metal);
  if (initialDegC === undefined && finalDegC === undefined) {
    const printed = withstand.rows.find(
      (row) =>
        row.metal === bare &&
        row.insulation === 'thermoplastic' &&
        row.insulationDegC === insulationDegC &&
        areaMm2 > row.fromMm2 &&
        areaMm2 <= row.toMm2,
    );
    if (printed !== undefined) return printed.k;
  }
  const plain = areaMm2 > withstand.largeFromMm2.value ? withstand.largeFinalDegC : withstand.plainFinalDegC;
  const from = initialDegC ?? insulationDegC;
  const to = finalDegC ?? plain.value;
  if (from >= to) return { missing: 'final temperature of the insulation in a short' };
  return { value: factorBetween({ metal: bare, fromDegC: from, toDegC: to }, tables.conductors), basis: plain.basis };
}

/** k between two temperatures of the metal, A √s/mm². Range: `toDegC` above `fromDegC`, both above about −200 °C. */
export function factorBetween(
  {
    metal,
    fromDegC,
    toDegC,
  }: { readonly metal: 'copper' | 'aluminium'; readonly fromDegC: number; readonly toDegC: number },
  { withstand }: Pick<ConductorTables, 'withstand'>,
): number {
  const { c, zeroDegC } = withstand.constants[metal];
  return c.value * Math.sqrt(Math.log((toDegC + zeroDegC.value) / (fromDegC + zeroDegC.value)));
}

export interface Withstand {
  readonly k: number;
  /** A²s that the conductors of the part together stand: k²S². */
  readonly k2s2: number;
  /** Of all parallel conductors together. */
  readonly areaMm2: number;
  readonly basis: Basis;
  /** What was filled in, e.g. `metal copper`. */
  readonly assumed: readonly string[];
}

/** Ordinary PVC: the insulation taken where a job names none, as the lowest common k of cables that are sold without a figure. */
const PLAIN_INSULATION_DEGC = 70;

/** What a cable withstands, its parallel conductors sharing the fault. Missing: its size, or no k for its insulation. */
export function withstandOf(
  cable: Pick<CablePart, 'id' | 'size' | 'metal' | 'insulationDegC' | 'inParallel'>,
  tables: Pick<Tables, 'conductors'>,
): Withstand | Missing {
  if (cable.size === undefined) return { missing: `size of cable ${cable.id}` };
  const area = areaOf(cable.size, tables.conductors);
  if ('missing' in area) return area;
  const assumed: string[] = [];
  if (cable.metal === undefined) assumed.push('metal copper');
  if (cable.insulationDegC === undefined) assumed.push('insulation ordinary PVC, 70 °C');
  const insulationDegC = cable.insulationDegC ?? PLAIN_INSULATION_DEGC;
  const k = withstandFactorK({ metal: cable.metal ?? 'copper', insulationDegC, areaMm2: area.value }, tables);
  if ('missing' in k) return { missing: `insulationDegC of cable ${cable.id}` };
  const areaMm2 = area.value * cable.inParallel;
  const basis = { ...k.basis, status: weakest(k.basis.status, area.basis.status) };
  return { k: k.value, k2s2: (k.value * areaMm2) ** 2, areaMm2, basis, assumed };
}

/** Seconds that a conductor stands a steady current: t = (k S/I)². Good up to five seconds; beyond, heat leaves and the figure is low. */
export function adiabaticTimeS({
  k,
  areaMm2,
  currentA,
}: {
  readonly k: number;
  readonly areaMm2: number;
  readonly currentA: number;
}): number {
  return ((k * areaMm2) / currentA) ** 2;
}

/** Least area, mm², that stands a let-through: S = √(I²t)/k. */
export function smallestAreaMm2({ i2t, k }: { readonly i2t: number; readonly k: number }): number {
  return Math.sqrt(i2t) / k;
}
