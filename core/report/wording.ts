/** The words that the report uses for kinds, states, statuses and severities: one place, so that one thing has one name on paper. */
import type { Severity } from '../checks/finding.ts';
import type { Metal, Origin, Run, Stranding } from '../job/part.ts';
import type { BatteryModel } from '../network/answer.ts';
import type { Status } from '../tables/status.ts';

export const STATUS_WORDS: Readonly<Record<Status, string>> = {
  published: 'published',
  'common-practice': 'common practice, no source',
  'from-memory': 'from memory — confirm against the text',
};

export const SEVERITY_WORDS: Readonly<Record<Severity, { readonly word: string; readonly meaning: string }>> = {
  stop: { word: 'STOP', meaning: 'do not energise until this is put right' },
  fix: { word: 'FIX', meaning: 'outside the chosen practice; put right' },
  look: { word: 'LOOK', meaning: 'a person has to judge this' },
  note: { word: 'NOTE', meaning: 'for information' },
};
/** A source's text without the status that it may end in already, since the status is printed after it. */
export function withoutStatus(text: string): string {
  const bare = text.replace(/[,;:]?\s*(?:from memory|common practice(?:, no (?:published )?source)?)$/, '').trim();
  return bare === '' ? text : bare;
}

/** Worst first. */
export const SEVERITIES: readonly Severity[] = ['stop', 'fix', 'look', 'note'];

export const ORIGIN_WORDS: Readonly<Record<Origin, string>> = {
  measured: 'measured',
  label: 'label',
  default: 'default',
  guess: 'guess',
};

export const METAL_WORDS: Readonly<Record<Metal, string>> = {
  copper: 'copper',
  'tinned-copper': 'tinned copper',
  aluminium: 'aluminium',
};
export const STRANDING_WORDS: Readonly<Record<Stranding, string>> = {
  solid: 'solid',
  stranded: 'stranded',
  flexible: 'flexible',
};
export const RUN_WORDS: Readonly<Record<Run, string>> = {
  'free-air': 'free air',
  conduit: 'conduit',
  bundle: 'bundle',
  'engine-space': 'engine space',
  buried: 'buried',
};
export const MODEL_WORDS: Readonly<Record<BatteryModel, string>> = {
  slow: 'battery resistance over minutes',
  fast: 'battery resistance in the first second',
};

/** `join(['a', 'b', 'c'])` → `a, b and c`. */
export function join(words: readonly string[]): string {
  if (words.length < 2) return words.join('');
  return `${words.slice(0, -1).join(', ')} and ${words.at(-1)}`;
}

/** `count(1, 'finding')` → `1 finding`; `count(2, 'finding')` → `2 findings`. */
export function count(number: number, noun: string): string {
  return `${number} ${noun}${number === 1 ? '' : 's'}`;
}

/** A rule's or state's name in plain words: `fuse-over-cable` → `Fuse over cable`. */
export function sentenceCase(name: string): string {
  const words = (/\s/.test(name) ? name : name.replaceAll(/[-_]+/g, ' ')).trim();
  return words.charAt(0).toUpperCase() + words.slice(1);
}

/** Fields whose bare name would not be understood on paper. */
const FIELD_WORDS: Readonly<Record<string, string>> = {
  acDrop: 'volts lost on the AC side',
  acPowerW: 'AC output',
  accessible: 'within reach',
  ageYears: 'age',
  ambientDegC: 'air temperature',
  ambientDesignDegC: 'design air temperature',
  ambientMaxDegC: 'highest air temperature',
  ambientMinDegC: 'lowest air temperature',
  besideFuel: 'beside fuel',
  blocksAtNight: 'blocks at night',
  capacityAh: 'capacity',
  conductorDegC: 'conductor temperature',
  cranking: 'starter motor',
  crankingA: 'cranking current',
  curvePoints: 'time and current curve',
  cutoffV: 'cut-off volts',
  dampSpace: 'damp space',
  dcRated: 'marked for DC',
  distanceFromSourceM: 'distance from the source',
  emfV: 'rest volts',
  endOhm: 'resistance of the terminations',
  forwardV: 'forward volts',
  gasolineSpace: 'petrol (gasoline) space',
  heldDown: 'held down',
  ignitionProtected: 'ignition-protected',
  impA: 'current at full power',
  inBatterySpace: 'in the battery space',
  insulationDegC: 'insulation temperature',
  interruptA: 'interrupt rating',
  iscA: 'short-circuit current',
  iscPerDegC: 'change of short-circuit current',
  linkOhm: 'resistance of the links',
  linkSize: 'size of the links',
  lockable: 'can be locked open',
  lowCutoffV: 'low cut-off volts',
  lowTemperatureCutoff: 'cold cut-off',
  marked: 'marked',
  maxChargeA: 'highest charge current',
  maxDischargeA: 'highest discharge current',
  maxFuseA: 'largest fuse',
  maxInputA: 'highest input current',
  maxInputV: 'highest input volts',
  maximumV: 'highest working volts',
  minimumV: 'lowest working volts',
  nominalCellDegC: 'nominal cell temperature',
  nominalV: 'nominal volts',
  outputA: 'output limit',
  outputV: 'output volts',
  pmpPerDegC: 'change of power',
  preArcI2t: 'melting I²t',
  ratedW: 'rated power',
  ratingA: 'rated amps',
  ratingMv: 'rated millivolts',
  ratingV: 'rated volts',
  setpointV: 'set-point',
  selfLimiting: 'limits itself',
  shortCircuitA: 'short-circuit current',
  shortTimeA: 'short-time current',
  slopeOhm: 'slope resistance',
  sourceSign: 'signs naming every source',
  springClip: 'held by a spring clip',
  standbyW: 'idle power',
  string: 'battery string',
  surgeS: 'length of the surge',
  surgeW: 'surge power',
  temperatureDegC: 'temperature',
  terminalDegC: 'terminal temperature',
  totalI2t: 'clearing I²t',
  ventAirM3PerH: 'vent air',
  ventOpeningCm2: 'vent opening',
  vmpV: 'volts at full power',
  vocPerDegC: 'change of open-circuit volts',
  vocV: 'open-circuit volts',
  withstandA: 'short-time withstand',
  withstandS: 'time of the withstand',
};

/** Camel-case field names of the job as words, unit suffix left off: `maxChargeA` → `max charge`. */
export function fieldWords(field: string): string {
  const known = FIELD_WORDS[field];
  if (known !== undefined) return known;
  const bare = field.replace(/(?:DegC|PerDegC|Ohm|Mv|Mm2|KWhPerM2Day|WPerM2|Ah|Wh|Years|Deg)$|(?<=[a-z])[AVWMS]$/, '');
  return bare
    .replaceAll(/([a-z0-9])([A-Z])/g, '$1 $2')
    .replaceAll('.', ', ')
    .toLowerCase();
}

/** Names of fields of the job file inside a sentence, as words. Units such as mV or kW are too short to be taken for one. */
export function plainFields(text: string): string {
  return text.replaceAll(FIELD_NAME, (name) => fieldWords(name)).replaceAll(/(?<=\d) degC\b/g, '\u00a0°C');
}
const FIELD_NAME =
  /\b(?:[a-z]{3,}|ac)(?:[A-Z][a-z]*)*(?:DegC|Ohm|Mv|Ah|Years|Cm2|M3PerH|I2t|[AVWMS])\b|\b(?:stateOfCharge|loadedConductors|inParallel|acDrop|besideFuel|blocksAtNight|curvePoints|dampSpace|dcRated|gasolineSpace|heldDown|ignitionProtected|inBatterySpace|loadBreak|lowTemperatureCutoff|selfLimiting|sourceSign|springClip)\b/g;
