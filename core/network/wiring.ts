/**
 * The drawing as a graph of junctions, for whoever asks what is joined to what. Wiring parts join junctions: cables, bars,
 * joints, shunts, switches, fuses, breakers, diodes and bonds. Strings, loads, chargers and the like sit between groups of
 * joined junctions, which are called nets here.
 */

import type {
  ArrayPart,
  BondPart,
  BreakerPart,
  BusbarPart,
  CablePart,
  ChargerPart,
  ControllerPart,
  ConverterPart,
  DiodePart,
  FusePart,
  InverterPart,
  JointPart,
  JunctionId,
  LoadPart,
  PairPart,
  Part,
  ShuntPart,
  StringPart,
  SwitchPart,
} from '../job/part.ts';
import { cablesOfPair } from '../job/part.ts';
import { DisjointSets } from './disjointSets.ts';

/** A part as whoever reads the drawing sees it: an out-and-back run is its two cables. */
export type SinglePart = Exclude<Part, PairPart>;
export type Device = FusePart | BreakerPart;
export type WiringPart =
  | CablePart
  | BusbarPart
  | FusePart
  | BreakerPart
  | SwitchPart
  | ShuntPart
  | JointPart
  | DiodePart
  | BondPart;
export type PoledPart = StringPart | LoadPart | InverterPart | ArrayPart | ChargerPart | ControllerPart | ConverterPart;

/** Every kind that a check can meet, for rules that judge them all. */
export const ANY_KIND: readonly SinglePart['kind'][] = [
  'string',
  'cable',
  'busbar',
  'fuse',
  'breaker',
  'switch',
  'shunt',
  'joint',
  'diode',
  'load',
  'inverter',
  'array',
  'controller',
  'charger',
  'converter',
  'bond',
];

export function withoutPairs(parts: readonly Part[]): readonly SinglePart[] {
  return parts.flatMap((part) => (part.kind === 'pair' ? cablesOfPair(part) : [part]));
}

export function isDevice(part: SinglePart): part is Device {
  return part.kind === 'fuse' || part.kind === 'breaker';
}

/** Can this part be open as it stands, so that nothing passes? */
export function isOpen(part: SinglePart): boolean {
  return (part.kind === 'fuse' || part.kind === 'breaker' || part.kind === 'switch') && part.state === 'open';
}

export function isWiring(part: SinglePart): part is WiringPart {
  switch (part.kind) {
    case 'cable':
    case 'busbar':
    case 'fuse':
    case 'breaker':
    case 'switch':
    case 'shunt':
    case 'joint':
    case 'diode':
    case 'bond':
      return true;
    default:
      return false;
  }
}

/** The junctions that a wiring part joins, in order. */
export function joined(part: WiringPart): readonly JunctionId[] {
  return part.kind === 'busbar' ? part.junctions : [part.from, part.to];
}

/** A pair of terminals of a part that is not wiring. */
export interface Poles {
  readonly part: PoledPart;
  /** `source`: it drives current; `sink`: it takes it. A string is a source. */
  readonly role: 'source' | 'sink';
  readonly plus: JunctionId;
  readonly minus: JunctionId;
}

/** Terminal pairs of a part: one for most, two for a controller or converter, none for wiring. */
export function polesOf(part: SinglePart): readonly Poles[] {
  switch (part.kind) {
    case 'string':
    case 'array':
    case 'charger':
      return [{ part, role: 'source', plus: part.plus, minus: part.minus }];
    case 'load':
    case 'inverter':
      return [{ part, role: 'sink', plus: part.plus, minus: part.minus }];
    case 'controller':
    case 'converter':
      return [
        { part, role: 'sink', ...part.from },
        { part, role: 'source', ...part.to },
      ];
    default:
      return [];
  }
}

/** Groups of joined junctions, numbered from 0. */
export interface Nets {
  readonly count: number;
  /** `undefined` for a junction that no part touches. */
  of(junction: JunctionId): number | undefined;
  /** True when both junctions are known and joined. */
  same(a: JunctionId, b: JunctionId): boolean;
}

/** Joins the junctions of every wiring part that `conducts` admits. A bus controller's common minus is not counted. */
export function netsOf(parts: readonly SinglePart[], conducts: (part: WiringPart) => boolean): Nets {
  const place = new Map<JunctionId, number>();
  const touch = (junction: JunctionId): void => {
    if (!place.has(junction)) place.set(junction, place.size);
  };
  for (const part of parts) {
    if (isWiring(part)) joined(part).forEach(touch);
    for (const { plus, minus } of polesOf(part)) {
      touch(plus);
      touch(minus);
    }
    if (part.kind === 'string' && part.midpoint !== undefined) touch(part.midpoint);
  }
  const sets = new DisjointSets(place.size);
  for (const part of parts) {
    if (!isWiring(part) || !conducts(part)) continue;
    const [first, ...others] = joined(part).map((junction) => place.get(junction)!);
    for (const other of others) sets.join(other, first!);
  }
  return numbered(place, [...sets.groups()]);
}

function numbered(place: ReadonlyMap<JunctionId, number>, roots: readonly number[]): Nets {
  const numbers = new Map<number, number>();
  const net = roots.map((root) => {
    const known = numbers.get(root);
    if (known !== undefined) return known;
    numbers.set(root, numbers.size);
    return numbers.size - 1;
  });
  const of = (junction: JunctionId) => {
    const at = place.get(junction);
    return at === undefined ? undefined : net[at];
  };
  return { count: numbers.size, of, same: (a, b) => of(a) !== undefined && of(a) === of(b) };
}

const closed = new WeakMap<readonly SinglePart[], Nets>();

/** What closed wiring joins, diodes left out; worked out once for a list of parts. */
export function closedNets(parts: readonly SinglePart[]): Nets {
  let nets = closed.get(parts);
  if (nets === undefined) {
    nets = netsOf(parts, (part) => !isOpen(part) && part.kind !== 'diode');
    closed.set(parts, nets);
  }
  return nets;
}

/** One end of a part at a junction. A busbar has one for each of its junctions. */
export interface PartEnd {
  readonly part: SinglePart;
  readonly junction: JunctionId;
}

/** What meets at each junction. Bonds are left out: they carry no working current. */
export function meetings(parts: readonly SinglePart[]): ReadonlyMap<JunctionId, readonly PartEnd[]> {
  const found = new Map<JunctionId, PartEnd[]>();
  const add = (part: SinglePart, junction: JunctionId) => {
    const here = found.get(junction);
    if (here === undefined) found.set(junction, [{ part, junction }]);
    else here.push({ part, junction });
  };
  for (const part of parts) {
    if (part.kind === 'bond') continue;
    if (isWiring(part)) for (const junction of joined(part)) add(part, junction);
    for (const { plus, minus } of polesOf(part)) {
      add(part, plus);
      add(part, minus);
    }
    if (part.kind === 'string' && part.midpoint !== undefined) add(part, part.midpoint);
  }
  return found;
}

/**
 * Nets that current can reach from one net (`along`) or come from to it (`against`) through diodes alone, with the diodes on the
 * way; the net itself first, with none. `nets` must not be joined by diodes.
 */
export function throughDiodes(
  start: number,
  way: 'along' | 'against',
  { nets, diodes }: { readonly nets: Nets; readonly diodes: readonly DiodePart[] },
): ReadonlyMap<number, readonly DiodePart[]> {
  const reached = new Map<number, readonly DiodePart[]>([[start, []]]);
  for (const [net, passed] of reached) {
    for (const diode of diodes) {
      const [near, far] = way === 'along' ? [diode.from, diode.to] : [diode.to, diode.from];
      const beyond = nets.of(far)!;
      if (nets.of(near) === net && !reached.has(beyond)) reached.set(beyond, [...passed, diode]);
    }
  }
  return reached;
}
