/** How far conductors run from a post before a fuse or breaker: the walk along the wire, with the cables on each way. */
import type { CablePart, JunctionId } from '../job/part.ts';
import type { Device, PartEnd } from '../network/wiring.ts';
import { isDevice, isWiring, joined } from '../network/wiring.ts';
import type { UnfusedLength } from '../tables/practiceTable.ts';
import type { Basis } from '../tables/status.ts';
import type { CheckContext } from './checkContext.ts';
import { isOver } from './tally.ts';

/** A device at the end of an unfused way. */
export interface ReachedDevice {
  readonly device: Device;
  /** Along the wire from the post, m; 0 on the post itself. */
  readonly lengthM: number;
  /** On the shortest way, from the post. */
  readonly cables: readonly CablePart[];
}

export interface UnfusedReach {
  readonly devices: readonly ReachedDevice[];
  /** Every cable that no device parts from the post. */
  readonly cables: readonly CablePart[];
  /** Junctions that no device parts from the post, the post first. */
  readonly junctions: ReadonlySet<JunctionId>;
}

interface Step {
  readonly lengthM: number;
  readonly cables: readonly CablePart[];
}

/** Shortest ways from a junction along wiring up to each first device, every switch taken as closed (after Dijkstra 1959). */
export function unfusedReach({ meetings }: CheckContext, post: JunctionId): UnfusedReach {
  const open = new Map<JunctionId, Step>([[post, { lengthM: 0, cables: [] }]]);
  const done = new Set<JunctionId>();
  const devices = new Map<Device['id'], ReachedDevice>();
  const cables = new Set<CablePart>();
  for (let at = nearest(open); at !== undefined; at = nearest(open)) {
    const [junction, step] = at;
    open.delete(junction);
    done.add(junction);
    for (const { part } of meetings.get(junction) ?? []) {
      if (!isWiring(part)) continue;
      if (isDevice(part)) {
        if (!devices.has(part.id)) devices.set(part.id, { device: part, ...step });
        continue;
      }
      if (part.kind === 'cable') cables.add(part);
      const next = part.kind === 'cable' ? along(step, part) : step;
      for (const end of joined(part)) {
        if (done.has(end) || (open.get(end)?.lengthM ?? Number.POSITIVE_INFINITY) <= next.lengthM) continue;
        open.set(end, next);
      }
    }
  }
  return { devices: [...devices.values()], cables: [...cables], junctions: done };
}

function along(step: Step, cable: CablePart): Step {
  return { lengthM: step.lengthM + cable.lengthM, cables: [...step.cables, cable] };
}

function nearest(open: ReadonlyMap<JunctionId, Step>): readonly [JunctionId, Step] | undefined {
  let least: readonly [JunctionId, Step] | undefined;
  for (const entry of open) if (least === undefined || entry[1].lengthM < least[1].lengthM) least = entry;
  return least;
}

/** Parts at the junctions of a reach. */
export function endsAt(reach: UnfusedReach, { meetings }: CheckContext): readonly PartEnd[] {
  return [...reach.junctions].flatMap((junction) => meetings.get(junction) ?? []);
}

type LengthVerdict =
  | { readonly kind: 'within' }
  | { readonly kind: 'beyond'; readonly lengthM: number; readonly limitM: number; readonly basis: Basis }
  /** It depends on whether these are sheathed throughout. */
  | { readonly kind: 'sheath'; readonly of: readonly (CablePart | Device)[] }
  /** The book gives words, no figure. */
  | { readonly kind: 'words'; readonly words: string };

/** The place of a device against the unfused length of a practice; the device's own figures go before the drawing's. */
export function placeVerdict({ device, lengthM: drawnM, cables }: ReachedDevice, limits: UnfusedLength): LengthVerdict {
  const lengthM = device.distanceFromSourceM ?? drawnM;
  const { openM, sheathedM, words } = limits;
  if (openM === undefined) return lengthM === 0 ? { kind: 'within' } : { kind: 'words', words };
  if (!isOver(lengthM, openM.value)) return { kind: 'within' };
  const isLonger = sheathedM !== undefined && sheathedM.value > openM.value;
  if (isLonger && !isOver(lengthM, sheathedM.value)) {
    const wires = device.sheathed === undefined && cables.length > 0 ? cables : [device];
    if (wires.every(({ sheathed }) => sheathed === true)) return { kind: 'within' };
    const unknown = wires.filter(({ sheathed }) => sheathed === undefined);
    if (wires.every(({ sheathed }) => sheathed !== false)) return { kind: 'sheath', of: unknown };
  }
  const isSheathed = device.sheathed ?? (cables.length > 0 && cables.every(({ sheathed }) => sheathed === true));
  const limit = isLonger && isSheathed ? sheathedM : openM;
  return { kind: 'beyond', lengthM, limitM: limit.value, basis: limit.basis };
}
