/** What the rule books ask for, by practice, parsed once from the rows beside this file. */
import type {
  Basis,
  ColdVoltsFactor,
  Figure,
  Practice,
  PracticeTable,
  SmallestConductor,
  SolarPractice,
  UnfusedLength,
} from '../../core/api.ts';
import { Defect } from '../../core/api.ts';
import { readRows } from '../chemistry/rows.ts';
import { basisOf, clauseFigure, sizeOf } from '../conductors/figures.ts';
import clausesCsv from './clauses.csv?raw';
import coldVoltsCsv from './cold-volts.csv?raw';
import figuresCsv from './figures.csv?raw';
import sizesCsv from './sizes.csv?raw';
import capsCsv from './small-wire-caps.csv?raw';

const PRACTICES: readonly Practice[] = ['us-land', 'us-marine', 'iso-marine', 'iec-land'];

const figures: ReadonlyMap<string, Figure> = new Map(
  readRows('figures.csv', figuresCsv).map((row) => [
    `${row.oneOf('practice', PRACTICES)} ${row.text('figure')}`,
    clauseFigure(row, 'value'),
  ]),
);

const sizes: ReadonlyMap<string, SmallestConductor> = new Map(
  readRows('sizes.csv', sizesCsv).map((row) => [
    `${row.oneOf('practice', PRACTICES)} ${row.text('figure')}`,
    { size: sizeOf(row), belowV: row.optionalNumber('belowV'), basis: basisOf(row, row.text('clause')) },
  ]),
);

/** Of one practice, by the id of the rule. */
function clausesOf(practice: Practice): ReadonlyMap<string, Basis> {
  const rows = readRows('clauses.csv', clausesCsv).filter((row) => row.oneOf('practice', PRACTICES) === practice);
  return new Map(rows.map((row) => [row.text('rule'), basisOf(row, row.text('clause'))]));
}

function optional(practice: Practice, name: string): Figure | undefined {
  return figures.get(`${practice} ${name}`);
}

function required(practice: Practice, name: string): Figure {
  const figure = optional(practice, name);
  if (figure === undefined) throw new Defect(`figures.csv has ${name} for ${practice}`);
  return figure;
}

type NextSizeUp = PracticeTable['nextSizeUp'];

/** `undefined` for a practice whose book does not allow the next size up. */
function nextSizeUp(practice: Practice): NextSizeUp {
  const upToA = optional(practice, 'nextSizeUp.upToA');
  const maxFactor = optional(practice, 'nextSizeUp.maxFactor');
  const fromV = optional(practice, 'nextSizeUp.fromV');
  const belowV = optional(practice, 'nextSizeUp.belowV');
  const basis = (upToA ?? maxFactor)?.basis;
  if (basis === undefined) return undefined;
  return { upToA: upToA?.value, maxFactor: maxFactor?.value, belowV: belowV?.value, fromV: fromV?.value, basis };
}

type Caps = PracticeTable['smallWireCaps'];

function caps(practice: Practice, metal: 'copper' | 'aluminium'): Caps {
  const capsA = new Map<number, number>();
  let basis: Basis | undefined;
  for (const row of readRows('small-wire-caps.csv', capsCsv)) {
    if (row.text('practice') !== practice || row.text('metal') !== metal) continue;
    const size = sizeOf(row);
    if (size.system !== 'awg') throw new Defect('small-wire-caps.csv holds AWG sizes');
    capsA.set(size.gauge, row.number('largestA'));
    basis ??= basisOf(row, row.text('clause'));
  }
  return basis === undefined ? undefined : { capsA, basis };
}

type From = 'unfusedFromBattery' | 'unfusedElsewhere' | 'chargingSource';

function unfused(practice: Practice, from: From, words: string): UnfusedLength {
  return { openM: optional(practice, `${from}.openM`), sheathedM: optional(practice, `${from}.sheathedM`), words };
}

/** Falling temperatures, each row reaching down from the one above it. */
const coldFactors: readonly ColdVoltsFactor[] = readRows('cold-volts.csv', coldVoltsCsv).map((row) => ({
  downToDegC: row.number('downToDegC'),
  factor: clauseFigure(row, 'factor'),
}));

function solar(practice: Practice): SolarPractice {
  return {
    currentFactor: required(practice, 'solar.currentFactor'),
    cableFactor: optional(practice, 'solar.cableFactor'),
    moduleFuseFactor: required(practice, 'solar.moduleFuseFactor'),
    fuseFromStrings: optional(practice, 'solar.fuseFromStrings'),
    fuseLowFactor: required(practice, 'solar.fuseLowFactor'),
    fuseHighFactor: optional(practice, 'solar.fuseHighFactor'),
    coldFactors,
  };
}

/** A book that says nothing else of charging sources treats them as any other. */
function chargingSource(practice: Practice, words: string): UnfusedLength {
  const own = unfused(practice, 'chargingSource', words);
  return own.openM === undefined ? unfused(practice, 'unfusedElsewhere', words) : own;
}

interface Words {
  readonly name: string;
  readonly books: string;
  readonly standardRatings: string;
  readonly fromBattery: string;
  readonly elsewhere: string;
}

function practiceTable(practice: Practice, words: Words): PracticeTable {
  return {
    name: words.name,
    books: words.books,
    fuseOverCableBelow50V: required(practice, 'fuseOverCableBelow50V'),
    fuseOverCableFrom50V: required(practice, 'fuseOverCableFrom50V'),
    nextSizeUp: nextSizeUp(practice),
    standardRatings: words.standardRatings,
    smallWireCaps: caps(practice, 'copper'),
    smallAluminiumCaps: caps(practice, 'aluminium'),
    dropCritical: required(practice, 'dropCritical'),
    dropOrdinary: required(practice, 'dropOrdinary'),
    continuousFactor: required(practice, 'continuousFactor'),
    unfusedFromBattery: unfused(practice, 'unfusedFromBattery', words.fromBattery),
    unfusedElsewhere: unfused(practice, 'unfusedElsewhere', words.elsewhere),
    chargingSource: chargingSource(practice, words.elsewhere),
    crankingUnfusedUpToV: optional(practice, 'crankingUnfusedUpToV'),
    ringTerminals: required(practice, 'ringTerminals'),
    dropWithAc: required(practice, 'dropWithAc'),
    isolatorWithinM: optional(practice, 'isolatorWithinM'),
    generatorFuseFactor: optional(practice, 'generatorFuseFactor'),
    clauses: clausesOf(practice),
    smallestSingle: sizes.get(`${practice} smallestSingle`),
    smallestSheathed: sizes.get(`${practice} smallestSheathed`),
    smallestParalleled: sizes.get(`${practice} smallestParalleled`),
    strandedCopperOnly: optional(practice, 'strandedCopperOnly')?.basis,
    smallestBond: sizes.get(`${practice} smallestBond`),
    bondAtLeastLead: optional(practice, 'bondAtLeastLead')?.basis,
    solar: solar(practice),
  };
}

export const practices: Readonly<Record<Practice, PracticeTable>> = {
  'us-land': practiceTable('us-land', {
    name: 'Land, United States',
    books: 'NEC (NFPA 70), tables of the 2023 edition',
    standardRatings: 'nec_240_6A_fuse',
    fromBattery: 'as close to the battery as practicable',
    elsewhere: 'where the conductor receives its supply',
  }),
  'us-marine': practiceTable('us-marine', {
    name: 'Boats, United States',
    books: '33 CFR 183 subpart I; ABYC E-11 where the law is silent',
    standardRatings: 'nec_240_6A_fuse',
    fromBattery: 'within 7 in of the battery, 72 in if sheathed throughout',
    elsewhere: 'within 7 in of the source, 40 in if sheathed or enclosed throughout',
  }),
  'iso-marine': practiceTable('iso-marine', {
    name: 'Small craft, international',
    books: 'ISO 13297:2020 (formerly ISO 10133:2012), ampacity table from memory',
    standardRatings: 'iec_60269_gG_series',
    fromBattery: 'within 200 mm of the battery',
    elsewhere: 'within 200 mm of the source',
  }),
  'iec-land': practiceTable('iec-land', {
    name: 'Land, IEC countries',
    books: 'IEC 60364-4-43 and 60364-5-52, partly from memory',
    standardRatings: 'iec_60269_gG_series',
    fromBattery: 'as close to the battery as practicable, the unprotected piece mechanically protected',
    elsewhere: 'at most 3 m along, without a branch, with low fault and fire risk',
  }),
};
