/** All wires of a drawing laid one after the other; those that nothing has changed for keep their last route. */
import type { Part } from '../job/part.ts';
import { clearRoute, type WireToLay } from './clearRoute.ts';
import type { Surroundings } from './drawPart.ts';
import type { Point, Positions } from './point.ts';
import { samePoint } from './point.ts';
import type { Box, PlaceOf } from './pose.ts';
import { boxesOverlap, isConductor, terminalPlaces } from './pose.ts';
import { routeWire } from './routeWire.ts';
import { boxOf, CLEAR, TOUCHING, type WireRoom } from './wireRoom.ts';

/** A wire before it is laid. */
interface Plan extends Omit<WireToLay, 'otherHalf'> {
  /** Part and role. */
  readonly name: string;
  /** The other half of a conductor. */
  readonly otherName: string | undefined;
}

interface LaidWire {
  readonly points: readonly Point[];
  /** All that its route depends on but its surroundings. */
  readonly key: string;
  /** Whether it was laid among the first, because it runs straight. */
  readonly isStraight: boolean;
  /** All that was looked at to find the route: a change elsewhere cannot change it. */
  readonly seen: Box;
}

/** Routes by part and role, and what they were laid among. */
export interface Laid {
  readonly routes: ReadonlyMap<string, LaidWire>;
  readonly things: ReadonlyMap<string, Box>;
}

export function wiresToLay(
  parts: readonly Part[],
  positions: Positions,
  { placeOf, entryOf }: { readonly placeOf: PlaceOf; readonly entryOf: Surroundings['entryOf'] },
): readonly Plan[] {
  return parts.flatMap((part): readonly Plan[] => {
    const at = positions.parts.get(part.id);
    if (at === undefined || part.kind === 'busbar') return [];
    return terminalPlaces(part, at, placeOf).flatMap((terminal): readonly Plan[] => {
      const end = placeOf(terminal.junction);
      if (end === undefined || samePoint(end, terminal)) return [];
      return [
        {
          name: `${part.id} ${terminal.role}`,
          otherName: isConductor(part) ? `${part.id} ${otherEnd(terminal.role)}` : undefined,
          owner: ownerOf(part, terminal.role),
          junction: terminal.junction,
          terminal,
          end,
          entry: entryOf(terminal.junction),
          start: isConductor(part) ? 'name' : 'plus' in part && terminal.role !== 'midpoint' ? 'pole' : 'symbol',
        },
      ];
    });
  });
}
function otherEnd(role: string): string {
  return role.startsWith('from') ? role.replace('from', 'to') : role.replace('to', 'from');
}
/** The halves of a conductor are one wire; each lead of a symbol is its own. */
function ownerOf(part: Part, role: string): string {
  return isConductor(part) ? `${part.id} ${role.endsWith('minus') ? 'minus' : 'plus'}` : `${part.id} ${role}`;
}

/** Straight wires first, then the others, short ones before long ones. */
export function layWires(room: WireRoom, plans: readonly Plan[], last?: Laid): Laid {
  const laying = new Laying(room, plans, last);
  const others: Plan[] = [];
  for (const plan of plans) if (!laying.layStraight(plan)) others.push(plan);
  others.sort((a, b) => distance(a.terminal, a.end) - distance(b.terminal, b.end));
  for (const plan of others) laying.layAround(plan);
  return { routes: laying.routes, things: room.things };
}
function distance(a: Point, b: Point): number {
  return Math.abs(a.x - b.x) + Math.abs(a.y - b.y);
}

class Laying {
  readonly routes = new Map<string, LaidWire>();
  private readonly room: WireRoom;
  private readonly last: Laid | undefined;
  /** Where something stands or runs otherwise than the last time. */
  private readonly changed: Box[] = [];

  constructor(room: WireRoom, plans: readonly Plan[], last: Laid | undefined) {
    this.room = room;
    this.last = last;
    if (last === undefined) return;
    for (const [name, box] of room.things) if (!last.things.has(name)) this.changed.push(box);
    for (const [name, box] of last.things) if (!room.things.has(name)) this.changed.push(box);
    const names = new Set(plans.map(({ name }) => name));
    for (const [name, { points }] of last.routes) if (!names.has(name)) this.change(points);
  }

  /** Lays a wire that can run straight and clear. */
  layStraight(plan: Plan): boolean {
    const plain = routeWire(plan.terminal, plan.end, plan.entry);
    const [a, b] = plain;
    if (plain.length !== 2 || a === undefined || b === undefined) return false;
    const seen = grown(boxOf(a, b));
    const old = this.kept(plan, seen);
    const isStraight = old === undefined ? this.room.costOf(plain, plan, TOUCHING) < TOUCHING : old.isStraight;
    if (isStraight) this.keep(plan, { points: plain, key: keyOf(plan), isStraight, seen });
    return isStraight;
  }

  layAround(plan: Plan): void {
    const old = this.last?.routes.get(plan.name);
    const otherHalf = (plan.otherName === undefined ? undefined : this.routes.get(plan.otherName)?.points) ?? [];
    const key = `${keyOf(plan)} ${otherHalf[1] === undefined ? '' : `${otherHalf[1].x},${otherHalf[1].y}`}`;
    if (old !== undefined && !old.isStraight && old.key === key && !this.isChanged(old.seen)) {
      this.keep(plan, old);
      return;
    }
    const { points, seen } = clearRoute(this.room, { ...plan, otherHalf });
    this.keep(plan, { points, key, isStraight: false, seen: grown(seen) });
  }

  /** The last laying of the same wire, where nothing has changed of what a box holds. */
  private kept(plan: Plan, seen: Box): LaidWire | undefined {
    const old = this.last?.routes.get(plan.name);
    if (old === undefined || this.isChanged(seen)) return undefined;
    return old.key.startsWith(keyOf(plan)) ? old : undefined;
  }
  private isChanged(seen: Box): boolean {
    return this.changed.some((box) => boxesOverlap(box, seen));
  }
  private keep(plan: Plan, laid: LaidWire): void {
    const old = this.last?.routes.get(plan.name);
    this.routes.set(plan.name, laid);
    this.room.addWire(laid.points, plan);
    if (this.last === undefined || old === laid) return;
    const isSame = old !== undefined && old.key === laid.key && old.isStraight === laid.isStraight;
    if (isSame && samePoints(old.points, laid.points)) return;
    this.change(laid.points);
    if (old !== undefined) this.change(old.points);
  }
  private change(points: readonly Point[]): void {
    for (const [index, b] of points.entries()) {
      const a = points[index - 1];
      if (a !== undefined) this.changed.push(grown(boxOf(a, b)));
    }
  }
}

function keyOf({ terminal, end, entry, start, junction }: Plan): string {
  return `${junction} ${terminal.x},${terminal.y} ${terminal.way} ${end.x},${end.y} ${entry} ${start};`;
}
function samePoints(some: readonly Point[], others: readonly Point[]): boolean {
  return (
    some.length === others.length &&
    some.every((point, index) => {
      const other = others[index];
      return other !== undefined && samePoint(point, other);
    })
  );
}
function grown({ x1, y1, x2, y2 }: Box): Box {
  return { x1: x1 - CLEAR, y1: y1 - CLEAR, x2: x2 + CLEAR, y2: y2 + CLEAR };
}
