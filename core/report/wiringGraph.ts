/** The job as a one-line diagram sees it: what hangs between the poles, and what leads from point to point within a pole. */
import type { CheckedJob } from '../job/job.ts';
import type { Part } from '../job/part.ts';
import { cablesOfPair } from '../job/part.ts';

export type Pole = 'plus' | 'minus';

/** A part, or one segment or one side of it, between two points of the same pole. */
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
}

const EARTH = 'earth';

/** The graph, or why this job does not go into two poles. */
export function wiringGraph(job: CheckedJob): WiringGraph | { readonly reason: string } {
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
        devices.push({ part, plus: part.plus, minus: part.minus });
        break;
      case 'controller':
      case 'converter': {
        const plus = { id: part.id, part, from: part.from.plus, to: part.to.plus };
        const minus = { id: part.id, part, from: part.from.minus, to: part.to.minus };
        links.push(plus, minus);
        twoPorts.push({ part, plus, minus });
        break;
      }
      case 'pair':
        for (const cable of cablesOfPair(part))
          links.push({ id: cable.id, part: cable, from: cable.from, to: cable.to });
        break;
      case 'busbar':
        links.push(...segmentsOf(part.id, part, part.junctions));
        break;
      default: {
        const isEarth = part.from === EARTH || part.to === EARTH;
        if (isEarth) earths.push({ part, junction: part.from === EARTH ? part.to : part.from });
        else links.push({ id: part.id, part, from: part.from, to: part.to });
      }
    }
  }
  const poleOf = polesOf(devices, links);
  return 'reason' in poleOf ? poleOf : { devices, links, twoPorts, earths, poleOf: poleOf.poles };
}

function segmentsOf(id: string, part: Part, junctions: readonly string[]): readonly Link[] {
  return junctions.slice(1).map((to, index) => ({ id: index === 0 ? id : '', part, from: junctions[index] ?? to, to }));
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

export function neighboursOf(links: readonly Link[]): ReadonlyMap<string, readonly string[]> {
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
