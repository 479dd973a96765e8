/**
 * The usual cautions of the trade in our words, each at the section of the report where the hand would be, and only where the
 * job has the thing that it warns of.
 */
import type { CheckedJob } from '../job/job.ts';
import type { Chemistry, Part, PartKind } from '../job/part.ts';
import type { Basis } from '../tables/status.ts';
import type { Citations } from './citations.ts';
import type { CautionBlock } from './document.ts';

export type CautionPlace =
  | 'isolating'
  | 'batteries'
  | 'joining'
  | 'conductors'
  | 'devices'
  | 'loads'
  | 'sources'
  | 'faults'
  | 'findings'
  | 'measuring';

export interface Caution {
  readonly place: CautionPlace;
  readonly appliesTo: (job: CheckedJob) => boolean;
  readonly text: string;
  readonly basis?: Basis;
}

const LEAD_ACID: readonly Chemistry[] = ['flooded', 'agm', 'gel'];
const LITHIUM: readonly Chemistry[] = ['lfp', 'nmc'];

const always = (): boolean => true;
const withKind =
  (...kinds: readonly PartKind[]) =>
  (job: CheckedJob): boolean =>
    job.parts.some((part) => kinds.includes(part.kind));
const withChemistry =
  (chemistries: readonly Chemistry[]) =>
  (job: CheckedJob): boolean =>
    job.parts.some((part) => part.kind === 'string' && chemistries.includes(part.chemistry));
const withSeveralStrings = (job: CheckedJob): boolean => job.parts.filter((part) => part.kind === 'string').length > 1;
const aboard = (job: CheckedJob): boolean => job.practice === 'us-marine' || job.practice === 'iso-marine';

const BATTERY_HANDLING: Basis = {
  source: 'SRC-CFR29-1926-441',
  text: '29 CFR 1926.441, batteries and battery charging: face, hand and body protection; water for flushing within 25 ft (7.6 m)',
  status: 'published',
};
const ACID_AND_TOOLS: Basis = {
  source: 'SRC-CFR29-1910-178',
  text: '29 CFR 1910.178(g), changing and charging storage batteries: acid into water, tools kept off uncovered batteries',
  status: 'published',
};
const HYDROGEN: Basis = {
  source: 'SRC-CAUTION-HYDROGEN',
  text: 'IEC 62485-2, stationary batteries: hydrogen in air explosive from 4 % by volume',
  status: 'published',
};
const METER_CATEGORY: Basis = {
  source: 'SRC-IEC61010-1',
  text: 'measurement categories of IEC 61010-1, as explained in a trade journal',
  status: 'published',
};
const IGNITION: Basis = {
  source: 'SRC-CFR33-183-410',
  text: '33 CFR 183.410, ignition protection in petrol spaces',
  status: 'published',
};
const TOUCH_VOLTS: Basis = {
  source: 'SRC-TOUCH-VOLTS',
  text: 'Direct voltages at which codes begin to ask for protection against shock: 50, 60 or 120 V, by code',
  status: 'from-memory',
};

/** What the cautions lean on. */
export const cautionBases: readonly Basis[] = [
  BATTERY_HANDLING,
  ACID_AND_TOOLS,
  HYDROGEN,
  METER_CATEGORY,
  IGNITION,
  TOUCH_VOLTS,
];

const CAUTIONS: readonly Caution[] = [
  {
    place: 'isolating',
    appliesTo: always,
    text: 'A battery cannot be switched off. Treat every job on it as live work, even with all switches open.',
  },
  {
    place: 'isolating',
    appliesTo: always,
    text: 'Before touching: loads off, chargers off, solar covered or isolated, alternator stopped, main switch open. Then prove dead with a meter just proved on a known source.',
  },
  {
    place: 'isolating',
    appliesTo: always,
    text: 'Rings, watches and chains off. Wrap the spanners: one slip across a bank makes a weld of the tool. Keep metal off battery tops.',
    basis: ACID_AND_TOOLS,
  },
  {
    place: 'isolating',
    appliesTo: always,
    text: 'Take the earthed lead (usually negative) off first and put it back last, with its free end tied back.',
  },
  { place: 'isolating', appliesTo: always, text: 'Do not work alone: someone near should know where the switch is.' },
  {
    place: 'batteries',
    appliesTo: withChemistry(LEAD_ACID),
    text: 'Acid burns eyes and skin. Face shield, apron and gloves; water at hand to flush with, and something to neutralise spills. Acid into water, never water into acid.',
    basis: BATTERY_HANDLING,
  },
  {
    place: 'batteries',
    appliesTo: withChemistry([...LEAD_ACID, 'nicd']),
    text: 'Charging makes hydrogen, explosive from 4 % in air. Vent from the highest point; no flame, smoking or switching spark near. Wait after charging: gassing goes on for up to about an hour.',
    basis: HYDROGEN,
  },
  {
    place: 'batteries',
    appliesTo: withChemistry(['nicd']),
    text: 'Nickel-cadmium electrolyte is caustic: never use tools or vessels that have held acid, and flush splashes with much water.',
  },
  {
    place: 'batteries',
    appliesTo: withChemistry(LITHIUM),
    text: 'Heat, crushing, overcharge, deep discharge or charging below 0 °C damages lithium cells. A failing cell can run away, give off flammable and poisonous gas and light again later. Do not breathe the smoke: get out and call the fire service. Do not open a swollen pack.',
  },
  {
    place: 'batteries',
    appliesTo: withChemistry(LITHIUM),
    text: 'Never bypass a battery management system, and never let it be the only thing that breaks a short circuit: it needs a fuse beside it.',
  },
  {
    place: 'batteries',
    appliesTo: withSeveralStrings,
    text: 'Never join strings of different voltage, chemistry or state of charge. Bring them level first: a gap of 0.8 V across 12 mΩ drives 67 A. Make the last connection away from the battery.',
  },
  {
    place: 'joining',
    appliesTo: withSeveralStrings,
    text: 'Measure both at rest with one meter, just before joining. Fuse in the lead of each string; eyes shielded; the last connection away from the batteries, where gas does not gather.',
  },
  {
    place: 'joining',
    appliesTo: withSeveralStrings,
    text: 'A resistor that levels two strings gets hot enough to burn: stand it on something that does not, and stay with it.',
  },
  { place: 'batteries', appliesTo: withKind('string'), text: 'Batteries are heavy and tip: lift with help.' },
  {
    place: 'conductors',
    appliesTo: withKind('cable', 'pair', 'joint', 'busbar'),
    text: "Tighten to the maker's torque; a loose lug heats like a heater. Check again after the first week, then yearly. A hot joint: load off, let it cool, isolate, then undo.",
  },
  {
    place: 'devices',
    appliesTo: withKind('fuse', 'breaker', 'switch'),
    text: 'Do not pull fuses, plugs or links under load: a DC arc goes on burning. Open a load-break switch first.',
  },
  {
    place: 'devices',
    appliesTo: withKind('fuse', 'breaker'),
    text: 'Before a fuse or its holder is touched: loads and chargers off, main switch open, then prove both ends dead with a meter. One fed from both ends stays live with either side open.',
  },
  {
    place: 'devices',
    appliesTo: withKind('fuse', 'breaker'),
    text: 'A fuse or breaker must interrupt the highest fault current of its place at direct current. One that cannot may burst or weld shut: never close it onto a fault to try.',
  },
  {
    place: 'devices',
    appliesTo: withKind('fuse', 'breaker', 'switch'),
    text: 'Use parts marked for DC at the highest voltage of the system. A part marked for AC alone may not put out a DC arc.',
  },
  {
    place: 'devices',
    appliesTo: withKind('fuse', 'breaker'),
    text: 'A fuse protects the cable, not the gadget. Never fit a bigger one to stop it blowing: find out why.',
  },
  {
    place: 'devices',
    appliesTo: aboard,
    text: 'Petrol or bottled gas aboard: only ignition-protected parts in those spaces. Sniff and ventilate before switching.',
    basis: IGNITION,
  },
  {
    place: 'loads',
    appliesTo: withKind('inverter'),
    text: "An inverter's AC side kills. It is outside this paper and belongs to a licensed electrician.",
  },
  {
    place: 'sources',
    appliesTo: withKind('array'),
    text: 'A solar array is live whenever there is light and can pass 60 V even in a system called 12 V. Know its cold open-circuit voltage before touching it.',
    basis: TOUCH_VOLTS,
  },
  {
    place: 'sources',
    appliesTo: withKind('charger', 'controller'),
    text: 'A wire from a charger is fed from both ends: from the charger and from the battery. Isolate both.',
  },
  {
    place: 'faults',
    appliesTo: withKind('string'),
    text: 'These are sums, not to be tried: never make a short to test a fuse or to read its current. With every switch and fuse open the battery itself is still live.',
  },
  {
    place: 'findings',
    appliesTo: always,
    text: 'After a short circuit, flood or fire, take cells, cables and fuses as damaged until they are checked.',
  },
  {
    place: 'findings',
    appliesTo: always,
    text: 'A passed check is not proof that nothing can go wrong, and a check listed as not done was not made at all.',
  },
  {
    place: 'measuring',
    appliesTo: always,
    text: 'Leads and meter rated for the place: CAT III or IV for anything tied to mains or panels; the category counts for more than the volts on the label.',
    basis: METER_CATEGORY,
  },
  {
    place: 'measuring',
    appliesTo: always,
    text: 'Fused current sockets only, and never volts with a lead left in the A socket. Above a few amps use a clamp: do not break a circuit to put the meter in.',
  },
];

const TITLES: Readonly<Record<CautionPlace, string>> = {
  isolating: 'Before a hand goes in',
  batteries: 'At the batteries',
  joining: 'Before strings are joined',
  conductors: 'At cables and joints',
  devices: 'At fuses and switches',
  loads: 'At the loads',
  sources: 'At the sources of charge',
  faults: 'Short circuits',
  findings: 'Reading the findings',
  measuring: 'Measuring',
};

const PLACES: Partial<Readonly<Record<PartKind, CautionPlace>>> = {
  string: 'batteries',
  cable: 'conductors',
  pair: 'conductors',
  joint: 'conductors',
  busbar: 'conductors',
  fuse: 'devices',
  breaker: 'devices',
  switch: 'devices',
  inverter: 'loads',
  array: 'sources',
  charger: 'sources',
  controller: 'sources',
};

/** The cautions for a hand at one part, the nearest first: at a battery, tools and rings before all else. */
export function cautionsForPart(part: Part, job: CheckedJob): readonly Pick<Caution, 'text' | 'basis'>[] {
  const alone = { ...job, parts: [part] };
  const beside = part.kind === 'string' && withSeveralStrings(job) ? [withSeveralStrings] : [];
  const own = CAUTIONS.filter(
    ({ place, appliesTo }) =>
      place === PLACES[part.kind] && (appliesTo(alone) || beside.some((one) => one === appliesTo)),
  );
  const tools = CAUTIONS.filter(({ place, basis }) => place === 'isolating' && basis === ACID_AND_TOOLS);
  return part.kind === 'string' ? [...tools, ...own] : own;
}

/** The cautions of a place that concern the job, for a screen. */
export function cautionTexts(place: CautionPlace, job: CheckedJob): readonly string[] {
  return CAUTIONS.filter((caution) => caution.place === place && caution.appliesTo(job)).map(({ text }) => text);
}

/** The caution block of a place, or nothing where none of its cautions concerns this job. */
export function cautionsAt(place: CautionPlace, job: CheckedJob, citations: Citations): readonly CautionBlock[] {
  const points = CAUTIONS.filter((caution) => caution.place === place && caution.appliesTo(job)).map(
    ({ text, basis }) => (basis === undefined ? text : `${text}\u00a0${citations.short(basis)}`),
  );
  return points.length === 0 ? [] : [{ kind: 'caution', title: TITLES[place], points }];
}
