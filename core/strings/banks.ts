/** Which strings work together: side by side between the same two poles, alone or in series. */
import type { JunctionId, PartId, StringPart } from '../job/part.ts';
import { closedNets, type Nets, type SinglePart } from '../network/wiring.ts';

/** Strings in series with nothing tapped between them, from minus to plus. Most branches are one string. */
export interface Branch {
  readonly strings: readonly StringPart[];
  /** Minus of the first, plus of the last. */
  readonly minus: JunctionId;
  readonly plus: JunctionId;
  /** Of the least of its strings. */
  readonly capacityAh: number;
}

/** Branches side by side between the same two poles, as closed switches and fuses join them; a lone branch is a bank too. */
export interface Bank {
  readonly branches: readonly Branch[];
  /** In the order of the branches, each from minus to plus. */
  readonly strings: readonly StringPart[];
  readonly capacityAh: number;
}

/** The banks of a case, in the order in which their first string stands in the job. Every string is in one branch of one bank. */
export function banksOf(parts: readonly SinglePart[]): readonly Bank[] {
  const nets = closedNets(parts);
  const strings = parts.filter((part) => part.kind === 'string');
  const byPoles = new Map<string, Branch[]>();
  for (const branch of branchesOf(strings, parts, nets)) {
    const poles = `${String(nets.of(branch.plus))} ${String(nets.of(branch.minus))}`;
    const beside = byPoles.get(poles);
    if (beside === undefined) byPoles.set(poles, [branch]);
    else beside.push(branch);
  }
  return [...byPoles.values()].map((branches) => bankFrom(branches));
}

export function bankFrom(branches: readonly Branch[]): Bank {
  return {
    branches,
    strings: branches.flatMap((branch) => branch.strings),
    capacityAh: branches.reduce((sum, { capacityAh }) => sum + capacityAh, 0),
  };
}

/** The bank that a string belongs to. */
export function bankOf(banks: readonly Bank[], id: PartId): number {
  return banks.findIndex(({ strings }) => strings.some((string) => string.id === id));
}

/** Chains of strings, in the order in which the first string of each in the job stands there. */
function branchesOf(strings: readonly StringPart[], parts: readonly SinglePart[], nets: Nets): readonly Branch[] {
  const { above, below } = joinedInSeries(strings, parts, nets);
  const taken = new Set<StringPart>();
  return strings.flatMap((string) => {
    if (taken.has(string)) return [];
    const under = chainFrom(string, below);
    const chain = chainFrom(under.at(-1)!, above);
    // A ring has no two poles between which its strings would work as one: each stands for itself.
    if (below.has(under.at(-1)!)) return [branchOf([string])];
    for (const one of chain) taken.add(one);
    return [branchOf(chain)];
  });
}

/** From a string on, until there is no next one or a ring closes. */
function chainFrom(first: StringPart, next: ReadonlyMap<StringPart, StringPart>): readonly StringPart[] {
  const chain = [first];
  for (let one = next.get(first); one !== undefined && one !== first; one = next.get(one)) chain.push(one);
  return chain;
}

function branchOf(chain: readonly StringPart[]): Branch {
  return {
    strings: chain,
    minus: chain[0]!.minus,
    plus: chain.at(-1)!.plus,
    capacityAh: Math.min(...chain.map(({ capacityAh }) => capacityAh)),
  };
}

/** For each string the one in series above and below it, where all of its current goes there. */
function joinedInSeries(strings: readonly StringPart[], parts: readonly SinglePart[], nets: Nets) {
  const above = new Map<StringPart, StringPart>();
  const below = new Map<StringPart, StringPart>();
  for (const lower of strings) {
    const upper = strings.filter((one) => nets.same(one.minus, lower.plus));
    const lowers = strings.filter((one) => nets.same(one.plus, lower.plus));
    if (upper.length !== 1 || lowers.length !== 1 || isTapped(nets.of(lower.plus), parts, nets)) continue;
    above.set(lower, upper[0]!);
    below.set(upper[0]!, lower);
  }
  return { above, below };
}

/** Whether anything but whole strings and their wiring hangs on a net: then the strings on both sides of it carry different currents. */
function isTapped(net: number | undefined, parts: readonly SinglePart[], nets: Nets): boolean {
  const here = (...junctions: readonly JunctionId[]) => junctions.some((junction) => nets.of(junction) === net);
  return parts.some((part) => {
    switch (part.kind) {
      case 'string':
        return part.midpoint !== undefined && here(part.midpoint);
      case 'diode':
        return here(part.from, part.to);
      case 'load':
      case 'inverter':
      case 'array':
      case 'charger':
        return here(part.plus, part.minus);
      case 'controller':
      case 'converter':
        return here(part.from.plus, part.from.minus, part.to.plus, part.to.minus);
      default:
        return false;
    }
  });
}
