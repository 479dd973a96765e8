/**
 * One loop of a driving voltage that falls straight with the charge it gives, a resistance, and RC elements: the exact current.
 *
 *   gap' = -s I,   v_j' = I R_j/tau_j - v_j/tau_j,   I = (gap - sum v_j)/R
 *
 * With x = (-gap, v_1 … v_n), poles p = (0, 1/tau_1 …) and weights w = (s, R_1/tau_1 …) this is x' = -(diag(p) + w 1^T/R) x, a
 * diagonal with one rank added. Its rates m are the roots of R + sum w_k/(p_k - m) = 0, one between each two neighbouring
 * poles and one above the last, all real: I(t) = sum i_m exp(-m t) with i_m = sum x_k/(p_k - m) / sum w_k/(p_k - m)^2.
 */

/** RC elements of the whole loop, slowest first, no two of the same time. */
export interface Loop {
  readonly ohm: number;
  readonly elements: readonly LoopElement[];
}

export interface LoopElement {
  readonly resistanceOhm: number;
  readonly tauS: number;
}

export interface LoopState {
  readonly gapV: number;
  /** By element of the loop; against the gap. */
  readonly elementV: readonly number[];
}

interface Mode {
  readonly ratePerS: number;
  readonly amplitudeA: number;
  /** p_k - m by pole, kept exact where m lies next to a pole. */
  readonly distances: readonly number[];
}

/** A flat stretch is given this slope, V/C: too small to be seen in any answer, and no case of its own. */
const LEAST_SLOPE = 1e-18;

export class LoopModes {
  private readonly weights: readonly number[];
  private readonly modes: readonly Mode[];

  /** `slopeVPerC` >= 0: by how much the gap falls for each coulomb. */
  constructor({ ohm, elements }: Loop, slopeVPerC: number, { gapV, elementV }: LoopState) {
    const poles = [0, ...elements.map(({ tauS }) => 1 / tauS)];
    this.weights = [Math.max(slopeVPerC, LEAST_SLOPE), ...elements.map((one) => one.resistanceOhm / one.tauS)];
    const start = [-gapV, ...elementV];
    this.modes = poles.map((_, index) => this.modeAbove(index, poles, ohm, start));
  }

  currentA(seconds: number): number {
    return this.modes.reduce((sum, mode) => sum + mode.amplitudeA * Math.exp(-mode.ratePerS * seconds), 0);
  }

  /** Charge moved in the first `seconds`, C. */
  chargeC(seconds: number): number {
    return this.modes.reduce((sum, mode) => sum + mode.amplitudeA * elapsed(mode.ratePerS, seconds), 0);
  }

  /** Volts of element `index` of the loop. */
  elementV(index: number, seconds: number): number {
    return this.modes.reduce(
      (sum, mode) => sum + this.elementPart(mode, index) * Math.exp(-mode.ratePerS * seconds),
      0,
    );
  }

  /** Integral of the current squared over the first `seconds` (may be infinite), A2 s. */
  squaredA2s(seconds: number): number {
    return this.integralOfProduct((mode) => mode.amplitudeA, seconds);
  }

  /** Integral of an element's volts squared, V2 s. */
  squaredV2s(index: number, seconds: number): number {
    return this.integralOfProduct((mode) => this.elementPart(mode, index), seconds);
  }

  private elementPart(mode: Mode, index: number): number {
    return (this.weights[index + 1]! / mode.distances[index + 1]!) * mode.amplitudeA;
  }

  private integralOfProduct(part: (mode: Mode) => number, seconds: number): number {
    let sum = 0;
    for (const one of this.modes) {
      for (const other of this.modes) {
        sum += part(one) * part(other) * elapsed(one.ratePerS + other.ratePerS, seconds);
      }
    }
    return sum;
  }

  private modeAbove(index: number, poles: readonly number[], ohm: number, start: readonly number[]): Mode {
    const { weights } = this;
    const sum = (pole: number, offset: number): number => {
      let total = ohm;
      for (let k = 0; k < poles.length; k++) total += weights[k]! / (poles[k]! - poles[pole]! - offset);
      return total;
    };
    const above = poles[index + 1];
    const width = (above ?? poles[index]! + weights.reduce((total, weight) => total + weight, 0) / ohm) - poles[index]!;
    const isNearer = above === undefined || sum(index, width / 2) > 0;
    const pole = isNearer ? index : index + 1;
    const direction = isNearer ? 1 : -1;
    const distance = rootOf(
      (apart) => direction * sum(pole, direction * apart),
      above === undefined ? width : width / 2,
    );
    const distances = poles.map((place) => place - poles[pole]! - direction * distance);
    const over = distances.reduce((total, apart, k) => total + start[k]! / apart, 0);
    const under = distances.reduce((total, apart, k) => total + weights[k]! / (apart * apart), 0);
    return { ratePerS: poles[pole]! + direction * distance, amplitudeA: over / under, distances };
  }
}

/** Integral of exp(-rate t) over the first `seconds`. */
function elapsed(ratePerS: number, seconds: number): number {
  return -Math.expm1(-ratePerS * seconds) / ratePerS;
}

/** Root of a function that rises from below 0 near x = 0, to full relative precision: halving the logarithm. */
function rootOf(rises: (x: number) => number, most: number): number {
  let low = most * 1e-40;
  let high = most;
  for (let step = 0; step < 200 && high > low * (1 + 2e-16); step++) {
    const middle = Math.sqrt(low) * Math.sqrt(high);
    if (middle <= low || middle >= high) break;
    if (rises(middle) < 0) low = middle;
    else high = middle;
  }
  return high;
}
