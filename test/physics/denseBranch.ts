/**
 * The branches of the dense reference solver: every part of a job becomes one or more branches between two nodes. A branch
 * current runs from node `a` to node `b` through the branch; its volts are V(a) - V(b). Sources are drawn from their minus
 * (`a`) to their plus (`b`), so that their branch current is the current out of plus.
 */

/** A photovoltaic curve: amps at given volts, and their slope. */
export interface PanelCurve {
  readonly currentA: (volts: number) => number;
  /** dI/dV, A per V: negative. */
  readonly slope: (volts: number) => number;
  readonly openCircuitV: number;
}

export type Law =
  /** v = emf + R i. A string from minus to plus has emf = -EMF. */
  | { readonly type: 'ohm'; readonly ohm: number; readonly emfV: number }
  /** v = 0. */
  | { readonly type: 'short' }
  /** v fixed. */
  | { readonly type: 'hold'; readonly volts: number }
  /** i fixed. */
  | { readonly type: 'amps'; readonly amps: number }
  /** i = P / v. */
  | { readonly type: 'watts'; readonly watts: number }
  /** v = (R + c i²) i: a wire warmed by its own current. */
  | { readonly type: 'warm'; readonly ohm: number; readonly ohmPerA2: number }
  /** i = curve(-v). */
  | { readonly type: 'panel'; readonly curve: PanelCurve }
  /** i = 0 with v <= forward, or v = forward + slope i with i >= 0. */
  | { readonly type: 'diode'; readonly forwardV: number; readonly slopeOhm: number }
  /** 0 <= i <= limit below the set point, any such i at it, 0 above it. `harvestW` also limits i to harvestW / u. */
  | {
      readonly type: 'feed';
      readonly outputA: number;
      readonly setpointV: number;
      readonly harvestW: number | undefined;
    }
  /** i = (u i of the feed / efficiency + standby) / v: the input of a converter, whose output is branch `feed`. */
  | { readonly type: 'draw'; readonly feed: number; readonly efficiency: number; readonly standbyW: number }
  /** A direct controller: joined below the set point of (out - outMinus), never backwards, never above its limit. */
  | { readonly type: 'pass'; readonly outputA: number; readonly setpointV: number; readonly outMinus: number };

export interface Branch {
  /** Part id, with a suffix where a part has several branches: `#2` segment, `#low` half, `#in`, `#out`, `#return`. */
  readonly key: string;
  readonly a: number;
  readonly b: number;
  readonly law: Law;
}

/** Laws whose current is an unknown of its own; the others give their current from the volts. */
export function hasOwnCurrent(law: Law): boolean {
  return !(
    law.type === 'ohm' ||
    law.type === 'amps' ||
    law.type === 'watts' ||
    law.type === 'panel' ||
    law.type === 'draw'
  );
}

/**
 * Which of a branch's equations holds: no current (`lower`), its own line between volts and amps (`middle`), its limit
 * (`upper`); for a direct controller also its set point (`held`), `middle` being joined.
 */
export type BranchState = 'none' | 'lower' | 'middle' | 'held' | 'upper';

export function hasStates(law: Law): boolean {
  return law.type === 'diode' || law.type === 'feed' || law.type === 'pass';
}
