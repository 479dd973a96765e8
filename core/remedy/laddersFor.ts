/** Which changes are worth trying for which rule. */
import type { PartId } from '../job/part.ts';
import { isolated, thickerLinks } from './bankLadders.ts';
import { conductorOf, moreInParallel, thicker } from './cableLadders.ts';
import type { Bench, Ladder } from './candidate.ts';
import { lowerSetpoints, noColdCharge, offInCase, otherSetpoint, weakerCharge } from './chargeLadders.ts';
import { largerBond, strandedCopper } from './conductorLadders.ts';
import { fuseAtString, higherVolts, largerRating, smallerRating } from './deviceLadders.ts';
import { fitted, moreAir } from './fittedLadders.ts';
import { forDirectCurrent, highInterrupt } from './markLadders.ts';
import { atSource, flagged, fuseEachString, fuseInto, madeAlike, sheathedPiece } from './placeLadders.ts';
import { evenLeads } from './shareLadders.ts';
import { blockingDiode, fewerInSeries, moreInSeries, otherController } from './solarLadders.ts';
import { anotherString, lessLostTo } from './wayLadders.ts';
import { broughtIntoUse, closedAgain, linksAway, swappedLeads, takenOut } from './wiringLadders.ts';

type LaddersOf = (bench: Bench, parts: readonly [first: PartId, ...others: PartId[]]) => readonly Ladder[];

/** Just below a rating: the next smaller one. */
const BELOW = 1 - 1e-6;
/** A shunt is used for long at no more than two thirds of its rating; common practice. */
const SHUNT_CONTINUOUS = 2 / 3;

const lessLost: LaddersOf = (bench, [load]) => lessLostTo(bench, load);

const otherRating: LaddersOf = (bench, [id]) => {
  const part = bench.inCase(id);
  if (part === undefined) return [];
  const { measured } = bench.finding;
  // With its margin first: the part is to carry the current for long.
  const margins = part.kind === 'shunt' ? [1 / SHUNT_CONTINUOUS] : [bench.job.settings.continuousFactor, 1];
  return margins.map((margin) => largerRating(bench, part, margin * measured.value));
};

const cables: LaddersOf = (bench, ids) => {
  const conductors = ids.flatMap((id) => conductorOf(bench, id) ?? []);
  return conductors.flatMap((conductor) => [thicker(bench, [conductor]), moreInParallel(bench, conductor)]);
};

const overCable: LaddersOf = (bench, [device, ...others]) => {
  const part = bench.inCase(device);
  const smaller = part === undefined ? [] : [smallerRating(bench, part)];
  const [first, ...more] = others;
  return first === undefined ? smaller : [...smaller, ...cables(bench, [first, ...more])];
};

/** A fuse that opens where it is to hold, or the other way about. */
const fuseWithin: LaddersOf = (bench, ids) =>
  ids.flatMap((id) => {
    const part = bench.inCase(id);
    if (part?.kind !== 'fuse' && part?.kind !== 'breaker') return [];
    const { measured, limit } = bench.finding;
    return [measured.value > limit.value ? smallerRating(bench, part) : largerRating(bench, part, limit.value)];
  });

/** A fuse that breaks more, or a thicker cable behind it, whichever the finding names. */
const strongerString: LaddersOf = (bench, ids) =>
  ids.flatMap((id) => {
    const part = bench.drawn(id);
    if (part?.kind === 'fuse') return highInterrupt(bench, part);
    return conductorOf(bench, id) === undefined ? [] : cables(bench, [id]);
  });

/** Of the devices that a finding names. */
const smallerDevices: LaddersOf = (bench, ids) =>
  ids.flatMap((id) => {
    const part = bench.inCase(id);
    return part?.kind === 'fuse' || part?.kind === 'breaker' ? [smallerRating(bench, part)] : [];
  });

/** The thinner cable stands first, then the one before it, then the device. */
const shrunk: LaddersOf = (bench, ids) => [
  ...smallerDevices(bench, ids),
  ...cables(bench, [ids[0]]),
  ...fuseInto(bench, ids[0], bench.finding.limit.value),
];

/** The ratings above the one in place, whatever the finding measured. */
const nextRatings: LaddersOf = (bench, [id]) => {
  const part = bench.inCase(id);
  return part?.kind === 'fuse' || part?.kind === 'breaker'
    ? [largerRating(bench, part, part.ratingA * JUST_ABOVE)]
    : [];
};
const JUST_ABOVE = 1.001;

/** The next smaller device, or thicker cables behind it. */
const fasterOrThicker: LaddersOf = (bench, [id, ...behind]) => {
  const part = bench.drawn(id);
  const isFuse = part?.kind === 'fuse' || part?.kind === 'breaker';
  const smaller = isFuse ? [smallerRating(bench, part, BELOW * part.ratingA)] : [];
  const [first, ...more] = behind;
  return first === undefined ? smaller : [...smaller, ...cables(bench, [first, ...more])];
};

/** What a fuse has to be rated for where it carries only part of its rating. */
const ratingForHeat: LaddersOf = (bench, [id]) => {
  const part = bench.inCase(id);
  if (part?.kind !== 'fuse') return [];
  const { measured, limit } = bench.finding;
  return limit.value > 0 ? [largerRating(bench, part, (measured.value * part.ratingA) / limit.value)] : [];
};

/** Rated for what the finding measured, with no margin: a fuse's rating is one already. */
const largerPart: LaddersOf = (bench, [id]) => {
  const part = bench.drawn(id);
  return part === undefined ? [] : [largerRating(bench, part)];
};

const forInverter: LaddersOf = (bench, [id]) => {
  const part = bench.inCase(id);
  return part?.kind === 'fuse' || part?.kind === 'breaker' ? [largerRating(bench, part)] : cables(bench, [id]);
};

const byRule: Readonly<Record<string, LaddersOf>> = {
  'dead-short': (bench, [id]) => linksAway(bench, id),
  'polarity-crossed': (bench, ids) => ids.slice(0, 2).flatMap((id) => swappedLeads(bench, id)),
  'load-collapse': lessLost,
  'load-unfed': (bench) => closedAgain(bench),
  'group-unconnected': (bench, ids) => takenOut(bench, ids),
  'part-never-used': (bench, [id]) => broughtIntoUse(bench, id),
  'end-open': (bench, ids) => takenOut(bench, ids),
  'no-fuse-on-source': (bench, [id]) => fuseAtString(bench, id),
  'fuse-over-cable': overCable,
  'small-wire-cap': overCable,
  'fuse-under-current': otherRating,
  'fuse-under-continuous': (bench, [id]) => {
    const part = bench.inCase(id);
    return part === undefined ? [] : [largerRating(bench, part)];
  },
  'cable-overloaded': cables,
  'cable-under-continuous': cables,
  'volts-rating-low': (bench, [id]) => {
    const part = bench.inCase(id);
    return part === undefined ? [] : [higherVolts(bench, part)];
  },
  'rating-under-current': otherRating,
  'shunt-small': otherRating,
  'drop-too-big': lessLost,
  'charge-drop-too-big': (bench, [charger, string]) => (string === undefined ? [] : lessLostTo(bench, string, charger)),
  'load-starved': lessLost,
  'load-overfed': (bench, [id]) => {
    const part = bench.inCase(id);
    return [...lowerSetpoints(bench), ...(part === undefined ? [] : [offInCase(bench, part)])];
  },
  'surge-sag': lessLost,
  'string-discharge-high': (bench, [id]) => anotherString(bench, id),
  'string-charge-high': (bench, [id]) => [...weakerCharge(bench), ...anotherString(bench, id)],
  'charge-too-strong': (bench, [id]) => [...weakerCharge(bench), ...anotherString(bench, id)],
  'share-uneven': (bench, ids) => evenLeads(bench, ids),
  'circulating-at-rest': (bench, ids) => isolated(bench, ids),
  'one-out-overload': (bench, [id]) => anotherString(bench, id),
  'link-overloaded': (bench, [id]) => thickerLinks(bench, id),
  'fuse-too-far': sheathedPiece,
  'charger-end-open': (bench, [source, ...wires]) => {
    const wire = wires[0];
    const thin = bench.finding.limit.unit === 'A' && wire !== undefined ? cables(bench, [wire]) : [];
    return [...atSource(bench, source, 'fuse'), ...thin];
  },
  'generator-fuse-size': smallerDevices,
  'string-unfused': fuseEachString,
  'backfeed-into-bad-string': strongerString,
  'cable-shrinks': shrunk,
  'source-without-isolator': (bench, [source]) => atSource(bench, source, 'switch'),
  'switch-not-breaking': (bench, [id]) =>
    flagged(bench, id, { field: 'loadBreak', words: 'one that breaks its direct current' }),
  'auto-reset': (bench, [id]) => flagged(bench, id, { field: 'manualReset', words: 'one that is reset by hand' }),
  'parallel-legs-unequal': (bench, ids) => [...madeAlike(bench, ids), ...cables(bench, ids)],
  'parallel-legs-unfused': (bench, ids) => [...smallerDevices(bench, ids), ...cables(bench, ids)],
  'return-smaller': (bench, [first, home]) => {
    const conductor = conductorOf(bench, first) ?? (home === undefined ? undefined : conductorOf(bench, home));
    return conductor === undefined ? [] : [thicker(bench, [conductor])];
  },
  // None for `both-poles-open-system`, `fuse-in-earthed-pole` and `starter-cable-shared`: conductors are led another way.
  'hot-place': (bench, [id]) => cables(bench, [id]),
  'tight-bundle': (bench, [id]) => cables(bench, [id]),
  'fuse-warm': ratingForHeat,
  'fuse-over-device-limit': fuseWithin,
  'cable-too-thin': (bench, [id]) => cables(bench, [id]),
  'wrong-metal-or-solid': (bench, [id]) => strandedCopper(bench, id),
  'bond-too-small': (bench, [id]) => largerBond(bench, id),
  'big-bank-needs-more': (bench, [id]) => {
    const part = bench.drawn(id);
    return part === undefined ? [] : highInterrupt(bench, part);
  },
  'breaker-under-table': (bench, [id]) => {
    const part = bench.drawn(id);
    return part === undefined ? [] : highInterrupt(bench, part);
  },
  'ac-part-on-dc': (bench, [id]) => {
    const part = bench.drawn(id);
    return part === undefined ? [] : forDirectCurrent(part);
  },
  'interrupt-too-low': (bench, [id]) => {
    const part = bench.drawn(id);
    return part === undefined ? [] : highInterrupt(bench, part);
  },
  'fault-too-weak': fasterOrThicker,
  'cable-cooks': fasterOrThicker,
  'trips-together': (bench, [near, far]) => {
    const part = bench.drawn(near);
    const ahead = far === undefined ? undefined : bench.drawn(far);
    const rated = ahead !== undefined && 'ratingA' in ahead ? ahead.ratingA : undefined;
    if (part === undefined || rated === undefined) return [];
    return [smallerRating(bench, part, rated / bench.finding.limit.value), largerRating(bench, ahead!, rated)];
  },
  'fault-not-parted': (bench, [id]) => fuseAtString(bench, id),
  'nuisance-blow': nextRatings,
  'pv-volts-cold': (bench, [id, ...arrays]) => [
    ...fewerInSeries(bench, arrays),
    ...otherController(bench, id, 'maxInputV'),
  ],
  'pv-volts-hot': (bench, [, ...arrays]) => moreInSeries(bench, arrays),
  'controller-amps': (bench, [id]) => {
    const part = bench.drawn(id);
    const isSwitched = part?.kind === 'controller' && part.type === 'pwm';
    return otherController(bench, id, isSwitched ? 'outputA' : 'maxInputA');
  },
  'pv-cable-156': (bench, [id]) => cables(bench, [id]),
  'pv-string-fuse': fuseWithin,
  'pv-wrong-way': (bench, [id]) => blockingDiode(bench, id),
  'inverter-cable': forInverter,
  // None for `interrupt-unknown`: the figure stands in the maker's sheet, and an edit cannot know it. None for `pv-string-fuse` where
  // the strings are drawn as one part: each has to be drawn with its fuse.
  // None for `busbar-fault`: what a bar or a fuse ahead of it withstands or lets through stands in the maker's sheets.
  // None for `joining-surge` and `midpoint-off`, which are about what is done to the blocks before they are joined or charged; nor for
  // `too-many-strings`, `parallel-mix` and `series-mismatch`, which ask for other blocks; nor for `charge-and-load-share-links`,
  // whose taps the study of the bank's layouts moves one by one.
  'charger-volts-off': (bench, ids) => otherSetpoint(bench, ids),
  'cold-charge': (bench, ids) => noColdCharge(bench, ids),
  'terminal-too-cool': (bench, [id]) => cables(bench, [id]),
  'main-switch-small': largerPart,
  'busbar-small': largerPart,
  'gas-no-vent': (bench, ids) => moreAir(bench, ids),
  'spark-near-gas': (bench, [id]) =>
    flagged(bench, id, { field: 'ignitionProtected', words: 'an ignition-protected one' }),
  'battery-loose': (bench, [id]) =>
    fitted(bench, id, { field: 'heldDown', value: true, words: 'strapped down', cost: 'a strap' }),
  'spring-or-crocodile-clip': (bench, [id]) =>
    fitted(bench, id, { field: 'springClip', value: false, words: 'bolted', cost: 'ring terminals' }),
  'bare-live-stud': (bench, [id]) =>
    fitted(bench, id, { field: 'covered', value: true, words: 'its live metal covered', cost: 'a boot or cap' }),
  'drop-added-up': lessLost,
  // None for `stud-crowded`, `mixed-volts`, `ring-feed` and `battery-by-fuel`: parts are led or placed another way; nor for
  // `no-low-cutoff`, `two-source-box` and `isolator-out-of-reach`, which ask for a setting, a sign and a place.
};

/** The ladders of changes for a finding; none where the job has no field for what the remedy asks. */
export function laddersFor(bench: Bench): readonly Ladder[] {
  const [first, ...others] = bench.finding.parts;
  const ladders = byRule[bench.finding.rule];
  if (ladders === undefined || first === undefined) return [];
  return ladders(bench, [first, ...others]).filter(({ rungs }) => rungs.length > 0);
}
