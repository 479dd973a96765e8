/** Which devices lie in series, the one nearer the sources first, with something behind it that the other does not serve. */
import type { PartId } from '../job/part.ts';
import { type Device, isDevice, type Nets, netsOf, polesOf, type SinglePart } from '../network/wiring.ts';
import type { CheckContext } from './checkContext.ts';
import { type DeviceEdge, type LiveSides, liveSides } from './deviceSides.ts';

export interface SeriesPair {
  readonly upstream: Device;
  readonly downstream: Device;
}

/** What goes dead when a device opens, everything else closed: stretches that no device parts, and the parts on them. */
interface Behind {
  readonly nets: ReadonlySet<number>;
  readonly served: ReadonlySet<PartId>;
}

/**
 * A device lies behind another where it is dead once that one is open. Pairs that serve the same parts are left out: whichever
 * opens, the same goes dark. In a ring nothing goes dead, so nothing lies behind.
 */
export function seriesPairs({ drawn }: Pick<CheckContext, 'drawn'>): readonly SeriesPair[] {
  const devices = drawn.filter(isDevice);
  const stretches = new Stretches(drawn, devices);
  const behind = devices.map((device) => ({ device, ...stretches.behind(device) }));
  return behind.flatMap((near) =>
    behind.flatMap((far): readonly SeriesPair[] => {
      if (far === near || near.served.size === 0 || far.served.size <= near.served.size) return [];
      const isBehind = stretches.endsOf(near.device).every((net) => far.nets.has(net));
      return isBehind ? [{ upstream: far.device, downstream: near.device }] : [];
    }),
  );
}

class Stretches {
  private readonly nets: Nets;
  private readonly sides: ReadonlyMap<PartId, LiveSides>;
  private readonly around = new Map<number, DeviceEdge[]>();
  private readonly servedOn = new Map<number, PartId[]>();

  constructor(drawn: readonly SinglePart[], devices: readonly Device[]) {
    this.nets = netsOf(drawn, (part) => !isDevice(part));
    const live = new Set<number>();
    for (const part of drawn) {
      for (const { plus, minus } of polesOf(part)) {
        for (const pole of [plus, minus]) {
          const net = this.nets.of(pole)!;
          if (part.kind === 'string') live.add(net);
          push(this.servedOn, net, part.id);
        }
      }
      if (part.kind === 'string' && part.midpoint !== undefined) live.add(this.nets.of(part.midpoint)!);
    }
    const edges = devices.map(({ id, from, to }) => ({ id, from: this.nets.of(from)!, to: this.nets.of(to)! }));
    for (const edge of edges) {
      push(this.around, edge.from, edge);
      push(this.around, edge.to, edge);
    }
    this.sides = liveSides(edges, (net) => live.has(net));
  }

  endsOf({ from, to }: Device): readonly number[] {
    return [this.nets.of(from)!, this.nets.of(to)!];
  }

  behind(device: Device): Behind {
    const side = this.sides.get(device.id)!;
    const [from, to] = this.endsOf(device);
    if (side.from === side.to) return { nets: new Set(), served: new Set() };
    const nets = new Set([side.from ? to! : from!]);
    const served = new Set<PartId>();
    for (const net of nets) {
      for (const id of this.servedOn.get(net) ?? []) served.add(id);
      for (const edge of this.around.get(net) ?? []) {
        if (edge.id !== device.id) nets.add(edge.from === net ? edge.to : edge.from);
      }
    }
    return { nets, served };
  }
}

function push<Value>(map: Map<number, Value[]>, key: number, value: Value): void {
  const known = map.get(key);
  if (known === undefined) map.set(key, [value]);
  else known.push(value);
}
