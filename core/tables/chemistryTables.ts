/** Published and remembered figures about battery chemistries; the rows live in `data/chemistry/`. All per cell unless said. */
import type { Chemistry } from '../job/part.ts';
import type { Basis } from './status.ts';

/** A figure with its honest spread: low <= value <= high. */
export interface Spread {
  readonly value: number;
  readonly low: number;
  readonly high: number;
  readonly basis: Basis;
}

/** One point of a rest-voltage curve, volts per cell. */
export interface EmfPoint extends Spread {
  readonly stateOfCharge: number;
}

/** Rest voltage of one cell against state of charge; points rise strictly in state of charge and in volts. */
export interface EmfCurve {
  readonly name: string;
  readonly chemistry: Chemistry;
  readonly referenceDegC: number;
  readonly points: readonly EmfPoint[];
}

/** How the rest voltage of one cell moves with temperature at a state of charge. */
export interface EmfTemperaturePoint {
  readonly stateOfCharge: number;
  readonly voltPerKelvin: number;
  readonly basis: Basis;
}

/** Resistance of one cell times the capacity of the string, ohm ampere-hours, at 25 degC, full, new. */
export interface CellResistance {
  readonly fastOhmAh: Spread;
  readonly slowOhmAh: Spread;
  /** Switch and sense resistor of one protection board, ohms; `undefined` where the chemistry has none. */
  readonly boardOhm: Spread | undefined;
}

/** A multiplier at one place of a rising scale (state of charge, or years). */
export interface FactorPoint extends Spread {
  readonly at: number;
}

/** One exponential element: its part of (slow - fast) resistance, and its time constant. */
export interface RelaxationElement {
  readonly share: number;
  readonly tauS: number;
  readonly basis: Basis;
}

/** Nominal volts of one cell, and the widest volts per cell at which a block label is still understood. */
export interface CellVolts {
  readonly nominalV: number;
  readonly lowestV: number;
  readonly highestV: number;
  readonly basis: Basis;
}

/** What a limit is about. Volts are per cell, rates are per hour (1 = the capacity in one hour), fractions 0 to 1. */
export type LimitQuantity =
  | 'absorptionV'
  | 'floatV'
  | 'equaliseV'
  | 'gassingV'
  | 'compensationVPerK'
  | 'chargeRate'
  | 'chargeRateMax'
  | 'dischargeRate'
  | 'dischargeRateShort'
  | 'endV'
  | 'loadCutV'
  | 'chargeLowestDegC'
  | 'chargeHighestDegC'
  | 'dischargeLowestDegC'
  | 'dischargeHighestDegC'
  | 'depthOfDischarge'
  | 'selfDischargePerMonth'
  | 'chargeEfficiency'
  | 'joinWithinV';

/** Gas-producing current for ventilation, mA per Ah. */
export interface GassingCurrent {
  readonly standard: string;
  readonly cellType: string;
  readonly mode: string;
  readonly cellV: number | undefined;
  readonly milliampPerAh: number;
  readonly basis: Basis;
}

/** Capacity at a cell temperature as a fraction of the capacity at 25 degC. */
export interface CapacityPoint {
  readonly temperatureDegC: number;
  readonly fraction: number;
  readonly basis: Basis;
}

/** A reading of internal resistance from elsewhere, as evidence beside the defaults: ohm Ah for the block's cells. */
export interface ResistanceEvidence {
  readonly item: string;
  readonly chemistry: Chemistry | undefined;
  readonly model: 'fast' | 'slow';
  readonly cells: number;
  readonly lowOhmAh: number | undefined;
  readonly highOhmAh: number;
  readonly method: string;
  readonly basis: Basis;
}

/** Temperature at which the acid of a lead cell freezes at a state of charge. */
export interface FreezingPoint {
  readonly stateOfCharge: number;
  readonly temperatureDegC: number;
  readonly basis: Basis;
}

export interface ModelParameter {
  readonly value: number;
  readonly unit: string;
  readonly note: string;
  readonly basis: Basis;
}

export interface ChemistryTables {
  /** The rest-voltage curve used for each chemistry. */
  readonly emf: Readonly<Record<Chemistry, EmfCurve>>;
  /** Other rest-voltage curves by name, kept to show how far sources differ. */
  readonly otherEmf: ReadonlyMap<string, EmfCurve>;
  /** Empty where not known. */
  readonly emfTemperature: Readonly<Record<Chemistry, readonly EmfTemperaturePoint[]>>;
  readonly cellVolts: Readonly<Record<Chemistry, CellVolts>>;
  readonly resistance: Readonly<Record<Chemistry, CellResistance>>;
  readonly resistanceByStateOfCharge: Readonly<Record<Chemistry, readonly FactorPoint[]>>;
  readonly resistanceByAge: Readonly<Record<Chemistry, readonly FactorPoint[]>>;
  /** Activation energy of the resistance, J/mol. */
  readonly activationEnergy: Readonly<Record<Chemistry, Spread>>;
  /** Part of a charge current that is kept, by state of charge; empty where the chemistry keeps the same part throughout. */
  readonly chargeKept: Readonly<Record<Chemistry, readonly FactorPoint[]>>;
  readonly relaxation: Readonly<Record<Chemistry, readonly RelaxationElement[]>>;
  /** A quantity that is missing is not known, or does not exist for the chemistry. */
  readonly limits: Readonly<Record<Chemistry, ReadonlyMap<LimitQuantity, Spread>>>;
  readonly capacityByTemperature: Readonly<Record<Chemistry, readonly CapacityPoint[]>>;
  /** Acid of lead cells, rising in state of charge. */
  readonly freezing: readonly FreezingPoint[];
  readonly gassing: readonly GassingCurrent[];
  readonly resistanceEvidence: readonly ResistanceEvidence[];
  /** Published parameter sets of battery models: set name, then parameter name. */
  readonly parameterSets: ReadonlyMap<string, ReadonlyMap<string, ModelParameter>>;
}
