/** Hand-made answers and findings about an invented job, for what a real solve seldom gives: no engine runs here. */
import type { CheckReport } from '../../core/checks/finding.ts';
import type { CheckedJob } from '../../core/job/job.ts';
import type { Part, PartId } from '../../core/job/part.ts';
import { cablesOfPair, junctionsOf } from '../../core/job/part.ts';
import type { Assumption, OperatingPoint, PartAnswer, Proof } from '../../core/network/answer.ts';
import type { ReportInput } from '../../core/report/input.ts';
import type { Basis } from '../../core/tables/status.ts';
import { tables } from '../../data/index.ts';
import { checked } from './reportInput.ts';
import { cabin } from './reportJobs.ts';

const PUBLISHED: Basis = {
  source: 'SRC-IEC60228',
  text: 'IEC 60228:2004, conductors of insulated cables, table 3',
  status: 'published',
};
const CUSTOM: Basis = { source: 'SRC-PRACTICE', text: 'common practice, no source', status: 'common-practice' };
export const REMEMBERED: Basis = {
  source: 'SRC-ISO13297',
  text: 'ISO 13297:2020, electrical systems of small craft, clause 12',
  status: 'from-memory',
};

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
      String(junction).endsWith('-') ? index * 0.013 : 25.6 - index * 0.037,
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
      parts: ['C-INV+', 'C-INV-'] as PartId[],
      missing: 'insulationDegC of the inverter leads, and the temperature rating of the inverter terminals',
    },
  ],
  passed: [
    { rule: 'fuse-over-cable', count: 6 },
    { rule: 'load-below-fuse', count: 5 },
  ],
};

export function cabinInput(options: Partial<ReportInput['options']> = {}): ReportInput {
  const job = checked(cabin);
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
    assumption('C-INV-', 'conductor', 'stranded copper taken, since the job does not say', {
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
  const collapsed = point(job, {
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
    job,
    tables,
    points: [
      point(job, { case: 'winter-night', assumptions }),
      point(job, { case: 'sunny-day', assumptions: assumptions.slice(0, 4) }),
      collapsed,
    ],
    checkReport: cabinChecks,
    options: { programVersion: '0.1.0', preparedOn: '2025-03-31', ...options },
  };
}
