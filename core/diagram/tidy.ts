/**
 * Places for everything of a job: the paper's plan of rows and layers where the job goes into two poles, else layers by distance.
 * Rows are `ROW` apart, the minus line of a row lies `POLES` below its plus line, layers are `LAYER` apart; no symbol stands on another.
 */
import type { CheckedJob } from '../job/job.ts';
import type { JunctionId, Part, PartId } from '../job/part.ts';
import { junctionsOf } from '../job/part.ts';
import { layeredPositions } from './layered.ts';
import type { Point, Positions } from './point.ts';
import { EARTH, POLES } from './point.ts';
import { separated } from './separate.ts';
import type { WiringGraph } from './wiringGraph.ts';
import { wiringGraph } from './wiringGraph.ts';
import type { Layout, PlacedLink, PlacedPoint } from './wiringLayout.ts';
import { layWiring } from './wiringLayout.ts';

export const ROW = 160;
export const LAYER = 160;
const LEFT = 120;
const TOP = 120;
/** Between upright lines that would stand on each other. */
const SLOT = 60;
/** From a bar or a trunk to a device that hangs on it without a conductor. */
const BESIDE = 100;
/** Between groups of parts that share nothing. */
const ISLAND_GAP = 120;

/** Islands stand one below the other, each laid out by the plan of the paper where it can be. */
export function tidyPositions(job: CheckedJob): Positions {
  const whole = plannedPositions(job);
  if (whole !== undefined) return separated(job.parts, whole);
  const parts = new Map<PartId, Point>();
  const junctions = new Map<JunctionId, Point>();
  let top = TOP;
  for (const island of islandsOf(job.parts)) {
    const alone: CheckedJob = { ...job, parts: island };
    const positions = separated(island, plannedPositions(alone) ?? layeredPositions(island));
    const ys = [...positions.parts.values(), ...positions.junctions.values()].map(({ y }) => y);
    const shift = top - Math.min(...ys);
    for (const [id, { x, y }] of positions.parts) parts.set(id, { x, y: y + shift });
    for (const [id, { x, y }] of positions.junctions) junctions.set(id, { x, y: y + shift });
    top = Math.max(...ys) + shift + ISLAND_GAP;
  }
  return { parts, junctions };
}

/** Groups of parts that hang together, in job order; those with most parts first. */
export function islandsOf(parts: readonly Part[]): readonly (readonly Part[])[] {
  const groupOf = new Map<JunctionId, Part[]>();
  const groups = new Set<Part[]>();
  for (const part of parts) {
    const touched = junctionsOf(part).filter((each) => each !== EARTH);
    const joined = new Set(touched.flatMap((each) => groupOf.get(each) ?? []));
    const found = [...groups].filter((group) => group.some((each) => joined.has(each)));
    const merged = [...found.flat(), part];
    for (const group of found) groups.delete(group);
    groups.add(merged);
    for (const each of merged)
      for (const junction of junctionsOf(each)) if (junction !== EARTH) groupOf.set(junction, merged);
  }
  const islands = [...groups];
  islands.sort((a, b) => b.length - a.length);
  return islands;
}

function plannedPositions(job: CheckedJob): Positions | undefined {
  const graph = wiringGraph(job);
  if ('reason' in graph) return undefined;
  const layout = layWiring(graph);
  return 'reason' in layout ? undefined : new Planned(job, graph, layout).positions();
}

class Planned {
  private readonly job: CheckedJob;
  private readonly graph: WiringGraph;
  private readonly layout: Layout;
  private readonly pointByName: ReadonlyMap<string, PlacedPoint>;
  private readonly xByPoint: ReadonlyMap<PlacedPoint, number>;
  private readonly parts = new Map<PartId, Point>();
  private readonly junctions = new Map<JunctionId, Point>();

  constructor(job: CheckedJob, graph: WiringGraph, layout: Layout) {
    this.job = job;
    this.graph = graph;
    this.layout = layout;
    this.pointByName = new Map(layout.points.map((point) => [point.name, point]));
    this.xByPoint = xOfPoints(layout);
  }

  positions(): Positions {
    this.placePoints();
    for (const part of this.job.parts) if (part.kind === 'busbar') this.placeTaps(part);
    for (const part of this.job.parts) {
      const at = this.placeOf(part);
      if (at !== undefined) this.parts.set(part.id, at);
    }
    this.placeMidpoints();
    return { parts: this.parts, junctions: this.junctions };
  }

  private yOf(row: number, pole: 'plus' | 'minus'): number {
    return TOP + row * ROW + (pole === 'plus' ? 0 : POLES);
  }
  private xOf(name: string): number {
    const point = this.pointByName.get(name);
    return (point === undefined ? undefined : this.xByPoint.get(point)) ?? LEFT;
  }

  private placePoints(): void {
    for (const point of this.layout.points) {
      if (point.isBar) continue;
      const at = { x: this.xByPoint.get(point) ?? LEFT, y: this.yOf(point.rows[0] ?? 0, point.pole) };
      this.junctions.set(point.name as JunctionId, at);
    }
  }

  /** The taps of a bar lie on it, each in the row of what hangs there; two never in one place. */
  private placeTaps(bar: Extract<Part, { kind: 'busbar' }>): void {
    const point = this.pointOfBar(bar);
    if (point === undefined) return;
    const x = this.xByPoint.get(point) ?? LEFT;
    const taken = new Set([...this.junctions.values()].filter((each) => each.x === x).map(({ y }) => y));
    const wanted = bar.junctions.map((junction) => ({ junction, row: this.rowAt(junction) ?? point.rows[0] ?? 0 }));
    wanted.sort((a, b) => a.row - b.row);
    for (const { junction, row } of wanted) {
      if (this.junctions.has(junction)) continue;
      let y = this.yOf(row, point.pole);
      while (taken.has(y)) y += 40;
      taken.add(y);
      this.junctions.set(junction, { x, y });
    }
    const ys = bar.junctions.flatMap((each) => this.junctions.get(each)?.y ?? []);
    this.parts.set(bar.id, { x, y: Math.round((Math.min(...ys) + Math.max(...ys)) / 40) * 20 });
  }
  private pointOfBar(bar: Part): PlacedPoint | undefined {
    const entry = [...this.graph.bars].find(([, bars]) => bars.includes(bar));
    return entry === undefined ? undefined : this.pointByName.get(entry[0]);
  }

  /** The uppermost row in which something hangs at a junction of a bar. */
  private rowAt(junction: JunctionId): number | undefined {
    const rows = this.job.parts
      .filter((part) => part.kind !== 'busbar' && junctionsOf(part).includes(junction))
      .flatMap((part) => this.rowsOf(part));
    return rows.length === 0 ? undefined : Math.min(...rows);
  }
  private rowsOf(part: Part): readonly number[] {
    return [
      ...this.linksOf(part).map(({ row }) => row),
      ...this.layout.devices.flatMap(({ device, row }) => (device.part === part ? [row] : [])),
    ];
  }

  /** The placed links of a part; those of a run are of its two cables. */
  private linksOf(part: Part): readonly PlacedLink[] {
    const ids: readonly string[] = part.kind === 'pair' ? [`${part.id}.plus`, `${part.id}.minus`] : [part.id];
    return this.linksById().get(part.id) ?? ids.flatMap((id) => this.linksById().get(id) ?? []);
  }
  private cachedLinks: Map<string, PlacedLink[]> | undefined;
  private linksById(): ReadonlyMap<string, readonly PlacedLink[]> {
    if (this.cachedLinks !== undefined) return this.cachedLinks;
    this.cachedLinks = new Map();
    for (const placed of this.layout.links) {
      const list = this.cachedLinks.get(placed.link.id);
      if (list === undefined) this.cachedLinks.set(placed.link.id, [placed]);
      else list.push(placed);
    }
    return this.cachedLinks;
  }

  private placeOf(part: Part): Point | undefined {
    switch (part.kind) {
      case 'busbar':
        return undefined;
      case 'string':
      case 'load':
      case 'inverter':
      case 'array':
      case 'charger':
        return this.devicePlace(part);
      case 'pair':
      case 'controller':
      case 'converter':
        return this.lanesPlace(part);
      case 'bond':
        return part.from === EARTH || part.to === EARTH ? this.earthPlace(part) : this.linkPlace(part);
      default:
        return this.linkPlace(part);
    }
  }

  /** Over its outermost pole where that is free for it, else beside. */
  private devicePlace(part: Extract<Part, { plus: unknown }>): Point | undefined {
    const placed = this.layout.devices.find(({ device }) => device.part === part);
    if (placed === undefined) return undefined;
    const { device, row, side } = placed;
    const outward = side === 'left' ? -1 : 1;
    const points = [device.plus, device.minus].flatMap((name) => this.pointByName.get(name) ?? []);
    const outer = Math.max(...points.map((point) => outward * (this.xByPoint.get(point) ?? LEFT)));
    const isFree = points
      .filter((point) => outward * (this.xByPoint.get(point) ?? LEFT) === outer)
      .every((point) => !point.isBar && point.rows.length === 1);
    const x = outward * outer + (isFree ? 0 : outward * BESIDE);
    return { x, y: this.yOf(row, 'plus') + POLES / 2 };
  }

  private linkPlace(part: Part): Point | undefined {
    const [placed] = this.linksOf(part);
    if (placed === undefined) return undefined;
    return { x: this.middleOfSpan([placed]), y: this.yOf(placed.row, placed.pole) };
  }
  private lanesPlace(part: Part): Point | undefined {
    const links = this.linksOf(part);
    const plus = links.find(({ pole }) => pole === 'plus') ?? links[0];
    if (plus === undefined) return undefined;
    return { x: this.middleOfSpan(links), y: this.yOf(plus.row, 'plus') + POLES / 2 };
  }
  /** The middle of what all the spans share; of the first where they share nothing. */
  private middleOfSpan(links: readonly PlacedLink[]): number {
    const spans = links.map(({ link }) => {
      const [a, b] = [this.xOf(link.from), this.xOf(link.to)];
      return { low: Math.min(a, b), high: Math.max(a, b) };
    });
    const low = Math.max(...spans.map((span) => span.low));
    const high = Math.min(...spans.map((span) => span.high));
    const shared = high - low >= LAYER / 2 ? { low, high } : (spans[0] ?? { low: LEFT, high: LEFT });
    return Math.round((shared.low + shared.high) / 20) * 10;
  }
  private earthPlace(part: Part): Point | undefined {
    const earth = this.layout.earths.find(({ id }) => id === part.id);
    const junction = junctionsOf(part).find((each) => each !== EARTH);
    const at = junction === undefined ? undefined : this.junctions.get(junction);
    if (earth === undefined || at === undefined) return undefined;
    return { x: at.x, y: Math.max(at.y, this.yOf(earth.row, earth.pole)) + 60 };
  }

  private placeMidpoints(): void {
    for (const part of this.job.parts) {
      if (part.kind !== 'string' || part.midpoint === undefined || this.junctions.has(part.midpoint)) continue;
      const at = this.parts.get(part.id);
      if (at !== undefined) this.junctions.set(part.midpoint, { x: at.x - 60, y: at.y });
    }
  }
}

/** Screen x of the paper's points: layers in the same order, `LAYER` apart, with room for lines side by side. */
function xOfPoints({ points }: Layout): ReadonlyMap<PlacedPoint, number> {
  const paperSlot = 8;
  const layerOf = (point: PlacedPoint): number => Math.round((point.x - point.slot * paperSlot) * 100) / 100;
  const layers = [...new Set(points.map(layerOf))];
  layers.sort((a, b) => a - b);
  const slots = new Map<number, number>();
  for (const point of points) slots.set(layerOf(point), Math.max(slots.get(layerOf(point)) ?? 0, point.slot));
  const left = new Map<number, number>();
  let x = LEFT;
  for (const layer of layers) {
    left.set(layer, x);
    x += LAYER + (slots.get(layer) ?? 0) * SLOT;
  }
  return new Map(points.map((point) => [point, (left.get(layerOf(point)) ?? LEFT) + point.slot * SLOT]));
}
