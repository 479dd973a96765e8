/** The cable of a charger, controller or converter towards the strings: the device at its own end, and the size of a generator's. */
import type { JunctionId } from '../job/part.ts';
import type { Device, Poles } from '../network/wiring.ts';
import { isDevice, isWiring, joined } from '../network/wiring.ts';
import type { Basis } from '../tables/status.ts';
import type { CheckContext } from './checkContext.ts';
import { clauseOf } from './clauses.ts';
import { livePole } from './livePoles.ts';
import type { Rule, RuleOutcome } from './rule.ts';
import { ELSEWHERE, isOver, missing, missingField, PASS, sizeWanted, Tally, type Verdict, wanted } from './tally.ts';
import { endsAt, placeVerdict, type UnfusedReach, unfusedReach } from './unfusedReach.ts';
import { amps, apart, field, list, percent, titleOf, withEdition } from './wording.ts';

export const chargerEndOpen: Rule = {
  id: 'charger-end-open',
  family: 'fuse',
  kinds: ['charger', 'controller', 'converter'],
  title: 'Charging source without a device at its own end',
  compares:
    'for each charger, controller and converter that charges strings: is a fuse or breaker within the unfused length of its output, or else does it limit itself to a current that every cable up to the first device may carry',
  remedy:
    'Fuse the battery end always; fuse the charger end too, or show that it limits itself and size its cable for its output.',
  byPractice: true,
  reads: 'drawing',
  basisFor: (judge) => clauseOf('charger-end-open', judge),
  run: runChargerEnd,
};

type ChargingPoles = Poles & { readonly part: Extract<Poles['part'], { readonly outputA: number }> };

function runChargerEnd(context: CheckContext): RuleOutcome {
  const tally = new Tally(chargerEndOpen, chargerEndOpen.basisFor(context));
  for (const poles of chargingPoles(context)) {
    if (context.volts.sharesBank(poles.plus, poles.minus))
      tally.judge([poles.part.id], [chargerVerdict(context, poles)]);
  }
  return tally.outcome();
}

/** Outputs that may charge. */
function chargingPoles(context: CheckContext): readonly ChargingPoles[] {
  return context.drawn.flatMap((part): readonly ChargingPoles[] => {
    if (part.kind === 'charger') return [{ part, role: 'source', plus: part.plus, minus: part.minus }];
    if (part.kind === 'controller' || part.kind === 'converter') return [{ part, role: 'source', ...part.to }];
    return [];
  });
}

function chargerVerdict(context: CheckContext, poles: ChargingPoles): Verdict {
  const { part } = poles;
  const reach = unfusedReach(context, poles[livePole(context, poles)]);
  // No device up to the strings at all is told of the strings.
  if (endsAt(reach, context).some((end) => end.part.kind === 'string')) return ELSEWHERE;
  const places = reach.devices.map((reached) =>
    placeVerdict(withoutOwnDistance(reached), context.practice.chargingSource),
  );
  if (places.every(({ kind }) => kind === 'within')) return PASS;
  // A controller or converter has its limit as its nature.
  const limits = part.kind === 'charger' ? part.selfLimiting : true;
  if (limits === true) return cablesVerdict(context, poles, reach);
  const unknown = places.flatMap((place) => (place.kind === 'sheath' ? place.of : []));
  if (limits === undefined && places.every(({ kind }) => kind === 'within' || kind === 'sheath')) {
    const what = [...unknown.map((wire) => field(wire, 'sheathed')), field(part, 'selfLimiting')].join(' or ');
    return missing(what, ...unknown.map((wire) => wanted(wire, 'sheathed')), wanted(part, 'selfLimiting'));
  }
  if (limits === undefined) return missingField(part, 'selfLimiting', ': else it wants a device at its own end');
  if (unknown.length > 0 && places.every(({ kind }) => kind !== 'beyond')) {
    return missing(
      list(unknown.map((wire) => field(wire, 'sheathed'))),
      ...unknown.map((wire) => wanted(wire, 'sheathed')),
    );
  }
  return endOpen(context, poles, reach);
}

/** `distanceFromSourceM` of a device is told of the battery that it guards. */
function withoutOwnDistance<T extends { readonly device: Device }>(reached: T): T {
  return { ...reached, device: { ...reached.device, distanceFromSourceM: undefined, sheathed: undefined } };
}

function endOpen(context: CheckContext, { part }: ChargingPoles, { devices, cables }: UnfusedReach): Verdict {
  const farM = Math.max(...devices.map(({ lengthM }) => lengthM));
  const { openM, words } = context.practice.chargingSource;
  const limitM = openM?.value ?? 0;
  const [found, limit] = apart(farM, limitM, 'm');
  return {
    kind: 'fail',
    severity: 'fix',
    case: context.cases[0]?.id ?? '',
    measured: { value: farM, unit: 'm' },
    limit: { value: limitM, unit: 'm' },
    excess: limitM > 0 ? farM / limitM : Number.POSITIVE_INFINITY,
    message: `${titleOf(part)} does not limit itself, and its first fuse or breaker is ${found} along the wire; ${limit} is allowed (${words}).`,
    others: cables.map(({ id }) => id),
  };
}

function cablesVerdict(context: CheckContext, { part }: ChargingPoles, { cables }: UnfusedReach): Verdict {
  const ambientDegC = Math.max(...context.cases.map((one) => one.ambientDegC));
  let worst: Verdict = PASS;
  let leastA = part.outputA;
  for (const cable of cables) {
    const ampacity = context.ampacityOf(cable, ambientDegC);
    if ('missing' in ampacity) return missing(ampacity.missing, ...sizeWanted(cable));
    if (!isOver(leastA, ampacity.finalA)) continue;
    leastA = ampacity.finalA;
    const [output, carries] = apart(part.outputA, leastA, 'A');
    worst = {
      kind: 'fail',
      severity: 'fix',
      case: context.cases[0]?.id ?? '',
      measured: { value: part.outputA, unit: 'A' },
      limit: { value: leastA, unit: 'A' },
      excess: part.outputA / leastA,
      message: `${titleOf(part)} can give ${output} into cable ${cable.id}, which may carry ${carries}, with no fuse or breaker at its own end.`,
      others: [cable.id],
    };
  }
  return worst;
}

export const generatorFuseSize: Rule = {
  id: 'generator-fuse-size',
  family: 'fuse',
  kinds: ['charger'],
  title: 'Fuse or breaker much above the output of an alternator or generator',
  compares:
    'rating of each fuse and breaker in series with an alternator or generator with 115 % of its rated output, where the practice asks for it',
  remedy: 'Choose a fuse at or just above the largest output when hot, still within what the cable may carry.',
  byPractice: true,
  reads: 'drawing',
  basisFor: (judge) => withEdition(judge.practice.generatorFuseFactor?.basis ?? NO_FACTOR, judge),
  run: runGeneratorFuse,
};

/** For a practice without the figure: where it comes from, and that it does not apply. */
const NO_FACTOR: Basis = {
  source: 'SRC-CFR46-28-860',
  text: '46 CFR 28.860; the chosen practice has no such figure',
  status: 'published',
};

function runGeneratorFuse(context: CheckContext): RuleOutcome {
  const tally = new Tally(generatorFuseSize, generatorFuseSize.basisFor(context));
  const factor = context.practice.generatorFuseFactor?.value;
  if (factor === undefined) return tally.outcome();
  for (const poles of chargingPoles(context)) {
    const { part } = poles;
    if (part.kind !== 'charger' || isOther(part.source)) continue;
    for (const device of inSeries(context, poles[livePole(context, poles)], part.id)) {
      tally.judge([device.id], [sizeVerdict(context, { device, outputA: part.outputA, factor, part })]);
    }
  }
  return tally.outcome();
}

/** A source that names something that does not turn. */
function isOther(source: string | undefined): boolean {
  return source !== undefined && !/generator|alternator|dynamo/i.test(source);
}

function sizeVerdict(
  context: CheckContext,
  at: {
    readonly device: Device;
    readonly outputA: number;
    readonly factor: number;
    readonly part: ChargingPoles['part'];
  },
): Verdict {
  const { device, outputA, factor, part } = at;
  const limitA = factor * outputA;
  if (!isOver(device.ratingA, limitA)) return PASS;
  if (part.kind === 'charger' && part.source === undefined) return missingField(part, 'source', ': is it a generator?');
  const [rated, limit] = apart(device.ratingA, limitA, 'A');
  return {
    kind: 'fail',
    severity: 'look',
    case: context.cases[0]?.id ?? '',
    measured: { value: device.ratingA, unit: 'A' },
    limit: { value: limitA, unit: 'A' },
    excess: device.ratingA / limitA,
    message: `${titleOf(device)}, ${rated}, is above ${limit}: ${percent(factor)} of the ${amps(outputA)} that ${part.id} gives.`,
    others: [part.id],
  };
}

/** Devices that carry the current of one part and no other: along junctions where nothing else meets. */
function inSeries(context: CheckContext, post: JunctionId, behind: string): readonly Device[] {
  const found: Device[] = [];
  let [junction, last] = [post, behind];
  for (;;) {
    const ends = context.meetings.get(junction) ?? [];
    const next = ends.find(({ part }) => part.id !== last)?.part;
    if (ends.length !== 2 || next === undefined || !isWiring(next) || joined(next).length !== 2) return found;
    if (isDevice(next)) {
      if (found.includes(next)) return found;
      found.push(next);
    }
    junction = joined(next).find((end) => end !== junction)!;
    last = next.id;
  }
}
