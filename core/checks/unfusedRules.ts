/** How far a fuse or breaker sits from the string that it is to guard. */
import type { JunctionId, StringPart } from '../job/part.ts';
import type { Device } from '../network/wiring.ts';
import type { Basis } from '../tables/status.ts';
import { FUSE_AT_SOURCE } from './bases.ts';
import type { CheckContext } from './checkContext.ts';
import { livePole } from './livePoles.ts';
import type { Judge, Rule, RuleOutcome } from './rule.ts';
import { missing, PASS, Tally, type Verdict, wanted } from './tally.ts';
import { placeVerdict, type ReachedDevice, unfusedReach } from './unfusedReach.ts';
import { apart, field, list, titleOf, withEdition } from './wording.ts';

export const fuseTooFar: Rule = {
  id: 'fuse-too-far',
  family: 'fuse',
  kinds: ['string'],
  title: 'Fuse or breaker too far from the string',
  compares:
    'length along the wire from the post of each string to each first fuse or breaker in the pole that is not earthed (or distanceFromSourceM of the device) with the unfused length of the practice, open or sheathed',
  remedy: 'Move the fuse nearer to the post, or shorten the unfused piece and sheath it throughout.',
  byPractice: true,
  reads: 'drawing',
  basisFor: (judge) => withEdition(unfusedBasis(judge), judge),
  run: runTooFar,
};

function unfusedBasis({ practice }: Judge): Basis {
  return practice.unfusedFromBattery.openM?.basis ?? FUSE_AT_SOURCE;
}

function runTooFar(context: CheckContext): RuleOutcome {
  const tally = new Tally(fuseTooFar, fuseTooFar.basisFor(context));
  const verdicts = new Map<Device['id'], Verdict[]>();
  for (const string of context.drawn) {
    if (string.kind !== 'string') continue;
    for (const post of livePosts(context, string)) {
      for (const reached of unfusedReach(context, post).devices) {
        const here = verdicts.get(reached.device.id) ?? [];
        here.push(verdictOf(context, string, reached));
        verdicts.set(reached.device.id, here);
      }
    }
  }
  for (const [id, found] of verdicts) tally.judge([id], found);
  return tally.outcome();
}

/** Posts whose cables want a device: the live pole and the middle, where one is tapped. */
function livePosts(context: CheckContext, string: StringPart): readonly JunctionId[] {
  const post = string[livePole(context, string)];
  return string.midpoint === undefined ? [post] : [post, string.midpoint];
}

function verdictOf(context: CheckContext, string: StringPart, reached: ReachedDevice): Verdict {
  const { device, cables } = reached;
  const place = placeVerdict(reached, context.practice.unfusedFromBattery);
  switch (place.kind) {
    case 'within':
      return PASS;
    case 'words':
      return missing(
        `how near ${device.kind} ${device.id} is to string ${string.id}, which a person judges: ${place.words}`,
      );
    case 'sheath':
      return missing(
        `${list(place.of.map((part) => field(part, 'sheathed')))}: whether ${device.kind} ${device.id} sits near enough to string ${string.id}`,
        ...place.of.map((part) => wanted(part, 'sheathed')),
      );
    case 'beyond': {
      const { lengthM, limitM, basis } = place;
      const [found, limit] = apart(lengthM, limitM, 'm');
      return {
        kind: 'fail',
        severity: basis.status === 'common-practice' ? 'look' : 'fix',
        case: context.cases[0]?.id ?? '',
        measured: { value: lengthM, unit: 'm' },
        limit: { value: limitM, unit: 'm' },
        excess: limitM > 0 ? lengthM / limitM : Number.POSITIVE_INFINITY,
        message: `${titleOf(device)} sits ${found} along the wire from string ${string.id}; unfused it may run ${limit} (${context.practice.unfusedFromBattery.words}).`,
        basis: withEdition(basis, context),
        others: [string.id, ...cables.map(({ id }) => id)],
      };
    }
  }
}
