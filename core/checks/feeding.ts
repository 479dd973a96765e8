/** What feeds a part: the source terminals on the nets of its two poles. */
import type { DiodePart, JunctionId, PartId } from '../job/part.ts';
import type { Nets, PoledPart } from '../network/wiring.ts';
import { closedNets, polesOf, throughDiodes } from '../network/wiring.ts';
import type { SolvedCase } from './checkContext.ts';

interface Feed {
  /** Volts between the source terminals that feed the part, at the sources. */
  readonly volts: number;
  /** The sources whose terminals those are. */
  readonly sources: readonly PoledPart[];
}

interface Terminal {
  readonly part: PoledPart;
  readonly volts: number;
}

interface SourceEnd {
  readonly part: PoledPart;
  readonly at: JunctionId;
}

/**
 * Source terminals of a solved case by net: what is open in the case joins nothing, and a diode lets a source feed only in its
 * own direction, so that two banks behind an isolator do not feed each other's loads.
 */
class Feeders {
  private readonly one: SolvedCase;
  private readonly nets: Nets;
  private readonly diodes: readonly DiodePart[];
  private readonly plusOf = new Map<number, SourceEnd[]>();
  private readonly minusOf = new Map<number, SourceEnd[]>();
  private readonly known = new Map<number, Feed | undefined>();

  constructor(one: SolvedCase) {
    this.one = one;
    this.nets = closedNets(one.parts);
    this.diodes = one.parts.filter(
      (part) => part.kind === 'diode' && one.answer(part.id).state === 'conducting',
    ) as DiodePart[];
    for (const part of one.parts) {
      if (part.kind !== 'string' && !gives(one, part.id)) continue;
      for (const { role, plus, minus } of polesOf(part)) {
        if (role !== 'source') continue;
        this.add(this.plusOf, part as PoledPart, plus);
        this.add(this.minusOf, part as PoledPart, minus);
      }
      if (part.kind === 'string' && part.midpoint !== undefined) {
        this.add(this.plusOf, part, part.midpoint);
        this.add(this.minusOf, part, part.midpoint);
      }
    }
  }

  /**
   * The feed of a pair of junctions: the highest plus terminal among the strings that feed the plus junction, less the lowest
   * minus terminal among those that take back from the minus junction. Only where no string does both, the converters,
   * controllers and chargers there count. `undefined` where nothing feeds them or their volts are not known.
   */
  of({ plus, minus }: { readonly plus: JunctionId; readonly minus: JunctionId }): Feed | undefined {
    const [p, m] = [this.nets.of(plus), this.nets.of(minus)];
    if (p === undefined || m === undefined) return undefined;
    // Parts on the same two nets have the same feed.
    const place = p * this.nets.count + m;
    if (!this.known.has(place)) this.known.set(place, this.find(p, m));
    return this.known.get(place);
  }

  private find(plusNet: number, minusNet: number): Feed | undefined {
    const above = this.ends(this.plusOf, plusNet, 'against');
    const below = this.ends(this.minusOf, minusNet, 'along');
    for (const wanted of [isString, isOther]) {
      const high = best(this.terminals(above, wanted), 1);
      const low = best(this.terminals(below, wanted), -1);
      if (high === undefined || low === undefined) continue;
      return { volts: high.volts - low.volts, sources: [...new Set([high.part, low.part])] };
    }
    return undefined;
  }

  private ends(map: ReadonlyMap<number, readonly SourceEnd[]>, net: number, way: 'along' | 'against') {
    return [...throughDiodes(net, way, { nets: this.nets, diodes: this.diodes }).keys()].flatMap(
      (reached) => map.get(reached) ?? [],
    );
  }

  private terminals(ends: readonly SourceEnd[], wanted: (part: PoledPart) => boolean): readonly Terminal[] {
    return ends.flatMap(({ part, at }) => {
      const volts = this.one.point.junctions.get(at);
      return wanted(part) && typeof volts === 'number' ? [{ part, volts }] : [];
    });
  }

  private add(map: Map<number, SourceEnd[]>, part: PoledPart, at: JunctionId): void {
    const net = this.nets.of(at)!;
    const here = map.get(net);
    if (here === undefined) map.set(net, [{ part, at }]);
    else here.push({ part, at });
  }
}

/** True for a source that gives current in the case. */
function gives(one: SolvedCase, id: PartId): boolean {
  const { currentA } = one.answer(id);
  return currentA === null || currentA > 0;
}

const isString = (part: PoledPart) => part.kind === 'string';
const isOther = (part: PoledPart) => part.kind !== 'string' && part.kind !== 'array';

function best(terminals: readonly Terminal[], sign: 1 | -1): Terminal | undefined {
  return terminals.reduce<Terminal | undefined>(
    (most, one) => (most === undefined || sign * (one.volts - most.volts) > 0 ? one : most),
    undefined,
  );
}

const ofCase = new WeakMap<SolvedCase, Feeders>();

/** The feeders of a solved case, found once for all rules that ask. */
export function feedersOf(one: SolvedCase): Feeders {
  let known = ofCase.get(one);
  if (known === undefined) {
    known = new Feeders(one);
    ofCase.set(one, known);
  }
  return known;
}
