/** The banks of the acceptance scenarios as parts of a job: the book's figures, entered as a person would. */
import { inputsOf, lugOhm, plainCopperOhm } from './scenariosBook.ts';

const mOhm = 0.001;

/** A lead of 35 mm2 with its two lugs. */
function lead(lengthM: number) {
  return {
    kind: 'cable',
    lengthM,
    resistanceOhm: plainCopperOhm({ lengthM, areaMm2: 35 }),
    endOhm: 2 * lugOhm,
  };
}

interface CabinBlock {
  readonly emf_V: number;
  readonly r_mohm: number;
}
const cabinBlocks = (inputsOf('S01') as { blocks: Record<'A,B' | 'C', CabinBlock> }).blocks;

/** Rest volts of the cabin's older strings. */
export const cabinOldV = 2 * cabinBlocks['A,B'].emf_V;

/** A string with its two leads: each 1.2 m of 35 mm2 and two lugs; the 0.3 m link and its two lugs are the string's. */
function cabinString(id: string, block: CabinBlock, capacityAh: number) {
  return [
    {
      id,
      kind: 'string',
      plus: `${id}+`,
      minus: `${id}-`,
      chemistry: 'agm',
      blocksInSeries: 2,
      blockNominalV: 12,
      capacityAh,
      linkOhm: plainCopperOhm({ lengthM: 0.3, areaMm2: 35 }) + 2 * lugOhm,
      emfV: 2 * block.emf_V,
      resistanceOhm: 2 * block.r_mohm * mOhm,
    },
    { ...lead(1.2), id: `${id} plus lead`, from: `${id}+`, to: 'bus+' },
    { ...lead(1.2), id: `${id} minus lead`, from: 'bus-', to: `${id}-` },
  ];
}

/** S01: three 24 V strings, string C replaced last year. */
export const ridgeCabin = {
  parts: [
    ...cabinString('A', cabinBlocks['A,B'], 150),
    ...cabinString('B', cabinBlocks['A,B'], 150),
    ...cabinString('C', cabinBlocks.C, 200),
    { id: 'house', kind: 'load', plus: 'bus+', minus: 'bus-', currentA: 80, on: false },
    // 60 A of charge is a charger far below its set-point: it gives its limit and nothing else.
    { id: 'charger', kind: 'charger', plus: 'bus+', minus: 'bus-', outputA: 60, setpointV: 60, on: false },
  ],
  junctions: { 'bus-': { reference: true } },
  cases: [
    { id: 'nothing on' },
    { id: 'load', set: { house: { on: true } } },
    { id: 'charge', set: { charger: { on: true } } },
    { id: 'load with equal volts', set: { house: { on: true }, C: { emfV: cabinOldV } } },
  ],
};

function camperBlock(id: string, leadM: number) {
  return [
    {
      id,
      kind: 'string',
      plus: `${id}+`,
      minus: `${id}-`,
      chemistry: 'lfp',
      blocksInSeries: 1,
      blockNominalV: 12.8,
      capacityAh: 100,
      emfV: 13.2,
      resistanceOhm: 2.5 * mOhm,
    },
    { ...lead(leadM), id: `${id} plus lead`, from: `${id}+`, to: 'bus+' },
    { ...lead(leadM), id: `${id} minus lead`, from: 'bus-', to: `${id}-` },
  ];
}

/** S03: two lithium blocks on leads of 0.5 m and 2.0 m, 150 A. */
export const camper = {
  parts: [
    ...camperBlock('near', 0.5),
    ...camperBlock('far', 2),
    { id: 'load', kind: 'load', plus: 'bus+', minus: 'bus-', currentA: 150 },
  ],
  junctions: { 'bus-': { reference: true } },
};

const sauna = inputsOf('S17') as { leads_m: readonly number[]; r_mohm: number };
/** The sauna's blocks cut out here. */
export const saunaLimitA = 100;

/** A block behind its own disconnect (a switch without resistance), on two leads with two lugs each. */
function saunaBlock(index: number) {
  const id = `block ${index + 1}`;
  const lengthM = sauna.leads_m[index]!;
  return [
    {
      id,
      kind: 'string',
      plus: `${id} +`,
      minus: `${id} -`,
      chemistry: 'lfp',
      blocksInSeries: 1,
      blockNominalV: 12.8,
      capacityAh: 200,
      emfV: 13.2,
      resistanceOhm: sauna.r_mohm * mOhm,
      maxDischargeA: saunaLimitA,
    },
    { id: `limit ${index + 1}`, kind: 'switch', from: `${id} +`, to: `${id} out` },
    { ...lead(lengthM), id: `${id} plus lead`, from: `${id} out`, to: 'bus+' },
    { ...lead(lengthM), id: `${id} minus lead`, from: 'bus-', to: `${id} -` },
  ];
}

/** S17: three lithium blocks that cut out at 100 A, a load of 240 A. */
export const saunaHut = {
  parts: [...[0, 1, 2].flatMap(saunaBlock), { id: 'load', kind: 'load', plus: 'bus+', minus: 'bus-', currentA: 240 }],
};

const boat = inputsOf('S19') as {
  emf: readonly number[];
  r_mohm: readonly number[];
  branch_cable_mohm: number;
};

/** S19: one of three parallel blocks has a dead cell. */
export const hireBoat = {
  parts: boat.emf.map((emfV, index) => ({
    id: `block ${index + 1}`,
    kind: 'string',
    plus: 'bus+',
    minus: 'bus-',
    chemistry: 'flooded',
    blocksInSeries: 1,
    blockNominalV: 12,
    capacityAh: 100,
    emfV,
    resistanceOhm: boat.r_mohm[index]! * mOhm,
    linkOhm: boat.branch_cable_mohm * mOhm,
  })),
};

const farm = inputsOf('S13') as { '24V': readonly number[]; '48V_from_negative': readonly number[] };

/** S13: what a meter read along a 24 V bank and a 48 V bank of 12 V blocks; every block a string of its own. */
export function hillFarm() {
  const row = (name: string, volts: readonly number[]) => ({
    parts: volts.map((_, index) => ({
      id: `${name} block ${index + 1}`,
      kind: 'string',
      minus: `${name} ${index}`,
      plus: `${name} ${index + 1}`,
      chemistry: 'flooded',
      blocksInSeries: 1,
      blockNominalV: 12,
      capacityAh: 200,
    })),
    readings: volts.map((valueV, index) => ({
      id: `${name} read ${index + 1}`,
      quantity: 'voltage',
      case: 'absorption',
      plus: `${name} ${index + 1}`,
      minus: `${name} ${index}`,
      valueV,
    })),
  });
  const rows = [row('24 V', farm['24V']), row('48 V', farm['48V_from_negative'])];
  return {
    parts: rows.flatMap(({ parts }) => parts),
    cases: [{ id: 'absorption' }],
    readings: rows.flatMap(({ readings }) => readings),
  };
}
