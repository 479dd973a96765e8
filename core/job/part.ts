/**
 * The parts of a job, after checking: every quantity is a number in the unit that its name carries, every default that the
 * job-file contract states has been filled in. A field that is `undefined` was not given and has no contract default: whoever
 * needs it either takes a marked assumption or reports the check as not done.
 *
 * Signs of a current, stated once for the whole program:
 * source kinds (`string`, `array`, `charger`) are positive out of `plus`; load kinds (`load`, `inverter`) positive into `plus`;
 * two-ended kinds positive from `from` to `to`.
 */

import type { ConductorSize } from '../units/conductorSize.ts';

/** Identity of a part: unique in a job. */
export type PartId = string & { readonly __brand: 'PartId' };
/** Identity of a junction: a named point where conductors meet. */
export type JunctionId = string & { readonly __brand: 'JunctionId' };

/** Where a figure comes from. A field given without an origin is a `label` figure; a field not given is a `default`. */
export type Origin = 'measured' | 'label' | 'default' | 'guess';

export type { ConductorSize };

export type Chemistry = 'flooded' | 'agm' | 'gel' | 'lfp' | 'nmc' | 'nicd';
export type Metal = 'copper' | 'tinned-copper' | 'aluminium';
export type Stranding = 'solid' | 'stranded' | 'flexible';
export type Run = 'free-air' | 'conduit' | 'bundle' | 'engine-space' | 'buried';
export type SwitchState = 'closed' | 'open';

interface PartBase {
  readonly id: PartId;
  readonly label: string | undefined;
  readonly note: string | undefined;
  readonly locationTag: string | undefined;
  readonly at: { readonly x: number; readonly y: number } | undefined;
  /** Origin of each field that the job gives one for. Read it through `originOf`. */
  readonly origin: ReadonlyMap<string, Origin>;
  /** Low and high bound of a field, in the field's own unit. */
  readonly range: ReadonlyMap<string, readonly [number, number]>;
  /** Names of the fields that the job itself gave (before defaults). */
  readonly given: ReadonlySet<string>;
  /** The box, locker or cabinet that the part sits in: parts of one enclosure name it alike. */
  readonly enclosure?: string | undefined;
  /** `x-…` fields of the part, carried along untouched. */
  readonly extra?: ReadonlyMap<string, unknown>;
}
interface Poles {
  readonly plus: JunctionId;
  readonly minus: JunctionId;
}
interface TwoPole extends PartBase, Poles {}
interface TwoEnded extends PartBase {
  readonly from: JunctionId;
  readonly to: JunctionId;
}
interface TwoPort extends PartBase {
  readonly from: Poles;
  readonly to: Poles;
}

export interface StringPart extends TwoPole {
  readonly kind: 'string';
  readonly chemistry: Chemistry;
  readonly blocksInSeries: number;
  readonly blockNominalV: number;
  /** Capacity of the string; the 20 h rate for lead-acid. */
  readonly capacityAh: number;
  /** 0 to 1; contract default 1. */
  readonly stateOfCharge: number;
  readonly temperatureDegC: number | undefined;
  readonly ageYears: number | undefined;
  /** Whole string at rest; overrides the chemistry's curve. */
  readonly emfV: number | undefined;
  /** Whole string, links excluded; overrides the default for chemistry and size. */
  readonly resistanceOhm: number | undefined;
  /** All inter-block links of the string together; contract default 0. */
  readonly linkOhm: number;
  /** Size of each inter-block link. */
  readonly linkSize: ConductorSize | undefined;
  readonly maxChargeA: number | undefined;
  readonly maxDischargeA: number | undefined;
  readonly shortCircuitA: number | undefined;
  /** Junction between the two halves of the string. */
  readonly midpoint: JunctionId | undefined;
  /** Cold-cranking current printed on the battery, of the whole string. */
  readonly crankingA?: number | undefined;
  /** Largest fuse that the battery's papers allow. */
  readonly maxFuseA?: number | undefined;
  /** Something disconnects the loads below this voltage of the whole string. */
  readonly lowCutoffV?: number | undefined;
  /** Strapped or boxed so that it cannot move. */
  readonly heldDown?: boolean | undefined;
  /** Right above, below or beside a tank, filter or fitting of fuel. */
  readonly besideFuel?: boolean | undefined;
  /** Its posts are held by clips that rely on a spring. */
  readonly springClip?: boolean | undefined;
  /** Its live posts are covered. */
  readonly covered?: boolean | undefined;
  /** Opening of the battery space to outside air, of the inlet and of the outlet each. */
  readonly ventOpeningCm2?: number | undefined;
  /** Air that a fan moves through the battery space. */
  readonly ventAirM3PerH?: number | undefined;
  /** Something blocks charging of the cold battery. */
  readonly lowTemperatureCutoff?: boolean | undefined;
}

/** What a conductor is made of and how it lies; shared by `cable` and `pair`. */
export interface ConductorFields {
  readonly inParallel: number;
  readonly metal: Metal | undefined;
  readonly stranding: Stranding | undefined;
  readonly insulationDegC: number | undefined;
  readonly run: Run | undefined;
  readonly loadedConductors: number | undefined;
  readonly ambientDegC: number | undefined;
  /** Fixes the temperature used for the resistance; else it is found from the load. */
  readonly conductorDegC: number | undefined;
  /** The two terminations of one conductor together; contract default 0. */
  readonly endOhm: number;
  readonly sheathed: boolean | undefined;
  /** Measured resistance of the run as it lies (its parallel conductors together), terminations excluded; overrides the tables. */
  readonly resistanceOhm: number | undefined;
}

export interface CablePart extends TwoEnded, ConductorFields {
  readonly kind: 'cable';
  /** This conductor's own length. */
  readonly lengthM: number;
  /** `undefined` only where `resistanceOhm` is given. */
  readonly size: ConductorSize | undefined;
}

/** An out-and-back run; stands for the cables `<id>.plus` and `<id>.minus`, see `cablesOfPair`. */
export interface PairPart extends TwoPort, ConductorFields {
  readonly kind: 'pair';
  /** One way. */
  readonly lengthM: number;
  readonly size: ConductorSize | undefined;
  readonly minusSize: ConductorSize | undefined;
  readonly minusLengthM: number | undefined;
}

export interface BusbarPart extends PartBase {
  readonly kind: 'busbar';
  /** In order along the bar, two or more. */
  readonly junctions: readonly JunctionId[];
  readonly ratingA: number | undefined;
  readonly ratingV: number | undefined;
  /** Between neighbours; contract default 0. */
  readonly segmentOhm: number;
  /** Short-time withstand current, held for `withstandS`. */
  readonly withstandA?: number | undefined;
  readonly withstandS?: number | undefined;
  /** Temperature that its terminals are marked for. */
  readonly terminalDegC?: number | undefined;
  readonly covered?: boolean | undefined;
}

/** `[currentA, meltS, clearS]`: from `meltS` the element may have melted, by `clearS` it has surely opened. */
export type CurvePoint = readonly [currentA: number, meltS: number, clearS: number];

/** Where a part that may make a spark sits. */
interface SparkFields {
  readonly inBatterySpace?: boolean | undefined;
  readonly ignitionProtected?: boolean | undefined;
}

interface ProtectiveFields extends TwoEnded, SparkFields {
  readonly ratingA: number;
  readonly type: string | undefined;
  readonly ratingV: number | undefined;
  /** At the system's DC voltage. */
  readonly interruptA: number | undefined;
  readonly state: SwitchState;
  readonly resistanceOhm: number | undefined;
  readonly distanceFromSourceM: number | undefined;
  readonly sheathed: boolean | undefined;
  /** Of the place that it sits in. */
  readonly ambientDegC?: number | undefined;
  /** Temperature that its terminals are marked for. */
  readonly terminalDegC?: number | undefined;
  /** It is marked for direct current. */
  readonly dcRated?: boolean | undefined;
  /** The maker's curve, by rising current; overrides the generic band of its type. */
  readonly curvePoints?: readonly CurvePoint[] | undefined;
  /** Least I²t that melts it, A²s. */
  readonly preArcI2t?: number | undefined;
  /** Most I²t that it lets through until it has opened, A²s. */
  readonly totalI2t?: number | undefined;
  /** A hand reaches it at once. */
  readonly accessible?: boolean | undefined;
  /** Its live studs are covered. */
  readonly covered?: boolean | undefined;
}
export interface FusePart extends ProtectiveFields {
  readonly kind: 'fuse';
}
export interface BreakerPart extends ProtectiveFields {
  readonly kind: 'breaker';
  readonly manualReset: boolean | undefined;
}
export interface SwitchPart extends TwoEnded, SparkFields {
  readonly kind: 'switch';
  readonly ratingA: number | undefined;
  readonly ratingV: number | undefined;
  readonly state: SwitchState;
  readonly loadBreak: boolean | undefined;
  readonly resistanceOhm: number | undefined;
  readonly dcRated?: boolean | undefined;
  readonly terminalDegC?: number | undefined;
  /** Largest current that it carries for a few seconds. */
  readonly shortTimeA?: number | undefined;
  readonly accessible?: boolean | undefined;
  readonly distanceFromSourceM?: number | undefined;
  /** It can be locked open. */
  readonly lockable?: boolean | undefined;
  /** It is marked with what it switches. */
  readonly marked?: boolean | undefined;
}
export interface ShuntPart extends TwoEnded {
  readonly kind: 'shunt';
  readonly ratingA: number;
  readonly ratingMv: number;
}
export interface JointPart extends TwoEnded {
  readonly kind: 'joint';
  readonly resistanceOhm: number;
  readonly springClip?: boolean | undefined;
  readonly covered?: boolean | undefined;
}
/** What the papers of a consumer or charger say of its wiring. */
interface DeviceFields {
  /** Rated volts of the system that it is made for (of its input). */
  readonly nominalV?: number | undefined;
  readonly maxFuseA?: number | undefined;
  /** Temperature that its terminals are marked for. */
  readonly terminalDegC?: number | undefined;
}
export interface DiodePart extends TwoEnded {
  readonly kind: 'diode';
  readonly forwardV: number | undefined;
  readonly slopeOhm: number | undefined;
  readonly ratingA: number | undefined;
}

export interface LoadPart extends TwoPole, DeviceFields {
  readonly kind: 'load';
  /** Exactly one of `powerW`, `currentA`, `resistanceOhm` is given. */
  readonly powerW: number | undefined;
  readonly currentA: number | undefined;
  readonly resistanceOhm: number | undefined;
  readonly on: boolean;
  /** The load drops out below. */
  readonly minimumV: number | undefined;
  readonly maximumV: number | undefined;
  readonly surgeW: number | undefined;
  readonly surgeS: number | undefined;
  /** Runs 3 h or more. */
  readonly continuous: boolean | undefined;
  readonly dropClass: 'critical' | 'ordinary' | undefined;
  /** A starter motor. */
  readonly cranking?: boolean | undefined;
}
export interface InverterPart extends TwoPole, DeviceFields {
  readonly kind: 'inverter';
  /** Present output. */
  readonly acPowerW: number | undefined;
  readonly ratedW: number;
  readonly surgeW: number | undefined;
  /** A number, or points `[fraction of rated output, efficiency]` with rising fractions. */
  readonly efficiency: number | readonly (readonly [number, number])[] | undefined;
  readonly standbyW: number | undefined;
  readonly cutoffV: number | undefined;
  readonly on: boolean;
  readonly surgeS?: number | undefined;
  /** Fraction of the volts lost in the wiring of its AC side. */
  readonly acDrop?: number | undefined;
}
export interface ArrayPart extends TwoPole {
  readonly kind: 'array';
  readonly modulesInSeries: number;
  readonly stringsInParallel: number;
  readonly vocV: number;
  readonly iscA: number;
  readonly vmpV: number;
  readonly impA: number;
  /** Fractions of the standard value per kelvin. */
  readonly vocPerDegC: number | undefined;
  readonly iscPerDegC: number | undefined;
  readonly pmpPerDegC: number | undefined;
  readonly nominalCellDegC: number | undefined;
  readonly tiltDeg: number | undefined;
  readonly azimuthDeg: number | undefined;
  readonly maxFuseA: number | undefined;
}
export interface ControllerPart extends TwoPort, Omit<DeviceFields, 'nominalV'> {
  readonly kind: 'controller';
  readonly type: 'mppt' | 'pwm';
  /** Limit. */
  readonly outputA: number;
  readonly maxInputV: number;
  readonly setpointV: number;
  readonly efficiency: number | undefined;
  /** Most short-circuit current of an array that it takes. */
  readonly maxInputA?: number | undefined;
  /** It lets nothing back to the array in the dark. */
  readonly blocksAtNight?: boolean | undefined;
}
export interface ChargerPart extends TwoPole, DeviceFields, SparkFields {
  readonly kind: 'charger';
  readonly source: string | undefined;
  /** Limit. */
  readonly outputA: number;
  readonly setpointV: number;
  readonly on: boolean;
  /** It cannot give more than its limit, whatever stands behind it. */
  readonly selfLimiting?: boolean | undefined;
}
export interface ConverterPart extends TwoPort, DeviceFields {
  readonly kind: 'converter';
  readonly outputV: number;
  /** Limit. */
  readonly outputA: number;
  readonly efficiency: number | undefined;
  readonly standbyW: number | undefined;
  readonly on: boolean;
}
/** An equipotential or earth bond; `to` may be the earth junction, `"earth"`. */
export interface BondPart extends TwoEnded {
  readonly kind: 'bond';
  readonly size: ConductorSize | undefined;
  readonly lengthM: number | undefined;
}

export type Part =
  | StringPart
  | CablePart
  | PairPart
  | BusbarPart
  | FusePart
  | BreakerPart
  | SwitchPart
  | ShuntPart
  | JointPart
  | DiodePart
  | LoadPart
  | InverterPart
  | ArrayPart
  | ControllerPart
  | ChargerPart
  | ConverterPart
  | BondPart;

export type PartKind = Part['kind'];

/** How a sentence names a part: `F3 (main fuse)`, or the id alone. */
export function nameOf(part: Part): string {
  return part.label === undefined ? part.id : `${part.id} (${part.label})`;
}

/** Origin of one field of a part: as stated, else `label` when the job gave the field, else `default`. */
export function originOf(part: Part, field: string): Origin {
  return part.origin.get(field) ?? (part.given.has(field) ? 'label' : 'default');
}

/** The two cables that an out-and-back run stands for: `<id>.plus` out from source to load, `<id>.minus` back. */
export function cablesOfPair(pair: PairPart): readonly [CablePart, CablePart] {
  let cables = pairCables.get(pair);
  if (cables === undefined) {
    cables = splitPair(pair);
    pairCables.set(pair, cables);
  }
  return cables;
}

/** One pair always gives the same two cables, so that what is found out about them is found out once. */
const pairCables = new WeakMap<PairPart, readonly [CablePart, CablePart]>();

function splitPair(pair: PairPart): readonly [CablePart, CablePart] {
  const { kind: _kind, from, to, minusSize, minusLengthM, ...conductor } = pair;
  const plus: CablePart = {
    ...conductor,
    kind: 'cable',
    id: `${pair.id}.plus` as PartId,
    from: from.plus,
    to: to.plus,
  };
  const minus: CablePart = {
    ...conductor,
    kind: 'cable',
    id: `${pair.id}.minus` as PartId,
    from: to.minus,
    to: from.minus,
    size: minusSize ?? pair.size,
    lengthM: minusLengthM ?? pair.lengthM,
  };
  return [plus, minus];
}

/** Every junction that a part touches, in the order of its fields. */
export function junctionsOf(part: Part): readonly JunctionId[] {
  switch (part.kind) {
    case 'busbar':
      return part.junctions;
    case 'pair':
    case 'controller':
    case 'converter':
      return [part.from.plus, part.from.minus, part.to.plus, part.to.minus];
    case 'string':
      return part.midpoint === undefined ? [part.plus, part.minus] : [part.plus, part.minus, part.midpoint];
    case 'load':
    case 'inverter':
    case 'array':
    case 'charger':
      return [part.plus, part.minus];
    default:
      return [part.from, part.to];
  }
}
