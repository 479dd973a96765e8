/** What a string is while its charge moves: volts and chemical energy along its curve, resistance, what it keeps of a charge. */
import { chargeKeptAt } from '../../battery/chargeKept.ts';
import { emfPerCell } from '../../battery/emf.ts';
import type { StringContext } from '../../battery/stringSource.ts';
import { factsOf, stringEmfAtCharge, stringSource } from '../../battery/stringSource.ts';
import { Defect } from '../../job/issue.ts';
import type { Chemistry, StringPart } from '../../job/part.ts';
import type { ChemistryTables } from '../../tables/chemistryTables.ts';
import { type Segmented, segmented } from './segmented.ts';

/** How the volts and the charge of a string answer a steady current for a while. Current positive on discharge. */
export interface ChargeLaw {
  /** Coulombs between empty and full. */
  readonly capacityAs: number;
  /** Rest volts over state of charge; also beyond empty and full. */
  readonly emfV: Segmented;
  /** Slow resistance over state of charge, without links. */
  readonly ohm: Segmented;
  readonly linkOhm: number;
  /** Part of a charge current that is kept, over state of charge. */
  readonly kept: Segmented;
  /** How a lead string resists a charge; null for others, which take it with their plain resistance. */
  readonly charging: LeadCharging | null;
  /** Where true, what a full string is given turns to gas; else its volts rise steeply and it takes no more. */
  readonly gassesWhenFull: boolean;
}

/**
 * A charge polarises a lead cell the more the fuller it is, R (1 + factor s / (end - s)), until gassing is the easier way: no
 * further than `mostOhm`.
 */
export interface LeadCharging {
  readonly factor: number;
  readonly end: number;
  readonly mostOhm: number;
}

/** Volts at the terminals for a steady current over a step, and how they change with the current, V/A (negative). */
export interface StepLine {
  readonly voltageV: number;
  readonly slopeOhm: number;
  /** Charge at the end of the step. */
  readonly stateOfCharge: number;
  /** Of a charge: what was not kept, C, and its energy, J. */
  readonly gassedAs: number;
  readonly gassedJ: number;
  /** Turned to heat inside the string, J. */
  readonly heatJ: number;
}

/**
 * Beyond the ends of its curve a cell's volts run off: at least 20 V a cell for the whole range of charge. Iron phosphate rises
 * 22.8 V a cell for the whole range in its last hundredth (SRC-BAT-OCV-LI, slow charge); for the rest common practice, no source.
 */
const RUN_OFF_V_PER_CELL = 20;

/** The law of a whole string, or of one half of it, at the temperature of a case. */
export function chargeLaw(string: StringPart, context: StringContext & { readonly half: boolean }): ChargeLaw {
  const { tables, half } = context;
  const facts = factsOf(string, context);
  const scale = half ? 0.5 : 1;
  const places = placesOf(string.chemistry, tables);
  const emf = places.map((s) => stringEmfAtCharge(facts, s, tables) * scale);
  const ohm = places.map((s) => resistanceAt(string, s, context) * scale);
  const gassesWhenFull = hasGas(string.chemistry);
  const runOff = RUN_OFF_V_PER_CELL * facts.cells * scale;
  const firstSlope = slopeOf(places, emf, 1);
  const lastSlope = slopeOf(places, emf, places.length - 1);
  return {
    capacityAs: 3600 * string.capacityAh,
    emfV: segmented(places, emf, {
      below: Math.max(runOff, firstSlope),
      above: gassesWhenFull ? 0 : Math.max(runOff, lastSlope),
    }),
    ohm: segmented(places, ohm),
    linkOhm: string.linkOhm * scale,
    kept: segmented(...chargeKeptAt(string.chemistry, tables)),
    charging: isLead(string.chemistry) ? leadCharging(string, facts.cells * scale, tables) : null,
    gassesWhenFull,
  };
}

/**
 * Volts of a string that carries a steady current I over a step of `seconds`, from a state of charge s0:
 *
 *   U = [W(s0) - W(s1)] / (s0 - s1) - R I,   s1 = s0 - I dt / (3600 Q),   W(s) = integral of the rest volts
 *
 * The bracket is the exact mean of the rest volts over the charge that passes (average vector field, a discrete gradient:
 * Quispel and McLaren 2008), so the energy out of the store and that at the terminals differ by R I² dt and nothing else, for
 * any length of step. R and what is kept of a charge are taken at the middle of the step. Second order; U falls with I.
 * On charge a lead string resists as `LeadCharging` says (SRC-BAT-SHEPHERD), and s1 counts what is kept of the charge.
 */
export function stepLine(law: ChargeLaw, start: number, currentA: number, seconds: number): StepLine {
  const perAmp = seconds / law.capacityAs;
  const { passed, passedSlope } = chargePassed(law, start, currentA, perAmp);
  const reached = start + passed;
  const { mean, slope } = law.emfV.mean(start, reached);
  const end = law.gassesWhenFull ? Math.min(reached, Math.max(start, 1)) : reached;
  const { dropV, perAmpV, perChargeV } = dropIn(law, 0.5 * (start + end), currentA);
  const unkeptAs = currentA < 0 ? -currentA * seconds - passed * law.capacityAs : 0;
  const overAs = (reached - end) * law.capacityAs;
  // d(middle of the step)/dI is half of d(end)/dI, and the end stands still once the string is full.
  const middleSlope = end < reached ? 0 : 0.5 * passedSlope;
  return {
    voltageV: mean - dropV,
    slopeOhm: Math.min(slope * passedSlope - perAmpV - perChargeV * middleSlope, -perAmpV),
    stateOfCharge: end,
    gassedAs: unkeptAs + overAs,
    gassedJ: unkeptAs * mean + overAs * law.emfV.at(1),
    heatJ: dropV * currentA * seconds,
  };
}

/** Seconds in which a string alone settles: its resistance times its capacitance, 3600 Q / (dE/ds). */
export function settlingSeconds(law: ChargeLaw, stateOfCharge: number, currentA: number): number {
  const slope = law.emfV.slopeAt(stateOfCharge);
  return slope <= 0
    ? Number.POSITIVE_INFINITY
    : (dropIn(law, stateOfCharge, currentA).perAmpV * law.capacityAs) / slope;
}

/** Change of the state of charge, and its derivative with the current. */
function chargePassed(law: ChargeLaw, start: number, currentA: number, perAmp: number) {
  if (currentA >= 0) return { passed: -currentA * perAmp, passedSlope: -perAmp };
  const whole = -currentA * perAmp;
  const first = law.kept.at(start);
  const middle = start + 0.5 * first * whole;
  const kept = law.kept.at(middle);
  const slope = kept + law.kept.slopeAt(middle) * 0.5 * first * whole;
  // More given is never less kept, however long the step.
  return { passed: kept * whole, passedSlope: -perAmp * Math.max(slope, 0.1 * kept) };
}

/** Volts lost inside a string, negative on charge, and their derivatives with the current and with the state of charge. */
function dropIn({ ohm, linkOhm, charging }: ChargeLaw, stateOfCharge: number, currentA: number) {
  const plain = ohm.at(stateOfCharge);
  const plainSlope = ohm.slopeAt(stateOfCharge);
  if (currentA >= 0 || charging === null) {
    return { dropV: (plain + linkOhm) * currentA, perAmpV: plain + linkOhm, perChargeV: plainSlope * currentA };
  }
  const s = Math.min(1, Math.max(0, stateOfCharge));
  const left = charging.end - s;
  const growth = 1 + (charging.factor * s) / left;
  if (plain * growth > charging.mostOhm) {
    const most = Math.max(plain, charging.mostOhm) + linkOhm;
    return { dropV: most * currentA, perAmpV: most, perChargeV: 0 };
  }
  const growthSlope = s === stateOfCharge ? (charging.factor * charging.end) / (left * left) : 0;
  const total = plain * growth + linkOhm;
  return {
    dropV: total * currentA,
    perAmpV: total,
    perChargeV: (plainSlope * growth + plain * growthSlope) * currentA,
  };
}

/** Every state of charge at which a table that the law is made of has a point. */
function placesOf(chemistry: Chemistry, tables: ChemistryTables): readonly number[] {
  const places = [
    0,
    1,
    ...tables.emf[chemistry].points.map(({ stateOfCharge }) => stateOfCharge),
    ...tables.emfTemperature[chemistry].map(({ stateOfCharge }) => stateOfCharge),
    ...tables.resistanceByStateOfCharge[chemistry].map(({ at }) => at),
  ];
  const inside = [...new Set(places)].filter((s) => s >= 0 && s <= 1);
  inside.sort((p, q) => p - q);
  return inside;
}

function resistanceAt(string: StringPart, stateOfCharge: number, { ambientDegC, tables }: StringContext): number {
  return stringSource({ ...string, stateOfCharge }, { model: 'slow', ambientDegC, tables }).resistanceOhm.value;
}

function slopeOf(places: readonly number[], values: readonly number[], k: number): number {
  return (values[k]! - values[k - 1]!) / (places[k]! - places[k - 1]!);
}

/** Cells with water in them gas when they are full; lithium cells do not. */
function hasGas(chemistry: Chemistry): boolean {
  return isLead(chemistry) || chemistry === 'nicd';
}

function isLead(chemistry: Chemistry): boolean {
  return chemistry === 'flooded' || chemistry === 'agm' || chemistry === 'gel';
}

/** Volts a cell at which the gassing current is what its parameter says: 13.38 V for six. */
const GASSING_AT_V = 2.23;
/** Volts a cell of a full string that is still pushed hard: about those of an equalising charge (SRC-BAT-INSTALL-FLOODED). */
const PUSHED_V = 2.6;

/**
 * From the published set of Schiffer et al.; its c_u from memory (see SRC-BAT-SHEPHERD). A full cell passes the gassing current
 * of Tafel's law, I0 exp(c_u (U - 2.23 V)): the resistance is that of its chord from rest to 2.6 V. `cells` in series.
 */
function leadCharging(string: StringPart, cells: number, tables: ChemistryTables): LeadCharging {
  const full = { chemistry: string.chemistry, stateOfCharge: 1, temperatureDegC: 25 };
  const overV = PUSHED_V - emfPerCell(full, tables).value;
  const atGassingA = (shepherd('I_gas0', tables) * string.capacityAh) / 100;
  const pushedA = atGassingA * Math.exp(shepherd('c_u', tables) * (PUSHED_V - GASSING_AT_V));
  return {
    factor: shepherd('M_c', tables),
    end: shepherd('C_c', tables),
    mostOhm: (cells * overV) / pushedA,
  };
}

function shepherd(name: string, tables: ChemistryTables): number {
  const parameter = tables.parameterSets.get('LA-Shepherd')?.get(name);
  if (parameter === undefined) throw new Defect(`the Shepherd set has ${name}`);
  return parameter.value;
}
