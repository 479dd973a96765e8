/** Strings that can only be switched off together. */
import type { PartId, StringPart } from '../job/part.ts';
import { DisjointSets } from '../network/disjointSets.ts';
import { isOpen, netsOf, type SinglePart } from '../network/wiring.ts';

/**
 * Strings between the same two groups of conductors, or in series, with no switch or diode among them: in the least fault one
 * such bank alone may be connected, the others switched off.
 */
export function faultBanks(parts: readonly SinglePart[]): readonly ReadonlySet<PartId>[] {
  const strings = parts.filter((part): part is StringPart => part.kind === 'string');
  const nets = netsOf(parts, (part) => !isOpen(part) && part.kind !== 'switch' && part.kind !== 'diode');
  const sets = new DisjointSets(strings.length);
  strings.forEach((a, i) => {
    for (let j = 0; j < i; j++) {
      const b = strings[j]!;
      const beside = nets.same(a.plus, b.plus) && nets.same(a.minus, b.minus);
      if (beside || nets.same(a.plus, b.minus) || nets.same(a.minus, b.plus)) sets.join(i, j);
    }
  });
  const banks = new Map<number, Set<PartId>>();
  strings.forEach(({ id }, i) => {
    const root = sets.find(i);
    if (!banks.has(root)) banks.set(root, new Set());
    banks.get(root)!.add(id);
  });
  return [...banks.values()];
}
