/** Whether devices part a fault from every string. */
import type { JunctionId, PartId, StringPart } from '../job/part.ts';
import { nameOf } from '../job/part.ts';
import { type Device, isDevice, type SinglePart } from '../network/wiring.ts';
import { FaultWiring, type Reach } from '../protection/faultReach.ts';
import { FUSE_AT_SOURCE } from './bases.ts';
import type { CheckContext } from './checkContext.ts';
import { livePole } from './livePoles.ts';
import type { Rule, RuleOutcome } from './rule.ts';
import { ELSEWHERE, PASS, Tally, type Verdict } from './tally.ts';
import { placeVerdict, unfusedReach } from './unfusedReach.ts';
import { list, shortList, titleOf, withEdition } from './wording.ts';

/**
 * A stretch is what wiring joins without a fuse or breaker, every switch closed. A fault on it is fed by the strings whose posts lie
 * on it, which nothing parts from it, and by strings beyond the devices round it. Judged are:
 *
 * 1. each string: a stretch with its live post where devices part other strings, and which goes on to more than the string's own
 *    first device, beyond what the practice lets run unfused. A string's own lead up to its first device is for the rule on its length;
 *    strings that all lie bare on one stretch are for the rule on string fuses.
 * 2. each device: one with both its ends on one stretch is bridged by other wiring and parts nothing.
 */
export const faultNotParted: Rule = {
  id: 'fault-not-parted',
  family: 'fuse',
  kinds: ['string', 'fuse', 'breaker'],
  title: 'Devices do not part a fault from every source',
  compares:
    'for each string: does a device part it from every junction at which devices part other strings (beyond the unfused length of the practice)? For each fuse and breaker: does other wiring, every switch closed, join its two ends?',
  remedy:
    'Give every string a fuse or breaker of its own ahead of where it meets the others, and let no wiring run round a device.',
  byPractice: true,
  reads: 'drawing',
  basisFor: (judge) => withEdition(FUSE_AT_SOURCE, judge),
  run: runParted,
};

function runParted(context: CheckContext): RuleOutcome {
  const tally = new Tally(faultNotParted, faultNotParted.basisFor(context));
  const wiring = new FaultWiring(context.drawn.map(asClosed));
  for (const part of context.drawn) {
    if (part.kind === 'string') tally.judge([part.id], [stringVerdict(context, wiring, part)]);
    else if (isDevice(part)) tally.judge([part.id], [bridgedVerdict(context, wiring, part)]);
  }
  return tally.outcome();
}

function asClosed(part: SinglePart): SinglePart {
  return part.kind === 'switch' || isDevice(part) ? { ...part, state: 'closed' } : part;
}

function bridgedVerdict(context: CheckContext, wiring: FaultWiring, device: Device): Verdict {
  const { junctions } = wiring.reach(device.from);
  if (!junctions.has(device.to)) return PASS;
  return {
    kind: 'fail',
    severity: 'fix',
    case: context.cases[0]?.id ?? '',
    measured: { value: 1, unit: '1' },
    limit: { value: 0, unit: '1' },
    excess: Number.POSITIVE_INFINITY,
    message: `${titleOf(device)} parts nothing: with every switch closed other wiring joins its two ends (${device.from} and ${device.to}).`,
  };
}

function stringVerdict(context: CheckContext, wiring: FaultWiring, string: StringPart): Verdict {
  const pole = livePole(context, string);
  const post = string[pole];
  const stretch = wiring.reach(post);
  const other = wiring.reach(string[pole === 'plus' ? 'minus' : 'plus']);
  // A device alone with its other post parts it as well.
  if (stretch.devices.length < 2 || (other.poles.length === 1 && other.devices.length === 1)) return PASS;
  const parted = partedStrings(wiring, stretch, pole);
  if (parted.size === 0) return PASS;
  if (feedsBare(stretch, other)) return ELSEWHERE;
  const reached = unfusedReach(context, post).devices.map((one) =>
    placeVerdict(one, context.practice.unfusedFromBattery),
  );
  if (reached.every(({ kind }) => kind === 'within')) return PASS;
  return notParted(context, { string, stretch, parted });
}

/** Strings beyond the devices round a stretch, each with the devices that part it. */
function partedStrings(wiring: FaultWiring, stretch: Reach, pole: 'plus' | 'minus'): ReadonlyMap<StringPart, Device> {
  const parted = new Map<StringPart, Device>();
  for (const device of stretch.devices) {
    const far: JunctionId = stretch.junctions.has(device.from) ? device.to : device.from;
    if (stretch.junctions.has(far)) continue;
    for (const { part, [pole]: end } of wiring.reach(far, device).poles) {
      if (part.kind === 'string' && !stretch.junctions.has(end) && wiring.reach(far, device).junctions.has(end)) {
        parted.set(part, device);
      }
    }
  }
  return parted;
}

/** A load or charger on both bare stretches of a string is told as fed with no fuse at all. */
function feedsBare(stretch: Reach, other: Reach): boolean {
  return stretch.poles.some((poles) => poles.part.kind !== 'string' && other.poles.includes(poles));
}

function notParted(
  context: CheckContext,
  found: { readonly string: StringPart; readonly stretch: Reach; readonly parted: ReadonlyMap<StringPart, Device> },
): Verdict {
  const { string, stretch, parted } = found;
  const by = [...new Set([...parted.values()].map(({ id }) => id))];
  const others: readonly PartId[] = [...[...parted.keys()].map(({ id }) => id), ...by];
  const at = stretch.devices.map(({ from, to }) => (stretch.junctions.has(from) ? from : to));
  return {
    kind: 'fail',
    severity: 'fix',
    case: context.cases[0]?.id ?? '',
    measured: { value: 1, unit: '1' },
    limit: { value: 0, unit: '1' },
    excess: Number.POSITIVE_INFINITY,
    message: `A fault at ${shortList([...new Set(at)])} is parted from ${list([...parted.keys()].map(nameOf))} by ${list(by)}, but from ${nameOf(string)} by nothing.`,
    others,
  };
}
