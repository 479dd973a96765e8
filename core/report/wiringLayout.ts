/**
 * Where everything of the one-line diagram stands. Both poles are drawn in full: each device has a row of its own with its plus
 * line above its minus line; a point of the wiring is an upright line through the rows that meet there; a part is a level line
 * between two points. Batteries stand at the left, everything else at the right.
 */
import type { Device, Link, Pole, TwoPort, WiringGraph } from './wiringGraph.ts';
import type { TreeNode } from './wiringTree.ts';
import { branchOf, growTree, partingPoint } from './wiringTree.ts';

export const LAYER_PT = 66;
export const ROW_PT = 82;
/** Between the plus line and the minus line of a row. */
export const POLES_PT = 32;
/** Between upright lines that would otherwise stand on each other. */
const SLOT_PT = 8;
/** Room above the first row, and beside the drawing for the names of devices. */
const TOP_PT = 22;
export const SIDE_PT = 104;

type Side = 'left' | 'right';

export interface PlacedLink {
  readonly link: Link;
  readonly x1: number;
  readonly x2: number;
  readonly y: number;
  readonly pole: Pole;
}
export interface PlacedDevice {
  readonly device: Device;
  readonly side: Side;
  readonly x: number;
  readonly plusY: number;
  readonly minusY: number;
}
export interface PlacedPoint {
  readonly name: string;
  readonly pole: Pole;
  readonly x: number;
  readonly top: number;
  readonly bottom: number;
  /** Where lines meet it. */
  readonly meets: readonly number[];
}
export interface PlacedBox {
  readonly twoPort: TwoPort;
  readonly x: number;
  readonly plusY: number;
  readonly minusY: number;
}
export interface Wire {
  readonly x1: number;
  readonly x2: number;
  readonly y: number;
}
export interface Layout {
  readonly width: number;
  readonly height: number;
  readonly links: readonly PlacedLink[];
  readonly devices: readonly PlacedDevice[];
  readonly boxes: readonly PlacedBox[];
  readonly points: readonly PlacedPoint[];
  /** From a point to the device at the end of its row. */
  readonly wires: readonly Wire[];
  readonly earths: readonly { readonly id: string; readonly x: number; readonly y: number }[];
}

export function layWiring(graph: WiringGraph): Layout | { readonly reason: string } {
  if (graph.devices.length === 0) return { reason: 'there is no source and no load' };
  return new Planner(graph).plan();
}

/** A point while the plan is being made. */
interface Spot {
  readonly name: string;
  readonly pole: Pole;
  layer: number;
  slot: number;
  readonly rows: Set<number>;
}

class Planner {
  private readonly graph: WiringGraph;
  private readonly spots = new Map<string, Spot>();
  private readonly rowOfDevice = new Map<Device, { readonly row: number; readonly side: Side }>();
  private readonly rowOfLink = new Map<Link, number>();
  private nextRow: Record<Side, number> = { left: 0, right: 0 };

  constructor(graph: WiringGraph) {
    this.graph = graph;
  }

  plan(): Layout | { readonly reason: string } {
    const loops: Link[] = [];
    for (let start = this.unplaced(); start !== undefined; start = this.unplaced()) {
      // A new island begins below everything drawn so far.
      const below = Math.max(this.nextRow.left, this.nextRow.right);
      this.nextRow = { left: below, right: below };
      const before = this.rowOfDevice.size;
      for (const pole of ['plus', 'minus'] as const) loops.push(...this.placePole(start, pole));
      if (this.rowOfDevice.size === before) return { reason: `the way to ${start.part.id} could not be laid out` };
    }
    this.alignTwoPorts();
    for (const link of loops) this.placeLoop(link);
    this.chooseSlots();
    return this.finish();
  }

  /** The device from which the tree is looked at: the largest taker if there is one, for the bank is behind it. */
  private unplaced(): Device | undefined {
    const open = this.graph.devices.filter((device) => !this.rowOfDevice.has(device));
    return (
      open.find(({ part }) => part.kind === 'inverter') ?? open.find(({ part }) => part.kind === 'load') ?? open[0]
    );
  }

  private placePole(start: Device, pole: Pole): readonly Link[] {
    const from = start[pole];
    if (this.spots.has(from)) return [];
    const links = this.graph.links.filter(({ from: point }) => this.graph.poleOf.get(point) === pole);
    const bank = this.graph.devices.filter(isBattery).map((device) => device[pole]);
    const reached = growTree(from, links).nodes;
    const targets = bank.filter((point) => reached.has(point));
    const root = targets.length === 0 ? from : partingPoint(from, targets, links);
    const { nodes, loops } = growTree(root, links);
    const rootNode = nodes.get(root);
    if (rootNode !== undefined) this.placeRoot(rootNode, pole);
    return loops;
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
    const stands = devices.flatMap((device) => this.rowOfDevice.get(device) ?? []);
    if (stands.length > 0) return stands.some(({ side }) => side === 'left') ? 'left' : 'right';
    return devices.some(isBattery) ? 'left' : 'right';
  }

  /** Places a branch and gives back its row: that of its uppermost device, or a row of its own where it has none. */
  private placeBranch(
    node: TreeNode,
    { pole, side, layer }: { readonly pole: Pole; readonly side: Side; readonly layer: number },
  ): number {
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
    const known = this.rowOfDevice.get(device);
    if (known !== undefined) return known.row;
    const row = this.takeRow(side);
    this.rowOfDevice.set(device, { row, side });
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

  /** The two ends of a two-port part stand in the same layer, so that its box reaches over both lines. */
  private alignTwoPorts(): void {
    for (const { plus, minus } of this.graph.twoPorts) {
      for (const [a, b] of [
        [plus.from, minus.from],
        [plus.to, minus.to],
      ] as const) {
        const one = this.spots.get(a);
        const other = this.spots.get(b);
        if (one === undefined || other === undefined || Math.sign(one.layer) * Math.sign(other.layer) < 0) continue;
        const [near, far] = Math.abs(one.layer) < Math.abs(other.layer) ? [one, other] : [other, one];
        if (this.isBeyond(near, plus, minus)) this.shiftBranch(near, far.layer - near.layer);
      }
    }
  }
  /** Only the end away from the bank may move. */
  private isBeyond({ name }: Spot, plus: Link, minus: Link): boolean {
    return [plus, minus].some(({ from, to }) => {
      const [a, b] = [this.spots.get(from), this.spots.get(to)];
      const outer = a !== undefined && b !== undefined && Math.abs(a.layer) > Math.abs(b.layer) ? from : to;
      return outer === name;
    });
  }
  private shiftBranch(spot: Spot, by: number): void {
    if (by === 0) return;
    const links = this.graph.links.filter(({ from }) => this.graph.poleOf.get(from) === spot.pole);
    const inner = Math.abs(spot.layer);
    const open = [spot];
    const moved = new Set<Spot>();
    for (let next = open.pop(); next !== undefined; next = open.pop()) {
      if (moved.has(next)) continue;
      moved.add(next);
      for (const { from, to } of links) {
        const far = from === next.name ? this.spots.get(to) : to === next.name ? this.spots.get(from) : undefined;
        if (far !== undefined && Math.abs(far.layer) > inner) open.push(far);
      }
    }
    for (const each of moved) each.layer += by;
  }

  /** A link that closes a loop gets a row of its own below everything else. */
  private placeLoop(link: Link): void {
    const row = Math.max(this.nextRow.left, this.nextRow.right);
    this.nextRow = { left: row + 1, right: row + 1 };
    this.rowOfLink.set(link, row);
    this.spots.get(link.from)?.rows.add(row);
    this.spots.get(link.to)?.rows.add(row);
  }

  private yOf(row: number, pole: Pole): number {
    return TOP_PT + row * ROW_PT + (pole === 'plus' ? 0 : POLES_PT);
  }
  private extent({ rows, pole }: Spot): readonly [number, number] {
    const ys = [...rows].map((row) => this.yOf(row, pole));
    return [Math.min(...ys), Math.max(...ys)];
  }

  /** Upright lines of the same layer that would touch stand side by side. */
  private chooseSlots(): void {
    const placed: Spot[] = [];
    for (const spot of this.spots.values()) {
      const [top, bottom] = this.extent(spot);
      const rivals = placed.filter((other) => {
        const [otherTop, otherBottom] = this.extent(other);
        return other.layer === spot.layer && otherTop <= bottom && top <= otherBottom;
      });
      const taken = new Set(rivals.map(({ slot }) => slot));
      while (taken.has(spot.slot)) spot.slot += 1;
      placed.push(spot);
    }
  }

  private xOf(spot: Spot, firstLayer: number): number {
    return SIDE_PT + (spot.layer - firstLayer + 0.5) * LAYER_PT + spot.slot * SLOT_PT;
  }

  private finish(): Layout | { readonly reason: string } {
    const layers = [...this.spots.values()].map(({ layer }) => layer);
    const first = Math.min(...layers);
    const span = (Math.max(...layers) - first + 1) * LAYER_PT;
    const ends: Readonly<Record<Side, number>> = { left: SIDE_PT, right: SIDE_PT + span };
    const at = (name: string): number | undefined => {
      const spot = this.spots.get(name);
      return spot === undefined ? undefined : this.xOf(spot, first);
    };
    const rows = Math.max(this.nextRow.left, this.nextRow.right);
    const links = this.placedLinks(at);
    const wires = this.wires(at, ends);
    const clash = overlap([...links, ...wires]);
    if (clash) return { reason: 'its lines would run over one another' };
    const boxes = this.boxes(links);
    if (boxes.length < this.graph.twoPorts.length)
      return { reason: 'a controller or converter does not come to lie between its two lines' };
    return {
      width: 2 * SIDE_PT + span,
      height: TOP_PT + (rows - 1) * ROW_PT + POLES_PT + TOP_PT,
      links,
      wires,
      boxes,
      devices: this.placedDevices(ends),
      points: [...this.spots.values()].map((spot) => this.placedPoint(spot, first)),
      earths: this.graph.earths.flatMap(({ part, junction }) => {
        const spot = this.spots.get(junction);
        return spot === undefined ? [] : [{ id: part.id, x: this.xOf(spot, first), y: this.extent(spot)[1] }];
      }),
    };
  }

  private placedLinks(at: (name: string) => number | undefined): readonly PlacedLink[] {
    return this.graph.links.flatMap((link) => {
      const row = this.rowOfLink.get(link);
      const [x1, x2] = [at(link.from), at(link.to)];
      const pole = this.graph.poleOf.get(link.from);
      return row === undefined || x1 === undefined || x2 === undefined || pole === undefined
        ? []
        : [{ link, x1, x2, y: this.yOf(row, pole), pole }];
    });
  }

  private wires(at: (name: string) => number | undefined, ends: Readonly<Record<Side, number>>): readonly Wire[] {
    return [...this.rowOfDevice].flatMap(([device, { row, side }]) =>
      (['plus', 'minus'] as const).flatMap((pole) => {
        const x = at(device[pole]);
        return x === undefined ? [] : [{ x1: x, x2: ends[side], y: this.yOf(row, pole) }];
      }),
    );
  }

  private placedDevices(ends: Readonly<Record<Side, number>>): readonly PlacedDevice[] {
    return [...this.rowOfDevice].map(([device, { row, side }]) => ({
      device,
      side,
      x: ends[side],
      plusY: this.yOf(row, 'plus'),
      minusY: this.yOf(row, 'minus'),
    }));
  }

  /** A box stands over both its lines where these lie in one row and side by side. */
  private boxes(links: readonly PlacedLink[]): readonly PlacedBox[] {
    return this.graph.twoPorts.flatMap((twoPort) => {
      const plus = links.find(({ link }) => link === twoPort.plus);
      const minus = links.find(({ link }) => link === twoPort.minus);
      if (plus === undefined || minus === undefined || minus.y - plus.y !== POLES_PT) return [];
      const left = Math.max(Math.min(plus.x1, plus.x2), Math.min(minus.x1, minus.x2));
      const right = Math.min(Math.max(plus.x1, plus.x2), Math.max(minus.x1, minus.x2));
      return right - left < LAYER_PT / 2 ? [] : [{ twoPort, x: (left + right) / 2, plusY: plus.y, minusY: minus.y }];
    });
  }

  private placedPoint(spot: Spot, first: number): PlacedPoint {
    const [top, bottom] = this.extent(spot);
    const meets = [...spot.rows].map((row) => this.yOf(row, spot.pole));
    return { name: spot.name, pole: spot.pole, x: this.xOf(spot, first), top, bottom, meets };
  }
}

function isBattery({ part }: Device): boolean {
  return part.kind === 'string';
}

/** Whether any two level lines share a stretch. */
function overlap(lines: readonly Wire[]): boolean {
  const byY = new Map<number, (readonly [number, number])[]>();
  for (const { x1, x2, y } of lines) {
    const stretch = [Math.min(x1, x2), Math.max(x1, x2)] as const;
    const others = byY.get(y) ?? [];
    if (others.some(([left, right]) => stretch[0] < right - 0.01 && left < stretch[1] - 0.01)) return true;
    byY.set(y, [...others, stretch]);
  }
  return false;
}
