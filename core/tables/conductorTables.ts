/**
 * Published conductor tables as the engine needs them: what conductors are made of, what they resist, what they may carry.
 * Every cell is a `Figure` with its own basis, because one printed table may hold both seen and remembered cells.
 */
import type { ConductorSize } from '../job/part.ts';
import type { Figure } from './practiceTable.ts';
import type { Basis } from './status.ts';

/** The two conductor metals; tin on copper changes the resistance table used, not the metal's law. */
export type BareMetal = 'copper' | 'aluminium';

export interface MetalConstants {
  /** Ohm mm² per metre at 20 °C. */
  readonly resistivityOhmMm2PerM: Figure;
  /** Per kelvin, referred to 20 °C. */
  readonly alphaPerK: Figure;
}

/** Conductivity of tinned annealed copper wire as a fraction of plain, by the diameter of one wire. */
export interface TinnedRow {
  readonly fromMm: number;
  /** Exclusive. */
  readonly toMm: number;
  readonly conductivity: Figure;
}

/** IEC 60228: largest resistance of one conductor at 20 °C, ohm per kilometre; `undefined` where the standard gives none. */
export interface MetricResistanceRow {
  readonly areaMm2: number;
  readonly class1Plain: Figure | undefined;
  readonly class1Tinned: Figure | undefined;
  readonly class2Plain: Figure | undefined;
  readonly class2Tinned: Figure | undefined;
  readonly class5Plain: Figure | undefined;
  readonly class5Tinned: Figure | undefined;
  /** Class 1 and class 2 share their limits. */
  readonly aluminium: Figure | undefined;
}

/** US 75 °C table: resistance of one conductor at 75 °C, ohm per 1000 ft. */
export interface UsResistanceRow {
  readonly size: ConductorSize;
  /** Printed area, circular mils. */
  readonly areaCmil: number;
  readonly wires: number;
  readonly construction: 'solid' | 'stranded';
  readonly plain: Figure;
  readonly coated: Figure;
  readonly aluminium: Figure;
}

/** One size of an ampacity table; `amperesA` by the table's own column name. */
export interface AmpacityRow {
  readonly size: ConductorSize;
  readonly amperesA: ReadonlyMap<string, Figure>;
}

export interface AmpacityTable {
  /** Printed: table and edition. */
  readonly name: string;
  readonly tableAmbientDegC: number;
  /** In rising area. */
  readonly rows: readonly AmpacityRow[];
}

/** Correction factors for a band of counts or degrees, by column name (a temperature or a way of laying). */
export interface FactorBand {
  /** First value of the band, inclusive; `undefined` is "and below". */
  readonly from: number | undefined;
  /** Last value of the band, inclusive; `undefined` is "and above". */
  readonly to: number | undefined;
  readonly factors: ReadonlyMap<string, Figure>;
}

/** K of the circular-mil form: ohm circular mils per foot. */
export interface CircularMilConstant {
  readonly metal: BareMetal;
  readonly use: string;
  readonly k: Figure;
}

/**
 * US land: columns `copper-60` … `aluminium-90`; factor columns `60`, `75`, `90`, and `all` for bundling (by conductors).
 */
export interface UsLandAmpacity {
  readonly current: AmpacityTable;
  readonly before2011: AmpacityTable;
  readonly ambient: readonly FactorBand[];
  readonly bundling: readonly FactorBand[];
  /** Terminal temperature for 14 to 1 AWG (circuits up to 100 A), and above. */
  readonly smallTerminalDegC: Figure;
  readonly largeTerminalDegC: Figure;
}

/** A boat table: columns by insulation temperature; bundling column `all` (by conductors). */
export interface BoatAmpacity {
  readonly table: AmpacityTable;
  readonly engineSpaceDegC: Figure;
  /** By insulation column; a column that is not there may not be used in an engine space. */
  readonly engineSpace: ReadonlyMap<string, Figure>;
  readonly bundling: readonly FactorBand[];
  /** Bundling binds from this system voltage; `undefined`: always. */
  readonly bundlingFromV: Figure | undefined;
}

/** Land, IEC: columns are reference methods (`A1` … `C`); ambient columns `pvc70`, `xlpe90`; grouping by circuits. */
export interface IecAmpacity {
  readonly pvc70: AmpacityTable;
  readonly xlpe90: AmpacityTable;
  /** Flexible cable with 60 °C insulation, one pair, direct current; column `pair`. */
  readonly flexible60: AmpacityTable;
  readonly ambient: readonly FactorBand[];
  /** Columns `bunched` and `single-layer`. */
  readonly grouping: readonly FactorBand[];
}

/** A printed factor k of the adiabatic short-circuit withstand, A √s/mm², for conductors of an area above `fromMm2` up to `toMm2`. */
export interface WithstandRow {
  readonly metal: BareMetal;
  readonly insulation: 'thermoplastic' | 'thermosetting' | 'rubber' | 'silicone';
  /** Conductor at the beginning and at the end of the short. */
  readonly insulationDegC: number;
  readonly finalDegC: number;
  readonly fromMm2: number;
  readonly toMm2: number;
  readonly k: Figure;
}

/** Constants of k = c √ln((θf + z)/(θi + z)). */
export interface WithstandConstants {
  readonly c: Figure;
  readonly zeroDegC: Figure;
}

export interface WithstandTables {
  readonly rows: readonly WithstandRow[];
  readonly constants: Readonly<Record<BareMetal, WithstandConstants>>;
  /** Hottest end of a short for thermoplastic or soldered ends, and for large thermoplastic conductors. */
  readonly plainFinalDegC: Figure;
  readonly largeFinalDegC: Figure;
  readonly largeFromMm2: Figure;
  /** The form holds for shorts no longer than this. */
  readonly longestS: Figure;
}

export interface ConductorTables {
  readonly metals: Readonly<Record<BareMetal, MetalConstants>>;
  /** Resistance of a twisted conductor over that of its straight wires. */
  readonly layFactor: Figure;
  readonly tinned: readonly TinnedRow[];
  /** Diameter of one wire of a flexible conductor, where nothing else is known. */
  readonly flexibleWireMm: Figure;
  readonly awgFormula: Basis;
  /** What the nominal area of a metric size rests on. */
  readonly metricNominal: Basis;
  /** In rising area. */
  readonly metricResistance: readonly MetricResistanceRow[];
  /** In rising area, solid before stranded. */
  readonly usResistance: readonly UsResistanceRow[];
  /** Least area of each SAE gauge, circular mils, by gauge (0 for 1/0, -1 for 2/0 …), in rising area. */
  readonly saeAreaCmil: ReadonlyMap<number, Figure>;
  /** Copper in "auto" cable, mm², by outside diameter in millimetres, rising. */
  readonly autoAreaMm2: ReadonlyMap<number, Figure>;
  readonly circularMilConstants: readonly CircularMilConstant[];
  readonly usLand: UsLandAmpacity;
  readonly usMarine: BoatAmpacity;
  readonly isoMarine: BoatAmpacity;
  readonly iecLand: IecAmpacity;
  /** Insulation temperature taken where none is given, by practice. */
  readonly defaultInsulationDegC: Readonly<Record<'us-land' | 'us-marine' | 'iso-marine' | 'iec-land', Figure>>;
  /** Temperature of an engine space for practices whose books give no figure. */
  readonly engineSpaceDegC: Figure;
  readonly withstand: WithstandTables;
}
