/** The job as a one-line diagram sees it: what hangs between the poles, and what leads from point to point within a pole. */
import type { CheckedJob } from '../job/job.ts';
import type { Part } from '../job/part.ts';
import { cablesOfPair } from '../job/part.ts';

export type Pole = 'plus' | 'minus';

/** A part, or one side of it, between two points of the same pole. */
export interface Link {
  readonly id: string;
  readonly part: Part;
  readonly from: string;
  readonly to: string;
}
/** A part between plus and minus. */
export interface Device {
  readonly part: Part;
  readonly plus: string;
  readonly minus: string;
}
/** A part with two ports: its plus link and its minus link are drawn as one box. */
export interface TwoPort {
  readonly part: Part;
  readonly plus: Link;
  readonly minus: Link;
}
export interface WiringGraph {
  readonly devices: readonly Device[];
  readonly links: readonly Link[];
  readonly twoPorts: readonly TwoPort[];
  /** Points that are bonded to earth, with the bond. */
  readonly earths: readonly { readonly part: Part; readonly junction: string }[];
  readonly poleOf: ReadonlyMap<string, Pole>;
  /** Points that stand for all taps of a busbar, with the bar (or the bars that share a tap). */
  readonly bars: ReadonlyMap<string, readonly Part[]>;
}

const EARTH = 'earth';

/** The graph, or why this job does not go into two poles. */
export function wiringGraph(job: CheckedJob): WiringGraph | { readonly reason: string } {
  const bars = new Bars(job);
  const at = (junction: string): string => bars.pointFor(junction);
  const devices: Device[] = [];
  const links: Link[] = [];
  const twoPorts: TwoPort[] = [];
  const earths: { part: Part; junction: string }[] = [];
  for (const part of job.parts) {
    switch (part.kind) {
      case 'string':
      case 'load':
      case 'inverter':
      case 'array':
      case 'charger':
        devices.push({ part, plus: at(part.plus), minus: at(part.minus) });
        break;
      case 'controller':
      case 'converter': {
        const plus = { id: part.id, part, from: at(part.from.plus), to: at(part.to.plus) };
        const minus = { id: part.id, part, from: at(part.from.minus), to: at(part.to.minus) };
        links.push(plus, minus);
        twoPorts.push({ part, plus, minus });
        break;
      }
      case 'pair':
        for (const cable of cablesOfPair(part)) {
          links.push({ id: cable.id, part: cable, from: at(cable.from), to: at(cable.to) });
        }
        break;
      case 'busbar':
        break;
      default: {
        const isEarth = part.from === EARTH || part.to === EARTH;
        if (isEarth) earths.push({ part, junction: at(part.from === EARTH ? part.to : part.from) });
        else links.push({ id: part.id, part, from: at(part.from), to: at(part.to) });
      }
    }
  }
  const poleOf = polesOf(devices, links);
  return 'reason' in poleOf ? poleOf : { devices, links, twoPorts, earths, poleOf: poleOf.poles, bars: bars.byPoint() };
}

/** All taps of a busbar are one point of the drawing; bars that share a tap are one. */
class Bars {
  private readonly points = new Map<string, string>();
  private readonly bars = new Map<string, Part[]>();

  constructor(job: CheckedJob) {
    for (const part of job.parts) {
      if (part.kind === 'busbar') this.add(part);
    }
  }

  private add(bar: Extract<Part, { kind: 'busbar' }>): void {
    const point = bar.id as string;
    const joined = new Set(bar.junctions.flatMap((junction) => this.points.get(junction) ?? []));
    const parts = [...[...joined].flatMap((other) => this.bars.get(other) ?? []), bar];
    for (const [junction, other] of this.points) if (joined.has(other)) this.points.set(junction, point);
    for (const other of joined) this.bars.delete(other);
    for (const junction of bar.junctions) this.points.set(junction, point);
    this.bars.set(point, parts);
  }

  pointFor(junction: string): string {
    return this.points.get(junction) ?? junction;
  }
  byPoint(): ReadonlyMap<string, readonly Part[]> {
    return this.bars;
  }
}

/** Every point takes the pole of the devices that it is connected with. */
function polesOf(
  devices: readonly Device[],
  links: readonly Link[],
): { readonly poles: ReadonlyMap<string, Pole> } | { readonly reason: string } {
  const neighbours = neighboursOf(links);
  const poles = new Map<string, Pole>();
  for (const { part, plus, minus } of devices) {
    for (const [start, pole] of [
      [plus, 'plus'],
      [minus, 'minus'],
    ] as const) {
      const clash = spreadPole(start, pole, { neighbours, poles });
      if (clash !== undefined) return { reason: `point ${clash} belongs to both poles (seen from ${part.id})` };
    }
  }
  const loose = links.find(({ from }) => !poles.has(from));
  return loose === undefined
    ? { poles }
    : { reason: `part ${loose.part.id} is connected to nothing that has two poles` };
}

function spreadPole(
  start: string,
  pole: Pole,
  {
    neighbours,
    poles,
  }: { readonly neighbours: ReadonlyMap<string, readonly string[]>; readonly poles: Map<string, Pole> },
): string | undefined {
  const open = [start];
  for (let point = open.pop(); point !== undefined; point = open.pop()) {
    const known = poles.get(point);
    if (known === pole) continue;
    if (known !== undefined) return point;
    poles.set(point, pole);
    open.push(...(neighbours.get(point) ?? []));
  }
  return undefined;
}

function neighboursOf(links: readonly Link[]): ReadonlyMap<string, readonly string[]> {
  const neighbours = new Map<string, string[]>();
  const add = (a: string, b: string): void => {
    const list = neighbours.get(a);
    if (list === undefined) neighbours.set(a, [b]);
    else list.push(b);
  };
  for (const { from, to } of links) {
    add(from, to);
    add(to, from);
  }
  return neighbours;
}
