/** A bank as a row of branches: which lies beside which, what links neighbours, and where the bank is tapped. */
import type { BusbarPart, JunctionId, PartId } from '../../job/part.ts';
import type { SinglePart, WiringPart } from '../../network/wiring.ts';
import { joined } from '../../network/wiring.ts';
import type { Bank, Branch } from '../banks.ts';
import {
  beginning,
  closedMeetings,
  isLine,
  type LinePart,
  type Meetings,
  otherEnd,
  type Way,
  wayFrom,
} from './ways.ts';

export type Pole = 'plus' | 'minus';
export const POLES: readonly Pole[] = ['plus', 'minus'];

export interface RowBranch {
  readonly branch: Branch;
  /** What belongs to the branch alone on each pole, links to neighbours left out. */
  readonly own: Readonly<Record<Pole, Way>>;
  /** All that carries its current alone: for the last branch of a ladder, its link too. */
  readonly alone: Readonly<Record<Pole, Way>>;
}

/** What joins two neighbours on one pole. */
export interface RowLink {
  readonly pole: Pole;
  /** Places in the row. */
  readonly between: readonly [number, number];
  readonly parts: readonly LinePart[];
}

export interface Row {
  readonly bank: Bank;
  /** As they lie along the links where there is a ladder of them, else in the order of the job. */
  readonly branches: readonly RowBranch[];
  /** Of a ladder; empty where the branches hang on common bars. */
  readonly links: readonly RowLink[];
  readonly isLadder: boolean;
  /** All wiring of the bank, up to where it is tapped. */
  readonly wiring: readonly WiringPart[];
  /** Junctions of the bank's own on each pole. */
  readonly junctions: Readonly<Record<Pole, ReadonlySet<JunctionId>>>;
}

/** How a bank of two or more branches is wired. */
export function rowOf(bank: Bank, parts: readonly SinglePart[]): Row {
  const at = closedMeetings(parts);
  const branches = withoutLinks(bank.branches.map((branch) => aloneOf(branch, at)));
  const chains = POLES.map((pole) => ({ pole, links: linksOf(branches, pole, at) }));
  const orders = chains.map(({ links }) => chainOrder(links, branches.length));
  const order = orders.find((found) => found !== undefined);
  const place = new Map(order?.map((k, index) => [k, index]));
  const links =
    order === undefined
      ? []
      : chains.flatMap((chain, k) => (orders[k] === undefined ? [] : chain.links.map((link) => placed(link, place))));
  const row = order === undefined ? branches : order.map((k) => branches[k]!);
  return { bank, branches: row, links, isLadder: order !== undefined, ...reachOf(row, links, parts) };
}

function placed(link: RowLink, place: ReadonlyMap<number, number>): RowLink {
  const [a, b] = link.between.map((k) => place.get(k)!);
  return { ...link, between: [Math.min(a!, b!), Math.max(a!, b!)] };
}

function aloneOf(branch: Branch, at: Meetings): RowBranch {
  const alone = {
    plus: wayFrom(branch.plus, branch.strings.at(-1)!.id, at),
    minus: wayFrom(branch.minus, branch.strings[0]!.id, at),
  };
  return { branch, alone, own: alone };
}

/** The last branch of a ladder has its link to itself: the way of a branch that ends at another's post goes no further than that one's. */
function withoutLinks(branches: readonly RowBranch[]): readonly RowBranch[] {
  return branches.map((branch) => {
    const cut = (pole: Pole): Way => {
      const way = branch.alone[pole];
      const sharing = branches.filter((other) => other !== branch && other.alone[pole].end === way.end);
      const isStar = sharing.length === branches.length - 1 && sharing.every((other) => hasCable(other.alone[pole]));
      if (isStar) return way;
      const shorter = sharing
        .map((other) => other.alone[pole].parts.length)
        .filter((length) => length < way.parts.length);
      return shorter.length === 0 ? way : beginning(way, Math.max(Math.min(...shorter), leadingDevices(way)));
    };
    return { ...branch, own: { plus: cut('plus'), minus: cut('minus') } };
  });
}

function hasCable(way: Way): boolean {
  return way.parts.some(({ kind }) => kind === 'cable');
}

/** What stands before the first cable of a way; where it has none, before its first joint. */
function leadingDevices({ parts }: Way): number {
  const cable = parts.findIndex(({ kind }) => kind === 'cable');
  return Math.max(0, cable < 0 ? parts.findIndex(({ kind }) => kind === 'joint') : cable);
}

/** Two-ended wiring between the ends of two branches' own ways, nothing else joining between. Bars count segment by segment. */
function linksOf(branches: readonly RowBranch[], pole: Pole, at: Meetings): readonly RowLink[] {
  const ends = new Map<JunctionId, number>();
  const own = new Set<PartId>();
  branches.forEach((branch, k) => {
    const way = branch.own[pole];
    if (!ends.has(way.end)) ends.set(way.end, k);
    for (const { id } of [...way.parts, ...branch.branch.strings]) own.add(id);
  });
  const links: RowLink[] = [];
  for (const [end, k] of ends) {
    for (const { part } of at.get(end) ?? []) {
      if (own.has(part.id) || !isLine(part)) continue;
      const next = otherEnd(part, end);
      const rest = ends.has(next) ? undefined : wayFrom(next, part.id, at);
      const other = ends.get(rest?.end ?? next);
      // Each link is met from both of its ends.
      if (other !== undefined && other > k)
        links.push({ pole, between: [k, other], parts: [part, ...(rest?.parts ?? [])] });
    }
  }
  return links;
}

/** The branches in order where the links join all of them in one line without branchings; `undefined` otherwise. */
function chainOrder(links: readonly RowLink[], count: number): readonly number[] | undefined {
  if (links.length !== count - 1) return undefined;
  const beside = Array.from({ length: count }, () => [] as number[]);
  for (const { between } of links) {
    beside[between[0]]!.push(between[1]);
    beside[between[1]]!.push(between[0]);
  }
  const start = beside.findIndex((others) => others.length === 1);
  if (start < 0 || beside.some((others) => others.length > 2)) return undefined;
  const order = [start];
  for (let at = start; order.length < count; ) {
    const next = beside[at]!.find((other) => !order.includes(other));
    if (next === undefined) return undefined;
    order.push(next);
    at = next;
  }
  return order;
}

function reachOf(
  branches: readonly RowBranch[],
  links: readonly RowLink[],
  parts: readonly SinglePart[],
): Pick<Row, 'wiring' | 'junctions'> {
  const junctionsOfPole = (pole: Pole) => {
    const reached = new Set<JunctionId>();
    for (const { own } of branches)
      for (const junction of [own[pole].start, ...own[pole].junctions]) reached.add(junction);
    for (const link of links)
      if (link.pole === pole) for (const part of link.parts) for (const end of joined(part)) reached.add(end);
    for (const bar of barsAt(reached, parts)) for (const junction of bar.junctions) reached.add(junction);
    return reached;
  };
  const junctions = { plus: junctionsOfPole('plus'), minus: junctionsOfPole('minus') };
  const wiring: WiringPart[] = [
    ...branches.flatMap(({ own }) => [...own.plus.parts, ...own.minus.parts]),
    ...links.flatMap((link) => link.parts),
    ...POLES.flatMap((pole) => barsAt(junctions[pole], parts)),
  ];
  return { wiring: [...new Set(wiring)], junctions };
}

function barsAt(junctions: ReadonlySet<JunctionId>, parts: readonly SinglePart[]): readonly BusbarPart[] {
  return parts
    .filter((part) => part.kind === 'busbar')
    .filter((bar) => bar.junctions.some((one) => junctions.has(one)));
}
