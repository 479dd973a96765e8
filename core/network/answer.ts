/** What a solve answers, for one operating case. */
import type { JunctionId, Origin, PartId } from '../job/part.ts';
import type { Basis } from '../tables/status.ts';

/** Battery resistance over minutes (`slow`, sharing and drops) or in the first second (`fast`, faults and surges). */
export type BatteryModel = 'slow' | 'fast';

/**
 * The answer about one part; signs as in `core/job/part.ts`. `null` with an entry in `undetermined` where the network does not
 * determine a figure. A `pair` answers as its two cables, under their own ids.
 */
export interface PartAnswer {
  readonly id: PartId;
  readonly currentA: number | null;
  readonly voltageV: number | null;
  /** Sources: delivered; loads: taken; two-ended parts: turned to heat; controllers and converters: lost in the part. */
  readonly powerW: number | null;
  /** Two-ended parts: |from - to|. */
  readonly dropV: number | null;
  /** Cables whose temperature was found or fixed. */
  readonly conductorDegC?: number;
  /**
   * What limits or stops the part, in one word or phrase: `off`, `open`, `unfed`, `dropped-out`, `blocking`, `conducting`,
   * `current-limited`, `voltage-held`, `idle`, `tracking` …
   */
  readonly state?: string;
  /** Busbar: current in each segment, from one junction to the next along the bar. */
  readonly segmentsA?: readonly (number | null)[];
  /** Controllers and converters. */
  readonly inputA?: number | null;
  readonly inputV?: number | null;
  readonly outputA?: number | null;
  readonly outputV?: number | null;
  /** Why `currentA` (or a segment) is null. */
  readonly undetermined?: string;
}

/** The sums that prove an answer. */
export interface Proof {
  /** Largest remainder of Kirchhoff's current rule over all junctions, A. */
  readonly worstJunctionA: number;
  /** Junction where it occurs. */
  readonly worstJunction: JunctionId | null;
  /** Largest disagreement between a part's own law and the volts across it, V: the remainder of the voltage rule. */
  readonly worstLoopV: number;
  /** Power delivered by all sources, W. */
  readonly powerInW: number;
  /** Power taken by all loads, W (batteries under charge included). */
  readonly powerOutW: number;
  /** Power turned to heat in wiring, joints, devices and batteries, W. */
  readonly heatW: number;
  /** powerInW - powerOutW - heatW. */
  readonly mismatchW: number;
  /** max |residual| / max(|matrix| |x| + |b|), dimensionless. */
  readonly relativeResidual: number;
  readonly iterations: number;
  /** True when every bound of the proof holds; an answer that fails is not printed as one. */
  readonly holds: boolean;
}

export interface Collapse {
  readonly load: PartId;
  /** What the load asks for. */
  readonly wantedW: number;
  /** The largest power that the network can deliver to it, the other loads as drawn (or scaled, see `message`). */
  readonly largestDeliverableW: number;
  readonly message: string;
}

/** Something the solve assumed, to be printed beside the answer. */
export interface Assumption {
  readonly part: PartId | null;
  readonly field: string;
  readonly value: number | string;
  readonly unit: string;
  readonly range: readonly [number, number] | null;
  readonly origin: Origin;
  readonly basis: Basis;
  readonly text: string;
}

/** A part of the drawing that carries nothing, in words that name the part. */
export interface GraphRemark {
  /** `island-unsupplied`: no source in the group; `unfed`: a load without a path to both poles; `floating`: junctions with no defined volts; `source-alone`: a source with nothing to feed. */
  readonly kind: 'island-unsupplied' | 'unfed' | 'floating' | 'source-alone';
  readonly parts: readonly PartId[];
  readonly junctions: readonly JunctionId[];
  readonly message: string;
}

export interface OperatingPoint {
  readonly case: string;
  readonly model: BatteryModel;
  readonly outcome: 'solved' | 'collapse' | 'unsupplied';
  /** Volts of every junction against its island's reference; null where not defined. */
  readonly junctions: ReadonlyMap<JunctionId, number | null>;
  readonly parts: ReadonlyMap<PartId, PartAnswer>;
  readonly proof: Proof;
  readonly collapse?: Collapse;
  readonly remarks: readonly GraphRemark[];
  readonly assumptions: readonly Assumption[];
}
