/** Faults and the time that devices take: ratings that open on the weakest, cables that stand what is let through. */
import { cableCooks, faultTooWeak } from '../../checks/clearingRules.ts';
import { amps } from '../../checks/wording.ts';
import type { ConductorSize } from '../../job/part.ts';
import { type Device, isDevice } from '../../network/wiring.ts';
import type { Conductor } from '../cableLadders.ts';
import { sizesFrom } from './cableChoice.ts';
import { ownRating } from './newDevices.ts';
import type { Plan } from './plan.ts';

/** Devices that the least fault behind them may not open: the smallest standard rating that still carries what flows. */
export function weakFaults(plan: Plan): void {
  for (const { finding } of faultTooWeak.run(plan.context).findings) {
    const device = plan.context.drawn.find((part): part is Device => isDevice(part) && finding.parts.includes(part.id));
    const ratingA = device === undefined ? undefined : ownRating(plan, device.id);
    if (device === undefined || ratingA === undefined || ratingA >= device.ratingA) continue;
    plan.reject({ part: device.id, words: `${amps(device.ratingA)} at ${device.id}`, why: finding.message });
    plan.rerate(device, ratingA);
  }
}

/** Cables that do not stand what their device lets through: k²S² goes by the square of the area. */
export function standLetThrough(plan: Plan): void {
  const changes = new Map<string, { conductor: Conductor; to: ConductorSize; why: string }>();
  for (const { finding, excess } of cableCooks.run(plan.context).findings) {
    const id = finding.parts.find((part) => plan.conductor(part) !== undefined);
    const conductor = id === undefined ? undefined : plan.conductor(id);
    if (conductor === undefined || !Number.isFinite(excess)) continue;
    const neededMmm2 = plan.copper(conductor, conductor.size) * Math.sqrt(excess);
    const to = sizesFrom(plan, conductor).find((size) => plan.copper(conductor, size) >= neededMmm2);
    const key = `${conductor.part} ${conductor.field}`;
    const known = changes.get(key);
    if (to === undefined || (known !== undefined && plan.copper(conductor, known.to) >= plan.copper(conductor, to)))
      continue;
    changes.set(key, { conductor, to, why: finding.message.replace(/\.$/, '') });
  }
  plan.resize([...changes.values()]);
}
