/** Lays a symmetric plan out in the memory of a kernel. */
import { HEADER, type Part } from './kernelWriter.ts';
import type { SymmetricPlan } from './symmetricPlan.ts';

/** Where the parts of a block stand, in bytes from its beginning. */
export interface BlockLayout {
  readonly parts: Readonly<Record<Part, number>>;
  /** Length of the block, a multiple of 16. */
  readonly bytes: number;
}

const up = (bytes: number): number => Math.ceil(bytes / 16) * 16;

/** Works out a block for so many systems side by side. */
export function layOutBlock(plan: SymmetricPlan, lanes: number): BlockLayout {
  const { leafCount, linkCount, fullNodes, slots, tableLength, pattern, storage, fullPlace } = plan;
  const { size, rowIndices } = pattern;
  const leaves = up(4 * HEADER.length);
  const integers = (count: number): number => leaves + 4 * count;
  const w = up(integers(tableLength + size));
  const numbers = (count: number): number => w + 8 * lanes * count;
  const leafPlace = 2 * (size + 1);
  const values = up(numbers(storage));
  return {
    parts: {
      leaves,
      links: integers(2 * leafCount),
      columns: integers(2 * leafCount + 4 * linkCount),
      fullNodes: integers(fullNodes),
      slots: integers(slots),
      ends: integers(tableLength),
      w,
      y: numbers(size + 1),
      leafEntries: numbers(leafPlace),
      linkEntries: numbers(leafPlace + leafCount),
      columnEntries: numbers(leafPlace + leafCount + 2 * linkCount),
      fullEntries: numbers(fullPlace),
      entriesEnd: numbers(storage),
      values,
    },
    bytes: up(values + 8 * lanes * rowIndices.length),
  };
}

/** Writes header and integers of a block at an address. */
export function writeBlock(plan: SymmetricPlan, { parts }: BlockLayout, buffer: ArrayBuffer, address: number): void {
  const ints = new Int32Array(buffer);
  for (let k = 0; k < HEADER.length; k++) ints[address / 4 + k] = address + parts[HEADER[k]!];
  ints.set(plan.table.subarray(0, plan.tableLength), (address + parts.leaves) / 4);
  ints.set(plan.pattern.columnStarts.subarray(1), (address + parts.ends) / 4);
}
