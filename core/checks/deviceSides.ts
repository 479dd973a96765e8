/**
 * Which sides of each fuse and breaker the sources still reach once that device is open. Nets are the corners of a graph, devices
 * its edges; a device whose opening parts the graph is a bridge, found for all devices in one walk (depth first, with the earliest
 * corner that each subtree reaches another way, after Tarjan 1974).
 */
import type { PartId } from '../job/part.ts';

export interface DeviceEdge {
  readonly id: PartId;
  readonly from: number;
  readonly to: number;
}

/** Is there a source on the `from` side, on the `to` side, the device being open? */
export interface LiveSides {
  readonly from: boolean;
  readonly to: boolean;
}

interface Visit {
  readonly net: number;
  /** Edge by which it was entered. */
  readonly via: DeviceEdge | undefined;
  next: number;
}

export function liveSides(
  edges: readonly DeviceEdge[],
  isSource: (net: number) => boolean,
): ReadonlyMap<PartId, LiveSides> {
  const around = new Map<number, DeviceEdge[]>();
  for (const edge of edges) {
    listAt(around, edge.from).push(edge);
    if (edge.to !== edge.from) listAt(around, edge.to).push(edge);
  }
  const walk = new Walk(around, isSource);
  const sides = new Map<PartId, LiveSides>();
  for (const start of around.keys()) walk.from(start);
  for (const edge of edges) sides.set(edge.id, walk.sidesOf(edge));
  return sides;
}

class Walk {
  private readonly around: ReadonlyMap<number, readonly DeviceEdge[]>;
  private readonly isSource: (net: number) => boolean;
  private readonly order = new Map<number, number>();
  private readonly low = new Map<number, number>();
  /** Source nets in the subtree below each net, itself included. */
  private readonly sources = new Map<number, number>();
  private readonly root = new Map<number, number>();
  /** Net that each bridge leads down to. */
  private readonly bridges = new Map<PartId, number>();

  constructor(around: ReadonlyMap<number, readonly DeviceEdge[]>, isSource: (net: number) => boolean) {
    this.around = around;
    this.isSource = isSource;
  }

  from(start: number): void {
    if (this.order.has(start)) return;
    const path = [this.enter(start, undefined, start)];
    for (let at = path.at(-1); at !== undefined; at = path.at(-1)) {
      const edge = this.around.get(at.net)?.[at.next++];
      if (edge === undefined) {
        path.pop();
        this.leave(at, path.at(-1));
        continue;
      }
      if (edge === at.via) continue;
      const other = edge.from === at.net ? edge.to : edge.from;
      const seen = this.order.get(other);
      if (seen === undefined) path.push(this.enter(other, edge, start));
      else this.low.set(at.net, Math.min(this.low.get(at.net)!, seen));
    }
  }

  sidesOf({ id, from, to }: DeviceEdge): LiveSides {
    const total = this.sources.get(this.root.get(from)!)!;
    const below = this.bridges.get(id);
    if (below === undefined) return { from: total > 0, to: total > 0 };
    const down = this.sources.get(below)! > 0;
    const up = total - this.sources.get(below)! > 0;
    return below === to ? { from: up, to: down } : { from: down, to: up };
  }

  private enter(net: number, via: DeviceEdge | undefined, root: number): Visit {
    this.order.set(net, this.order.size);
    this.low.set(net, this.order.get(net)!);
    this.sources.set(net, this.isSource(net) ? 1 : 0);
    this.root.set(net, root);
    return { net, via, next: 0 };
  }

  private leave(done: Visit, above: Visit | undefined): void {
    if (above === undefined || done.via === undefined) return;
    const low = this.low.get(done.net)!;
    this.low.set(above.net, Math.min(this.low.get(above.net)!, low));
    this.sources.set(above.net, this.sources.get(above.net)! + this.sources.get(done.net)!);
    if (low > this.order.get(above.net)!) this.bridges.set(done.via.id, done.net);
  }
}

function listAt(map: Map<number, DeviceEdge[]>, net: number): DeviceEdge[] {
  const known = map.get(net);
  if (known !== undefined) return known;
  const fresh: DeviceEdge[] = [];
  map.set(net, fresh);
  return fresh;
}
