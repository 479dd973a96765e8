/** What the study of faults and protective devices answers. */
import type { JunctionId, PartId } from '../job/part.ts';
import type { Basis } from '../tables/status.ts';

/** `plain`: Thévenin with the figures' own values; `iec-61660`: the battery branch of IEC 61660-1, first instant and settled. */
export type FaultMethod = 'plain' | 'iec-61660';

/** What one source sends into a fault. */
export interface FaultShare {
  readonly part: PartId;
  readonly currentA: number;
}

/** A bolted fault between a junction and another. */
export interface FaultCurrent {
  /** First instant; for `plain` the same as `settledA`. */
  readonly firstA: number;
  /** After the first tenths of a second. */
  readonly settledA: number;
  /** Seen from the fault: volts before it, and -dV/dI. */
  readonly openV: number;
  readonly sourceOhm: number;
  readonly shares: readonly FaultShare[];
}

export interface JunctionFault {
  readonly junction: JunctionId;
  /** The junction that it is shorted to: its island's reference, or the one asked for. */
  readonly to: JunctionId;
  /** Cold cables, low resistance, high EMF, every source. Null where no source reaches the two. */
  readonly highest: FaultCurrent | null;
  /** Hot cables, high resistance, low EMF, the least source alone that is connected. */
  readonly lowest: FaultCurrent | null;
}

/** A fault just behind a device, seen by the device: on either side, the side that sends more through it counts for the highest. */
export interface DeviceFault {
  readonly device: PartId;
  /** Junction at which the fault lies for the highest current through the device. */
  readonly at: JunctionId;
  readonly highestA: number;
  /** Far end of what it protects, lowest. Null where nothing lies behind it. */
  readonly lowestAt: JunctionId | null;
  readonly lowestA: number | null;
  /** What that fault is to. */
  readonly lowestTo: JunctionId | null;
  /** Through the device from the other side as well, where a source lies there: a source at both ends. */
  readonly fromBothSides: boolean;
  /** The most through the device for a fault right behind each of its two ends. */
  readonly sides: readonly { readonly at: JunctionId; readonly highestA: number }[];
}

/** Fault currents of one operating case. */
export interface FaultStudy {
  readonly case: string;
  readonly method: FaultMethod;
  /** Between poles; then, where a bond to earth exists, from every junction to earth. */
  readonly junctions: readonly JunctionFault[];
  /** Closed fuses and breakers that a source reaches. */
  readonly devices: readonly DeviceFault[];
  /** One sentence each, beginning with the field that would settle it. */
  readonly assumed: readonly string[];
}

/** One point of a band: at so many amperes it holds at least `meltS` and has opened by `clearS`. Infinity: never. */
export interface BandPoint {
  readonly currentA: number;
  readonly meltS: number;
  readonly clearS: number;
}
/** How a device behaves in time, from the maker's points of the job or the generic band of its type. */
export interface DeviceBand {
  readonly device: PartId;
  readonly kind: 'fuse' | 'breaker';
  /** Empty where the job names no type and the maker's points alone are known. */
  readonly type: string;
  readonly ratingA: number;
  /** `maker`: the job's own points; `generic`: the band of its type, which says so wherever it is used. */
  readonly from: 'maker' | 'generic';
  /** Rising currents. No time is read off beyond the last. */
  readonly points: readonly BandPoint[];
  /** Melting and total clearing I²t, A²s, where known: used below 10 ms. */
  readonly preArcI2t: number | null;
  readonly totalI2t: number | null;
  readonly basis: Basis;
}

export interface Clearing {
  readonly device: PartId;
  readonly currentA: number;
  /** Seconds by which it surely has opened; null: it may never, or the band does not say. Never falls short beyond the last point. */
  readonly clearS: number | null;
  /** Seconds that it surely holds; null: the band does not say. Infinity: for ever. */
  readonly holdS: number | null;
  /** Whether it surely opens; null: the band says nothing of opening. */
  readonly clears: boolean | null;
  /** A²s let through until then, at most; null where it may never open. */
  readonly letThroughI2t: number | null;
  /**
   * The current lies beyond the last point, and no I²t settles it: `clearS` and `letThroughI2t` are what they are at the last point, at
   * most. What passes with them passes; what fails with them is not decided without the maker's points.
   */
  readonly beyond: boolean;
  readonly text: string;
}
