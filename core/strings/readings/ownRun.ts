/** The wiring that carries the current of one string and nothing else. */
import type { JunctionId, PartId, StringPart } from '../../job/part.ts';
import { isOpen, isWiring, meetings, type PartEnd, type SinglePart } from '../../network/wiring.ts';

export interface OwnRun {
  readonly string: StringPart;
  /** Parts that carry the string's current, the string itself among them; -1 where the part counts it the other way. */
  readonly carriers: ReadonlyMap<PartId, 1 | -1>;
  /** Every junction on the way. */
  readonly junctions: ReadonlySet<JunctionId>;
  /** Junctions from a pole of the string outwards. */
  readonly plusWay: readonly JunctionId[];
  readonly minusWay: readonly JunctionId[];
}

type Meetings = ReadonlyMap<JunctionId, readonly PartEnd[]>;

/** From both poles of a string outwards, as long as exactly two parts meet. `parts` as they stand in the case. */
export function ownRunOf(string: StringPart, parts: readonly SinglePart[]): OwnRun {
  let meet = known.get(parts);
  if (meet === undefined) {
    meet = meetings(parts);
    known.set(parts, meet);
  }
  return new Walk(string, meet).run();
}

/** What meets where, found once for a list of parts. */
const known = new WeakMap<readonly SinglePart[], Meetings>();

class Walk {
  private readonly string: StringPart;
  private readonly meet: Meetings;
  private readonly carriers: Map<PartId, 1 | -1>;

  constructor(string: StringPart, meet: Meetings) {
    this.string = string;
    this.meet = meet;
    this.carriers = new Map([[string.id, 1]]);
  }

  run(): OwnRun {
    const plusWay = this.outwards(this.string.plus, 'plus');
    // The answer of a string tapped at half its volts is that of its upper half: the lower carries another current.
    const { minus } = this.string;
    const minusWay = this.isTapped(this.string) ? [minus] : this.outwards(minus, 'minus');
    const junctions = new Set([...plusWay, ...minusWay]);
    return { string: this.string, carriers: this.carriers, junctions, plusWay, minusWay };
  }

  private isTapped({ midpoint }: StringPart): boolean {
    return midpoint !== undefined && this.meet.get(midpoint)!.length > 1;
  }

  private outwards(start: JunctionId, side: 'plus' | 'minus'): readonly JunctionId[] {
    const way = [start];
    let part: SinglePart = this.string;
    let junction = start;
    for (;;) {
      const ends: readonly PartEnd[] = this.meet.get(junction) ?? [];
      const [next, ...others]: PartEnd[] = ends.filter((end) => end.part !== part);
      if (next === undefined || others.length > 0 || ends.length !== 2 || this.carriers.has(next.part.id)) {
        return way;
      }
      const far = this.through(next.part, junction, side);
      if (far === undefined) return way;
      way.push(far);
      part = next.part;
      junction = far;
    }
  }

  /** The far end of a part entered at a junction, and its sign noted; `undefined` where the current cannot simply pass. */
  private through(part: SinglePart, near: JunctionId, side: 'plus' | 'minus'): JunctionId | undefined {
    if (isOpen(part) || part.kind === 'busbar') return undefined;
    if (part.kind === 'string') {
      if (this.isTapped(part)) return undefined;
      return this.noted(part.id, near === part.minus, { near, side }, part.minus, part.plus);
    }
    if (!isWiring(part)) return undefined;
    return this.noted(part.id, near === part.from, { near, side }, part.from, part.to);
  }

  /** A part counts from `first` to `last`; the string's current leaves by its plus and comes back by its minus. */
  private noted(
    id: PartId,
    atFirst: boolean,
    { near, side }: { readonly near: JunctionId; readonly side: 'plus' | 'minus' },
    first: JunctionId,
    last: JunctionId,
  ): JunctionId | undefined {
    if (near !== first && near !== last) return undefined;
    this.carriers.set(id, atFirst === (side === 'plus') ? 1 : -1);
    return atFirst ? last : first;
  }
}
