/** The volt walk: the potential along the way from a source through a load and back, as a list of steps. */
import type { JunctionId, PartId } from '../job/part.ts';

/** Where on the way a step lies: in the source, on the way out to the load, in the load, on the way back. */
export type WalkSide = 'source' | 'out' | 'load' | 'back';

/**
 * What a step is: `source`, the rise that the source gives (a string's rest volts, else the volts that it holds); `sag`, the
 * volts lost inside a string to its own resistance; `part`, a piece of wiring; `load`, what the walk is made for.
 */
export type WalkStepKind = 'source' | 'sag' | 'part' | 'load';

export interface WalkStep {
  readonly kind: WalkStepKind;
  readonly side: WalkSide;
  readonly part: PartId;
  /** Busbar: which segment, counted from 0 along the bar. */
  readonly segment?: number;
  /** Null at the point inside a string between its rest volts and its resistance. */
  readonly from: JunctionId | null;
  readonly to: JunctionId | null;
  /** Against the same 0 V as the junctions of the operating point; against the source's minus where those are not defined. */
  readonly startV: number;
  readonly endV: number;
  /** endV - startV, by the part's own law or its answer: positive where the potential rises. */
  readonly changeV: number;
  /** Positive in the direction of the walk; null where the network does not determine it. */
  readonly currentA: number | null;
  /** Source: delivered; load: taken; else turned to heat. Null where the current is. */
  readonly powerW: number | null;
}

export interface WalkTotals {
  /** Volts lost in the wiring on the way out, and on the way back; positive where lost. */
  readonly outV: number;
  readonly backV: number;
  /** Volts at the load. */
  readonly loadV: number;
  /** Volts lost inside the source. */
  readonly sagV: number;
  /** Net rise of other strings in series on the way; 0 for most. */
  readonly otherSourcesV: number;
}

export interface VoltWalk {
  readonly ok: true;
  readonly source: PartId;
  readonly load: PartId;
  /** Begins and ends at the source's minus. */
  readonly steps: readonly WalkStep[];
  /** Rest volts of a string; the volts that any other source holds or gives. */
  readonly emfV: number;
  readonly totals: WalkTotals;
  /** Sum of all changes round the loop: zero by Kirchhoff's voltage rule, to rounding. */
  readonly closureV: number;
}

export interface NoWalk {
  readonly ok: false;
  readonly reason: string;
}

/** A load that can be walked to. */
export interface WalkChoice {
  readonly load: PartId;
  /** What the load draws there: a string under charge and the input of a controller or converter are loads too. */
  readonly currentA: number;
  /** Feeds it most; null where no source reaches it by wiring. */
  readonly source: PartId | null;
  /** All sources that reach it, the one that feeds it most first. */
  readonly sources: readonly PartId[];
}
