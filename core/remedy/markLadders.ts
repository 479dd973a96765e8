/** Devices of another make: marked for direct current, or with a high interrupting rating. */
import { together } from '../draft/edit.ts';
import { setField } from '../draft/fields.ts';
import type { Part } from '../job/part.ts';
import { nameOf } from '../job/part.ts';
import { formatQuantity } from '../units/formatQuantity.ts';
import { type Bench, type Ladder, stepped } from './candidate.ts';

/** The same rating, marked for direct current. */
export function forDirectCurrent(part: Part): readonly Ladder[] {
  const label = `${titleOf(part)}: one marked for direct current`;
  const edit = together(label, [setField({ part: part.id, field: 'dcRated', value: true })]);
  const cost = `one ${part.kind} for direct current`;
  return [stepped([{ edit, cost, effort: 'device', amount: 1, sameAnswers: true }])];
}

/** A fuse of a type that breaks what the trade rule for large banks asks; no breaker of this trade does. */
export function highInterrupt(bench: Bench, part: Part): readonly Ladder[] {
  if (part.kind !== 'fuse') return [];
  const { mainA, mainV } = bench.tables.devices.largeBank;
  const type = bench.tables.devices.typicalInterrupt.find(
    ({ interruptA, upToV }) => interruptA.value >= mainA.value && upToV.value >= mainV.value,
  )?.type;
  if (type === undefined) return [];
  const [breaks, at] = [amount(mainA.value, 'A'), amount(mainV.value, 'V')];
  const label = `${titleOf(part)}: a current-limiting fuse of the same rating that breaks ${breaks} at ${at}`;
  const edit = together(label, [
    setField({ part: part.id, field: 'type', value: type }),
    setField({ part: part.id, field: 'ratingV', value: mainV.value }),
    setField({ part: part.id, field: 'interruptA', value: mainA.value }),
  ]);
  return [stepped([{ edit, cost: `one ${amount(part.ratingA, 'A')} fuse of ${breaks}`, effort: 'device', amount: 1 }])];
}

function amount(value: number, unit: string): string {
  return formatQuantity({ value, unit });
}

function titleOf(part: Part): string {
  return `${part.kind.charAt(0).toUpperCase()}${part.kind.slice(1)} ${nameOf(part)}`;
}
