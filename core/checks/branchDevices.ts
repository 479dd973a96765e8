/** The fuse or breaker of one string alone, where strings stand side by side. */
import type { JunctionId } from '../job/part.ts';
import type { Device } from '../network/wiring.ts';
import type { Bank, Branch } from '../strings/banks.ts';
import type { CheckContext } from './checkContext.ts';
import { deviceGraphOf } from './deviceGraph.ts';

/**
 * Devices each of which, once open, parts one branch from all others of its bank while these stay joined: they carry the current of
 * that branch and of no other. With two branches a device between them counts for the one that it lies nearer to, and for both
 * where nothing else lies on either side.
 */
export function ownDevices(context: CheckContext, bank: Bank, branch: Branch): readonly Device[] {
  return [...inPole(context, bank, branch, 'plus'), ...inPole(context, bank, branch, 'minus')];
}

function inPole(context: CheckContext, bank: Bank, branch: Branch, pole: 'plus' | 'minus'): readonly Device[] {
  const graph = deviceGraphOf(context);
  const others = bank.branches.filter((other) => other !== branch).map((other) => other[pole]);
  const first = others[0];
  if (first === undefined) return [];
  return graph.devicesAt(branch[pole]).filter((device) => {
    const own = graph.reached(branch[pole], (one) => one === device);
    const isJoined = (junction: JunctionId, nets: ReadonlySet<number>) => nets.has(graph.bare.of(junction)!);
    if (others.some((other) => isJoined(other, own))) return false;
    const rest = graph.reached(first, (one) => one === device);
    return others.every((other) => isJoined(other, rest));
  });
}
