/** Invented jobs and hand-made answers for the tests of the report: no engine runs here. */
import type { CheckReport } from '../../core/checks/finding.ts';
import type { CheckedJob, OperatingCase } from '../../core/job/job.ts';
import type { Part, PartId } from '../../core/job/part.ts';
import { cablesOfPair, junctionsOf } from '../../core/job/part.ts';
import type { Assumption, OperatingPoint, PartAnswer, Proof } from '../../core/network/answer.ts';
import type { ReportInput } from '../../core/report/input.ts';
import type { Basis } from '../../core/tables/status.ts';
import type { Tables } from '../../core/tables/tables.ts';

type Loose = Readonly<Record<string, unknown>>;

/** A part with the contract's defaults for what the test does not say. */
export function part(fields: Loose): Part {
  const defaults: Loose = {
    origin: new Map(),
    range: new Map(),
    given: new Set(Object.keys(fields)),
    inParallel: 1,
    endOhm: 0,
    linkOhm: 0,
    segmentOhm: 0,
    stateOfCharge: 1,
  };
  const state: Loose = ['fuse', 'breaker', 'switch'].includes(String(fields['kind']))
    ? { state: 'closed' }
    : { on: true };
  return { ...defaults, ...state, ...fields } as unknown as Part;
}

export function job(fields: Loose & { readonly parts: readonly Part[] }): CheckedJob {
  return {
    title: 'Untitled',
    practice: 'iec-land',
    site: {},
    junctions: new Map(),
    cases: [{ id: 'as-drawn', label: undefined, changed: new Map() }],
    demand: [],
    targets: {},
    readings: [],
    settings: {},
    extra: new Map(),
    ...fields,
  } as unknown as CheckedJob;
}

export const PUBLISHED: Basis = {
  source: 'SRC-IEC60228',
  text: 'IEC 60228:2004, conductors of insulated cables, table 3',
  status: 'published',
};
export const CUSTOM: Basis = { source: 'SRC-PRACTICE', text: 'common practice, no source', status: 'common-practice' };
export const REMEMBERED: Basis = {
  source: 'SRC-ISO13297',
  text: 'ISO 13297:2020, electrical systems of small craft, clause 12',
  status: 'from-memory',
};

/** The little of the tables that the report reads itself. */
export const tables = {
  practices: {
    'us-land': { name: 'Land, United States', books: 'NEC (NFPA 70) articles 240, 310, 480, 690, 706' },
    'us-marine': { name: 'Small craft, United States', books: '33 CFR 183 subpart I; ABYC E-11' },
    'iso-marine': { name: 'Small craft, ISO', books: 'ISO 13297' },
    'iec-land': { name: 'Land, IEC', books: 'IEC 60364 series; IEC 62485-2' },
  },
  conductors: {
    awgFormula: PUBLISHED,
    metricResistance: [],
    usResistance: [],
    saeAreaCmil: new Map(),
    autoAreaMm2: new Map(),
  },
} as unknown as Tables;

const BALANCED: Proof = {
  worstJunctionA: 2.1e-12,
  worstJunction: 'BUS+' as Proof['worstJunction'],
  worstLoopV: 3.4e-14,
  powerInW: 1204.6,
  powerOutW: 1180.2,
  heatW: 24.4,
  mismatchW: 1.7e-11,
  relativeResidual: 6.2e-17,
  iterations: 5,
  holds: true,
};

/** An answer for every part and junction; figures made up by a rule so that they differ and look like volts and amps. */
export function point(of: CheckedJob, fields: Partial<OperatingPoint> & { readonly case: string }): OperatingPoint {
  const parts = of.parts.flatMap((one): readonly Part[] => (one.kind === 'pair' ? cablesOfPair(one) : [one]));
  const junctions = new Map(
    [...new Set(parts.flatMap(junctionsOf))].map((junction, index) => [
      junction,
      String(junction).includes('-') || String(junction).startsWith('B−') ? index * 0.013 : 25.6 - index * 0.037,
    ]),
  );
  return {
    model: 'slow',
    outcome: 'solved',
    junctions,
    parts: new Map(parts.map((one, index) => [one.id, answerOf(one, index)])),
    proof: BALANCED,
    remarks: [],
    assumptions: [],
    ...fields,
  };
}

function answerOf(one: Part, index: number): PartAnswer {
  const currentA = 57.46 - index * 1.37;
  const twoEnded = 'from' in one && typeof one.from === 'string';
  if (one.kind === 'busbar')
    return {
      id: one.id,
      currentA,
      voltageV: null,
      powerW: 0,
      dropV: null,
      segmentsA: one.junctions.slice(1).map((_, step) => currentA - step * 4.2),
    };
  if (twoEnded) {
    const dropV = 0.004 + index * 0.0037;
    const warm = one.kind === 'cable' ? { conductorDegC: 31.4 + index } : {};
    return { id: one.id, currentA, voltageV: dropV, dropV, powerW: Math.abs(currentA) * dropV, ...warm };
  }
  if (one.kind === 'controller' || one.kind === 'converter') {
    return {
      id: one.id,
      currentA,
      voltageV: 25.1,
      powerW: 12.2,
      dropV: null,
      inputV: 74.3,
      inputA: 8.71,
      outputV: 26.4,
      outputA: 23.3,
      state: 'tracking',
    };
  }
  return { id: one.id, currentA, voltageV: 25.33 - index * 0.05, powerW: currentA * 25.2, dropV: null };
}

export function assumption(
  partId: string | null,
  field: string,
  value: number | string,
  fields: Partial<Assumption> = {},
): Assumption {
  return {
    part: partId as PartId | null,
    field,
    value,
    unit: '',
    range: null,
    origin: 'default',
    basis: CUSTOM,
    text: `${field}${partId === null ? '' : ` of ${partId}`} taken as ${value}`,
    ...fields,
  };
}

/** Three strings at a ridge, an inverter, a solar array, some loads: a job as a small firm would hand over. Invented. */
export function cabinJob(): CheckedJob {
  const strings = ['A', 'B', 'C'].map((letter, index) =>
    part({
      id: `S-${letter}`,
      kind: 'string',
      label: index === 2 ? 'String C, replaced last year' : `String ${letter}`,
      locationTag: 'battery box',
      plus: `${letter}+`,
      minus: `${letter}−`,
      chemistry: 'agm',
      blocksInSeries: 2,
      blockNominalV: 12,
      capacityAh: 200,
      stateOfCharge: 0.8,
      ageYears: index === 2 ? 1 : 6,
      temperatureDegC: 8,
      ...(index === 2
        ? {
            resistanceOhm: 0.0061,
            origin: new Map([['resistanceOhm', 'measured']]),
            range: new Map([['resistanceOhm', [0.0058, 0.0064]]]),
          }
        : {}),
    }),
  );
  const links = ['A', 'B', 'C'].flatMap((letter) => [
    part({
      id: `L${letter}+`,
      kind: 'cable',
      from: `${letter}+`,
      to: `F${letter}`,
      lengthM: 0.6,
      size: { system: 'mm2', areaMm2: 35 },
      metal: 'copper',
      stranding: 'flexible',
      insulationDegC: 90,
      run: 'free-air',
      endOhm: 0.0002,
    }),
    part({
      id: `F-${letter}`,
      kind: 'fuse',
      label: `String fuse ${letter}`,
      type: 'class T',
      from: `F${letter}`,
      to: 'BUS+',
      ratingA: 125,
      ratingV: 125,
      interruptA: 20000,
      distanceFromSourceM: 0.6,
      sheathed: true,
      resistanceOhm: 0.0005,
    }),
    part({
      id: `L${letter}−`,
      kind: 'cable',
      from: 'BUS−',
      to: `${letter}−`,
      lengthM: 0.9,
      size: { system: 'mm2', areaMm2: 35 },
      metal: 'copper',
      stranding: 'flexible',
      insulationDegC: 90,
      run: 'free-air',
      endOhm: 0.0002,
    }),
  ]);
  const rest = [
    part({ id: 'BAR+', kind: 'busbar', junctions: ['BUS+', 'BUS+2', 'BUS+3'], ratingA: 250, segmentOhm: 0.00004 }),
    part({
      id: 'Q1',
      kind: 'switch',
      label: 'Main switch',
      from: 'BUS+3',
      to: 'MAIN+',
      ratingA: 275,
      ratingV: 48,
      loadBreak: true,
      resistanceOhm: 0.00015,
    }),
    part({ id: 'SH1', kind: 'shunt', from: 'RET', to: 'BUS−', ratingA: 300, ratingMv: 50 }),
    part({
      id: 'F-INV',
      kind: 'fuse',
      label: 'Inverter fuse',
      type: 'class T',
      from: 'MAIN+',
      to: 'INVF',
      ratingA: 200,
      ratingV: 125,
      interruptA: 20000,
    }),
    part({
      id: 'C-INV+',
      kind: 'cable',
      from: 'INVF',
      to: 'INV+',
      lengthM: 1.8,
      size: { system: 'awg', gauge: -1 },
      metal: 'copper',
      insulationDegC: 105,
      run: 'conduit',
    }),
    part({
      id: 'C-INV−',
      kind: 'cable',
      from: 'INV−',
      to: 'RET',
      lengthM: 1.8,
      size: { system: 'awg', gauge: -1 },
      metal: 'copper',
      insulationDegC: 105,
      run: 'conduit',
    }),
    part({
      id: 'INV1',
      kind: 'inverter',
      label: 'Inverter',
      plus: 'INV+',
      minus: 'INV−',
      ratedW: 3000,
      acPowerW: 900,
      surgeW: 6000,
      efficiency: 0.9,
      standbyW: 18,
      cutoffV: 21,
    }),
    part({
      id: 'B-DC',
      kind: 'breaker',
      label: 'Lighting and pump breaker',
      from: 'MAIN+',
      to: 'DCB',
      ratingA: 25,
      ratingV: 80,
      manualReset: true,
    }),
    part({
      id: 'W-FRIDGE',
      kind: 'pair',
      label: 'Run to the refrigerator in the back kitchen',
      from: { plus: 'DCB', minus: 'RET' },
      to: { plus: 'FR+', minus: 'FR−' },
      lengthM: 7.3,
      size: { system: 'mm2', areaMm2: 6 },
      metal: 'tinned-copper',
      run: 'bundle',
      loadedConductors: 4,
    }),
    part({
      id: 'FRIDGE',
      kind: 'load',
      label: 'Refrigerator',
      plus: 'FR+',
      minus: 'FR−',
      powerW: 120,
      minimumV: 21,
      surgeW: 480,
      surgeS: 0.5,
      continuous: true,
      dropClass: 'ordinary',
    }),
    part({
      id: 'W-RADIO',
      kind: 'pair',
      from: { plus: 'DCB', minus: 'RET' },
      to: { plus: 'RA+', minus: 'RA−' },
      lengthM: 4.2,
      size: { system: 'mm2', areaMm2: 2.5 },
    }),
    part({
      id: 'RADIO',
      kind: 'load',
      label: 'Radio link',
      plus: 'RA+',
      minus: 'RA−',
      currentA: 1.8,
      dropClass: 'critical',
    }),
    part({
      id: 'PV',
      kind: 'array',
      label: 'Roof array',
      plus: 'PV+',
      minus: 'PV−',
      modulesInSeries: 2,
      stringsInParallel: 2,
      vocV: 45.6,
      iscA: 9.4,
      vmpV: 37.8,
      impA: 8.9,
      vocPerDegC: -0.0029,
      tiltDeg: 55,
      azimuthDeg: 180,
      maxFuseA: 15,
    }),
    part({
      id: 'MPPT',
      kind: 'controller',
      label: 'Solar controller',
      type: 'mppt',
      from: { plus: 'PV+', minus: 'PV−' },
      to: { plus: 'BUS+2', minus: 'BUS−' },
      outputA: 40,
      maxInputV: 150,
      setpointV: 28.4,
    }),
    part({
      id: 'GEN',
      kind: 'charger',
      label: 'Generator charger',
      source: 'generator',
      plus: 'BUS+2',
      minus: 'BUS−',
      outputA: 50,
      setpointV: 28.8,
      on: false,
    }),
    part({ id: 'J-RET', kind: 'joint', from: 'RET', to: 'RET2', resistanceOhm: 0.00012 }),
    part({ id: 'E1', kind: 'bond', from: 'BUS−', to: 'earth', size: { system: 'mm2', areaMm2: 16 }, lengthM: 3.5 }),
  ];
  const all = [...strings, ...links, ...rest];
  const night: OperatingCase = {
    id: 'winter-night',
    label: 'Winter night',
    ambientDegC: -5,
    irradianceWPerM2: 0,
    surge: undefined,
    changed: new Map(
      all.filter(({ kind }) => kind === 'string').map((one) => [one.id, { ...one, stateOfCharge: 0.5 } as Part]),
    ),
  };
  const day: OperatingCase = {
    id: 'sunny-day',
    label: 'Sunny day, nobody at home',
    ambientDegC: 12,
    irradianceWPerM2: 800,
    surge: undefined,
    changed: new Map(all.filter(({ id }) => id === 'INV1').map((one) => [one.id, { ...one, on: false } as Part])),
  };
  const surge: OperatingCase = {
    id: 'saw-start',
    label: 'Saw starting',
    ambientDegC: -5,
    irradianceWPerM2: 0,
    surge: 'INV1' as PartId,
    changed: new Map(),
  };
  return job({
    title: 'Ridge cabin: three 24 V strings',
    preparedFor: 'The hut association (invented)',
    preparedBy: 'A. Writer',
    practiceEdition: 'IEC 60364-4-43:2008, as adopted locally',
    notes: 'Invented for a test. Two strings are six years old, one was replaced.',
    parts: all,
    cases: [night, day, surge],
    demand: [
      {
        label: 'Lights',
        powerW: 8,
        quantity: 9,
        hoursPerDay: [5, 5, 4, 3, 3, 2, 2, 3, 3, 4, 5, 6],
        supply: 'dc',
        together: true,
      },
      {
        label: 'Washing machine',
        powerW: 700,
        quantity: 1,
        hoursPerDay: Array.from({ length: 12 }, () => 0.4),
        supply: 'ac',
        surgeW: 2100,
        together: false,
      },
    ],
    readings: [
      {
        id: 'R1',
        case: 'winter-night',
        quantity: 'voltage',
        plus: 'BUS+',
        minus: 'BUS−',
        valueV: 25.02,
        meter: 'handheld',
        set: 'as-found',
        takenAt: '2025-01-14',
        takenBy: 'A. W.',
      },
      {
        id: 'R2',
        case: 'winter-night',
        quantity: 'current',
        part: 'S-A',
        valueA: 12.4,
        standardUncertainty: 0.5,
        set: 'as-found',
      },
    ],
  });
}

export const cabinChecks: CheckReport = {
  findings: [
    {
      rule: 'drop',
      severity: 'look',
      parts: ['W-FRIDGE.plus', 'W-FRIDGE.minus'] as PartId[],
      case: 'winter-night',
      measured: { value: 0.041, unit: '1' },
      limit: { value: 0.03, unit: '1' },
      message: 'The run to the refrigerator drops 4.1 % of 24 V, more than the 3 % set for it.',
      remedy: 'Use 10 mm² for the run, or bring the refrigerator nearer.',
      basis: 'common practice, no source',
      basisStatus: 'common-practice',
    },
    {
      rule: 'interrupt',
      severity: 'stop',
      parts: ['F-INV'] as PartId[],
      case: 'saw-start',
      measured: { value: 8120, unit: 'A' },
      limit: { value: 5000, unit: 'A' },
      message: 'A short circuit behind the inverter fuse can draw 8120 A; the fuse holder is marked to break 5000 A.',
      remedy: 'Fit a fuse and holder that break at least 10 000 A at 32 V DC or more.',
      basis: 'IEC 60364-4-43:2008, clause 434.5.1',
      basisStatus: 'published',
    },
    {
      rule: 'string-age',
      severity: 'fix',
      parts: ['S-A', 'S-B', 'S-C'] as PartId[],
      case: '',
      measured: { value: 5, unit: 'years' },
      limit: { value: 1, unit: 'years' },
      message: 'String C is five years younger than its neighbours and takes more than its share.',
      remedy: 'Replace all three together, or run the new one on its own.',
      basis: 'common practice, no source',
      basisStatus: 'common-practice',
    },
    {
      rule: 'unfused-length',
      severity: 'note',
      parts: ['LA+'] as PartId[],
      case: '',
      measured: { value: 0.6, unit: 'm' },
      limit: { value: 1.8, unit: 'm' },
      message: 'The lead from string A runs 0.6 m before its fuse; it is sheathed.',
      remedy: 'Nothing to do while the sheath is whole.',
      basis: 'ISO 13297:2020, clause 12.2',
      basisStatus: 'from-memory',
    },
  ],
  notChecked: [
    { rule: 'device-voltage', parts: ['F-INV'] as PartId[], missing: 'ratingV of fuse F-INV' },
    {
      rule: 'terminal-temperature',
      parts: ['C-INV+', 'C-INV−'] as PartId[],
      missing: 'insulationDegC of the inverter leads, and the temperature rating of the inverter terminals',
    },
  ],
  passed: [
    { rule: 'fuse-over-cable', count: 6 },
    { rule: 'load-below-fuse', count: 5 },
  ],
};

export function cabinInput(options: Partial<ReportInput['options']> = {}): ReportInput {
  const cabin = cabinJob();
  const assumptions = [
    assumption(null, 'ambientDegC', 25, {
      unit: 'degC',
      text: 'air around the parts taken as 25 degC, since neither the case nor the site gives one',
    }),
    assumption('S-A', 'resistanceOhm', 0.0096, {
      unit: 'ohm',
      range: [0.0064, 0.0144],
      basis: REMEMBERED,
      text: 'resistanceOhm of S-A from its chemistry, size and charge',
    }),
    assumption('S-B', 'resistanceOhm', 0.0096, {
      unit: 'ohm',
      range: [0.0064, 0.0144],
      basis: REMEMBERED,
      text: 'resistanceOhm of S-B from its chemistry, size and charge',
    }),
    assumption('S-A', 'emfV', 25.31, {
      unit: 'V',
      range: [25.1, 25.5],
      basis: REMEMBERED,
      text: 'emfV of S-A from its chemistry, size and charge',
    }),
    assumption('C-INV+', 'conductor', 'stranded copper taken, since the job does not say', {
      basis: PUBLISHED,
      text: 'stranded copper taken, since the job does not say',
    }),
    assumption('C-INV−', 'conductor', 'stranded copper taken, since the job does not say', {
      basis: PUBLISHED,
      text: 'stranded copper taken, since the job does not say',
    }),
    assumption('MPPT', 'efficiency', 0.95, {
      unit: '1',
      range: [0.92, 0.98],
      text: 'efficiency of MPPT taken as 0.95',
    }),
  ];
  const wanted = 6666.7;
  const collapsed = point(cabin, {
    case: 'saw-start',
    outcome: 'collapse',
    parts: new Map(),
    junctions: new Map(),
    assumptions: assumptions.slice(0, 3),
    collapse: {
      load: 'INV1' as PartId,
      wantedW: wanted,
      largestDeliverableW: 5120,
      message: 'with the other loads as drawn, the bank and its leads hold no more',
    },
  });
  return {
    job: cabin,
    tables,
    points: [
      point(cabin, { case: 'winter-night', assumptions }),
      point(cabin, { case: 'sunny-day', assumptions: assumptions.slice(0, 4) }),
      collapsed,
    ],
    checkReport: cabinChecks,
    options: { programVersion: '0.1.0', preparedOn: '2025-03-31', ...options },
  };
}
