/** What feeds a part: the source terminals on the nets of its two poles. */
import type { JunctionId, PartId } from '../job/part.ts';
import type { SolvedCase } from './checkContext.ts';
import type { Nets, PoledPart, WiringPart } from './wiring.ts';
import { isOpen, netsOf, polesOf } from './wiring.ts';

export interface Feed {
  /** Volts between the source terminals that feed the part, at the sources. */
  readonly volts: number;
  /** The sources whose terminals those are. */
  readonly sources: readonly PoledPart[];
}

interface Terminal {
  readonly part: PoledPart;
  readonly volts: number;
}

/** Source terminals of a solved case by net: what is open or blocking in the case joins nothing. */
class Feeders {
  private readonly nets: Nets;
  private readonly plusOf = new Map<number, { part: PoledPart; at: JunctionId }[]>();
  private readonly minusOf = new Map<number, { part: PoledPart; at: JunctionId }[]>();

  private readonly one: SolvedCase;

  constructor(one: SolvedCase) {
    this.one = one;
    this.nets = netsOf(one.parts, (part) => conductsIn(one, part));
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
   * The feed of a pair of junctions: the highest plus terminal among the strings on the plus junction's net, less the
   * lowest minus terminal among those on the minus junction's net. Only where no string feeds both, the converters, controllers
   * and chargers there count. `undefined` where nothing feeds them or their volts are not known.
   */
  of(ends: { readonly plus: JunctionId; readonly minus: JunctionId }): Feed | undefined {
    for (const wanted of [isString, isOther]) {
      const high = best(this.terminals(this.plusOf, ends.plus, wanted), 1);
      const low = best(this.terminals(this.minusOf, ends.minus, wanted), -1);
      if (high === undefined || low === undefined) continue;
      return { volts: high.volts - low.volts, sources: [...new Set([high.part, low.part])] };
    }
    return undefined;
  }

  private terminals(
    map: ReadonlyMap<number, readonly { part: PoledPart; at: JunctionId }[]>,
    end: JunctionId,
    wanted: (part: PoledPart) => boolean,
  ): readonly Terminal[] {
    const net = this.nets.of(end);
    const here = net === undefined ? undefined : map.get(net);
    return (here ?? []).flatMap(({ part, at }) => {
      const volts = this.one.point.junctions.get(at);
      return wanted(part) && typeof volts === 'number' ? [{ part, volts }] : [];
    });
  }

  private add(map: Map<number, { part: PoledPart; at: JunctionId }[]>, part: PoledPart, at: JunctionId): void {
    const net = this.nets.of(at)!;
    const here = map.get(net);
    if (here === undefined) map.set(net, [{ part, at }]);
    else here.push({ part, at });
  }
}

function conductsIn(one: SolvedCase, part: WiringPart): boolean {
  return !isOpen(part) && (part.kind !== 'diode' || one.answer(part.id).state === 'conducting');
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
