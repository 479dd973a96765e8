/** EMF of a lead cell from the strength of its acid: the physics behind the rest-voltage tables. */

/** Molar mass of sulphuric acid, g/mol. */
const ACID_MOLAR_MASS = 98.08;

/** Coefficients of 1, L, L^2, L^3, L^4 with L = log10(molality), 25 degC (Bode 1977). */
const POSITIVE_V = [1.628, 0.074, 0.033, 0.043, 0.022] as const;
const NEGATIVE_V = [-0.294, -0.074, -0.03, -0.031, -0.012] as const;

/**
 * EMF of one lead cell at 25 degC, volts: E = U+ - U-, each a fourth-order polynomial in log10 of the acid's molality
 * (mol of acid per kg of water, 0.1 to 7). Source: SRC-BAT-BODE.
 */
export function leadEmfFromMolality(molalityMolPerKg: number): number {
  const strength = Math.log10(molalityMolPerKg);
  return polynomial(POSITIVE_V, strength) - polynomial(NEGATIVE_V, strength);
}

/** Molality from the mass fraction w of acid (0 <= w < 1): m = 1000 w / (98.08 (1 - w)), mol/kg. */
export function molalityFromMassFraction(massFraction: number): number {
  return (1000 * massFraction) / (ACID_MOLAR_MASS * (1 - massFraction));
}

function polynomial(coefficients: readonly number[], x: number): number {
  return coefficients.reduceRight((sum, coefficient) => sum * x + coefficient, 0);
}
