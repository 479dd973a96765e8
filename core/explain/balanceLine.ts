/** The figures of the balance that stands under every screen: what goes in, what comes out, what warms the wiring. */
import type { JunctionId } from '../job/part.ts';
import type { OperatingPoint } from '../network/answer.ts';

export interface BalanceLine {
  readonly outcome: OperatingPoint['outcome'];
  readonly inW: number;
  readonly outW: number;
  readonly heatW: number;
  /** inW - outW - heatW. */
  readonly mismatchW: number;
  /** Largest remainder of Kirchhoff's current rule, A, and the junction where it stands. */
  readonly largestRemainderA: number;
  readonly at: JunctionId | null;
  /** Largest remainder of Kirchhoff's voltage rule, V. */
  readonly largestLoopV: number;
  /** Dimensionless. */
  readonly relativeResidual: number;
  readonly iterations: number;
  /** Every bound of the proof holds. */
  readonly holds: boolean;
}

/** From the proof of an operating point; all zero where nothing is supplied or no point exists. */
export function balanceLine({ outcome, proof }: Pick<OperatingPoint, 'outcome' | 'proof'>): BalanceLine {
  return {
    outcome,
    inW: proof.powerInW,
    outW: proof.powerOutW,
    heatW: proof.heatW,
    mismatchW: proof.mismatchW,
    largestRemainderA: proof.worstJunctionA,
    at: proof.worstJunction,
    largestLoopV: proof.worstLoopV,
    relativeResidual: proof.relativeResidual,
    iterations: proof.iterations,
    holds: proof.holds,
  };
}
