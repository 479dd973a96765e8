/** Fuses and breakers against the cables that they protect. */
import type { CablePart } from '../job/part.ts';
import type { Device } from '../network/wiring.ts';
import { isDevice } from '../network/wiring.ts';
import type { PracticeTable } from '../tables/practiceTable.ts';
import type { Basis } from '../tables/status.ts';
import type { Tables } from '../tables/tables.ts';
import { sizeText } from '../units/conductorSize.ts';
import type { CheckContext } from './checkContext.ts';
import { protectedCablesOf } from './protectedCables.ts';
import type { Judge, Rule } from './rule.ts';
import { isOver, missing, NOMINAL_VOLTS, PASS, sizeWanted, Tally, type Verdict } from './tally.ts';
import { amps, apart, titleOf, together, withEdition } from './wording.ts';

/** For a practice without caps: where caps come from, and that none apply. */
const NO_CAPS: Basis = {
  source: 'SRC-NEC-240-4',
  text: 'NEC (NFPA 70) 240.4(D); the chosen practice has no such caps',
  status: 'published',
};
/** Above this multiple of the ampacity no book of ours allows a device at all. */
const STOP_FACTOR = 1.5;
/** From these nominal volts on, boat law asks for more (33 CFR 183.455(c)). */
const HIGHER_VOLTS = 50;

export const fuseOverCable: Rule = {
  id: 'fuse-over-cable',
  family: 'fuse',
  kinds: ['fuse', 'breaker'],
  title: 'Fuse or breaker too large for a cable that it protects',
  compares:
    'rating of each fuse and breaker with the ampacity of every cable that it protects (downstream through all branches to the next device; upstream and on the return as far as in series), by the factor and next standard size of the practice',
  remedy: 'Fit a smaller fuse, or a larger cable, or a fuse of its own where the cable grows thinner.',
  byPractice: true,
  reads: 'drawing',
  basisFor: (judge) => withEdition(judge.practice.fuseOverCableBelow50V.basis, judge),
  run: (context) => eachProtectedCable(context, fuseOverCable, overCable),
};

export const smallWireCap: Rule = {
  id: 'small-wire-cap',
  family: 'fuse',
  kinds: ['fuse', 'breaker'],
  title: 'Fuse or breaker above the cap for small wires',
  compares:
    'rating of each fuse and breaker with the cap for small copper and aluminium wires (18 to 10 AWG) that it protects',
  remedy: 'Fit a fuse no larger than the cap for the gauge, or a larger wire.',
  byPractice: true,
  reads: 'drawing',
  basisFor: (judge) => withEdition(capsOf(judge.practice, 'copper')?.basis ?? NO_CAPS, judge),
  run: (context) => eachProtectedCable(context, smallWireCap, overCap),
};

type Judgement = (
  context: CheckContext,
  at: { device: Device; cable: CablePart; hottest: Place },
) => readonly Verdict[];

/** The case with the warmest air. */
interface Place {
  readonly id: string;
  readonly ambientDegC: number;
}

function eachProtectedCable(context: CheckContext, rule: Rule, judgement: Judgement) {
  const tally = new Tally(rule, rule.basisFor(context));
  const cables = protectedCablesOf(context);
  const hottest = hottestOf(context);
  for (const device of context.drawn) {
    if (!isDevice(device)) continue;
    const verdicts = cables.of(device).flatMap((cable) => judgement(context, { device, cable, hottest }));
    tally.judge([device.id], verdicts);
  }
  return tally.outcome();
}

function hottestOf(context: CheckContext): Place {
  return context.cases.reduce<Place>(
    (most, { id, ambientDegC }) => (ambientDegC > most.ambientDegC ? { id, ambientDegC } : most),
    { id: '', ambientDegC: Number.NEGATIVE_INFINITY },
  );
}

const overCable: Judgement = (context, { device, cable, hottest }) => {
  const ampacity = context.ampacityOf(cable, hottest.ambientDegC);
  if ('missing' in ampacity) return [missing(ampacity.missing, ...sizeWanted(cable))];
  const allowed = largestDevice({ ampacityA: ampacity.finalA, nominalV: nominalOf(context, device) }, context);
  if ('missing' in allowed) return [missing(`${allowed.missing} (${device.kind} ${device.id})`, NOMINAL_VOLTS)];
  if (!isOver(device.ratingA, allowed.ratingA)) return [PASS];
  const [rated, most] = apart(device.ratingA, allowed.ratingA, 'A');
  return [
    {
      kind: 'fail',
      severity: isOver(device.ratingA, STOP_FACTOR * ampacity.finalA) ? 'stop' : 'fix',
      case: hottest.id,
      measured: { value: device.ratingA, unit: 'A' },
      limit: { value: allowed.ratingA, unit: 'A' },
      excess: device.ratingA / allowed.ratingA,
      message: `${titleOf(device)}, ${rated}, does not protect cable ${cable.id} (${sizeOf(cable)}), which may carry ${amps(ampacity.finalA)}: ${most} is the most allowed there (${allowed.how}).`,
      basis: together(withEdition(allowed.basis, context), { text: ampacity.basis.text, status: ampacity.status }),
      others: [cable.id],
    },
  ];
};

function nominalOf({ volts }: CheckContext, { from, to }: Pick<Device, 'from' | 'to'>): number | undefined {
  return volts.nominalAt(from) ?? volts.nominalAt(to);
}

/** What a cable admits over it: its ampacity in the warmest case, the largest device, and the cap for its gauge where there is one. */
export interface Allowance {
  readonly ampacityA: number;
  readonly largest: LargestDevice;
  readonly capA: number | undefined;
}

/** The allowance of a cable for a device between two junctions. */
export function allowanceOver(
  context: CheckContext,
  { cable, between }: { readonly cable: CablePart; readonly between: Pick<Device, 'from' | 'to'> },
): Allowance | { readonly missing: string } {
  const ampacity = context.ampacityOf(cable, hottestOf(context).ambientDegC);
  if ('missing' in ampacity) return ampacity;
  const ampacityA = ampacity.finalA;
  const largest = largestDevice({ ampacityA, nominalV: nominalOf(context, between) }, context);
  return 'missing' in largest ? largest : { ampacityA, largest, capA: capOver(context.practice, cable) };
}

export interface LargestDevice {
  readonly ratingA: number;
  /** In words: the factor, or the next standard size. */
  readonly how: string;
  readonly basis: Basis;
}

/**
 * The largest device that a practice allows over a cable: factor · Iz, or the next standard rating above Iz where the practice
 * allows that step, up to its own bounds. The factor depends on nominal volts in boat law; missing where they are not known and
 * matter.
 */
export function largestDevice(
  { ampacityA, nominalV }: { readonly ampacityA: number; readonly nominalV: number | undefined },
  { practice, tables }: Pick<Judge, 'practice' | 'tables'>,
): LargestDevice | { readonly missing: string } {
  const { fuseOverCableBelow50V: below, fuseOverCableFrom50V: above, nextSizeUp } = practice;
  const dependsOnVolts =
    below.value !== above.value || nextSizeUp?.fromV !== undefined || nextSizeUp?.belowV !== undefined;
  if (nominalV === undefined && dependsOnVolts) return { missing: 'nominalV in the settings: nominal system volts' };
  const figure = nominalV !== undefined && nominalV >= HIGHER_VOLTS ? above : below;
  const plain: LargestDevice = {
    ratingA: figure.value * ampacityA,
    how: `${figure.value * 100} % of the ampacity`,
    basis: figure.basis,
  };
  const step = nextStandardRating({ ampacityA, nominalV }, practice, tables);
  if (step === undefined || nextSizeUp === undefined || step <= plain.ratingA) return plain;
  return { ratingA: step, how: 'next standard size up', basis: together(figure.basis, nextSizeUp.basis) };
}

function nextStandardRating(
  { ampacityA, nominalV }: { readonly ampacityA: number; readonly nominalV: number | undefined },
  practice: PracticeTable,
  tables: Tables,
): number | undefined {
  const rule = practice.nextSizeUp;
  if (rule === undefined || ampacityA <= 0) return undefined;
  if (nominalV !== undefined) {
    if (rule.fromV !== undefined && nominalV < rule.fromV) return undefined;
    if (rule.belowV !== undefined && nominalV >= rule.belowV) return undefined;
  }
  const series = tables.devices.ratings.get(practice.standardRatings);
  const next = series?.ratingsA.find((ratingA) => !isOver(ampacityA, ratingA));
  if (next === undefined || isOver(next, rule.upToA ?? next)) return undefined;
  return isOver(next, (rule.maxFactor ?? Number.POSITIVE_INFINITY) * ampacityA) ? undefined : next;
}

const overCap: Judgement = ({ practice, ...context }, { device, cable, hottest }) => {
  const metal = metalOf(cable);
  const caps = capsOf(practice, metal);
  const capA = capOver(practice, cable);
  if (caps === undefined || capA === undefined) return [];
  if (!isOver(device.ratingA, capA)) return [PASS];
  const [rated, most] = apart(device.ratingA, capA, 'A');
  return [
    {
      kind: 'fail',
      severity: 'fix',
      case: hottest.id,
      measured: { value: device.ratingA, unit: 'A' },
      limit: { value: capA, unit: 'A' },
      excess: device.ratingA / capA,
      message: `${titleOf(device)}, ${rated}, is over cable ${cable.id} (${sizeOf(cable)} ${metal}); ${most} is the cap for that gauge, whatever its ampacity.`,
      basis: withEdition(caps.basis, { ...context, practice }),
      others: [cable.id],
    },
  ];
};

function metalOf({ metal }: CablePart): 'copper' | 'aluminium' {
  return metal === 'aluminium' ? 'aluminium' : 'copper';
}

function capOver(practice: PracticeTable, cable: CablePart): number | undefined {
  return cable.size?.system === 'awg' ? capsOf(practice, metalOf(cable))?.capsA.get(cable.size.gauge) : undefined;
}

function capsOf(practice: PracticeTable, metal: 'copper' | 'aluminium') {
  return metal === 'copper' ? practice.smallWireCaps : practice.smallAluminiumCaps;
}

function sizeOf(cable: CablePart): string {
  const size = cable.size === undefined ? 'no size' : sizeText(cable.size);
  return cable.inParallel === 1 ? size : `${cable.inParallel} x ${size}`;
}
