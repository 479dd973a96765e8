/** Plain words for what the job file calls by short names: kinds, fields, choices, states. One thing has one name on every screen. */
import { fieldWords, KIND_WORDS, type Origin, type PartKind, type Status } from '../../core/api.ts';

/** Names of fields that read better on a screen than the report's running words; else the report's are used. */
const FIELDS: Readonly<Record<string, string>> = {
  acDrop: 'Volts lost on the AC side',
  acPowerW: 'AC output now',
  accessible: 'Within reach of a hand',
  azimuthDeg: 'Faces (0° = north)',
  besideFuel: 'Beside a fuel tank or fitting',
  blockNominalV: 'Volts of one block',
  blocksInSeries: 'Blocks in series',
  blocksAtNight: 'Lets nothing back at night',
  continuous: 'Runs 3 h or more',
  covered: 'Live metal is covered',
  cranking: 'Starter motor',
  dcRated: 'Marked for DC',
  distanceFromSourceM: 'Wire from the source',
  dropClass: 'How much drop matters',
  efficiency: 'Efficiency',
  emfV: 'Rest volts',
  enclosure: 'Box or locker that it is in',
  endOhm: 'Both ends together',
  heldDown: 'Strapped or boxed',
  ignitionProtected: 'Ignition-protected',
  inBatterySpace: 'In the battery space',
  inParallel: 'Wires side by side',
  insulationDegC: 'Insulation good to',
  linkOhm: 'All links together',
  linkSize: 'Size of a link',
  loadBreak: 'May be opened under load',
  loadedConductors: 'Loaded wires together',
  locationTag: 'Place',
  lockable: 'Can be locked open',
  lowCutoffV: 'Loads are cut off below',
  lowTemperatureCutoff: 'Cold blocks charging',
  manualReset: 'Reset by hand',
  marked: 'Marked with what it switches',
  minusLengthM: 'Length of the minus',
  minusSize: 'Size of the minus',
  modulesInSeries: 'Modules in series',
  on: 'Switched',
  ratingMv: 'Millivolts at that',
  run: 'Lies in',
  segmentOhm: 'Between two taps',
  selfLimiting: 'Limits its own current',
  sheathed: 'In a sheath',
  shortTimeA: 'Carries for a few seconds',
  springClip: 'Held by a spring clip',
  stateOfCharge: 'State of charge',
  stringsInParallel: 'Strings side by side',
  surgeS: 'Surge lasts',
  terminalDegC: 'Terminals marked for',
  tiltDeg: 'Tilt (0° = flat)',
  ventAirM3PerH: 'Air moved by a fan',
  ventOpeningCm2: 'Vent, in and out each',
  withstandS: 'Withstand lasts',
};

/** What a word of the trade means, for who has not met it. */
const HINTS: Readonly<Record<string, string>> = {
  conductorDegC: 'Fixes the temperature that its resistance is taken at; else it is found from the current.',
  cutoffV: 'It switches itself off below this.',
  crankingA: 'Cold-cranking amps printed on it, of the whole string.',
  curvePoints: 'From the maker’s curve: amps, seconds to melt, seconds to clear, such as 400: 2: 10; 800: 0.2: 1',
  emfV: 'Volts at its posts after hours with nothing connected; replaces the curve of its chemistry.',
  endOhm: 'Resistance of the two lugs together.',
  interruptA: 'The largest fault current that it can break at the system’s DC volts.',
  enclosure: 'Parts that name the same box are taken to be in it together.',
  iscA: 'What one module gives into a dead short in full sun.',
  linkOhm: 'Resistance of the straps between its blocks, added up.',
  linkSize: 'Of one strap from block to block.',
  maxFuseA: 'The largest fuse that its papers allow.',
  nominalV: 'Volts of the system that it is made for.',
  minimumV: 'It stops working below this.',
  preArcI2t: 'Least I²t that melts it.',
  setpointV: 'The volts that it holds once the battery is nearly full.',
  slopeOhm: 'How its volts rise with current.',
  stateOfCharge: 'How full: 100 % is full.',
  totalI2t: 'Most I²t that it lets through until it has opened.',
  ventOpeningCm2: 'Free area of the opening to outside air, of the inlet and of the outlet each.',
  vmpV: 'Of one module, at its best working point.',
  vocV: 'Of one module in full sun with nothing connected.',
};

const CHOICES: Readonly<Record<string, Readonly<Record<string, string>>>> = {
  chemistry: {
    flooded: 'Lead-acid, wet (flooded)',
    agm: 'Lead-acid, AGM',
    gel: 'Lead-acid, gel',
    lfp: 'LFP, lithium iron phosphate',
    nmc: 'NMC, lithium with nickel',
    nicd: 'NiCd, nickel-cadmium',
  },
  metal: { copper: 'Copper', 'tinned-copper': 'Tinned copper', aluminium: 'Aluminium' },
  stranding: {
    solid: 'Solid, one wire',
    stranded: 'Stranded, thick wires',
    flexible: 'Flexible, fine wires',
  },
  run: {
    'free-air': 'Free air',
    conduit: 'Conduit or trunking',
    bundle: 'Bundle with others',
    'engine-space': 'Engine space (hot)',
    buried: 'Ground',
  },
  state: { closed: 'Closed', open: 'Open' },
  type: { mppt: 'MPPT, tracking', pwm: 'PWM, switching' },
  dropClass: { critical: 'Critical', ordinary: 'Ordinary' },
  supply: { dc: 'DC', ac: 'AC, through the inverter' },
  practice: {
    'us-land': 'US, on land',
    'us-marine': 'US, aboard a boat',
    'iso-marine': 'ISO, aboard a boat',
    'iec-land': 'IEC, on land',
  },
};

export const ORIGIN_MEANING: Readonly<Record<Origin, { readonly word: string; readonly meaning: string }>> = {
  measured: { word: 'measured', meaning: 'taken with a meter or a tape' },
  label: { word: 'label', meaning: 'read off the part, its papers or the drawing' },
  default: { word: 'default', meaning: 'taken by this program, since nobody gave it' },
  guess: { word: 'guess', meaning: 'somebody’s guess' },
};

export const STATUS_MEANING: Readonly<Record<Status, string>> = {
  published: 'published',
  'common-practice': 'common practice, no source',
  'from-memory': 'from memory: confirm against the text',
};

/** `battery string`, `out-and-back run`. */
export function kindWord(kind: PartKind): string {
  return KIND_WORDS[kind];
}

/** The name of a field as it stands before it: `Rated amps`. A field of the job itself goes by its path. */
export function fieldWord(field: string): string {
  const last = field.split('.').at(-1) ?? field;
  const known = FIELDS[last] ?? fieldWords(last);
  return known.charAt(0).toUpperCase() + known.slice(1);
}

export function fieldHint(field: string): string | undefined {
  return HINTS[field];
}

/** A choice of a field in plain words; the word of the job file where there are none. */
export function choiceWord(field: string, choice: string): string {
  return CHOICES[field]?.[choice] ?? choice;
}

/** What stands for yes and no in a field that is one or the other. */
export function flagWords(field: string): { readonly yes: string; readonly no: string } {
  return field === 'on' ? { yes: 'On', no: 'Off' } : { yes: 'Yes', no: 'No' };
}

const STATES: Readonly<Record<string, string>> = {
  off: 'Off',
  open: 'Open: nothing flows',
  unfed: 'Not fed',
  'dropped-out': 'Dropped out: too few volts',
  blocking: 'Blocking',
  conducting: 'Conducting',
  'current-limited': 'Gives all the current that it can',
  'voltage-held': 'Holds its set volts',
  idle: 'Idle',
  tracking: 'At the array’s best working point',
};

/** The state that an answer names, in plain words. */
export function stateWord(state: string): string {
  const plain = state.replaceAll('-', ' ');
  return STATES[state] ?? plain.charAt(0).toUpperCase() + plain.slice(1);
}
