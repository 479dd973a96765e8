/** A figure of an answer as a screen shows it: number and unit apart, and nothing where only the dust of a calculation is left. */
import type { UnitsFirst } from './fieldUnit.ts';
import { formatQuantity, type QuantityText } from './formatQuantity.ts';
import { fahrenheitText, feetText } from './imperial.ts';

/** Below this, in the unit itself, a figure is what rounding has left of nothing: no meter of the trade reads a thousandth of it. */
const dust = 1e-9;

export interface FigureText {
  /** With a minus sign and not a hyphen. */
  readonly number: string;
  /** With the space before it that the unit is written with. */
  readonly sign: string;
}

/** `6.217` and ` A`; `−3.2` and ` mV`; `0` and ` A` for 1e-55 A. */
export function figureText(quantity: QuantityText): FigureText {
  const value = Math.abs(quantity.value) < dust ? 0 : quantity.value;
  const text = formatQuantity({ ...quantity, value });
  const [, number = text, sign = ''] = /^(-?[\d.]+(?:e[+-]?\d+)?)(.*)$/.exec(text) ?? [];
  return { number: number.replaceAll('-', '−'), sign: sign.replace(' ', '\u00a0') };
}

/** The same in one piece. */
export function wholeFigureText(quantity: QuantityText): string {
  const { number, sign } = figureText(quantity);
  return `${number}${sign}`;
}

/** A quantity in the units that come first: `20 °C` or `68 °F`, `3.2 m` or `10 ft 6 in`; all others as they are. */
export function firstText({ first, ...quantity }: QuantityText & { readonly first: UnitsFirst }): string {
  const { value, unit } = quantity;
  if (first === 'us' && unit === 'degC') return fahrenheitText({ temperatureDegC: value });
  if (first === 'us' && unit === 'm') return feetText({ lengthM: value });
  return formatQuantity(quantity);
}
