/**
 * The wiring of a solved case as the ways that a walk can take. Of all ways between two junctions the widest counts: the one
 * whose thinnest current is largest. The widest ways between all pairs together are the tree that joins the junctions by
 * their largest currents first (a largest spanning tree, Kruskal 1956), so one tree serves every walk.
 */

import type { JunctionId, PartId } from '../job/part.ts';
import type { OperatingPoint } from '../network/answer.ts';
import { DisjointSets } from '../network/disjointSets.ts';
import { isOpen, isWiring, joined, type SinglePart } from '../network/wiring.ts';
import { sourcePorts } from './walkPorts.ts';

/** A piece of wiring between two junctions, or a string that lies in series on the way. */
export interface Wire {
  readonly part: PartId;
  readonly segment?: number;
  readonly from: JunctionId;
  readonly to: JunctionId;
  /** V(from) - V(to) by the part's own law or answer. */
  readonly fallV: number;
  /** From `from` to `to`; null where the network does not determine it. */
  readonly currentA: number | null;
  /** A string: its rest volts, the rest of the rise being its sag. Wires of it lead from minus to plus. */
  readonly emfV?: number;
}

export interface Stretch {
  readonly wire: Wire;
  /** True from `from` to `to`. */
  readonly forward: boolean;
}

export class Wires {
  private readonly place = new Map<JunctionId, number>();
  private readonly names: JunctionId[] = [];
  /** By junction: the wire of the tree towards its root. */
  private readonly up: ((Stretch & { readonly above: number }) | undefined)[] = [];
  private readonly depth: number[] = [];
  private readonly root: number[] = [];

  constructor(parts: readonly SinglePart[], point: OperatingPoint) {
    const wires = parts.flatMap((part) => wiresOf(part, point));
    const width = ({ currentA, emfV }: Wire) => {
      const size = currentA === null ? Number.POSITIVE_INFINITY : Math.abs(currentA);
      // Strings come last: a walk goes through one only where no wiring leads on.
      return emfV === undefined ? size : -1 / (1 + size);
    };
    const widest = wires.map((wire, index) => ({ wire, index, width: width(wire) }));
    widest.sort((a, b) => (a.width === b.width ? a.index - b.index : b.width - a.width));
    for (const { from, to } of wires) {
      this.touch(from);
      this.touch(to);
    }
    this.plant(widest.map(({ wire }) => wire));
  }

  /** The widest way from one junction to another; `undefined` where no wiring joins them. Empty for a junction to itself. */
  way(from: JunctionId, to: JunctionId): readonly Stretch[] | undefined {
    if (from === to) return [];
    let [a, b] = [this.place.get(from), this.place.get(to)];
    if (a === undefined || b === undefined || this.root[a] !== this.root[b]) return undefined;
    const out: Stretch[] = [];
    const back: Stretch[] = [];
    while (a !== b) {
      if (this.depth[a]! >= this.depth[b]!) {
        const { wire, forward, above }: Stretch & { above: number } = this.up[a]!;
        out.push({ wire, forward });
        a = above;
      } else {
        const { wire, forward, above }: Stretch & { above: number } = this.up[b]!;
        back.push({ wire, forward: !forward });
        b = above;
      }
    }
    back.reverse();
    return [...out, ...back];
  }

  private touch(junction: JunctionId): void {
    if (this.place.has(junction)) return;
    this.place.set(junction, this.names.length);
    this.names.push(junction);
  }

  /** Builds the tree from wires in falling width and roots each piece of it. */
  private plant(widest: readonly Wire[]): void {
    const count = this.names.length;
    const sets = new DisjointSets(count);
    const around: Wire[][] = Array.from({ length: count }, () => []);
    for (const wire of widest) {
      const [a, b] = [this.place.get(wire.from)!, this.place.get(wire.to)!];
      if (sets.find(a) === sets.find(b)) continue;
      sets.join(a, b);
      around[a]!.push(wire);
      around[b]!.push(wire);
    }
    for (let start = 0; start < count; start++) {
      if (this.root[start] === undefined) this.grow(start, around);
    }
  }

  private grow(start: number, around: readonly (readonly Wire[])[]): void {
    this.root[start] = start;
    this.depth[start] = 0;
    const queue = [start];
    for (const at of queue) {
      for (const wire of around[at]!) {
        const from = this.place.get(wire.from)!;
        const next = from === at ? this.place.get(wire.to)! : from;
        if (this.root[next] !== undefined) continue;
        this.root[next] = start;
        this.depth[next] = this.depth[at]! + 1;
        this.up[next] = { wire, forward: from === next, above: at };
        queue.push(next);
      }
    }
  }
}

function wiresOf(part: SinglePart, point: OperatingPoint): readonly Wire[] {
  const answer = point.parts.get(part.id);
  if (answer === undefined || isOpen(part)) return [];
  if (part.kind === 'busbar') {
    return part.junctions.slice(1).map((to, segment) => {
      const currentA = answer.segmentsA?.[segment] ?? null;
      const fallV = (currentA ?? 0) * part.segmentOhm;
      return { part: part.id, segment, from: part.junctions[segment]!, to, fallV, currentA };
    });
  }
  if (isWiring(part)) {
    const [from, to] = joined(part);
    const passes = answer.state !== 'blocking' && answer.voltageV !== null;
    if (!passes || from === undefined || to === undefined) return [];
    return [{ part: part.id, from, to, fallV: answer.voltageV, currentA: answer.currentA }];
  }
  if (part.kind === 'string') return seriesWires(part, point);
  return part.kind === 'controller' && part.type === 'pwm' ? linksOf(part, answer) : [];
}

/** A string as a way from its minus to its plus, by its halves where it has a midpoint. */
function seriesWires(string: Extract<SinglePart, { kind: 'string' }>, point: OperatingPoint): readonly Wire[] {
  const ports = sourcePorts(string, point);
  const pieces = ports.length > 1 ? ports.slice(1) : ports;
  return pieces.map(({ part, plus, minus, emfV, sagV, currentA }) => {
    return { part, from: minus, to: plus, fallV: (sagV ?? 0) - emfV, currentA, emfV };
  });
}

/** A switching controller joins its two minus terminals always, and its plus terminals while it lets the array through. */
function linksOf(
  part: Extract<SinglePart, { kind: 'controller' }>,
  answer: { readonly state?: string; readonly outputA?: number | null },
): readonly Wire[] {
  const direct = answer.state === 'direct';
  const currentA = direct ? (answer.outputA ?? null) : null;
  const minus = { part: part.id, from: part.to.minus, to: part.from.minus, fallV: 0, currentA };
  return direct ? [{ part: part.id, from: part.from.plus, to: part.to.plus, fallV: 0, currentA }, minus] : [minus];
}
