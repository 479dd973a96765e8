/** Default internal resistance of cells in series: fast (first second) and slow (minutes). */
import type { Chemistry } from '../job/part.ts';
import type { ChemistryTables, FactorPoint, Spread } from '../tables/chemistryTables.ts';
import { weakest } from '../tables/status.ts';
import type { Banded } from './banded.ts';
import { along, placeIn } from './curve.ts';

export interface ResistanceQuery {
  readonly chemistry: Chemistry;
  /** In series. */
  readonly cells: number;
  /** Protection boards in series; ignored where the chemistry has none. */
  readonly boards: number;
  /** Of the string, > 0; the 20 h rate for lead-acid. */
  readonly capacityAh: number;
  /** 0 to 1. */
  readonly stateOfCharge: number;
  readonly temperatureDegC: number;
  /** `undefined`: not known; taken as new, with mid-life as the high bound. */
  readonly ageYears: number | undefined;
  /** `fast`: first second (faults, surges); `slow`: minutes (sharing, drops). */
  readonly model: 'fast' | 'slow';
}

interface Factor {
  readonly value: number;
  readonly low: number;
  readonly high: number;
}

/** Multiplier of mid-life batteries: the high bound for a string of unknown age. Source: SRC-BAT-R-VERSUS-AGE. */
const MID_LIFE_FACTOR = 1.25;
/** The temperatures between which the law of temperature is used; beyond, the end is taken. */
const COLDEST_DEG_C = -40;
const WARMEST_DEG_C = 60;
const REFERENCE_DEG_C = 25;
/** Gas constant, J/(mol K), and 0 degC in kelvin. */
const GAS_CONSTANT = 8.314;
const KELVIN = 273.15;

/**
 * Resistance of `cells` cells in series:
 *
 *   R = cells k / C x f(charge) x f(temperature) x f(age) + boards R_board
 *
 * k in ohm Ah per cell by chemistry and model, C the capacity; f(charge) and f(age) from tables, f(temperature) by
 * Arrhenius. Low, middle and high are carried through each factor, so the band is the worst of all together.
 * Sources: SRC-BAT-RESISTANCE-DEFAULTS, SRC-BAT-R-VERSUS-CHARGE, SRC-BAT-R-VERSUS-AGE, and by chemistry
 * SRC-BAT-LEAD-COLD, SRC-BAT-LI-ILLUSTRATIVE or SRC-BAT-NICD-COLD.
 */
export function defaultResistance(query: ResistanceQuery, tables: ChemistryTables): Banded {
  const { chemistry, cells, capacityAh } = query;
  const { fastOhmAh, slowOhmAh, boardOhm } = tables.resistance[chemistry];
  const perCell = query.model === 'fast' ? fastOhmAh : slowOhmAh;
  const energy = tables.activationEnergy[chemistry];
  const charge = tables.resistanceByStateOfCharge[chemistry];
  const factors = [
    factorAt(charge, query.stateOfCharge),
    temperatureFactor(energy, query.temperatureDegC),
    ageFactor(tables.resistanceByAge[chemistry], query.ageYears),
  ];
  const of = (bound: 'value' | 'low' | 'high') =>
    factors.reduce((product, factor) => product * factor[bound], (perCell[bound] * cells) / capacityAh) +
    (boardOhm?.[bound] ?? 0) * query.boards;
  const status = weakest(perCell.basis.status, energy.basis.status, ...charge.map((point) => point.basis.status));
  return {
    value: of('value'),
    low: of('low'),
    high: of('high'),
    origin: 'default',
    basis: { ...perCell.basis, status },
  };
}

/** Two batteries of one make and lot differ by up to this. Source: SRC-BAT-LOT-SCATTER. */
const LOT_SCATTER = 0.1;

/**
 * How far the resistance of one string may lie from that of another with the same label: each ages in its own way, and new ones of a lot
 * differ too. As factors on its middle figure; what else `defaultResistance` leaves open (which tables fit the make) is the same for both.
 */
export function ownScatter(
  { chemistry, ageYears }: Pick<ResistanceQuery, 'chemistry' | 'ageYears'>,
  tables: ChemistryTables,
): { readonly low: number; readonly high: number } {
  const age = ageFactor(tables.resistanceByAge[chemistry], ageYears);
  return { low: (age.low / age.value) * (1 - LOT_SCATTER), high: (age.high / age.value) * (1 + LOT_SCATTER) };
}

/**
 * Arrhenius factor on a resistance: exp[(Ea/R) (1/T - 1/298.15 K)], 1 at 25 degC, more in the cold. `activationJPerMol` >= 0.
 */
export function arrheniusFactor(activationJPerMol: number, temperatureDegC: number): number {
  const inverse = 1 / (temperatureDegC + KELVIN) - 1 / (REFERENCE_DEG_C + KELVIN);
  return Math.exp((activationJPerMol / GAS_CONSTANT) * inverse);
}

function temperatureFactor(energy: Spread, temperatureDegC: number): Factor {
  const within = Math.min(WARMEST_DEG_C, Math.max(COLDEST_DEG_C, temperatureDegC));
  const weak = arrheniusFactor(energy.low, within);
  const strong = arrheniusFactor(energy.high, within);
  return { value: arrheniusFactor(energy.value, within), low: Math.min(weak, strong), high: Math.max(weak, strong) };
}

function ageFactor(points: readonly FactorPoint[], ageYears: number | undefined): Factor {
  return ageYears === undefined ? { value: 1, low: 1, high: MID_LIFE_FACTOR } : factorAt(points, ageYears);
}

function factorAt(points: readonly FactorPoint[], at: number): Factor {
  const place = placeIn(points, (point) => point.at, at);
  return {
    value: along(place, (point) => point.value),
    low: along(place, (point) => point.low),
    high: along(place, (point) => point.high),
  };
}
