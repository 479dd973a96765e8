/** A string of blocks as a source behind a resistance, for one model of the battery. */

import type { StringPart } from '../job/part.ts';
import type { ChemistryTables } from '../tables/chemistryTables.ts';
import { Memory } from '../tables/memory.ts';
import type { Banded, EntryBand } from './banded.ts';
import { bandedEntry } from './banded.ts';
import type { CellCount } from './cells.ts';
import { cellsPerBlock } from './cells.ts';
import type { Emf } from './emf.ts';
import { emfOfCells } from './emf.ts';
import { defaultResistance } from './resistance.ts';

export interface StringSource {
  /** Whole string at rest, at its state of charge and temperature. */
  readonly emfV: Banded;
  /** Whole string, links excluded, for the model asked. */
  readonly resistanceOhm: Banded;
  /** What was assumed, one plain sentence each, beginning with the field that would settle it. */
  readonly assumed: readonly string[];
}

/** `slow`: minutes (sharing, drops); `fast`: the first second (faults, surges). */
export interface StringContext {
  readonly model: 'slow' | 'fast';
  /** Temperature of a string that gives none. */
  readonly ambientDegC: number;
  readonly tables: ChemistryTables;
}

/** Half-width of the band of an entered rest voltage: a hand meter well used, a label, an estimate. Common practice. */
const EMF_BAND: EntryBand = { measured: 0.0025, label: 0.01, guess: 0.03 };
/** The same for an entered resistance; 10 % is also the stated accuracy of the two-point method (SRC-BAT-IEC60896). */
const RESISTANCE_BAND: EntryBand = { measured: 0.1, label: 0.25, guess: 0.5 };
/** A block with fewer lithium cells has no protection board of its own: the string then has one. */
const CELLS_WITH_OWN_BOARD = 4;

/** What the figures of one string are computed from. */
export interface StringFacts {
  readonly string: StringPart;
  readonly count: CellCount;
  /** In series in the whole string. */
  readonly cells: number;
  readonly temperatureDegC: number;
}

/**
 * The string as the network sees it. Figures of the job (`emfV`, `resistanceOhm`) win and serve both models; a rated
 * `shortCircuitA` gives the fast resistance E / I (and bounds the slow one from below). All else comes from the chemistry's
 * tables, as a default with its band. Sources: see `emfOfCells` and `defaultResistance`.
 */
export function stringSource(string: StringPart, context: StringContext): StringSource {
  const detail = `${context.model} ${context.ambientDegC}`;
  return found.of(context.tables, string, detail, () => findSource(string, context));
}

const found = new Memory<StringPart, StringSource>();

function findSource(string: StringPart, context: StringContext): StringSource {
  const facts = factsOf(string, context);
  const emfV = stringEmf(facts, context.tables);
  const resistanceOhm = stringResistance(facts, emfV, context);
  return { emfV, resistanceOhm, assumed: assumptions(facts) };
}

/** Cells and temperature of a string. */
export function factsOf(string: StringPart, context: Pick<StringContext, 'ambientDegC' | 'tables'>): StringFacts {
  const count = cellsPerBlock(string.chemistry, string.blockNominalV, context.tables);
  const cells = string.blocksInSeries * (count.known ? count.cells : count.nearest);
  return { string, count, cells, temperatureDegC: string.temperatureDegC ?? context.ambientDegC };
}

/**
 * Rest voltage of the whole string, with `slopeV` = dE/dSoC of its chemistry (also for an entered rest voltage: it holds at
 * the string's state of charge, and moves along the chemistry's curve from there).
 */
export function stringEmf(facts: StringFacts, tables: ChemistryTables): Emf {
  const { string, cells, temperatureDegC } = facts;
  const at = (stateOfCharge: number) =>
    emfOfCells(cells, { chemistry: string.chemistry, stateOfCharge, temperatureDegC }, tables);
  const middle = at(string.stateOfCharge);
  if (string.emfV !== undefined) {
    return { ...bandedEntry(string, 'emfV', string.emfV, EMF_BAND), slopeV: middle.slopeV };
  }
  const [lowCharge, highCharge] = string.range.get('stateOfCharge') ?? [string.stateOfCharge, string.stateOfCharge];
  const low = Math.min(middle.low, at(lowCharge).low);
  const high = Math.max(middle.high, at(highCharge).high);
  return facts.count.known ? { ...middle, low, high } : withUnknownCells({ ...middle, low, high }, facts);
}

/**
 * Rest voltage of the whole string at another state of charge, volts: along the chemistry's curve, moved so that it passes
 * through the string's own figure at the string's own state of charge.
 */
export function stringEmfAtCharge(facts: StringFacts, stateOfCharge: number, tables: ChemistryTables): number {
  const { string, cells, temperatureDegC } = facts;
  const curve = (charge: number) =>
    emfOfCells(cells, { chemistry: string.chemistry, stateOfCharge: charge, temperatureDegC }, tables).value;
  const offset = string.emfV === undefined ? 0 : string.emfV - curve(string.stateOfCharge);
  return curve(stateOfCharge) + offset;
}

/** One cell more or less in each block. */
function withUnknownCells(emf: Emf, { string, cells }: StringFacts): Emf {
  const share = string.blocksInSeries / cells;
  return { ...emf, low: emf.low * Math.max(0.5, 1 - share), high: emf.high * (1 + share), origin: 'guess' };
}

function stringResistance(facts: StringFacts, emfV: Banded, { model, tables }: StringContext): Banded {
  const { string } = facts;
  if (string.resistanceOhm !== undefined) {
    return bandedEntry(string, 'resistanceOhm', string.resistanceOhm, RESISTANCE_BAND);
  }
  const found = chemistryResistance(facts, model, tables);
  if (string.shortCircuitA === undefined) return found;
  const rated = fromShortCircuit(
    emfV.value,
    bandedEntry(string, 'shortCircuitA', string.shortCircuitA, RESISTANCE_BAND),
  );
  if (model === 'fast') return rated;
  return {
    ...found,
    value: Math.max(found.value, rated.value),
    low: Math.max(found.low, rated.low),
    high: Math.max(found.high, rated.high),
  };
}

/** R = E / I: the larger the current, the smaller the resistance. */
function fromShortCircuit(emfV: number, currentA: Banded): Banded {
  const { origin, basis } = currentA;
  return { value: emfV / currentA.value, low: emfV / currentA.high, high: emfV / currentA.low, origin, basis };
}

/** Resistance of the string from its chemistry, size, charge, temperature and age alone. */
function chemistryResistance(facts: StringFacts, model: 'slow' | 'fast', tables: ChemistryTables): Banded {
  const { string, cells, temperatureDegC } = facts;
  return defaultResistance({ ...string, cells, boards: boardsOf(facts), temperatureDegC, model }, tables);
}

function boardsOf({ string, cells }: StringFacts): number {
  return cells / string.blocksInSeries >= CELLS_WITH_OWN_BOARD ? string.blocksInSeries : 1;
}

function assumptions({ string, count, temperatureDegC }: StringFacts): readonly string[] {
  const assumed: string[] = [];
  const needsChemistry = string.emfV === undefined || string.resistanceOhm === undefined;
  if (!needsChemistry) return assumed;
  if (!count.known) {
    assumed.push(`blockNominalV: ${count.missing}; ${count.nearest} cells a block taken for the string "${string.id}"`);
  }
  if (!string.given.has('stateOfCharge')) {
    assumed.push(`stateOfCharge: the string "${string.id}" taken as full`);
  }
  if (string.temperatureDegC === undefined) {
    assumed.push(`temperatureDegC: the string "${string.id}" taken at ${temperatureDegC} degC, as the air around it`);
  }
  if (string.resistanceOhm === undefined && string.ageYears === undefined) {
    assumed.push(
      `ageYears: the string "${string.id}" taken as new; up to mid-life in the high bound of its resistance`,
    );
  }
  return assumed;
}
