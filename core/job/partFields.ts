/** The fields of every kind of part, as the job-file contract states them: what each holds, what is required, what is the default. */
import type { Field, Fields } from './field.ts';
import type { ConductorFields, Part, PartKind } from './part.ts';

/** Fields that are read alike for all kinds. */
type Common =
  | 'kind'
  | 'id'
  | 'label'
  | 'note'
  | 'locationTag'
  | 'enclosure'
  | 'at'
  | 'origin'
  | 'range'
  | 'given'
  | 'extra';
type FieldsOf<T> = { readonly [F in Exclude<keyof T, Common>]-?: Field };

const required = { required: true } as const;

// Bounds below are against slips of the keyboard: wider than anything of this trade, so that they refuse no real part. No source.
const volts: Field = { rule: { holds: 'quantity', unit: 'V', above: 0, atMost: 5000 } };
const amps: Field = { rule: { holds: 'quantity', unit: 'A', atLeast: 0, atMost: 1e6 } };
const ratingAmps: Field = { rule: { holds: 'quantity', unit: 'A', above: 0, atMost: 1e6 } };
const ohms: Field = { rule: { holds: 'quantity', unit: 'ohm', atLeast: 0, atMost: 1e6 } };
const watts: Field = { rule: { holds: 'quantity', unit: 'W', atLeast: 0, atMost: 1e7 } };
const metres: Field = { rule: { holds: 'quantity', unit: 'm', atLeast: 0, atMost: 1e5 } };
const airTemperature: Field = { rule: { holds: 'quantity', unit: 'degC', atLeast: -90, atMost: 150 } };
const conductorTemperature: Field = { rule: { holds: 'quantity', unit: 'degC', atLeast: -90, atMost: 400 } };
const efficiency: Field = { rule: { holds: 'quantity', unit: '1', above: 0, atMost: 1 } };
const seconds: Field = { rule: { holds: 'quantity', unit: 's', above: 0, atMost: 3600 } };
const surgeTime: Field = { rule: { holds: 'quantity', unit: 's', atLeast: 0, atMost: 3600 } };
const fuseEnergy: Field = { rule: { holds: 'quantity', unit: 'A2s', above: 0, atMost: 1e12 } };
const ratedTemperature: Field = { rule: { holds: 'quantity', unit: 'degC', above: 0, atMost: 400 } };
const perDegree: Field = { rule: { holds: 'quantity', unit: '1/K', atLeast: -0.02, atMost: 0.02 } };
const flag: Field = { rule: { holds: 'flag' } };
const flagOn: Field = { rule: { holds: 'flag' }, standard: true };
const text: Field = { rule: { holds: 'text', longest: 200 } };
const size: Field = { rule: { holds: 'size' } };
const junction: Field = { rule: { holds: 'junction' }, ...required };
const poles: Field = { rule: { holds: 'poles' }, ...required };
const state: Field = { rule: { holds: 'choice', of: ['closed', 'open'] }, standard: 'closed' };
const howMany: Field = { rule: { holds: 'count', atLeast: 1, atMost: 10_000 } };

const twoPoles = { plus: junction, minus: junction };
const twoEnds = { from: junction, to: junction };
const twoPorts = { from: poles, to: poles };

const conductor: FieldsOf<ConductorFields> = {
  inParallel: { ...howMany, standard: 1 },
  metal: { rule: { holds: 'choice', of: ['copper', 'tinned-copper', 'aluminium'] } },
  stranding: { rule: { holds: 'choice', of: ['solid', 'stranded', 'flexible'] } },
  insulationDegC: ratedTemperature,
  run: { rule: { holds: 'choice', of: ['free-air', 'conduit', 'bundle', 'engine-space', 'buried'] } },
  loadedConductors: howMany,
  ambientDegC: airTemperature,
  conductorDegC: conductorTemperature,
  endOhm: { ...ohms, standard: 0 },
  sheathed: flag,
  resistanceOhm: ohms,
};

/** What may stand by a spark. */
const spark = { inBatterySpace: flag, ignitionProtected: flag };
/** What the papers of a consumer or charger say of its wiring. */
const device = { nominalV: volts, maxFuseA: ratingAmps, terminalDegC: ratedTemperature };

const protective = {
  ...twoEnds,
  ratingA: { ...ratingAmps, ...required },
  type: text,
  ratingV: volts,
  interruptA: ratingAmps,
  state,
  resistanceOhm: ohms,
  distanceFromSourceM: metres,
  sheathed: flag,
  ambientDegC: airTemperature,
  terminalDegC: ratedTemperature,
  dcRated: flag,
  curvePoints: { rule: { holds: 'curve' } },
  preArcI2t: fuseEnergy,
  totalI2t: fuseEnergy,
  accessible: flag,
  covered: flag,
  ...spark,
} as const;

type AllPartFields = { readonly [K in PartKind]: FieldsOf<Extract<Part, { kind: K }>> };

const tables: AllPartFields = {
  string: {
    ...twoPoles,
    chemistry: { rule: { holds: 'choice', of: ['flooded', 'agm', 'gel', 'lfp', 'nmc', 'nicd'] }, ...required },
    blocksInSeries: { ...howMany, ...required },
    blockNominalV: { ...volts, ...required },
    capacityAh: { rule: { holds: 'quantity', unit: 'Ah', above: 0, atMost: 1e6 }, ...required },
    stateOfCharge: { rule: { holds: 'quantity', unit: '1', atLeast: 0, atMost: 1 }, standard: 1 },
    temperatureDegC: airTemperature,
    ageYears: { rule: { holds: 'quantity', unit: 'year', atLeast: 0, atMost: 100 } },
    emfV: volts,
    resistanceOhm: ohms,
    linkOhm: { ...ohms, standard: 0 },
    linkSize: size,
    maxChargeA: amps,
    maxDischargeA: amps,
    shortCircuitA: ratingAmps,
    midpoint: { rule: { holds: 'junction' } },
    crankingA: ratingAmps,
    maxFuseA: ratingAmps,
    lowCutoffV: volts,
    heldDown: flag,
    besideFuel: flag,
    springClip: flag,
    covered: flag,
    ventOpeningCm2: { rule: { holds: 'quantity', unit: 'cm2', atLeast: 0, atMost: 1e6 } },
    ventAirM3PerH: { rule: { holds: 'quantity', unit: 'm3/h', atLeast: 0, atMost: 1e6 } },
    lowTemperatureCutoff: flag,
  },
  cable: { ...twoEnds, ...conductor, lengthM: { ...metres, ...required }, size },
  pair: {
    ...twoPorts,
    ...conductor,
    lengthM: { ...metres, ...required },
    size,
    minusSize: size,
    minusLengthM: metres,
  },
  busbar: {
    junctions: { rule: { holds: 'junction-list' }, ...required },
    ratingA: ratingAmps,
    ratingV: volts,
    segmentOhm: { ...ohms, standard: 0 },
    withstandA: ratingAmps,
    withstandS: seconds,
    terminalDegC: ratedTemperature,
    covered: flag,
  },
  fuse: protective,
  breaker: { ...protective, manualReset: flag },
  switch: {
    ...twoEnds,
    ratingA: ratingAmps,
    ratingV: volts,
    state,
    loadBreak: flag,
    resistanceOhm: ohms,
    dcRated: flag,
    terminalDegC: ratedTemperature,
    shortTimeA: ratingAmps,
    accessible: flag,
    distanceFromSourceM: metres,
    lockable: flag,
    marked: flag,
    ...spark,
  },
  shunt: {
    ...twoEnds,
    ratingA: { ...ratingAmps, ...required },
    ratingMv: { rule: { holds: 'quantity', unit: 'mV', above: 0, atMost: 10_000 }, ...required },
  },
  joint: { ...twoEnds, resistanceOhm: { ...ohms, ...required }, springClip: flag, covered: flag },
  diode: {
    ...twoEnds,
    forwardV: { rule: { holds: 'quantity', unit: 'V', atLeast: 0, atMost: 100 } },
    slopeOhm: ohms,
    ratingA: ratingAmps,
  },
  load: {
    ...twoPoles,
    powerW: watts,
    currentA: amps,
    resistanceOhm: { rule: { holds: 'quantity', unit: 'ohm', above: 0, atMost: 1e9 } },
    on: flagOn,
    minimumV: volts,
    maximumV: volts,
    surgeW: watts,
    surgeS: surgeTime,
    continuous: flag,
    dropClass: { rule: { holds: 'choice', of: ['critical', 'ordinary'] } },
    cranking: flag,
    ...device,
  },
  inverter: {
    ...twoPoles,
    acPowerW: watts,
    ratedW: { rule: { holds: 'quantity', unit: 'W', above: 0, atMost: 1e7 }, ...required },
    surgeW: watts,
    efficiency: { rule: { holds: 'efficiency' } },
    standbyW: watts,
    cutoffV: volts,
    on: flagOn,
    surgeS: surgeTime,
    acDrop: { rule: { holds: 'quantity', unit: '1', atLeast: 0, below: 1 } },
    ...device,
  },
  array: {
    ...twoPoles,
    modulesInSeries: { ...howMany, ...required },
    stringsInParallel: { ...howMany, ...required },
    vocV: { ...volts, ...required },
    iscA: { ...ratingAmps, ...required },
    vmpV: { ...volts, ...required },
    impA: { ...ratingAmps, ...required },
    vocPerDegC: perDegree,
    iscPerDegC: perDegree,
    pmpPerDegC: perDegree,
    nominalCellDegC: { rule: { holds: 'quantity', unit: 'degC', atLeast: 20, atMost: 100 } },
    tiltDeg: { rule: { holds: 'quantity', unit: 'deg', atLeast: 0, atMost: 180 } },
    azimuthDeg: { rule: { holds: 'quantity', unit: 'deg', atLeast: -360, atMost: 360 } },
    maxFuseA: ratingAmps,
  },
  controller: {
    ...twoPorts,
    type: { rule: { holds: 'choice', of: ['mppt', 'pwm'] }, ...required },
    outputA: { ...ratingAmps, ...required },
    maxInputV: { ...volts, ...required },
    setpointV: { ...volts, ...required },
    efficiency,
    maxInputA: ratingAmps,
    maxFuseA: ratingAmps,
    terminalDegC: ratedTemperature,
    blocksAtNight: flag,
  },
  charger: {
    ...twoPoles,
    source: text,
    outputA: { ...ratingAmps, ...required },
    setpointV: { ...volts, ...required },
    on: flagOn,
    selfLimiting: flag,
    ...device,
    ...spark,
  },
  converter: {
    ...twoPorts,
    outputV: { ...volts, ...required },
    outputA: { ...ratingAmps, ...required },
    efficiency,
    standbyW: watts,
    on: flagOn,
    ...device,
  },
  bond: { ...twoEnds, size, lengthM: metres },
};

/** The fields of each kind of part. A kind not in the map is no kind of part. */
export const partFields: ReadonlyMap<string, Fields> = new Map(Object.entries(tables));

/** The fields that every part may have beside those of its kind; `origin` and `range` are read by `checkPart`. */
export const commonFields: Fields = {
  id: { rule: { holds: 'anything' } },
  kind: { rule: { holds: 'anything' } },
  label: text,
  note: { rule: { holds: 'text', longest: 10_000 } },
  locationTag: text,
  enclosure: text,
  at: { rule: { holds: 'point' } },
  origin: { rule: { holds: 'anything' } },
  range: { rule: { holds: 'anything' } },
};
