/** The fields of a job beside its parts, cases and readings: site, demand, targets, settings. */
import { described, type Field, type Fields, isRawObject, type Place } from './field.ts';
import type { IssueList } from './issueList.ts';
import type { DemandRow, Settings, Site, Targets } from './job.ts';
import { fieldPath, itemPath } from './path.ts';
import { readFields } from './readField.ts';

const anything: Field = { rule: { holds: 'anything' } };
const shortText: Field = { rule: { holds: 'text', longest: 1000 } };
const fraction: Field = { rule: { holds: 'quantity', unit: '1', atLeast: 0, atMost: 1 } };
const partOfOne: Field = { rule: { holds: 'quantity', unit: '1', above: 0, atMost: 1 } };
const airTemperature: Field = { rule: { holds: 'quantity', unit: 'degC', atLeast: -90, atMost: 90 } };

export const topFields: Fields = {
  format: anything,
  version: anything,
  title: shortText,
  notes: { rule: { holds: 'text', longest: 200_000 } },
  preparedFor: shortText,
  preparedBy: shortText,
  practice: { rule: { holds: 'choice', of: ['us-land', 'us-marine', 'iso-marine', 'iec-land'] } },
  practiceEdition: shortText,
  site: anything,
  junctions: anything,
  parts: anything,
  cases: anything,
  demand: anything,
  targets: anything,
  readings: anything,
  settings: anything,
};

export const junctionFields: Fields = {
  label: { rule: { holds: 'text', longest: 200 } },
  at: { rule: { holds: 'point' } },
  reference: { rule: { holds: 'flag' }, standard: false },
};

const flag: Field = { rule: { holds: 'flag' } };

export const siteFields: { readonly [F in keyof Site]-?: Field } = {
  latitudeDeg: { rule: { holds: 'quantity', unit: 'deg', atLeast: -90, atMost: 90 } },
  ambientMinDegC: airTemperature,
  ambientDesignDegC: airTemperature,
  ambientMaxDegC: airTemperature,
  irradiationKWhPerM2Day: { rule: { holds: 'numbers', length: 12, unit: 'kWh/m2/day', atLeast: 0, atMost: 15 } },
  albedo: fraction,
  gasolineSpace: flag,
  dampSpace: flag,
  sourceSign: flag,
};

export function checkSite(raw: unknown, issues: IssueList): Site {
  const place = { issues, path: 'site', owner: 'the site' };
  const site = readObject(raw, siteFields, place) as unknown as Site;
  const rising = [
    ['ambientMinDegC', 'ambientDesignDegC'],
    ['ambientDesignDegC', 'ambientMaxDegC'],
    ['ambientMinDegC', 'ambientMaxDegC'],
  ] as const;
  for (const [lower, upper] of rising) {
    const [low, high] = [site[lower], site[upper]];
    if (low === undefined || high === undefined || low <= high) continue;
    issues.add(fieldPath('site', upper), 'contradiction', () => {
      return `${upper} of the site (${String(high)} degC) is below ${lower} (${String(low)} degC).`;
    });
    break;
  }
  return site;
}

const targetFields: { readonly [F in keyof Targets]: Field } = {
  autonomyDays: { rule: { holds: 'quantity', unit: 'day', atLeast: 0, atMost: 365 } },
  maxDepthOfDischarge: partOfOne,
  systemV: { rule: { holds: 'quantity', unit: 'V', above: 0, atMost: 1500 } },
  chemistry: { rule: { holds: 'choice', of: ['flooded', 'agm', 'gel', 'lfp', 'nmc', 'nicd'] } },
  designMargin: { rule: { holds: 'quantity', unit: '1', atLeast: 0, atMost: 10 } },
  ageFactor: { rule: { holds: 'quantity', unit: '1', above: 0, atMost: 10 } },
  coldestBatteryDegC: airTemperature,
  wireLoss: { rule: { holds: 'quantity', unit: '1', atLeast: 0, below: 1 } },
  inverterEfficiency: partOfOne,
  batteryEfficiency: partOfOne,
  arrayDerate: partOfOne,
  lossOfLoad: { rule: { holds: 'quantity', unit: 'h', atLeast: 0, atMost: 8784 } },
  dropLimit: { rule: { holds: 'quantity', unit: '1', above: 0, below: 1 } },
};

export function checkTargets(raw: unknown, issues: IssueList): Targets {
  return readObject(raw, targetFields, { issues, path: 'targets', owner: 'the targets' }) as unknown as Targets;
}

const dropLimit: Field = { rule: { holds: 'quantity', unit: '1', above: 0, below: 1 } };

export const settingFields: { readonly [F in keyof Settings]: Field } = {
  dropCritical: dropLimit,
  dropOrdinary: dropLimit,
  nominalV: { rule: { holds: 'quantity', unit: 'V', above: 0, atMost: 1500 } },
  cableStopFactor: { rule: { holds: 'quantity', unit: '1', atLeast: 1, atMost: 10 }, standard: 1.2 },
  continuousFactor: { rule: { holds: 'quantity', unit: '1', atLeast: 1, atMost: 10 }, standard: 1.25 },
  shareLimit: { rule: { holds: 'quantity', unit: '1', above: 0, atMost: 10 }, standard: 0.1 },
  maxParallelStrings: { rule: { holds: 'count', atLeast: 1, atMost: 1000 }, standard: 4 },
  ageGapYears: { rule: { holds: 'quantity', unit: 'year', atLeast: 0, atMost: 100 }, standard: 1 },
  midpointWatch: { rule: { holds: 'quantity', unit: '1', above: 0, below: 1 }, standard: 0.005 },
  midpointAct: { rule: { holds: 'quantity', unit: '1', above: 0, below: 1 }, standard: 0.01 },
  faultClearS: { rule: { holds: 'quantity', unit: 's', above: 0, atMost: 60 }, standard: 5 },
};

export function checkSettings(raw: unknown, issues: IssueList): Settings {
  const settings = readObject(raw, settingFields, {
    issues,
    path: 'settings',
    owner: 'the settings',
  }) as unknown as Settings;
  if (settings.midpointWatch > settings.midpointAct) {
    issues.add('settings.midpointWatch', 'contradiction', () => {
      return `midpointWatch (${String(settings.midpointWatch)}) must not be more than midpointAct (${String(settings.midpointAct)}).`;
    });
  }
  return settings;
}

const mostDemandRows = 5000;

const demandFields: { readonly [F in keyof DemandRow]: Field } = {
  label: { rule: { holds: 'text', longest: 200 } },
  powerW: { rule: { holds: 'quantity', unit: 'W', atLeast: 0, atMost: 1e7 }, required: true },
  quantity: { rule: { holds: 'quantity', unit: '1', atLeast: 0, atMost: 10_000 }, standard: 1 },
  hoursPerDay: {
    rule: { holds: 'numbers', length: 12, orSame: true, unit: 'h', atLeast: 0, atMost: 24 },
    required: true,
  },
  supply: { rule: { holds: 'choice', of: ['dc', 'ac'] }, standard: 'dc' },
  surgeW: { rule: { holds: 'quantity', unit: 'W', atLeast: 0, atMost: 1e7 } },
  together: { rule: { holds: 'flag' }, standard: true },
  hourProfile: { rule: { holds: 'numbers', length: 24, unit: '1', atLeast: 0, atMost: 1 } },
};

export function checkDemand(raw: unknown, issues: IssueList): readonly DemandRow[] {
  if (raw === undefined) return [];
  if (!Array.isArray(raw)) {
    issues.add('demand', 'wrong-type', () => `demand must be a list of rows, got ${described(raw)}.`);
    return [];
  }
  if (raw.length > mostDemandRows) {
    issues.add(
      'demand',
      'too-many',
      () => `A job may have ${String(mostDemandRows)} rows of demand, this one has ${String(raw.length)}.`,
    );
    return [];
  }
  return raw.map((item: unknown, index) => {
    const place = { issues, path: itemPath('demand', index), owner: `row ${String(index + 1)} of the demand` };
    const row = readObject(item ?? null, demandFields, place) as unknown as DemandRow;
    return { ...row, hourProfile: sharesOf(row.hourProfile, place) };
  });
}

/** The hour profile as shares of the day's energy: the figures of the file divided by their sum. */
function sharesOf(
  profile: readonly number[] | undefined,
  { issues, path, owner }: Place,
): readonly number[] | undefined {
  if (profile === undefined) return undefined;
  const sum = profile.reduce((total, share) => total + share, 0);
  if (sum > 0) return profile.map((share) => share / sum);
  issues.add(
    fieldPath(path, 'hourProfile'),
    'out-of-range',
    () => `hourProfile of ${owner}: at least one hour must be more than 0.`,
  );
  return undefined;
}

/** The fields of an object that may be left out altogether. */
function readObject(raw: unknown, fields: Fields, place: Place): Record<string, unknown> {
  if (raw !== undefined && !isRawObject(raw)) {
    place.issues.add(place.path, 'wrong-type', () => `${place.path} must be an object, got ${described(raw)}.`);
  }
  const quiet = isRawObject(raw) || raw === undefined;
  return quiet ? readFields(raw ?? {}, fields, place) : {};
}
