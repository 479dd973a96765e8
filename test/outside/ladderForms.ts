/**
 * Closed forms of N equal strings of resistance R in a ladder, links r_p (plus) and r_n (minus) between neighbours, x = (r_p + r_n)/R,
 * cosh th = 1 + x/2. String 1 first.
 */

/** Both taps at string 1. */
export function sameEndShares(count: number, x: number): readonly number[] {
  const th = Math.acosh(1 + x / 2);
  const share = (k: number) => (2 * Math.sinh(th / 2) * Math.cosh((count - k + 0.5) * th)) / Math.sinh(count * th);
  return Array.from({ length: count }, (_, index) => share(index + 1));
}

/** Taps on opposite corners. */
export function diagonalShares(count: number, x: number): readonly number[] {
  const th = Math.acosh(1 + x / 2);
  const share = (k: number) =>
    (Math.sinh(th / 2) * Math.cosh((k - (count + 1) / 2) * th)) / Math.sinh((count * th) / 2);
  return Array.from({ length: count }, (_, index) => share(index + 1));
}
