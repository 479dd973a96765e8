/**
 * The plan of the one-line diagram in rows and layers, without measures. Both poles are planned in full: each device has a row of
 * its own; each point of the wiring has a layer, counted from where the bank is joined, to the left (negative) on the way to the
 * batteries and to the right on the way to everything else.
 */
import type { Device, Link, Pole, WiringGraph } from './wiringGraph.ts';
import type { TreeNode } from './wiringTree.ts';
import { branchOf, growTree, partingPoint } from './wiringTree.ts';

export type Side = 'left' | 'right';

/** A point of the wiring: an upright line through the rows that meet there. */
export interface Spot {
  readonly name: string;
  readonly pole: Pole;
  layer: number;
  /** Place among the upright lines of its layer that would else stand on each other. */
  slot: number;
  readonly rows: Set<number>;
}
interface DevicePlace {
  row: number;
  readonly side: Side;
}
export interface WiringPlan {
  readonly spots: ReadonlyMap<string, Spot>;
  readonly deviceAt: ReadonlyMap<Device, DevicePlace>;
  readonly rowOfLink: Map<Link, number>;
  /** Links that close rings: first to give way. */
  readonly loops: ReadonlySet<Link>;
  rowCount: number;
}

export function planWiring(graph: WiringGraph): WiringPlan | { readonly reason: string } {
  if (graph.devices.length === 0) return { reason: 'there is no source and no load' };
  return new Planner(graph).plan();
}

function isBattery({ part }: Device): boolean {
  return part.kind === 'string';
}

class Planner {
  private readonly graph: WiringGraph;
  private readonly spots = new Map<string, Spot>();
  private readonly deviceAt = new Map<Device, DevicePlace>();
  private readonly rowOfLink = new Map<Link, number>();
  private nextRow: Record<Side, number> = { left: 0, right: 0 };

  constructor(graph: WiringGraph) {
    this.graph = graph;
  }

  plan(): WiringPlan | { readonly reason: string } {
    const loops: Link[] = [];
    for (let start = this.unplaced(); start !== undefined; start = this.unplaced()) {
      // A new island begins below everything planned so far.
      const below = Math.max(this.nextRow.left, this.nextRow.right);
      this.nextRow = { left: below, right: below };
      const before = this.deviceAt.size;
      for (const pole of ['plus', 'minus'] as const) loops.push(...this.placePole(start, pole));
      if (this.deviceAt.size === before) return { reason: `the way to ${start.part.id} could not be laid out` };
    }
    this.alignTwoPorts();
    this.partLoops(loops);
    // Links that close rings start beside their first point; the layout moves them where they are in the way.
    for (const link of loops) this.rowOfLink.set(link, Math.min(...(this.spots.get(link.from)?.rows ?? [0])));
    const rowCount = Math.max(this.nextRow.left, this.nextRow.right);
    return { spots: this.spots, deviceAt: this.deviceAt, rowOfLink: this.rowOfLink, loops: new Set(loops), rowCount };
  }

  /** The device from which the trees are looked at: a large taker if there is one, for the bank is behind it. */
  private unplaced(): Device | undefined {
    const open = this.graph.devices.filter((device) => !this.deviceAt.has(device));
    return (
      open.find(({ part }) => part.kind === 'inverter') ?? open.find(({ part }) => part.kind === 'load') ?? open[0]
    );
  }

  private placePole(start: Device, pole: Pole): readonly Link[] {
    const from = start[pole];
    if (this.spots.has(from)) {
      // Its pole was planned with an earlier island; only the device itself is new.
      this.spots.get(from)?.rows.add(this.deviceRow(start, isBattery(start) ? 'left' : 'right'));
      return [];
    }
    const links = this.linksOf(pole);
    const reached = growTree(from, links).nodes;
    const bank = this.graph.devices.filter(isBattery).map((device) => device[pole]);
    const targets = bank.filter((point) => reached.has(point));
    const root = targets.length === 0 ? from : partingPoint(from, targets, links);
    const { nodes, loops } = growTree(root, links);
    const rootNode = nodes.get(root);
    if (rootNode !== undefined) this.placeRoot(rootNode, pole);
    return loops;
  }

  private linksOf(pole: Pole): readonly Link[] {
    return this.graph.links.filter(({ from }) => this.graph.poleOf.get(from) === pole);
  }
  private devicesAt(name: string, pole: Pole): readonly Device[] {
    return this.graph.devices.filter((device) => device[pole] === name);
  }

  private placeRoot(root: TreeNode, pole: Pole): void {
    const spot = this.spot(root.name, pole, 0);
    for (const device of this.devicesAt(root.name, pole)) {
      spot.rows.add(this.deviceRow(device, isBattery(device) ? 'left' : 'right'));
    }
    for (const child of root.children) {
      const side = this.sideOf(child, pole);
      spot.rows.add(this.placeBranch(child, { pole, side, layer: side === 'left' ? -1 : 1 }));
    }
  }

  /** A branch with a battery in it, or with a device that already stands at the left, goes left. */
  private sideOf(branch: TreeNode, pole: Pole): Side {
    const devices = branchOf(branch).flatMap(({ name }) => this.devicesAt(name, pole));
    const stands = devices.flatMap((device) => this.deviceAt.get(device) ?? []);
    if (stands.length > 0) return stands.some(({ side }) => side === 'left') ? 'left' : 'right';
    return devices.some(isBattery) ? 'left' : 'right';
  }

  /** Places a branch and gives back its row: that of its uppermost device, or a row of its own where it has none. */
  private placeBranch(
    node: TreeNode,
    at: { readonly pole: Pole; readonly side: Side; readonly layer: number },
  ): number {
    const { pole, side, layer } = at;
    const spot = this.spot(node.name, pole, layer);
    const step = side === 'left' ? -1 : 1;
    for (const device of this.devicesAt(node.name, pole)) spot.rows.add(this.deviceRow(device, side));
    for (const child of node.children) spot.rows.add(this.placeBranch(child, { pole, side, layer: layer + step }));
    const row = spot.rows.size === 0 ? this.takeRow(side) : Math.min(...spot.rows);
    spot.rows.add(row);
    if (node.link !== undefined) this.rowOfLink.set(node.link, row);
    return row;
  }

  private deviceRow(device: Device, side: Side): number {
    const known = this.deviceAt.get(device);
    if (known !== undefined) return known.row;
    const row = this.takeRow(side);
    this.deviceAt.set(device, { row, side });
    return row;
  }
  private takeRow(side: Side): number {
    const row = this.nextRow[side];
    this.nextRow[side] += 1;
    return row;
  }
  private spot(name: string, pole: Pole, layer: number): Spot {
    const spot: Spot = { name, pole, layer, slot: 0, rows: new Set() };
    this.spots.set(name, spot);
    return spot;
  }

  /** The outer ends of a two-port part stand in the same layer, so that its box can reach over both lines. */
  private alignTwoPorts(): void {
    for (const { plus, minus } of this.graph.twoPorts) {
      const outerPlus = this.outerEnd(plus);
      const outerMinus = this.outerEnd(minus);
      if (outerPlus === undefined || outerMinus === undefined) continue;
      if (Math.sign(outerPlus.layer) !== Math.sign(outerMinus.layer)) continue;
      const [near, far] =
        Math.abs(outerPlus.layer) < Math.abs(outerMinus.layer) ? [outerPlus, outerMinus] : [outerMinus, outerPlus];
      this.shiftBranch(near, far.layer - near.layer);
    }
  }
  /** Two points of the same layer that a link joins need room for it between them: one moves outwards. */
  private partLoops(loops: readonly Link[]): void {
    for (const { from, to } of loops) {
      const [a, b] = [this.spots.get(from), this.spots.get(to)];
      if (a === undefined || b === undefined || a === b || a.layer !== b.layer) continue;
      this.shiftBranch(b, b.layer < 0 ? -1 : 1);
    }
  }
  private outerEnd({ from, to }: Link): Spot | undefined {
    const [a, b] = [this.spots.get(from), this.spots.get(to)];
    if (a === undefined || b === undefined || Math.abs(a.layer) === Math.abs(b.layer)) return undefined;
    return Math.abs(a.layer) > Math.abs(b.layer) ? a : b;
  }
  private shiftBranch(spot: Spot, by: number): void {
    if (by === 0) return;
    const links = this.linksOf(spot.pole);
    const inner = Math.abs(spot.layer);
    const moved = new Set<Spot>();
    const open = [spot];
    for (let next = open.pop(); next !== undefined; next = open.pop()) {
      if (moved.has(next)) continue;
      moved.add(next);
      for (const { from, to } of links) {
        const far = from === next.name ? this.spots.get(to) : to === next.name ? this.spots.get(from) : undefined;
        const isSameSide = far !== undefined && Math.sign(far.layer) === Math.sign(spot.layer);
        if (isSameSide && Math.abs(far.layer) > inner) open.push(far);
      }
    }
    for (const each of moved) each.layer += by;
  }
}
