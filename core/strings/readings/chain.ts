/** Strings in series, whatever is tapped between them, cut at every point where a meter can be held. */
import type { JunctionId, StringPart } from '../../job/part.ts';
import { closedNets, type Nets, type SinglePart } from '../../network/wiring.ts';

/** From one point of a chain to the next: a string, or half of one that has a midpoint. */
export interface Stretch {
  /** `S1`, or `S1 lower half`. */
  readonly name: string;
  readonly string: StringPart;
  readonly minus: JunctionId;
  readonly plus: JunctionId;
  /** Share of the chain's volts that falls to it: nominal volts. */
  readonly nominalV: number;
}

export interface Chain {
  /** From minus to plus. */
  readonly strings: readonly StringPart[];
  readonly stretches: readonly Stretch[];
  /** Point 0 is the minus of the chain; `undefined` for a junction that is none of its points. */
  pointOf(junction: JunctionId): number | undefined;
  /** True where the junction is itself a terminal of the chain, false where wiring joins it to one. */
  isExact(junction: JunctionId): boolean;
}

/**
 * Every string of a case belongs to one chain, in the order of their lowest strings. Where as many strings end at a net as begin
 * there, they are taken in the order of the job: `banksOf` would part them, but their volts still add up.
 */
export function chainsOf(parts: readonly SinglePart[]): readonly Chain[] {
  const nets = closedNets(parts);
  const strings = parts.filter((part) => part.kind === 'string');
  const above = new Map<StringPart, StringPart>();
  for (const string of strings) {
    const ending = strings.filter((one) => nets.same(one.plus, string.plus));
    const beginning = strings.filter((one) => nets.same(one.minus, string.plus));
    const next = beginning[ending.indexOf(string)];
    if (ending.length === beginning.length && next !== undefined && next !== string) above.set(string, next);
  }
  const notFirst = new Set(above.values());
  return strings.filter((string) => !notFirst.has(string)).map((first) => chainFrom(first, above, nets));
}

function chainFrom(first: StringPart, above: ReadonlyMap<StringPart, StringPart>, nets: Nets): Chain {
  const strings = [first];
  for (let next = above.get(first); next !== undefined; next = above.get(next)) strings.push(next);
  const stretches = strings.flatMap(stretchesOf);
  const exact = new Map<JunctionId, number>();
  for (const [index, { minus, plus }] of stretches.entries()) {
    exact.set(minus, index);
    exact.set(plus, index + 1);
  }
  const byNet = new Map<number | undefined, number>();
  for (const [junction, point] of exact) byNet.set(nets.of(junction), point);
  return {
    strings,
    stretches,
    pointOf: (junction) => exact.get(junction) ?? byNet.get(nets.of(junction)),
    isExact: (junction) => exact.has(junction),
  };
}

function stretchesOf(string: StringPart): readonly Stretch[] {
  const { id, minus, plus, midpoint } = string;
  const nominalV = string.blocksInSeries * string.blockNominalV;
  if (midpoint === undefined) return [{ name: id, string, minus, plus, nominalV }];
  return [
    { name: `${id} lower half`, string, minus, plus: midpoint, nominalV: nominalV / 2 },
    { name: `${id} upper half`, string, minus: midpoint, plus, nominalV: nominalV / 2 },
  ];
}
