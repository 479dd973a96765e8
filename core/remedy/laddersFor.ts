/** Which changes are worth trying for which rule. */
import type { PartId } from '../job/part.ts';
import { isolated, thickerLinks } from './bankLadders.ts';
import { conductorOf, moreInParallel, thicker } from './cableLadders.ts';
import type { Bench, Ladder } from './candidate.ts';
import { lowerSetpoints, noColdCharge, offInCase, otherSetpoint, weakerCharge } from './chargeLadders.ts';
import { fuseAtString, higherVolts, largerRating, smallerRating } from './deviceLadders.ts';
import { evenLeads } from './shareLadders.ts';
import { anotherString, lessLostTo } from './wayLadders.ts';
import { broughtIntoUse, closedAgain, linksAway, swappedLeads, takenOut } from './wiringLadders.ts';

type LaddersOf = (bench: Bench, parts: readonly [first: PartId, ...others: PartId[]]) => readonly Ladder[];

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
  // None for `joining-surge` and `midpoint-off`, which are about what is done to the blocks before they are joined or charged; nor for
  // `too-many-strings`, `parallel-mix` and `series-mismatch`, which ask for other blocks; nor for `charge-and-load-share-links`,
  // whose taps the study of the bank's layouts moves one by one.
  'charger-volts-off': (bench, ids) => otherSetpoint(bench, ids),
  'cold-charge': (bench, ids) => noColdCharge(bench, ids),
};

/** The ladders of changes for a finding; none where the job has no field for what the remedy asks. */
export function laddersFor(bench: Bench): readonly Ladder[] {
  const [first, ...others] = bench.finding.parts;
  const ladders = byRule[bench.finding.rule];
  if (ladders === undefined || first === undefined) return [];
  return ladders(bench, [first, ...others]).filter(({ rungs }) => rungs.length > 0);
}
