/**
 * Which parts of a drawing carry anything, found in the graph alone: groups of junctions that conductors and live sources
 * join, the loads that have both poles in one fed group, and the controllers and converters that have something to pass on.
 */
import type { OperatingCase } from '../../core/job/job.ts';
import type { ControllerPart, ConverterPart, JunctionId, Part, PartId } from '../../core/job/part.ts';

/** Two junctions that a conductor or a live source joins. */
interface Link {
  readonly one: JunctionId;
  readonly other: JunctionId;
}

export interface Screening {
  /** Loads, inverters, converters and controllers that are on and have a source between their poles. */
  readonly fed: ReadonlySet<PartId>;
  /** Group of each junction; junctions of a group have defined volts against each other. */
  readonly group: (junction: JunctionId) => JunctionId;
  /** Groups with a live source. */
  readonly supplied: ReadonlySet<JunctionId>;
}

/** Disjoint sets by walking up to a head; no balancing, the networks are small. */
export class Groups<T> {
  private readonly parents = new Map<T, T>();
  head(item: T): T {
    let at = item;
    for (let up = this.parents.get(at); up !== undefined; up = this.parents.get(at)) at = up;
    return at;
  }
  /** False when the two were in one group already. */
  join(one: T, other: T): boolean {
    const [a, b] = [this.head(one), this.head(other)];
    if (a === b) return false;
    this.parents.set(a, b);
    return true;
  }
}

/** Conductors of a part that always join junctions (not the sources and loads). */
function conductorLinks(part: Part): readonly Link[] {
  switch (part.kind) {
    case 'cable':
    case 'shunt':
    case 'joint':
    case 'diode':
    case 'bond':
      return [{ one: part.from, other: part.to }];
    case 'fuse':
    case 'breaker':
    case 'switch':
      return part.state === 'open' ? [] : [{ one: part.from, other: part.to }];
    case 'pair':
      return [
        { one: part.from.plus, other: part.to.plus },
        { one: part.from.minus, other: part.to.minus },
      ];
    case 'busbar':
      return part.junctions.slice(1).map((other, k) => ({ one: part.junctions[k]!, other }));
    case 'controller':
      // The return of a direct controller is a conductor, by day and by night.
      return part.type === 'pwm' ? [{ one: part.from.minus, other: part.to.minus }] : [];
    default:
      return [];
  }
}

/** True where light falls: an array in the dark is no source. */
export function isLit(operatingCase: OperatingCase): boolean {
  return operatingCase.irradianceWPerM2 === undefined || operatingCase.irradianceWPerM2 > 0;
}

function sourceLinks(part: Part, lit: boolean): readonly Link[] {
  if (part.kind === 'string' && part.midpoint !== undefined) {
    return [
      { one: part.plus, other: part.midpoint },
      { one: part.midpoint, other: part.minus },
    ];
  }
  const live = part.kind === 'string' || (part.kind === 'charger' && part.on) || (part.kind === 'array' && lit);
  return live ? [{ one: part.plus, other: part.minus }] : [];
}

export function screen(parts: readonly Part[], operatingCase: OperatingCase): Screening {
  const lit = isLit(operatingCase);
  const groups = new Groups<JunctionId>();
  const sources: JunctionId[] = [];
  for (const part of parts) {
    for (const { one, other } of conductorLinks(part)) groups.join(one, other);
    for (const { one, other } of sourceLinks(part, lit)) {
      groups.join(one, other);
      sources.push(one);
    }
  }
  const fed = new Set<PartId>();
  passOn({ parts, groups, sources, fed, lit });
  const supplied = new Set(sources.map((junction) => groups.head(junction)));
  for (const part of parts) {
    if ((part.kind !== 'load' && part.kind !== 'inverter') || !part.on) continue;
    const head = groups.head(part.plus);
    if (head === groups.head(part.minus) && supplied.has(head)) fed.add(part.id);
  }
  return { fed, group: (junction) => groups.head(junction), supplied };
}

/** Converters and controllers become sources of their output side once their input side has one; until nothing changes. */
function passOn(state: {
  readonly parts: readonly Part[];
  readonly groups: Groups<JunctionId>;
  readonly sources: JunctionId[];
  readonly fed: Set<PartId>;
  readonly lit: boolean;
}): void {
  const { parts, groups, sources, fed, lit } = state;
  const waiting = parts.filter(
    (part): part is ControllerPart | ConverterPart =>
      (part.kind === 'converter' && part.on) || (part.kind === 'controller' && lit),
  );
  for (let changed = true; changed; ) {
    changed = false;
    const supplied = new Set(sources.map((junction) => groups.head(junction)));
    for (const part of waiting) {
      const head = groups.head(part.from.plus);
      if (fed.has(part.id) || head !== groups.head(part.from.minus) || !supplied.has(head)) continue;
      fed.add(part.id);
      changed = true;
      if (part.kind === 'controller' && part.type === 'pwm') {
        groups.join(part.from.plus, part.to.plus);
      } else {
        groups.join(part.to.plus, part.to.minus);
        sources.push(part.to.plus);
      }
      break;
    }
  }
}
