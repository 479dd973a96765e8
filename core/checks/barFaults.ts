/** The most that a fault can send through a busbar, and the devices that end it. */
import type { BusbarPart, JunctionId, PartId } from '../job/part.ts';
import { type Device, type Poles, polesOf } from '../network/wiring.ts';
import type { FaultModel } from '../protection/faultModel.ts';
import { FaultWiring, type Reach } from '../protection/faultReach.ts';
import { NOTHING_A } from '../protection/faultState.ts';

export interface BarFault {
  readonly bar: PartId;
  readonly at: JunctionId;
  readonly currentA: number;
  /** Devices round the fault with what each carries. */
  readonly devices: readonly { readonly device: PartId; readonly currentA: number }[];
  /** Strings that no device parts from the fault. */
  readonly bare: readonly PartId[];
}

/** Null where no source reaches the bar. A bar of the minus pole is shorted to the bar or post of the other pole that sends most. */
export function barFaults(model: FaultModel, bar: BusbarPart): BarFault | null {
  let most: { readonly at: JunctionId; readonly to: JunctionId; readonly currentA: number } | null = null;
  for (const at of new Set(bar.junctions)) {
    for (const to of otherPoles(model, bar)) {
      const state = model.most.first.fault(at, to);
      if (state === null || Math.abs(state.openV) < POLE_SHARE * usualV(model)) continue;
      const currentA = Math.abs(state.currentA);
      if (currentA > NOTHING_A && (most === null || currentA > most.currentA)) most = { at, to, currentA };
    }
  }
  return most === null
    ? null
    : { bar: bar.id, at: most.at, currentA: most.currentA, ...parting(model, most.at, most.to) };
}

/** Below a quarter of the highest source's volts two junctions count as of one pole. */
const POLE_SHARE = 0.25;

function usualV({ parts }: FaultModel): number {
  return Math.max(...parts.map((part) => (part.kind === 'string' ? part.blocksInSeries * part.blockNominalV : 0)), 0);
}

/** Other bars where there are any, since a fault at a bar lies between it and what is near; else the strings' posts. */
function otherPoles({ parts }: FaultModel, bar: BusbarPart): readonly JunctionId[] {
  const bars = parts.flatMap((part) => (part.kind === 'busbar' && part !== bar ? [part.junctions[0]!] : []));
  return [...bars, ...parts.flatMap((part) => (part.kind === 'string' ? [part.minus] : []))];
}

function parting(model: FaultModel, at: JunctionId, to: JunctionId): Pick<BarFault, 'devices' | 'bare'> {
  const wiring = new FaultWiring(model.parts);
  const [here, there] = [wiring.reach(at), wiring.reach(to)];
  const state = model.most.first.fault(at, to)!;
  const carriedBy = ({ id }: Device) => Math.abs(state.through(id) ?? state.currentA);
  const devicesOf = (zone: Reach) =>
    zone.devices
      .filter(({ from, to: other }) => !(zone.junctions.has(from) && zone.junctions.has(other)))
      .map((device) => ({ device: device.id, currentA: carriedBy(device) }))
      .filter(({ currentA }) => currentA > NOTHING_A);
  const devices = devicesOf(here);
  const bare = here.poles.filter((poles) => isString(poles) && there.poles.includes(poles)).map(({ part }) => part.id);
  return { devices: devices.length > 0 ? devices : devicesOf(there), bare };
}

function isString({ part }: Poles): boolean {
  return polesOf(part).length === 1 && part.kind === 'string';
}
