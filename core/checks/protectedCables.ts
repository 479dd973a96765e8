/**
 * Which cables a fuse or breaker protects. Method, on the drawing with every switch closed:
 *
 * 1. The side of the device that no string can reach once the device is open is its downstream side. Every cable there, through
 *    all branches up to the next fuse or breaker, is protected by it: a short anywhere there is fed through it.
 * 2. On a side that strings reach without the device (its source side, or both sides where parallel strings or a ring feed it),
 *    only the cables in series with it count: along junctions where nothing else meets, up to the first branch, terminal or device.
 *    They carry its current and no other.
 * 3. From each load, inverter, charger, controller or converter that step 1 or 2 comes to, the cable at its other terminal counts
 *    as far as it is in series (as in 2): the return of the same circuit.
 *
 * Where no string reaches either side, chargers, arrays, controllers and converters take the part of the strings.
 */
import type { CablePart, JunctionId, Part, PartId } from '../job/part.ts';
import type { Device, Nets, PartEnd, Poles, SinglePart } from '../network/wiring.ts';
import { isDevice, isWiring, joined, meetings, netsOf, polesOf, withoutPairs } from '../network/wiring.ts';
import type { CheckContext } from './checkContext.ts';
import { type LiveSides, liveSides } from './deviceSides.ts';

export class ProtectedCables {
  private readonly meetings: ReadonlyMap<JunctionId, readonly PartEnd[]>;
  /** Junctions joined without any fuse or breaker. */
  private readonly nets: Nets;
  private readonly cablesOf = new Map<number, CablePart[]>();
  private readonly polesOn = new Map<number, Poles[]>();
  private readonly sides: readonly ReadonlyMap<PartId, LiveSides>[];
  private readonly stringNets = new Set<number>();
  private readonly sourceNets = new Set<number>();

  constructor(parts: readonly SinglePart[], meetings: ReadonlyMap<JunctionId, readonly PartEnd[]>) {
    this.meetings = meetings;
    this.nets = netsOf(parts, (part) => !isDevice(part));
    for (const part of parts) {
      if (part.kind === 'cable') this.add(this.cablesOf, part.from, part);
      else for (const poles of polesOf(part)) this.addPoles(poles);
    }
    const edges = parts.filter(isDevice).map(({ id, from, to }) => ({ id, from: this.net(from), to: this.net(to) }));
    this.sides = [this.stringNets, this.sourceNets].map((nets) => liveSides(edges, (net) => nets.has(net)));
  }

  /** Every cable that the device protects, its `from` side first. */
  of(device: Device): readonly CablePart[] {
    const found = new Set<CablePart>();
    const [from, to] = [this.net(device.from), this.net(device.to)];
    const live = this.sides.map((sides) => sides.get(device.id)!).find((side) => side.from || side.to) ?? DEAD;
    for (const [end, net, isLive] of [
      [device.from, from, live.from],
      [device.to, to, live.to],
    ] as const) {
      if (isLive) this.alongSeries(end, device, found);
      else this.allOf(net, found);
    }
    return [...found];
  }

  private allOf(net: number, found: Set<CablePart>): void {
    for (const cable of this.cablesOf.get(net) ?? []) found.add(cable);
    for (const { part, plus, minus } of this.polesOn.get(net) ?? []) {
      if (part.kind === 'string') continue;
      const other = this.net(plus) === net ? minus : plus;
      if (this.net(other) !== net) this.alongSeries(other, part, found);
    }
  }

  /** Cables from a junction on, away from `behind`, as long as exactly one other part meets there. */
  private alongSeries(start: JunctionId, behind: SinglePart, found: Set<CablePart>): void {
    const passed = new Set<PartId>([behind.id]);
    let junction = start;
    let last = behind.id;
    for (;;) {
      const ends = this.meetings.get(junction) ?? [];
      const next = ends.find(({ part }) => part.id !== last)?.part;
      if (ends.length !== 2 || next === undefined || passed.has(next.id) || isDevice(next)) return;
      passed.add(next.id);
      const beyond = isWiring(next) ? otherEnd(joined(next), junction) : throughPart(next, junction);
      if (beyond === undefined) return;
      if (next.kind === 'cable') found.add(next);
      last = next.id;
      junction = beyond;
    }
  }

  private net(junction: JunctionId): number {
    return this.nets.of(junction)!;
  }

  private addPoles(poles: Poles): void {
    this.add(this.polesOn, poles.plus, poles);
    if (this.net(poles.minus) !== this.net(poles.plus)) this.add(this.polesOn, poles.minus, poles);
    if (poles.role !== 'source') return;
    const { part } = poles;
    const terminals = [poles.plus, poles.minus];
    if (part.kind === 'string' && part.midpoint !== undefined) terminals.push(part.midpoint);
    for (const terminal of terminals)
      (part.kind === 'string' ? this.stringNets : this.sourceNets).add(this.net(terminal));
  }

  private add<T>(map: Map<number, T[]>, junction: JunctionId, value: T): void {
    const net = this.net(junction);
    const here = map.get(net);
    if (here === undefined) map.set(net, [value]);
    else if (!here.includes(value)) here.push(value);
  }
}

/** No source reaches the device at all: what is in series with it counts on both sides. */
const DEAD: LiveSides = { from: true, to: true };

/** The far junction of a part with two ends; `undefined` for a bar with more, which is a branch. */
function otherEnd(ends: readonly JunctionId[], near: JunctionId): JunctionId | undefined {
  if (ends.length !== 2) return undefined;
  return ends[0] === near ? ends[1] : ends[0];
}

/** The other terminal of a part in the loop; `undefined` for a string, where the loop begins. */
function throughPart(part: SinglePart, near: JunctionId): JunctionId | undefined {
  if (part.kind === 'string') return undefined;
  const poles = polesOf(part).find(({ plus, minus }) => plus === near || minus === near);
  if (poles === undefined) return undefined;
  return poles.plus === near ? poles.minus : poles.plus;
}

const ofContext = new WeakMap<CheckContext, ProtectedCables>();

/** The protected cables of a job as drawn, found once for all rules that ask. */
export function protectedCablesOf(context: CheckContext): ProtectedCables {
  let known = ofContext.get(context);
  if (known === undefined) {
    known = new ProtectedCables(context.drawn, context.meetings);
    ofContext.set(context, known);
  }
  return known;
}

/** The cables that each fuse or breaker of a drawing protects. */
export function protectedBy(parts: readonly Part[]): (device: Device) => readonly CablePart[] {
  const drawn = withoutPairs(parts);
  const cables = new ProtectedCables(drawn, meetings(drawn));
  return (device) => cables.of(device);
}
