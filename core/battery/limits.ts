/** What a chemistry allows: charge volts against temperature, currents, temperatures, end volts. */
import type { Chemistry } from '../job/part.ts';
import type { ChemistryTables, LimitQuantity } from '../tables/chemistryTables.ts';
import type { Basis } from '../tables/status.ts';
import type { Banded } from './banded.ts';
import { bandedDefault } from './banded.ts';
import { along, placeIn } from './curve.ts';

/** Temperature that charge volts are printed for. */
const REFERENCE_DEG_C = 25;

/**
 * One limit of a chemistry per cell (volts), per hour (rates), or as it stands; `undefined` where it is not known or does
 * not exist (an iron phosphate cell is not equalised). Source: rows of `data/chemistry/limits.csv`.
 */
export function limitOf(chemistry: Chemistry, quantity: LimitQuantity, tables: ChemistryTables): Banded | undefined {
  const spread = tables.limits[chemistry].get(quantity);
  return spread === undefined ? undefined : bandedDefault(spread);
}

/** A temperature window; `inside` says whether the temperature asked about lies in it. */
export interface TemperatureWindow {
  readonly lowest: Banded | undefined;
  readonly highest: Banded | undefined;
  readonly inside: boolean;
}

/** Charge volts of cells in series at a temperature. A quantity is `undefined` where the chemistry has none. */
export interface ChargeWindow {
  /** low and high are the ends of the window that is usual at this temperature. */
  readonly absorptionV: Banded | undefined;
  readonly floatV: Banded | undefined;
  readonly equaliseV: Banded | undefined;
  readonly gassingV: Banded | undefined;
  /** Change of the charge volts per kelvin above 25 degC, whole string; 0 where the chemistry has none. */
  readonly compensationVPerK: Banded | undefined;
  readonly chargeTemperature: TemperatureWindow;
}

/**
 * Charge window of `cells` cells in series:
 *
 *   U(T) = cells [U(25 degC) + c (T - 25)]
 *
 * c being the compensation per cell; T is taken no further than the temperatures between which charging is allowed.
 * Source: rows of `data/chemistry/limits.csv`.
 */
export function chargeWindow(
  { chemistry, cells, temperatureDegC }: { chemistry: Chemistry; cells: number; temperatureDegC: number },
  tables: ChemistryTables,
): ChargeWindow {
  const compensation = limitOf(chemistry, 'compensationVPerK', tables);
  const chargeTemperature = temperatureWindow(chemistry, 'charge', temperatureDegC, tables);
  const { lowest, highest } = chargeTemperature;
  const warmest = Math.min(temperatureDegC, highest?.value ?? temperatureDegC);
  const rise = Math.max(warmest, lowest?.value ?? warmest) - REFERENCE_DEG_C;
  const volts = (quantity: LimitQuantity) => {
    const limit = limitOf(chemistry, quantity, tables);
    return limit === undefined ? undefined : compensated(limit, compensation, rise, cells);
  };
  return {
    absorptionV: volts('absorptionV'),
    floatV: volts('floatV'),
    equaliseV: volts('equaliseV'),
    gassingV: volts('gassingV'),
    compensationVPerK: compensation === undefined ? undefined : scaled(compensation, cells),
    chargeTemperature,
  };
}

function compensated(limit: Banded, compensation: Banded | undefined, rise: number, cells: number): Banded {
  if (compensation === undefined) return scaled(limit, cells);
  const shifts = [compensation.low * rise, compensation.high * rise];
  return {
    ...limit,
    value: (limit.value + compensation.value * rise) * cells,
    low: (limit.low + Math.min(...shifts)) * cells,
    high: (limit.high + Math.max(...shifts)) * cells,
  };
}

function scaled(banded: Banded, factor: number): Banded {
  return {
    ...banded,
    value: banded.value * factor,
    low: banded.low * factor,
    high: banded.high * factor,
  };
}

/** Temperatures between which the cells may be charged or discharged. */
export function temperatureWindow(
  chemistry: Chemistry,
  use: 'charge' | 'discharge',
  temperatureDegC: number,
  tables: ChemistryTables,
): TemperatureWindow {
  const lowest = limitOf(chemistry, `${use}LowestDegC`, tables);
  const highest = limitOf(chemistry, `${use}HighestDegC`, tables);
  const inside =
    temperatureDegC >= (lowest?.value ?? Number.NEGATIVE_INFINITY) &&
    temperatureDegC <= (highest?.value ?? Number.POSITIVE_INFINITY);
  return { lowest, highest, inside };
}

/** Currents of a string by chemistry and capacity, amperes. */
export interface CurrentLimits {
  /** Usual charge current. */
  readonly chargeA: Banded | undefined;
  readonly chargeMaxA: Banded | undefined;
  /** Continuous. */
  readonly dischargeA: Banded | undefined;
  /** Seconds. */
  readonly dischargeShortA: Banded | undefined;
}

/** I = rate x capacity; `capacityAh` of the string, > 0. Source: rows of `data/chemistry/limits.csv`. */
export function currentLimits(
  { chemistry, capacityAh }: { chemistry: Chemistry; capacityAh: number },
  tables: ChemistryTables,
): CurrentLimits {
  const amperes = (quantity: LimitQuantity) => {
    const rate = limitOf(chemistry, quantity, tables);
    return rate === undefined ? undefined : scaled(rate, capacityAh);
  };
  return {
    chargeA: amperes('chargeRate'),
    chargeMaxA: amperes('chargeRateMax'),
    dischargeA: amperes('dischargeRate'),
    dischargeShortA: amperes('dischargeRateShort'),
  };
}

/** Volts of cells in series below which discharge ends, and at which loads are usually cut off to spare the cells. */
export interface DischargeVolts {
  readonly endV: Banded | undefined;
  readonly loadCutV: Banded | undefined;
}

/** Source: rows of `data/chemistry/limits.csv`. */
export function dischargeVolts(
  { chemistry, cells }: { chemistry: Chemistry; cells: number },
  tables: ChemistryTables,
): DischargeVolts {
  const volts = (quantity: LimitQuantity) => {
    const limit = limitOf(chemistry, quantity, tables);
    return limit === undefined ? undefined : scaled(limit, cells);
  };
  return { endV: volts('endV'), loadCutV: volts('loadCutV') };
}

export interface FreezingTemperature {
  readonly temperatureDegC: number;
  readonly basis: Basis;
}

/** Temperature at which the acid of a lead cell freezes; `undefined` for other chemistries. Source: SRC-BAT-FREEZING. */
export function freezingTemperature(
  { chemistry, stateOfCharge }: { chemistry: Chemistry; stateOfCharge: number },
  tables: ChemistryTables,
): FreezingTemperature | undefined {
  if (chemistry !== 'flooded' && chemistry !== 'agm' && chemistry !== 'gel') return undefined;
  const place = placeIn(tables.freezing, (point) => point.stateOfCharge, stateOfCharge);
  return { temperatureDegC: along(place, (point) => point.temperatureDegC), basis: place.from.basis };
}
