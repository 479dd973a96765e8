/** The drawing with its devices as edges: what a fuse or breaker parts, every switch taken as closed and diodes as open. */
import type { JunctionId } from '../job/part.ts';
import { type Device, isDevice, type Nets, netsOf } from '../network/wiring.ts';
import type { CheckContext } from './checkContext.ts';

class DeviceGraph {
  /** Junctions that no device parts. */
  readonly bare: Nets;
  private readonly around = new Map<number, { readonly device: Device; readonly to: number }[]>();

  constructor({ drawn }: Pick<CheckContext, 'drawn'>) {
    this.bare = netsOf(drawn, (part) => !isDevice(part) && part.kind !== 'diode');
    for (const device of drawn) {
      if (!isDevice(device)) continue;
      const [from, to] = [this.bare.of(device.from)!, this.bare.of(device.to)!];
      this.add(from, { device, to });
      this.add(to, { device, to: from });
    }
  }

  /** Devices with an end where no other device parts them from a junction. */
  devicesAt(junction: JunctionId): readonly Device[] {
    return (this.around.get(this.bare.of(junction)!) ?? []).map(({ device }) => device);
  }

  /** Bare nets that a junction is joined to once some devices are open. */
  reached(junction: JunctionId, opened: (device: Device) => boolean): ReadonlySet<number> {
    const found = new Set([this.bare.of(junction)!]);
    for (const net of found) {
      for (const { device, to } of this.around.get(net) ?? []) if (!opened(device)) found.add(to);
    }
    return found;
  }

  private add(net: number, edge: { readonly device: Device; readonly to: number }): void {
    const here = this.around.get(net);
    if (here === undefined) this.around.set(net, [edge]);
    else here.push(edge);
  }
}

const ofContext = new WeakMap<CheckContext, DeviceGraph>();

/** The device graph of a job as drawn, made once for all rules that ask. */
export function deviceGraphOf(context: CheckContext): DeviceGraph {
  let known = ofContext.get(context);
  if (known === undefined) {
    known = new DeviceGraph(context);
    ofContext.set(context, known);
  }
  return known;
}
