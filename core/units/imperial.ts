/** Feet, inches and degrees Fahrenheit: they exist here and on screens, nowhere in between. */
import { fixedText } from './numberText.ts';

/** Metres in an inch, exact by the international definition of 1959. */
const metresPerInch = 0.0254;
const inchesPerFoot = 12;

/** A length in feet and inches, to a tenth of an inch: 3.2 m is `10 ft 6 in`. */
export function feetText({ lengthM }: { lengthM: number }): string {
  const tenths = Math.round((Math.abs(lengthM) / metresPerInch) * 10);
  const feet = Math.floor(tenths / (inchesPerFoot * 10));
  const inches = fixedText({ value: (tenths - feet * inchesPerFoot * 10) / 10, decimals: 1 });
  const sign = lengthM < 0 && tenths > 0 ? '-' : '';
  if (feet === 0) return `${sign}${inches} in`;
  return inches === '0' ? `${sign}${String(feet)} ft` : `${sign}${String(feet)} ft ${inches} in`;
}

/** A temperature in degrees Fahrenheit, to a whole degree: 35 °C is `95 °F`. */
export function fahrenheitText({ temperatureDegC }: { temperatureDegC: number }): string {
  return `${fixedText({ value: (temperatureDegC * 9) / 5 + 32, decimals: 0 })} °F`;
}
