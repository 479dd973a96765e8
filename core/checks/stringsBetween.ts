/** Which strings drive current from one net to another. */
import type { StringPart } from '../job/part.ts';
import type { Nets, SinglePart } from '../network/wiring.ts';

/**
 * Strings on the ways between two nets over strings alone: ends that lead nowhere else (another string on the same minus, behind a
 * fuse of its own) are taken off until none is left.
 */
export function stringsBetween(
  parts: readonly SinglePart[],
  nets: Nets,
  { plus, minus }: { readonly plus: number; readonly minus: number },
): ReadonlySet<StringPart> {
  let left = parts.flatMap((part) => (part.kind === 'string' ? edgesOf(part, nets) : []));
  for (;;) {
    const neighbours = new Map<number, Set<number>>();
    const meet = (one: number, other: number): void => {
      neighbours.set(one, (neighbours.get(one) ?? new Set()).add(other));
    };
    for (const { upper, lower } of left) {
      meet(upper, lower);
      meet(lower, upper);
    }
    const isEnd = (net: number) => net !== plus && net !== minus && neighbours.get(net)!.size < 2;
    const kept = left.filter(({ upper, lower }) => !isEnd(upper) && !isEnd(lower));
    if (kept.length === left.length) return new Set(kept.map(({ string }) => string));
    left = kept;
  }
}

interface Edge {
  readonly string: StringPart;
  readonly upper: number;
  readonly lower: number;
}

/** A string joins its poles, over its midpoint where it has one. */
function edgesOf(string: StringPart, nets: Nets): readonly Edge[] {
  const [upper, lower] = [nets.of(string.plus)!, nets.of(string.minus)!];
  if (string.midpoint === undefined) return [{ string, upper, lower }];
  const middle = nets.of(string.midpoint)!;
  return [
    { string, upper, lower: middle },
    { string, upper: middle, lower },
  ];
}
