/** Of what class a device has to be: the fault that it may have to break, at the volts that it may see. */

import type { CheckContext, SolvedCase } from '../../checks/checkContext.ts';
import { rules } from '../../checks/rules.ts';
import { isOver } from '../../checks/tally.ts';
import type { PartId } from '../../job/part.ts';
import { type Device, isDevice, isOpen } from '../../network/wiring.ts';
import { deviceFaults } from '../../protection/deviceFaults.ts';
import { withFaultModel } from '../../protection/faultModel.ts';
import type { DeviceClass, Plan } from './plan.ts';

/** Rules that another class of device answers. */
const BY_CLASS: readonly string[] = ['interrupt-too-low', 'big-bank-needs-more'];

const ofContext = new WeakMap<CheckContext, ReadonlyMap<PartId, number>>();

/** The most that each device may have to break, in any case, strings full and as strong as they may be. */
export function faultsOf({ context }: Plan): ReadonlyMap<PartId, number> {
  let most = ofContext.get(context);
  if (most === undefined) {
    most = mostOf(context);
    ofContext.set(context, most);
  }
  return most;
}

function mostOf({ job, tables, steady }: CheckContext): ReadonlyMap<PartId, number> {
  const most = new Map<PartId, number>();
  // Cases that differ in loads and charge alone have the same highest fault.
  const unlike = new Map(steady.map((one) => [stateOf(one), one.operatingCase]));
  for (const operatingCase of unlike.values()) {
    const request = { job, tables, operatingCase, method: 'plain', figures: 'bounds' } as const;
    // The least currents are not asked for here, and cost most of the work.
    for (const { device, highestA } of withFaultModel(request, (model) => deviceFaults({ ...model, least: [] }))) {
      most.set(device, Math.max(highestA, most.get(device) ?? 0));
    }
  }
  return most;
}

function stateOf({ parts }: SolvedCase): string {
  return parts.flatMap((part) => (isOpen(part) || (part.kind === 'charger' && !part.on) ? [part.id] : [])).join(' ');
}

/** Gives a class to every device that is put in, and to fuses that are found too weak for the fault. */
export function classifyDevices(plan: Plan): void {
  const weak = new Map<PartId, number>();
  for (const rule of rules.filter(({ id }) => BY_CLASS.includes(id))) {
    for (const { finding } of rule.run(plan.context).findings) {
      const wantedA = finding.limit.unit === 'A' ? Math.max(finding.limit.value, finding.measured.value) : 0;
      for (const id of finding.parts) weak.set(id, Math.max(wantedA, weak.get(id) ?? 0));
    }
  }
  const fresh = new Set(plan.fresh.map(({ device }) => device));
  for (const device of plan.context.drawn.filter(isDevice)) {
    const wantedA = weak.get(device.id);
    if (!fresh.has(device.id) && (wantedA === undefined || device.kind !== 'fuse')) continue;
    const faultA = faultsOf(plan).get(device.id);
    const what = classFor(plan, device, faultA === undefined ? wantedA : Math.max(faultA, wantedA ?? 0));
    const known = plan.classes.get(device.id);
    if (known !== undefined && (wantedA === undefined || known.type === what?.type)) continue;
    if (what !== undefined) plan.classify(device.id, what);
    else
      plan.reject({
        part: device.id,
        words: `a class of fuse for ${device.id}`,
        why: 'no class of the list bears its volts, its rating and the fault: ask a maker',
      });
  }
}

/** The class of least interrupt rating that bears the volts and the fault and is made in the rating; `undefined`: none listed. */
export function classFor(
  { context: { tables, volts } }: Plan,
  device: Device,
  faultA: number | undefined,
): DeviceClass | undefined {
  const highestV = (volts.highestAt(device.from) ?? volts.highestAt(device.to))?.volts;
  if (device.kind !== 'fuse' || highestV === undefined || faultA === undefined) return undefined;
  const bearing = tables.devices.typicalInterrupt.filter(
    ({ type, upToV, interruptA }) =>
      !isOver(highestV, upToV.value) && !isOver(faultA, interruptA.value) && isMade(type, device.ratingA),
  );
  bearing.sort((a, b) => a.interruptA.value - b.interruptA.value);
  const [least] = bearing;
  return least && { type: least.type, ratingV: least.upToV.value, interruptA: least.interruptA.value };

  function isMade(type: string, ratingA: number): boolean {
    const series = [...tables.devices.ratings].filter(([name]) => name.includes(type));
    return series.length === 0 || series.some(([, { ratingsA }]) => ratingsA.includes(ratingA));
  }
}

/** The class in words: `strip small`, `class T`. */
export function classWords(type: string): string {
  return type.replaceAll('_', ' ');
}
