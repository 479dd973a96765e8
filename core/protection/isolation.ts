/** Which devices part a fault from all sources. */
import type { JunctionId, PartId } from '../job/part.ts';
import type { Device } from '../network/wiring.ts';
import { type FaultModel, withFaultModel } from './faultModel.ts';
import { FaultWiring } from './faultReach.ts';
import type { FaultRequest } from './faultSources.ts';
import { NOTHING_A } from './faultState.ts';

export interface IsolatingDevice {
  readonly device: PartId;
  /** Its end that looks at the fault. */
  readonly side: JunctionId;
  /** Through it into the fault: the most, and the least that flows where it carries anything (null: only limited sources do). */
  readonly highestA: number;
  readonly lowestA: number | null;
}

export interface Isolation {
  readonly junction: JunctionId;
  readonly to: JunctionId;
  /** All of these must open to part the fault from every source. */
  readonly devices: readonly IsolatingDevice[];
  /** Sources with no device between them and the fault: nothing parts these. */
  readonly bare: readonly PartId[];
}

/** For a fault at each junction that a source reaches: the devices round it through which a source feeds it. */
export function partsThatIsolate(request: FaultRequest): readonly Isolation[] {
  return withFaultModel(request, (model) => {
    const wiring = new FaultWiring(model.parts);
    return model.junctions.flatMap((junction) => isolation(model, wiring, junction));
  });
}

function isolation(model: FaultModel, wiring: FaultWiring, junction: JunctionId): readonly Isolation[] {
  const to = model.request.to ?? model.referenceOf.get(junction);
  if (to === undefined || to === junction) return [];
  const most = model.most.first.fault(junction, to);
  if (most === null || Math.abs(most.currentA) < NOTHING_A) return [];
  const { junctions, devices, poles } = wiring.reach(junction);
  const least = model.least.map((pair) => pair.settled.fault(junction, to));
  const inward = (device: Device, state: typeof most | null): number => {
    if (state === null) return 0;
    const through = state.through(device.id);
    if (through === null) return Math.abs(state.currentA);
    return Math.max(0, (junctions.has(device.to) ? 1 : -1) * Math.sign(state.currentA) * through);
  };
  const isolating = devices.flatMap((device): readonly IsolatingDevice[] => {
    // With both its ends at the fault it parts nothing.
    if (junctions.has(device.from) && junctions.has(device.to)) return [];
    const highestA = inward(device, most);
    if (highestA < NOTHING_A) return [];
    const carried = least.map((state) => inward(device, state)).filter((currentA) => currentA > NOTHING_A);
    const lowestA = carried.length === 0 ? null : Math.min(...carried, highestA);
    return [{ device: device.id, side: junctions.has(device.to) ? device.to : device.from, highestA, lowestA }];
  });
  const sends = new Set(most.shares().map(({ part }) => part));
  const bare = poles.filter(({ role, part }) => role === 'source' && sends.has(part.id)).map(({ part }) => part.id);
  return [{ junction, to, devices: isolating, bare: [...new Set(bare)] }];
}
