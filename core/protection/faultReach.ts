/** What lies behind a device, up to the next device, load or source. */
import type { JunctionId } from '../job/part.ts';
import {
  type Device,
  isDevice,
  isOpen,
  isWiring,
  joined,
  type Poles,
  polesOf,
  type SinglePart,
  type WiringPart,
} from '../network/wiring.ts';

export interface Reach {
  readonly junctions: ReadonlySet<JunctionId>;
  /** Closed devices that end it, other than the one it lies behind. */
  readonly devices: readonly Device[];
  /** Terminals that it comes to; strings among them. */
  readonly poles: readonly Poles[];
  /** Junctions at which a diode stands in the way of current from the start. */
  readonly blocked: ReadonlySet<JunctionId>;
}

/** Conductors and closed switches carry on, diodes their own way or (`any`) either; fuses and breakers end it; bonds are no way for working current. */
export class FaultWiring {
  private readonly at = new Map<JunctionId, WiringPart[]>();
  private readonly polesAt = new Map<JunctionId, Poles[]>();

  constructor(parts: readonly SinglePart[]) {
    for (const part of parts) {
      if (isWiring(part)) {
        if (part.kind === 'bond' || isOpen(part)) continue;
        for (const junction of joined(part)) push(this.at, junction, part);
      }
      for (const poles of polesOf(part)) {
        push(this.polesAt, poles.plus, poles);
        push(this.polesAt, poles.minus, poles);
      }
    }
  }

  /** From a junction outwards, not through `behind`. */
  reach(start: JunctionId, behind?: Device, diodes: 'along' | 'any' = 'any'): Reach {
    const junctions = new Set([start]);
    const blocked = new Set<JunctionId>();
    const devices = new Set<Device>();
    const poles = new Set<Poles>();
    for (const junction of junctions) {
      for (const end of this.polesAt.get(junction) ?? []) poles.add(end);
      for (const part of this.at.get(junction) ?? []) {
        if (part === behind) continue;
        if (isDevice(part)) devices.add(part);
        else if (part.kind === 'diode' && diodes === 'along' && junction === part.to) blocked.add(junction);
        else for (const other of joined(part)) junctions.add(other);
      }
    }
    return { junctions, devices: [...devices], poles: [...poles], blocked };
  }

  /** Does only one conductor end here? */
  isEnd(junction: JunctionId): boolean {
    return (this.at.get(junction)?.length ?? 0) === 1;
  }
}

function push<Value>(map: Map<JunctionId, Value[]>, key: JunctionId, value: Value): void {
  const known = map.get(key);
  if (known === undefined) map.set(key, [value]);
  else known.push(value);
}
