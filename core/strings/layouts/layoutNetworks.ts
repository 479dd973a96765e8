/** The wirings that a row of blocks can have: a ladder of links, equal leads to two bars, a halving tree. */
import type { BankNetwork, BankWire } from './bankNetwork.ts';

/** One branch: its strings, the links in them, and the devices that go with it. */
export interface RowSource {
  readonly emfV: number;
  readonly ohm: number;
}

/** The wire that all layouts are made of; an end is a termination. */
export interface Wire {
  readonly perMetreOhm: number;
  /** Both terminations of one piece. */
  readonly endsOhm: number;
}

/** A network with the nodes where it is tapped, and the metres of cable in it. */
export interface WiredRow {
  readonly network: BankNetwork;
  readonly plusTaps: readonly number[];
  readonly minusTaps: readonly number[];
  readonly cableM: number;
}

export interface RowShape {
  readonly sources: readonly RowSource[];
  readonly spacingM: number;
  readonly wire: Wire;
}

export function pieceOhm({ perMetreOhm, endsOhm }: Wire, lengthM: number): number {
  return lengthM * perMetreOhm + endsOhm;
}

/** Links between neighbours in both bars; tapped at any string. Node k is the plus post of string k, node N + k its minus post. */
export function ladderOf(shape: RowShape): WiredRow {
  const { sources, spacingM, wire } = shape;
  const count = sources.length;
  const ohm = pieceOhm(wire, spacingM);
  const wires = [0, count].flatMap((first) =>
    Array.from({ length: count - 1 }, (_, k): BankWire => ({ a: first + k, b: first + k + 1, ohm })),
  );
  const posts = Array.from({ length: count }, (_, k) => k);
  return {
    network: { nodes: 2 * count, sources: placed(sources), wires },
    plusTaps: posts,
    minusTaps: posts.map((k) => count + k),
    cableM: written(2 * (count - 1) * spacingM),
  };
}

/** Bars at the middle of the row; every lead as long as the one to the block at the end has to be, or as given. */
export function starOf(shape: RowShape, leadM = starLeadM(shape)): WiredRow {
  const { sources, wire } = shape;
  const count = sources.length;
  const ohm = pieceOhm(wire, leadM);
  const wires = [0, 1].flatMap((pole) =>
    sources.map((_, k): BankWire => ({ a: pole * count + k, b: 2 * count + pole, ohm })),
  );
  return {
    network: { nodes: 2 * count + 2, sources: placed(sources), wires },
    plusTaps: [2 * count],
    minusTaps: [2 * count + 1],
    cableM: written(2 * count * leadM),
  };
}

/** From the block at an end to the middle of the row. */
function starLeadM({ sources, spacingM }: RowShape): number {
  return ((sources.length - 1) / 2) * spacingM;
}

/**
 * Blocks joined two and two by equal legs, the pairs again two and two, up to the middle of the row; a row that does not halve evenly has
 * its larger half first. Both legs of a pair are as long as the longer one has to be.
 */
export function treeOf(shape: RowShape): WiredRow {
  const { sources, spacingM, wire } = shape;
  const count = sources.length;
  const wires: BankWire[] = [];
  let nodes = 2 * count;
  let cableM = 0;
  const join = (first: number, end: number, offset: number): { node: number; at: number } => {
    if (end - first === 1) return { node: offset + first, at: first * spacingM };
    const half = first + Math.ceil((end - first) / 2);
    const halves = [join(first, half, offset), join(half, end, offset)] as const;
    const at = ((first + end - 1) / 2) * spacingM;
    const legM = Math.max(...halves.map((one) => Math.abs(one.at - at)));
    const node = nodes++;
    for (const one of halves) wires.push({ a: one.node, b: node, ohm: pieceOhm(wire, legM) });
    cableM += 2 * legM;
    return { node, at };
  };
  const plus = join(0, count, 0).node;
  const minus = join(0, count, count).node;
  return {
    network: { nodes, sources: placed(sources), wires },
    plusTaps: [plus],
    minusTaps: [minus],
    cableM: written(cableM),
  };
}

function placed(sources: readonly RowSource[]): BankNetwork['sources'] {
  return sources.map(({ emfV, ohm }, k) => ({ plus: k, minus: sources.length + k, emfV, ohm }));
}

/** To a tenth of a millimetre: what adding up leaves behind the last digit is no cable. */
function written(lengthM: number): number {
  return Math.round(lengthM * 10_000) / 10_000;
}
