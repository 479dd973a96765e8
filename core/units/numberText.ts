/** A number as text, the same in every place and country: decimal point, no grouping, no trailing zeros, never `-0`. */

/** Beyond these a figure is written with a power of ten, as in `2.8e-14`. */
const smallestPlain = 1e-4;
const largestPlain = 1e15;

/**
 * A number to at most `digits` significant digits. Whole places are never rounded away: 12345 to 3 digits is `12345`.
 * A value that is not finite is written `not finite`; it is a defect if one is to be printed.
 */
export function numberText({ value, digits = 4 }: { value: number; digits?: number }): string {
  if (!Number.isFinite(value)) return 'not finite';
  const size = Math.abs(value);
  if (size === 0) return '0';
  if (size < smallestPlain || size >= largestPlain) return trimmed(value.toExponential(digits - 1));
  const wholePlaces = Math.floor(Math.log10(size)) + 1;
  return fixedText({
    value: Number(value.toPrecision(Math.max(digits, wholePlaces))),
    decimals: Math.max(0, digits - wholePlaces),
  });
}

/** A number to `decimals` places after the point; with `keepZeros` always that many, for columns. */
export function fixedText({
  value,
  decimals,
  keepZeros = false,
}: {
  value: number;
  decimals: number;
  keepZeros?: boolean;
}): string {
  if (!Number.isFinite(value)) return 'not finite';
  const text = value.toFixed(decimals);
  const unsigned = /^-0(?:\.0*)?$/.test(text) ? text.slice(1) : text;
  return keepZeros ? unsigned : trimmed(unsigned);
}

/** Without zeros at the end of the decimals. */
function trimmed(text: string): string {
  return text.replace(/(\.\d*?)0+(?=e|$)/, '$1').replace(/\.(?=e|$)/, '');
}
