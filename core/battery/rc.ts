/** How the resistance of a string grows from the first second to minutes: one resistor and a few RC elements. */
import type { StringPart } from '../job/part.ts';
import type { StringContext } from './stringSource.ts';
import { stringSource } from './stringSource.ts';

export interface RcElement {
  readonly resistanceOhm: number;
  /** R C, seconds. */
  readonly tauS: number;
}

/** U = E - R0 I - sum of the element volts; current positive on discharge. */
export interface RcModel {
  readonly instantOhm: number;
  readonly elements: readonly RcElement[];
}

/**
 * RC model of a string: R0 is its fast resistance, and the elements share (slow - fast) as the chemistry's published fits
 * do, so that R(t) runs from fast to slow. A resistance entered in the job serves both models and leaves no elements.
 * Source: rows of `data/chemistry/relaxation.csv`.
 */
export function rcModel(string: StringPart, { ambientDegC, tables }: Omit<StringContext, 'model'>): RcModel {
  const fast = stringSource(string, { model: 'fast', ambientDegC, tables }).resistanceOhm.value;
  const slow = stringSource(string, { model: 'slow', ambientDegC, tables }).resistanceOhm.value;
  const growth = slow - fast;
  if (growth <= 0) return { instantOhm: fast, elements: [] };
  const elements = tables.relaxation[string.chemistry].map(({ share, tauS }) => ({
    resistanceOhm: share * growth,
    tauS,
  }));
  return { instantOhm: fast, elements };
}

/** Resistance that a steady current has met `seconds` (>= 0) after it began: R0 + sum R_k (1 - exp(-t / tau_k)). */
export function resistanceAfter(model: RcModel, seconds: number): number {
  return model.elements.reduce(
    (sum, { resistanceOhm, tauS }) => sum - resistanceOhm * Math.expm1(-seconds / tauS),
    model.instantOhm,
  );
}

/**
 * Volts of the elements after a steady current of `currentA` for `seconds`, exact for any step:
 *
 *   v' = v exp(-dt/tau) + I R (1 - exp(-dt/tau))
 *
 * `elementV` runs parallel to `model.elements`.
 */
export function advanceElements(
  model: RcModel,
  elementV: readonly number[],
  { currentA, seconds }: { currentA: number; seconds: number },
): readonly number[] {
  return model.elements.map(({ resistanceOhm, tauS }, index) => {
    const kept = Math.exp(-seconds / tauS);
    return (elementV[index] ?? 0) * kept + currentA * resistanceOhm * (1 - kept);
  });
}
