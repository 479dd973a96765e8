/** What a fuse or breaker may have to break, and the least that must make it open. */
import type { JunctionId } from '../job/part.ts';
import { type Device, isDevice } from '../network/wiring.ts';
import type { DeviceFault } from './answer.ts';
import type { FaultModel, FaultPair } from './faultModel.ts';
import type { FaultNetwork } from './faultNetwork.ts';
import { FaultWiring } from './faultReach.ts';
import { type FaultState, NOTHING_A } from './faultState.ts';

export interface DeviceChoice {
  /** All where not said. */
  readonly isWanted?: (device: Device) => boolean;
  /** The least is left out: its figures are null. */
  readonly highestOnly?: boolean;
}

/** Closed devices whose two ends a source reaches. */
export function deviceFaults(
  model: FaultModel,
  { isWanted = () => true, highestOnly = false }: DeviceChoice = {},
): readonly DeviceFault[] {
  const study = new DeviceStudy(model, highestOnly);
  return model.parts.filter(isDevice).flatMap((device) => {
    const found = device.state === 'closed' && isWanted(device) ? study.of(device) : null;
    return found === null ? [] : [found];
  });
}

/** A fault behind a device, on the side of `at`. */
interface FarFault {
  readonly at: JunctionId;
  readonly to: JunctionId;
  readonly currentA: number;
}

class DeviceStudy {
  readonly model: FaultModel;
  private readonly highestOnly: boolean;
  readonly wiring: FaultWiring;
  private readonly sources: readonly { readonly plus: JunctionId; readonly minus: JunctionId }[];

  constructor(model: FaultModel, highestOnly: boolean) {
    this.model = model;
    this.highestOnly = highestOnly;
    this.wiring = new FaultWiring(model.parts);
    const strings = model.parts.flatMap((part) => (part.kind === 'string' ? [part] : []));
    this.sources = [...strings, ...model.limited];
  }

  of(device: Device): DeviceFault | null {
    const sides = [device.to, device.from].map((at) => {
      const to = this.otherPole(at);
      return { at, to, currentA: to === null ? 0 : this.right(device, at, to) };
    });
    const [forward, backward] = [sides[0]!, sides[1]!];
    if (forward.to === null && backward.to === null) return null;
    const most = backward.currentA > forward.currentA ? backward : forward;
    const least = this.highestOnly ? null : this.least(device, sides);
    return {
      device: device.id,
      at: most.at,
      highestA: most.currentA,
      lowestAt: least?.at ?? null,
      lowestTo: least?.to ?? null,
      lowestA: least === null ? null : Math.min(least.currentA, most.currentA),
      fromBothSides: forward.currentA > NOTHING_A && backward.currentA > NOTHING_A,
      sides: sides.map(({ at, currentA }) => ({ at, highestA: currentA })),
    };
  }

  private readonly asked = new Map<FaultNetwork, Map<string, FaultState | null>>();
  /** Devices on one bar ask for the same faults: each is solved once. */
  private fault(network: FaultNetwork, at: JunctionId, to: JunctionId): FaultState | null {
    const known = this.asked.get(network) ?? new Map<string, FaultState | null>();
    this.asked.set(network, known);
    const key = JSON.stringify([at, to]);
    let state = known.get(key);
    if (state === undefined) {
      state = network.fault(at, to);
      known.set(key, state);
    }
    return state;
  }

  /** The most through a device for a fault right behind it, at its end `at`. */
  private right(device: Device, at: JunctionId, to: JunctionId): number {
    return this.towards(this.model.most.first, device, { behind: at, at, to });
  }

  /** The least over the far ends on either side that a source beyond the device reaches, settled. */
  private least(device: Device, sides: readonly { readonly at: JunctionId }[]): FarFault | null {
    let least: FarFault | null = null;
    for (const { at: behind } of sides) {
      for (const { at, to } of this.farEnds(device, behind)) {
        for (const pair of this.model.least) {
          const currentA = this.towards(pair.settled, device, { behind, at, to });
          if (currentA > NOTHING_A && (least === null || currentA < least.currentA)) least = { at, to, currentA };
        }
      }
    }
    return least;
  }

  /** Through the device to its end `behind`; all of the fault where the split is not determined. */
  private towards(
    network: FaultPair['first'],
    device: Device,
    { behind, at, to }: { readonly behind: JunctionId; readonly at: JunctionId; readonly to: JunctionId },
  ): number {
    const state = this.fault(network, at, to);
    if (state === null) return 0;
    const through = state.through(device.id);
    if (through === null) return Math.abs(state.currentA);
    // In the plus pole a fault draws towards `behind`; in the minus pole it comes back out of it.
    const sign = (behind === device.to ? 1 : -1) * (state.currentA < 0 ? -1 : 1);
    return Math.max(0, sign * through);
  }

  /** Where what a device protects ends: terminals, the next devices, bare ends. */
  private farEnds(device: Device, behind: JunctionId): readonly { readonly at: JunctionId; readonly to: JunctionId }[] {
    const { junctions, devices, poles, blocked } = this.wiring.reach(behind, device, 'along');
    const ends: { at: JunctionId; to: JunctionId }[] = [];
    for (const { plus, minus } of poles) {
      if (junctions.has(plus) && !junctions.has(minus)) ends.push({ at: plus, to: minus });
      else if (junctions.has(minus) && !junctions.has(plus)) ends.push({ at: minus, to: plus });
    }
    const pole = this.otherPole(behind);
    if (pole === null) return ends;
    const bare = new Set(devices.flatMap(({ from, to }) => [from, to]).filter((junction) => junctions.has(junction)));
    for (const junction of junctions) if (this.wiring.isEnd(junction)) bare.add(junction);
    for (const junction of blocked) bare.add(junction);
    for (const end of ends) bare.delete(end.at);
    for (const at of bare) ends.push({ at, to: pole });
    return ends;
  }

  /**
   * What a fault at a junction is to: the reference of its island, or what was asked for; for a junction in the reference's own
   * pole, which has no volts against it, the far pole of the source that drives most.
   */
  private otherPole(at: JunctionId): JunctionId | null {
    const { request, referenceOf, most } = this.model;
    const reference = request.to ?? referenceOf.get(at);
    if (reference === undefined) return null;
    const here = this.fault(most.first, at, reference);
    const volts = Math.abs(here?.openV ?? 0);
    let other = here === null ? null : reference;
    let best = here === null ? 0 : Math.abs(here.currentA);
    const enough = this.usualV(reference);
    if (volts > POLE_SHARE * enough) return other;
    for (const source of this.sources) {
      for (const pole of [source.plus, source.minus]) {
        const state = this.fault(most.first, pole, at);
        if (state === null || Math.abs(state.openV) <= POLE_SHARE * enough || Math.abs(state.currentA) <= best)
          continue;
        best = Math.abs(state.currentA);
        other = pole;
      }
    }
    return other;
  }

  private readonly usual = new Map<JunctionId, number>();
  /** The most that any source's pole stands at against a junction. */
  private usualV(reference: JunctionId): number {
    let volts = this.usual.get(reference);
    if (volts === undefined) {
      volts = 0;
      for (const { plus, minus } of this.sources) {
        for (const pole of [plus, minus]) {
          volts = Math.max(volts, Math.abs(this.fault(this.model.most.first, pole, reference)?.openV ?? 0));
        }
      }
      this.usual.set(reference, volts);
    }
    return volts;
  }
}

/** Below a quarter of the island's volts a junction counts as of the reference's own pole. */
const POLE_SHARE = 0.25;
