/** The ways in which a row of blocks can be tapped, and their names. */
import type { PartId } from '../../job/part.ts';
import type { LayoutKind } from '../answer.ts';

/** Places in the row. */
export interface Taps {
  readonly plus: number;
  readonly minus: number;
}
export interface TapLayout {
  readonly name: string;
  readonly kind: LayoutKind;
  readonly taps: Taps;
  /** Where chargers are tapped apart from the loads. */
  readonly chargeTaps: Taps | null;
}

/** Rows longer than this are tapped at ends and middle only: the pairs of a long row fill pages and none of them is the best. */
const MOST_IN_FULL = 8;
/** With chargers at taps of their own, rows longer than this likewise. */
const MOST_IN_FULL_CHARGED = 4;

/** Every pair of taps of a row; with chargers on, each also with the chargers at the mirrored taps, or all with them where asked. */
export function tapLayouts(
  ids: readonly PartId[],
  charging: { readonly isOn: boolean; readonly at: Taps | undefined },
): readonly TapLayout[] {
  const pairs = pairsOf(ids.length).filter(({ kind }) => ids.length <= MOST_IN_FULL || kind !== 'taps');
  return pairs.flatMap(({ kind, taps }): readonly TapLayout[] => {
    const plain = { name: named(ids, taps, kind), kind, taps, chargeTaps: null };
    const isFew = ids.length <= MOST_IN_FULL_CHARGED || kind !== 'taps';
    const chargeTaps = charging.at ?? (charging.isOn && isFew ? mirrored(taps, ids.length) : undefined);
    if (chargeTaps === undefined || isSame(chargeTaps, taps)) return [plain];
    const apart = { ...plain, chargeTaps, name: `loads: ${plain.name}; chargers: ${named(ids, chargeTaps, 'taps')}` };
    return charging.at === undefined ? [plain, apart] : [apart];
  });
}

function pairsOf(count: number): readonly { readonly kind: LayoutKind; readonly taps: Taps }[] {
  const places = Array.from({ length: count }, (_, k) => k);
  return places.flatMap((plus) =>
    places.map((minus) => ({ kind: kindOf({ plus, minus }, count), taps: { plus, minus } })),
  );
}

function kindOf({ plus, minus }: Taps, count: number): LayoutKind {
  const isEnd = (k: number) => k === 0 || k === count - 1;
  if (plus === minus && isEnd(plus)) return 'same-end';
  if (isEnd(plus) && isEnd(minus)) return 'opposite-ends';
  // An odd row has one string in the middle, an even one two.
  if (plus === minus && Math.abs(2 * plus - (count - 1)) <= 1) return 'middle';
  return 'taps';
}

function named(ids: readonly PartId[], { plus, minus }: Taps, kind: LayoutKind): string {
  const where = kind === 'opposite-ends' ? ' (opposite ends)' : kind === 'middle' ? ' (middle)' : '';
  if (plus === minus) return `both taps at ${ids[plus]!}${where}`;
  return `plus at ${ids[plus]!}, minus at ${ids[minus]!}${where}`;
}

function mirrored({ plus, minus }: Taps, count: number): Taps {
  return { plus: count - 1 - plus, minus: count - 1 - minus };
}

function isSame(a: Taps, b: Taps): boolean {
  return a.plus === b.plus && a.minus === b.minus;
}
