/**
 * Where everything of the one-line diagram stands, in points. A device has its plus line above its minus line; a point of the
 * wiring is an upright line through the rows that meet there; a part is a level line between two points.
 */
import type { Device, Link, Pole, TwoPort, WiringGraph } from './wiringGraph.ts';
import type { Side, Spot, WiringPlan } from './wiringPlan.ts';
import { planWiring } from './wiringPlan.ts';
import { LONGEST_PT, linkWidthPt, nameWidthPt } from './wiringWords.ts';

export const ROW_PT = 76;
/** Between the plus line and the minus line of a row. */
export const POLES_PT = 32;
/** Room above the first row. */
export const TOP_PT = 30;
/** Room beside the drawing for the names of devices. */
export const SIDE_PT = 96;
/** Between upright lines that would otherwise stand on each other. */
const SLOT_PT = 8;
/** From the last points to the devices at the ends of the rows. */
const END_PT = 26;
/** A two-port part is drawn as one box where both its lines share at least this much. */
const BOX_PT = 34;
/** Rounds of moving lines out of each other's way before it is given up. */
const MOST_ROUNDS = 12;

export interface PlacedLink {
  readonly link: Link;
  readonly pole: Pole;
  readonly row: number;
  readonly x1: number;
  readonly x2: number;
}
export interface PlacedDevice {
  readonly device: Device;
  readonly side: Side;
  readonly row: number;
  readonly x: number;
}
export interface PlacedPoint {
  readonly name: string;
  readonly pole: Pole;
  readonly slot: number;
  readonly x: number;
  /** Rising. */
  readonly rows: readonly number[];
  /** Drawn as a busbar. */
  readonly isBar: boolean;
}
export interface PlacedBox {
  readonly twoPort: TwoPort;
  readonly row: number;
  readonly x: number;
}
/** From a point to the device at the end of its row. */
interface Wire {
  readonly pole: Pole;
  readonly row: number;
  readonly x1: number;
  readonly x2: number;
}
export interface Layout {
  readonly width: number;
  /** Width to which names of points were cut. */
  readonly longestPt: number;
  readonly rowCount: number;
  readonly links: readonly PlacedLink[];
  readonly devices: readonly PlacedDevice[];
  /** Two-port parts whose lines lie side by side; the others are drawn as a box on each line. */
  readonly boxes: readonly PlacedBox[];
  readonly points: readonly PlacedPoint[];
  readonly wires: readonly Wire[];
  readonly earths: readonly { readonly id: string; readonly x: number; readonly row: number; readonly pole: Pole }[];
}

/** Height of a line above the foot of the first row's top: rows go down, minus below plus. */
export function yOf({ row, pole }: { readonly row: number; readonly pole: Pole }): number {
  return TOP_PT + row * ROW_PT + (pole === 'plus' ? 0 : POLES_PT);
}

export function layWiring(
  graph: WiringGraph,
  longestPt: number = LONGEST_PT.roomy,
): Layout | { readonly reason: string } {
  const plan = planWiring(graph);
  if ('reason' in plan) return plan;
  const drafter = new Drafter(graph, plan, longestPt);
  return drafter.untangle() ? drafter.layout() : { reason: 'its lines would run over one another' };
}

class Drafter {
  private readonly graph: WiringGraph;
  private readonly plan: WiringPlan;
  private readonly longestPt: number;
  /** Left edge of each layer's upright lines, by layer. */
  private layerX = new Map<number, number>();
  private right = 0;

  constructor(graph: WiringGraph, plan: WiringPlan, longestPt: number) {
    this.graph = graph;
    this.plan = plan;
    this.longestPt = longestPt;
  }

  /** Lines that would share a stretch of a row are moved to rows of their own, until none does. */
  untangle(): boolean {
    for (let round = 0; round < MOST_ROUNDS; round += 1) {
      this.gatherRows();
      this.chooseSlots();
      this.measureLayers();
      if (!this.moveClashes()) return true;
    }
    return false;
  }

  /** Rows that moves have left empty are closed up. */
  private closeUp(): void {
    const { rowOfLink, deviceAt } = this.plan;
    const used = rising(new Set([...rowOfLink.values(), ...[...deviceAt.values()].map(({ row }) => row)]));
    const newRow = new Map(used.map((row, index) => [row, index]));
    for (const [link, row] of rowOfLink) rowOfLink.set(link, newRow.get(row) ?? row);
    for (const place of deviceAt.values()) place.row = newRow.get(place.row) ?? place.row;
    this.plan.rowCount = used.length;
    this.gatherRows();
  }

  layout(): Layout {
    this.closeUp();
    const links = this.links();
    return {
      width: this.right + SIDE_PT,
      longestPt: this.longestPt,
      rowCount: this.plan.rowCount,
      links,
      wires: [...this.plan.deviceAt.keys()].flatMap((device) => this.wiresOf(device)),
      boxes: this.boxes(links),
      devices: [...this.plan.deviceAt].map(([device, { row, side }]) => ({ device, row, side, x: this.endX(side) })),
      points: [...this.plan.spots.values()].map((spot) => ({
        name: spot.name,
        pole: spot.pole,
        slot: spot.slot,
        x: this.xOf(spot),
        rows: rising(spot.rows),
        isBar: this.graph.bars.has(spot.name),
      })),
      earths: this.graph.earths.flatMap(({ part, junction }) => {
        const spot = this.plan.spots.get(junction);
        return spot === undefined
          ? []
          : [{ id: part.id, x: this.xOf(spot), row: rising(spot.rows).at(-1) ?? 0, pole: spot.pole }];
      }),
    };
  }

  /** An upright line reaches just the rows in which something joins it: a longer one would seem to touch what it passes. */
  private gatherRows(): void {
    const { spots, rowOfLink, deviceAt } = this.plan;
    for (const { rows } of spots.values()) rows.clear();
    for (const [{ from, to }, row] of rowOfLink) for (const point of [from, to]) spots.get(point)?.rows.add(row);
    for (const [{ plus, minus }, { row }] of deviceAt)
      for (const point of [plus, minus]) spots.get(point)?.rows.add(row);
  }

  /** Upright lines of the same layer that would touch stand side by side. */
  private chooseSlots(): void {
    const placed: Spot[] = [];
    for (const spot of this.plan.spots.values()) {
      const [top, bottom] = extent(spot);
      const rivals = placed.filter((other) => {
        const [otherTop, otherBottom] = extent(other);
        return other.layer === spot.layer && otherTop <= bottom && top <= otherBottom;
      });
      const taken = new Set(rivals.map(({ slot }) => slot));
      spot.slot = 0;
      while (taken.has(spot.slot)) spot.slot += 1;
      placed.push(spot);
    }
  }

  /** Each layer is as far from the next as the words between them ask. */
  private measureLayers(): void {
    const spots = [...this.plan.spots.values()];
    const layers = rising(new Set(spots.map(({ layer }) => layer)));
    const inLayer = (layer: number): readonly Spot[] => spots.filter((spot) => spot.layer === layer);
    this.layerX = new Map();
    let x = SIDE_PT + END_PT;
    for (const [index, layer] of layers.entries()) {
      this.layerX.set(layer, x);
      const slots = Math.max(...inLayer(layer).map(({ slot }) => slot));
      const next = layers[index + 1];
      const names = [layer, next ?? layer].map((each) =>
        Math.max(...inLayer(each).map(({ name }) => nameWidthPt(name, this.longestPt))),
      );
      const wordsPt =
        next === undefined
          ? 0
          : Math.max((names[0] ?? 0) / 2 + (names[1] ?? 0) / 2 + 4, this.widestBetween(layer, next));
      x += slots * SLOT_PT + wordsPt;
    }
    this.right = x + END_PT;
  }
  private widestBetween(layer: number, next: number): number {
    const layerOf = (name: string): number | undefined => this.plan.spots.get(name)?.layer;
    const widths = this.graph.links
      .filter(({ from, to }) => {
        const [a, b] = [layerOf(from), layerOf(to)];
        return (a === layer && b === next) || (a === next && b === layer);
      })
      .map((link) => linkWidthPt(link, this.longestPt));
    return Math.max(0, ...widths);
  }

  private xOf({ layer, slot }: Spot): number {
    return (this.layerX.get(layer) ?? 0) + slot * SLOT_PT;
  }
  private endX(side: Side): number {
    return side === 'left' ? SIDE_PT : this.right;
  }

  /**
   * True where something had to be moved. Links of the trees stay first, then the wires of the devices, then links that close
   * rings: a device whose wire would run back over the trees is the one that is in the way.
   */
  private moveClashes(): boolean {
    const { loops, deviceAt, rowOfLink } = this.plan;
    const taken: Wire[] = [];
    const isFree = (wire: Wire): boolean => !taken.some((other) => clash(wire, other));
    let hasMoved = false;
    const placeLinks = (links: readonly PlacedLink[]): void => {
      for (const placed of links) {
        const row = isFree(placed)
          ? placed.row
          : this.rowWhere(placed.row, (other) => isFree({ ...placed, row: other }));
        if (row !== placed.row) hasMoved = true;
        rowOfLink.set(placed.link, row);
        taken.push({ ...placed, row });
      }
    };
    const links = this.links();
    placeLinks(links.filter(({ link }) => !loops.has(link)));
    for (const [device, place] of deviceAt) {
      const wires = this.wiresOf(device);
      if (!wires.every(isFree)) {
        const suits = (row: number): boolean =>
          this.isDeviceRow(row, place.side) && wires.every((wire) => isFree({ ...wire, row }));
        place.row = this.rowWhere(place.row, suits);
        hasMoved = true;
      }
      taken.push(...this.wiresOf(device));
    }
    placeLinks(links.filter(({ link }) => loops.has(link)));
    return hasMoved;
  }
  /** The nearest row that suits, or a new one below all. */
  private rowWhere(from: number, suits: (row: number) => boolean): number {
    for (let distance = 1; distance < this.plan.rowCount; distance += 1) {
      for (const row of [from + distance, from - distance]) {
        if (row >= 0 && row < this.plan.rowCount && suits(row)) return row;
      }
    }
    this.plan.rowCount += 1;
    return this.plan.rowCount - 1;
  }
  private isDeviceRow(row: number, side: Side): boolean {
    return [...this.plan.deviceAt.values()].every((place) => place.row !== row || place.side !== side);
  }

  private wiresOf(device: Device): readonly Wire[] {
    const place = this.plan.deviceAt.get(device);
    if (place === undefined) return [];
    return (['plus', 'minus'] as const).flatMap((pole) => {
      const spot = this.plan.spots.get(device[pole]);
      return spot === undefined ? [] : [{ pole, row: place.row, x1: this.xOf(spot), x2: this.endX(place.side) }];
    });
  }

  private links(): readonly PlacedLink[] {
    return this.graph.links.flatMap((link) => {
      const row = this.plan.rowOfLink.get(link);
      const [from, to] = [this.plan.spots.get(link.from), this.plan.spots.get(link.to)];
      if (row === undefined || from === undefined || to === undefined) return [];
      return [{ link, row, pole: from.pole, x1: this.xOf(from), x2: this.xOf(to) }];
    });
  }

  private boxes(links: readonly PlacedLink[]): readonly PlacedBox[] {
    return this.graph.twoPorts.flatMap((twoPort) => {
      const plus = links.find(({ link }) => link === twoPort.plus);
      const minus = links.find(({ link }) => link === twoPort.minus);
      if (plus === undefined || minus === undefined || minus.row !== plus.row) return [];
      const left = Math.max(Math.min(plus.x1, plus.x2), Math.min(minus.x1, minus.x2));
      const right = Math.min(Math.max(plus.x1, plus.x2), Math.max(minus.x1, minus.x2));
      return right - left < BOX_PT ? [] : [{ twoPort, row: plus.row, x: (left + right) / 2 }];
    });
  }
}

function rising(numbers: ReadonlySet<number>): readonly number[] {
  const list = [...numbers];
  list.sort((a, b) => a - b);
  return list;
}
function extent({ rows, pole }: Spot): readonly [number, number] {
  const list = rising(rows);
  return [yOf({ row: list[0] ?? 0, pole }), yOf({ row: list.at(-1) ?? 0, pole })];
}
/** Whether two level lines share a stretch. */
function clash(one: Wire, other: Wire): boolean {
  if (one.row !== other.row || one.pole !== other.pole) return false;
  const left = Math.max(Math.min(one.x1, one.x2), Math.min(other.x1, other.x2));
  const right = Math.min(Math.max(one.x1, one.x2), Math.max(other.x1, other.x2));
  return right - left > 0.01;
}
