/** Devices against what is printed on the part behind them, and against direct current itself. */
import type {
  ArrayPart,
  ChargerPart,
  ControllerPart,
  ConverterPart,
  InverterPart,
  LoadPart,
  StringPart,
  SwitchPart,
} from '../job/part.ts';
import { type Device, isDevice, joined, netsOf, type Poles, polesOf, type SinglePart } from '../network/wiring.ts';
import type { Basis } from '../tables/status.ts';
import { entered, PART_RATING } from './bases.ts';
import type { CheckContext } from './checkContext.ts';
import { liveSides } from './deviceSides.ts';
import type { Rule } from './rule.ts';
import { inSeries } from './seriesWalk.ts';
import { isOver, missing, missingField, PASS, Tally, type Verdict, wanted } from './tally.ts';
import { apart, field, shortList, titleOf, together, volts } from './wording.ts';

type LimitedPart = InverterPart | ControllerPart | ChargerPart | ConverterPart | StringPart | LoadPart | ArrayPart;

export const fuseOverDeviceLimit: Rule = {
  id: 'fuse-over-device-limit',
  family: 'fuse',
  kinds: ['inverter', 'controller', 'charger', 'converter', 'string', 'load', 'array'],
  title: 'Fuse or breaker above the largest printed on the part behind it',
  compares:
    'rating of the fuse or breaker that protects each inverter, controller, charger, converter, string, load and array (in series with it, else the one that feeds its branch) with its maxFuseA',
  remedy: "Fit a device no larger than the part's own limit, and no larger than the cable's.",
  byPractice: false,
  reads: 'drawing',
  basisFor: () => PART_RATING,
  run: (context) => {
    const tally = new Tally(fuseOverDeviceLimit, PART_RATING);
    const devices = new ServingDevices(context);
    const unsaid: LimitedPart[] = [];
    for (const part of context.drawn) {
      if (!isLimited(part)) continue;
      const serving = polesOf(part).flatMap((poles) => devices.of(poles) ?? []);
      const largest = serving.reduce<Device | undefined>(
        (a, b) => (a === undefined || b.ratingA > a.ratingA ? b : a),
        undefined,
      );
      // Nothing protects it at all: told by the rule about sources without a fuse.
      if (largest === undefined) continue;
      if (part.maxFuseA !== undefined) tally.judge([part.id], [limitVerdict(context, part, largest, part.maxFuseA)]);
      else if (printsLimit(part)) unsaid.push(part);
    }
    if (unsaid.length > 0) {
      const gap = missing(
        `${shortList(unsaid.map((part) => field(part, 'maxFuseA')))}: the largest fuse printed for it`,
        ...unsaid.map((part) => wanted(part, 'maxFuseA')),
      );
      tally.judge(
        unsaid.map(({ id }) => id),
        [gap],
      );
    }
    return tally.outcome();
  },
};

function isLimited(part: SinglePart): part is LimitedPart {
  return fuseOverDeviceLimit.kinds.includes(part.kind);
}

/** Electronics carry such a figure on the plate or in the manual; loads, strings and alternators mostly do not. */
function printsLimit(part: LimitedPart): boolean {
  if (part.kind === 'charger') return part.source !== 'alternator';
  return part.kind === 'inverter' || part.kind === 'controller' || part.kind === 'converter';
}

function limitVerdict(context: CheckContext, part: LimitedPart, device: Device, maxFuseA: number): Verdict {
  if (!isOver(device.ratingA, maxFuseA)) return PASS;
  const [rated, most] = apart(device.ratingA, maxFuseA, 'A');
  return {
    kind: 'fail',
    severity: 'fix',
    case: context.cases[0]?.id ?? '',
    measured: { value: device.ratingA, unit: 'A' },
    limit: { value: maxFuseA, unit: 'A' },
    excess: device.ratingA / maxFuseA,
    message: `${titleOf(device)}, ${rated}, protects ${part.kind} ${part.id}, whose own limit is a fuse of ${most}.`,
    basis: together(PART_RATING, entered(part, 'maxFuseA')),
    others: [device.id],
  };
}

/** Which device protects what hangs on two poles. */
class ServingDevices {
  private readonly context: CheckContext;
  private readonly bare: CheckContext['nets'];
  private readonly devices: readonly Device[];
  private readonly live: ReturnType<typeof liveSides>;

  constructor(context: CheckContext) {
    this.context = context;
    this.devices = context.drawn.filter(isDevice);
    this.bare = netsOf(context.drawn, (part) => !isDevice(part));
    const strings = new Set<number>();
    for (const part of context.drawn) {
      if (part.kind !== 'string') continue;
      for (const junction of [part.plus, part.minus]) strings.add(this.bare.of(junction)!);
    }
    const edges = this.devices.map(({ id, from, to }) => ({ id, from: this.bare.of(from)!, to: this.bare.of(to)! }));
    this.live = liveSides(edges, (net) => strings.has(net));
  }

  /**
   * The nearest device in series with either pole (the smallest, where both have one); else the largest that feeds the plus net,
   * else the minus net, from its far side. `undefined` where there is none.
   */
  of({ part, plus, minus }: Poles): Device | undefined {
    const near = [plus, minus].flatMap((start) => {
      const first = inSeries(this.context, start, part.id).find(isDevice);
      return first === undefined ? [] : [first];
    });
    if (near.length > 0) return near.reduce((a, b) => (b.ratingA < a.ratingA ? b : a));
    for (const junction of [plus, minus]) {
      const feeding = this.devices.filter((device) => this.feeds(device, this.bare.of(junction)!));
      if (feeding.length > 0) return feeding.reduce((a, b) => (b.ratingA > a.ratingA ? b : a));
    }
    return undefined;
  }

  /** A short on the net is fed through the device: a string reaches its far side, and its near side lies on the net. */
  private feeds(device: Device, net: number): boolean {
    const sides = this.live.get(device.id);
    if (sides === undefined) return false;
    const [from, to] = [this.bare.of(device.from), this.bare.of(device.to)];
    return from !== to && ((from === net && sides.to) || (to === net && sides.from));
  }
}

const DC_MARKED: Basis = {
  source: 'SRC-DC-MARKING',
  text: "parts to be marked for the current that they break: NEC (NFPA 70), numbering of 2023, 690.9 and 706 (listed for direct current), second-hand; a fuse maker's application guide",
  status: 'published',
};
/** An arc of direct current in air is hard to hold below about so many volts; above, an alternating-current part may not put it out. */
const ASK_ABOVE_V = 30;

/**
 * `ratingV` of a job is volts of direct current, so a part with one counts as rated; above 30 V, where an arc holds and a figure
 * for alternating current is easily taken for one, `dcRated` is asked for besides, unless the fuse is of a type sold for
 * direct current.
 */
export const acPartOnDc: Rule = {
  id: 'ac-part-on-dc',
  family: 'rating',
  kinds: ['fuse', 'breaker', 'switch'],
  title: 'Part for alternating current used on direct current',
  compares:
    'dcRated of each fuse, breaker and switch (a ratingV counts as direct current; above 30 V the mark itself is asked for, but for fuse types sold for direct current)',
  remedy: 'Replace it by a part rated for direct current at these volts.',
  byPractice: false,
  reads: 'drawing',
  basisFor: () => DC_MARKED,
  run: (context) => {
    const tally = new Tally(acPartOnDc, DC_MARKED);
    for (const part of context.drawn) {
      if (isDevice(part) || part.kind === 'switch') tally.judge([part.id], [markVerdict(context, part)]);
    }
    return tally.outcome();
  },
};

function markVerdict(context: CheckContext, part: Device | SwitchPart): Verdict {
  const highest = context.volts.highestAt(joined(part)[0]!)?.volts;
  if (part.dcRated === false) {
    const here = highest === undefined ? '' : `, and has up to ${volts(highest)} here`;
    return {
      kind: 'fail',
      severity: 'stop',
      case: context.cases[0]?.id ?? '',
      measured: { value: highest ?? 0, unit: 'V' },
      limit: { value: 0, unit: 'V' },
      excess: Number.POSITIVE_INFINITY,
      message: `${titleOf(part)} is not rated for direct current${here}: its arc may not go out.`,
    };
  }
  if (part.dcRated === true) return PASS;
  if (part.ratingV === undefined) return missingField(part, 'dcRated', ': is it marked for direct current?');
  const isSoldForDc =
    part.kind === 'fuse' && context.tables.devices.typicalInterrupt.some(({ type }) => type === part.type);
  if (isSoldForDc || highest === undefined || !isOver(highest, ASK_ABOVE_V)) return PASS;
  return missingField(part, 'dcRated', `: at ${volts(highest)} the mark for direct current decides`);
}

/** The smallest `maxFuseA` of the parts that each device protects. */
export function limitsOverDevices(context: CheckContext): ReadonlyMap<Device['id'], number> {
  const devices = new ServingDevices(context);
  const limits = new Map<Device['id'], number>();
  for (const part of context.drawn) {
    if (!isLimited(part) || part.maxFuseA === undefined) continue;
    for (const { id } of polesOf(part).flatMap((poles) => devices.of(poles) ?? [])) {
      limits.set(id, Math.min(part.maxFuseA, limits.get(id) ?? Number.POSITIVE_INFINITY));
    }
  }
  return limits;
}
